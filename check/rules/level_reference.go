package rules

import (
	"fmt"
	"math"
	"math/big"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// LevelReference finds radiated powers that are referred to a dipole where the
// isotropic radiator is meant, and the reverse.
func (Book) LevelReference() check.Rule {
	return check.Rule{
		Name:     "level-reference",
		Severity: lang.Error,
		Title:    "A radiated power is referred to the half-wave dipole where the isotropic radiator is meant",
		Sees:     "A power flux density P/(4πr²), or a field √(30·P)/r, with P declared as an effective radiated power (ERP); an ERP that is a power times a gain in dBi or dBd, which both are read as gains over the isotropic radiator.",
		Silent:   "For EIRP in these formulas; for ERP times 1.64 (2.15 dB), and an ERP that is divided by 1.64.",
		Formula:  "EIRP = P·G_i, ERP = P·G_d, G_i = 1.64·G_d (2.15 dB); S = EIRP/(4πr²), E_rms = √(30 Ω·EIRP)/r.",
		Remedy:   "Multiply the ERP by 1.64, or declare an EIRP.",
		Source:   "ITU-R Recommendation V.573-5 (e.i.r.p. and e.r.p.; from memory)",
		Wrong: check.Example{Note: `    P_r, effective radiated power = 21.9 W
    r, length = 1 m
    S, power flux density = P_r/(4*pi*r^2) = 1.74 W/m^2
`},
		Right: check.Example{Note: `    P_r, equivalent isotropically radiated power = 35.9 W
    r, length = 1 m
    S, power flux density = P_r/(4*pi*r^2) = 2.86 W/m^2
`},
		Run: perClaim(levelReference),
	}
}

func levelReference(p *check.Pass, c *claim) {
	k := c.sym.Facts.Kind
	t, single := c.note.Normal(c.sym, lang.UpToDeclared).Single()
	if !single {
		return
	}
	for _, f := range t.Factors {
		switch {
		case f.Symbol == nil || !f.Facts.Kind.Is(kind.ERP):
		case k.Is(kind.PowerFluxDensity) && f.Exp == unit.Whole(1) && t.Pi == -1, k.Is(kind.ElectricFieldStrength) && f.Exp == unit.NewRat(1, 2):
			if withDipoleGain(t.Coef) {
				return
			}
			c.report(p, lang.Fault{
				Message: fmt.Sprintf("%s takes %s, which is referred to a dipole: the isotropic radiator of this formula has 1.64 times it", c.sym.Name, f.Symbol.Name),
				Detail:  fmt.Sprintf("Write `1.64*%s`, or declare %s as an equivalent isotropically radiated power if that is what it is.", f.Symbol.Name, f.Symbol.Name),
				Related: c.because([]lang.Factor{f}, func(s *lang.Symbol) string { return s.Name + " is an ERP" }),
			})
			return
		}
	}
	c.gainReference(p, t)
}

// withDipoleGain reports a number with the gain of a dipole in it, 1.64/4 or
// 1/1.64.
func withDipoleGain(coef *big.Rat) bool {
	x, _ := coef.Float64()
	for ; x != 0 && math.Abs(x) < 1; x *= 2 {
	}
	for ; math.Abs(x) >= 2; x /= 2 {
	}
	return math.Abs(x/1.64-1) < 0.005 || math.Abs(x*1.64/2-1) < 0.005
}

// gainReference reports an ERP that is made with the gain over the isotropic
// radiator: a gain in dBi or dBd is that, whatever its unit.
func (c *claim) gainReference(p *check.Pass, t lang.Term) {
	if !c.sym.Facts.Kind.Is(kind.ERP) || withDipoleGain(t.Coef) {
		return
	}
	for _, f := range t.Factors {
		if u := gainUnit(f.Symbol); (u == "dBi" || u == "dBd") && f.Exp == unit.Whole(1) {
			c.report(p, lang.Fault{
				Message: fmt.Sprintf("%s is a power times a gain over the isotropic radiator: that is an EIRP, 1.64 times the ERP", c.sym.Name),
				Detail:  "Divide by 1.64, or declare an equivalent isotropically radiated power.",
				Related: c.because([]lang.Factor{f}, func(s *lang.Symbol) string { return s.Name + " is read as a gain over the isotropic radiator" }),
			})
			return
		}
	}
}

// gainUnit is the unit in which a gain is written.
func gainUnit(s *lang.Symbol) string {
	if s == nil || s.Def == nil || len(s.Def.Members) == 0 {
		return ""
	}
	if l, ok := s.Def.Members[0].(*lang.Literal); ok && l.Unit != nil {
		return l.Unit.Text
	}
	return ""
}
