package eval

import (
	"context"
	"math"
	"testing"

	"pgregory.net/rapid"
)

// gen draws random smooth expressions of a given shape. Slots: 0 to 2 real
// numbers, 3 complex, 4 and 5 vectors, 6 a tensor, from 10 on private.
type gen struct {
	expr
	r    *rapid.T
	next int
}

func (g *gen) pick(n int) int { return rapid.IntRange(0, n-1).Draw(g.r, "pick") }

func (g *gen) fresh() int { g.next++; return 9 + g.next }

// safe is 1 + c^2, a number that is never zero nor negative.
func (g *gen) safe(c Code) Code { return g.add(Num(1), g.mul(c, c)) }

func (g *gen) number(depth int) Code {
	if depth <= 0 {
		if k := g.pick(4); k < 3 {
			return slot(k)
		}
		return Num(rapid.Float64Range(-2, 2).Draw(g.r, "constant"))
	}
	a := func() Code { return g.number(depth - 1) }
	switch g.pick(22) {
	case 0:
		return g.add(a(), a())
	case 1:
		return g.sub(a(), a())
	case 2:
		return g.mul(a(), a())
	case 3:
		return g.div(a(), g.safe(a()))
	case 4:
		return must(g.t)(Pow(0, g.safe(a()), g.call("sin", a())))
	case 5:
		return g.call([]string{"sin", "cos", "tanh", "atan", "erf", "abs"}[g.pick(6)], a())
	case 6:
		return g.call([]string{"sqrt", "ln", "log10", "cbrt"}[g.pick(4)], g.safe(a()))
	case 7:
		return g.call("exp", g.call("sin", a()))
	case 8:
		return g.dot(g.vector(depth-1), g.vector(depth-1))
	case 9:
		return must(g.t)(Abs(0, g.phasor(depth-1)))
	case 10:
		return g.call([]string{"Re", "Im"}[g.pick(2)], g.phasor(depth-1))
	case 11: // a call of a function of two parameters
		p, q := g.fresh(), g.fresh()
		body := g.add(g.mul(slot(p), slot(q)), g.call("sin", slot(p)), a())
		return Let(0, []int{p, q}, []Code{a(), a()}, body)
	case 12:
		s := g.fresh()
		body := g.mul(g.call("cos", g.mul(slot(s), slot(0))), g.safe(slot(1)))
		return must(g.t)(Integral(0, s, g.call("sin", a()), g.call("cos", a()), body))
	case 13:
		s := g.fresh()
		return must(g.t)(Sum(0, s, Num(1), Num(5), g.div(slot(0), g.add(slot(s), g.safe(slot(1))))))
	case 14: // the root of x + x^3 = a
		s := g.fresh()
		left := g.add(slot(s), g.pow(slot(s), 3))
		return must(g.t)(Solve(0, s, left, g.call("sin", a()), Num(-2), Num(2)))
	case 15:
		return g.call([]string{"det", "trace"}[g.pick(2)], g.tensor(depth-1))
	case 16:
		return must(g.t)(Component(0, g.pick(3), g.vector(depth-1)))
	case 17:
		return g.call([]string{"min", "max", "sum", "mean"}[g.pick(4)], a(), a(), a())
	case 18: // a list and its reduction
		l := g.mul(g.add(Const(ListOf(1, -2, 0.5)), a()), Const(ListOf(0.3, 0.2, -1)))
		return g.call([]string{"min", "max", "sum", "mean"}[g.pick(4)], g.call("sin", l))
	case 19: // phase of a number off the cut, and a power of it
		z := g.add(Num(3), g.call("exp", g.mul(Const(Cplx(1i)), a())))
		return g.call("arg", must(g.t)(Pow(0, z, []Code{Num(3), Num(-2), Num(0.3), g.phasor(0)}[g.pick(4)])))
	case 20:
		return must(g.t)(TensorComponent(0, g.pick(3), g.pick(3), g.tensor(depth-1)))
	case 21:
		return g.call("ellipK", g.mul(Num(0.9), g.pow(g.call("sin", a()), 2)))
	}
	return g.call("besselJ", Num(float64(g.pick(3))), a())
}

