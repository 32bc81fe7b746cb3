package rules

import (
	"fmt"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// PairSumDoubleCount finds sums of charge times potential that meet every pair
// of charges twice.
func (Book) PairSumDoubleCount() check.Rule {
	return check.Rule{
		Name:     "pair-sum-double-count",
		Severity: lang.Error,
		Title:    "A sum of charges times their own potentials counts every pair twice",
		Sees: "An energy that is Σ q·φ, or an integral of ρ·φ, with the coefficient 1, where the potentials are computed from the same charges: named charges and potentials, " +
			"a column of charges with a column of potentials that potential(…) makes from it, a charge density and the potential that follows from it.",
		Silent:  "With the half; for potentials that others make: declared as an external electric potential, or computed from none of the charges; for an interaction energy; for the sum over pairs (q_1*q_2/r_12 + …).",
		Formula: "W = ½·Σ qᵢφᵢ = Σ_{i<j} qᵢqⱼ/(4πε·rᵢⱼ) = ½∫ρφ dV: the half counts each pair once, and falls away for a potential of others.",
		Remedy:  "Put in the half, or sum over pairs; assembly_energy(…) does.",
		Source:  "Jackson, Classical Electrodynamics, 3rd ed., 1.11, eq. 1.49 to 1.53 (from memory)",
		Wrong: check.Example{Note: `    q, electric charge = 2 nC
    r, length = 30 mm
    V_1, electric potential = 2*q/(4*pi*eps_0*r)
    V_2, electric potential = 2*q/(4*pi*eps_0*r)
    V_3, electric potential = 2*q/(4*pi*eps_0*r)
    W, energy = q*V_1 + q*V_2 + q*V_3 = 7.19 uJ
`},
		Right: check.Example{Note: `    q, electric charge = 2 nC
    r, length = 30 mm
    V_1, electric potential = 2*q/(4*pi*eps_0*r)
    V_2, electric potential = 2*q/(4*pi*eps_0*r)
    V_3, electric potential = 2*q/(4*pi*eps_0*r)
    W, energy = 1/2*(q*V_1 + q*V_2 + q*V_3) = 3.60 uJ
`},
		Run: perClaim(pairSum),
	}
}

func pairSum(p *check.Pass, c *claim) {
	if !isOf(c.sym.Facts, kind.Energy) || c.sym.Facts.Kind.Is(kind.InteractionEnergy) || c.sym.Facts.Kind.Is(kind.SourceWork) {
		return
	}
	if c.columnPairs(p) {
		return
	}
	var charges, potentials []lang.Factor
	for _, t := range c.view.products(c.sym) {
		q, v, ok := chargeInPotential(t)
		if w := numbersOf(c.note, c.sym); !ok || t.pi != 0 || !t.is(1, 1) && (w.half || !w.isCount(t.coef)) {
			return
		}
		charges, potentials = append(charges, q), append(potentials, v)
	}
	if len(charges) == 0 || !allOwn(p, potentials, charges) {
		return
	}
	c.reportPairs(p, append(charges, potentials...))
}

// chargeInPotential reads a term as a charge, or a charge density with a volume,
// in a potential.
func chargeInPotential(t *product) (q, v lang.Factor, ok bool) {
	if !t.only(roleElectric, roleGeometry, roleNumber) || len(t.byRole[roleElectric]) != 2 {
		return q, v, false
	}
	for _, f := range t.byRole[roleElectric] {
		switch {
		case f.Exp != t.byRole[roleElectric][0].Exp || f.Exp.Sign() < 0:
			return q, v, false
		case isOf(f.Facts, kind.ElectricPotential) && f.Facts.Kind.Is(kind.ElectricPotential) && !f.Facts.Kind.Is(kind.ExternalPotential):
			v = f
		case isCharge(f):
			q = f
		}
	}
	return q, v, q.Symbol != nil && v.Symbol != nil
}

// allOwn reports potentials each of which is made from one of the charges.
func allOwn(p *check.Pass, potentials, charges []lang.Factor) bool {
	for _, v := range potentials {
		own := false
		for _, q := range charges {
			own = own || originsOf(p).madeFrom(v.Symbol, q.Symbol)
		}
		if !own {
			return false
		}
	}
	return true
}

// columnPairs handles sum(t.q*t.phi) with a column that potential(…) computes.
func (c *claim) columnPairs(p *check.Pass) bool {
	form := c.note.Normal(c.sym, lang.NamesStay)
	t, single := form.Single()
	if !single || len(t.Factors) != 1 || t.Factors[0].Call != "sum" || t.Coef.Cmp(pow2(0)) != 0 {
		return false
	}
	inside, ok := t.Factors[0].Inside.Single()
	if !ok || len(inside.Factors) != 2 || inside.Coef.Cmp(pow2(0)) != 0 {
		return false
	}
	for _, f := range inside.Factors {
		if isOf(f.Facts, kind.ElectricPotential) && c.madeByPotential(f.Key) {
			c.reportPairs(p, nil)
			return true
		}
	}
	return false
}

// madeByPotential reports a computed column that calls potential(…).
func (c *claim) madeByPotential(key string) bool {
	s := c.note.Lookup(key)
	if s == nil || s.Stmt == nil {
		return false
	}
	table, ok := s.Stmt.Tree.(*lang.Table)
	if !ok {
		return false
	}
	found := false
	for _, col := range table.Columns {
		if col.Formula != nil && lang.CanonicalName(col.Name.Text) == s.Key[len(s.Owner.Key)+1:] {
			lang.Walk(col.Formula, func(t lang.Tree) bool {
				call, ok := t.(*lang.Call)
				found = found || ok && call.Fn.Text == "potential"
				return !found
			})
		}
	}
	return found
}

func (c *claim) reportPairs(p *check.Pass, factors []lang.Factor) {
	c.report(p, lang.Fault{
		Message: fmt.Sprintf("%s is 2.00 times the energy: every pair of charges is counted twice", c.sym.Name),
		Detail:  fmt.Sprintf("Write `1/2*(%s)`. The half falls away where others make the potential: declare it as an external electric potential.", c.text()),
		Fix:     &lang.Fix{Title: "Put in the half", Edits: []lang.Edit{insert(c.span().Start, "1/2*("), insert(c.span().End, ")")}},
		Related: c.because(factors, func(s *lang.Symbol) string { return s.Name + " = " + s.Shown }),
	})
}
