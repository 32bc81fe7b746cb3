package rules

import (
	"fmt"
	"math/big"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file finds Gaussian formulas whose dimension holds in the SI all the same:
// only the 4π is wrong. It belongs to rule gaussian-form-in-si.

// gaussianClaim looks at one claim.
func gaussianClaim(p *check.Pass, c *claim) {
	ps := c.view.products(c.sym)
	switch {
	case rationalizedDensity(c, ps):
		c.report(p, lang.Fault{
			Message: fmt.Sprintf("%s is divided by 8π, as in the Gaussian system: in the SI it is 4π times as large", c.sym.Name),
			Detail:  "The energy density of a linear medium is `1/2*E·D` and `1/2*B·H`, its mean over a sinusoid half of that.",
		})
	default:
		f, ok := gaussianSource(c, ps)
		if !ok {
			f, ok = gaussianPolarization(c)
		}
		if ok {
			c.report(p, f)
		}
	}
}

// rationalizedDensity reports E·D/8π and B·H/8π, ε₀E²/8π, and their means.
func rationalizedDensity(c *claim, ps []*product) bool {
	k := c.sym.Facts.Kind
	if len(ps) == 0 || !c.declared() || !k.Is(kind.EnergyDensity) || !eachIs(ps, -1, [2]int64{1, 8}, [2]int64{1, 16}, [2]int64{1, 32}) {
		return false
	}
	for _, p := range ps {
		if !p.only(roleElectric, roleMagnetic, roleCapacity, roleInduction) || p.degree[roleElectric].Add(p.degree[roleMagnetic]) != two || !onlyFields(p) {
			return false
		}
	}
	return true
}

// onlyFields reports that the amplitudes are field quantities, in which no
// geometry hides.
func onlyFields(p *product) bool {
	for _, r := range []role{roleElectric, roleMagnetic} {
		for _, f := range p.byRole[r] {
			switch f.Facts.Dim.Base() {
			case kind.ElectricFieldStrength.Dim().Base(), kind.ElectricFluxDensity.Dim().Base(), kind.MagneticFluxDensity.Dim().Base(), kind.MagneticFieldStrength.Dim().Base():
			default:
				return false
			}
		}
	}
	return true
}

// gaussianSource finds H = 4πNI/l, 0.4πNI/l and D = 4πσ.
func gaussianSource(c *claim, ps []*product) (lang.Fault, bool) {
	if len(ps) != 1 || !c.declared() || ps[0].pi != 1 {
		return lang.Fault{}, false
	}
	k, p := c.sym.Facts.Kind, ps[0]
	f := lang.Fault{Message: fmt.Sprintf("%s has the factor 4π of the Gaussian system", c.sym.Name)}
	switch {
	case k.Is(kind.MagneticFieldStrength) && currentOverLength(p) && c.counts(p, 2, 5):
		f.Message = fmt.Sprintf("%s has the factor 0.4π of a field in oersted from a current in A and a length in cm", c.sym.Name)
		f.Detail = "With units H = N·I/l, in A/m or in whatever unit the result is stated."
	case k.Is(kind.MagneticFieldStrength) && currentOverLength(p) && c.counts(p, 4, 1):
		f.Detail = "In the SI H = N·I/l."
	case k.Is(kind.ElectricFluxDensity) && p.is(4, 1) && len(p.all) == 1 && p.all[0].Facts.Kind.Is(kind.AreicElectricCharge):
		f.Detail = "In the SI the flux density at a conductor is the surface charge density itself, D = σ."
	default:
		return f, false
	}
	return f, true
}

// counts reports that the coefficient is num/den, times counts: turns.
func (c *claim) counts(p *product, num, den int64) bool {
	over := new(big.Rat).Quo(p.coef, big.NewRat(num, den))
	return over.Cmp(big.NewRat(1, 1)) == 0 || numbersOf(c.note, c.sym).isCount(over)
}

// currentOverLength reports I/l with counts.
func currentOverLength(p *product) bool {
	m := p.byRole[roleMagnetic]
	return p.only(roleMagnetic, roleGeometry, roleNumber) && len(m) == 1 && m[0].Facts.Dim.Base() == kind.ElectricCurrent.Dim().Base() &&
		p.degree[roleMagnetic] == unit.Whole(1) && len(p.byRole[roleGeometry]) == 1 && p.degree[roleGeometry] == unit.Whole(-1)
}

// gaussianPolarization finds H + 4πM, E·ε₀ + 4πP and 1 + 4πχ.
func gaussianPolarization(c *claim) (lang.Fault, bool) {
	form := c.note.Normal(c.sym, lang.UpToDeclared)
	if form == nil || len(form.Terms) < 2 {
		return lang.Fault{}, false
	}
	for _, t := range form.Terms {
		if t.Pi != 1 || new(big.Rat).Abs(t.Coef).Cmp(big.NewRat(4, 1)) != 0 {
			continue
		}
		for _, f := range t.Factors {
			if detail := unrationalized(f.Facts.Kind, spelled(f)); detail != "" && f.Exp == unit.Whole(1) && f.Facts.KindBy == lang.Declared {
				return lang.Fault{
					Message: fmt.Sprintf("%s adds 4π times %s, as in the Gaussian system: the SI has no 4π there", c.sym.Name, spelled(f)),
					Detail:  detail,
					Related: c.because([]lang.Factor{f}, func(s *lang.Symbol) string { return s.Name + " is " + withArticle(s.Facts.Kind.String()) }),
				}, true
			}
		}
	}
	return lang.Fault{}, false
}

// unrationalized tells what stands in the SI where the Gaussian system has 4π
// times a quantity of the kind; "" for other kinds.
func unrationalized(k kind.ID, name string) string {
	switch {
	case k.Is(kind.Magnetization):
		return "Write `mu_0*(H + M)`."
	case k.Is(kind.MagneticPolarization):
		return "Write `mu_0*H + J`."
	case k.Is(kind.ElectricPolarization):
		return "Write `eps_0*E + P`."
	case k.Is(kind.ElectricSusceptibility), k.Is(kind.MagneticSusceptibility):
		return fmt.Sprintf("Write `1 + %s`. If %s is taken from a table in cgs units, it is no susceptibility of the SI: leave its kind out, or multiply it by 4π where it is stated.", name, name)
	}
	return ""
}

// spelled is a factor as the note spells it.
func spelled(f lang.Factor) string {
	switch {
	case f.Symbol == nil:
		return f.Key
	case f.Symbol.Owner != nil:
		return f.Symbol.Owner.Name + "." + f.Symbol.Name
	}
	return f.Symbol.Name
}
