package rules

import (
	"fmt"
	"slices"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// DispersiveEnergyDensity finds energies of alternating fields in dispersive
// media that leave the derivative of ωε out.
func (Book) DispersiveEnergyDensity() check.Rule {
	return check.Rule{
		Name:     "dispersive-energy-density",
		Severity: lang.Error,
		Title:    "The energy of an alternating field in a dispersive medium lacks the derivative of ω·ε",
		Sees: "A stored energy or energy density ¼ε|E|², ½εE² (µ and H likewise) of an alternating field in a medium that is declared dispersive, or whose permittivity is not positive, " +
			"without a derivative in what it is computed from.",
		Silent: "For static fields; in media that are declared nondispersive, or that say nothing; where a derivative stands in the definition or in what it uses; " +
			"with eps_0 or mu_0 alone, the energy of the field without that of the medium; for a reactive power, where the plain form is meant.",
		Formula: "⟨w⟩ = ¼·∂(ωε)/∂ω·|E|² + ¼·∂(ωµ)/∂ω·|H|² for peak phasors, a narrow band and little loss; ¼ε|E|² turns negative in a plasma or a metal.",
		Remedy:  "Differentiate: `1/4*derivative(ω*eps(ω) for ω at ω_0)*|E|^2`; declare the medium nondispersive if ε does not vary around the frequency.",
		Source:  "Jackson, Classical Electrodynamics, 3rd ed., 6.8, eq. 6.126 (from memory)",
		Wrong: check.Example{Note: `    regime: harmonic at f = 12 GHz
    medium plasma: linear, isotropic, homogeneous, lossless, dispersive
        eps_r = 0.4375
    E in plasma, peak electric field strength = 20 kV/m
    w, average energy density = 1/4*plasma.eps*E^2 = 0.387 mJ/m^3
`},
		Right: check.Example{Note: `    regime: harmonic at f = 12 GHz
    medium plasma: linear, isotropic, homogeneous, lossless, dispersive
        eps_r(f) = 1 - (9 GHz / f)^2 for f from 1 GHz to 100 GHz
    E in plasma, peak electric field strength = 20 kV/m
    g(f) = f*plasma.eps_r(f)
    w, average energy density = 1/4*eps_0*derivative(g(x) for x at f)*E^2 = 1.383 mJ/m^3
`},
		Run: perClaim(dispersiveEnergy),
	}
}

func dispersiveEnergy(p *check.Pass, c *claim) {
	form, ok := c.form()
	if !ok || form != kind.StoredEnergy || !c.harmonic() || c.sym.Facts.Qualifier == kind.Static || c.differentiates(p) {
		return
	}
	squares, ok := c.squares(form)
	if !ok {
		return
	}
	for _, m := range c.mediaOf() {
		e, negative := m.negativePermittivity(c.note)
		if !m.says("dispersive") && !negative || m.says("nondispersive") {
			continue
		}
		for _, q := range squares {
			if q.stat == kind.Static || !q.withResponseOf(m) {
				continue
			}
			f := lang.Fault{
				Message: fmt.Sprintf("%s leaves the dispersion of %s out: the energy of an alternating field is made with ∂(ωε)/∂ω", c.sym.Name, m.sym.Name),
				Detail:  "Put the derivative of ω·ε in the place of ε, or declare the medium nondispersive if ε does not vary around this frequency.",
				Related: []lang.Related{{Span: m.sym.Span, Path: m.sym.Path, Message: m.sym.Name + " is declared dispersive"}},
			}
			if negative {
				f.Message = fmt.Sprintf("%s takes ε_r = %.4g of %s, which gives no energy: a medium with such a permittivity is dispersive", c.sym.Name, e, m.sym.Name)
				f.Related[0].Message = m.sym.Name
			}
			c.report(p, f)
			return
		}
	}
}

// withResponseOf reports a square in which the response of the medium stands: its
// permittivity or permeability, or its flux density. With eps_0 or mu_0 it is
// the energy of the field alone.
func (q *square) withResponseOf(m medium) bool {
	if len(q.amplitudes) == 2 && q.amplitudes[0].Facts.Dim.Base() != q.amplitudes[1].Facts.Dim.Base() {
		return true
	}
	for _, f := range append(q.byRole[roleCapacity], q.byRole[roleInduction]...) {
		if slices.Contains(f.Facts.Media, m.sym.Key) {
			return true
		}
	}
	return false
}

// negativePermittivity gives the real part of a scalar permittivity that is not
// positive.
func (m medium) negativePermittivity(n *lang.Note) (float64, bool) {
	for _, name := range []string{"eps_r", "eps"} {
		s := n.Lookup(m.sym.Key + "." + name)
		if s == nil || !s.Known || s.Role == lang.RoleFunction || s.Value.Len() != 1 {
			continue
		}
		return s.Value.Re(), s.Value.Re() <= 0
	}
	return 0, false
}

// differentiates reports a derivative in the definition or in what it uses.
func (c *claim) differentiates(p *check.Pass) bool {
	if hasDerivative(c.sym.Stmt) {
		return true
	}
	return originsOf(p).reaches(c.sym.Stmt, func(s *lang.Symbol) bool { return s.Owner == nil && hasDerivative(s.Stmt) })
}

func hasDerivative(s *lang.Stmt) bool {
	found := false
	if s != nil {
		lang.Walk(s.Tree, func(t lang.Tree) bool {
			call, ok := t.(*lang.Call)
			found = found || ok && call.Fn.Text == "derivative"
			return !found
		})
	}
	return found
}
