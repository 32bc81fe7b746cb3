package rules

import (
	"fmt"
	"strings"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// PowerCalledEnergy explains energies that lack a time, and powers that have
// one too many.
func (Book) PowerCalledEnergy() check.Rule {
	return check.Rule{
		Name:     "power-called-energy",
		Severity: lang.Error,
		Title:    "A power is called an energy, or an energy a power",
		Sees: "A quantity declared as an energy or an energy density, or stated in J, J/m³, whose formula gives a power or a power density (E·J, σE², ρJ², ωε″E², U·I), " +
			"one multiplied by a frequency, or integrated over a volume only; and the reverse, an energy that is called a power or a dissipation.",
		Silent:  "After an integral over time, or a factor of time or period; wherever the dimensions agree.",
		Formula: "∂w/∂t + ∇·S = −E·J: E·J and σE² are work per volume and time (W/m³); only w has J/m³.",
		Remedy:  "Multiply by the time in which it acts, or declare a power density.",
		Source:  "Jackson, Classical Electrodynamics, 3rd ed., 6.7, Poynting's theorem (from memory); ISO/IEC 80000-6:2022, items 6-33 and 6-34 (from memory)",
		Wrong: check.Example{Note: `    E, static electric field strength = 40 V/m
    J, static electric current density = 2 kA/m^2
    w, energy density = E*J
`},
		Right: check.Example{Note: `    E, static electric field strength = 40 V/m
    J, static electric current density = 2 kA/m^2
    p, power density = E*J = 80 kW/m^3
    w, energy density = p*3 s = 240 kJ/m^3
`},
		Run: powerCalledEnergy,
	}
}

func powerCalledEnergy(p *check.Pass) error {
	for _, m := range mismatches(p) {
		if detail, ok := lacksTime(m); ok {
			what := describeDim(m.found)
			p.Report(lang.Fault{
				Span:    m.span,
				Message: fmt.Sprintf("%s is claimed as %s, and its formula gives %s", m.sym.Name, m.claim(), what),
				Detail:  detail,
			})
		}
	}
	return nil
}

// lacksTime tells whether an energy is a power or the reverse, and what to do.
func lacksTime(m mismatch) (detail string, ok bool) {
	perSecond := unit.Dim{unit.Time: unit.Whole(-1)}
	switch m.factor() {
	case perSecond:
		if !isEnergyDim(m.claims) {
			return "", false
		}
		return fmt.Sprintf("That is energy per time. Multiply by the time in which it acts, or declare %s as a power.", m.sym.Name), true
	case perSecond.Pow(unit.Whole(2)):
		if !isEnergyDim(m.claims) {
			return "", false
		}
		return "A power times a frequency is no energy: the energy of one cycle is the power divided by the frequency.", true
	case perSecond.Pow(unit.Whole(-1)):
		if !isEnergyDim(m.found.Dim) {
			return "", false
		}
		return fmt.Sprintf("That is an energy. Divide by the time in which it is delivered, or declare %s as an energy.", m.sym.Name), true
	}
	return "", false
}

// isEnergyDim reports J, J/m, J/m², J/m³ or J/kg.
func isEnergyDim(d unit.Dim) bool {
	for _, k := range []kind.ID{kind.Energy, kind.LineicEnergy, kind.AreicEnergy, kind.EnergyDensity} {
		if d.Base() == k.Dim().Base() {
			return true
		}
	}
	return d.Base() == kind.Energy.Dim().Div(kind.Mass.Dim()).Base()
}

// describeDim says what was found: its kind where it is known, and its unit.
func describeDim(f lang.Facts) string {
	u := unit.Coherent(f.Dim).Symbol
	if f.Kind != 0 {
		return fmt.Sprintf("%s (%s)", withArticle(f.Kind.String()), u)
	}
	return u
}

// withArticle writes a noun with its indefinite article.
func withArticle(noun string) string {
	if noun != "" && strings.ContainsRune("aeiou", rune(noun[0])) {
		return "an " + noun
	}
	return "a " + noun
}
