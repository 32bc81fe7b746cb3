package lang

import (
	"fmt"
	"math"
	"math/rand/v2"
	"strings"
	"testing"
)

// The propagation of distributions by sampling (JCGM 101:2008, 7) is an
// independent way to the standard uncertainty: every input is drawn anew, and
// the whole note is analysed with the drawn numbers in it. The sample standard
// deviation of M draws scatters by 1/√(2M) of itself for a normal output; five
// times that, and the curvature that first order leaves out, which is stated
// for each note, is the tolerance.
func TestUncertaintyAgreesWithSampling(t *testing.T) {
	const draws = 4000
	cases := []struct {
		name, note, result string
		curvature          float64 // relative, of the terms of second order
	}{
		// y = a² + a·b with a in both terms
		{"a shared input", "a = {10.0 0.1 n}\nb = {5.0 ± 0.2}\ns = a*b\ny = a^2 + s", "y", 0.001},
		{"an integral with an uncertain bound", "U = {400 ± 8}\ny = integral(x/(1 + (x/200)^2) for x from 0 to U)", "y", 0.002},
		{"a root", "q = {4.00 0.05 n}\ny = solve(x^3 + x = q for x from 0 to 5)", "y", 0.002},
		{"a reading of a table", "h = {150 ± 10}\ntable t: b [1], g [1]\n    0 0\n    0.5 100\n    0.8 200\n    1.0 300\ny = t.b at g = h", "y", 0.01},
		{"a difference of what is correlated", "a = {10.0 0.1 n}\nb = 2*a + {1.0 0.05 n}\ny = b - a", "y", 0.001},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			rng := rand.New(rand.NewPCG(1, 2))
			stated := analysedValue(t, fillInputs(c.note, nil), c.result)
			sum, squares := 0.0, 0.0
			for range draws {
				y := analysedValue(t, fillInputs(c.note, rng), c.result).Value.Re()
				d := y - stated.Value.Re()
				sum, squares = sum+d, squares+d*d
			}
			sampled := math.Sqrt((squares - sum*sum/draws) / (draws - 1))
			tolerance := 5/math.Sqrt(2*draws) + c.curvature
			if r := stated.Standard/sampled - 1; math.Abs(r) > tolerance {
				t.Errorf("propagated %v, sampled %v: %.2g apart, tolerance %.2g", stated.Standard, sampled, r, tolerance)
			}
		})
	}
}

func analysedValue(t *testing.T, text, name string) *Symbol {
	t.Helper()
	note, err := Analyze(t.Context(), indented(text), Options{})
	if err != nil {
		t.Fatal(err)
	}
	s := note.Lookup(name)
	if s == nil || !s.Known {
		t.Fatalf("%s has no value in\n%s\n%v", name, text, note.Faults)
	}
	return s
}

// fillInputs writes the inputs of a template: `{VALUE ± LIMIT}` is rectangular,
// `{VALUE U n}` is normal; with their spread, or drawn and without one.
func fillInputs(note string, rng *rand.Rand) string {
	for {
		before, rest, found := strings.Cut(note, "{")
		if !found {
			return note
		}
		input, after, _ := strings.Cut(rest, "}")
		var value, spread float64
		normal := strings.HasSuffix(input, " n")
		text := ""
		if _, err := fmt.Sscan(strings.NewReplacer("±", " ", " n", "").Replace(input), &value, &spread); err != nil {
			panic(err)
		}
		switch {
		case rng == nil && normal:
			text = fmt.Sprintf("%g.0(%g)", value, spread)
			if value != math.Trunc(value) {
				text = fmt.Sprintf("%g(%g)", value, spread)
			}
		case rng == nil:
			text = fmt.Sprintf("%g ± %g", value, spread)
		case normal:
			text = fmt.Sprintf("%.15g", value+spread*rng.NormFloat64())
		default:
			text = fmt.Sprintf("%.15g", value+spread*(2*rng.Float64()-1))
		}
		note = before + text + after
	}
}

// The end gauge of JCGM 100:2008, H.1: a length standard compared with another,
// with temperatures and expansions; its published result is l = 50.000838 mm
// with u = 32 nm (H.1.4 and table H.1).
func TestEndGaugeOfTheGuide(t *testing.T) {
	note := `l_s = 50.000623(0.000025) mm
d = 215.0(9.7) nm
α_s = 11.5e-6 K^-1 ± 2e-6 K^-1
θ = -0.1 K
θ_u = 0.00(0.41) K
δα = 0.00(58)e-6 K^-1
δθ = 0.000(0.029) K
l = l_s + d - l_s*(δα*(θ + θ_u) + α_s*δθ) = __ mm`
	l := analysedValue(t, note, "l")
	if got := fmt.Sprintf("%.6f mm, %.0f nm", l.Value.Re()*1e3, l.Standard*1e9); got != "50.000838 mm, 32 nm" {
		t.Errorf("l = %s", got)
	}
}
