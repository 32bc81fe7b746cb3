package eval

import (
	"context"
	"math"
	"testing"
	"time"
)

// must unwraps the result of a combinator.
func must(t testing.TB) func(Code, error) Code {
	return func(c Code, err error) Code {
		t.Helper()
		if err != nil {
			t.Fatal(err)
		}
		return c
	}
}

// run evaluates with the given slots; steps are bounded, time hardly, so that a
// slow machine gives the same results.
func run(t testing.TB, c Code, slots ...Value) Value {
	t.Helper()
	f := NewFrame(context.Background(), len(slots), Budget{Time: time.Minute})
	for i, v := range slots {
		f.Set(i, v)
	}
	v, fault := f.Run(0, c)
	if fault != nil {
		t.Fatalf("fault %+v", *fault)
	}
	return v
}

// near fails unless got is within rel of want.
func near(t testing.TB, what string, got, want, rel float64) {
	t.Helper()
	if d := math.Abs(got - want); !(d <= rel*math.Abs(want)) && got != want {
		t.Errorf("%s = %.17g, want %.17g (off by %.2g relative)", what, got, want, d/math.Abs(want))
	}
}

func TestArithmeticOfShapes(t *testing.T) {
	ok := must(t)
	v, w := Const(Vec(1, 2, 3)), Const(Vec(4, -5, 6))
	ten := Const(Ten([9]float64{2, 0, 1, 0, 3, 0, 0, 0, 4}))
	list := Const(ListOf(1, 2, 4))
	cases := []struct {
		name string
		code Code
		want Value
	}{
		{"sum of vectors", ok(Add(0, v, w)), Vec(5, -3, 9)},
		{"vector times number", ok(Mul(0, v, Num(2))), Vec(2, 4, 6)},
		{"dot", ok(Dot(0, v, w)), Real(12)},
		{"cross", ok(Cross(0, v, w)), Vec(27, 6, -13)},
		{"tensor on vector", ok(Mul(0, ten, v)), Vec(5, 6, 12)},
		{"vector on tensor", ok(Dot(0, v, ten)), Vec(2, 6, 13)},
		{"tensor by tensor", ok(Dot(0, ten, ten)), Ten([9]float64{4, 0, 6, 0, 9, 0, 0, 0, 16})},
		{"list plus number", ok(Add(0, list, Num(1))), ListOf(2, 3, 5)},
		{"list over list", ok(Div(0, list, list)), ListOf(1, 1, 1)},
		{"complex quotient", ok(Div(0, Const(Cplx(1)), Const(Cplx(1i)))), Cplx(-1i)},
		{"power", ok(Pow(0, Num(2), Num(-2))), Real(0.25)},
		{"magnitude", ok(Abs(0, Const(CVec(3i, 4, 0)))), Real(5)},
		{"component", ok(TensorComponent(0, 0, 2, ten)), Real(1)},
	}
	for _, c := range cases {
		if got := run(t, c.code); !got.Equal(c.want) {
			t.Errorf("%s = %+v, want %+v", c.name, got, c.want)
		}
	}
}

func TestShapesRefused(t *testing.T) {
	v, ten, list := Const(Vec(1, 2, 3)), Const(identity), Const(ListOf(1, 2))
	refused := map[string]func() (Code, error){
		"vector*vector":      func() (Code, error) { return Mul(0, v, v) },
		"vector*tensor":      func() (Code, error) { return Mul(0, v, ten) },
		"number+vector":      func() (Code, error) { return Add(0, Num(1), v) },
		"number/vector":      func() (Code, error) { return Div(0, Num(1), v) },
		"vector^number":      func() (Code, error) { return Pow(0, v, Num(2)) },
		"list·list":          func() (Code, error) { return Dot(0, list, list) },
		"number×number":      func() (Code, error) { return Cross(0, Num(1), Num(2)) },
		"|tensor|":           func() (Code, error) { return Abs(0, ten) },
		"list of vectors":    func() (Code, error) { return Mul(0, v, list) },
		"sin(vector)":        func() (Code, error) { return Builtin("sin", 0, []Code{v}) },
		"sin()":              func() (Code, error) { return Builtin("sin", 0, nil) },
		"unknown":            func() (Code, error) { return Builtin("gamma", 0, []Code{v}) },
		"max(complex)":       func() (Code, error) { return Builtin("max", 0, []Code{Const(Cplx(1i))}) },
		"inv(vector)":        func() (Code, error) { return Builtin("inv", 0, []Code{v}) },
		"vector in a vector": func() (Code, error) { return Triple(0, v, Num(0), Num(0)) },
	}
	for name, f := range refused {
		if _, err := f(); err == nil {
			t.Errorf("%s is not refused", name)
		}
	}
}
