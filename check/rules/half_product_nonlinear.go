package rules

import (
	"fmt"
	"math/big"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// HalfProductNonlinear finds half products of final values in media whose
// response is no straight line.
func (Book) HalfProductNonlinear() check.Rule {
	return check.Rule{
		Name:     "half-product-nonlinear",
		Severity: lang.Error,
		Title:    "The energy of a nonlinear medium is taken as half the product of final values",
		Sees: "An energy or energy density that is 1/2 (for harmonic fields also 1/4) of a square or product of amplitudes — ½E·D, ½εE², ½CU², ½QU, ½B·H, ½µH², ½LI², ½ψI — " +
			"with a property or a field of a medium declared nonlinear or hysteretic, or where the one amplitude follows from the other by a curve that is not straight: a table, a function, a saturation law. " +
			"A caution where the kind follows from the formula alone.",
		Silent: "For an integral along the curve; for a coenergy; for products that no energy is said to be, such as E·D in a check of energy plus coenergy; " +
			"where the property is stated as constant for a range that reaches from zero to the amplitude, or the curve is straight to 1 % up to there; " +
			"for an energy-equivalent capacitance; for B²/2µ0 and D²/2ε0, the energy of a gap; for half of B·H with B against H, the field outside a magnet; " +
			"in linear media, and in media that do not say (undeclared-medium-assumption speaks).",
		Formula: "w = ∫ E dD. It equals ½E·D only where D is proportional to E from 0 to the end; for a saturating curve it is less. Energy and coenergy: ∫ E dD + ∫ D dE = E·D.",
		Remedy:  "Integrate the curve: `integral(E(D) for D from 0 to D_m)`, or along the table of a measured loop.",
		Source:  "Landau, Lifshitz, Electrodynamics of Continuous Media, § 10 (from memory); Jackson, Classical Electrodynamics, 3rd ed., 4.7 (from memory)",
		Wrong: check.Example{Note: `    medium ferro: nonlinear, isotropic, homogeneous
        E_s = 6 MV/m
    E in ferro, static electric field strength = 12 MV/m
    D in ferro, static electric flux density = 0.12 C/m^2 * tanh(E/ferro.E_s)
    w, energy density = 1/2 * E*D = 694 kJ/m^3
`},
		Right: check.Example{Note: `    medium ferro: nonlinear, isotropic, homogeneous
        E_s = 6 MV/m
    E in ferro, static electric field strength = 12 MV/m
    D(x), electric flux density = 0.12 C/m^2 * tanh(x/ferro.E_s) for x from 0 MV/m to 20 MV/m
    w, energy density = E*D(E) - integral(D(x) for x from 0 MV/m to E) = 434 kJ/m^3
`},
		Run: perClaim(halfProduct),
	}
}

func halfProduct(p *check.Pass, c *claim) {
	if !c.isEnergy() {
		return
	}
	if m, curved := c.nonlinear(); curved {
		c.halfInCurve(p, m)
	} else {
		c.halfOfLaw(p)
	}
}

// halfInCurve reports the first term that is half or a quarter of a product of
// amplitudes in the medium.
func (c *claim) halfInCurve(p *check.Pass, m medium) {
	squares, ok := c.curveSquares()
	if !ok {
		return
	}
	found := numbersOf(c.note, c.sym)
	for _, q := range squares {
		if !c.inMedium(q, m) || c.energyByDefinition(q) || c.inStraightPart(q) || !found.mayBe(q.coef, big.NewRat(1, 2)) && !found.mayBe(q.coef, big.NewRat(1, 4)) {
			continue
		}
		f := lang.Fault{
			Message: fmt.Sprintf("%s is half a product of final values, and %s is nonlinear: the energy is the area beside the curve", c.sym.Name, m.sym.Name),
			Detail: fmt.Sprintf("Integrate the field over the flux density along the curve of %s. Half the product is more than the energy where the curve saturates. "+
				"If the range in use is straight, declare a medium for that range as linear.", m.sym.Name),
			Related: append([]lang.Related{{Name: m.sym.Key, Span: m.sym.Span, Path: m.sym.Path, Message: m.sym.Name + " is declared nonlinear"}},
				c.because(q.amplitudes, func(s *lang.Symbol) string { return s.Name + " is a final value" })...),
		}
		if !c.declared() {
			f.Severity = p.Lowered()
		}
		c.report(p, f)
		return
	}
}

// curveSquares gives the terms of the claim as squares, functions among the
// amplitudes allowed: 1/2*B*core.H(B) is half of final values too.
func (c *claim) curveSquares() ([]*square, bool) {
	var out []*square
	for _, t := range c.view.products(c.sym) {
		plain := *t
		plain.calls = nil
		q := squareOf(c.note, &plain, kind.StoredEnergy)
		if q == nil || q.pi != 0 {
			return nil, false
		}
		out = append(out, q)
	}
	return out, len(out) > 0
}

// inMedium reports a term of which a property or an amplitude belongs to the
// medium. A flux density crosses into a gap: with ε0 or µ0 alone it makes the
// energy there, whatever it passes before.
func (c *claim) inMedium(q *square, m medium) bool {
	if inGap(q) || c.demagnetized(q) {
		return false
	}
	for _, f := range q.all {
		for _, key := range f.Facts.Media {
			if key == m.sym.Key {
				return true
			}
		}
		if f.Symbol != nil && f.Symbol.Owner == m.sym {
			return true
		}
	}
	return false
}

// energyByDefinition reports a product with a capacitance that is defined by
// the energy, or whose verdict is that of bias-point-capacitance-energy: the
// nominal capacitance of a part with a rated voltage.
func (c *claim) energyByDefinition(q *square) bool {
	for _, f := range q.byRole[roleCapacity] {
		if f.Facts.Kind.Is(kind.EnergyEquivalentCapacitance) {
			return true
		}
		if _, rated := c.ratedPart(f); rated != nil && isOf(f.Facts, kind.Capacitance) && c.view.book.Find("bias-point-capacitance-energy") != nil {
			return true
		}
	}
	return false
}

// inGap reports B²/2µ0 or D²/2ε0.
func inGap(q *square) bool {
	for _, f := range q.amplitudes {
		if !isOf(f.Facts, kind.MagneticFluxDensity) && !isOf(f.Facts, kind.ElectricFluxDensity) {
			return false
		}
	}
	links := append(append([]lang.Factor{}, q.byRole[roleInduction]...), q.byRole[roleCapacity]...)
	for _, f := range links {
		if f.Symbol == nil || f.Symbol.Role != lang.RoleConstant {
			return false
		}
	}
	return len(links) > 0
}
