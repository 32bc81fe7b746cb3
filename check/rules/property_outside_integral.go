package rules

import (
	"fmt"
	"slices"
	"strings"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// PropertyOutsideIntegral finds a property of one medium, or a mean of several,
// that multiplies an integral which reaches into other media.
func (Book) PropertyOutsideIntegral() check.Rule {
	return check.Rule{
		Name:     "property-outside-integral",
		Severity: lang.Error,
		Title:    "A property stands before an integral in which it varies",
		Sees: "An energy, a power or a charge in which a permittivity, a permeability, a conductivity or a loss factor multiplies an integral (over a region, a variable or a table), " +
			"where the integrand holds a field or a property of another medium, or where the medium of the property is inhomogeneous; and the arithmetic mean of a property of several media, " +
			"before an integral (an error) or before the square of a field that is a voltage over the sum of several thicknesses (an error), or of any other field (a caution).",
		Silent:  "For an integral in one homogeneous medium; for a property that stays under the integral; for each region integrated by itself; for a mean that is weighted as the layers are in series (Σd/Σ(d/ε)).",
		Formula: "∫ε(r)E² dV ≠ ε̄·∫E² dV, since E redistributes with ε: across layers in series E_n jumps by ε₁/ε₂, and only parallel layers take the arithmetic mean.",
		Remedy:  "Keep the property under the integral, or integrate each medium by itself: `integral(1/2*eps_l(r)*E(r)^2 …)`.",
		Source:  "Jackson, Classical Electrodynamics, 3rd ed., 4.7 (the permittivity under the integral; from memory)",
		Wrong: check.Example{Note: `    medium film: linear, isotropic, homogeneous
        eps_r = 2.3
    medium board: linear, isotropic, homogeneous
        eps_r = 6.0
    d_1 = 1 mm
    d_2 = 3 mm
    U, static voltage = 10 kV
    ε_m, permittivity = (d_1*film.eps + d_2*board.eps)/(d_1 + d_2)
    E_m, static electric field strength = U/(d_1 + d_2)
    W_A, areic energy = 1/2*ε_m*E_m^2*(d_1 + d_2) = 0.562 J/m^2
`},
		Right: check.Example{Note: `    medium film: linear, isotropic, homogeneous
        eps_r = 2.3
    medium board: linear, isotropic, homogeneous
        eps_r = 6.0
    d_1 = 1 mm
    d_2 = 3 mm
    U, static voltage = 10 kV
    D, static electric flux density = U/(d_1/film.eps + d_2/board.eps)
    W_A, areic energy = 1/2*D*U = 0.474 J/m^2
`},
		Run: perClaim(outsideIntegral),
	}
}

func outsideIntegral(p *check.Pass, c *claim) {
	if _, ok := c.form(); !ok && !c.sym.Facts.Kind.Is(kind.ElectricCharge) {
		return
	}
	for _, t := range c.view.products(c.sym) {
		f, why, severity := c.outside(t)
		if why == "" {
			continue
		}
		out := lang.Fault{
			Message: fmt.Sprintf("%s multiplies %s", factorName(f), why),
			Detail:  "Keep the property under the integral, or integrate each medium by itself.",
			Related: c.because([]lang.Factor{f}, func(s *lang.Symbol) string { return s.Name + " = " + s.Shown }),
		}
		if severity != 0 {
			out.Severity = p.Lowered()
			out.Detail = "That is right where all media see the same field: layers side by side. For layers one behind the other take U²/(2Σd/ε)."
		}
		c.report(p, out)
		return
	}
}

// outside looks for a property in a term that does not hold for all of what it
// multiplies; why is "" where there is none.
func (c *claim) outside(t *product) (f lang.Factor, why string, lower int) {
	over, media := integralIn(t)
	for _, f := range t.all {
		own := f.Facts.Media
		if !isConstantOfMedia(f) || len(own) == 0 || f.Symbol == nil {
			continue
		}
		mean := len(own) > 1 && f.Symbol.Owner == nil && arithmetic(c.note, f.Symbol)
		switch {
		case over && mean:
			return f, "an integral, and is the mean of a property over " + listed(c.note, own), 0
		case over && foreign(media, own) != "":
			return f, fmt.Sprintf("an integral with fields or properties of %s", foreign(media, own)), 0
		case over && c.graded(own[0]):
			return f, fmt.Sprintf("an integral, and %s is inhomogeneous", own[0]), 0
		case mean && !over && t.degree[roleElectric] == two && len(t.byRole[roleElectric]) == 1:
			if acrossLayers(c.note, t.byRole[roleElectric][0].Symbol) {
				return f, "the square of a mean field, and is itself a mean over layers in series", 0
			}
			return f, "the square of a field, and is the mean of a property over " + listed(c.note, own), 1
		}
	}
	return f, "", 0
}

// isConstantOfMedia reports a factor that stands for a property in linear laws.
func isConstantOfMedia(f lang.Factor) bool {
	for _, k := range []kind.ID{kind.Permittivity, kind.Permeability, kind.Conductivity} {
		if isOf(f.Facts, k) {
			return true
		}
	}
	return f.Facts.Kind.Is(kind.RelativePermittivity) || f.Facts.Kind.Is(kind.RelativePermeability) || f.Facts.Kind.Is(kind.LossFactor)
}

// integralIn reports an integral among the factors, and the media in it.
func integralIn(t *product) (found bool, media []string) {
	for _, f := range t.all {
		if f.Over != nil || strings.HasPrefix(f.Key, "(integral(") {
			found = true
			media = append(media, f.Facts.Media...)
			if f.Over != nil {
				for _, g := range t.all { // what stood under it is a factor now
					if g.Facts.Kind.Is(kind.ElectricFieldStrength) || g.Facts.Kind.Is(kind.MagneticFieldStrength) {
						media = append(media, g.Facts.Media...)
					}
				}
			}
		}
	}
	return found, media
}

// foreign names a medium of the first list that the second lacks.
func foreign(media, own []string) string {
	for _, m := range media {
		if !slices.Contains(own, m) {
			return m
		}
	}
	return ""
}

func (c *claim) graded(key string) bool {
	m, ok := mediumOf(c.note, key)
	return ok && m.says("inhomogeneous")
}

// arithmetic reports a sum in which the properties stand as they are, also over
// a divisor without properties: a mean of layers in series has the reciprocals.
func arithmetic(n *lang.Note, s *lang.Symbol) bool {
	x := unparenthesized(s.Def.Members[0])
	if b, ok := x.(*lang.Binary); ok && b.Op == lang.OpDiv {
		if f, ok := n.FactsOf(s.Stmt, b.Y); !ok || len(f.Media) > 0 {
			return false
		}
		x = b.X
	}
	form := n.Form(s, x, lang.NamesStay)
	if form == nil || len(form.Terms) < 2 {
		return false
	}
	media := map[string]bool{}
	for _, t := range form.Terms {
		for _, f := range t.Factors {
			if isConstantOfMedia(f) && f.Exp.Sign() > 0 && len(f.Facts.Media) == 1 {
				media[f.Facts.Media[0]] = true
			}
		}
	}
	return len(media) > 1
}

// acrossLayers reports a field that is a voltage over a sum of plain lengths.
func acrossLayers(n *lang.Note, s *lang.Symbol) bool {
	if s == nil || s.Def == nil || len(s.Def.Members) == 0 {
		return false
	}
	b, ok := unparenthesized(s.Def.Members[0]).(*lang.Binary)
	if !ok || b.Op != lang.OpDiv {
		return false
	}
	sum, ok := unparenthesized(b.Y).(*lang.Binary)
	if !ok || sum.Op != lang.OpAdd {
		return false
	}
	over, ok := n.FactsOf(s.Stmt, sum)
	above, ok2 := n.FactsOf(s.Stmt, b.X)
	return ok && ok2 && len(over.Media) == 0 && isOf(over, kind.Length) && isOf(above, kind.Voltage)
}

// unparenthesized takes plain parentheses off.
func unparenthesized(x lang.Expr) lang.Expr {
	for {
		p, ok := x.(*lang.Paren)
		if !ok || p.Unit != nil || p.Spread != nil {
			return x
		}
		x = p.X
	}
}

// listed writes media in words.
func listed(n *lang.Note, keys []string) string {
	names := make([]string, len(keys))
	for i, k := range keys {
		names[i] = k
		if s := n.Lookup(k); s != nil {
			names[i] = s.Name
		}
	}
	return strings.Join(names[:len(names)-1], ", ") + " and " + names[len(names)-1]
}

// factorName names a factor as its author does.
func factorName(f lang.Factor) string {
	if f.Symbol != nil {
		return ownedName(f.Symbol)
	}
	return strings.Trim(f.Key, "()")
}
