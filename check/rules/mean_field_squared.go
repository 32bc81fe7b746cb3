package rules

import (
	"fmt"
	"math"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// MeanFieldSquared finds the square of a mean field in a gap between two radii.
func (Book) MeanFieldSquared() check.Rule {
	return check.Rule{
		Name:     "mean-field-squared",
		Severity: lang.Error,
		Title:    "The square of a mean field stands for the mean of the square",
		Sees: "An energy or a power with the square of a field strength that is a voltage over the difference of two radii (b − a), where the note makes a coaxial or spherical field of them: " +
			"they stand in ln(b/a), bound a region (tube, shell), or are declared as radii.",
		Silent:  "For a thin gap with b/a below 1.05; for the field as a function of the radius, integrated; for ½·C·U²; for a plane gap; in an inhomogeneous medium, which may be graded for a uniform field.",
		Formula: "⟨E²⟩ ≥ ⟨E⟩²: W = ½ε∫E² dV = ½CU², per length π·ε·U²/ln(b/a) for a coaxial gap; U/(b − a) is a mean along a path.",
		Remedy:  "Integrate the square of the field, or use the capacitance.",
		Source:  "common practice; the coaxial field is in every textbook (from memory)",
		Wrong: check.Example{Note: `    r_i, radius = 5 mm
    r_o, radius = 20 mm
    U, static voltage = 20 kV
    E_m, static electric field strength = U/(r_o - r_i)
    W_l, lineic energy = 1/2*eps_0*E_m^2*pi*(r_o^2 - r_i^2) = 9.27 mJ/m
`},
		Right: check.Example{Note: `    r_i, radius = 5 mm
    r_o, radius = 20 mm
    U, static voltage = 20 kV
    W_l, lineic energy = pi*eps_0*U^2/ln(r_o/r_i) = 8.03 mJ/m
`},
		Run: meanFieldSquared,
	}
}

// thinGap is the ratio of radii below which a gap is as good as plane.
const thinGap = 1.05

func meanFieldSquared(p *check.Pass) error {
	for _, c := range viewOf(p).claims {
		if _, ok := c.form(); !ok {
			continue
		}
		for _, t := range c.view.products(c.sym) {
			if len(t.byRole[roleElectric]) != 1 || t.byRole[roleElectric][0].Exp != two || !isOf(t.byRole[roleElectric][0].Facts, kind.ElectricFieldStrength) {
				continue
			}
			if field := t.byRole[roleElectric][0].Symbol; field != nil && c.overRadii(p, field) {
				break
			}
		}
	}
	return nil
}

// overRadii reports a field that is a voltage over the difference of two radii.
func (c *claim) overRadii(p *check.Pass, field *lang.Symbol) bool {
	outer, inner := radiiOf(p.Note, field)
	if outer == nil || !roundGap(p.Note, outer, inner) || c.madeUniform() {
		return false
	}
	b, ok1 := magnitude(outer)
	a, ok2 := magnitude(inner)
	if ok1 && ok2 && (a == 0 || math.Max(a/b, b/a) < thinGap) {
		return false
	}
	f := lang.Fault{
		Message: fmt.Sprintf("%s squares %s, the mean of the field along the gap: the mean of the square is larger", c.sym.Name, field.Name),
		Detail:  "Integrate E(r)^2 over the volume, or use ½·C·U². A mean along a path is no mean over the volume.",
		Related: []lang.Related{{Span: field.Span, Path: field.Path, Message: fmt.Sprintf("%s is a voltage over %s − %s", field.Name, outer.Name, inner.Name)}},
	}
	c.report(p, f)
	return true
}

// madeUniform reports a medium that is graded: it may make the field the same
// everywhere.
func (c *claim) madeUniform() bool {
	for _, m := range c.mediaOf() {
		if m.says("inhomogeneous") {
			return true
		}
	}
	return false
}

// radiiOf gives the two lengths whose difference divides a voltage.
func radiiOf(n *lang.Note, field *lang.Symbol) (outer, inner *lang.Symbol) {
	if field.Def == nil || len(field.Def.Members) == 0 {
		return nil, nil
	}
	over, ok := unparenthesized(field.Def.Members[0]).(*lang.Binary)
	if !ok || over.Op != lang.OpDiv {
		return nil, nil
	}
	gap, ok := unparenthesized(over.Y).(*lang.Binary)
	above, known := n.FactsOf(field.Stmt, over.X)
	if !ok || gap.Op != lang.OpSub || !known || !isOf(above, kind.Voltage) {
		return nil, nil
	}
	x, ok1 := gap.X.(*lang.Name)
	y, ok2 := gap.Y.(*lang.Name)
	if !ok1 || !ok2 {
		return nil, nil
	}
	a, b := n.Lookup(lang.CanonicalName(x.Text)), n.Lookup(lang.CanonicalName(y.Text))
	if a == nil || b == nil || !isOf(a.Facts, kind.Length) || !isOf(b.Facts, kind.Length) {
		return nil, nil
	}
	return a, b
}

// roundGap reports two lengths that the note shows to be radii: by their kind,
// in ln(b/a), or as the bounds of a region.
func roundGap(n *lang.Note, a, b *lang.Symbol) bool {
	if a.Facts.Kind.Is(kind.Radius) && b.Facts.Kind.Is(kind.Radius) {
		return true
	}
	round := false
	for _, s := range n.Script.Stmts {
		lang.Walk(s.Tree, func(t lang.Tree) bool {
			if call, ok := t.(*lang.Call); ok && (call.Fn.Text == "ln" || call.Fn.Text == "tube" || call.Fn.Text == "shell") {
				round = round || names(call, a.Key) && names(call, b.Key)
			}
			return !round
		})
	}
	return round
}

// names reports whether a name stands below a node.
func names(t lang.Tree, key string) bool {
	found := false
	lang.Walk(t, func(t lang.Tree) bool {
		n, ok := t.(*lang.Name)
		found = found || ok && lang.CanonicalName(n.Text) == key
		return !found
	})
	return found
}
