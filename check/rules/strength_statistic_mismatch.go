package rules

import (
	"fmt"
	"math"
	"math/big"
	"slices"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// StrengthStatisticMismatch finds stresses that are held against strengths of
// another statistic or another class of voltage.
func (Book) StrengthStatisticMismatch() check.Rule {
	return check.Rule{
		Name:     "strength-statistic-mismatch",
		Severity: lang.Error,
		Title:    "A stress is held against a strength of another statistic or of another class of voltage",
		Sees: "A comparison or a quotient of a field strength or a voltage and a strength (dielectric strength, withstand, breakdown or inception voltage, inception field strength) where the one is an rms and the other a peak value, " +
			"the one alternating and the other static, or the one an impulse level and the other no impulse. " +
			"A caution, in a harmonic note, where only one of the two says its statistic, where a crest is held against an impulse level without saying that it is an impulse, and above 800 Hz where an rms strength does not say its frequencies.",
		Silent: "After a conversion (√2, its digits, a factor of its own); for levels of one class; for a static stress and a crest strength, since a gas breaks down at the crest; for rms stress and rms strength, which a thermal breakdown follows.",
		Formula: "Breakdown of a gas and partial discharge follow the crest, û = √2·U; the ac test voltage is the crest over √2. " +
			"Static, impulse and high-frequency strengths are material data of their own (space charge, time lag, heating).",
		Remedy: "Convert the stress to the crest, and take the strength for that class of voltage.",
		Source: "IEC 60060-1 (value of an alternating test voltage: crest over √2; from memory); IEC 60243-1 and ASTM D149 (power-frequency strength; from memory)",
		Wrong: check.Example{Note: `    medium oil: linear, isotropic, homogeneous
        E_bd, peak dielectric strength = 3.6 kV/mm
    U, rms voltage = 12 kV
    d = 4 mm
    E, rms electric field strength = U/d = 3.0 kV/mm
    criterion E < oil.E_bd
`},
		Right: check.Example{Note: `    medium oil: linear, isotropic, homogeneous
        E_bd, peak dielectric strength = 3.6 kV/mm
    U, rms voltage = 9 kV
    d = 4 mm
    E, peak electric field strength = sqrt(2)*U/d = 3.18 kV/mm
    criterion E < oil.E_bd
`},
		Run: perSpot(strengthMismatch),
	}
}

func strengthMismatch(p *check.Pass, s *spot) {
	lang.Walk(s.stmt.Tree, func(t lang.Tree) bool {
		r, ok := t.(*lang.Relation)
		if !ok {
			return true
		}
		for i := range r.Ops {
			x := p.Note.StatementForm(s.stmt, r.Terms[i], lang.UpToDeclared)
			y := p.Note.StatementForm(s.stmt, r.Terms[i+1], lang.UpToDeclared)
			if m, ok := marginOf(x, y); ok {
				m.report(p, s.stmt, s.stmt.Abs(r))
			}
			for j, z := range []*lang.Form{x, y} {
				t, single := z.Single()
				if m, ok := marginIn(t); single && ok {
					m.report(p, s.stmt, s.stmt.Abs(r.Terms[i+j]))
				}
			}
		}
		return false
	})
	for _, c := range s.claims {
		if t, single := p.Note.Normal(c.sym, lang.UpToDeclared).Single(); single && c.sym.Facts.Dim.IsOne() {
			if m, ok := marginIn(t); ok {
				m.report(p, s.stmt, c.span())
			}
		}
	}
}

// margin is a stress and the strength that it is held against.
type margin struct {
	stress, strength lang.Factor
	number           scale
	convertible      bool // a factor beside them may convert
}

// strengthKinds are the kinds of strengths; read only.
var strengthKinds = []kind.ID{kind.DielectricStrength, kind.WithstandVoltage, kind.BreakdownVoltage, kind.InceptionVoltage, kind.InceptionFieldStrength}

func isStrength(f lang.Facts) bool {
	return slices.ContainsFunc(strengthKinds, f.Kind.Is)
}

// marginOf joins the two sides of a comparison.
func marginOf(x, y *lang.Form) (margin, bool) {
	a, one := x.Single()
	b, other := y.Single()
	electric := func(f lang.Factor) bool { return isElectricAmplitude(f.Facts) }
	if !one || !other || b.Coef.Sign() == 0 || !slices.ContainsFunc(a.Factors, electric) || !slices.ContainsFunc(b.Factors, electric) {
		return margin{}, false
	}
	t := lang.Term{Coef: new(big.Rat).Quo(a.Coef, b.Coef), Pi: a.Pi - b.Pi, Factors: slices.Clone(a.Factors)}
	for _, f := range b.Factors {
		f.Exp = f.Exp.Neg()
		t.Factors = append(t.Factors, f)
	}
	return marginIn(t)
}

// marginIn finds a strength over a stress, or the reverse, in a term.
func marginIn(t lang.Term) (m margin, ok bool) {
	if t.Coef == nil {
		return m, false
	}
	strengths, stresses := 0, 0
	for _, f := range t.Factors {
		switch {
		case !isElectricAmplitude(f.Facts):
			m.convertible = m.convertible || mayConvert(f)
		case isStrength(f.Facts):
			m.strength = f
			strengths++
		default:
			m.stress = f
			stresses++
		}
	}
	one := unit.Whole(1)
	if strengths != 1 || stresses != 1 || m.stress.Symbol == nil || m.strength.Symbol == nil || m.stress.Exp != m.strength.Exp.Neg() || m.stress.Exp != one && m.stress.Exp != one.Neg() {
		return m, false
	}
	m.number, ok = scaleOf(t)
	return m, ok
}

// isElectricAmplitude reports a voltage or an electric field strength.
func isElectricAmplitude(f lang.Facts) bool {
	return isAmplitude(f) && (isOf(f, kind.Voltage) || isOf(f, kind.ElectricFieldStrength))
}

// report says what does not go together, if anything.
func (m margin) report(p *check.Pass, s *lang.Stmt, at lang.Span) {
	severity, message, detail := m.judge(p, s)
	if message == "" {
		return
	}
	f := lang.Fault{Severity: severity, Span: at, Message: message, Detail: detail}
	for _, x := range []lang.Factor{m.stress, m.strength} {
		if sym := x.Symbol; sym.Stmt != nil {
			f.Related = append(f.Related, lang.Related{Path: sym.Path, Span: sym.Span, Message: fmt.Sprintf("%s is %s", sym.Name, levelWords(p.Note, x))})
		}
	}
	p.Report(f)
}

// levelWords tells what a stress or a strength says of itself.
func levelWords(n *lang.Note, f lang.Factor) string {
	wave, stat := waveOf(n, f), statOf(n, f)
	switch {
	case wave == kind.Impulse:
		return "an impulse level"
	case stat == kind.Unqualified:
		return "of a statistic that is not stated"
	}
	return article(stat) + " value"
}

// judge tells what is wrong; "" for nothing.
func (m margin) judge(p *check.Pass, s *lang.Stmt) (severity lang.Severity, message, detail string) {
	n := p.Note
	stress, strength := statOf(n, m.stress), statOf(n, m.strength)
	word, at := n.RegimeAt(s)
	impulse := waveOf(n, m.strength) == kind.Impulse
	surge := waveOf(n, m.stress) == kind.Impulse
	names := fmt.Sprintf("%s (%s) is held against %s (%s)", m.stress.Symbol.Name, levelWords(n, m.stress), m.strength.Symbol.Name, levelWords(n, m.strength))
	switch {
	case m.convertible:
		return 0, "", ""
	case impulse != surge:
		return m.judgeImpulse(p, impulse, word, names)
	case impulse:
		return 0, "", ""
	case !known(stress, strength):
		if word != "harmonic" || stress == strength || stress == kind.Static || strength == kind.Static || m.stress.Facts.Complex {
			return 0, "", ""
		}
		return p.Lowered(), names, "Say at its definition whether it is a peak or an rms value; between the two lies a factor of 1.41."
	case stress == kind.RMS && strength == kind.Static, stress == kind.Static && strength == kind.RMS:
		return p.Rule.Severity, names, "The strength at direct voltage and that at alternating voltage are data of their own. Take the strength for this class of voltage."
	case crest(stress, strength) && !m.converted(stress, strength):
		return p.Rule.Severity, names, crestDetail(stress)
	case strength == kind.RMS && word == "harmonic" && highFrequency(at) && !saysFrequency(m.strength.Symbol):
		return p.Lowered(), fmt.Sprintf("%s is an rms strength that does not say its frequencies, and the note is at %.3g kHz", m.strength.Symbol.Name, hertz(at)/1e3),
			fmt.Sprintf("Strengths are measured at power frequency; heating lowers them above about 800 Hz. Write the range, `%s, … for f from 48 Hz to 62 Hz`.", m.strength.Symbol.Name)
	}
	return 0, "", ""
}

// judgeImpulse judges a pair of which only one is an impulse level.
func (m margin) judgeImpulse(p *check.Pass, strength bool, regime, names string) (lang.Severity, string, string) {
	other := m.stress
	if !strength {
		other = m.strength
	}
	detail := "An impulse level holds for a surge of microseconds. Take the strength for the class of voltage of the stress."
	stat, wave := statOf(p.Note, other), waveOf(p.Note, other)
	switch {
	case stat == kind.RMS || stat == kind.Static || wave == kind.Sinusoidal || strength && regime == "harmonic" && stat == kind.Peak:
		return p.Rule.Severity, names, detail
	case strength && stat == kind.Peak:
		return p.Lowered(), names, detail + fmt.Sprintf(" If %s is an impulse, write `%s, impulse …`.", other.Symbol.Name, other.Symbol.Name)
	}
	return 0, "", ""
}

// converted reports a √2 between the two, in exact form or in digits.
func (m margin) converted(a, b kind.Qualifier) bool {
	inverse := scale{1 / m.number.value, m.number.root2}
	return (m.number.fits(a, b) || m.number.fits(b, a)) && (inverse.fits(a, b) || inverse.fits(b, a))
}

func crestDetail(stress kind.Qualifier) string {
	if stress == kind.RMS {
		return "The crest is 1.41 times the rms value of a sinusoid: the margin is 1.41 times too large. Write the stress as a peak value, `sqrt(2)*…`."
	}
	return "The strength in crest values is 1.41 times its rms value: the margin is 1.41 times too small. Convert the strength, `sqrt(2)*…`."
}

// highFrequency reports a frequency above the range of power-frequency tests,
// 800 Hz (ASTM D149, scope; from memory).
func highFrequency(at *lang.Symbol) bool { return hertz(at) > 800 }

// hertz is the frequency of a regime; 0 where it has none.
func hertz(at *lang.Symbol) float64 {
	if at == nil || !at.Result.Known {
		return 0
	}
	if at.Facts.Dim[unit.Cycle].Sign() > 0 {
		return at.Value.Re()
	}
	return at.Value.Re() / (2 * math.Pi)
}

// saysFrequency reports a range of frequencies at a definition.
func saysFrequency(s *lang.Symbol) bool {
	return slices.ContainsFunc(s.Valid, func(v lang.Validity) bool {
		return v.Unit.Dim[unit.Time].Sign() < 0
	})
}
