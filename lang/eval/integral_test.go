package eval

import (
	"context"
	"math"
	"testing"
)

// fnCode wraps a Go function of slot 0 as code, for integrands that would be
// tedious to build; derivative-free.
func fnCode(fn func(x float64) float64) Code {
	c := Code{Real: func(f *Frame) float64 { return fn(real(f.slots[0].x)) }}
	c.Any = func(f *Frame) Value { return Real(fn(real(f.slots[0].x))) }
	return build(c, Slot(0, Type{}))
}

var inf = math.Inf(1)

func TestIntegralsOfKnownValue(t *testing.T) {
	sq := math.Sqrt
	cases := []struct {
		name string
		fn   func(float64) float64
		a, b float64
		want float64 // with its source
	}{
		{"x^2", func(x float64) float64 { return x * x }, 0, 3, 9},
		{"reversed", func(x float64) float64 { return x * x }, 3, 0, -9},
		{"exp", math.Exp, 0, 1, math.E - 1},
		{"1/x over nine decades", func(x float64) float64 { return 1 / x }, 1e-6, 1e3, 9 * math.Ln10},
		{"sin over 50 periods", func(x float64) float64 { return math.Sin(x) * math.Sin(x) }, 0, 100 * math.Pi, 50 * math.Pi},
		{"kink", func(x float64) float64 { return math.Abs(x - 1.0/3) }, 0, 1, 5.0 / 18},
		{"step", func(x float64) float64 { return math.Floor(x * math.E) }, 0, 1, 1 + 1 - 3/math.E}, // steps at 1/e, 2/e
		{"sqrt", sq, 0, 1, 2.0 / 3},
		{"1/sqrt at 0", func(x float64) float64 { return 1 / sq(x) }, 0, 4, 4},
		{"1/sqrt at 1", func(x float64) float64 { return 1 / sq(x-1) }, 1, 5, 4},
		{"ln", math.Log, 0, 1, -1},
		{"ln^2/sqrt", func(x float64) float64 { l := math.Log(x); return l * l / sq(x) }, 0, 1, 16}, // ∫x^(-1/2) ln²x = 2/(1/2)^3
		{"x^-0.9", func(x float64) float64 { return math.Pow(x, -0.9) }, 0, 1, 10},
		{"both ends", func(x float64) float64 { return 1 / sq(x*(1-x)) }, 0, 1, math.Pi},                           // B(1/2, 1/2)
		{"arcsine", func(x float64) float64 { return 1 / sq(1-x*x) }, -1, 1, math.Pi},                              // 2 asin 1
		{"Debye", func(x float64) float64 { return x * x * x / math.Expm1(x) }, 0, inf, math.Pow(math.Pi, 4) / 15}, // A&S 23.2.7, zeta(4)
		{"Gauss", func(x float64) float64 { return math.Exp(-x * x) }, -inf, inf, sq(math.Pi)},                     // A&S 7.1.1
		{"Lorentz", func(x float64) float64 { return 1 / (1 + x*x) }, -inf, inf, math.Pi},                          // A&S 4.4.3
		{"1/x^2 out", func(x float64) float64 { return 1 / (x * x) }, 2, inf, 0.5},
		{"x^-1.1 out", func(x float64) float64 { return math.Pow(x, -1.1) }, 1, inf, 10},
		{"both singular and infinite", func(x float64) float64 { return 1 / (sq(x) * (1 + x)) }, 0, inf, math.Pi}, // A&S 6.2.1, B(1/2,1/2)
		{"decay of a nanometre", func(x float64) float64 { return math.Exp(-x / 1e-9) }, 0, inf, 1e-9},
		{"skin of a micrometre in a metre", func(x float64) float64 { return math.Exp(-x / 1e-6) }, 0, 1, 1e-6},
		{"skin on a constant", func(x float64) float64 { return 1 + 1e6*math.Exp(-(1-x)/1e-6) }, 0, 1, 2},
		{"Planck at 6000 K in frequency", func(x float64) float64 { y := x / 1.25e14; return y * y * y / math.Expm1(y) }, 0, inf, 1.25e14 * math.Pow(math.Pi, 4) / 15},
		{"pole at the middle node", func(x float64) float64 {
			if x == 0 {
				return inf
			}
			return 1 / sq(math.Abs(x))
		}, -1, 1, 4},
		{"pole off any node", func(x float64) float64 { return 1 / sq(math.Abs(x-math.Pi/10)) }, 0, 1, 2*sq(math.Pi/10) + 2*sq(1-math.Pi/10)},
		{"log off any node", func(x float64) float64 { return math.Log(math.Abs(x - 0.3)) }, 0, 1, 0.3*math.Log(0.3) + 0.7*math.Log(0.7) - 1},
		{"two poles inside", func(x float64) float64 { return 1/sq(math.Abs(x-0.3)) + 1/sq(math.Abs(x-0.7)) }, 0, 1, 4*sq(0.3) + 4*sq(0.7)},
		{"zero", func(float64) float64 { return 0 }, 0, 1, 0},
		{"zero out", func(float64) float64 { return 0 }, 0, inf, 0},
		{"sinc", func(x float64) float64 { return math.Sin(x) / x }, 0, 10, 1.6583475942188740493}, // Si(10), A&S table 5.1
		{"logarithm in a cable gap", func(x float64) float64 { return 1 / x }, 0.0004, 0.0011, math.Log(11.0 / 4)},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			g := must(t)(Integral(7, 0, Num(c.a), Num(c.b), fnCode(c.fn)))
			n := 0
			counted := must(t)(Integral(7, 0, Num(c.a), Num(c.b), fnCode(func(x float64) float64 { n++; return c.fn(x) })))
			f := NewFrame(context.Background(), 1, Budget{})
			v, fault := f.Run(7, g)
			if fault != nil {
				t.Fatalf("fault %+v", *fault)
			}
			near(t, c.name, v.Re(), c.want, 1e-9)
			f.Run(7, counted)
			t.Logf("%d evaluations, relative error %.1e", n, math.Abs(v.Re()-c.want)/math.Abs(c.want))
		})
	}
}

