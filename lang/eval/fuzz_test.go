package eval

import (
	"context"
	"math"
	"testing"
	"time"
)

// FuzzIntegral integrates odd bodies between odd bounds: steps, poles, noise,
// NaN and infinities at places that the fuzzer chooses. It must end, must not
// give a value that is not finite without a fault, and where the body is a step
// or a power must be right or fault.
func FuzzIntegral(f *testing.F) {
	for kind := range uint8(10) {
		f.Add(kind, 0.0, 1.0, 0.3, 2.0)
		f.Add(kind, -1.0, math.Inf(1), 0.0, -0.5)
		f.Add(kind, 1e-9, 1e9, 1e-3, 1e3)
		f.Add(kind, math.NaN(), 0.0, math.Inf(-1), 0.0)
	}
	f.Fuzz(func(t *testing.T, kind uint8, a, b, p, q float64) {
		body := fnCode(oddBody(kind, p, q))
		c := must(t)(Integral(1, 0, Num(a), Num(b), body))
		fr := NewFrame(context.Background(), 1, Budget{Steps: 3e7, Time: 5 * time.Second})
		v, fault := fr.Run(1, c)
		if fault == nil && !v.Finite() {
			t.Fatalf("kind %d from %g to %g (%g, %g) gives %g", kind, a, b, p, q, v.Re())
		}
		if len(fr.marks) != 0 || fr.level != 0 || fr.depth != 0 {
			t.Fatalf("the frame is left at level %d, depth %d with %d marks", fr.level, fr.depth, len(fr.marks))
		}
		want, ok := oddIntegral(kind, a, b, p, q)
		if fault == nil && ok && math.Abs(v.Re()-want) > 1e-8*math.Abs(want)+1e-300 {
			t.Errorf("kind %d from %g to %g (%g, %g) = %.12g, want %.12g", kind, a, b, p, q, v.Re(), want)
		}
	})
}

func oddBody(kind uint8, p, q float64) func(float64) float64 {
	switch kind % 10 {
	case 0: // a step at p
		return func(x float64) float64 {
			if x < p {
				return 1
			}
			return 3
		}
	case 1:
		return func(x float64) float64 { return math.Pow(math.Abs(x-p), q) }
	case 2:
		return func(x float64) float64 { return 1 / (x - p) }
	case 3: // no value beyond p
		return func(x float64) float64 { return math.Sqrt(p - x) }
	case 4:
		return func(x float64) float64 { return math.Exp(q * x) }
	case 5:
		return func(x float64) float64 { return math.Sin(q * x) }
	case 6: // infinite at one place
		return func(x float64) float64 {
			if x == p {
				return math.Inf(1)
			}
			return q
		}
	case 7: // noise
		return func(x float64) float64 { return math.Mod(math.Abs(x)*1e9+p, 1) }
	case 8:
		return func(x float64) float64 { return math.Floor(q*x) * p }
	}
	return func(float64) float64 { return p }
}

// oddIntegral is the integral of the bodies of which it is known in closed form
// without cancellation.
func oddIntegral(kind uint8, a, b, p, q float64) (float64, bool) {
	if !(a < b) || b-a < 1e-6*math.Abs(a) || b-a > 1e3 || math.Abs(a) > 1e3 || a == 0 && b == 0 {
		return 0, false
	}
	switch kind % 10 {
	case 0:
		m := min(max(p, a), b)
		return (m - a) + 3*(b-m), !math.IsNaN(p)
	case 1:
		if q <= -0.9 || q > 20 || p != a {
			return 0, false
		}
		return math.Pow(b-a, q+1) / (q + 1), true
	case 9:
		return p * (b - a), isFinite(p*(b-a)) && math.Abs(p) > 1e-200
	}
	return 0, false
}
