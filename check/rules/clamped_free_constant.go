package rules

import (
	"fmt"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// ClampedFreeConstant finds constants of piezoelectric media at the wrong
// mechanical condition.
func (Book) ClampedFreeConstant() check.Rule {
	return check.Rule{
		Name:     "clamped-free-constant",
		Severity: lang.Caution,
		Title:    "The permittivity of a piezoelectric medium is used at another mechanical condition than it is stated for",
		Sees: "A permittivity at constant stress above the mechanical resonance that the medium states, one at constant strain a decade below it, " +
			"and a permittivity of a medium declared piezoelectric that is stated for neither.",
		Silent:  "Where the condition fits the frequency; for media that are not declared piezoelectric; where the medium states a coupling factor below 0.1 (k² below 1 %).",
		Formula: "ε^S ≈ ε^T·(1 − k²): between them lies elastic energy. A bridge far below the resonance sees ε^T (free), above it ε^S (clamped).",
		Remedy:  "State which it is: `eps_r, constant-stress relative permittivity = 1700`, and the resonance: `f_m, mechanical resonance frequency = 1.2 MHz`.",
		Source:  "IEEE Std 176-1987, 2.3 and 4 (from memory)",
		Wrong: check.Example{Note: `    regime: harmonic at f = 30 MHz
    medium ceramic: linear, isotropic, homogeneous, nondispersive, piezoelectric
        eps_r, constant-stress relative permittivity = 1700
        f_m, mechanical resonance frequency = 1.2 MHz
    A = 1 cm^2
    d = 1 mm
    C, capacitance = ceramic.eps*A/d = 1.505 nF
`},
		Right: check.Example{Note: `    regime: harmonic at f = 30 MHz
    medium ceramic: linear, isotropic, homogeneous, nondispersive, piezoelectric
        eps_r, constant-strain relative permittivity = 850
        f_m, mechanical resonance frequency = 1.2 MHz
    A = 1 cm^2
    d = 1 mm
    C, capacitance = ceramic.eps*A/d = 0.753 nF
`},
		Run: clampedFree,
	}
}

func clampedFree(p *check.Pass) error {
	seen := map[string]bool{}
	for _, u := range p.Note.Uses {
		s := u.Symbol
		if u.Define || s == nil || s.Owner == nil || u.Stmt == s.Stmt || !s.Facts.Kind.Is(kind.RelativePermittivity) && !isOf(s.Facts, kind.Permittivity) {
			continue
		}
		m, ok := mediumOf(p.Note, s.Owner.Key)
		if !ok || seen[s.Key] || !m.says("piezoelectric") || weaklyCoupled(p.Note, m) {
			continue
		}
		if f, bad := clampedFault(p, m, s, u); bad {
			seen[s.Key] = true
			p.Report(f)
		}
	}
	return nil
}

// weaklyCoupled reports a medium whose coupling factor hardly matters.
func weaklyCoupled(n *lang.Note, m medium) bool {
	k := m.propertyOf(n, kind.CouplingFactor)
	x, ok := magnitude(k)
	return ok && x < 0.1
}

// clampedFault judges one use of a permittivity.
func clampedFault(p *check.Pass, m medium, s *lang.Symbol, u lang.Use) (lang.Fault, bool) {
	f := lang.Fault{Span: u.Span, Related: []lang.Related{{Span: s.Span, Path: s.Path, Message: ownedName(s) + " = " + s.Shown}}}
	free, clamped := s.Facts.Kind.Is(kind.ConstantStressPermittivity), s.Facts.Kind.Is(kind.ConstantStrainPermittivity)
	if !free && !clamped {
		f.Message = fmt.Sprintf("%s is piezoelectric, and %s does not say whether it is that of the free or the clamped body", m.sym.Name, ownedName(s))
		f.Detail = fmt.Sprintf("Declare a constant-stress or a constant-strain relative permittivity; if the coupling hardly matters, state it: `k, coupling factor = …` in %s.", m.sym.Name)
		return f, true
	}
	word, at := p.Note.RegimeAt(u.Stmt)
	resonance := m.propertyOf(p.Note, kind.MechanicalResonanceFrequency)
	r, known := magnitude(resonance)
	if !known {
		return f, false
	}
	w, harmonic := magnitude(at)
	switch {
	case word == "harmonic" && harmonic && free && w > r:
		f.Message = fmt.Sprintf("%s is that of the free body, and %s is above the mechanical resonance", ownedName(s), at.Shown)
		f.Detail = "Above the resonance the body cannot follow: take the constant-strain value."
	case clamped && (word == "static" || word == "harmonic" && harmonic && w < r/10):
		f.Message = fmt.Sprintf("%s is that of the clamped body, and the frequency is far below the mechanical resonance", ownedName(s))
		f.Detail = "Far below the resonance the body follows: take the constant-stress value."
	default:
		return f, false
	}
	return f, true
}
