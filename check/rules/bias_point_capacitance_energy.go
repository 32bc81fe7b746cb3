package rules

import (
	"fmt"
	"math"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// BiasPointCapacitanceEnergy finds ½CU² with a C that is a slope at a bias.
func (Book) BiasPointCapacitanceEnergy() check.Rule {
	return check.Rule{
		Name:     "bias-point-capacitance-energy",
		Severity: lang.Error,
		Title:    "An energy is taken from a capacitance that holds at one voltage only",
		Sees: "A stored energy that is a square of the voltage (or of the charge) times a capacitance of the kind differential capacitance, a derivative of the charge by the voltage, " +
			"or the capacitance of a nonlinear medium that states a rated voltage, above 20 % of that. " +
			"A caution for a capacitance that varies with the voltage, or is stated for a range of voltages that does not reach down to zero, without saying which capacitance it is; " +
			"for an alternating voltage across a differential capacitance without a range; for a charge-equivalent capacitance.",
		Silent: "For an energy-equivalent capacitance; for integrals along the characteristic; in media declared linear; " +
			"where the capacitance is stated for a range that reaches from zero to the voltage; for a swing that is small against the bias or fits into the range about it.",
		Formula: "W = ∫v dQ = ∫v C_d(v) dv, with C_d = dQ/dv. Of three values only C_E = 2W/U² gives the energy as ½C_E·U²; C_Q = Q/U gives the charge, and C_d the slope.",
		Remedy:  "Integrate: `integral(v*C_d(v) for v from 0 V to U)`, or along the table; or take the energy-equivalent capacitance.",
		Source:  "IEC 60384-1 for capacitance measured at a small voltage; Landau, Lifshitz, Electrodynamics of Continuous Media, § 10, for the energy (both from memory)",
		Wrong: check.Example{Note: `    U, static voltage = 400 V
    C_d(v), differential capacitance = 10 uF/(1 + (v/(200 V))^2) for v from 0 V to 450 V
    W, stored energy = 1/2*C_d(U)*U^2 = 0.16 J
`},
		Right: check.Example{Note: `    U, static voltage = 400 V
    C_d(v), differential capacitance = 10 uF/(1 + (v/(200 V))^2) for v from 0 V to 450 V
    W, stored energy = integral(v*C_d(v) for v from 0 V to U) = 0.322 J
`},
		Run: perClaim(biasPoint),
	}
}

// ratedShare is the part of the rated voltage up to which the nominal
// capacitance of a nonlinear part is taken for constant (common practice).
const ratedShare = 0.2

// smallSwing is the part of the bias up to which an alternating voltage is
// taken for small.
const smallSwing = 0.2

// throughCharges looks through charges too, so that a slope cannot hide in
// `Q = C_d*U`.
func throughCharges(s *lang.Symbol) bool {
	return atoms(s) || s.Facts.Kind.Is(kind.ElectricCharge) && !s.Input
}

func biasPoint(p *check.Pass, c *claim) {
	if !c.isEnergy() {
		return
	}
	for _, expand := range []lang.Expand{atoms, throughCharges} {
		for _, t := range products(c.note.Normal(c.sym, expand)) {
			if c.biasTerm(p, t) {
				return
			}
		}
	}
}

// isEnergy reports a claim of an energy or its density, total or not, that is
// not a coenergy and no step towards something else.
func (c *claim) isEnergy() bool {
	k := c.sym.Facts.Kind
	form, ok := c.form()
	return ok && form == kind.StoredEnergy && !k.Is(kind.Coenergy) && !k.Is(kind.CoenergyDensity) && (c.declared() || !c.usedElsewhere())
}

// biasTerm judges one term and reports whether it filed a finding.
func (c *claim) biasTerm(p *check.Pass, t *product) bool {
	if !isVoltageSquare(t) {
		return false
	}
	for _, f := range t.byRole[roleCapacity] {
		if !isOf(f.Facts, kind.Capacitance) || f.Facts.Kind.Is(kind.EnergyEquivalentCapacitance) {
			continue
		}
		if s := c.slopeFactor(f); s != nil && c.slopeVerdict(p, t, f, s) || c.ratedVerdict(p, t, f) {
			return true
		}
	}
	return false
}

// isVoltageSquare reports a square of voltages or charges with a capacitance.
func isVoltageSquare(t *product) bool {
	if t.degree[roleElectric] != two || !t.only(roleElectric, roleCapacity, roleGeometry, roleNumber) {
		return false
	}
	for _, f := range t.all {
		if r := roleOf(f.Facts); opaqueFactor(f) && r != roleCapacity && r != roleNumber && f.Over == nil {
			return false
		}
	}
	for _, f := range t.byRole[roleElectric] {
		if f.Exp.Sign() < 0 || !isOf(f.Facts, kind.Voltage) && !isOf(f.Facts, kind.ElectricCharge) {
			return false
		}
	}
	return len(t.byRole[roleCapacity]) > 0
}

// slopeFactor finds the slope behind a capacitance of the claim.
func (c *claim) slopeFactor(f lang.Factor) *slope {
	if f.Symbol != nil {
		return slopeOf(c.note, f.Symbol)
	}
	return slopeIn(c.note, c.sym.Stmt, c.x)
}

// voltageOf is the greatest voltage of a term, with its factor.
func voltageOf(n *lang.Note, t *product) (u float64, by lang.Factor, known bool) {
	for _, f := range t.byRole[roleElectric] {
		if x, ok := sizeOf(n, f); ok && isOf(f.Facts, kind.Voltage) && x >= u {
			u, by, known = x, f, true
		}
	}
	return u, by, known
}

// slopeVerdict files a finding unless the capacitance is constant over the
// voltages that matter.
func (c *claim) slopeVerdict(p *check.Pass, t *product, f lang.Factor, s *slope) bool {
	u, by, known := voltageOf(c.note, t)
	if known && s.holdsFor(u) {
		return false
	}
	out := lang.Fault{Severity: p.Rule.Severity}
	unsaid := ""
	switch {
	case s.charge:
		out.Severity = p.Lowered()
		unsaid = " If the part is linear, call it a capacitance."
	case !s.sure:
		out.Severity = p.Lowered()
		unsaid = " If it is 2·W/U², declare it as `energy-equivalent capacitance`; if it is the slope, as `differential capacitance`."
	case !s.hasRange && !s.biased && alternates(c.note, by):
		out.Severity = p.Lowered()
		unsaid = fmt.Sprintf(" If %s is a small swing about a bias, state the range of the capacitance: `for U from … to …`.", nameOf(by))
	}
	if !c.declared() {
		out.Severity = p.Lowered()
	}
	out.Message = c.slopeMessage(f, s, u, known)
	out.Detail = s.remedy() + c.alongTable(s, u, known) + unsaid
	out.Related = c.because([]lang.Factor{f}, func(y *lang.Symbol) string { return y.Name + " is " + s.what })
	out.Fix = c.slopeFix(t, s)
	c.report(p, out)
	return true
}

// holdsFor reports a capacitance that is constant from zero to u, or a swing u
// about the bias within which it is constant.
func (s *slope) holdsFor(u float64) bool {
	if s.biased && u <= smallSwing*math.Abs(s.bias) {
		return true
	}
	if !s.hasRange || s.charge {
		return false
	}
	if covers(s.valid, u) || u < s.valid.Low && 2*u <= s.valid.High-s.valid.Low {
		return true
	}
	return !s.sure && u > s.valid.High // outside its range: property-out-of-range speaks
}

// ratedVerdict finds the nominal capacitance of a nonlinear part at a voltage
// that is no longer small against its rated voltage.
func (c *claim) ratedVerdict(p *check.Pass, t *product, f lang.Factor) bool {
	m, rated := c.ratedPart(f)
	u, _, known := voltageOf(c.note, t)
	if rated == nil || !known {
		return false
	}
	limit, _ := magnitude(rated)
	if u <= ratedShare*limit {
		return false
	}
	sev := p.Rule.Severity
	if !c.declared() {
		sev = p.Lowered()
	}
	c.report(p, lang.Fault{
		Severity: sev,
		Message: fmt.Sprintf("%s takes the nominal capacitance of %s, which is nonlinear, at %.3g V: that is %.0f %% of its rated voltage", c.sym.Name, m.sym.Name,
			u, 100*u/limit),
		Detail: "The capacitance changes with the voltage on the way there. Integrate its characteristic, `integral(v*C_d(v) for v from 0 V to U)`, or declare the value for this voltage as `energy-equivalent capacitance`.",
		Related: append([]lang.Related{{Name: m.sym.Key, Span: m.sym.Span, Path: m.sym.Path, Message: m.sym.Name + " is declared nonlinear"}},
			c.because([]lang.Factor{f}, func(s *lang.Symbol) string { return s.Name + " is the nominal value" })...),
	})
	return true
}

// ratedPart is the nonlinear medium of a capacitance with its rated voltage.
func (c *claim) ratedPart(f lang.Factor) (m medium, rated *lang.Symbol) {
	keys := f.Facts.Media
	if f.Symbol != nil && f.Symbol.Owner != nil {
		keys = append([]string{f.Symbol.Owner.Key}, keys...)
	}
	for _, key := range keys {
		if m, ok := mediumOf(c.note, key); ok && m.nonlinear() {
			if rated := m.propertyOf(c.note, kind.RatedVoltage); rated != nil {
				return m, rated
			}
		}
	}
	return medium{}, nil
}
