package rules

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// PowerSumCoherence finds sums of several sources that do not go with their
// phases.
func (Book) PowerSumCoherence() check.Rule {
	return check.Rule{
		Name:     "power-sum-coherence",
		Severity: lang.Error,
		Title:    "Sources are added in power although they are coherent, or in magnitude although they are not",
		Sees: "Coherent quantities (declared so, `E_1, coherent rms electric field strength`) that are added as powers or as the root of the sum of squares; " +
			"rms values of incoherent quantities, or of harmonic regimes of different frequencies, whose magnitudes are added. " +
			"A caution where field strengths or power flux densities of one frequency are added and nobody says whether they are coherent.",
		Silent: "For phasors, which are added with their phases; for a result that says `worst-case`, `coherent` or `incoherent` itself and thereby what was assumed; for peak values of different frequencies, whose sum bounds the crest; " +
			"for components of one field, for voltages, currents and powers whose coherence nobody states; for terms of one and the same source.",
		Formula: "One frequency: ⟨S⟩ = ½|ΣÊ_k|²/Z, phases count; different frequencies: ⟨S⟩ = Σ½|Ê_k|²/Z over a long enough time; bound: |ΣE_k| ≤ Σ|E_k|.",
		Remedy:  "Add coherent fields as phasors and square the sum; add the mean squares of independent ones; name a sum of magnitudes `worst-case`.",
		Source:  "Jackson, Classical Electrodynamics, 3rd ed., 6.9 and 10.1 (from memory); superposition",
		Wrong: check.Example{Note: `    E_1, coherent rms electric field strength = 4.0 V/m
    E_2, coherent rms electric field strength = 4.0 V/m
    S, average power flux density = E_1^2/Z_0 + E_2^2/Z_0 = 84.9 mW/m^2
`},
		Right: check.Example{Note: `    E_1, coherent rms electric field strength = 4.0 V/m
    E_2, coherent rms electric field strength = 4.0 V/m
    S, average power flux density = (E_1 + E_2)^2/Z_0 = 170 mW/m^2
`},
		Run: perClaim(powerSum),
	}
}

// sources are the terms of a sum, each of one quantity.
type sources struct {
	of     []*lang.Symbol
	power  bool // powers, squares, or the root of a sum of squares
	linear bool // rms values themselves
}

func powerSum(p *check.Pass, c *claim) {
	if c.sym.Facts.Coherence != kind.AnyPhase || c.sym.Facts.Complex {
		return
	}
	s, ok := c.sourcesOf()
	if !ok {
		return
	}
	var tied []kind.Coherence
	for _, x := range s.of {
		tied = append(tied, coherenceOf(c.note, x, maxScalings))
	}
	others := c.otherFrequencies(s.of)
	switch coherent, incoherent := count(tied, kind.Coherent), count(tied, kind.Incoherent); {
	case s.power && coherent >= 2 && incoherent == 0:
		c.reportSources(p, s, p.Rule.Severity, "adds the powers of coherent sources: fields of one frequency with fixed phases add as phasors, and the sum is squared", c.inPhase(s))
	case s.linear && (incoherent > 0 || others == differ):
		c.reportSources(p, s, p.Rule.Severity, "adds the magnitudes of sources that are not coherent: in the mean their squares add",
			fmt.Sprintf(" Take the root of the sum of the squares. If a bound is meant, write `%s, worst-case …`.", c.sym.Name))
	case incoherent == 0 && others == agree && c.isFieldSum(s) && !c.oneFromAnother(s.of):
		how := "adds the powers"
		if s.linear {
			how = "adds the magnitudes"
		}
		c.reportSources(p, s, p.Lowered(), how+" of sources of one frequency, and the note does not say whether they are coherent",
			fmt.Sprintf(" Say it with the sources, `coherent` or `incoherent`, or with the result what it assumes: `%s, worst-case …`, `%s, incoherent …`.", c.sym.Name, c.sym.Name))
	}
}

func count(list []kind.Coherence, what kind.Coherence) int {
	n := 0
	for _, c := range list {
		if c == what {
			n++
		}
	}
	return n
}

// sourcesOf reads a claim as a sum of at least two sources.
func (c *claim) sourcesOf() (s sources, ok bool) {
	form := c.note.Normal(c.sym, lang.NamesStay)
	if sum := c.underRoot(); sum != nil {
		form = sum
	}
	if form == nil || len(form.Terms) < 2 {
		return s, false
	}
	for _, t := range form.Terms {
		x, degree := sourceIn(t)
		switch {
		case x == nil || t.Coef.Sign() < 0 || slices.Contains(s.of, x):
			return s, false
		case degree == two || isPower(x.Facts):
			s.power = true
		case x.Facts.Qualifier == kind.RMS:
			s.linear = true
		default:
			return s, false
		}
		s.of = append(s.of, x)
	}
	return s, s.power != s.linear
}

