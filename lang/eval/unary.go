package eval

import (
	"math"
	"math/cmplx"
)

// unary is a function of one number, real and, where it has one, complex.
type unary struct {
	re func(x float64) float64
	// slope is the derivative at x, y being the value there.
	slope func(x, y float64) float64
	// outside is why x has no real value: "pole", "complex", or "".
	outside func(x float64) string
	cx      func(z complex128) complex128
	cslope  func(z, w complex128) complex128
	// diff builds the derivative; y is the code of the value.
	diff  func(n int, x, y Code) (Code, error)
	takes Takes
	gives Gives
	doc   string

	name string
	kern kernel1
}

func (u *unary) signature() Signature {
	t, g := u.takes, u.gives
	if t == 0 {
		t = TakesNumber
	}
	if g == 0 {
		g = GivesNumber
	}
	return Signature{Name: u.name, Min: 1, Max: 1, Params: []string{"x"}, Takes: []Takes{t}, Gives: g, Doc: u.doc}
}

// makeUnary builds the call of a function of one number, element by element on
// a list.
func makeUnary(name string, node int, args []Code) (Code, error) {
	return unaries[name].call(node, args[0])
}

func (u *unary) call(node int, a Code) (Code, error) {
	if a.Type.Shape == Vector || a.Type.Shape == Tensor {
		return Code{}, refuse("", "%s takes a number or a list, not %s", u.name, a.Type)
	}
	if a.Type.Complex && u.cx == nil {
		return Code{}, refuse("take `Re`, `Im` or `|…|` of it first", "%s takes real numbers, not %s", u.name, a.Type)
	}
	x := a.Any
	c := Code{Type: a.Type, Any: func(f *Frame) Value { return u.kern.each(f, node, x(f)) }}
	if a.Real != nil {
		c.Real = u.fast(node, a.Real)
	}
	return build(c, a).derive(func(d *differ) (Code, error) { return d.unary(u, node, a) }), nil
}

func (u *unary) fast(node int, r func(*Frame) float64) func(*Frame) float64 {
	re, outside := u.re, u.outside
	if outside == nil {
		return func(f *Frame) float64 { return re(r(f)) }
	}
	return func(f *Frame) float64 {
		x := r(f)
		if why := outside(x); why != "" {
			f.outside(node, u.name, x, why)
			return 0
		}
		return re(x)
	}
}

func (f *Frame) outside(node int, name string, x float64, why string) {
	call := name + "(" + number(x) + ")"
	if why == "pole" {
		f.fail(node, RuleDivision, call+" is infinite", "keep the argument away from this value")
		return
	}
	f.complexResult(node, call)
}

func (u *unary) kernel() kernel1 {
	return kernel1{
		re: func(f *Frame, node int, a, da float64) (float64, float64) {
			if u.outside != nil {
				if why := u.outside(a); why != "" {
					f.outside(node, u.name, a, why)
					return 0, 0
				}
			}
			y := u.re(a)
			if da == 0 {
				return y, 0
			}
			return y, u.slope(a, y) * da
		},
		cx: func(f *Frame, node int, a, da complex128) (complex128, complex128) {
			w := u.cx(a)
			if !finite(w) && finite(a) {
				f.fail(node, RuleDivision, u.name+" is infinite at this argument", "keep the argument away from this value")
				return 0, 0
			}
			if da == 0 {
				return w, 0
			}
			return w, u.cslope(a, w) * da
		},
	}
}

// unary is the chain rule f'(a)·a'.
func (d *differ) unary(u *unary, node int, a Code) (Code, error) {
	return d.linear(a, func(x Code) (Code, error) {
		if x.null {
			return nullOf(a.Type), nil
		}
		y, err := u.call(node, a)
		if err != nil {
			return Code{}, err
		}
		s, err := u.diff(node, a, y)
		if err != nil {
			return Code{}, err
		}
		return Mul(node, s, x)
	})
}

func negative(x float64) string {
	if x < 0 {
		return "complex"
	}
	return ""
}

func beyondOne(x float64) string {
	if math.Abs(x) > 1 {
		return "complex"
	}
	return ""
}

func logDomain(x float64) string {
	if x == 0 {
		return "pole"
	}
	return negative(x)
}

// The complex forms are the principal values of math/cmplx. Derivatives are
// those of DLMF 4.7, 4.20, 4.24, 4.34 (dlmf.nist.gov).
var unaries map[string]*unary

// named completes a function with its name and its kernel.
func (u unary) named(name string) *unary {
	u.name = name
	u.kern = u.kernel()
	return &u
}

func powerFunctions() map[string]unary {
	return map[string]unary{
		"sqrt": {re: math.Sqrt, slope: func(_, y float64) float64 { return 0.5 / y }, outside: negative,
			cx: cmplx.Sqrt, cslope: func(_, w complex128) complex128 { return 0.5 / w },
			diff:  func(n int, _, y Code) (Code, error) { return Div(n, Num(0.5), y) },
			takes: TakesNumberArea, gives: GivesSqrt, doc: "square root; of a complex number the root with positive real part"},
		"cbrt": {re: math.Cbrt, slope: func(_, y float64) float64 { return 1 / (3 * y * y) },
			cx: cbrtC, cslope: func(_, w complex128) complex128 { return 1 / (3 * w * w) },
			diff:  func(n int, _, y Code) (Code, error) { return Div(n, Num(1.0/3), product(n, y, y)) },
			takes: TakesNumberArea, gives: GivesCbrt, doc: "cube root; of a negative number the negative root, of a complex number the principal root"},
		"exp": {re: math.Exp, slope: func(_, y float64) float64 { return y },
			cx: cmplx.Exp, cslope: func(_, w complex128) complex128 { return w },
			diff: func(_ int, _, y Code) (Code, error) { return y, nil }, doc: "e to the power of x"},
		"ln": {re: math.Log, slope: func(x, _ float64) float64 { return 1 / x }, outside: logDomain,
			cx: cmplx.Log, cslope: func(z, _ complex128) complex128 { return 1 / z },
			diff: func(n int, x, _ Code) (Code, error) { return Div(n, Num(1), x) }, doc: "natural logarithm"},
		"log10": {re: math.Log10, slope: func(x, _ float64) float64 { return 1 / (x * math.Ln10) }, outside: logDomain,
			cx: cmplx.Log10, cslope: func(z, _ complex128) complex128 { return 1 / (z * math.Ln10) },
			diff: func(n int, x, _ Code) (Code, error) { return Div(n, Num(1/math.Ln10), x) }, doc: "decimal logarithm"},
	}
}

func cbrtC(z complex128) complex128 {
	if z == 0 {
		return 0
	}
	return cmplx.Pow(z, 1.0/3)
}
