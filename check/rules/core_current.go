package rules

import (
	"fmt"
	"math"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// This file compares the current of an inductance with its saturation current.

// beyondCurrent compares the current of ½LI² with a saturation current.
func (c *claim) beyondCurrent(p *check.Pass, t *product) bool {
	if t.degree[roleMagnetic] != two || !t.only(roleMagnetic, roleInduction, roleGeometry, roleNumber) || len(t.byRole[roleInduction]) != 1 || hidesNumbers(t) {
		return false
	}
	l := t.byRole[roleInduction][0]
	if !isOf(l.Facts, kind.Inductance) || l.Facts.Kind.Is(kind.Permeance) {
		return false
	}
	most := 0.0
	for _, f := range t.byRole[roleMagnetic] {
		if !isOf(f.Facts, kind.ElectricCurrent) || f.Exp.Sign() < 0 {
			return false
		}
		if x, ok := sizeOf(c.note, f); ok {
			most = math.Max(most, x)
		}
	}
	sat, loose := c.saturationCurrent(l)
	limit, ok := magnitude(sat)
	if !ok || most <= limit || c.currentCovered(l, most) {
		return false
	}
	f := lang.Fault{
		Message: fmt.Sprintf("%s takes the inductance as constant at %.4g A, beyond its saturation current of %.4g A", c.sym.Name, most, limit),
		Detail: "Integrate the current over the linked flux, `integral(i(x) for x from 0 Wb to Ψ)`, or along a table of both. " +
			"With the inductance at small currents the half product is more than the energy, with the incremental one it is less.",
		Related: append(c.because([]lang.Factor{l}, func(s *lang.Symbol) string { return s.Name + " is the inductance" }), pointTo(sat, "the saturation current")...),
	}
	if loose {
		f.Severity = p.Lowered()
		f.Detail += fmt.Sprintf(" If %s belongs to another winding, bind both to their parts: `%s in PART`.", sat.Name, sat.Name)
	} else if !c.declared() {
		f.Severity = p.Lowered()
	}
	c.report(p, f)
	return true
}

// currentCovered reports an inductance that is stated for a range of currents
// which reaches from zero to i.
func (c *claim) currentCovered(l lang.Factor, i float64) bool {
	if l.Symbol == nil {
		return false
	}
	v, ok := rangeOver(l.Symbol, kind.ElectricCurrent)
	return ok && covers(v, i)
}

// saturationCurrent finds the saturation current of an inductance: a property
// of its part, a quantity that is bound to the same part, or, loose, the only
// one of the note where neither is bound.
func (c *claim) saturationCurrent(l lang.Factor) (s *lang.Symbol, loose bool) {
	m, bound := c.mediumOfFactor(l)
	if bound {
		if s := m.propertyOf(c.note, kind.SaturationCurrent); s != nil {
			return s, false
		}
	}
	for _, q := range c.note.Symbols {
		if q.Role != lang.RoleQuantity || !q.Facts.Kind.Is(kind.SaturationCurrent) {
			continue
		}
		tied := len(q.Facts.Media) > 0
		switch {
		case tied != bound || tied && q.Facts.Media[0] != m.sym.Key:
		case s != nil:
			return nil, false // several: which one is meant is not known
		default:
			s, loose = q, !tied
		}
	}
	return s, loose
}
