package eval

import (
	"context"
	"math"
	"math/cmplx"
	"testing"
)

// tangentBy evaluates code with slot i seeded by 1.
func tangentBy(t testing.TB, c Code, i int, slots ...Value) (value, tangent float64) {
	t.Helper()
	f := NewFrame(context.Background(), len(slots), Budget{})
	for k, v := range slots {
		f.Set(k, v)
	}
	f.Set(i, slots[i].WithTangent(Real(1)))
	v, fault := f.RunDual(0, c)
	if fault != nil {
		t.Fatalf("%+v", *fault)
	}
	return v.Re(), v.Tangent().Re()
}

// Integrals by an uncertain bound or parameter p (slot 1), x in slot 0.
func TestTangentsOfIntegrals(t *testing.T) {
	e := expr{t}
	x, p := slot(0), slot(1)
	root := func(c Code) Code { return e.pow(c, 0.5) }
	cases := []struct {
		name     string
		from, to Code
		body     Code
		p        float64
		val, tan float64
	}{
		{"upper bound", Num(0), p, e.pow(x, 2), 2, 8.0 / 3, 4},
		{"both bounds", p, e.mul(Num(3), p), e.div(Num(1), x), 2, math.Log(3), 0},
		{"backwards", p, Num(0), e.pow(x, 2), 2, -8.0 / 3, -4},
		{"parameter", Num(0), Num(1), e.call("exp", e.mul(p, x)), 1, math.E - 1, 1},
		{"empty range", p, Num(2), e.pow(x, 2), 2, 0, -4},
		{"singular at a moving bound", p, Num(5), e.div(Num(1), root(e.sub(x, p))), 1, 4, -0.5},
		{"singular at both", p, e.mul(Num(2), p), e.div(Num(1), root(e.mul(e.sub(x, p), e.sub(e.mul(Num(2), p), x)))), 3, math.Pi, 0},
		{"out to infinity", p, Num(inf), e.pow(x, -2), 2, 0.5, -0.25},
		{"infinite with parameter", Num(0), Num(inf), e.call("exp", e.mul(Num(-1), p, x)), 4, 0.25, -1.0 / 16},
		{"power with parameter", Num(0), Num(1), must(t)(Pow(0, x, p)), -0.5, 2, -4},
		{"kink that moves", Num(0), Num(1), must(t)(Abs(0, e.sub(x, p))), 0.3, 0.29, -0.4},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			g := must(t)(Integral(0, 0, c.from, c.to, c.body))
			v, d := tangentBy(t, g, 1, Value{}, Real(c.p))
			near(t, "value", v, c.val, 1e-9)
			if c.tan == 0 && math.Abs(d) < 1e-9 {
				return
			}
			near(t, "tangent", d, c.tan, 1e-8)
		})
	}
}

// Two layers that meet at an uncertain radius m: the integral of a permittivity
// that jumps there moves by the jump. W = ∫_a^m 2r + ∫_m^b 5r dr.
func TestTangentOfAMovingBoundary(t *testing.T) {
	e := expr{t}
	const param, r, m = 3, 0, 1
	layers := func(x Code) Code {
		body := must(t)(Choose(0, slot(param), []Piece{{Num(1), slot(m), Num(2)}, {slot(m), Num(4), Num(5)}}))
		return Let(0, []int{param}, []Code{x}, body)
	}
	g := must(t)(Integral(0, r, Num(1), Num(4), e.mul(layers(slot(r)), slot(r))))
	v, d := tangentBy(t, g, m, Value{}, Real(2), Value{}, Value{})
	near(t, "W", v, 3+30, 1e-12)
	near(t, "dW/dm", d, (2-5)*2, 1e-12)
}

