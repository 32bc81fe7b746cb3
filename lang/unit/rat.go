package unit

import (
	"math"
	"strconv"
)

// Rat is a small exact rational exponent in lowest terms; the zero value is 0
// and Rats compare with ==. An operation whose result does not fit 32 bits
// gives the one invalid Rat, which absorbs every further operation: nothing
// panics and nothing wraps round. See Valid.
type Rat struct{ num, den1 int32 } // num/(den1+1); den1 == -1 is the invalid Rat

var invalidRat = Rat{0, -1}

// NewRat returns n/d in lowest terms; the invalid Rat where d is 0 or the
// result does not fit.
func NewRat(n, d int64) Rat {
	if d == 0 || n == math.MinInt64 || d == math.MinInt64 {
		return invalidRat
	}
	if d < 0 {
		n, d = -n, -d
	}
	if g := gcd(n, d); g > 1 {
		n, d = n/g, d/g
	}
	if n > math.MaxInt32 || n < -math.MaxInt32 || d > math.MaxInt32 {
		return invalidRat
	}
	return Rat{int32(n), int32(d - 1)}
}

// Whole returns the Rat n.
func Whole(n int) Rat { return NewRat(int64(n), 1) }

// gcd is the greatest common divisor of |a| and |b|; 0 only for gcd(0, 0).
func gcd(a, b int64) int64 {
	for b != 0 {
		a, b = b, a%b
	}
	if a < 0 {
		return -a
	}
	return a
}

// Valid reports whether no operation that led to r overflowed.
func (r Rat) Valid() bool { return r.den1 >= 0 }

// Num and Den are numerator and denominator in lowest terms, Den > 0. The
// invalid Rat is 0/0.
func (r Rat) Num() int64 { return int64(r.num) }

// Den is the denominator, see Num.
func (r Rat) Den() int64 { return int64(r.den1) + 1 }

// Add returns r + s.
func (r Rat) Add(s Rat) Rat {
	if r.den1 == 0 && s.den1 == 0 {
		return NewRat(int64(r.num)+int64(s.num), 1)
	}
	a, ok := addCross(r, s)
	if !ok {
		return invalidRat
	}
	return NewRat(a, r.Den()*s.Den())
}

// addCross is the numerator of r + s over the product of the denominators.
// Each product is below 2^62, so that the sum fits 64 bits.
func addCross(r, s Rat) (int64, bool) {
	if !r.Valid() || !s.Valid() {
		return 0, false
	}
	return r.Num()*s.Den() + s.Num()*r.Den(), true
}

// Sub returns r − s.
func (r Rat) Sub(s Rat) Rat { return r.Add(s.Neg()) }

// Neg returns −r.
func (r Rat) Neg() Rat { return Rat{-r.num, r.den1} }

// Mul returns r·s.
func (r Rat) Mul(s Rat) Rat {
	if !r.Valid() || !s.Valid() {
		return invalidRat
	}
	return NewRat(r.Num()*s.Num(), r.Den()*s.Den())
}

// Sign is −1, 0 or +1; 0 for the invalid Rat.
func (r Rat) Sign() int {
	switch {
	case r.num > 0:
		return 1
	case r.num < 0:
		return -1
	}
	return 0
}

// IsZero reports r == 0; the invalid Rat is not zero.
func (r Rat) IsZero() bool { return r == Rat{} }

// Int returns r as an integer, if it is one.
func (r Rat) Int() (int, bool) { return int(r.num), r.den1 == 0 }

// Float64 returns the nearest float64; NaN for the invalid Rat.
func (r Rat) Float64() float64 { return float64(r.num) / float64(r.Den()) }

// String prints "2", "-1" or "1/2"; "?" for the invalid Rat.
func (r Rat) String() string {
	if !r.Valid() {
		return "?"
	}
	s := strconv.Itoa(int(r.num))
	if r.den1 != 0 {
		s += "/" + strconv.FormatInt(r.Den(), 10)
	}
	return s
}
