package rules

import (
	"fmt"
	"math/big"
	"slices"
	"strings"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// ExternalPotentialHalved finds a half in the energy of a charge, or of a
// permanent dipole, in a field that others make.
func (Book) ExternalPotentialHalved() check.Rule {
	return check.Rule{
		Name:     "external-potential-halved",
		Severity: lang.Error,
		Title:    "The energy in the field of others has a half that belongs to systems that make their own field",
		Sees: "An energy ½·q·φ or an integral of ½·ρ·φ with φ declared as an external electric potential, or computed from charges of which q is none; " +
			"½·p·E with a permanent electric dipole moment, ½·m·B with a permanent magnetic moment, of either sign. " +
			"A caution for an interaction energy of which the note does not say who makes the potential, and for a moment that is a datum.",
		Silent: "Without the half; for a potential that the charge itself makes, alone, by its image or by what it does to the other charges of the same sum; " +
			"for a share of an energy that another definition sums; for an induced moment, where induced-dipole-half speaks; for a torque; for means and rms values.",
		Formula: "W = q·φ_ext, W = −p·E, W = −m·B: nothing builds up with q, p or m. The half belongs to ½Σqφ, where the charges make φ themselves, and to induced moments.",
		Remedy:  "Leave the half out.",
		Source:  "Jackson, Classical Electrodynamics, 3rd ed., 4.2, eq. 4.24, and 5.7, eq. 5.72 (from memory)",
		Wrong: check.Example{Note: `    q, electric charge = 4 nC
    V_e, external electric potential = 15 kV
    W, energy = 1/2*q*V_e = 30 uJ
`},
		Right: check.Example{Note: `    q, electric charge = 4 nC
    V_e, external electric potential = 15 kV
    W, energy = q*V_e = 60 uJ
`},
		Run: perClaim(externalHalved),
	}
}

func externalHalved(p *check.Pass, c *claim) {
	if !c.isEnergyOfField() || c.stat == kind.Average {
		return
	}
	gs := c.couplings()
	for _, g := range gs {
		if c.chargeHalved(p, g, gs) {
			return
		}
	}
	ms, _ := c.moments()
	for _, m := range ms {
		if c.momentHalved(p, m) {
			return
		}
	}
}

// hasHalf reports a term of which the coefficient is the half, counts taken out,
// and not 1 as well.
func (c *claim) hasHalf(coef *big.Rat) bool {
	k, found := new(big.Rat).Abs(coef), numbersOf(c.note, c.sym)
	return found.mayBe(k, big.NewRat(1, 2)) && !found.mayBe(k, big.NewRat(1, 1))
}

// chargeHalved judges a charge in a potential.
func (c *claim) chargeHalved(p *check.Pass, g *coupling, all []*coupling) bool {
	if g.unsuited() || !isOf(g.field.Facts, kind.Voltage) || !c.hasHalf(g.coef) || g.inSum(all) {
		return false
	}
	f := lang.Fault{
		Message: fmt.Sprintf("%s is half of the energy: %s stands in the potential of others, which does not build up with it", c.sym.Name, factorName(g.source)),
		Detail:  "Leave the half out.",
		Related: c.because([]lang.Factor{g.source, g.field}, func(s *lang.Symbol) string { return s.Name }),
	}
	switch {
	case g.isExternal():
	case g.self():
		return false
	case g.ofOthers() && !c.usedElsewhere():
		f.Detail = fmt.Sprintf("Leave the half out: %s is made by charges of which %s is none.", factorName(g.field), factorName(g.source))
	case !g.ofOthers() && c.sym.Facts.Kind.Is(kind.InteractionEnergy) && g.field.Facts.Kind.Is(kind.ElectricPotential):
		f.Severity = p.Lowered()
		f.Message = fmt.Sprintf("%s is half of the energy if others make %s", c.sym.Name, factorName(g.field))
		f.Detail = "Leave the half out then, and declare an external electric potential; if the charges make this potential themselves, write `energy`."
	default:
		return false
	}
	if !c.declared() {
		f.Severity = p.Lowered()
	}
	c.report(p, f)
	return true
}

// inSum reports a term whose partner in the same sum it acts on in turn.
func (g *coupling) inSum(all []*coupling) bool {
	return slices.ContainsFunc(all, g.mutual)
}

// momentHalved judges a dipole in a field.
func (c *claim) momentHalved(p *check.Pass, m *moment) bool {
	switch statOf(c.note, m.field) {
	case kind.RMS, kind.Average, kind.PeakToPeak:
		return false
	}
	from := m.origin()
	if m.slope || from == originInduced || from == originMixed || !c.hasHalf(m.coef) {
		return false
	}
	f := lang.Fault{
		Message: fmt.Sprintf("%s is half of the energy: %s is there without the field, and does not build up with it", c.sym.Name, factorName(m.of)),
		Detail:  "Leave the half out.",
		Related: c.because([]lang.Factor{m.of, m.field}, func(s *lang.Symbol) string { return s.Name + " = " + s.Shown }),
	}
	if from == originUnknown {
		f.Severity = p.Lowered()
		f.Message = fmt.Sprintf("%s is half of the energy if %s is there without the field", c.sym.Name, factorName(m.of))
		f.Detail = fmt.Sprintf("Say which it is: %s takes no half, %s does.", m.permanentKind(), strings.Replace(m.permanentKind(), "a permanent", "an induced", 1))
	}
	if !c.declared() {
		f.Severity = p.Lowered()
	}
	c.report(p, f)
	return true
}
