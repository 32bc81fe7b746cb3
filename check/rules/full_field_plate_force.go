package rules

import (
	"fmt"
	"math/big"
	"slices"

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
			"one is computed from the other, both from one voltage and one distance, or ε·E² itself. A caution where a voltage alone ties them, as it may a body between the plates, and for ε·E² in a solid or liquid.",
		Silent:  "With the half; for a field that is declared as that of others (an external electric field strength) or that is defined with a half, as σ/(2ε₀) is; for a particle of another charge; for alternating values, where quarter-half-average speaks; for a magnetic force.",
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
		Run: fullFields,
	}
}

// fullFields looks at every claim anew: what a medium says of itself counts
// although the claim does not use it.
func fullFields(p *check.Pass) error {
	for _, c := range viewOf(p).claims {
		fullField(p, c)
	}
	return nil
}

func fullField(p *check.Pass, c *claim) {
	k := c.sym.Facts.Kind
	if !k.Is(kind.Force) && !k.Is(kind.Pressure) || !c.declared() || c.stat == kind.Average {
		return
	}
	ps := c.view.products(c.sym)
	for _, t := range ps {
		if t.pi != 0 || !t.only(roleElectric, roleCapacity, roleGeometry, roleNumber) || c.fullOff(t) == nil {
			continue
		}
		switch c.ownField(p, t) {
		case tieNone:
		case tieLoose:
			c.report(p, lang.Fault{
				Severity: p.Lowered(),
				Message:  fmt.Sprintf("%s is 2.00 times the force if the charge is that of the plate: it makes half of that field itself", c.sym.Name),
				Detail:   "Put in the half then. For a body between the plates declare an external electric field strength.",
			})
			return
		default:
			f := lang.Fault{
				Message: fmt.Sprintf("%s is 2.00 times the force on the surface: it makes half of that field itself", c.sym.Name),
				Detail:  "Put in the half, or take the field of the other plate alone. For a body in the field of others declare an external electric field strength.",
			}
			if len(ps) == 1 {
				f.Fix = &lang.Fix{Title: "Put in the half", Edits: []lang.Edit{{Span: c.span(), New: c.halved()}}}
			}
			if c.soft(t) {
				f.Severity = p.Lowered()
				f.Detail += " The stress that thins an incompressible film between compliant electrodes is ε·E² as a whole: waive the rule there."
			}
			c.report(p, f)
			return
		}
	}
}

// soft reports the square of a field in a medium that is no gas: in a film whose
// electrodes stretch with it the whole ε·E² acts, since like charges spread.
func (c *claim) soft(t *product) bool {
	return len(t.byRole[roleElectric]) == 1 && slices.ContainsFunc(c.mediaOf(), func(m medium) bool {
		x, ok := m.relativePermittivity(c.note)
		return ok && x > polarizes
	})
}

// fullOff tells whether a term is twice its half, counts taken out; nil if not.
func (c *claim) fullOff(t *product) *big.Rat {
	return numbersOf(c.note, c.sym).off(new(big.Rat).Abs(t.coef), big.NewRat(1, 2), big.NewRat(2, 1))
}

// tie tells how a note ties a charge to the field in which it stands.
type tie uint8

const (
	tieNone  tie = iota
	tieLoose     // by the voltage alone
	tieFirm      // they are of one capacitor
)

// ownField reports a charge in a field that the note ties to it, or the square of
// a field with a permittivity, of static values.
func (c *claim) ownField(p *check.Pass, t *product) tie {
	for _, f := range t.byRole[roleElectric] {
		if s := statOf(c.note, f); s != kind.Static && s != kind.Unqualified && s != kind.Instantaneous || f.Exp.Sign() < 0 || f.Facts.Kind.Is(kind.IncidentFieldStrength) || c.ofOtherPlate(f) {
			return tieNone
		}
	}
	switch fields := t.byRole[roleElectric]; len(fields) {
	case 1:
		if fields[0].Exp == two && len(t.byRole[roleCapacity]) > 0 && !c.harmonic() {
			return tieFirm
		}
	case 2:
		q, e := fields[0], fields[1]
		if !isCharge(q) && !isAreicCharge(q) {
			q, e = e, q
		}
		if (isCharge(q) || isAreicCharge(q)) && !isCharge(e) && q.Symbol != nil && e.Symbol != nil {
			return c.tieOf(p, t, q, e)
		}
	}
	return tieNone
}

// tieOf tells how a charge and a field (or a voltage over a distance) belong
// together.
func (c *claim) tieOf(p *check.Pass, t *product, q, e lang.Factor) tie {
	from := originsOf(p)
	voltage := isOf(e.Facts, kind.Voltage)
	switch {
	case !voltage && linked(c.note, q, e):
		return tieFirm
	case !linked(c.note, q, e) && !sharedVoltage(from, q.Symbol, e.Symbol):
		return tieNone
	}
	for _, s := range c.note.Symbols {
		if s.Role != lang.RoleQuantity || !isOf(s.Facts, kind.Length) || !from.madeFrom(q.Symbol, s) {
			continue
		}
		if from.madeFrom(e.Symbol, s) || slices.ContainsFunc(t.byRole[roleGeometry], func(f lang.Factor) bool { return f.Key == s.Key }) {
			return tieFirm // one distance decides both
		}
	}
	return tieLoose
}

// ofOtherPlate reports a field that is defined with a half: that of the other
// plate, σ/(2ε₀), or the mean of both sides.
func (c *claim) ofOtherPlate(f lang.Factor) bool {
	if f.Symbol == nil || !isOf(f.Facts, kind.ElectricFieldStrength) {
		return false
	}
	t, single := c.note.Normal(f.Symbol, lang.Through).Single()
	return single && t.Pi == 0 && new(big.Rat).Abs(t.Coef).Cmp(big.NewRat(1, 2)) == 0
}

func isAreicCharge(f lang.Factor) bool { return isOf(f.Facts, kind.AreicElectricCharge) }

// sharedVoltage reports two quantities that are made from one voltage.
func sharedVoltage(from origins, a, b *lang.Symbol) bool {
	return from.reaches(a.Stmt, func(x *lang.Symbol) bool {
		return isOf(x.Facts, kind.Voltage) && (x.Key == b.Key || from.madeFrom(b, x))
	})
}
