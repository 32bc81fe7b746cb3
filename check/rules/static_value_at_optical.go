package rules

import (
	"fmt"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// StaticValueAtOptical finds refractive indices that are the root of a
// permittivity of low frequencies, and the reverse.
func (Book) StaticValueAtOptical() check.Rule {
	return check.Rule{
		Name:     "static-value-at-optical",
		Severity: lang.Error,
		Title:    "A refractive index is made from a permittivity of low frequencies, or a permittivity from an index of light",
		Sees: "A refractive index √ε_r of a medium whose permittivity is declared static, or is stated for frequencies up to less than a tenth of 1 THz (an error); of a medium that states neither a range nor nondispersive (a caution); " +
			"a static or low-frequency energy with n² as its permittivity.",
		Silent:  "For media that are declared nondispersive; for a permittivity stated for optical frequencies; in a harmonic note, where the index is taken at the frequency of the note.",
		Formula: "n²(ω) = ε_r(ω)·µ_r(ω) at the same ω: dipoles and ions drop out with rising frequency. Water: ε_r 80 static, n² = 1.77 for light.",
		Remedy:  "Use the value at the frequency of the work, and state its range: `eps_r = 80 for f from 0 Hz to 1 GHz`.",
		Source:  "Jackson, Classical Electrodynamics, 3rd ed., 7.5.C and figure 7.9 (water; from memory)",
		Wrong: check.Example{Note: `    medium water: linear, isotropic, homogeneous, dispersive
        eps_r, static relative permittivity = 80
    n, refractive index = sqrt(water.eps_r) = 8.94
`},
		Right: check.Example{Note: `    medium water: linear, isotropic, homogeneous, dispersive
        n_d, refractive index = 1.333   for λ from 580 nm to 600 nm
    λ, wavelength = 589 nm
    n, refractive index = water.n_d = 1.333
`},
		Run: perClaim(staticAtOptical),
	}
}

// optical is the frequency, in Hz, from which a refractive index is one of light
// or of the far infrared.
const optical = 1e12

func staticAtOptical(p *check.Pass, c *claim) {
	t, single := c.note.Normal(c.sym, lang.UpToDeclared).Single()
	if !single {
		return
	}
	if c.sym.Facts.Kind.Is(kind.RefractiveIndex) && c.declared() {
		c.indexFromPermittivity(p, t)
		return
	}
	if form, ok := c.form(); ok && form == kind.StoredEnergy && c.isStatic() {
		for _, f := range t.Factors {
			if f.Symbol != nil && f.Facts.Kind.Is(kind.RefractiveIndex) && f.Exp == two {
				c.report(p, lang.Fault{
					Message: fmt.Sprintf("%s takes %s², a permittivity of light, for a static field", c.sym.Name, f.Symbol.Name),
					Detail:  "Use the static permittivity: dipoles and ions follow a static field and no light.",
				})
				return
			}
		}
	}
}

// indexFromPermittivity judges n = √ε_r by what the medium says of ε_r.
func (c *claim) indexFromPermittivity(p *check.Pass, t lang.Term) {
	for _, f := range t.Factors {
		if f.Symbol == nil || !f.Symbol.Facts.Kind.Is(kind.RelativePermittivity) || f.Exp != unit.NewRat(1, 2) {
			continue
		}
		m, owned := ownerMedium(c.note, f.Symbol)
		if owned && m.says("nondispersive") || c.harmonic() {
			continue // in a harmonic note both are taken at its frequency
		}
		out := lang.Fault{
			Message: fmt.Sprintf("%s is the root of %s, a permittivity of low frequencies", c.sym.Name, ownedName(f.Symbol)),
			Detail:  "n² = ε_r·µ_r at the same frequency: take the index, or the permittivity, that was measured there.",
			Related: c.because([]lang.Factor{f}, func(s *lang.Symbol) string { return ownedName(s) + " = " + s.Shown }),
		}
		top, ranged := topFrequency(f.Symbol)
		switch {
		case f.Symbol.Facts.Qualifier == kind.Static, ranged && top < optical/10:
		case ranged || !owned:
			continue
		default:
			out.Severity = p.Lowered()
			out.Message = fmt.Sprintf("%s is the root of %s, and the note does not say for which frequencies that holds", c.sym.Name, ownedName(f.Symbol))
			out.Detail += fmt.Sprintf(" State the range of %s, or declare the medium nondispersive.", ownedName(f.Symbol))
		}
		c.report(p, out)
		return
	}
}

// topFrequency is the upper end of a property's range of frequencies.
func topFrequency(s *lang.Symbol) (float64, bool) {
	v, ok := rangeOver(s, kind.Frequency)
	return v.High, ok
}
