package rules

import (
	"fmt"

	"inkjoule/check"
	"inkjoule/lang"
)

// TimeConventionSign finds complex properties with the sign of the other time
// convention, which makes a passive medium amplify.
func (Book) TimeConventionSign() check.Rule {
	return check.Rule{
		Name:     "time-convention-sign",
		Severity: lang.Error,
		Title:    "A complex property has the sign of the convention e^{−iωt}: a passive medium would amplify",
		Sees: "A permittivity, a permeability, a susceptibility, a refractive index or a wavenumber with a positive imaginary part in a harmonic note, whose convention is e^{+jωt}, " +
			"also by its formula (ε + jσ/ω, ε·(1 + j·tan δ)) and where it comes from another note; two properties of opposite signs in one note; a propagation coefficient or a wave e^{−αz + jβz} " +
			"that is not damped in the direction in which it travels; an attenuation coefficient, a loss factor, a conductivity or a dissipation of a lossy or lossless medium that is negative. " +
			"A caution where no harmonic regime is stated and a complex property is used; for a time factor e^{−jωt} in a harmonic note; for j/(ωC) and −jωL; " +
			"for a negative loss where nothing says that the medium is passive.",
		Silent: "For a medium that is declared active; for an imaginary part of zero but for rounding; for what follows from a property that is reported already; for media with a negative permittivity and " +
			"permeability, in which waves run backward; for conj(…); for a wave that travels and decays in the direction of −z.",
		Formula: "e^{+jωt}: ε = ε′ − jε″, n − jκ, k = β − jα, γ = α + jβ with α ≥ 0, e^{−jkz}, ε_c = ε − jσ/ω; e^{−iωt}: ε′ + iε″, n + iκ, e^{+ikz}.",
		Remedy:  "Write the conjugate of imported data: `eps_r = 52 - 14*j`; declare the convention by the regime.",
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
		Run: timeConvention,
	}
}

func timeConvention(p *check.Pass) error {
	v := conventionsOf(p)
	v.properties()
	v.imported()
	for _, c := range viewOf(p).claims {
		if !v.explained(c) && !v.complexClaim(c) && !v.wave(c) {
			v.negative(c)
		}
	}
	for _, s := range p.Note.Symbols {
		v.forms(s)
	}
	return nil
}

// conventions is what a note shows of its time convention.
type conventions struct {
	p        *check.Pass
	harmonic bool            // a harmonic regime stands somewhere
	wrong    map[string]bool // media of which a property has the other sign, by key
	right    *lang.Symbol    // a property with the sign of e^{+jωt}
}

func conventionsOf(p *check.Pass) *conventions {
	v := &conventions{p: p, wrong: map[string]bool{}}
	for _, st := range p.Note.Script.Stmts {
		if r, ok := st.Tree.(*lang.Regime); ok && r.Word.Text == "harmonic" {
			v.harmonic = true
		}
	}
	v.sort(p.Note.Symbols)
	for _, u := range p.Note.Uses {
		if u.Symbol != nil && u.Symbol.Path != "" {
			v.sort([]*lang.Symbol{u.Symbol})
		}
	}
	return v
}

// sort notes which media have properties of which sign.
func (v *conventions) sort(symbols []*lang.Symbol) {
	for _, s := range symbols {
		if s.Owner == nil || !isSigned(s) || activeOwner(v.p.Note, s) {
			continue
		}
		switch lossSign(s) {
		case 1:
			v.wrong[s.Owner.Key] = true
		case -1:
			if v.right == nil {
				v.right = s
			}
		}
	}
}

// activeOwner reports a property of an active medium.
func activeOwner(n *lang.Note, s *lang.Symbol) bool {
	m, ok := ownerMedium(n, s)
	return ok && m.says("active")
}

// properties reports those with the sign of the other convention, and losses
// that are stated as negative.
func (v *conventions) properties() {
	for _, s := range v.p.Note.Symbols {
		given := s.Owner != nil || s.Input && s.Role == lang.RoleQuantity
		if !given || s.Def == nil || s.Stmt == nil || len(s.Def.Members) == 0 || activeOwner(v.p.Note, s) {
			continue
		}
		switch {
		case isSigned(s) && lossSign(s) > 0:
			v.tellSign(s, s.Stmt.Abs(s.Def.Members[0]))
		case s.Owner != nil && isPassiveLoss(s.Facts.Kind) && isNegative(s):
			v.p.Report(lang.Fault{
				Span:    s.Stmt.Abs(s.Def.Members[0]),
				Message: fmt.Sprintf("%s is negative: a passive medium loses", ownedName(s)),
				Detail:  "If the medium amplifies, declare it active.",
			})
		}
	}
}

// imported reports the first use of a property of another note that has the
// other sign, and cautions where a note without a regime uses complex ones.
func (v *conventions) imported() {
	told := map[string]bool{}
	for _, u := range v.p.Note.Uses {
		s := u.Symbol
		if s == nil || u.Define || s.Owner == nil || !isSigned(s) || lossSign(s) == 0 || s.Owner.Stmt == u.Stmt || !computes(u.Stmt) || activeOwner(v.p.Note, s) {
			continue
		}
		switch {
		case lossSign(s) > 0 && s.Path != "" && !told[s.Key]:
			told[s.Key] = true
			v.tellSign(s, u.Span)
		case lossSign(s) < 0 && !v.harmonic && len(told) == 0 && len(v.wrong) == 0:
			told[s.Key] = true
			v.p.Report(lang.Fault{
				Severity: v.p.Lowered(), Span: u.Span,
				Message: fmt.Sprintf("%s is complex, and the note states no time convention", ownedName(s)),
				Detail:  "State the regime (`regime: harmonic at f = …`): it stands for e^{+jωt}, with ε′ − jε″ and n − jκ.",
				Related: relatedSymbols(v.p.Note, s),
			})
		}
	}
}

// tellSign reports a property with a positive imaginary part.
func (v *conventions) tellSign(s *lang.Symbol, at lang.Span) {
	f := lang.Fault{
		Span:    at,
		Message: fmt.Sprintf("the imaginary part of %s is positive: with e^{+jωt} a passive medium has a negative one", ownedName(s)),
		Detail:  "Write the conjugate; data with n + iκ or ε′ + iε″ are of the convention e^{−iωt}. If the medium amplifies, declare it active.",
	}
	switch {
	case v.harmonic:
	case v.right != nil:
		f.Message = fmt.Sprintf("the imaginary part of %s is positive and that of %s negative: the two are of different time conventions", ownedName(s), ownedName(v.right))
		f.Related = relatedSymbols(v.p.Note, v.right)
	default:
		f.Severity = v.p.Lowered()
		f.Detail += " State the regime (`regime: harmonic at f = …`), which fixes the convention."
	}
	v.p.Report(f)
}
