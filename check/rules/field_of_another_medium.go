package rules

import (
	"fmt"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// FieldOfAnotherMedium finds a field strength bound to one medium that is
// multiplied by the property of another.
func (Book) FieldOfAnotherMedium() check.Rule {
	return check.Rule{
		Name:     "field-of-another-medium",
		Severity: lang.Error,
		Title:    "A field strength of one medium is multiplied by a property of another",
		Sees: "A product of an electric or magnetic field strength that is bound to a medium (`E in oil`) with the permittivity, permeability or conductivity of another medium, " +
			"where no property of its own medium is in the product.",
		Silent: "For flux densities, of which the normal component crosses a boundary; where a property of the field's own medium stands in the same product " +
			"(oil.eps*E_oil/board.eps is the field in the board); for fields that are bound to no medium.",
		Formula: "D = ε(r)E: at a boundary the normal component of E jumps by ε₁/ε₂; tangential E is continuous and belongs to both media.",
		Remedy:  "Take the field of that medium, or make it from D.",
		Source:  "Jackson, Classical Electrodynamics, 3rd ed., I.5 (boundary conditions; from memory)",
		Wrong: check.Example{Note: `    medium oil: linear, isotropic, homogeneous
        eps_r = 2.2
    medium board: linear, isotropic, homogeneous
        eps_r = 4.4
    E in oil, instantaneous electric field strength = 6 kV/mm
    w, energy density = 1/2*board.eps*E^2 = 701 J/m^3
`},
		Right: check.Example{Note: `    medium oil: linear, isotropic, homogeneous
        eps_r = 2.2
    medium board: linear, isotropic, homogeneous
        eps_r = 4.4
    E in oil, instantaneous electric field strength = 6 kV/mm
    E_b in board, instantaneous electric field strength = oil.eps*E/board.eps = 3 kV/mm
    w, energy density = 1/2*board.eps*E_b^2 = 175.3 J/m^3
`},
		Run: perSymbol(fieldOfAnother),
	}
}

func fieldOfAnother(p *check.Pass, s *lang.Symbol) {
	for _, t := range terms(p.Note.Normal(s, lang.NamesStay)) {
		field, prop, ok := crossing(t)
		if ok && sameCrystal(p.Note, field.Symbol.Facts.Media[0], propertyMedium(prop)) {
			continue // one crystal in two frames: axis-frame-mismatch speaks about tensors
		}
		if ok {
			reportCrossing(p, s, field, prop)
			return
		}
	}
}

// crossing finds a field and a property of different media in one product.
func crossing(t lang.Term) (field, prop lang.Factor, ok bool) {
	owners := map[string]bool{}
	for _, f := range t.Factors {
		if m := propertyMedium(f); m != "" {
			owners[m] = true
			prop = f
		}
	}
	if len(owners) == 0 {
		return field, prop, false
	}
	for _, f := range t.Factors {
		if f.Symbol == nil || f.Symbol.Def == nil || f.Symbol.Def.In == nil || !isFieldStrength(f.Facts.Kind) {
			continue
		}
		if m := lang.CanonicalName(f.Symbol.Def.In.Text); len(f.Symbol.Facts.Media) > 0 && !owners[m] && !owners[f.Symbol.Facts.Media[0]] {
			return f, prop, true
		}
	}
	return field, prop, false
}

func isFieldStrength(k kind.ID) bool {
	return k.Is(kind.ElectricFieldStrength) && !k.Is(kind.DielectricStrength) || k.Is(kind.MagneticFieldStrength)
}

// propertyMedium is the medium of a permittivity, permeability or conductivity.
func propertyMedium(f lang.Factor) string {
	if f.Symbol == nil || f.Symbol.Owner == nil || f.Symbol.Owner.Role != lang.RoleMedium {
		return ""
	}
	for _, k := range []kind.ID{kind.Permittivity, kind.RelativePermittivity, kind.Permeability, kind.RelativePermeability, kind.Conductivity, kind.Resistivity} {
		if f.Facts.Kind.Is(k) {
			return f.Symbol.Owner.Key
		}
	}
	return ""
}

func reportCrossing(p *check.Pass, s *lang.Symbol, field, prop lang.Factor) {
	x := s.Def.Members[0]
	span := s.Stmt.Abs(x)
	if at, ok := placeOf(s, prop); ok {
		span = at
	}
	own := field.Symbol.Def.In.Text
	p.Report(lang.Fault{
		Span:    span,
		Message: fmt.Sprintf("%s is the field in %s, and %s belongs to %s", field.Symbol.Name, own, prop.Key, prop.Symbol.Owner.Name),
		Detail:  fmt.Sprintf("Take the field in %s, or a property of %s. The flux density normal to a boundary is the same on both sides, the field is not.", prop.Symbol.Owner.Name, own),
		Related: []lang.Related{{Path: field.Symbol.Path, Span: field.Symbol.Span, Message: fmt.Sprintf("%s is bound to %s here", field.Symbol.Name, own)}},
	})
}

// placeOf finds where the property is written in the definition.
func placeOf(s *lang.Symbol, prop lang.Factor) (span lang.Span, ok bool) {
	lang.Walk(s.Def.Members[0], func(t lang.Tree) bool {
		if m, is := t.(*lang.Member); is && !ok {
			if n, named := m.X.(*lang.Name); named && lang.CanonicalName(n.Text) == prop.Symbol.Owner.Key {
				span, ok = s.Stmt.Abs(m), true
			}
		}
		return !ok
	})
	return span, ok
}