// underRoot is the form of what a claim takes the root of; nil where it is no
// root.
func (c *claim) underRoot() *lang.Form {
	call, ok := unparen(c.x).(*lang.Call)
	if !ok || call.Fn.Text != "sqrt" || len(call.Args) != 1 {
		return nil
	}
	return c.note.StatementForm(c.sym.Stmt, call.Args[0], lang.NamesStay)
}

// sourceIn gives the only amplitude of a term, or the only power, and its
// exponent.
func sourceIn(t lang.Term) (found *lang.Symbol, degree unit.Rat) {
	for _, f := range t.Factors {
		switch {
		case f.Facts.Complex || f.Key == "j":
			return nil, degree // a phasor, or a phase beside the amplitude
		case !isAmplitude(f.Facts) && !isPower(f.Facts):
		case found != nil || f.Symbol == nil || f.Symbol.Role != lang.RoleQuantity || f.Part != "" || f.Exp != unit.Whole(1) && f.Exp != two:
			return nil, degree
		default:
			found, degree = f.Symbol, f.Exp
		}
	}
	return found, degree
}

// oneFromAnother reports sources of which one follows from another: parts of
// one thing, no several sources.
func (c *claim) oneFromAnother(list []*lang.Symbol) bool {
	for _, a := range list {
		for _, b := range list {
			if a != b && dependsOn(c.note, a, b) {
				return true
			}
		}
	}
	return false
}

// coherenceOf is what a quantity says, or the amplitude that it is made of.
func coherenceOf(n *lang.Note, s *lang.Symbol, depth int) kind.Coherence {
	if s.Facts.Coherence != kind.AnyPhase || s.Input || s.Def == nil || depth == 0 {
		return s.Facts.Coherence
	}
	t, single := n.Normal(s, lang.NamesStay).Single()
	if !single {
		return kind.AnyPhase
	}
	if x, _ := sourceIn(t); x != nil {
		return coherenceOf(n, x, depth-1)
	}
	return kind.AnyPhase
}

// agreement tells whether sources have one frequency.
type agreement uint8

const (
	unsaid agreement = iota
	agree
	differ
)

// otherFrequencies compares the frequencies of the regimes in which the sources
// are defined.
func (c *claim) otherFrequencies(list []*lang.Symbol) agreement {
	first := 0.0
	same := agree
	for i, s := range list {
		word, at := c.note.Regime(s)
		if word != "harmonic" || hertz(at) == 0 {
			return unsaid
		}
		if f := hertz(at); i == 0 {
			first = f
		} else if math.Abs(f/first-1) > 1e-9 {
			same = differ
		}
	}
	return same
}

// isFieldSum reports a sum of scalar field strengths, or of power flux
// densities: of sources in one place.
func (c *claim) isFieldSum(s sources) bool {
	for _, x := range s.of {
		field := isOf(x.Facts, kind.ElectricFieldStrength) || x.Facts.Kind.Is(kind.MagneticFieldStrength) || x.Facts.Kind.Is(kind.MagneticFluxDensity)
		flux := isOf(x.Facts, kind.PowerFluxDensity)
		if !field && !flux || x.Facts.Shape != 0 || field && s.power {
			return false // squares of field strengths may be those of components
		}
	}
	return true
}

// inPhase tells what coherent sources would give in phase.
func (c *claim) inPhase(s sources) string {
	sum, squares := 0.0, 0.0
	for _, x := range s.of {
		v, ok := magnitude(x)
		if !ok {
			return ""
		}
		if isPower(x.Facts) {
			v = math.Sqrt(v)
		}
		sum += v
		squares += v * v
	}
	if squares == 0 {
		return ""
	}
	text := fmt.Sprintf(" In phase the power is %.2f times this sum", sum*sum/squares)
	if !isPower(c.sym.Facts) && isAmplitude(c.sym.Facts) {
		text = fmt.Sprintf(" In phase the value is %.2f times this one", sum/math.Sqrt(squares))
	}
	return text + ", in opposition it may vanish. Orthogonal components of one field add in quadrature whatever their phases: then write the vector, or leave `coherent` out."
}

func (c *claim) reportSources(p *check.Pass, s sources, severity lang.Severity, what, detail string) {
	var names []string
	var factors []lang.Factor
	for _, x := range s.of {
		names = append(names, x.Name)
		factors = append(factors, lang.Factor{Symbol: x})
	}
	c.report(p, lang.Fault{
		Severity: severity,
		Message:  fmt.Sprintf("%s %s (%s)", c.sym.Name, what, strings.Join(names, ", ")),
		Detail:   strings.TrimSpace(detail),
		Related: c.because(factors, func(x *lang.Symbol) string {
			if tied := coherenceOf(c.note, x, maxScalings); tied != kind.AnyPhase {
				return fmt.Sprintf("%s is %s", x.Name, tied)
			}
			return x.Name + " is one of the sources"
		}),
	})
}
