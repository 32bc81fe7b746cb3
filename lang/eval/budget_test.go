package eval

import (
	"context"
	"math"
	"testing"
	"time"
)

// Whatever a note asks for ends, soon after its budget.
func TestBudgetEndsEverything(t *testing.T) {
	e := expr{t}
	long := must(t)(Sum(3, 0, Num(1), Num(1e12), e.call("sin", slot(0))))
	nested := e.call("sin", slot(0))
	for i := range 8 {
		nested = must(t)(Integral(3, i, Num(0), Num(1), e.call("abs", e.sub(nested, slot(i+1)))))
	}
	calls := slot(20)
	for i := range 60 { // f60 = f59 + f59, …: 2^60 calls
		calls = e.add(Let(3, []int{20 + i}, []Code{slot(80)}, calls), Let(3, []int{20 + i}, []Code{slot(80)}, calls))
	}
	list := Const(ListOf(make([]float64, 1000)...))
	lists := must(t)(Sum(3, 0, Num(1), Num(1e9), e.call("sum", e.mul(slot(0), list))))
	for name, c := range map[string]Code{"sum": long, "orders": must(t)(Sum(3, 0, Num(1), Num(1e5), e.call("besselJ", Num(1e5), slot(0)))), "nested integrals": nested, "calls": calls, "lists": lists} {
		for _, dual := range []bool{false, true} {
			f := NewFrame(context.Background(), 100, Budget{Steps: 1e6, Memory: 1 << 20})
			do := f.Run
			if dual {
				do = f.RunDual
			}
			start := time.Now()
			if v, fault := do(0, c); fault == nil || fault.Rule != RuleBudget || fault.Node != 3 && name != "lists" && name != "orders" {
				t.Errorf("%s: %v %+v", name, v.Re(), fault)
			}
			if took := time.Since(start); took > 5*time.Second {
				t.Errorf("%s took %v", name, took)
			}
			if _, fault := do(0, Num(1)); fault != nil {
				t.Errorf("%s: an exhausted frame cannot give a constant: %+v", name, fault)
			}
		}
	}
}

func TestDeadlineAndCancellation(t *testing.T) {
	e := expr{t}
	long := must(t)(Sum(3, 0, Num(1), Num(1e12), e.call("sin", slot(0))))
	f := NewFrame(context.Background(), 1, Budget{Steps: math.MaxInt64, Time: 20 * time.Millisecond})
	if _, fault := f.Run(0, long); fault == nil || fault.Rule != RuleBudget {
		t.Errorf("deadline: %+v", fault)
	}
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	f = NewFrame(ctx, 1, Budget{Steps: math.MaxInt64, Time: 5 * time.Second})
	start := time.Now()
	if _, fault := f.Run(0, long); fault == nil || fault.Rule != RuleBudget || time.Since(start) > 2*time.Second {
		t.Errorf("cancelled: %+v after %v", fault, time.Since(start))
	}
}

// The fast path does not allocate once warm: scalars, vectors in between, calls,
// nested integrals, a region.
func TestFastPathDoesNotAllocate(t *testing.T) {
	for name, c := range fastCodes(t) {
		f := NewFrame(context.Background(), 30, Budget{Steps: math.MaxInt64, Time: time.Hour})
		f.Set(7, Real(3))
		f.Set(8, Ten([9]float64{2, 0, 0, 0, 3, 0, 0, 0, 4}))
		f.Run(0, c)
		if n := testing.AllocsPerRun(5, func() { f.fault, f.ok = Fault{}, true; c.Real(f) }); n > 0 {
			t.Errorf("%s allocates %g times", name, n)
		}
	}
}

// fastCodes are integrals of the kind that notes hold.
func fastCodes(t testing.TB) map[string]Code {
	e := expr{t}
	region := func(k RegionKind, body Code, ps ...float64) Code {
		return must(t)(RegionIntegral(0, Region{Kind: k, Params: lengths(ps...)}, at, body))
	}
	x, y, z, r := slot(3), slot(4), slot(5), slot(0)
	field := e.mul(slot(7), e.vec(e.mul(x, y), e.mul(y, z), e.mul(z, x)))
	density := e.mul(Num(0.5), e.dot(e.mul(Slot(8, Type{Shape: Tensor}), field), field))
	call := func(arg Code) Code { return Let(0, []int{9}, []Code{arg}, e.div(Num(1), e.pow(slot(9), 2))) }
	return map[string]Code{
		"smooth box":      region(Box, smooth3(e), 1, 1, 1),
		"crystal energy":  region(Box, density, 1, 1, 1),
		"sphere of calls": region(Shell, call(r), 1, 2),
		"line":            must(t)(Integral(0, 0, Num(1), Num(9), call(r))),
		"singular":        must(t)(Integral(0, 0, Num(0), Num(1), e.pow(r, -0.5))),
		"sum":             must(t)(Sum(0, 0, Num(1), Num(100), call(r))),
		"equation":        must(t)(Solve(0, 0, e.pow(r, 3), Num(2), Num(0), Num(2))),
	}
}

// smooth3 is exp(-x² - y²)·cos(z + x·y), a smooth integrand of three variables.
func smooth3(e expr) Code {
	x, y, z := slot(3), slot(4), slot(5)
	g := e.call("exp", e.sub(Num(0), e.add(e.pow(x, 2), e.pow(y, 2))))
	return e.mul(g, e.call("cos", e.add(z, e.mul(x, y))))
}
