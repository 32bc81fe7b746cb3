package rules

import (
	"fmt"
	"math"
	"math/cmplx"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// CrestFactorAssumed finds the √2 of a sinusoid beside quantities of another
// waveform.
func (Book) CrestFactorAssumed() check.Rule {
	return check.Rule{
		Name:     "crest-factor-assumed",
		Severity: lang.Caution,
		Title:    "The square root of 2 of a sinusoid converts a quantity of another waveform",
		Sees: "√2 or its digits between the peak and the rms value of a quantity that is declared square, triangular, pulsed, modulated, distorted, random, impulse or elliptical, or that is a multiple of such a quantity, in a definition, a quotient or a comparison; " +
			"and the crest of a vector phasor whose components are out of phase, made with √2 from its rms magnitude.",
		Silent: "For sinusoidal quantities and where no waveform is stated; with a crest factor of the quantity's own (kind crest factor, a ratio, a further factor such as 1 + m beside the √2); " +
			"for √3 with a triangle and no factor with a square wave; for the rms value of a vector phasor, which is |Ê|/√2 for every polarization.",
		Formula: "Crest over rms: √2 for one sinusoid, 1 for a square wave, √3 for a triangle, √2·(1 + m)/√(1 + m²/2) for a carrier with modulation m, 1/√D for pulses; for circular polarization |E(t)| is constant.",
		Remedy:  "State the crest factor: `k_c, crest factor = 1.8 per \"measurement\"`, and write `k_c*U`.",
		Source:  "Definitions of peak and rms value, IEC 60050-103 (from memory); the factors follow by integration",
		Wrong: check.Example{Note: `    E_c, modulated rms electric field strength = 11.5 V/m
    E_p, peak electric field strength = sqrt(2)*E_c = 16.3 V/m
`},
		Right: check.Example{Note: `    m = 0.80
    k_c, crest factor = sqrt(2)*(1 + m)/sqrt(1 + m^2/2) = 2.22
    E_c, modulated rms electric field strength = 11.5 V/m
    E_p, peak electric field strength = k_c*E_c = 25.5 V/m
`},
		Run: perSpot(crestAssumed),
	}
}

func crestAssumed(p *check.Pass, s *spot) {
	for _, c := range s.claims {
		if t, single := c.note.Normal(c.sym, unnamed).Single(); single && c.emfOf() == nil && (isAmplitude(c.sym.Facts) || c.sym.Facts.Dim.IsOne()) {
			crestIn(p, t, c.span(), c.sym.Facts.Waveform)
		}
	}
	lang.Walk(s.stmt.Tree, func(t lang.Tree) bool {
		r, ok := t.(*lang.Relation)
		if !ok {
			return true
		}
		for _, x := range r.Terms {
			if t, single := p.Note.StatementForm(s.stmt, x, unnamed).Single(); single {
				crestIn(p, t, s.stmt.Abs(x), kind.AnyWave)
			}
		}
		return false
	})
}

// crestIn cautions about an amplitude of another waveform with a √2 beside it.
// The waveform of the result counts where the amplitude has none.
func crestIn(p *check.Pass, t lang.Term, at lang.Span, result kind.Waveform) {
	for _, f := range t.Factors {
		if mayConvert(f) {
			return
		}
	}
	s, ok := scaleOf(t)
	if !ok {
		return
	}
	for _, f := range t.Factors {
		stat := statOf(p.Note, f)
		if !isAmplitude(f.Facts) || f.Symbol == nil || f.Exp != unit.Whole(1) && f.Exp != unit.Whole(-1) || stat != kind.Peak && stat != kind.RMS {
			continue
		}
		wave := waveOf(p.Note, f)
		if wave == kind.AnyWave {
			wave = result
		}
		if !justRoot2(s, wave) {
			continue
		}
		share, turning := turns(f)
		switch {
		case shaped(wave):
			reportCrest(p, at, f, wave, waveCrest(wave))
		case turning && stat == kind.RMS:
			reportCrest(p, at, f, kind.Elliptical, fmt.Sprintf("The components are out of phase: the crest is %.3g times the rms magnitude, not 1.41 times.", math.Sqrt2*share))
		default:
			continue
		}
		return
	}
}

// justRoot2 reports a number that is √2 or 1/√2; with an overvoltage or a
// three-phase factor too where the waveform is not modulated, since 1.2 beside
// the √2 of a carrier is its modulation. With any other factor the author has
// thought of a crest factor.
func justRoot2(s scale, w kind.Waveform) bool {
	for _, root := range []float64{math.Sqrt2, 1 / math.Sqrt2} {
		rest := s.value / root
		for _, beside := range []float64{1, 1.05, 1.1, 1.15, 1.2, 2, 0.5, math.Sqrt(3), 1 / math.Sqrt(3)} {
			if math.Abs(rest/beside-1) < 3e-3 && (beside == 1 || w != kind.Modulated) {
				return true
			}
		}
	}
	return false
}

// turns tells whether a complex vector changes its direction within a cycle,
// and what share of √2 times its rms magnitude the crest then is.
func turns(f lang.Factor) (share float64, turning bool) {
	s := f.Symbol
	if f.Facts.Shape != eval.Vector || !f.Facts.Complex || s == nil || !s.Result.Known || f.Part != "" {
		return 1, false
	}
	// |Re(E·e^{jφ})|² = (|E|² + |E·E|·cos 2φ)/2: its maximum over φ.
	var size float64
	var dot complex128
	for i := range s.Value.Len() {
		x := s.Value.At(i).C()
		size += real(x)*real(x) + imag(x)*imag(x)
		dot += x * x
	}
	if size == 0 {
		return 1, false
	}
	share = math.Sqrt((1 + cmplx.Abs(dot)/size) / 2)
	return share, share < 0.99
}

// waveCrest tells the crest factor of a waveform.
func waveCrest(w kind.Waveform) string {
	switch w {
	case kind.Square:
		return "For a square wave peak and rms value are equal."
	case kind.Triangular:
		return "For a triangle the peak is sqrt(3) times the rms value."
	case kind.Pulsed:
		return "For pulses of the duty ratio D the peak is 1/sqrt(D) times the rms value."
	case kind.Modulated:
		return "For a carrier with the modulation m the crest is sqrt(2)*(1 + m) times the rms value of the carrier, and sqrt(2)*(1 + m)/sqrt(1 + m^2/2) times that of the whole."
	case kind.Elliptical:
		return "The crest of a turning vector lies between 1 (circular) and sqrt(2) times its rms magnitude."
	case kind.Impulse:
		return "An impulse has no rms value that goes with its crest."
	case kind.Random:
		return "Noise has no crest, only a level that is seldom passed: 3 to 4 times the rms value is usual."
	}
	return "The crest follows from the phases of the components, or from a measurement."
}

func reportCrest(p *check.Pass, at lang.Span, f lang.Factor, w kind.Waveform, detail string) {
	name := f.Symbol.Name
	p.Report(lang.Fault{
		Span:    at,
		Message: fmt.Sprintf("the square root of 2 converts %s, and that is %s: it holds for one sinusoid", name, withArticle(w.String()+" quantity")),
		Detail:  detail + " State the crest factor as a quantity, `k_c, crest factor = …`, and convert with it.",
		Related: []lang.Related{{Path: f.Symbol.Path, Span: f.Symbol.Span, Message: name + " is defined here"}},
	})
}
