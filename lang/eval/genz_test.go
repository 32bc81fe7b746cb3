package eval

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

// The families of A. Genz, "Testing multidimensional integration routines"
// (1984), in one dimension with random difficulty: what converges is right to
// 1e-9 of the integral of the magnitude. Closed forms on [0, 1].
func TestGenzFamilies(t *testing.T) {
	families := []struct {
		name string
		fn   func(c, w, x float64) float64
		want func(c, w float64) float64
	}{
		{"oscillatory", func(c, w, x float64) float64 { return math.Cos(2*math.Pi*w + c*x) },
			func(c, w float64) float64 { return 2 / c * math.Sin(c/2) * math.Cos(2*math.Pi*w+c/2) }},
		{"peak", func(c, w, x float64) float64 { return 1 / (1/(c*c) + (x-w)*(x-w)) },
			func(c, w float64) float64 { return c * (math.Atan(c*(1-w)) + math.Atan(c*w)) }},
		{"corner peak", func(c, _, x float64) float64 { return math.Pow(1+c*x, -2) },
			func(c, _ float64) float64 { return 1 / (1 + c) }},
		{"Gaussian", func(c, w, x float64) float64 { return math.Exp(-c * c * (x - w) * (x - w)) },
			func(c, w float64) float64 { return math.Sqrt(math.Pi) / (2 * c) * (math.Erf(c*(1-w)) + math.Erf(c*w)) }},
		{"continuous", func(c, w, x float64) float64 { return math.Exp(-c * math.Abs(x-w)) },
			func(c, w float64) float64 { return -(math.Expm1(-c*w) + math.Expm1(-c*(1-w))) / c }},
		{"discontinuous", func(c, w, x float64) float64 {
			if x > w {
				return 0
			}
			return math.Exp(c * x)
		}, func(c, w float64) float64 { return math.Expm1(c*w) / c }},
	}
	for _, fam := range families {
		rapid.Check(t, func(r *rapid.T) {
			c := math.Pow(10, rapid.Float64Range(-2, 2.5).Draw(r, "c"))
			w := rapid.Float64Range(0.02, 0.98).Draw(r, "w")
			size := 0.0
			g := must(t)(Integral(0, 0, Num(0), Num(1), fnCode(func(x float64) float64 {
				y := fam.fn(c, w, x)
				size = max(size, math.Abs(y))
				return y
			})))
			v, fault := NewFrame(t.Context(), 1, Budget{}).Run(0, g)
			want := fam.want(c, w)
			if fault != nil {
				r.Fatalf("%s(%g, %g): %+v", fam.name, c, w, *fault)
			}
			if math.Abs(v.Re()-want) > 1e-9*math.Abs(want)+2e-13*size {
				r.Fatalf("%s(%g, %g) = %.15g, want %.15g", fam.name, c, w, v.Re(), want)
			}
		})
	}
}
