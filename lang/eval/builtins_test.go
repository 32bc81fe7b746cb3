package eval

import (
	"context"
	"math"
	"math/cmplx"
	"testing"

	"gonum.org/v1/gonum/integrate/quad"
	"gonum.org/v1/gonum/mathext"
)

// Values that handbooks print. A&S is Abramowitz and Stegun, Handbook of
// Mathematical Functions (NBS, 1964); digits from memory of its tables and
// checked against gonum below where gonum has the function.
func TestBuiltinsAgainstHandbooks(t *testing.T) {
	e := expr{t}
	cases := []struct {
		name string
		args []Code
		want float64
		abs  float64
	}{
		{"ellipK", lengths(0.5), 1.85407467730137, 1e-14},    // A&S table 17.1
		{"ellipE", lengths(0.5), 1.35064388104768, 1e-14},    // A&S table 17.1
		{"ellipK", lengths(0), math.Pi / 2, 1e-15},           // A&S 17.3.11
		{"ellipK", lengths(-1), 1.31102877714606, 1e-14},     // lemniscate constant / 2, DLMF 19.20.2
		{"ellipE", lengths(1), 1, 1e-15},                     // A&S 17.3.12
		{"ellipE", lengths(-1), 1.91009889451386, 1e-14},     // arc of a sine, OEIS A105419 / 4
		{"besselJ", lengths(0, 1), 0.765197686557967, 1e-15}, // A&S table 9.1
		{"besselJ", lengths(1, 1), 0.440050585744934, 1e-15},
		{"besselJ", lengths(2, 5), 0.046565116277752, 1e-15},
		{"besselJ", lengths(0, 2.404825557695773), 0, 1e-15}, // first zero, A&S table 9.5
		{"besselY", lengths(0, 1), 0.088256964215677, 1e-15}, // A&S table 9.1
		{"besselY", lengths(1, 1), -0.781212821300289, 1e-15},
		{"erf", lengths(0.5), 0.520499877813047, 1e-15}, // A&S table 7.1
		{"cbrt", lengths(-8), -2, 1e-15},
		{"atan2", lengths(1, -1), 3 * math.Pi / 4, 1e-15},
		// Wire gauge: NBS Handbook 100 (1966) gives 0.4600 in and 0.0050 in; the
		// others as printed by OpenStax, University Physics 2, sec. 9.2 to 9.6.
		{"awg", lengths(-3), 0.4600 * 0.0254, 0.00005 * 0.0254},
		{"awg", lengths(36), 0.0050 * 0.0254, 1e-12},
		{"awg", lengths(12), 2.053e-3, 5e-7},
		{"awg", lengths(14), 1.628e-3, 5e-7},
		{"awg", lengths(10), 2.588e-3, 5e-7},
		{"awg", lengths(0), 0.3249 * 0.0254, 0.00005 * 0.0254}, // in inches; the 8.252 mm printed there comes from rounded mils
		{"awg", lengths(5), 4.621e-3, 5e-7},
		{"mean", lengths(1, 2, 6), 3, 0},
		{"max", lengths(1, 7, 6), 7, 0},
		{"min", []Code{Const(ListOf(3, 1, 2))}, 1, 0},
		{"sum", []Code{Const(ListOf(1e16, 1, -1e16))}, 1, 0}, // compensated
	}
	for _, c := range cases {
		if got := run(t, e.call(c.name, c.args...)).Re(); math.Abs(got-c.want) > c.abs {
			t.Errorf("%s = %.16g, want %.16g", c.name, got, c.want)
		}
	}
}

// The complete integrals against their defining integrals by gonum's
// Gauss-Legendre rule, also for a negative parameter.
func TestEllipticIntegralsAgainstQuadrature(t *testing.T) {
	for _, m := range []float64{-30, -2, -0.5, 0, 0.1, 0.7, 0.95} {
		w := func(th float64) float64 { return math.Sqrt(1 - m*math.Pow(math.Sin(th), 2)) }
		k := quad.Fixed(func(th float64) float64 { return 1 / w(th) }, 0, math.Pi/2, 200, nil, 0)
		e := quad.Fixed(w, 0, math.Pi/2, 200, nil, 0)
		d := quad.Fixed(func(th float64) float64 { return math.Pow(math.Sin(th), 2) / w(th) }, 0, math.Pi/2, 200, nil, 0)
		near(t, "K", ellipK(m), k, 1e-13)
		near(t, "E", ellipE(m), e, 1e-13)
		near(t, "D", ellipD(m), d, 1e-12)
	}
	for _, m := range []float64{0, 0.3, 0.999} {
		near(t, "K", ellipK(m), mathext.CompleteK(m), 1e-15)
	}
}

