package rules

import (
	"fmt"
	"math"
	"slices"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// DispersiveEnergyDensity finds energies of alternating fields in dispersive
// media that leave the derivative of ωε out.
func (Book) DispersiveEnergyDensity() check.Rule {
	return check.Rule{
		Name:     "dispersive-energy-density",
		Severity: lang.Error,
		Title:    "The energy of an alternating field in a dispersive medium lacks the derivative of ω·ε",
		Sees: "A stored energy or energy density ¼ε|E|², ½εE² (µ and H likewise) of an alternating field, without a derivative in what it is computed from: " +
			"where ε is a function of frequency, or read from a table over it, with |(ω/ε)·∂ε/∂ω| above 0.02 at the point of use; where Re ε is not positive; " +
			"where ε_r is below 0.99 in a medium that is not lossy, since no medium without loss has that over a band. " +
			"A caution where the medium is declared dispersive and nothing tells the slope.",
		Silent: "For static fields; for a slope within 0.02; in media that are declared nondispersive, or that say nothing of it; where a derivative stands in the definition or in what it uses; " +
			"with eps_0 or mu_0 alone, the energy of the field without that of the medium; for a reactive power, where the plain form is meant; " +
			"for one value that is stated for a decade of frequencies or more, or beside a loss factor below 0.03: then the slope is small.",
		Formula: "⟨w⟩ = ¼·∂(ωε)/∂ω·|E|² + ¼·∂(ωµ)/∂ω·|H|² for peak phasors, a narrow band and little loss; ¼ε|E|² turns negative in a plasma or a metal. " +
			"Without loss ∂ε_r/∂ω > 2(1 − ε_r)/ω; with a loss factor that varies slowly, (ω/ε)·∂ε/∂ω ≈ −(2/π)·tan δ.",
		Remedy: "Differentiate: `1/4*derivative(ω*eps(ω) for ω at ω_0)*|E|^2`; declare the medium nondispersive if ε does not vary around the frequency.",
		Source: "Jackson, Classical Electrodynamics, 3rd ed., 6.8, eq. 6.126; Landau and Lifshitz, Electrodynamics of Continuous Media, 2nd ed., § 84, for the bound (both from memory)",
		Wrong: check.Example{Note: `    regime: harmonic at f = 12 GHz
    medium plasma: linear, isotropic, homogeneous, lossless, dispersive
        eps_r(f) = 1 - (9 GHz / f)^2 for f from 1 GHz to 100 GHz
    E in plasma, peak electric field strength = 20 kV/m
    w, average energy density = 1/4*eps_0*plasma.eps_r(f)*E^2 = 0.387 mJ/m^3
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

// slightSlope is |(ω/ε)·∂ε/∂ω| up to which the plain form holds.
const slightSlope = 0.02

func dispersiveEnergy(p *check.Pass, c *claim) {
	if form, ok := c.form(); !ok || form != kind.StoredEnergy || c.sym.Facts.Qualifier == kind.Static || c.differentiates(p) {
		return
	}
	squares, ok := c.squares(kind.StoredEnergy)
	if !ok {
		squares, ok = c.squaresWithin(kind.StoredEnergy)
	}
	if !ok {
		return
	}
	for _, q := range squares {
		if q.stat != kind.Static && c.dispersesIn(p, q) {
			return
		}
	}
}

// dispersesIn judges the response that one square takes.
func (c *claim) dispersesIn(p *check.Pass, q *square) bool {
	read := c.responses(q)
	for _, r := range read {
		if slope, ok := r.slope(c.note); ok && math.Abs(slope) > slightSlope {
			c.reportSlope(p, r, slope)
			return true
		}
	}
	if !c.harmonic() && q.stat != kind.RMS && c.stat != kind.Average {
		return false
	}
	for _, m := range c.mediaOf() {
		if q.withResponseOf(m) && c.dispersiveMedium(p, q, m, len(read) > 0) {
			return true
		}
	}
	return false
}

// dispersiveMedium judges by what a medium says; sloped: the slope is known, and
// slight.
func (c *claim) dispersiveMedium(p *check.Pass, q *square, m medium, sloped bool) bool {
	word, x, ok := q.responseOf(c.note, m)
	lossless := !m.says("lossy") && word == "ε_r"
	switch {
	case ok && x <= 0:
		c.reportDispersion(p, &m, fmt.Sprintf("%s takes %s = %.4g of %s, which gives no energy: a medium with such a value is dispersive", c.sym.Name, word, x, m.sym.Name))
	case ok && x < 1-slightSlope/2 && lossless:
		c.reportDispersion(p, &m, fmt.Sprintf("%s takes ε_r = %.4g of %s, which without loss goes with ∂(ωε_r)/∂ω of %.3g or more: the energy is %.3g times that at least", c.sym.Name, x, m.sym.Name, 2-x, (2-x)/x))
	case m.says("dispersive") && !sloped && !m.slightDispersion(c.note):
		c.report(p, lang.Fault{
			Severity: p.Lowered(),
			Message:  fmt.Sprintf("%s leaves the dispersion of %s out: the energy of an alternating field is made with ∂(ωε)/∂ω", c.sym.Name, m.sym.Name),
			Detail:   fmt.Sprintf("State %s as a function of frequency and differentiate ω·%s, or state the band for which its value holds.", word, word),
			Related:  []lang.Related{{Span: m.sym.Span, Path: m.sym.Path, Message: m.sym.Name + " is declared dispersive"}},
		})
	default:
		return false
	}
	return true
}

// reportSlope tells a known slope. One that falls goes with absorption, which
// the derivative form does not know either once it is considerable.
func (c *claim) reportSlope(p *check.Pass, r varying, slope float64) {
	at, _ := r.point(c.note)
	f := lang.Fault{
		Message: fmt.Sprintf("%s leaves the dispersion out: (ω/ε)·∂ε/∂ω is %.3g at %s", c.sym.Name, slope, r.hertz(at)),
		Detail:  differentiateAdvice,
	}
	if slope > -absorbs {
		f.Message += fmt.Sprintf(", so that the energy is %.3g times that", 1+slope)
	} else {
		f.Detail = "A permittivity that falls with frequency goes with absorption: report the absorbed power ½ω·ε″·|E|², or state the model of the medium."
	}
	c.report(p, f)
}

const differentiateAdvice = "Put the derivative of ω·ε in the place of ε: `1/4*derivative(ω*ε(ω) for ω at …)*|E|^2`."

func (c *claim) reportDispersion(p *check.Pass, m *medium, message string) {
	f := lang.Fault{Message: message, Detail: differentiateAdvice}
	if m != nil {
		f.Related = []lang.Related{{Span: m.sym.Span, Path: m.sym.Path, Message: m.sym.Name}}
	}
	c.report(p, f)
}

// hertz writes where a value over frequency is read, as a frequency.
func (v varying) hertz(at float64) string {
	if v.over.Kind.Is(kind.AngularFrequency) || v.over.Dim[unit.Angle].Sign() > 0 {
		at /= 2 * math.Pi
	}
	u, err := unit.Parse("Hz")
	if err != nil {
		return ""
	}
	u = unit.Choose(u, at)
	return fmt.Sprintf("%.4g %s", u.FromSI(at), u.Symbol)
}

// responses are the readings over frequency that the permittivities,
// permeabilities and flux densities of a square rest on.
func (c *claim) responses(q *square) []varying {
	var out []varying
	for _, r := range variesOver(c.note, c.sym, kind.Frequency, enterResponse) {
		capacity, induction := len(q.byRole[roleElectric]) > 0, len(q.byRole[roleMagnetic]) > 0
		switch role := roleOf(r.facts); {
		case role == roleCapacity && capacity, role == roleInduction && induction:
			out = append(out, r)
		}
	}
	return out
}

// enterResponse looks through all but the amplitudes that drive: what a field
// was made from says nothing of the energy.
func enterResponse(s *lang.Symbol) bool {
	r := roleOf(s.Facts)
	return r != roleElectric && r != roleMagnetic || isOf(s.Facts, kind.ElectricFluxDensity) || isOf(s.Facts, kind.MagneticFluxDensity)
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

// responseOf is the real part of the relative constant that the square takes
// from the medium.
func (q *square) responseOf(n *lang.Note, m medium) (word string, x float64, ok bool) {
	word, names := "ε_r", []string{"eps_r", "eps"}
	constant := "eps_0"
	if len(q.byRole[roleMagnetic]) > 0 {
		word, names, constant = "µ_r", []string{"mu_r", "mu"}, "mu_0"
	}
	for i, name := range names {
		s := n.Lookup(m.sym.Key + "." + name)
		if s == nil || !s.Known || s.Role == lang.RoleFunction || len(s.Def.Params) > 0 || s.Value.Len() != 1 {
			continue
		}
		x = s.Value.Re()
		if k := n.Lookup(constant); i == 1 && k != nil {
			x /= k.Value.Re()
		}
		return word, x, true
	}
	return word, 0, false
}

// slightDispersion reports a medium whose declaration bounds the slope: one
// permittivity for a decade of frequencies or wavelengths, or a small loss
// factor beside it.
func (m medium) slightDispersion(n *lang.Note) bool {
	for _, name := range []string{"eps_r", "eps"} {
		s := n.Lookup(m.sym.Key + "." + name)
		if s == nil || len(s.Def.Params) > 0 {
			continue
		}
		for _, k := range []kind.ID{kind.Frequency, kind.Length} {
			if v, ok := rangeOver(s, k); ok && v.High >= 10*v.Low {
				return true
			}
		}
	}
	loss, ok := magnitude(n.Lookup(m.sym.Key + ".tan_delta"))
	return ok && loss < slightSlope*math.Pi/2
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
