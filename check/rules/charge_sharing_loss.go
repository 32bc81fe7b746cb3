package rules

import (
	"fmt"
	"slices"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// ChargeSharingLoss finds the voltage of joined capacitors that is taken from
// equal energies.
func (Book) ChargeSharingLoss() check.Rule {
	return check.Rule{
		Name:     "charge-sharing-loss",
		Severity: lang.Caution,
		Title:    "The voltage of joined capacitors is taken from equal energies, and it is the charge that is kept",
		Sees: "A voltage √(2·W/(C₁ + C₂)), √(C₁·U₁²/(C₁ + C₂)) or U₁·√(C₁/(C₁ + C₂)), where the energy is that of some of the capacitors, or of all at different voltages; " +
			"a voltage ΣC·U/ΣC whose note gives the stored energies before and after, and neither their difference nor a heat.",
		Silent: "For the energy of all the capacitors at one voltage, and for one that is a datum; for a voltage from the charge without an energy balance, or with the difference or a heat in it; " +
			"in a note with an inductance or an efficiency: an inductor or a converter moves the energy without that loss.",
		Formula: "U_f = ΣCU/ΣC: the node keeps its charge, and C₂/(C₁ + C₂) of the energy becomes heat if C₂ was empty, whatever the resistance.",
		Remedy:  "Write `U_f, static voltage = C_1*U_1/(C_1 + C_2)`, and the heat as the difference of the energies.",
		Source:  "common practice; the two-capacitor exercise of many textbooks (from memory)",
		Wrong: check.Example{Note: `    C_1, capacitance = 100 uF
    C_2, capacitance = 47 uF
    U_1, static voltage = 300 V
    W, stored energy = 1/2*C_1*U_1^2 = 4.50 J
    U_f, static voltage = sqrt(2*W/(C_1 + C_2)) = 247 V
`},
		Right: check.Example{Note: `    C_1, capacitance = 100 uF
    C_2, capacitance = 47 uF
    U_1, static voltage = 300 V
    U_f, static voltage = C_1*U_1/(C_1 + C_2) = 204 V
`},
		Run: chargeSharing,
	}
}

func chargeSharing(p *check.Pass) error {
	if hasInductance(p.Note) || slices.ContainsFunc(p.Note.Symbols, func(s *lang.Symbol) bool { return s.Facts.Kind.Is(kind.Efficiency) }) {
		return nil
	}
	for _, c := range viewOf(p).claims {
		switch {
		case !isOf(c.sym.Facts, kind.Voltage):
		case c.fromEqualEnergies():
			f := lang.Fault{
				Message: fmt.Sprintf("%s keeps the energy, and joined capacitors keep their charge", c.sym.Name),
				Detail:  "Take ΣC·U/ΣC; the difference of the energies is heat. If an inductor or a converter moves the charge, declare its inductance or its efficiency.",
			}
			c.report(p, f)
		default:
			c.balance(p)
		}
	}
	return nil
}

// fromEqualEnergies reports a voltage that shares the energy of some capacitors
// among all of them.
func (c *claim) fromEqualEnergies() bool {
	found := false
	lang.Walk(c.x, func(t lang.Tree) bool {
		call, ok := t.(*lang.Call)
		if !ok || call.Fn.Text != "sqrt" || len(call.Args) != 1 {
			return !found
		}
		if over, ok := unparenthesized(call.Args[0]).(*lang.Binary); ok && over.Op == lang.OpDiv {
			found = found || c.sharesEnergy(over)
		}
		return false
	})
	return found
}

// sharesEnergy judges what stands under the root: an energy, or a capacitance,
// over a sum of capacitances.
func (c *claim) sharesEnergy(over *lang.Binary) bool {
	sum := c.capacitances(over.Y)
	if len(sum) < 2 {
		return false
	}
	above, ok := c.note.FactsOf(c.sym.Stmt, over.X)
	if !ok {
		return false
	}
	part := c.note.StatementForm(c.sym.Stmt, over.X, throughBanks)
	if part == nil {
		return false
	}
	if isOf(above, kind.Capacitance) {
		return len(part.Terms) < len(sum) // U_1·√(C_1/(C_1 + C_2))
	}
	return isOf(above, kind.Energy) && unequal(part, sum)
}

// sumOfCapacitances looks through a name of a sum of capacitances.
func sumOfCapacitances(s *lang.Symbol) bool {
	if !isOf(s.Facts, kind.Capacitance) || s.Def == nil || len(s.Def.Members) == 0 {
		return false
	}
	b, ok := unparenthesized(s.Def.Members[0]).(*lang.Binary)
	return ok && b.Op == lang.OpAdd
}

// throughBanks looks through energies and through sums of capacitances.
func throughBanks(s *lang.Symbol) bool { return throughStores(s) || sumOfCapacitances(s) }

// capacitances are the keys of the terms of a sum of capacitances.
func (c *claim) capacitances(x lang.Expr) map[string]bool {
	form := c.note.StatementForm(c.sym.Stmt, x, sumOfCapacitances)
	if form == nil {
		return nil
	}
	out := map[string]bool{}
	for _, t := range form.Terms {
		if len(t.Factors) != 1 || !isOf(t.Factors[0].Facts, kind.Capacitance) || t.Factors[0].Exp != unit.Whole(1) {
			return nil
		}
		out[t.Factors[0].Key] = true
	}
	return out
}

// unequal reports an energy ½ΣC·U² that is not that of all the capacitors at one
// voltage; false for an energy of another make.
func unequal(form *lang.Form, all map[string]bool) bool {
	volts, seen := map[string]bool{}, map[string]bool{}
	for _, t := range form.Terms {
		for _, f := range t.Factors {
			switch {
			case isOf(f.Facts, kind.Capacitance) && f.Exp == unit.Whole(1):
				seen[f.Key] = true
			case isOf(f.Facts, kind.Voltage) && f.Exp == two:
				volts[f.Key] = true
			default:
				return false
			}
		}
	}
	return len(volts) > 1 || len(volts) == 1 && len(seen) > 0 && len(seen) < len(all)
}

// balance reports a voltage from the charge whose note leaves the lost energy
// out of its balance.
func (c *claim) balance(p *check.Pass) {
	over, ok := unparenthesized(c.x).(*lang.Binary)
	if !ok || over.Op != lang.OpDiv || len(c.capacitances(over.Y)) < 2 {
		return
	}
	charge := c.note.StatementForm(c.sym.Stmt, over.X, atoms)
	if facts, known := c.note.FactsOf(c.sym.Stmt, over.X); !known || charge == nil || !isOf(facts, kind.ElectricCharge) {
		return
	}
	before, after := c.energies(charge)
	if before == nil || after == nil || closes(p, before, after) {
		return
	}
	lost := ""
	if b, a := before.sym, after.sym; b.Known && a.Known && b.Value.Re() > 0 && a.Value.Re() < b.Value.Re() {
		lost = fmt.Sprintf(", %.3g %% of it", 100*(1-a.Value.Re()/b.Value.Re()))
	}
	after.report(p, lang.Fault{
		Message: fmt.Sprintf("%s is less than %s, and the note does not say where the rest%s goes", after.sym.Name, before.sym.Name, lost),
		Detail:  fmt.Sprintf("It becomes heat, whatever the resistance: write `Q_h, heat = %s - %s`.", before.sym.Name, after.sym.Name),
		Related: []lang.Related{{Span: c.sym.Span, Message: c.sym.Name + " keeps the charge"}, {Span: before.sym.Span, Message: before.sym.Name}},
	})
}

// energies finds the stored energies of the note with a voltage of the charge,
// and with the voltage of the claim.
func (c *claim) energies(charge *lang.Form) (before, after *claim) {
	first := map[string]bool{}
	for _, t := range charge.Terms {
		for _, f := range t.Factors {
			if isOf(f.Facts, kind.Voltage) {
				first[f.Key] = true
			}
		}
	}
	for _, d := range c.view.claims {
		squares, ok := d.squares(kind.StoredEnergy)
		if !ok || !d.isStored() {
			continue
		}
		for _, q := range squares {
			for _, f := range q.amplitudes {
				switch {
				case f.Key == c.sym.Key:
					after = d
				case first[f.Key]:
					before = d
				}
			}
		}
	}
	return before, after
}

// closes reports a statement that uses both energies, or a heat in the note.
func closes(p *check.Pass, before, after *claim) bool {
	for _, used := range originsOf(p) {
		has := func(s *lang.Symbol) bool {
			return slices.ContainsFunc(used, func(x *lang.Symbol) bool { return x.Key == s.Key })
		}
		if has(before.sym) && has(after.sym) {
			return true
		}
	}
	return slices.ContainsFunc(p.Note.Symbols, func(s *lang.Symbol) bool { return s.Facts.Kind.Is(kind.Heat) })
}
