package unit

import (
	"math"
	"strings"
)

// Choose returns the unit in which a value of si coherent SI units reads best:
// the given coherent unit with a prefix on its first symbol that gives 1 to
// 999, or the nearest to that where powers leave a gap (mm^2, m^2). The
// prefixes go in thousands; a kelvin, a plain number and a kilogram in a
// compound take none, a second, a radian or a kilogram alone none above 1. A
// zero or infinite value keeps the unit.
func Choose(coherent Unit, si float64) Unit {
	x := math.Abs(coherent.FromSI(si))
	first, power, rest := leading(coherent.Symbol)
	lo, hi := reach(first, rest)
	if lo == hi || power == 0 || x == 0 || math.IsInf(x, 0) || math.IsNaN(x) || !coherent.Coherent() {
		return coherent
	}
	best, off := 0, math.Inf(1)
	for exp := hi; exp >= lo; exp -= 3 {
		if d := outside(x, exp*power); d < off {
			best, off = exp, d
		}
	}
	return prefixed(coherent, first, rest, best)
}

// leading splits a phrase into its first symbol, the integer exponent of that
// (0 for one that takes no prefix) and the rest of the phrase.
func leading(phrase string) (first string, power int, rest string) {
	n := symbolLen(phrase)
	first, rest = phrase[:n], phrase[n:]
	p := parser{s: phrase, at: n}
	e, ok := p.exponent(0)
	if !ok {
		return first, 1, rest
	}
	power, ok = e.Int()
	if !ok || p.err != nil {
		return first, 0, rest
	}
	return first, power, rest
}

// reach gives the smallest and largest prefix, as powers of ten, that a first
// symbol takes; both 0 for none.
func reach(first, rest string) (lo, hi int) {
	switch {
	case first == "kg" && rest == "":
		return -30, 0
	case first == "" || first == "kg" || first == "K" || first == "°C":
		return 0, 0
	case (first == "s" || first == "rad" || first == "sr") && rest == "":
		return -30, 0
	}
	if r, at, ok := lookup(first); !ok || at >= 0 || r.prefix != anyPrefix && r.prefix&upKMG == 0 {
		return 0, 0
	}
	return -30, 30
}

// outside is the distance in decades of x/10^exp from the range in which four
// digits print as 1.000 to 999.9; x is positive.
func outside(x float64, exp int) float64 {
	lg := math.Log10(x) - float64(exp)
	const top = 2.9999782840 // lg 999.95
	switch {
	case lg < top-3:
		return top - 3 - lg
	case lg >= top:
		return lg - top + 1e-9
	}
	return 0
}

// prefixed returns the unit with the prefix of 10^exp on its first symbol.
func prefixed(u Unit, first, rest string, exp int) Unit {
	if first == "kg" {
		first, exp = "g", exp+3
	}
	symbol := prefixSymbol(exp)
	if symbol == "u" {
		symbol = "µ"
	}
	v, err := Parse(symbol + first + rest)
	if err != nil || !strings.HasSuffix(v.Symbol, rest) {
		return u
	}
	v.Dim = u.Dim
	return v
}

// prefixSymbol returns the prefix of 10^exp, "" for none.
func prefixSymbol(exp int) string {
	for _, p := range prefixes {
		if p.exp == exp {
			return p.symbol
		}
	}
	return ""
}
