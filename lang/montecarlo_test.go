package lang

import (
	"fmt"
	"math"
	"math/rand/v2"
	"os"
	"strconv"
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
			stated := analysedValue(t, fillInputs(c.note, nil), c.result)
			u := sampled(t, c.note, c.result, stated.Value.Re())
			tolerance := 5/math.Sqrt(2*draws) + c.curvature
			if r := stated.Standard/u - 1; math.Abs(r) > tolerance {
				t.Errorf("propagated %v, sampled %v: %.2g apart, tolerance %.2g", stated.Standard, u, r, tolerance)
			}
		})
	}
}

// draws is the number of samples of each note.
const draws = 4000

// sampled is the standard deviation of a result over the draws, which are
// gathered as differences from a value close to their mean.
func sampled(t *testing.T, note, result string, about float64) float64 {
	t.Helper()
	rng := rand.New(rand.NewPCG(1, 2))
	sum, squares := 0.0, 0.0
	for range draws {
		d := analysedValue(t, fillInputs(note, rng), result).Value.Re() - about
		sum, squares = sum+d, squares+d*d
	}
	return math.Sqrt((squares - sum*sum/draws) / (draws - 1))
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
			text = pointed(value) + "(" + pointed(spread) + ")"
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

// pointed writes a number with a decimal point, so that a standard uncertainty
// counts in the unit of the number and not in units of its last digit.
func pointed(x float64) string {
	text := strconv.FormatFloat(x, 'f', -1, 64)
	if !strings.Contains(text, ".") {
		text += ".0"
	}
	return text
}

// endGauge is the end gauge of JCGM 100:2008, H.1: a length standard compared
// with another, with temperatures and expansions (the inputs are in H.1.3).
const endGauge = `l_s = {50.000623 0.000025 n} mm
d = {215.0 9.7 n} nm
α_s = ({11.5 ± 2}) K^-1
θ = -0.1 K
θ_u = {0.00 0.41 n} K
δα = {0.00 0.58 n} K^-1
δθ = {0.000 0.029 n} K
l = l_s + d - l_s*(δα*(θ + θ_u) + α_s*δθ)*1e-6`

// The published result is l = 50.000838 mm with u = 32 nm (H.1.4, H.1.5). What
// first order leaves out, the product of two uncertain zeros, makes 34 nm of it
// (H.1.7): that is what the sampler has to find.
func TestEndGaugeOfTheGuide(t *testing.T) {
	l := analysedValue(t, fillInputs(endGauge, nil), "l")
	if got := fmt.Sprintf("%.6f mm, %.0f nm", l.Value.Re()*1e3, l.Standard*1e9); got != "50.000838 mm, 32 nm" {
		t.Errorf("l = %s", got)
	}
	if u := sampled(t, endGauge, "l", l.Value.Re()); math.Abs(u/34e-9-1) > 5/math.Sqrt(2*draws)+0.5/34 {
		t.Errorf("sampled u = %.3g nm, published 34 nm", u*1e9)
	}
}

// The example of JCGM 100:2008, H.2 is a note of the corpus: correlated means,
// the values and uncertainties of table H.3. Its correlations of the results
// follow from the uncertainty of sums, u²(a + b) = u²(a) + u²(b) + 2r·u(a)·u(b).
func TestCorrelationsOfTheGuide(t *testing.T) {
	note, err := os.ReadFile("../corpus/values/uncertainty.joule")
	if err != nil {
		t.Fatal(err)
	}
	text := string(note) + "\n    RX = R + X\n    RZ = R + Z\n    XZ = X + Z\n"
	n, err := Analyze(t.Context(), text, Options{})
	if err != nil {
		t.Fatal(err)
	}
	u := func(name string) float64 { return n.Lookup(name).Standard }
	for pair, want := range map[string]float64{"RX": -0.588, "RZ": -0.485, "XZ": 0.993} { // JCGM 100:2008, table H.3
		a, b := u(pair[:1]), u(pair[1:])
		if r := (u(pair)*u(pair) - a*a - b*b) / (2 * a * b); math.Abs(r-want) > 5e-4 {
			t.Errorf("r(%s, %s) = %.4f, want %g", pair[:1], pair[1:], r, want)
		}
	}
}
