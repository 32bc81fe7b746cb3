package rules

import (
	"fmt"
	"math"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// SkinDepthRange finds the skin depth of a good conductor in a medium that is
// none at the frequency.
func (Book) SkinDepthRange() check.Rule {
	return check.Rule{
		Name:     "skin-depth-range",
		Severity: lang.Error,
		Title:    "The skin depth of a good conductor is used in a medium that is none at this frequency",
		Sees: "A length √(2/(ωµσ)) where σ/(ωε) of the medium is below 10. A caution where the medium states no permittivity and σ/(ωε₀) is below 1000, " +
			"so that a permittivity of 100 would matter.",
		Silent:  "For σ/(ωε) ≥ 10, which every metal has far beyond microwaves; for the general form with √(1 + (σ/ωε)²); for an attenuation coefficient from √(µε).",
		Formula: "α = ω·√(µε/2)·√(√(1 + (σ/ωε)²) − 1); δ = 1/α, and √(2/(ωµσ)) only for σ ≫ ωε.",
		Remedy:  "Take δ = 1/α from the general form, or from the propagation coefficient: `1/Re(j*ω*sqrt(mu_0*m.eps_c))`.",
		Source:  "Jackson, Classical Electrodynamics, 3rd ed., 7.5 and 8.1 (from memory)",
		Wrong: check.Example{Note: `    regime: harmonic at f = 2.45 GHz
    medium brine: linear, isotropic, homogeneous, lossy
        eps_r = 75
        sigma = 4.5 S/m
    ω, angular frequency = 2*pi*f
    δ, skin depth = sqrt(2/(ω*mu_0*brine.sigma)) = 4.79 mm
    k = brine.eps_r = 75
`},
		Right: check.Example{Note: `    regime: harmonic at f = 2.45 GHz
    medium brine: linear, isotropic, homogeneous, lossy
        eps_r = 75
        sigma = 4.5 S/m
    ω, angular frequency = 2*pi*f
    α, attenuation coefficient = Re(j*ω*sqrt(mu_0*brine.eps_c))
    δ, skin depth = 1/α = 10.5 mm
`},
		Run: perClaim(skinDepth),
	}
}

// goodConductor is σ/(ωε) from which the simple form holds to some per cent.
const goodConductor = 10

func skinDepth(p *check.Pass, c *claim) {
	if !isOf(c.sym.Facts, kind.Length) {
		return
	}
	sigma, omega, ok := c.skinForm()
	if !ok {
		return
	}
	eps, stated := c.permittivityOf(sigma)
	q := omega.rate * sigma.size / eps
	f := lang.Fault{
		Message: fmt.Sprintf("%s takes a good conductor, and σ/(ωε) is %.3g here", c.sym.Name, q),
		Detail:  "Take the general form: δ = 1/α with α = ω·√(µε/2)·√(√(1 + (σ/ωε)²) − 1).",
	}
	switch {
	case q < goodConductor:
	case !stated && q < 100*goodConductor:
		f.Severity = p.Lowered()
		f.Message = fmt.Sprintf("%s takes a good conductor, and the medium states no permittivity (σ/(ωε₀) is %.3g)", c.sym.Name, q)
		f.Detail = "State eps_r of the medium, or take the general form."
	default:
		return
	}
	c.report(p, f)
}

// sized is a factor with its size in SI units; rate is 1/ω for a frequency.
type sized struct {
	lang.Factor
	size, rate float64
}

// skinForm reads a length as √(2/(ω·µ·σ)).
func (c *claim) skinForm() (sigma, omega sized, ok bool) {
	t, single := c.note.Normal(c.sym, lang.UpToDeclared).Single()
	half := unit.NewRat(-1, 2)
	if !single {
		return
	}
	permeability := false
	for _, f := range t.Factors {
		x, known := sizeOf(c.note, f)
		switch {
		case f.Key == "#2":
		case isOf(f.Facts, kind.Conductivity) && f.Exp == half && known:
			sigma = sized{f, x, 0}
		case isOf(f.Facts, kind.Resistivity) && f.Exp == half.Neg() && known:
			sigma = sized{f, 1 / x, 0}
		case isOf(f.Facts, kind.Frequency) && f.Exp == half && known:
			if omega = (sized{f, x, 1 / x}); isCycles(f) {
				omega.rate /= 2 * math.Pi
			}
		case isOf(f.Facts, kind.Permeability) && f.Exp == half:
			permeability = true
		case f.Facts.Known && f.Facts.Dim.IsOne():
		default:
			return sigma, omega, false
		}
	}
	return sigma, omega, permeability && sigma.size > 0 && omega.size > 0
}

// permittivityOf is that of the medium to which a conductivity belongs, else
// eps_0 with false.
func (c *claim) permittivityOf(sigma sized) (float64, bool) {
	for _, key := range sigma.Facts.Media {
		if m, ok := mediumOf(c.note, key); ok {
			if e, ok := m.relativePermittivity(c.note); ok {
				return e * epsilon0(c.note), true
			}
		}
	}
	return epsilon0(c.note), false
}
