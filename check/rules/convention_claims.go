package rules

import (
	"fmt"

	"inkjoule/lang"
	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
)

// This file judges the signs of complex results, and of losses.

// signed are the kinds of which the imaginary part is a loss, negative with
// e^{+jωt}; read only.
var signed = []kind.ID{
	kind.Permittivity, kind.RelativePermittivity, kind.Permeability, kind.RelativePermeability,
	kind.ElectricSusceptibility, kind.MagneticSusceptibility, kind.RefractiveIndex, kind.PhaseCoefficient, kind.AngularWavenumber,
}

// isSigned reports a complex value of such a kind.
func isSigned(s *lang.Symbol) bool {
	if !s.Known || !s.Facts.Complex || s.Role == lang.RoleFunction {
		return false
	}
	for _, k := range signed {
		if s.Facts.Kind.Is(k) {
			return true
		}
	}
	return false
}

// lossSign is the sign of the largest imaginary part, of a tensor's diagonal;
// 0 where it is zero but for rounding.
func lossSign(s *lang.Symbol) int {
	size, most := 0.0, 0.0
	for i := range s.Value.Len() {
		x := s.Value.At(i).C()
		size = max(size, magnitudeOf(x))
		if onDiagonal := s.Value.Shape() != eval.Tensor || i%4 == 0; onDiagonal && abs(imag(x)) > abs(most) {
			most = imag(x)
		}
	}
	switch {
	case most > 1e-12*size:
		return 1
	case most < -1e-12*size:
		return -1
	}
	return 0
}

func abs(x float64) float64 { return max(x, -x) }

// isPassiveLoss reports kinds that a passive medium has with a positive sign.
func isPassiveLoss(k kind.ID) bool {
	for _, id := range []kind.ID{
		kind.AttenuationCoefficient, kind.LossFactor, kind.LossIndex, kind.Conductivity, kind.PowerDensity, kind.SpecificAbsorptionRate,
	} {
		if k.Is(id) {
			return true
		}
	}
	return false
}

// isNegative reports a known real number below zero.
func isNegative(s *lang.Symbol) bool {
	return s.Known && !s.Facts.Complex && s.Facts.Shape == eval.Scalar && s.Value.Re() < 0
}

// explained reports a claim whose media explain its sign: one that is active,
// or one whose own property is reported.
func (v *conventions) explained(c *claim) bool {
	for _, m := range c.mediaOf() {
		if m.says("active") || v.wrong[m.sym.Key] || m.backward(v) {
			return true
		}
	}
	return false
}

// backward reports a medium in which waves run against their energy: with a
// negative permittivity and a negative permeability.
func (m medium) backward(v *conventions) bool {
	n := v.p.Note
	negative := func(names ...string) bool {
		s := firstOf(n, m.sym.Key, names...)
		return s != nil && s.Known && s.Value.Len() > 0 && s.Value.At(0).Re() < 0
	}
	return negative("eps", "eps_r") && negative("mu", "mu_r") || negative("n")
}

// complexClaim reports a result with the sign of the other convention.
func (v *conventions) complexClaim(c *claim) bool {
	s := c.sym
	if !isSigned(s) || lossSign(s) <= 0 || writesConj(c.x) {
		return false
	}
	f := lang.Fault{
		Message: fmt.Sprintf("the imaginary part of %s is positive: with e^{+jωt} a passive medium has a negative one", s.Name),
		Detail:  "A conductivity enters as ε − jσ/ω, a loss factor as ε·(1 − j·tan δ), an attenuation as β − jα.",
	}
	if word, _ := c.note.Regime(s); word != "harmonic" {
		f.Severity = v.p.Lowered()
		f.Detail += " State the regime (`regime: harmonic at f = …`), which fixes the convention."
	} else if s.Facts.KindBy == lang.Guessed {
		f.Severity = v.p.Lowered()
	}
	c.report(v.p, f)
	return true
}

// writesConj reports an expression that is made for the other convention, or
// for a product with a conjugate.
func writesConj(x lang.Expr) bool {
	found := false
	lang.Walk(x, func(t lang.Tree) bool {
		c, ok := t.(*lang.Call)
		found = found || ok && c.Fn.Text == "conj"
		return !found
	})
	return found
}

// wave reports a propagation coefficient that is not damped in the direction in
// which it travels.
func (v *conventions) wave(c *claim) bool {
	s := c.sym
	if !s.Known || !s.Facts.Complex || s.Facts.Shape != eval.Scalar || !s.Facts.Kind.Is(kind.PropagationCoefficient) || writesConj(c.x) {
		return false
	}
	re, im := s.Value.Re(), s.Value.Im()
	if re*im >= 0 || abs(re) < 1e-12*abs(im) || abs(im) < 1e-12*abs(re) {
		return false
	}
	f := lang.Fault{
		Message: fmt.Sprintf("the real and the imaginary part of %s have opposite signs: with e^{+jωt} this wave grows in the direction in which it travels", s.Name),
		Detail:  "γ = α + jβ = j·ω·√(µ·ε) with ε = ε′ − jε″; look for the sign of an imaginary part, or of j.",
	}
	if !c.declared() || !c.harmonic() {
		f.Severity = v.p.Lowered()
	}
	c.report(v.p, f)
	return true
}

// negative reports a passive quantity that comes out negative: an error where
// its medium is declared lossy or lossless.
func (v *conventions) negative(c *claim) {
	s := c.sym
	if !isNegative(s) || !c.declared() || !isPassiveLoss(s.Facts.Kind) || len(s.Facts.Media) == 0 {
		return // without a medium, nothing says that a passive one made it
	}
	f := lang.Fault{
		Message: fmt.Sprintf("%s is negative: a passive medium loses", s.Name),
		Detail:  "Look for the sign of an imaginary part: with e^{+jωt}, ε″ = −Im(ε) and γ = α + jβ. If the medium amplifies, declare it active.",
	}
	if !c.passive() {
		f.Severity = v.p.Lowered()
	}
	c.report(v.p, f)
}

// passive reports a claim all of whose media are declared lossy or lossless.
func (c *claim) passive() bool {
	for _, m := range c.mediaOf() {
		if !m.says("lossy", "lossless") {
			return false
		}
	}
	return true
}
