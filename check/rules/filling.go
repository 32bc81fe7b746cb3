package rules

import (
	"inkjoule/lang"
	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
)

// This file counts how often the relative constant of a medium stands in an
// energy: once beside E², not beside D·E, inversely beside D².

// filling is one kind of medium constant, with the fields that it links.
type filling struct {
	constant          string  // of the vacuum
	field, density    kind.ID // E and D, H and B
	whole, relative   kind.ID
	properties        [2]string // of a medium: relative, absolute
	absolute, product string    // for messages
	flux              string
}

// The two kinds of filling; read only.
var (
	dielectric = filling{"eps_0", kind.ElectricFieldStrength, kind.ElectricFluxDensity, kind.Permittivity, kind.RelativePermittivity,
		[2]string{"eps_r", "eps"}, "an absolute permittivity", "D·E", "the flux density"}
	magnetic = filling{"mu_0", kind.MagneticFieldStrength, kind.MagneticFluxDensity, kind.Permeability, kind.RelativePermeability,
		[2]string{"mu_r", "mu"}, "an absolute permeability", "B·H", "the flux density"}
)

// throughConstants looks through auxiliary names and through names of
// permittivities and permeabilities.
func throughConstants(s *lang.Symbol) bool {
	r := roleOf(s.Facts)
	return throughSquares(s) || r == roleCapacity || r == roleInduction
}

// counted is how often relative constants stand in a term.
type counted struct {
	times  int
	vacuum bool         // the vacuum's constant is there
	of     *lang.Symbol // the constant that counts
	name   string
}

// count tells how often the relative constant of one medium stands in a term,
// and how often it should; ok is false for terms of another make.
func (s filling) count(n *lang.Note, t *product) (found counted, right int, ok bool) {
	fields, fluxes := 0, 0
	for _, f := range t.all {
		e, whole := f.Exp.Int()
		if !whole {
			return found, 0, false
		}
		switch {
		case isOf(f.Facts, s.field) && !isPolarization(f):
			fields += e
		case isOf(f.Facts, s.density) && !isPolarization(f) && !f.Facts.Kind.Is(kind.AreicElectricCharge):
			fluxes += e
		case f.Key == s.constant:
			found.vacuum = true
		case isOf(f.Facts, s.whole), f.Facts.Kind.Is(s.relative):
			if found.of != nil && owner(found.of) != owner(f.Symbol) {
				return found, 0, false // two media
			}
			found.times, found.of, found.name = found.times+e, f.Symbol, factorName(f)
		case isPolarization(f), opaqueFactor(f):
			return found, 0, false
		}
	}
	if fields < 0 || fluxes < 0 || fields+fluxes != 2 {
		return found, 0, false
	}
	return found, (fields - fluxes) / 2, found.of == nil || found.of.Owner != nil || found.of.Facts.Kind.Is(s.relative)
}

// owner is the medium of a property, or the quantity itself.
func owner(s *lang.Symbol) *lang.Symbol {
	if s != nil && s.Owner != nil {
		return s.Owner
	}
	return s
}

// filledBy finds the medium in which the fields of a term are, by their
// definition or by the region over which they are integrated, and its relative
// constant; nil where that does not exceed 1.05.
func (c *claim) filledBy(s filling, t *product) (*lang.Symbol, float64) {
	keys := map[string]bool{}
	for _, f := range t.all {
		if f.Symbol == nil || f.Symbol.Def == nil || !isOf(f.Facts, s.field) && !isOf(f.Facts, s.density) {
			continue
		}
		if in := f.Symbol.Def.In; in != nil {
			keys[lang.CanonicalName(in.Text)] = true
		}
	}
	for _, f := range t.all {
		if f.Over == nil || f.Over.Stmt == nil || len(keys) > 0 {
			continue
		}
		if r, ok := f.Over.Stmt.Tree.(*lang.Region); ok && r.In != nil {
			keys[lang.CanonicalName(r.In.Text)] = true
		}
	}
	for key := range keys {
		if m, ok := mediumOf(c.note, key); ok && len(keys) == 1 {
			if x, ok := s.relativeOf(c.note, m); ok && x > polarizes {
				return m.sym, x
			}
		}
	}
	return nil, 0
}

// relativeOf is the scalar relative constant of a medium, the least element on
// the diagonal of a tensor.
func (s filling) relativeOf(n *lang.Note, m medium) (float64, bool) {
	for i, name := range s.properties {
		p := n.Lookup(m.sym.Key + "." + name)
		if p == nil || p.Role == lang.RoleFunction || !p.Known {
			continue
		}
		over := 1.0
		if i == 1 {
			over = n.Lookup(s.constant).Value.Re()
		}
		if p.Facts.Shape == eval.Tensor {
			return min(p.Value.At(0).Re(), p.Value.At(4).Re(), p.Value.At(8).Re()) / over, true
		}
		x, ok := magnitude(p)
		return x / over, ok
	}
	return 0, false
}
