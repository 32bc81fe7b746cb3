package eval

import (
	"context"
	"math"
	"testing"

	"gonum.org/v1/gonum/interp"
	"pgregory.net/rapid"
)

// A magnetization curve, invented: field strength in A/m, flux density in T.
var (
	fieldH = []float64{0, 50, 100, 200, 400, 800, 1600, 5000}
	fluxB  = []float64{0, 0.12, 0.41, 0.83, 1.15, 1.36, 1.52, 1.71}
	loss   = []float64{5, 4, 4.5, 3, 2, 2, 1, 0.5}
)

func bhTable(t testing.TB, linear bool) *Table {
	tab, err := NewTable("bh", linear, []Column{
		{"H", Const(ListOf(fieldH...))}, {"B", Const(ListOf(fluxB...))}, {"p", Const(ListOf(loss...))},
	})
	if err != nil {
		t.Fatal(err)
	}
	return tab
}

// reader reads column y along column x at a number.
func reader(t testing.TB, tab *Table, y, x int) func(float64) (Value, *Fault) {
	c := must(t)(tab.At(9, y, x, slot(0)))
	f := NewFrame(context.Background(), 1, Budget{})
	return func(at float64) (Value, *Fault) {
		f.Set(0, Real(at).WithTangent(Real(1)))
		return f.RunDual(9, c)
	}
}

// Forward readings, cubic and straight, value and slope, against gonum.
func TestTableAgainstGonum(t *testing.T) {
	var fb interp.FritschButland
	var pl interp.PiecewiseLinear
	for col, ys := range [][]float64{nil, fluxB, loss} {
		if col == 0 {
			continue
		}
		if err := fb.Fit(fieldH, ys); err != nil {
			t.Fatal(err)
		}
		if err := pl.Fit(fieldH, ys); err != nil {
			t.Fatal(err)
		}
		cubic, straight := reader(t, bhTable(t, false), col, 0), reader(t, bhTable(t, true), col, 0)
		for h := 0.0; h <= 5000; h += 7.3 {
			v, _ := cubic(h)
			near(t, "cubic", v.Re(), fb.Predict(h), 1e-14)
			if d := fb.PredictDerivative(h); math.Abs(v.Tangent().Re()-d) > 1e-12*math.Abs(d)+1e-17 {
				t.Errorf("slope at %g: %g, want %g", h, v.Tangent().Re(), d)
			}
			w, _ := straight(h)
			near(t, "straight", w.Re(), pl.Predict(h), 1e-14)
		}
		for i, h := range fieldH {
			v, _ := cubic(h)
			near(t, "row", v.Re(), ys[i], 1e-15)
		}
	}
}

// Reading H at B inverts reading B at H, and so does its slope.
func TestTableReadBackwards(t *testing.T) {
	for _, linear := range []bool{false, true} {
		b, h, p := reader(t, bhTable(t, linear), 1, 0), reader(t, bhTable(t, linear), 0, 1), reader(t, bhTable(t, linear), 2, 1)
		for x := 0.5; x < 5000; x *= 1.1 {
			v, _ := b(x)
			w, fault := h(v.Re())
			if fault != nil {
				t.Fatalf("%+v", *fault)
			}
			near(t, "H(B(H))", w.Re(), x, 1e-11)
			near(t, "dH/dB", w.Tangent().Re(), 1/v.Tangent().Re(), 1e-9)
			direct, _ := reader(t, bhTable(t, linear), 2, 0)(x)
			q, _ := p(v.Re())
			near(t, "p(B(H))", q.Re(), direct.Re(), 1e-10)
		}
	}
}

