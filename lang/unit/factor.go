package unit

import (
	"math"
	"math/big"
	"math/bits"
	"strconv"
)

// Factor is the factor of a unit to the coherent SI unit of its dimension:
// an exact rational times a power of π (° = π/180 rad, Oe = 1000/(4π) A/m).
// The zero value is the factor 1.
type Factor struct {
	num, den int64    // num/den·10^exp; den 0 means 1/1, both > 0 otherwise
	exp      int      // decimal exponent
	pi       int      // power of π
	big      *big.Rat // replaces num/den where those would overflow
	rest     float64  // irrational remainder (ln10/20, roots); 0 means none

	// Measured is set where the factor rests on a measured constant (Da) or on
	// a correspondence that is conventional since 2019 (statC, statV).
	Measured bool
}

// maxBig bounds the size of an exact factor in bits, so that a hostile phrase
// cannot make numbers grow; beyond it a factor is a float64.
const maxBig = 4096

// ratio returns num/den·10^exp; num and den must be positive.
func ratio(num, den int64, exp int) Factor { return Factor{num: num, den: den, exp: exp} }

// Exact reports whether Rational times a power of π is the whole factor.
func (f Factor) Exact() bool { return f.rest == 0 }

// Pi is the power of π in the factor.
func (f Factor) Pi() int { return f.pi }

// Rational returns the rational part of the factor, without π; nil where the
// factor is not Exact.
func (f Factor) Rational() *big.Rat {
	if f.rest != 0 {
		return nil
	}
	r := new(big.Rat).Set(f.mantissa())
	if f.exp == 0 {
		return r
	}
	p := new(big.Int).Exp(big.NewInt(10), big.NewInt(int64(abs(f.exp))), nil)
	if f.exp > 0 {
		return r.Mul(r, new(big.Rat).SetInt(p))
	}
	return r.Quo(r, new(big.Rat).SetInt(p))
}

func abs(n int) int {
	if n < 0 {
		return -n
	}
	return n
}

// mantissa is the factor without exp, π and rest. The caller must not change it.
func (f Factor) mantissa() *big.Rat {
	switch {
	case f.big != nil:
		return f.big
	case f.den == 0:
		return big.NewRat(1, 1)
	}
	return big.NewRat(f.num, f.den)
}

// Mul returns the factor of a product of units.
func (f Factor) Mul(g Factor) Factor { return f.combine(g, 1) }

// Div returns the factor of a quotient of units.
func (f Factor) Div(g Factor) Factor { return f.combine(g, -1) }

// combine returns f·g^sign.
func (f Factor) combine(g Factor, sign int) Factor {
	h := Factor{exp: f.exp + sign*g.exp, pi: f.pi + sign*g.pi, Measured: f.Measured || g.Measured}
	h.rest = combineRest(f.rest, g.rest, sign)
	if f.big == nil && g.big == nil {
		if num, den, ok := small(f, g, sign); ok {
			h.num, h.den = num, den
			return h
		}
	}
	q := new(big.Rat)
	if sign > 0 {
		q.Mul(f.mantissa(), g.mantissa())
	} else {
		q.Quo(f.mantissa(), g.mantissa())
	}
	return h.withBig(q)
}

// withBig sets the mantissa, as a float64 where it has grown too large.
func (f Factor) withBig(q *big.Rat) Factor {
	if q.Num().BitLen()+q.Denom().BitLen() <= maxBig {
		f.big = q
		return f
	}
	x, _ := q.Float64()
	f.rest = combineRest(f.rest, irrational(x), 1)
	return f
}

// irrational guards a remainder: one that has left the range of float64 is NaN,
// never the 0 that stands for none.
func irrational(x float64) float64 {
	if x == 0 || math.IsInf(x, 0) {
		return math.NaN()
	}
	return x
}

// combineRest multiplies irrational remainders, where 0 stands for none.
func combineRest(a, b float64, sign int) float64 {
	if b == 0 {
		return a
	}
	if a == 0 {
		a = 1
	}
	if sign < 0 {
		return irrational(a / b)
	}
	return irrational(a * b)
}

// small multiplies the mantissas in 64 bits, if that is possible.
func small(f, g Factor, sign int) (num, den int64, ok bool) {
	fn, fd, gn, gd := f.num, f.den, g.num, g.den
	if fd == 0 {
		fn, fd = 1, 1
	}
	if gd == 0 {
		gn, gd = 1, 1
	}
	if sign < 0 {
		gn, gd = gd, gn
	}
	if a := gcd(fn, gd); a > 1 {
		fn, gd = fn/a, gd/a
	}
	if a := gcd(gn, fd); a > 1 {
		gn, fd = gn/a, fd/a
	}
	n, okN := product64(fn, gn)
	d, okD := product64(fd, gd)
	return n, d, okN && okD
}

