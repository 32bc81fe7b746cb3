package eval_test

import (
	"context"
	"fmt"

	"inkjoule/lang/eval"
)

// The energy between two cylinders at 10 kV per metre of length, with an
// uncertain inner radius: W = ∫ ½ε(U/(r ln(b/a)))² 2πr dr.
func Example() {
	const r, a = 0, 1 // slots
	real := eval.Type{}
	check := func(c eval.Code, err error) eval.Code {
		if err != nil {
			fmt.Println(err) // *eval.ShapeError: what was found, and what to write
		}
		return c
	}
	b := eval.Num(0.02)
	ratio := check(eval.Div(1, b, eval.Slot(a, real)))
	ln := check(eval.Builtin("ln", 2, []eval.Code{ratio}))
	field := check(eval.Div(3, eval.Num(10e3), check(eval.Mul(4, eval.Slot(r, real), ln))))
	density := check(eval.Mul(5, eval.Num(8.8541878188e-12/2), check(eval.Pow(6, field, eval.Num(2)))))
	ring := check(eval.Mul(7, density, check(eval.Mul(8, eval.Num(6.283185307179586), eval.Slot(r, real)))))
	energy := check(eval.Integral(9, r, eval.Slot(a, real), b, ring))

	f := eval.NewFrame(context.Background(), 2, eval.Budget{})
	f.Set(a, eval.Real(0.005))
	inputs := []eval.Uncertain{{Slot: a, Gradient: eval.Gradient{{Input: 0, D: eval.Real(1)}}}}
	w, gradient, fault := eval.Propagate(f, 9, energy, inputs)
	if fault != nil {
		fmt.Println(fault.Rule, fault.Message)
		return
	}
	spreads := eval.Spreads{Of: func(int) eval.Spread { return eval.WithinLimit(0.1e-3) }}
	fmt.Printf("%.4g J/m, u = %.2g J/m\n", w.Re(), gradient.Standard(spreads))
	// Output: 0.002007 J/m, u = 1.7e-05 J/m
}