func TestTableOutsideItsRows(t *testing.T) {
	cases := []struct {
		y, x int
		at   float64
		text string
	}{
		{1, 0, -1, "table bh has no rows for H = -1: its rows run from 0 to 5000"},
		{1, 0, 5000.1, "table bh has no rows for H = 5000.1: its rows run from 0 to 5000"},
		{0, 1, 1.8, "table bh has no rows for B = 1.8: its rows run from 0 to 1.71"},
		{0, 2, 3, "table bh cannot be read along p: this column does not rise or fall all the way"},
	}
	for _, c := range cases {
		_, fault := reader(t, bhTable(t, false), c.y, c.x)(c.at)
		if fault == nil || fault.Rule != RuleTable || fault.Node != 9 || fault.Message != c.text {
			t.Errorf("reading at %g: %+v, want %q", c.at, fault, c.text)
		}
	}
	if v, fault := reader(t, bhTable(t, false), 1, 0)(5000 * (1 + 1e-15)); fault != nil || math.Abs(v.Re()-1.71) > 1e-12 {
		t.Errorf("the last row, missed by rounding: %v %+v", v.Re(), fault)
	}
}

func TestTableRefused(t *testing.T) {
	cols := func(x, y []float64) []Column {
		return []Column{{"x", Const(ListOf(x...))}, {"y", Const(ListOf(y...))}}
	}
	for name, c := range map[string][]Column{
		"no columns": nil, "lengths": cols([]float64{1, 2}, []float64{1}), "no rows": cols(nil, nil),
		"NaN": cols([]float64{1, 2}, []float64{1, math.NaN()}), "no list": {{"x", Num(1)}},
	} {
		if _, err := NewTable("t", false, c); err == nil {
			t.Errorf("%s: not refused", name)
		}
	}
	tab, err := NewTable("t", false, cols([]float64{1, 2, 2, 3}, []float64{1, 2, 3, 4}))
	if err != nil {
		t.Fatal(err)
	}
	if _, fault := reader(t, tab, 1, 0)(1.5); fault == nil || fault.Rule != RuleTable {
		t.Errorf("repeated x: %+v", fault)
	}
	if v, fault := reader(t, tab, 0, 1)(4); fault != nil || v.Re() != 3 {
		t.Errorf("read along the other column: %v %+v", v.Re(), fault)
	}
	one, _ := NewTable("t", false, cols([]float64{4}, []float64{7}))
	if v, fault := reader(t, one, 1, 0)(4); fault != nil || v.Re() != 7 {
		t.Errorf("one row: %v %+v", v.Re(), fault)
	}
}

// ∫H dB along the table is the area under the interpolant: for a straight table
// the trapezium sum, to the last digit; with ∫B dH it makes up the rectangle
// (energy plus coenergy).
func TestIntegralAlongTable(t *testing.T) {
	for _, linear := range []bool{true, false} {
		tab := bhTable(t, linear)
		h, b := must(t)(tab.At(0, 0, 1, slot(0))), must(t)(tab.At(0, 1, 0, slot(0)))
		w := run(t, must(t)(Integral(0, 0, Num(0), Num(1.71), h)), Value{}).Re()
		co := run(t, must(t)(Integral(0, 0, Num(0), Num(5000), b)), Value{}).Re()
		near(t, "energy + coenergy", w+co, 1.71*5000, 1e-9)
		if linear {
			sum := 0.0
			for i := 1; i < len(fieldH); i++ {
				sum += (fieldH[i] + fieldH[i-1]) / 2 * (fluxB[i] - fluxB[i-1])
			}
			near(t, "trapezium", w, sum, 1e-12)
		}
	}
}

// Cells that move: the tangent of a reading against a difference.
func TestTableTangentByCells(t *testing.T) {
	cell := slot(0)
	e := expr{t}
	scaled := func(xs []float64, by Code) Code { return e.mul(Const(ListOf(xs...)), by) }
	bump := Const(ListOf(0, 0, 0, 1, 0, 0, 0, 0))
	for _, yx := range [][2]int{{1, 0}, {0, 1}, {2, 1}} {
		tab, err := NewTable("bh", false, []Column{
			{"H", e.add(Const(ListOf(fieldH...)), e.mul(bump, e.sub(cell, Num(1))))},
			{"B", e.add(scaled(fluxB, cell), e.mul(bump, e.sub(cell, Num(1))))},
			{"p", scaled(loss, e.pow(cell, 2))},
		})
		if err != nil {
			t.Fatal(err)
		}
		for _, at := range []float64{0.7, 0.9, 1.1} {
			if yx[1] == 0 {
				at *= 200
			}
			c := must(t)(tab.At(0, yx[0], yx[1], Num(at)))
			f := NewFrame(context.Background(), 1, Budget{})
			val := func(x float64) float64 {
				f.Set(0, Real(x))
				v, fault := f.Run(0, c)
				if fault != nil {
					t.Fatalf("%+v", *fault)
				}
				return v.Re()
			}
			const h = 1e-4
			want := (8*(val(1+h)-val(1-h)) - val(1+2*h) + val(1-2*h)) / (12 * h)
			f.Set(0, Real(1).WithTangent(Real(1)))
			v, _ := f.RunDual(0, c)
			near(t, "tangent", v.Tangent().Re(), want, 1e-7)
		}
	}
}