func (g *gen) vector(depth int) Code {
	if depth <= 0 {
		return Slot(4+g.pick(2), Type{Shape: Vector})
	}
	switch g.pick(5) {
	case 0:
		return g.vec(g.number(depth-1), g.number(depth-1), g.number(depth-1))
	case 1:
		return g.add(g.vector(depth-1), g.vector(depth-1))
	case 2:
		return g.mul(g.number(depth-1), g.vector(depth-1))
	case 3:
		return must(g.t)(Cross(0, g.vector(depth-1), g.vector(depth-1)))
	}
	return g.mul(g.tensor(depth-1), g.vector(depth-1))
}

func (g *gen) tensor(depth int) Code {
	if depth <= 0 {
		return Slot(6, Type{Shape: Tensor})
	}
	switch g.pick(4) {
	case 0:
		return g.call("diag", g.number(depth-1), g.number(depth-1), g.number(depth-1))
	case 1:
		return g.call("rotate", g.tensor(depth-1), Slot(4, Type{Shape: Vector}), g.number(depth-1))
	case 2:
		return g.call("uniaxial", g.number(depth-1), g.number(depth-1), Slot(5, Type{Shape: Vector}))
	}
	return g.call("inv", g.add(Const(Ten([9]float64{9, 0, 0, 0, 9, 0, 0, 0, 9})), Slot(6, Type{Shape: Tensor})))
}

func (g *gen) phasor(depth int) Code {
	if depth <= 0 {
		return Slot(3, Type{Complex: true})
	}
	switch g.pick(5) {
	case 0:
		return g.add(g.phasor(depth-1), g.number(depth-1))
	case 1:
		return g.mul(g.phasor(depth-1), g.phasor(depth-1))
	case 2:
		return g.call("exp", g.mul(Const(Cplx(1i)), g.number(depth-1)))
	case 3:
		return g.call("conj", g.phasor(depth-1))
	}
	return g.call("sqrt", g.add(Num(3), g.call("exp", g.mul(Const(Cplx(1i)), g.number(depth-1)))))
}

// start sets the slots: numbers around 1, a phasor, vectors, a tensor.
func start(f *Frame, r *rapid.T) {
	x := func() float64 { return rapid.Float64Range(0.3, 1.7).Draw(r, "x") }
	for i := range 3 {
		f.Set(i, Real(x()))
	}
	f.Set(3, Cplx(complex(x(), -x())))
	f.Set(4, Vec(x(), -x(), x()))
	f.Set(5, Vec(-x(), x(), x()))
	f.Set(6, Ten([9]float64{x(), x(), 0, x(), x(), x(), 0, x(), x()}))
}

// The fast path computes what the general one computes.
func TestFastPathEqualsGeneralPath(t *testing.T) {
	rapid.Check(t, func(r *rapid.T) {
		g := &gen{expr: expr{t}, r: r}
		c := g.number(4)
		f := NewFrame(context.Background(), 40, Budget{})
		start(f, r)
		fast, fault := f.Run(0, c)
		if fault != nil {
			r.Skip()
		}
		general, fault := f.RunDual(0, c)
		if fault != nil {
			r.Fatalf("general path faults: %+v", *fault)
		}
		if d := math.Abs(fast.Re() - general.Re()); d > 1e-9*math.Max(1e-3, math.Abs(fast.Re())) {
			r.Fatalf("fast %.17g, general %.17g", fast.Re(), general.Re())
		}
	})
}

