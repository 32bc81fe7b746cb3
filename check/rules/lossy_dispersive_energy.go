package rules

import (
	"fmt"
	"math"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// LossyDispersiveEnergy finds stored energies from ∂(ωε)/∂ω in media that lose.
func (Book) LossyDispersiveEnergy() check.Rule {
	return check.Rule{
		Name:     "lossy-dispersive-energy",
		Severity: lang.Caution,
		Title:    "A stored energy is made from ∂(ωε)/∂ω in a medium that absorbs",
		Sees: "A stored energy of an alternating field with a derivative in what it is computed from, in a medium that is declared dispersive and lossy and whose ε″/|ε′| is above 0.1 or not stated; " +
			"a stored energy of that form that comes out negative.",
		Silent:  "Where ε″/|ε′| is below 0.1; for lossless media; for a mean absorbed power, which ε alone determines; without a derivative, where dispersive-energy-density speaks.",
		Formula: "With absorption, stored energy and heat are not told apart by ε(ω): a model of the medium is needed, such as ⟨w⟩ = ¼ε₀|E|²·(ε′ + 2ωε″/Γ) for one resonance of width Γ.",
		Remedy:  "Report the absorbed power ½ωε″|E|², or state the model of the medium.",
		Source:  "Loudon, J. Phys. A 3 (1970) 233 (from memory); Barash and Ginzburg, Sov. Phys. Usp. 19 (1976) 263 (abstract)",
		Wrong: check.Example{Note: `    regime: harmonic at f = 12 GHz
    medium film: linear, isotropic, homogeneous, lossy, dispersive
        eps_r(f) = 1 - (9 GHz / f)^2 for f from 1 GHz to 100 GHz
    E in film, peak electric field strength = 20 kV/m
    g(f) = f*film.eps_r(f)
    w, average energy density = 1/4*eps_0*derivative(g(x) for x at f)*E^2 = 1.383 mJ/m^3
`},
		Right: check.Example{Note: `    regime: harmonic at f = 12 GHz
    medium film: linear, isotropic, homogeneous, lossless, dispersive
        eps_r(f) = 1 - (9 GHz / f)^2 for f from 1 GHz to 100 GHz
    E in film, peak electric field strength = 20 kV/m
    g(f) = f*film.eps_r(f)
    w, average energy density = 1/4*eps_0*derivative(g(x) for x at f)*E^2 = 1.383 mJ/m^3
`},
		Run: perClaim(lossyDispersive),
	}
}

// absorbs is ε″/|ε′| from which the derivative form fails.
const absorbs = 0.1

func lossyDispersive(p *check.Pass, c *claim) {
	if form, ok := c.form(); !ok || form != kind.StoredEnergy || !c.harmonic() || !c.differentiates(p) {
		return
	}
	for _, m := range c.mediaAround(p) {
		if !m.says("dispersive") || !m.says("lossy") {
			continue
		}
		loss, known := m.lossRatio(c.note)
		if known && loss <= absorbs {
			continue
		}
		f := lang.Fault{
			Message: fmt.Sprintf("%s is a stored energy of %s, which absorbs: ε alone does not tell it from the heat", c.sym.Name, m.sym.Name),
			Detail:  "State the model of the medium, or report the absorbed power ½·ω·ε″·|E|².",
			Related: []lang.Related{{Span: m.sym.Span, Path: m.sym.Path, Message: m.sym.Name + " is declared lossy and dispersive"}},
		}
		if known {
			f.Message += fmt.Sprintf(" (ε″/|ε′| is %.2g)", loss)
		} else {
			f.Detail += fmt.Sprintf(" If ε″ is below a tenth of ε′, state tan_delta of %s.", m.sym.Name)
		}
		c.report(p, f)
		return
	}
}

// mediaAround are the media of a claim, and those to which its fields are bound.
func (c *claim) mediaAround(p *check.Pass) []medium {
	out := c.mediaOf()
	originsOf(p).reaches(c.sym.Stmt, func(s *lang.Symbol) bool {
		if s.Def != nil && s.Def.In != nil {
			if m, ok := mediumOf(c.note, lang.CanonicalName(s.Def.In.Text)); ok {
				out = append(out, m)
			}
		}
		return false
	})
	return out
}

// lossRatio is ε″/|ε′| as the medium states it.
func (m medium) lossRatio(n *lang.Note) (float64, bool) {
	if s := n.Lookup(m.sym.Key + ".tan_delta"); s != nil {
		return magnitude(s)
	}
	if s := n.Lookup(m.sym.Key + ".eps_r"); s != nil && s.Known && s.Facts.Complex && s.Value.Len() == 1 && s.Value.Re() != 0 {
		return math.Abs(s.Value.Im() / s.Value.Re()), true
	}
	return 0, false
}