// Derivatives of readings as code, to the third, against differences.
func TestTableDerivatives(t *testing.T) {
	for _, yx := range [][2]int{{1, 0}, {0, 1}, {2, 1}, {1, 1}} {
		tab := bhTable(t, false)
		c := must(t)(tab.At(0, yx[0], yx[1], slot(0)))
		x := 1.0
		if yx[1] == 0 {
			x = 250
		}
		for range 3 {
			d := must(t)(Derivative(0, 0, slot(0), c))
			f := NewFrame(context.Background(), 1, Budget{})
			at := func(x float64) float64 { f.Set(0, Real(x)); v, _ := f.Run(0, c); return v.Re() }
			h := 1e-3 * x
			want := (8*(at(x+h)-at(x-h)) - at(x+2*h) + at(x-2*h)) / (12 * h)
			if got := run(t, d, Real(x)).Re(); math.Abs(got-want) > 1e-7*math.Abs(want)+1e-9 {
				t.Errorf("derivative of %v: %g, want %g", yx, got, want)
			}
			c = d
		}
	}
}

func TestLoopArea(t *testing.T) {
	// a unit square far away, both ways round, and a triangle
	far := 1e9
	x, y := []float64{far, far + 1, far + 1, far}, []float64{0, 0, 1, 1}
	for _, r := range []bool{false, true} {
		if r {
			x[1], x[3], y[1], y[3] = x[3], x[1], y[3], y[1]
		}
		l := lists(x, y)
		near(t, "square", run(t, must(t)(Loop(0, l[0], l[1]))).Re(), 1, 1e-15)
	}
	l := lists([]float64{0, 4, 0}, []float64{0, 0, 3})
	near(t, "triangle", run(t, must(t)(Loop(0, l[0], l[1]))).Re(), 6, 1e-15)
}

// On monotone data the cubic stays between neighbouring cells, rises all the
// way (but for rounding), and is inverted by reading it backwards.
func TestMonotoneCubicIsMonotone(t *testing.T) {
	rapid.Check(t, func(r *rapid.T) {
		n := rapid.IntRange(2, 9).Draw(r, "rows")
		step := rapid.Float64Range(1e-3, 1e3)
		xs, ys := make([]float64, n), make([]float64, n)
		for i := 1; i < n; i++ {
			xs[i], ys[i] = xs[i-1]+step.Draw(r, "dx"), ys[i-1]+step.Draw(r, "dy")
		}
		tab, err := NewTable("t", false, []Column{{"x", Const(ListOf(xs...))}, {"y", Const(ListOf(ys...))}})
		if err != nil {
			r.Fatal(err)
		}
		forward, back := reader(t, tab, 1, 0), reader(t, tab, 0, 1)
		last := math.Inf(-1)
		for k := range 50 {
			x := xs[n-1] * float64(k) / 49
			v, fault := forward(x)
			if fault != nil || v.Re() < last-1e-14*ys[n-1] || v.Tangent().Re() < -1e-9 {
				r.Fatalf("at %g: %g after %g, slope %g, %+v", x, v.Re(), last, v.Tangent().Re(), fault)
			}
			last = v.Re()
			w, fault := back(v.Re())
			again, _ := forward(w.Re())
			if fault != nil || math.Abs(again.Re()-v.Re()) > 1e-12*ys[n-1]+8*epsilon*x*v.Tangent().Re() {
				r.Fatalf("y(x(%g)) = %g, %+v", v.Re(), again.Re(), fault)
			}
		}
	})
}
