package rules

import (
	"math"
	"math/big"
	"strings"

	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// This file tells whether the plain number of a term turns one statistic into
// another: √2, 1.414 and √(2/3) do, 1.1 and 1/√3 do not.

// scale is the plain number of a term.
type scale struct {
	value float64
	root2 bool // an odd power of √2 is written in it
}

// scaleOf multiplies the plain numbers of a term; ok is false where one of them
// stands under another root than a square root.
func scaleOf(t lang.Term) (scale, bool) {
	coef, _ := t.Coef.Float64()
	s := scale{value: math.Abs(coef) * math.Pow(math.Pi, float64(t.Pi))}
	for _, f := range t.Factors {
		r, is := rootOf(f)
		if !is {
			continue
		}
		if f.Exp.Den() > 2 {
			return s, false
		}
		twos, _ := splitTwos(r)
		s.root2 = s.root2 != (f.Exp.Den() == 2 && twos%2 != 0)
		x, _ := r.Float64()
		s.value *= math.Pow(x, float64(f.Exp.Num())/float64(f.Exp.Den()))
	}
	return s, true
}

// withoutCycles is the scale of a term with each 2π·f counted as one ω.
func withoutCycles(t lang.Term) (scale, bool) {
	s, ok := scaleOf(t)
	for _, f := range t.Factors {
		n, whole := f.Exp.Int()
		if isCycles(f) && whole && t.Pi != 0 && (t.Pi > 0) == (n > 0) {
			s.value /= math.Pow(2*math.Pi, float64(n))
		}
	}
	return s, ok
}

// rootOf reads a factor that is a number under a root, "#2/3".
func rootOf(f lang.Factor) (*big.Rat, bool) {
	text, is := strings.CutPrefix(f.Key, "#")
	if !is {
		return nil, false
	}
	return new(big.Rat).SetString(text)
}

// splitTwos takes the power of two out of a positive number.
func splitTwos(r *big.Rat) (twos int, odd *big.Rat) {
	odd = new(big.Rat).Set(r)
	two := big.NewRat(2, 1)
	for odd.Sign() > 0 && odd.Num().Bit(0) == 0 {
		odd.Quo(odd, two)
		twos++
	}
	for odd.Denom().Bit(0) == 0 {
		odd.Mul(odd, two)
		twos--
	}
	return twos, odd
}

// usual are the numbers that scale an amplitude without converting it:
// tolerances and overvoltages, halves and thirds, line and phase.
var usual = []float64{1, 1.05, 1.1, 1.15, 1.2, 1.25, 1.3, 1.5, 1.6, 2, 3, 4, 0.95, 0.9, 0.85, 0.8, 0.5, 0.25, 1. / 3, math.Sqrt(3), 1 / math.Sqrt(3), 1.05 / math.Sqrt(3), 1.1 / math.Sqrt(3)}

// isUsual reports a usual number, to within the digits that people write.
func isUsual(x, tolerance float64) bool {
	for _, u := range usual {
		if math.Abs(x/u-1) < tolerance {
			return true
		}
	}
	return false
}

// fits reports that the number may turn the one statistic into the other,
// besides scaling: √2 in exact form or in digits, a two for a swing.
func (s scale) fits(from, to kind.Qualifier) bool {
	num, den, ok := kind.Conversion(from, to)
	if !ok {
		return s.value != 1
	}
	if s.root2 {
		return true
	}
	factor := math.Sqrt(float64(num) / float64(den))
	switch {
	case num == 8 && s.value == 2, den == 8 && s.value == 0.5:
		return false // that is the crest, not the rms value
	case from == kind.PeakToPeak || to == kind.PeakToPeak:
		return factor > 1 && s.value > 1.45 || factor < 1 && s.value < 0.7
	case isUsual(s.value, 1e-3):
		return false
	}
	// 1.4 for √2 is 1 % off, and people write it.
	return isUsual(s.value/factor, 0.015) || !plainDecimal(s.value)
}

// plainDecimal reports a multiple of 1/20: with digits beyond, a number may
// hold a conversion and a scaling at once.
func plainDecimal(x float64) bool {
	n := x * 20
	return n >= 1 && math.Abs(n-math.Round(n)) < 1e-9
}