func TestPieces(t *testing.T) {
	e := expr{t}
	c := must(t)(Choose(6, slot(0), []Piece{
		{Num(0), Num(1), e.pow(slot(0), 2)}, {Num(2), Num(1), Num(7)},
	}))
	for _, k := range []struct{ x, want float64 }{{0, 0}, {0.5, 0.25}, {1, 1}, {1.5, 7}, {2, 7}, {2 * (1 + 1e-14), 7}} {
		if got := run(t, c, Real(k.x)).Re(); got != k.want {
			t.Errorf("at %g: %g, want %g", k.x, got, k.want)
		}
	}
	for _, x := range []float64{-0.1, 2.1} {
		f := NewFrame(context.Background(), 1, Budget{})
		f.Set(0, Real(x))
		if _, fault := f.Run(0, c); fault == nil || fault.Rule != RuleRange || fault.Node != 6 {
			t.Errorf("at %g: %+v", x, fault)
		}
	}
	near(t, "derivative", run(t, must(t)(Derivative(0, 0, Num(0.5), c)), Value{}).Re(), 1, 1e-15)
}

// Complex and vector integrands.
func TestIntegralsOfOtherShapes(t *testing.T) {
	e := expr{t}
	x := slot(0)
	phasor := e.call("exp", e.mul(Const(Cplx(1i)), x))
	v := run(t, must(t)(Integral(0, 0, Num(0), Num(math.Pi/2), phasor)), Value{}).C()
	if cmplx.Abs(v-(1+1i)) > 1e-12 {
		t.Errorf("∫e^jx = %v, want 1+1j", v)
	}
	w := run(t, must(t)(Integral(0, 0, Num(0), Num(1), e.vec(x, e.pow(x, 2), e.pow(x, -0.5)))), Value{})
	for i, want := range []float64{0.5, 1.0 / 3, 2} {
		near(t, "component", w.At(i).Re(), want, 1e-9)
	}
	ten := run(t, must(t)(Integral(0, 0, Num(0), Num(1), e.mul(x, Const(identity)))), Value{})
	near(t, "tensor", ten.At(8).Re(), 0.5, 1e-12)
	// centre of a half ball: ∫(x, y, z) over the ball's upper half, by sphere coordinates
	up := e.mul(e.call("max", e.call("cos", slot(1)), Num(0)), e.vec(slot(3), slot(4), slot(5)))
	m := run(t, must(t)(RegionIntegral(0, Region{Kind: Ball, Params: lengths(1)}, at, up)), make([]Value, 7)...)
	near(t, "moment", m.At(2).Re(), math.Pi/6, 1e-9) // ∫r^3 dr · 2π · ∫cos² sin dθ over the half
	if math.Abs(m.At(0).Re()) > 1e-12 {
		t.Errorf("moment along x: %g", m.At(0).Re())
	}
}

// Tangents by the size of a region: dV/dR is the area.
func TestTangentOfARegion(t *testing.T) {
	e := expr{t}
	radius := slot(7)
	slots := append(make([]Value, 7), Real(2))
	g := must(t)(RegionIntegral(0, Region{Kind: Ball, Params: []Code{radius}}, at, e.pow(slot(5), 2)))
	v, d := tangentBy(t, g, 7, slots...)
	near(t, "∫z²", v, 4*math.Pi*32/15, 1e-9)
	near(t, "d/dR", d, 4*math.Pi*16/3, 1e-9)
	g = must(t)(RegionIntegral(0, Region{Kind: Cylinder, Params: []Code{radius, Num(3)}, Boundary: true}, at, e.pow(slot(3), 2)))
	_, d = tangentBy(t, g, 7, slots...)
	near(t, "boundary", d, math.Pi*(3*3*4+2*8), 1e-9) // ∮x² = πR³L + 2·πR⁴/4
	near(t, "as code", run(t, must(t)(Derivative(0, 7, Num(2), g)), slots...).Re(), d, 1e-9)
}

