package rules

import (
	"fmt"
	"math/big"
	"slices"
	"strings"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// EnergyProductAsStored finds figures of merit of a permanent magnet that are
// taken for its energy.
func (Book) EnergyProductAsStored() check.Rule {
	return check.Rule{
		Name:     "energy-product-as-stored",
		Severity: lang.Caution,
		Title:    "The energy product of a permanent magnet is taken for a stored or available energy",
		Sees: "An energy or energy density that is an energy product without the half, also times a volume; that is the product of a remanent flux density and a coercivity, or half of it; " +
			"that is B²/2µ or ½µH² with µ = B_r/H_c. Advice where the kind of the energy follows from the formula alone.",
		Silent: "For half of the energy product, the most that the outside can have for each volume of the magnet; for half of B·H at the load point; " +
			"for the energy product as a figure of merit; for work, heat and source work; for four times the product, the area of a square loop.",
		Formula: "Without free currents ∫B·H dV over all space is zero, so that the energy in the field outside is −½∫B·H dV over the magnet: at most ½(BH)_max for each volume, at the best load line; (BH)_max ≤ B_r²/(4µ0).",
		Remedy:  "Take half of |B_d·H_d| at the load line that the magnet works on: `W, energy = -1/2*B_d*H_d*V`.",
		Source:  "Jackson, Classical Electrodynamics, 3rd ed., 5.16 and problem 5.21 (from memory)",
		Wrong: check.Example{Note: `    p_m, energy product = 380 kJ/m^3
    V = 12 cm^3
    W, stored energy = p_m*V = 4.56 J
`},
		Right: check.Example{Note: `    p_m, energy product = 380 kJ/m^3
    V = 12 cm^3
    W, stored energy = p_m*V/2 = 2.28 J
`},
		Run: perClaim(energyProduct),
	}
}

func energyProduct(p *check.Pass, c *claim) {
	if !c.isEnergy() || c.workWords() {
		return
	}
	for _, expand := range []lang.Expand{atoms, throughPermeabilities} {
		for _, t := range products(c.note.Normal(c.sym, expand)) {
			if c.productTerm(p, t) {
				return
			}
		}
	}
}

// productTerm judges one term and reports whether it filed a finding.
func (c *claim) productTerm(p *check.Pass, t *product) bool {
	var bh, remanence, coercivity lang.Factor
	hasBH := false
	for _, f := range t.all {
		switch {
		case f.Facts.Kind.Is(kind.EnergyProduct):
			bh, hasBH = f, f.Exp == unit.Whole(1)
		case f.Facts.Kind.Is(kind.RemanentFluxDensity):
			remanence = f
		case f.Facts.Kind.Is(kind.Coercivity):
			coercivity = f
		}
	}
	coef := new(big.Rat).Abs(t.coef)
	found := numbersOf(c.note, c.sym)
	switch one, half := big.NewRat(1, 1), big.NewRat(1, 2); {
	case hasBH && !found.half && coef.Cmp(half) != 0 && c.scalesOnly(t, bh):
		c.tellProduct(p, []lang.Factor{bh}, fmt.Sprintf("%s is the energy product times a volume: that is a figure of merit, twice the most that the field outside can have", c.sym.Name))
	case remanence.Symbol == nil || coercivity.Symbol == nil:
		return false
	case remanence.Exp == unit.Whole(1) && coercivity.Exp == unit.Whole(1) && (coef.Cmp(one) == 0 || coef.Cmp(half) == 0):
		c.tellProduct(p, []lang.Factor{remanence, coercivity}, fmt.Sprintf("%s is made with remanence times coercivity: a magnet never has both at once, and where the demagnetization curve is straight its energy product is a quarter of that", c.sym.Name))
	case remanence.Exp == coercivity.Exp.Neg() && t.degree[roleMagnetic] == two:
		c.tellProduct(p, []lang.Factor{remanence, coercivity}, fmt.Sprintf("%s takes remanence over coercivity for a permeability: the magnet was not brought to this point from zero along that line", c.sym.Name))
	default:
		return false
	}
	return true
}

// scalesOnly reports a term with nothing beside one factor but geometry and
// numbers.
func (c *claim) scalesOnly(t *product, f lang.Factor) bool {
	for _, g := range t.all {
		if r := roleOf(g.Facts); g.Key != f.Key && r != roleGeometry && r != roleNumber {
			return false
		}
	}
	return true
}

// workWords reports a claim that speaks of work: of magnetizing or
// demagnetizing, for one.
func (c *claim) workWords() bool { return slices.Contains(strings.Fields(c.words()), "work") }

func (c *claim) tellProduct(p *check.Pass, by []lang.Factor, message string) {
	f := lang.Fault{
		Message: message,
		Detail:  "The energy in the field outside is half of |B·H| at the load point of the magnet, for each of its volume: `-1/2*B_d*H_d*V`, and less away from the best load line. If it is the work of demagnetizing, call it `work`.",
		Related: c.because(by, func(s *lang.Symbol) string { return s.Name + " is " + withArticle(s.Facts.Kind.String()) }),
	}
	if !c.declared() {
		f.Severity = p.Lowered()
	}
	c.report(p, f)
}

// demagnetized reports a product of B and H that are opposite to each other, as
// in a permanent magnet: half of it is the energy of the field outside.
func (c *claim) demagnetized(q *square) bool {
	sign := 1.0
	for _, f := range q.amplitudes {
		if f.Symbol == nil || !f.Symbol.Result.Known || f.Symbol.Value.Len() != 1 || f.Exp != unit.Whole(1) {
			return false
		}
		sign *= f.Symbol.Value.Re()
	}
	return len(q.amplitudes) == 2 && sign < 0
}