// Every function of one number: the slope of the tangent, the derivative as
// code and its second derivative against central differences.
func TestSlopesOfUnaryBuiltins(t *testing.T) {
	e := expr{t}
	for name := range unaries {
		for _, x := range []float64{-0.6, 0.3, 0.8} {
			u := unaries[name]
			if u.outside != nil && u.outside(x) != "" {
				continue
			}
			checkSlopes(t, name, e.call(name, slot(0)), x)
		}
	}
	for _, n := range []float64{-2, 0, 1, 3} {
		checkSlopes(t, "besselJ", e.call("besselJ", Num(n), slot(0)), 1.3)
		checkSlopes(t, "besselY", e.call("besselY", Num(n), slot(0)), 1.3)
	}
	checkSlopes(t, "atan2", e.call("atan2", slot(0), e.sub(Num(0.2), e.pow(slot(0), 2))), -0.7)
	checkSlopes(t, "power", must(t)(Pow(0, slot(0), slot(0))), 1.3)
	checkSlopes(t, "negative base", e.pow(slot(0), -3), -1.3)
	checkSlopes(t, "abs", must(t)(Abs(0, e.sub(slot(0), Num(2)))), 1)
	checkSlopes(t, "ellipD", hidden(0, slot(0)), 0.3)
	checkSlopes(t, "ellipD", hidden(0, slot(0)), -3)
	if d := ellipDSlope(1e-5, ellipD(1e-5)) - (ellipD(2e-5)-ellipD(0))/2e-5; math.Abs(d) > 1e-9 {
		t.Errorf("slope of D near zero is off by %g", d)
	}
}

// checkSlopes compares the derivatives of code of slot 0 at x.
func checkSlopes(t *testing.T, name string, c Code, x float64) {
	t.Helper()
	f := NewFrame(context.Background(), 2, Budget{})
	at := func(c Code, x float64) float64 {
		f.Set(0, Real(x))
		f.Set(1, Real(x))
		v, fault := f.Run(0, c)
		if fault != nil {
			t.Fatalf("%s(%g): %+v", name, x, *fault)
		}
		return v.Re()
	}
	diff := func(c Code) float64 {
		const h = 1e-3
		d := func(h float64) float64 { return (at(c, x+h) - at(c, x-h)) / (2 * h) }
		return (64*d(h) - 20*d(2*h) + d(4*h)) / 45 // error of order h^6
	}
	f.Set(0, Real(x).WithTangent(Real(1)))
	v, fault := f.RunDual(0, c)
	if fault != nil {
		t.Fatalf("%s: %+v", name, *fault)
	}
	d1, err := Derivative(0, 0, slot(1), c)
	if err != nil {
		t.Fatalf("%s: %v", name, err)
	}
	near(t, name+" slope", v.Tangent().Re(), diff(c), 1e-9)
	near(t, name+" derivative", at(d1, x), v.Tangent().Re(), 1e-12)
	d2, err := Derivative(0, 1, slot(0), d1)
	if err != nil {
		t.Fatalf("%s: %v", name, err)
	}
	if want := diff(d1); math.Abs(want) > 1e-9 {
		near(t, name+" second derivative", at(d2, x), want, 1e-8)
	}
}

