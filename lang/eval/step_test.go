package eval

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

// A jump anywhere, near an end of the range or of a panel too, is integrated to
// 1e-9; so is a layer at either end. At the right end its depth is at least a
// millionth of the range, since the rounding of x blurs thinner ones.
func TestJumpsAndLayersAreNotMissed(t *testing.T) {
	rapid.Check(t, func(r *rapid.T) {
		a := rapid.Float64Range(-100, 100).Draw(r, "a")
		width := rapid.Float64Range(0.1, 100).Draw(r, "width")
		b := a + width
		m := a + width*rapid.Float64Range(0, 1).Draw(r, "at")
		check := func(what string, a, b, want float64, fn func(float64) float64) {
			v, fault := NewFrame(t.Context(), 1, Budget{}).Run(0, must(t)(Integral(0, 0, Num(a), Num(b), fnCode(fn))))
			if fault != nil || math.Abs(v.Re()-want) > 1e-9*math.Abs(want) {
				r.Fatalf("%s: %.15g, want %.15g; fault %+v", what, v.Re(), want, fault)
			}
		}
		check("step", a, b, (m-a)+3*(b-m), func(x float64) float64 {
			if x < m {
				return 1
			}
			return 3
		})
		d := width * math.Pow(10, rapid.Float64Range(-6, 1).Draw(r, "depth"))
		layer := width - math.Expm1(-width/d)
		check("layer on the right", 0, width, layer, func(x float64) float64 { return 1 + math.Exp(-(width-x)/d)/d })
		d *= 1e-6
		layer = width - math.Expm1(-width/d)
		check("layer on the left", 0, width, layer, func(x float64) float64 { return 1 + math.Exp(-x/d)/d })
	})
}