// An integral that converges too slowly to be summed up is not called divergent.
func TestSlowIsNotDivergent(t *testing.T) {
	for _, power := range []float64{-0.99, -0.999, -0.9995} {
		for _, from := range []float64{0, 1} {
			g := must(t)(Integral(0, 0, Num(from), Num(from+1), fnCode(func(x float64) float64 { return math.Pow(x-from, power) })))
			v, fault := NewFrame(context.Background(), 1, Budget{}).Run(0, g)
			switch {
			case fault == nil:
				near(t, "integral", v.Re(), 1/(1+power), 1e-7)
			case fault.Rule == RuleDiverges:
				t.Errorf("x^%g at %g: %+v", power, from, *fault)
			}
		}
	}
}

func TestIntegralsWithoutValue(t *testing.T) {
	cases := []struct {
		name string
		fn   func(float64) float64
		a, b float64
		rule string
	}{
		{"1/x at 0", func(x float64) float64 { return 1 / x }, 0, 1, RuleDiverges},
		{"1/x^2 at 0", func(x float64) float64 { return 1 / (x * x) }, 0, 1, RuleDiverges},
		{"1/(1-x)", func(x float64) float64 { return 1 / (1 - x) }, 0, 1, RuleDiverges},
		{"1/x out", func(x float64) float64 { return 1 / x }, 1, inf, RuleDiverges},
		{"constant out", func(float64) float64 { return 3 }, 0, inf, RuleDiverges},
		{"1/sqrt out", func(x float64) float64 { return 1 / math.Sqrt(x) }, 1, inf, RuleDiverges},
		{"exp out", math.Exp, 0, inf, RuleDiverges},
		{"pole inside", func(x float64) float64 { return 1 / (x - 0.3) }, 0, 1, RuleDiverges},
		{"pole inside, even", func(x float64) float64 { return 1 / ((x - 0.3) * (x - 0.3)) }, 0, 1, RuleDiverges},
		{"log and pole", func(x float64) float64 { return math.Log(x) / x }, 0, 1, RuleDiverges},
		{"sine out", math.Sin, 0, inf, RuleNotConverged},
		{"slow logarithm", func(x float64) float64 { l := math.Log(x); return 1 / (x * l * l) }, 2, inf, RuleNotConverged},
		{"NaN", func(x float64) float64 { return math.NaN() }, 0, 1, RuleNotConverged},
		{"NaN in a stretch", func(x float64) float64 { return math.Sqrt(x - 0.5) }, 0, 1, RuleNotConverged},
		{"infinite", func(x float64) float64 { return inf }, 0, 1, RuleNotConverged},
		{"noise", func(x float64) float64 {
			return math.Mod(math.Float64frombits(math.Float64bits(x)*2654435761&(1<<52-1)|1023<<52), 1)
		}, 0, 1, RuleNotConverged},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			n := 0
			g := must(t)(Integral(7, 0, Num(c.a), Num(c.b), fnCode(func(x float64) float64 { n++; return c.fn(x) })))
			v, fault := NewFrame(context.Background(), 1, Budget{}).Run(7, g)
			if fault == nil || fault.Rule != c.rule || fault.Node != 7 {
				t.Errorf("%s gives %v, fault %+v, want %s", c.name, v.Re(), fault, c.rule)
			}
			t.Logf("%d evaluations; %+v", n, fault)
		})
	}
}
