package rules

import (
	"fmt"
	"math/big"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// MutualEnergyTerm finds energies of coupled windings whose mutual term is
// missing or has another coefficient than 1.
func (Book) MutualEnergyTerm() check.Rule {
	return check.Rule{
		Name:     "mutual-energy-term",
		Severity: lang.Error,
		Title:    "The energy of two coupled windings lacks its mutual term, or counts it half or twice",
		Sees: "An energy with ½·L₁·I₁² and ½·L₂·I₂² of two inductances and two currents, in a note that states one mutual inductance (or coupling factor) that is not zero: " +
			"without a term M·I₁·I₂, or with the coefficient ½ or 2 of it; a total of such terms that is negative.",
		Silent:  "With M·I₁·I₂ of either sign; for a coupling of zero; where the note states no mutual inductance, or several; for incremental and leakage inductances (a leakage factor).",
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
	m := couplingOf(p.Note)
	if m == nil {
		return nil
	}
	for _, c := range viewOf(p).claims {
		if form, ok := c.form(); ok && form == kind.StoredEnergy && isOf(c.sym.Facts, kind.Energy) {
			c.mutual(p, m)
		}
	}
	return nil
}

// couplingOf is the note's only mutual inductance or coupling factor, nil where
// it has none, several, or one that is zero.
func couplingOf(n *lang.Note) *lang.Symbol {
	var found *lang.Symbol
	for _, s := range n.Symbols {
		if s.Role != lang.RoleQuantity || !s.Facts.Kind.Is(kind.MutualInductance) && !s.Facts.Kind.Is(kind.CouplingFactor) {
			continue
		}
		if found != nil && !(found.Facts.Kind.Is(kind.CouplingFactor) || s.Facts.Kind.Is(kind.CouplingFactor)) {
			return nil
		}
		if s.Known && s.Value.Len() == 1 && s.Value.Re() == 0 {
			return nil
		}
		if found == nil || s.Facts.Kind.Is(kind.MutualInductance) {
			found = s
		}
	}
	return found
}

// mutual judges the terms of an energy of two windings.
func (c *claim) mutual(p *check.Pass, m *lang.Symbol) {
	var self, cross []*product
	for _, t := range c.view.products(c.sym) {
		switch currents := t.byRole[roleMagnetic]; {
		case len(currents) == 1 && currents[0].Exp == two && len(t.byRole[roleInduction]) == 1 && isOf(currents[0].Facts, kind.ElectricCurrent):
			self = append(self, t)
		case len(currents) == 2 && len(t.byRole[roleInduction]) > 0 && currents[0].Exp == unit.Whole(1) && currents[1].Exp == unit.Whole(1):
			cross = append(cross, t)
		default:
			return // something else is in it
		}
	}
	if len(self) != 2 || self[0].byRole[roleMagnetic][0].Key == self[1].byRole[roleMagnetic][0].Key ||
		self[0].byRole[roleInduction][0].Key == self[1].byRole[roleInduction][0].Key {
		return
	}
	f := lang.Fault{
		Detail:  fmt.Sprintf("Write `+ %s*I_1*I_2` with signed currents; it stands once, without a half.", m.Name),
		Related: []lang.Related{{Span: m.Span, Path: m.Path, Message: m.Name + " couples the windings"}},
	}
	switch {
	case len(cross) == 0:
		f.Message = fmt.Sprintf("%s leaves the mutual term out, and %s is not zero", c.sym.Name, m.Name)
	case new(big.Rat).Abs(cross[0].coef).Cmp(big.NewRat(1, 2)) == 0:
		f.Message = fmt.Sprintf("%s has half of the mutual term", c.sym.Name)
	case new(big.Rat).Abs(cross[0].coef).Cmp(big.NewRat(2, 1)) == 0:
		f.Message = fmt.Sprintf("%s has the mutual term twice", c.sym.Name)
	case c.sym.Known && c.sym.Value.Re() < 0:
		f.Message = fmt.Sprintf("%s is negative: |M| ≤ √(L₁·L₂) keeps an energy from that", c.sym.Name)
		f.Detail = "Look for a sign or a factor: a mutual inductance can't exceed the geometric mean of the two inductances."
	default:
		return
	}
	c.report(p, f)
}
