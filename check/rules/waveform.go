package rules

import (
	"math/big"

	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file tells the waveform of a quantity: the one that is declared, or that
// of the amplitude which it is a multiple of.

// shaped reports a waveform for which the factors of a sinusoid do not hold.
func shaped(w kind.Waveform) bool { return w != kind.AnyWave && w != kind.Sinusoidal }

// waveOf is the waveform of a factor; AnyWave where the note does not say it.
func waveOf(n *lang.Note, f lang.Factor) kind.Waveform {
	for range maxScalings {
		s := f.Symbol
		if f.Facts.Waveform != kind.AnyWave || s == nil || s.Def == nil || s.Input {
			return f.Facts.Waveform
		}
		next, ok := scaledFrom(n.Normal(s, lang.UpToDeclared))
		if !ok {
			return kind.AnyWave
		}
		f = next
	}
	return kind.AnyWave
}

// maxScalings bounds how many definitions a waveform is followed through.
const maxScalings = 16

// scaledFrom gives the only amplitude of a term that is a multiple of it.
func scaledFrom(form *lang.Form) (found lang.Factor, ok bool) {
	t, single := form.Single()
	if !single {
		return found, false
	}
	for _, f := range t.Factors {
		switch {
		case roleOf(f.Facts) == roleFrequency:
			return found, false // a derivative or an integral has another waveform
		case !isAmplitude(f.Facts):
		case ok || f.Exp != unit.Whole(1) || opaqueFactor(f):
			return found, false
		default:
			found, ok = f, true
		}
	}
	return found, ok
}

// waves gives the waveform of the amplitudes of a square, and false where they
// have several.
func (q *square) waves(n *lang.Note) (kind.Waveform, bool) {
	common := kind.AnyWave
	for _, f := range q.amplitudes {
		w := waveOf(n, f)
		if w == kind.AnyWave || w == common {
			continue
		}
		if common != kind.AnyWave {
			return common, false
		}
		common = w
	}
	return common, true
}

// coefficient is that of table 1.4 for the square's statistic and a result,
// with the crest factor of the waveform in place of √2; ok is false where the
// table or the waveform does not tell it.
func (q *square) coefficient(n *lang.Note, form kind.Form, to kind.Qualifier) (*big.Rat, bool) {
	num, den, ok := kind.Coefficient(form, q.stat, to)
	if !ok {
		return nil, false
	}
	right := big.NewRat(int64(num), int64(den))
	wave, one := q.waves(n)
	if !shaped(wave) || q.stat == to || q.stat == kind.RMS && to == kind.Average {
		return right, one || q.stat == to
	}
	crest, told := wave.Crest()
	if !told || !one {
		return nil, false
	}
	if q.stat == kind.Peak {
		return right.Mul(right, big.NewRat(2, int64(crest))), true
	}
	return right.Mul(right, big.NewRat(int64(crest), 2)), true
}