// The complex forms: derivative along the real and the imaginary direction
// against differences, which also shows that the principal branch is smooth
// there.
func TestSlopesOfComplexBuiltins(t *testing.T) {
	e := expr{t}
	f := NewFrame(context.Background(), 1, Budget{})
	for name, u := range unaries {
		if u.cx == nil {
			continue
		}
		c := e.call(name, Slot(0, Type{Complex: true}))
		for _, z := range []complex128{0.3 + 0.4i, -0.7 + 0.2i, 1.5 - 2i} {
			for _, dir := range []complex128{1, 1i} {
				f.Set(0, Cplx(z).WithTangent(Cplx(dir)))
				v, fault := f.RunDual(0, c)
				if fault != nil {
					t.Fatalf("%s(%v): %+v", name, z, *fault)
				}
				const h = 1e-4
				step := complex(h, 0) * dir
				want := (8*(u.cx(z+step)-u.cx(z-step)) - u.cx(z+2*step) + u.cx(z-2*step)) / complex(12*h, 0)
				if d := cmplx.Abs(v.Tangent().C() - want); d > 1e-9*(1+cmplx.Abs(want)) {
					t.Errorf("%s at %v along %v: %v, want %v", name, z, dir, v.Tangent().C(), want)
				}
			}
		}
	}
}

func TestPhasors(t *testing.T) {
	e := expr{t}
	j := Const(Cplx(1i))
	turn := e.call("exp", e.mul(j, Num(math.Pi)))
	if v := run(t, turn).C(); cmplx.Abs(v+1) > 1e-15 {
		t.Errorf("e^(j pi) = %v", v)
	}
	// 3 V - 4j V: magnitude 5 V, phase -53.13°
	z := Const(Cplx(3 - 4i))
	near(t, "|z|", run(t, must(t)(Abs(0, z))).Re(), 5, 0)
	near(t, "arg z", run(t, e.call("arg", z)).Re(), -0.9272952180016122, 1e-15)
	near(t, "sqrt(-4)", run(t, e.call("sqrt", Const(Cplx(-4)))).Im(), 2, 0)
	// a long line: tanh of a large argument is 1, not NaN
	near(t, "tanh", run(t, e.call("tanh", Const(Cplx(800+3i)))).Re(), 1, 0)
}

func TestFaultsOfDomain(t *testing.T) {
	e := expr{t}
	x := slot(0)
	cases := []struct {
		name string
		code Code
		at   float64
		rule string
	}{
		{"1/x", e.div(Num(1), x), 0, RuleDivision},
		{"vector/x", e.div(Const(Vec(1, 2, 3)), x), 0, RuleDivision},
		{"sqrt", e.call("sqrt", x), -2, RuleShape},
		{"ln", e.call("ln", x), 0, RuleDivision},
		{"ln", e.call("ln", x), -1, RuleShape},
		{"asin", e.call("asin", x), 1.5, RuleShape},
		{"ellipK", e.call("ellipK", x), 1, RuleDivision},
		{"ellipK", e.call("ellipK", x), 2, RuleShape},
		{"besselJ", e.call("besselJ", x, Num(1)), 0.5, RuleShape},
		{"besselY", e.call("besselY", Num(0), x), 0, RuleDivision},
		{"power", e.pow(x, -1), 0, RuleDivision},
		{"power", e.pow(x, 0.5), -1, RuleShape},
		{"inv", e.call("inv", e.mul(x, Const(identity))), 0, RuleDivision},
		{"uniaxial", e.call("uniaxial", x, x, Const(Vec(0, 0, 0))), 1, RuleDivision},
		{"exp", e.call("exp", x), 1000, RuleBudget},
		{"out of the list", must(t)(Cell(0, 2, e.mul(x, Const(ListOf(1, 2))))), 1, RuleTable},
		{"complex zero", must(t)(Abs(0, e.pow(e.mul(x, Const(Cplx(1i))), -2))), 0, RuleDivision},
		{"constant to infinity", must(t)(Integral(0, 1, Num(0), Num(inf), e.pow(x, 2))), 2, RuleDiverges},
		{"not whole", must(t)(Sum(0, 1, Num(0), x, slot(1))), 2.5, RuleShape},
		{"bound that is no number", must(t)(Integral(0, 1, Num(0), e.call("exp", e.mul(Num(1e3), x)), e.pow(slot(1), -2))), 2, RuleDiverges},
		{"lists", e.call("sum", e.mul(Const(ListOf(1, 2)), e.add(x, Const(ListOf(1, 2, 3))))), 1, RuleShape},
	}
	for _, c := range cases {
		f := NewFrame(context.Background(), 2, Budget{})
		f.Set(0, Real(c.at))
		for _, run := range []func(int, Code) (Value, *Fault){f.Run, f.RunDual} {
			if v, fault := run(0, c.code); fault == nil || fault.Rule != c.rule || fault.Message == "" {
				t.Errorf("%s(%g) gives %v, %+v; want %s", c.name, c.at, v.Re(), fault, c.rule)
			}
		}
	}
}

