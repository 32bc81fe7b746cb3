package rules

import (
	"fmt"
	"math/big"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// FullFieldPlateForce finds the force on a conductor's own charge in the whole
// field at its surface.
func (Book) FullFieldPlateForce() check.Rule {
	return check.Rule{
		Name:     "full-field-plate-force",
		Severity: lang.Error,
		Title:    "The force on a charged surface is taken in the whole field, half of which the surface makes itself",
		Sees: "A force Q·E, Q·U/d or ε·E²·A, a pressure σ·E or ε·E², of static values with the coefficient 1, where charge and field belong to one capacitor: " +
			"one is computed from the other, both from one voltage, or ε·E² itself.",
		Silent:  "With the half; for a field that is declared as that of others (an external electric field strength); for alternating values, where quarter-half-average speaks; for a magnetic force.",
		Formula: "A surface charge feels the mean of the fields on its two sides: F = ½QE, p = ½σE = ½ε₀E² = σ²/(2ε₀).",
		Remedy:  "Put in the half, or take the field of the other plate alone.",
		Source:  "Jackson, Classical Electrodynamics, 3rd ed., 1.11, eq. 1.61 (w = σ²/2ε₀; from memory)",
		Wrong: check.Example{Note: `    A, area = 4 cm^2
    d, thickness = 0.5 mm
    U, static voltage = 600 V
    C, capacitance = eps_0*A/d
    Q, electric charge = C*U
    F, force = Q*U/d = 5.10 mN
`},
		Right: check.Example{Note: `    A, area = 4 cm^2
    d, thickness = 0.5 mm
    U, static voltage = 600 V
    C, capacitance = eps_0*A/d
    Q, electric charge = C*U
    F, force = Q*U/(2*d) = 2.55 mN
`},
		Run: perClaim(fullField),
	}
}

func fullField(p *check.Pass, c *claim) {
	k := c.sym.Facts.Kind
	if !k.Is(kind.Force) && !k.Is(kind.Pressure) || !c.declared() {
		return
	}
	ps := c.view.products(c.sym)
	if len(ps) != 1 || ps[0].pi != 0 || new(big.Rat).Abs(ps[0].coef).Cmp(pow2(0)) != 0 || !ps[0].only(roleElectric, roleCapacity, roleGeometry, roleNumber) {
		return
	}
	if !c.ownField(p, ps[0]) {
		return
	}
	c.report(p, lang.Fault{
		Message: fmt.Sprintf("%s is 2.00 times the force on the surface: it makes half of that field itself", c.sym.Name),
		Detail:  "Put in the half, or take the field of the other plate alone.",
		Fix:     &lang.Fix{Title: "Put in the half", Edits: []lang.Edit{insert(c.span().Start, "1/2*("), insert(c.span().End, ")")}},
	})
}

// ownField reports a charge in a field that the note ties to it, or the square of
// a field with a permittivity, of static values.
func (c *claim) ownField(p *check.Pass, t *product) bool {
	for _, f := range t.byRole[roleElectric] {
		if s := statOf(c.note, f); s != kind.Static && s != kind.Unqualified && s != kind.Instantaneous || f.Exp.Sign() < 0 || f.Facts.Kind.Is(kind.IncidentFieldStrength) {
			return false
		}
	}
	switch fields := t.byRole[roleElectric]; len(fields) {
	case 1:
		return fields[0].Exp == two && len(t.byRole[roleCapacity]) > 0 && !c.harmonic()
	case 2:
		q, e := fields[0], fields[1]
		if !isCharge(q) && !isAreicCharge(q) {
			q, e = e, q
		}
		if !isCharge(q) && !isAreicCharge(q) || isCharge(e) || q.Symbol == nil || e.Symbol == nil {
			return false
		}
		from := originsOf(p)
		return from.madeFrom(q.Symbol, e.Symbol) || from.madeFrom(e.Symbol, q.Symbol) || sharedVoltage(from, q.Symbol, e.Symbol)
	}
	return false
}

func isAreicCharge(f lang.Factor) bool { return isOf(f.Facts, kind.AreicElectricCharge) }

// sharedVoltage reports two quantities that are made from one voltage.
func sharedVoltage(from origins, a, b *lang.Symbol) bool {
	return from.reaches(a.Stmt, func(x *lang.Symbol) bool {
		return isOf(x.Facts, kind.Voltage) && from.madeFrom(b, x)
	})
}