// The tangent is the derivative: it agrees with a central difference along the
// same direction (step relative to the slots, error of order h^2).
func TestTangentIsTheDerivative(t *testing.T) {
	rapid.Check(t, func(r *rapid.T) {
		g := &gen{expr: expr{t}, r: r}
		c := g.number(3)
		f := NewFrame(context.Background(), 40, Budget{})
		start(f, r)
		var at [7]Value
		for i := range at {
			at[i] = f.Get(i)
		}
		along := func(h float64) (float64, bool) {
			for i, v := range at {
				f.Set(i, addKernel.each(f, 0, v, mulKernel.each(f, 0, Real(h), v)))
			}
			v, fault := f.Run(0, c)
			return v.Re(), fault == nil
		}
		for i, v := range at {
			f.Set(i, v.WithTangent(v))
		}
		dual, fault := f.RunDual(0, c)
		p, ok1 := along(1e-4)
		m, ok2 := along(-1e-4)
		p2, ok3 := along(2e-4)
		m2, ok4 := along(-2e-4)
		if fault != nil || !(ok1 && ok2 && ok3 && ok4) {
			r.Skip()
		}
		d1, d2 := (p-m)/2e-4, (p2-m2)/4e-4
		want := (4*d1 - d2) / 3 // Richardson: error of order h^4
		got := dual.Tangent().Re()
		slack := math.Abs(d1-d2) + 1e-6*math.Max(math.Abs(want), math.Abs(dual.Re())) + 1e-9
		if math.Abs(got-want) > slack {
			r.Fatalf("tangent %.12g, difference %.12g (slack %.2g)", got, want, slack)
		}
	})
}

// Differentiated code computes the tangent, and its own tangent is the second
// derivative.
func TestDerivativeEqualsTangent(t *testing.T) {
	rapid.Check(t, func(r *rapid.T) {
		g := &gen{expr: expr{t}, r: r}
		c := g.number(3)
		d1, err := Derivative(0, 0, slot(7), c)
		if err != nil {
			r.Fatalf("first derivative: %v", err)
		}
		f := NewFrame(context.Background(), 40, Budget{})
		start(f, r)
		x := f.Get(0)
		f.Set(7, x)
		f.Set(0, x.WithTangent(Real(1)))
		v, fault := f.RunDual(0, c)
		if fault != nil {
			r.Skip()
		}
		f.Set(0, x)
		w, fault := f.Run(0, d1)
		if fault != nil {
			r.Fatalf("derivative faults: %+v", *fault)
		}
		same(r, "first", w.Re(), v.Tangent().Re(), math.Abs(v.Re()))
		d2, err := Derivative(0, 7, slot(8), d1)
		if err != nil {
			return // min, max: refused
		}
		f.Set(8, x)
		f.Set(7, x.WithTangent(Real(1)))
		v, fault = f.RunDual(0, d1)
		w, fault2 := f.Run(0, d2)
		if fault == nil && fault2 == nil {
			same(r, "second", w.Re(), v.Tangent().Re(), math.Abs(v.Re()))
		}
	})
}

func same(r *rapid.T, what string, a, b, size float64) {
	if d := math.Abs(a - b); !(d <= 1e-7*math.Max(math.Max(math.Abs(a), math.Abs(b)), size)+1e-10) {
		r.Fatalf("%s derivative: code %.15g, tangent %.15g", what, a, b)
	}
}

// Turning everything turns the result: (R T Rᵀ)·(R v) = R·(T·v), and lengths,
// traces and determinants stay.
func TestRotationInvariance(t *testing.T) {
	rapid.Check(t, func(r *rapid.T) {
		e := expr{t}
		f := NewFrame(context.Background(), 40, Budget{})
		start(f, r)
		ten, v, axis, angle := Slot(6, Type{Shape: Tensor}), Slot(4, Type{Shape: Vector}), Slot(5, Type{Shape: Vector}), slot(0)
		turned := e.call("rotate", ten, axis, angle)
		rot := must(t)(rotation(0, must(t)(direction("rotate", 0, axis)), angle))
		l, r2 := e.dot(turned, e.dot(rot, v)), e.dot(rot, e.dot(ten, v))
		for _, pair := range [][2]Code{
			{must(t)(Abs(0, e.sub(l, r2))), Num(0)},
			{e.call("trace", turned), e.call("trace", ten)},
			{e.call("det", turned), e.call("det", ten)},
			{must(t)(Abs(0, e.dot(rot, v))), must(t)(Abs(0, v))},
			{e.call("det", rot), Num(1)},
		} {
			a, _ := f.Run(0, pair[0])
			b, _ := f.Run(0, pair[1])
			if math.Abs(a.Re()-b.Re()) > 1e-12*math.Max(1, math.Abs(b.Re())) {
				r.Fatalf("%.17g is not %.17g", a.Re(), b.Re())
			}
		}
	})
}