func TestBuiltinsDescribeThemselves(t *testing.T) {
	seen := map[string]bool{}
	for _, s := range Builtins() {
		seen[s.Name] = true
		if s.Doc == "" || len(s.Params) == 0 || len(s.Takes) == 0 || s.Gives == 0 || s.Max >= 0 && s.Max < s.Min {
			t.Errorf("%s is described badly: %+v", s.Name, s)
		}
		if _, err := Builtin(s.Name, 0, lengths(make([]float64, 12)...)); err == nil && s.Max >= 0 {
			t.Errorf("%s takes twelve arguments", s.Name)
		}
	}
	for _, name := range []string{"sqrt", "cbrt", "exp", "ln", "log10", "sin", "cos", "tan", "asin", "acos", "atan", "atan2",
		"sinh", "cosh", "tanh", "abs", "min", "max", "sum", "mean", "dot", "cross", "Re", "Im", "conj", "arg", "diag", "tensor",
		"uniaxial", "rotate", "inv", "trace", "det", "ellipK", "ellipE", "besselJ", "besselY", "erf", "awg"} {
		if !seen[name] {
			t.Errorf("%s is missing", name)
		}
	}
}

func TestTensorsAndLists(t *testing.T) {
	e := expr{t}
	m := Const(Ten([9]float64{2, 0, 1, 0, 3, 0, 1, 0, 4}))
	near(t, "det", run(t, e.call("det", m)).Re(), 21, 0)
	near(t, "trace", run(t, e.call("trace", m)).Re(), 9, 0)
	if got := run(t, e.dot(e.call("inv", m), m)); math.Abs(got.At(0).Re()-1) > 1e-15 || math.Abs(got.At(2).Re()) > 1e-15 {
		t.Errorf("inv(T)·T = %+v", got)
	}
	// calcite, optic axis turned by 90° about y: z becomes x
	u := e.call("uniaxial", Num(8.5), Num(8.0), Const(Vec(0, 0, 2)))
	if got := run(t, u); !got.Equal(Ten([9]float64{8.5, 0, 0, 0, 8.5, 0, 0, 0, 8})) {
		t.Errorf("uniaxial = %+v", got)
	}
	r := run(t, e.call("rotate", u, Const(Vec(0, 1, 0)), Num(math.Pi/2)))
	for i, want := range []float64{8, 0, 0, 0, 8.5, 0, 0, 0, 8.5} {
		if math.Abs(r.At(i).Re()-want) > 1e-14 {
			t.Errorf("rotated component %d is %g, want %g", i, r.At(i).Re(), want)
		}
	}
	// right-handed: x turned by 90° about z is y
	rot := must(t)(rotation(0, Const(Vec(0, 0, 1)), Num(math.Pi/2)))
	if v := run(t, e.dot(rot, Const(Vec(1, 0, 0)))); math.Abs(v.At(1).Re()-1) > 1e-15 {
		t.Errorf("x turns to %+v", v)
	}
	list := Const(CList(3i, 4))
	if got := run(t, must(t)(Abs(0, list))); !got.Equal(ListOf(3, 4)) {
		t.Errorf("|list| = %+v", got)
	}
	if got := run(t, e.call("arg", list)); !got.Equal(ListOf(math.Pi/2, 0)) {
		t.Errorf("arg(list) = %+v", got)
	}
	if got := run(t, must(t)(Cell(0, 1, list))); !got.Equal(Cplx(4)) {
		t.Errorf("cell = %+v", got)
	}
	if got := run(t, e.dot(Const(CTen([9]complex128{1i, 0, 0, 0, 1, 0, 0, 0, 1})), Const(Vec(1, 2, 3)))); !got.Equal(CVec(1i, 2, 3)) {
		t.Errorf("complex tensor on vector = %+v", got)
	}
	if got := run(t, e.call("dot", Const(Vec(1, 2, 3)), Const(Vec(1, 1, 1)))); got.Re() != 6 {
		t.Errorf("dot = %+v", got)
	}
}
