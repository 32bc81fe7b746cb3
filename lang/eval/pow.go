package eval

import (
	"math"
	"math/cmplx"
)

// Pow is a ^ b for numbers, and for a list with a number or a list. A negative
// base needs a whole exponent, or a complex type; zero needs an exponent that
// is not negative. 0^0 is 1.
func Pow(node int, a, b Code) (Code, error) {
	t, ok := elementwise(a.Type, b.Type)
	if !ok || t.Shape == Vector || t.Shape == Tensor {
		return Code{}, refuse("write `v·v` or `|v|^2` for the square of a vector", "cannot raise %s to the power of %s", a.Type, b.Type)
	}
	if k, isNum := b.number(); isNum && k == 1 {
		return a, nil
	}
	c := Code{Type: t, Any: func(f *Frame) Value { return powKernel.each(f, node, a.Any(f), b.Any(f)) }}
	if t.IsReal() {
		c.Real = realPow(node, a, b)
	}
	return build(c, a, b).derive(func(d *differ) (Code, error) { return d.power(node, a, b) }), nil
}

// realPow spares the general power for the exponents that notes are made of.
func realPow(node int, a, b Code) func(*Frame) float64 {
	x, y := a.Real, b.Real
	k, ok := b.number()
	switch {
	case ok && k == 2 && a.slot >= 0:
		i := a.slot
		return func(f *Frame) float64 { v := real(f.slots[i].x); return v * v }
	case ok && k == 2:
		return func(f *Frame) float64 { v := x(f); return v * v }
	case ok && k == 3:
		return func(f *Frame) float64 { v := x(f); return v * v * v }
	case ok && k == 4:
		return func(f *Frame) float64 { v := x(f); v *= v; return v * v }
	case ok:
		return func(f *Frame) float64 { return f.realPower(node, x(f), k) }
	}
	return func(f *Frame) float64 { return f.realPower(node, x(f), y(f)) }
}

// realPower is a^b with its faults.
func (f *Frame) realPower(node int, a, b float64) float64 {
	switch {
	case b == 2:
		return a * a
	case b == 3:
		return a * a * a
	case b == 4:
		a *= a
		return a * a
	case a == 0 && b < 0:
		f.fail(node, RuleDivision, "zero is raised to a negative power", "")
		return 0
	case a < 0 && b != math.Trunc(b) && !math.IsInf(b, 0):
		f.complexResult(node, number(a)+"^"+number(b))
		return 0
	case b == 0.5:
		return math.Sqrt(a)
	}
	return math.Pow(a, b)
}

// complexResult is the fault of a real function whose value is complex.
func (f *Frame) complexResult(node int, what string) {
	f.fail(node, RuleShape, what+" is a complex number where a real one is computed",
		"check the sign of the argument, or add `0*j` to it if the complex value is meant")
}

var powKernel = kernel2{
	re: func(f *Frame, node int, a, da, b, db float64) (float64, float64) {
		v := f.realPower(node, a, b)
		d := 0.0
		if da != 0 && b != 0 {
			d = b * math.Pow(a, b-1) * da
		}
		if db != 0 && v != 0 { // 0^b stays 0; a negative base has no slope here: NaN
			d += v * math.Log(a) * db
		}
		return v, d
	},
	cx: func(f *Frame, node int, a, da, b, db complex128) (complex128, complex128) {
		if a == 0 && real(b) < 0 {
			f.fail(node, RuleDivision, "zero is raised to a negative power", "")
			return 0, 0
		}
		v := cpow(a, b)
		var d complex128
		if da != 0 && b != 0 {
			d = b * cpow(a, b-1) * da
		}
		if db != 0 && a != 0 {
			d += v * cmplx.Log(a) * db
		}
		return v, d
	},
}

// cpow is the principal power; small whole exponents are multiplied out, which
// is exact where exp(b·ln a) is not.
func cpow(a, b complex128) complex128 {
	n := real(b)
	if imag(b) != 0 || n != math.Trunc(n) || math.Abs(n) > 64 {
		if b == 0.5 {
			return cmplx.Sqrt(a)
		}
		return cmplx.Pow(a, b)
	}
	r, p := complex128(1), a
	for k := int(math.Abs(n)); k > 0; k >>= 1 {
		if k&1 == 1 {
			r *= p
		}
		p *= p
	}
	if n < 0 {
		return 1 / r
	}
	return r
}

// power is a^(b-1)·b·a' + a^b·ln(a)·b'.
func (d *differ) power(node int, a, b Code) (Code, error) {
	return d.both(a, b, func(x, y Code) (Code, error) {
		sum := nullOf(Type{Complex: a.Type.Complex || b.Type.Complex})
		if !x.null {
			e, err := Sub(node, b, Num(1))
			if err != nil {
				return Code{}, err
			}
			p, err := Pow(node, a, e)
			if err != nil {
				return Code{}, err
			}
			sum = product(node, product(node, b, p), x)
		}
		if y.null {
			return sum, nil
		}
		l, err := Builtin("ln", node, []Code{a})
		if err != nil {
			return Code{}, err
		}
		p, err := Pow(node, a, b)
		if err != nil {
			return Code{}, err
		}
		return Add(node, sum, product(node, product(node, p, l), y))
	})
}
