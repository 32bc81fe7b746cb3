package rules

import (
	"fmt"
	"math/big"

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
		Sees: "An energy ½·q·φ with φ declared as an external electric potential, or ½·p·E with p declared as a permanent electric dipole moment, of either sign. " +
			"A caution for an interaction energy whose potential is not declared as external.",
		Silent:  "Without the half; for a potential that the charge itself makes; for an induced moment, where induced-dipole-half speaks; for a torque.",
		Formula: "W = q·φ_ext, W = −p·E: nothing builds up with q or p. The half belongs to ½Σqφ, where the charges make φ themselves, and to induced moments.",
		Remedy:  "Leave the half out.",
		Source:  "Jackson, Classical Electrodynamics, 3rd ed., 4.2, eq. 4.24 (from memory)",
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
	if !isOf(c.sym.Facts, kind.Energy) || c.sym.Facts.Kind.Is(kind.Torque) {
		return
	}
	for _, t := range c.view.products(c.sym) {
		if new(big.Rat).Abs(t.coef).Cmp(big.NewRat(1, 2)) != 0 || t.pi != 0 {
			continue
		}
		what, severity := c.fieldOfOthers(p, t)
		if what == "" {
			continue
		}
		f := lang.Fault{
			Message: fmt.Sprintf("%s is half of the energy: %s is in the field of others, which does not build up with it", c.sym.Name, what),
			Detail:  "Leave the half out.",
		}
		if severity != 0 {
			f.Severity = p.Lowered()
			f.Detail = "Leave the half out, or, if the charges make this potential themselves, write `energy` and declare an `electric potential`."
		}
		c.report(p, f)
		return
	}
}

// fieldOfOthers names what sits in a field that others make; lower is not 0
// where the note does not say so of the field.
func (c *claim) fieldOfOthers(p *check.Pass, t *product) (what string, lower int) {
	for _, f := range t.all {
		if f.Facts.Kind.Is(kind.PermanentElectricDipoleMoment) && len(t.byRole[roleElectric]) == 1 && f.Exp == t.byRole[roleElectric][0].Exp {
			return factorName(f), 0
		}
	}
	if len(t.byRole[roleElectric]) != 2 {
		return "", 0
	}
	a, b := t.byRole[roleElectric][0], t.byRole[roleElectric][1]
	if isOf(a.Facts, kind.ElectricPotential) {
		a, b = b, a
	}
	switch {
	case !isCharge(a) || !isOf(b.Facts, kind.ElectricPotential):
	case b.Facts.Kind.Is(kind.ExternalPotential):
		return factorName(a), 0
	case c.sym.Facts.Kind.Is(kind.InteractionEnergy) && b.Symbol != nil && a.Symbol != nil && !originsOf(p).madeFrom(b.Symbol, a.Symbol):
		return factorName(a), 1
	}
	return "", 0
}
