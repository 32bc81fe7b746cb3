package rules

import (
	"fmt"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// ChargeSharingLoss finds the voltage of joined capacitors that is taken from
// equal energies.
func (Book) ChargeSharingLoss() check.Rule {
	return check.Rule{
		Name:     "charge-sharing-loss",
		Severity: lang.Caution,
		Title:    "The voltage of joined capacitors is taken from equal energies, and it is the charge that is kept",
		Sees:     "A voltage √(2·W/(C₁ + C₂)) with the sum of two capacitances below an energy, or √(C₁·U₁²/(C₁ + C₂)).",
		Silent:   "For √(2·W/C) of one capacitance; for a voltage from the charge; in a note with an inductance, which moves the energy without a loss.",
		Formula:  "U_f = ΣCU/ΣC: the node keeps its charge, and C₂/(C₁ + C₂) of the energy becomes heat if C₂ was empty, whatever the resistance.",
		Remedy:   "Write `U_f, static voltage = C_1*U_1/(C_1 + C_2)`, and the heat as the difference of the energies.",
		Source:   "common practice; the two-capacitor exercise of many textbooks (from memory)",
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
	for _, s := range p.Note.Symbols {
		if isOf(s.Facts, kind.Inductance) && s.Role == lang.RoleQuantity {
			return nil
		}
	}
	for _, c := range viewOf(p).claims {
		if isOf(c.sym.Facts, kind.Voltage) && c.fromEqualEnergies() {
			c.report(p, lang.Fault{
				Message: fmt.Sprintf("%s keeps the energy, and joined capacitors keep their charge", c.sym.Name),
				Detail:  "Take ΣC·U/ΣC; the difference of the energies is heat. If an inductor or a converter moves the charge, declare it.",
			})
		}
	}
	return nil
}

// fromEqualEnergies reports a root of an energy over a sum of capacitances.
func (c *claim) fromEqualEnergies() bool {
	call, ok := unparenthesized(c.x).(*lang.Call)
	if !ok || call.Fn.Text != "sqrt" || len(call.Args) != 1 {
		return false
	}
	over, ok := unparenthesized(call.Args[0]).(*lang.Binary)
	if !ok || over.Op != lang.OpDiv {
		return false
	}
	sum, ok := unparenthesized(over.Y).(*lang.Binary)
	if !ok || sum.Op != lang.OpAdd {
		return false
	}
	below, ok1 := c.note.FactsOf(c.sym.Stmt, sum)
	above, ok2 := c.note.FactsOf(c.sym.Stmt, over.X)
	return ok1 && ok2 && isOf(below, kind.Capacitance) && isOf(above, kind.Energy)
}
