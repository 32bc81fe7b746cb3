package rules

import (
	"fmt"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
)

// TimeConventionSign finds complex properties with the sign of the other time
// convention, which makes a passive medium amplify.
func (Book) TimeConventionSign() check.Rule {
	return check.Rule{
		Name:     "time-convention-sign",
		Severity: lang.Error,
		Title:    "A complex property has the sign of the convention e^{−iωt}: a passive medium would amplify",
		Sees: "A permittivity, a permeability, a susceptibility or a refractive index with a positive imaginary part in a harmonic note, whose convention is e^{+jωt}; an attenuation coefficient, a loss factor, " +
			"a conductivity or an average dissipation that comes out negative. A caution where no harmonic regime is stated.",
		Silent:  "For a medium that is declared active; for an imaginary part of zero but for rounding; for what follows from a property that is reported already.",
		Formula: "e^{+jωt}: ε = ε′ − jε″, n − jκ, γ = α + jβ with α ≥ 0, ε_c = ε − jσ/ω; e^{−iωt}: ε′ + iε″, n + iκ.",
		Remedy:  "Write the conjugate: `eps_r = 52 - 14*j`.",
		Source:  "IEC 60050-121:1998/AMD:2008 and Pozar, Microwave Engineering, 4th ed., 1.3 (ε = ε′ − jε″; from memory)",
		Wrong: check.Example{Note: `    regime: harmonic at f = 915 MHz
    medium meal: linear, isotropic, homogeneous, lossy
        eps_r = 52 + 14*j
    x = Re(meal.eps_r) = 52
`},
		Right: check.Example{Note: `    regime: harmonic at f = 915 MHz
    medium meal: linear, isotropic, homogeneous, lossy
        eps_r = 52 - 14*j
    x = Re(meal.eps_r) = 52
`},
		Run: perSpot(conventionSign),
	}
}

func conventionSign(p *check.Pass, s *spot) {
	if m, ok := s.stmt.Tree.(*lang.Medium); ok {
		if !(medium{tree: m}).says("active") {
			for _, sym := range p.Note.Symbols {
				if sym.Stmt == s.stmt && sym.Owner != nil {
					complexSign(p, sym)
				}
			}
		}
		return
	}
	for _, c := range s.claims {
		if !c.complexOrActive(p) && !complexSign(p, c.sym) {
			negativeLoss(p, c)
		}
	}
}

// complexOrActive reports a claim whose media explain its sign: one that is
// active, or one whose own property is reported.
func (c *claim) complexOrActive(p *check.Pass) bool {
	for _, m := range c.mediaOf() {
		if m.says("active") {
			return true
		}
		for _, s := range p.Note.Symbols {
			if s.Owner != nil && s.Owner.Key == m.sym.Key && wrongSign(s) {
				return true
			}
		}
	}
	return false
}

// signed are the kinds of which the imaginary part is a loss; read only.
var signed = []kind.ID{
	kind.Permittivity, kind.RelativePermittivity, kind.Permeability, kind.RelativePermeability,
	kind.ElectricSusceptibility, kind.MagneticSusceptibility, kind.RefractiveIndex,
}

// wrongSign reports a complex property with a positive imaginary part.
func wrongSign(s *lang.Symbol) bool {
	if !s.Known || !s.Facts.Complex || s.Role == lang.RoleFunction {
		return false
	}
	is := false
	for _, k := range signed {
		is = is || s.Facts.Kind.Is(k)
	}
	if !is {
		return false
	}
	size, most := 0.0, 0.0
	for i := range s.Value.Len() {
		if s.Value.Shape() == eval.Tensor && i%4 != 0 {
			continue
		}
		x := s.Value.At(i)
		size, most = max(size, magnitudeOf(x.C())), max(most, imag(x.C()))
	}
	return most > 1e-12*size
}

// complexSign reports a property with the wrong sign.
func complexSign(p *check.Pass, s *lang.Symbol) bool {
	if !wrongSign(s) {
		return false
	}
	f := lang.Fault{
		Span:    s.Stmt.Abs(s.Def.Members[0]),
		Message: fmt.Sprintf("the imaginary part of %s is positive: with e^{+jωt} a passive medium has a negative one", ownedName(s)),
		Detail:  "Write the conjugate; data with n + iκ or ε′ + iε″ are of the convention e^{−iωt}.",
	}
	if word, _ := p.Note.Regime(s); word != "harmonic" && s.Owner == nil || s.Owner != nil && !anyHarmonic(p) {
		f.Severity = p.Lowered()
		f.Detail += " State the regime (`regime: harmonic at f = …`), which fixes the convention."
	}
	p.Report(f)
	return true
}

// anyHarmonic reports a note with a harmonic regime: media stand above it.
func anyHarmonic(p *check.Pass) bool {
	for _, st := range p.Note.Script.Stmts {
		if r, ok := st.Tree.(*lang.Regime); ok && r.Word.Text == "harmonic" {
			return true
		}
	}
	return false
}

// negativeLoss reports a passive quantity that comes out negative.
func negativeLoss(p *check.Pass, c *claim) {
	s := c.sym
	if !s.Known || s.Facts.Complex || s.Facts.Shape != eval.Scalar || s.Value.Re() >= 0 || !c.declared() {
		return
	}
	k := s.Facts.Kind
	dissipated := k.Is(kind.PowerDensity) || k.Is(kind.SpecificAbsorptionRate)
	if !k.Is(kind.AttenuationCoefficient) && !k.Is(kind.LossFactor) && !k.Is(kind.Conductivity) && !dissipated {
		return
	}
	if len(s.Facts.Media) == 0 {
		return // nothing says that a passive medium made it
	}
	c.report(p, lang.Fault{
		Severity: p.Lowered(),
		Message:  fmt.Sprintf("%s is negative: a passive medium loses", s.Name),
		Detail:   "Look for the sign of an imaginary part: with e^{+jωt}, ε″ = −Im(ε) and γ = α + jβ. If the medium amplifies, declare it active.",
	})
}
