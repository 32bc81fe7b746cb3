package rules

import (
	"fmt"
	"math/big"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// InducedDipoleHalf finds the energy of an induced dipole without its half.
func (Book) InducedDipoleHalf() check.Rule {
	return check.Rule{
		Name:     "induced-dipole-half",
		Severity: lang.Error,
		Title:    "The energy of an induced dipole in the field that induces it lacks its half",
		Sees: "An energy −p·E or −m·B (of either sign) where the moment is declared as an induced one or is computed from this field or from a polarizability, and −α·E², " +
			"with twice the coefficient of table 1.4: 1 of static or instantaneous values, ½ for the mean of peak values, 1 for the mean of rms values.",
		Silent:  "With the half; for a permanent moment, and for a datum of which nothing is said; for a torque p×E or a force; for a moment that is the sum of a permanent and an induced part, of which only one takes the half.",
		Formula: "dW = −p·dE = −αE·dE, so W = −½αE² = −½p·E: the other half went into stretching the dipole. Its mean in a field of amplitude E is −¼αE². F = (p·∇)E = ½α∇E² agrees with it.",
		Remedy:  "Put in the half.",
		Source:  "Jackson, Classical Electrodynamics, 3rd ed., 4.7 (linear response; from memory)",
		Wrong: check.Example{Note: `    α, polarizability = 1.1e-26 C·m^2/V
    E, static electric field strength = 100 kV/m
    p = α*E
    W, energy = -p*E = -1.1e-16 J
`},
		Right: check.Example{Note: `    α, polarizability = 1.1e-26 C·m^2/V
    E, static electric field strength = 100 kV/m
    p = α*E
    W, energy = -p*E/2 = -5.5e-17 J
`},
		Run: perClaim(inducedHalf),
	}
}

func inducedHalf(p *check.Pass, c *claim) {
	if !c.isEnergyOfField() {
		return
	}
	ms, all := c.moments()
	for _, m := range ms {
		right := m.right()
		if right == nil || m.origin() != originInduced || !m.off(right, big.NewRat(2, 1)) {
			continue
		}
		f := lang.Fault{
			Message: fmt.Sprintf("%s is 2.00 times the energy: %s", c.sym.Name, m.why()),
			Detail:  fmt.Sprintf("Put in the half: the coefficient is %s here. For a moment that is there without the field, declare %s.", ratio(right), m.permanentKind()),
			Related: c.because([]lang.Factor{m.of, m.field}, func(s *lang.Symbol) string { return s.Name + " = " + s.Shown }),
		}
		if !c.declared() {
			f.Severity = p.Lowered()
		}
		if all && len(ms) == 1 {
			f.Fix = &lang.Fix{Title: "Put in the half", Edits: []lang.Edit{{Span: c.span(), New: c.halved()}}}
		}
		c.report(p, f)
		return
	}
}

// why says how the moment follows the field.
func (m *moment) why() string {
	if m.slope {
		return fmt.Sprintf("a moment %s·%s builds up with the field", factorName(m.of), factorName(m.field))
	}
	return fmt.Sprintf("%s is induced by the field, and builds up with it", factorName(m.of))
}

// permanentKind is what to declare a moment as that is there without the field.
func (m *moment) permanentKind() string {
	if isOf(m.field.Facts, kind.MagneticFluxDensity) {
		return withArticle(kind.PermanentMagneticMoment.String())
	}
	return withArticle(kind.PermanentElectricDipoleMoment.String())
}
