package eval

import (
	"math"
	"math/cmplx"
)

// call1 is a builtin of one argument on code that is known to suit it.
func call1(name string, n int, a Code) Code {
	c, err := Builtin(name, n, []Code{a})
	if err != nil {
		return nullOf(a.Type)
	}
	return c
}

// onePlus is 1 + s·y².
func onePlus(n int, s float64, y Code) (Code, error) {
	return Add(n, Num(1), product(n, Num(s), product(n, y, y)))
}

// overRoot is s/sqrt(c + k·x²), the derivative of the inverse functions.
func overRoot(n int, s, k float64, x Code) (Code, error) {
	r, err := onePlus(n, k, x)
	if err != nil {
		return Code{}, err
	}
	return Div(n, Num(s), call1("sqrt", n, r))
}

func circular() map[string]unary {
	one := func(z complex128) complex128 { return cmplx.Sqrt(1 - z*z) }
	return map[string]unary{
		"sin": {re: math.Sin, slope: func(x, _ float64) float64 { return math.Cos(x) },
			cx: cmplx.Sin, cslope: func(z, _ complex128) complex128 { return cmplx.Cos(z) },
			diff: func(n int, x, _ Code) (Code, error) { return call1("cos", n, x), nil }, takes: TakesAngle, doc: "sine"},
		"cos": {re: math.Cos, slope: func(x, _ float64) float64 { return -math.Sin(x) },
			cx: cmplx.Cos, cslope: func(z, _ complex128) complex128 { return -cmplx.Sin(z) },
			diff: func(n int, x, _ Code) (Code, error) { return Neg(n, call1("sin", n, x)), nil }, takes: TakesAngle, doc: "cosine"},
		"tan": {re: math.Tan, slope: func(_, y float64) float64 { return 1 + y*y },
			cx: cmplx.Tan, cslope: func(_, w complex128) complex128 { return 1 + w*w },
			diff: func(n int, _, y Code) (Code, error) { return onePlus(n, 1, y) }, takes: TakesAngle, doc: "tangent"},
		"asin": {re: math.Asin, slope: func(x, _ float64) float64 { return 1 / math.Sqrt((1-x)*(1+x)) }, outside: beyondOne,
			cx: cmplx.Asin, cslope: func(z, _ complex128) complex128 { return 1 / one(z) },
			diff: func(n int, x, _ Code) (Code, error) { return overRoot(n, 1, -1, x) }, gives: GivesAngle, doc: "inverse sine, from -pi/2 to pi/2"},
		"acos": {re: math.Acos, slope: func(x, _ float64) float64 { return -1 / math.Sqrt((1-x)*(1+x)) }, outside: beyondOne,
			cx: cmplx.Acos, cslope: func(z, _ complex128) complex128 { return -1 / one(z) },
			diff: func(n int, x, _ Code) (Code, error) { return overRoot(n, -1, -1, x) }, gives: GivesAngle, doc: "inverse cosine, from 0 to pi"},
		"atan": {re: math.Atan, slope: func(x, _ float64) float64 { return 1 / (1 + x*x) },
			cx: cmplx.Atan, cslope: func(z, _ complex128) complex128 { return 1 / (1 + z*z) },
			diff: atanDiff, gives: GivesAngle, doc: "inverse tangent, from -pi/2 to pi/2"},
		"sinh": {re: math.Sinh, slope: func(x, _ float64) float64 { return math.Cosh(x) },
			cx: cmplx.Sinh, cslope: func(z, _ complex128) complex128 { return cmplx.Cosh(z) },
			diff: func(n int, x, _ Code) (Code, error) { return call1("cosh", n, x), nil }, doc: "hyperbolic sine"},
		"cosh": {re: math.Cosh, slope: func(x, _ float64) float64 { return math.Sinh(x) },
			cx: cmplx.Cosh, cslope: func(z, _ complex128) complex128 { return cmplx.Sinh(z) },
			diff: func(n int, x, _ Code) (Code, error) { return call1("sinh", n, x), nil }, doc: "hyperbolic cosine"},
		"tanh": {re: math.Tanh, slope: func(_, y float64) float64 { return (1 - y) * (1 + y) },
			cx: tanhC, cslope: func(_, w complex128) complex128 { return 1 - w*w },
			diff: func(n int, _, y Code) (Code, error) { return onePlus(n, -1, y) }, doc: "hyperbolic tangent"},
	}
}

func atanDiff(n int, x, _ Code) (Code, error) {
	r, err := onePlus(n, 1, x)
	if err != nil {
		return Code{}, err
	}
	return Div(n, Num(1), r)
}

// tanhC does not overflow for a large real part, which a propagation constant
// times a long line has: cmplx.Tanh divides infinities there.
func tanhC(z complex128) complex128 {
	if r := real(z); math.Abs(r) > 20 {
		// tanh z = s(1 - 2q/(1+q)), q = exp(-2 s z); q < 1e-17
		return complex(math.Copysign(1, r), 0)
	}
	return cmplx.Tanh(z)
}