// product64 multiplies two positive numbers, if the product fits.
func product64(a, b int64) (int64, bool) {
	hi, lo := bits.Mul64(uint64(a), uint64(b))
	return int64(lo), hi == 0 && lo <= math.MaxInt64
}

// Pow returns f^p. A root that is not rational makes the factor inexact.
func (f Factor) Pow(p Rat) Factor {
	n, whole := p.Int()
	if f.isOne() || p.IsZero() {
		return Factor{Measured: f.Measured}
	}
	if !whole {
		return Factor{rest: irrational(math.Pow(f.Float64(), p.Float64())), Measured: f.Measured}
	}
	out := Factor{}
	for range abs(n) {
		out = out.combine(f, n/abs(n))
	}
	return out
}

func (f Factor) isOne() bool {
	return f.exp == 0 && f.pi == 0 && f.big == nil && f.rest == 0 && f.num == f.den
}

// Float64 returns the factor as a float64, within two units of the last place.
func (f Factor) Float64() float64 {
	mul, div := f.split()
	return mul / div
}

// split returns mul and div with the factor = mul/div, chosen so that decimal
// factors stay exact: for mm it is 1/1000, and 7 mm is 7/1000 correctly
// rounded, which 7·0.001 is not.
func (f Factor) split() (mul, div float64) {
	mul, div = 1, 1
	if abs(f.exp) > 22 && f.big == nil && f.den <= 1 && f.pi == 0 && f.rest == 0 {
		return f.farDecimal(), 1
	}
	switch {
	case f.big != nil:
		mul, div = splitBig(f.big)
	case f.den != 0:
		mul, div = float64(f.num), float64(f.den)
	}
	if f.exp > 0 {
		mul *= pow10(f.exp)
	} else if f.exp < 0 {
		div *= pow10(-f.exp)
	}
	if f.pi > 0 {
		mul *= math.Pow(math.Pi, float64(f.pi))
	} else if f.pi < 0 {
		div *= math.Pow(math.Pi, float64(-f.pi))
	}
	if f.rest != 0 {
		mul *= f.rest
	}
	return mul, div
}

// farDecimal is a decimal factor beyond the powers of ten that float64 holds
// exactly, correctly rounded.
func (f Factor) farDecimal() float64 {
	buf := strconv.AppendInt(make([]byte, 0, 32), max(f.num, 1), 10)
	buf = strconv.AppendInt(append(buf, 'e'), int64(f.exp), 10)
	x, _ := strconv.ParseFloat(string(buf), 64)
	return x
}

// splitBig gives numerator and denominator as floats, or the quotient over 1
// where one of them is outside the range in which floats are reliable.
func splitBig(q *big.Rat) (mul, div float64) {
	if q.Num().BitLen() > 512 || q.Denom().BitLen() > 512 {
		x, _ := q.Float64()
		return x, 1
	}
	mul, _ = new(big.Float).SetInt(q.Num()).Float64()
	div, _ = new(big.Float).SetInt(q.Denom()).Float64()
	return mul, div
}

// pow10 returns 10^n, n ≥ 0, exactly up to 10^22.
func pow10(n int) float64 { return math.Pow10(n) }

// String prints the factor: `0.0254`, `π/180`, `1000/(4·π)`, `1e-28`.
func (f Factor) String() string {
	r := f.Rational()
	if r == nil {
		return strconv.FormatFloat(f.Float64(), 'g', 10, 64)
	}
	if f.pi == 0 {
		return decimal(r)
	}
	return f.withPi(r)
}

// withPi prints r·π^pi as a fraction.
func (f Factor) withPi(r *big.Rat) string {
	pi := power("π", Whole(abs(f.pi)))
	num, den := r.Num().String(), r.Denom().String()
	switch {
	case f.pi > 0 && num == "1":
		num = pi
	case f.pi > 0:
		num += "·" + pi
	case den == "1":
		den = pi
	default:
		den = "(" + den + "·" + pi + ")"
	}
	if den == "1" {
		return num
	}
	return num + "/" + den
}

// decimal prints a rational as a finite decimal where it has one of up to 20
// significant digits, else as a fraction.
func decimal(r *big.Rat) string {
	if x, exact := r.Float64(); exact || shortest(r, x) {
		return strconv.FormatFloat(x, 'g', -1, 64)
	}
	if n, exact := r.FloatPrec(); exact && n <= 40 {
		return r.FloatString(n)
	}
	return r.Num().String() + "/" + r.Denom().String()
}

// shortest reports whether the shortest decimal of x is r itself.
func shortest(r *big.Rat, x float64) bool {
	s, ok := new(big.Rat).SetString(strconv.FormatFloat(x, 'g', -1, 64))
	return ok && s.Cmp(r) == 0
}