// A private slot of a region integral lies beyond its own, where another
// definition of the note may keep its value.
func TestRegionIntegralKeepsOtherSlots(t *testing.T) {
	e := expr{t}
	only := Coordinates{R: 0, Theta: -1, Phi: -1, X: -1, Y: -1, Z: -1, N: -1}
	f := NewFrame(context.Background(), 12, Budget{})
	for i := range 12 {
		f.Set(i, Real(float64(100+i)))
	}
	for _, b := range []bool{false, true} {
		c := must(t)(RegionIntegral(0, Region{Kind: Box, Params: lengths(1, 1, 1), Boundary: b}, only, e.pow(slot(0), 2)))
		for _, do := range []func(int, Code) (Value, *Fault){f.Run, f.RunDual} {
			if _, fault := do(0, c); fault != nil {
				t.Fatalf("%+v", *fault)
			}
			for i := 1; i < 12; i++ {
				if f.Get(i).Re() != float64(100+i) {
					t.Errorf("slot %d holds %g", i, f.Get(i).Re())
				}
			}
		}
	}
}

// A function may be called in its own argument: f(x, f(y, z)), f(x, y) = x - 2y.
func TestCallInItsOwnArgument(t *testing.T) {
	e := expr{t}
	for n := 2; n <= 4; n++ {
		slots, body := []int{10, 11, 12, 13}[:n], e.sub(slot(10), e.mul(Num(2), slot(11)))
		f := func(x, y Code) Code {
			args := []Code{x, y, Num(7), Num(8)}[:n]
			return Let(0, slots, args, body)
		}
		c := f(slot(0), f(slot(1), slot(2)))
		near(t, "f(x, f(y, z))", run(t, c, append([]Value{Real(1), Real(2), Real(5)}, make([]Value, 11)...)...).Re(), 1-2*(2-2*5), 0)
	}
}

func TestIntegralRestoresItsSlot(t *testing.T) {
	e := expr{t}
	f := NewFrame(context.Background(), 1, Budget{})
	for _, c := range []Code{
		must(t)(Integral(0, 0, Num(0), Num(1), e.pow(slot(0), 2))),
		must(t)(Sum(0, 0, Num(0), Num(9), e.pow(slot(0), 2))),
		must(t)(Solve(0, 0, e.pow(slot(0), 3), Num(1), Num(0), Num(3))),
		turn(0, 0, e.pow(e.call("sin", slot(0)), 2)),
	} {
		for _, do := range []func(int, Code) (Value, *Fault){f.Run, f.RunDual} {
			f.Set(0, Real(42))
			if _, fault := do(0, c); fault != nil || f.Get(0).Re() != 42 {
				t.Errorf("slot 0 holds %g; %+v", f.Get(0).Re(), fault)
			}
		}
	}
}

func TestDerivativesOfFields(t *testing.T) {
	e := expr{t}
	// V = q/(4πε r) along x: E = -dV/dx, then dE/dx, by nested derivatives.
	v := e.div(Num(1), slot(0))
	field := must(t)(Derivative(0, 0, slot(1), v))
	second := must(t)(Derivative(0, 1, slot(2), field))
	third := must(t)(Derivative(0, 2, slot(3), second))
	near(t, "1st", run(t, field, Value{}, Real(2)).Re(), -0.25, 1e-15)
	near(t, "2nd", run(t, second, Value{}, Value{}, Real(2)).Re(), 0.25, 1e-15)
	near(t, "3rd", run(t, third, Value{}, Value{}, Value{}, Real(2)).Re(), -0.375, 1e-15)
	// a function called in its own argument: f(f(x)), f = x², is x⁴
	sq := func(x Code) Code { return Let(0, []int{5}, []Code{x}, e.pow(slot(5), 2)) }
	d := must(t)(Derivative(0, 0, slot(1), sq(sq(slot(0)))))
	near(t, "f(f(x))", run(t, d, Value{}, Real(3), Value{}, Value{}, Value{}, Value{}).Re(), 4*27, 1e-15)
	// the derivative of a function of two parameters through a shared argument
	two := Let(0, []int{5, 6}, []Code{slot(0), e.pow(slot(0), 2)}, e.mul(slot(5), slot(6), slot(0)))
	d = must(t)(Derivative(0, 0, slot(1), two))
	near(t, "x·x²·x", run(t, d, make([]Value, 7)...).Re(), 0, 0)
	near(t, "x·x²·x", run(t, d, Value{}, Real(2), Value{}, Value{}, Value{}, Value{}, Value{}).Re(), 32, 1e-15)
}
