package rules

import (
	"fmt"
	"math"
	"math/big"
	"slices"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// MutualEnergyTerm finds energies of coupled windings whose mutual term is
// missing or has another coefficient than 1.
func (Book) MutualEnergyTerm() check.Rule {
	return check.Rule{
		Name:     "mutual-energy-term",
		Severity: lang.Error,
		Title:    "The energy of two coupled windings lacks its mutual term, or counts it half or twice",
		Sees: "An energy with ½·L·I² of two or more windings: without a term M·I₁·I₂ where the note states a mutual inductance or a coupling factor that is not zero between two of them " +
			"(by its formula, by the flux L₁I₁ + M·I₂ of one, or as the only one of the note); with half or twice that term; with a sign that contradicts the flux; a total that is negative. " +
			"Likewise ½·C₁₁V₁² + ½·C₂₂V₂² without the coefficient C₁₂ that ties both charges, or with half or twice of it.",
		Silent:  "With M·I₁·I₂ once, of either sign where no flux tells it; for ½ψᵀI, ½L_m(I₁ + I₂)² and other forms; for a coupling of zero, a winding without current, incremental inductances, and a note with a leakage factor, where M is absorbed.",
		Formula: "W = ½L₁I₁² + ½L₂I₂² + M·I₁·I₂, positive for aiding currents; ½IᵀLI holds M twice and halves it. |M| ≤ √(L₁L₂), so W ≥ 0.",
		Remedy:  "Add `M*I_1*I_2` with signed currents.",
		Source:  "Jackson, Classical Electrodynamics, 3rd ed., 5.17, eq. 5.153 (from memory)",
		Wrong: check.Example{Note: `    L_1, inductance = 2.0 mH
    L_2, inductance = 0.8 mH
    M, mutual inductance = 0.9 mH
    I_1, static current = 5 A
    I_2, static current = -3 A
    W, stored energy = 1/2*L_1*I_1^2 + 1/2*L_2*I_2^2 = 28.6 mJ
    k = M/sqrt(L_1*L_2) = 0.71
`},
		Right: check.Example{Note: `    L_1, inductance = 2.0 mH
    L_2, inductance = 0.8 mH
    M, mutual inductance = 0.9 mH
    I_1, static current = 5 A
    I_2, static current = -3 A
    W, stored energy = 1/2*L_1*I_1^2 + 1/2*L_2*I_2^2 + M*I_1*I_2 = 15.1 mJ
`},
		Run: mutualTerm,
	}
}

func mutualTerm(p *check.Pass) error {
	l := linksOf(p.Note)
	v := viewOf(p)
	if len(l.all) > 0 && !hasLeakage(p.Note) {
		for _, c := range v.claims {
			if form, ok := c.form(); ok && form == kind.StoredEnergy && isOf(c.sym.Facts, kind.Energy) && (c.declared() || !c.usedElsewhere()) {
				c.mutual(p, l)
			}
		}
	}
	mutualElectrodes(p, v)
	return nil
}

func hasLeakage(n *lang.Note) bool {
	return slices.ContainsFunc(n.Symbols, func(s *lang.Symbol) bool { return s.Facts.Kind.Is(kind.LeakageFactor) })
}

// mutual judges the terms of an energy of coupled windings.
func (c *claim) mutual(p *check.Pass, l links) {
	self, cross, ok := c.windings()
	if !ok {
		return
	}
	for i, a := range self {
		for _, b := range self[:i] {
			if a.i.Key == b.i.Key || a.unjudged() || b.unjudged() || a.coef.Cmp(b.coef) != 0 {
				continue
			}
			x := between(cross, a, b)
			if x != nil && x.inSum(self) {
				continue
			}
			if m := l.couples(a, b, len(self) == 2 && !zeroCoupling(c.note)); m != nil && c.mutualOf(p, l, m, pairOfWindings{a, b, x}) {
				return
			}
		}
	}
	if len(cross) > 0 && len(self) > 1 && c.sym.Known && c.sym.Value.Re() < 0 {
		c.report(p, lang.Fault{
			Message: fmt.Sprintf("%s is negative: |M| ≤ √(L₁·L₂) keeps an energy from that", c.sym.Name),
			Detail:  "Look for a sign or a factor: a mutual inductance can't exceed the geometric mean of the two inductances.",
		})
	}
}

// unjudged reports a winding without current, or one of which only increments
// are known.
func (w winding) unjudged() bool {
	x, known := magnitude(w.i.Symbol)
	return known && x == 0 || w.l.Facts.Kind.Is(kind.IncrementalInductance)
}

// pairOfWindings are two windings with their cross term, if there is one.
type pairOfWindings struct {
	a, b winding
	x    *crossTerm
}

// mutualOf judges the cross term of two windings that m couples.
func (c *claim) mutualOf(p *check.Pass, l links, m *lang.Symbol, w pairOfWindings) bool {
	term := fmt.Sprintf("%s*%s*%s", m.Name, factorName(w.b.i), factorName(w.a.i))
	if m.Facts.Kind.Is(kind.CouplingFactor) {
		term = fmt.Sprintf("%s*sqrt(%s*%s)*%s*%s", m.Name, factorName(w.b.l), factorName(w.a.l), factorName(w.b.i), factorName(w.a.i))
	}
	f := lang.Fault{
		Detail:  fmt.Sprintf("Write `+ %s` with signed currents; it stands once, without a half.", term),
		Related: []lang.Related{{Span: m.Span, Path: m.Path, Message: m.Name + " couples the windings"}},
	}
	flux := l.fluxOf(m, w.a, w.b)
	switch {
	case w.x == nil:
		f.Message = fmt.Sprintf("%s leaves the mutual term out, and %s is not zero%s", c.sym.Name, m.Name, c.shareOf(m, w))
	case w.x.times(w.a, 1, 2):
		f.Message = fmt.Sprintf("%s has half of the mutual term", c.sym.Name)
	case w.x.times(w.a, 2, 1):
		f.Message = fmt.Sprintf("%s has the mutual term twice", c.sym.Name)
	case flux != 0 && flux != w.x.t.coef.Sign():
		f.Message = fmt.Sprintf("%s takes the mutual term with the other sign than the flux, in which the same currents stand", c.sym.Name)
		f.Detail = "One reference direction for each winding decides the sign in both: the energy is ½·(ψ_1·I_1 + ψ_2·I_2)."
	default:
		return false
	}
	if !c.declared() {
		f.Severity = p.Lowered()
	}
	c.report(p, f)
	return true
}

// times reports a cross term that is num/den times what belongs beside the
// windings: twice the coefficient of their squares.
func (x *crossTerm) times(w winding, num, den int64) bool {
	right := new(big.Rat).Mul(w.coef, big.NewRat(2, 1))
	return new(big.Rat).Abs(x.t.coef).Cmp(right.Mul(right.Abs(right), big.NewRat(num, den))) == 0
}

// shareOf tells how large the missing term is beside the claim.
func (c *claim) shareOf(m *lang.Symbol, w pairOfWindings) string {
	if !m.Known || m.Value.Len() != 1 || !c.sym.Known || c.sym.Value.Re() == 0 || w.a.i.Symbol.Value.Len() != 1 || w.b.i.Symbol.Value.Len() != 1 || !w.a.i.Symbol.Known || !w.b.i.Symbol.Known {
		return ""
	}
	x := m.Value.Re() * w.a.i.Symbol.Value.Re() * w.b.i.Symbol.Value.Re()
	if m.Facts.Kind.Is(kind.CouplingFactor) {
		a, okA := magnitude(w.a.l.Symbol)
		b, okB := magnitude(w.b.l.Symbol)
		if !okA || !okB {
			return ""
		}
		x *= math.Sqrt(a * b)
	}
	return fmt.Sprintf(": with it the energy is %.3g times this", 1+x/c.sym.Value.Re())
}

// mutualElectrodes judges energies of electrodes by the coefficient that ties
// their charges.
func mutualElectrodes(p *check.Pass, v *view) {
	var ties []*matrix
	var charges []*claim
	for _, c := range v.claims {
		if isOf(c.sym.Facts, kind.ElectricCharge) && len(c.charges()) > 1 {
			charges = append(charges, c)
		}
	}
	for i, c := range charges {
		for _, d := range charges[i+1:] {
			if m := chargeMatrix(c, d); m != nil {
				ties = append(ties, m)
			}
		}
	}
	for _, c := range v.claims {
		if len(ties) > 0 && c.isStored() && (c.declared() || !c.usedElsewhere()) {
			c.electrodes(p, ties)
		}
	}
}

func (c *claim) electrodes(p *check.Pass, ties []*matrix) {
	m := c.energyMatrix()
	for _, tie := range ties {
		at := tie.crosses()[0]
		a, b := m.entries[pair{at[0], at[0]}], m.entries[pair{at[1], at[1]}]
		if len(a) != 1 || len(b) != 1 || a[0].coef.Cmp(b[0].coef) != 0 || !tie.holds(pair{at[0], at[0]}, a[0].cap.Key, 1) || !tie.holds(pair{at[1], at[1]}, b[0].cap.Key, 1) {
			continue
		}
		of := tie.entries[at][0].cap
		f := lang.Fault{
			Detail:  fmt.Sprintf("Write `+ %s*V_1*V_2`: it stands once, without a half.", factorName(of)),
			Related: c.because([]lang.Factor{of}, func(s *lang.Symbol) string { return s.Name + " ties both charges" }),
		}
		switch cross := m.entries[at]; {
		case len(cross) == 0:
			f.Message = fmt.Sprintf("%s leaves the term of %s out, which ties the charges of both electrodes", c.sym.Name, factorName(of))
		case len(cross) == 1 && cross[0].cap.Key == of.Key && new(big.Rat).Mul(cross[0].coef, big.NewRat(2, 1)).Cmp(a[0].coef) == 0:
			f.Message = fmt.Sprintf("%s has half of the term of %s", c.sym.Name, factorName(of))
		case len(cross) == 1 && cross[0].cap.Key == of.Key && new(big.Rat).Mul(a[0].coef, big.NewRat(2, 1)).Cmp(cross[0].coef) == 0:
			f.Message = fmt.Sprintf("%s has the term of %s twice", c.sym.Name, factorName(of))
		default:
			continue
		}
		if !c.declared() {
			f.Severity = p.Lowered()
		}
		c.report(p, f)
		return
	}
}
