package eval

import (
	"context"
	"math"
	"testing"
	"time"
)

func benchCode(b *testing.B, c Code) {
	f := NewFrame(context.Background(), 30, Budget{Steps: math.MaxInt64, Time: time.Hour})
	f.Set(7, Real(3))
	f.Set(8, Ten([9]float64{2, 0, 0, 0, 3, 0, 0, 0, 4}))
	if _, fault := f.Run(0, c); fault != nil {
		b.Fatalf("%+v", *fault)
	}
	b.ReportAllocs()
	for b.Loop() {
		c.Real(f)
	}
}

func BenchmarkFastCodes(b *testing.B) {
	for name, c := range fastCodes(b) {
		b.Run(name, func(b *testing.B) { benchCode(b, c) })
	}
}

// The same quadrature written by hand: three nested 7-15 Kronrod rules with the
// same error estimate and the same look at the ends, on a Go function.
func BenchmarkSmoothBoxByHand(b *testing.B) {
	b.ReportAllocs()
	for b.Loop() {
		v := byHand(0, 1, func(x float64) float64 {
			return byHand(0, 1, func(y float64) float64 {
				return byHand(0, 1, func(z float64) float64 { return math.Exp(-(x*x + y*y)) * math.Cos(z+x*y) })
			})
		})
		if math.Abs(v-smoothBox) > 1e-9 {
			b.Fatal(v)
		}
	}
}

// smoothBox is the integral of smooth3 over the unit cube, from the run by hand.
var smoothBox = byHand(0, 1, func(x float64) float64 {
	return byHand(0, 1, func(y float64) float64 {
		return byHand(0, 1, func(z float64) float64 { return math.Exp(-(x*x + y*y)) * math.Cos(z+x*y) })
	})
})

// byHand integrates a smooth function with one panel.
func byHand(a, b float64, fn func(float64) float64) float64 {
	var fx [panelSize]float64
	c, h := a+(b-a)/2, (b-a)/2
	for i, t := range kronrodNodes {
		fx[i] = fn(c + h*t)
	}
	sum, err, abs := panelSum(h, fx[:])
	d := (1 - kronrodNodes[panelSize-1]) * h
	left, right := edgeValues(fx[:])
	for _, off := range [2]float64{fn(a) - left, fn(b) - right} {
		if off = d * math.Abs(off); off > 1e-10*abs {
			err += off
		}
	}
	if err > 1e-9*math.Abs(sum) {
		panic("not smooth enough for one panel")
	}
	return sum
}

func BenchmarkAssemblyEnergy10000(b *testing.B) {
	q, x, y, z := rockSalt(11)
	for len(q) > 10000 {
		q, x, y, z = q[1:], x[1:], y[1:], z[1:]
	}
	l := lists(q, x, y, z)
	benchCode(b, must(b)(AssemblyEnergy(0, l[0], l[1], l[2], l[3], slot(7))))
}

func BenchmarkTableReading(b *testing.B) {
	for name, yx := range map[string][2]int{"forward": {1, 0}, "backward": {0, 1}} {
		tab := bhTable(b, false)
		c := must(b)(tab.At(0, yx[0], yx[1], expr{b}.mul(Num(0.4), slot(7))))
		b.Run(name, func(b *testing.B) { benchCode(b, c) })
	}
}

func BenchmarkPropagate(b *testing.B) {
	e := expr{b}
	f := NewFrame(context.Background(), 3, Budget{Steps: math.MaxInt64, Time: time.Hour})
	var in []Uncertain
	for i := range 3 {
		f.Set(i, Real(2))
		in = append(in, Uncertain{i, Gradient{{i, Real(1)}}})
	}
	c := e.div(e.mul(Num(0.5), slot(0), e.pow(slot(1), 2)), e.call("sqrt", slot(2)))
	b.ReportAllocs()
	for b.Loop() {
		Propagate(f, 0, c, in)
	}
}

func BenchmarkCompile(b *testing.B) {
	e := expr{b}
	b.ReportAllocs()
	for b.Loop() {
		smooth3(e)
	}
}
