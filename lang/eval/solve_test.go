package eval

import (
	"context"
	"math"
	"testing"
)

func TestSolve(t *testing.T) {
	e := expr{t}
	x := slot(0)
	cases := []struct {
		name        string
		left, right Code
		a, b        float64
		want        float64
		count       int // 0: one root
	}{
		{"square root", e.pow(x, 2), Num(2), 0, 2, math.Sqrt2, 0},
		{"at the end", e.pow(x, 2), Num(4), 0, 2, 2, 0},
		{"backwards", e.pow(x, 2), Num(2), 2, 0, math.Sqrt2, 0},
		{"cos x = x", e.call("cos", x), x, 0, 1, 0.73908513321516064166, 0},                           // OEIS A003957
		{"Wien", e.mul(e.sub(Num(5), x), e.call("exp", x)), Num(5), 1, 10, 4.96511423174427630369, 0}, // OEIS A094090
		{"two roots", e.pow(x, 2), Num(2), -2, 3, -math.Sqrt2, 2},
		{"touching", e.pow(e.sub(x, Num(0.7)), 2), Num(0), 0, 2, 0.7, 0},
		{"close pair", e.pow(e.sub(x, Num(0.7)), 2), Num(1e-10), 0, 2, 0.7 - 1e-5, 2},
		{"close pair between samples", e.pow(e.sub(x, Num(0.7041)), 2), Num(1e-10), 0, 2, 0.7041 - 1e-5, 2},
		{"ten turns", e.call("sin", x), Num(0), 1, 32, math.Pi, 10},
		{"tangent, with its poles", e.call("tan", x), Num(1), 0, 7, math.Pi / 4, 2},
		{"nanometres", e.div(Num(1e-18), x), x, 1e-12, 1, 1e-9, 0},
		{"many decades, linear misses both", e.mul(e.sub(x, Num(1e-6)), e.sub(x, Num(3e-6))), Num(0), 1e-9, 1, 1e-6, 2},
		{"undefined in part", e.call("sqrt", e.sub(x, Num(1))), Num(2), -3, 9, 5, 0},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			f := NewFrame(context.Background(), 1, Budget{})
			v, fault := f.Run(5, must(t)(Solve(5, 0, c.left, c.right, Num(c.a), Num(c.b))))
			if fault != nil {
				t.Fatalf("%+v", *fault)
			}
			tol := 1e-14
			if c.name == "touching" {
				tol = 1e-8 // a double root is known to half the digits
			}
			near(t, c.name, v.Re(), c.want, tol)
			if f.Roots(5) != c.count {
				t.Errorf("%d roots counted, want %d", f.Roots(5), c.count)
			}
		})
	}
}

func TestSolveWithoutRoot(t *testing.T) {
	e := expr{t}
	x := slot(0)
	cases := []struct {
		name string
		left Code
		rule string
	}{
		{"positive", e.add(e.pow(x, 2), Num(1)), RuleNoRoot},
		{"pole", e.div(Num(1), e.sub(x, Num(0.3))), RuleNoRoot},
		{"nowhere defined", e.call("sqrt", e.sub(x, Num(100))), RuleShape},
	}
	for _, c := range cases {
		_, fault := NewFrame(context.Background(), 1, Budget{}).Run(0, must(t)(Solve(5, 0, c.left, Num(0), Num(-1), Num(2))))
		if fault == nil || fault.Rule != c.rule {
			t.Errorf("%s: %+v, want %s", c.name, fault, c.rule)
		}
	}
}

// The root of x·e^x = p moves by dx/dp = 1/(e^x(1+x)) (Lambert's W, DLMF 4.13.4).
func TestSolveTangent(t *testing.T) {
	e := expr{t}
	c := must(t)(Solve(0, 0, e.mul(slot(0), e.call("exp", slot(0))), slot(1), Num(0), Num(5)))
	f := NewFrame(context.Background(), 2, Budget{})
	f.Set(1, Real(1).WithTangent(Real(1)))
	v, fault := f.RunDual(0, c)
	if fault != nil {
		t.Fatalf("%+v", *fault)
	}
	w := 0.56714329040978387300 // omega constant, OEIS A030178
	near(t, "W(1)", v.Re(), w, 1e-15)
	near(t, "W'(1)", v.Tangent().Re(), 1/(math.Exp(w)*(1+w)), 1e-14)
	d := must(t)(Derivative(0, 1, slot(2), c))
	near(t, "as code", run(t, d, Value{}, Value{}, Real(1)).Re(), v.Tangent().Re(), 1e-14)
}
