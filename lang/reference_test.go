package lang

import (
	"fmt"
	"math"
	"math/big"
	"strings"
	"testing"

	"gonum.org/v1/gonum/integrate/quad"
	"gonum.org/v1/gonum/interp"
	"gonum.org/v1/gonum/mathext"
)

// Whole notes, as a person would write them, against general-purpose libraries:
// special functions by their integrals, lattice sums with 200 bits, tables.

// values analyses one note of many expressions and gives their values.
func values(t *testing.T, head string, exprs []string) []float64 {
	t.Helper()
	text := head
	for i, x := range exprs {
		text += fmt.Sprintf("\nv_%d = %s", i, x)
	}
	n, err := Analyze(t.Context(), indented(text), Options{})
	if err != nil {
		t.Fatal(err)
	}
	out := make([]float64, len(exprs))
	for i, x := range exprs {
		s := n.Lookup(fmt.Sprintf("v_%d", i))
		if s == nil || !s.Known {
			t.Fatalf("%s has no value: %+v", x, told(n, nil))
		}
		out[i] = s.Value.Re()
	}
	return out
}

// The language promises 1e-9 relative for an integral and for a root; what is
// divided by a gamma function of the same promise may have twice that.
func TestIntegralsOfNotesAgainstGonum(t *testing.T) {
	g := func(a float64) string { return fmt.Sprintf("integral(s^(%g - 1)*exp(-s) for s from 0 to inf)", a) }
	var exprs []string
	var want []float64
	add := func(w float64, form string, args ...any) {
		exprs, want = append(exprs, fmt.Sprintf(form, args...)), append(want, w)
	}
	for _, m := range []float64{0.01, 0.3, 0.9, 0.999} { // DLMF 19.2.8
		add(mathext.CompleteK(m), "integral(1/sqrt(1 - %g*sin(s)^2) for s from 0 to pi/2)", m)
		add(mathext.CompleteE(m), "integral(sqrt(1 - %g*sin(s)^2) for s from 0 to pi/2)", m)
		add(mathext.CompleteK(m), "ellipK(%g)", m)
		add(mathext.CompleteE(m), "ellipE(%g)", m)
		for _, phi := range []float64{0.4, 1.3} { // DLMF 19.2.4, 19.2.5
			add(mathext.EllipticF(phi, m), "integral(1/sqrt(1 - %g*sin(s)^2) for s from 0 to %g)", m, phi)
			add(mathext.EllipticE(phi, m), "integral(sqrt(1 - %g*sin(s)^2) for s from 0 to %g)", m, phi)
		}
	}
	for _, x := range []float64{0.2, 1, 6} {
		for _, a := range []float64{0.5, 2.3} { // DLMF 8.2.4; singular at 0 for a < 1
			add(mathext.GammaIncReg(a, x), "integral(s^(%g - 1)*exp(-s) for s from 0 to %g)/%s", a, x, g(a))
		}
		// DLMF 9.6.2 and 10.32.9
		z := 2.0 / 3 * math.Pow(x, 1.5)
		add(real(mathext.AiryAi(complex(x, 0))), "sqrt(%g/3)/pi*integral(exp(-%.17g*cosh(s))*cosh(s/3) for s from 0 to inf)", x, z)
		// DLMF 5.9.12
		add(mathext.Digamma(x), "integral(exp(-s)/s - exp(-%g*s)/(1 - exp(-s)) for s from 0 to inf)", x)
	}
	for _, x := range []float64{0.1, 0.5, 0.95} {
		add(mathext.RegIncBeta(0.5, 1.5, x), "integral(s^-0.5*(1 - s)^0.5 for s from 0 to %g)/integral(s^-0.5*(1 - s)^0.5 for s from 0 to 1)", x)
		add(real(mathext.Li2(complex(x, 0))), "-integral(ln(1 - %g*s)/s for s from 0 to 1)", x) // DLMF 25.12.2
		// DLMF 15.6.1 with a = 0.3, b = 1.5, c = 2.5
		add(mathext.Hypergeo(0.3, 1.5, 2.5, x), "integral(s^0.5*(1 - %g*s)^-0.3 for s from 0 to 1)/integral(s^0.5 for s from 0 to 1)", x)
		add(mathext.NormalQuantile(x), "solve(1/2*(1 + erf(s/sqrt(2))) = %g for s from -9 to 9)", x)
	}
	for _, q := range []float64{0.25, 1, 7} { // DLMF 25.11.25
		add(mathext.Zeta(3.5, q), "integral(s^2.5*exp(-%g*s)/(1 - exp(-s)) for s from 0 to inf)/%s", q, g(3.5))
	}
	for n := range 4 { // DLMF 10.9.2
		for _, x := range []float64{0.5, 5, 30} {
			add(math.Jn(n, x), "integral(cos(%d*s - %g*sin(s)) for s from 0 to pi)/pi", n, x)
			add(math.Jn(n, x), "besselJ(%d, %g)", n, x)
		}
	}
	for i, got := range values(t, "", exprs) {
		if math.Abs(got-want[i]) > 2e-9*math.Abs(want[i]) {
			t.Errorf("%s = %.16g, want %.16g", exprs[i], got, want[i])
		}
	}
}

// Cubes of the lattices of rock salt and of caesium chloride, by three sums
// each, against the same sums with 200 bits. Every term is off by a few units
// of its last place, and the sums lose nothing: 8·2^-53 of the sum of magnitudes.
func TestLatticeSumsOfNotesAgainstBigFloat(t *testing.T) {
	const cube = "sum(sum(sum(f(a, b, c) for c from %[1]d to %[2]d) for b from %[1]d to %[2]d) for a from 1 to %[2]d)" +
		" + sum(sum(f(0, b, c) for c from %[1]d to %[2]d) for b from 1 to %[2]d) + sum(f(0, 0, c) for c from 1 to %[2]d)"
	cases := []struct {
		name, f string
		term    func(i, j, k int) *big.Float
	}{
		{"rock salt", "f(a, b, c) = (-1)^(a + b + c)/sqrt(a^2 + b^2 + c^2)", func(i, j, k int) *big.Float {
			return inverseDistance(1-2*((i+j+k)&1), big.NewFloat(0), i, j, k)
		}},
		{"caesium chloride", "f(a, b, c) = 1/sqrt(a^2 + b^2 + c^2) - 1/sqrt((a - 1/2)^2 + (b - 1/2)^2 + (c - 1/2)^2)", func(i, j, k int) *big.Float {
			r := inverseDistance(1, big.NewFloat(0), i, j, k)
			return r.Sub(r, inverseDistance(1, big.NewFloat(0.5), i, j, k))
		}},
	}
	for _, c := range cases {
		for _, n := range []int{1, 4, 9} {
			got := values(t, c.f, []string{fmt.Sprintf(cube, -n, n)})[0]
			want, size := new(big.Float).SetPrec(200), 0.0
			for i := 0; i <= n; i++ {
				for j := -n; j <= n; j++ {
					for k := -n; k <= n; k++ {
						if i > 0 || j > 0 || j == 0 && k > 0 {
							term := c.term(i, j, k)
							v, _ := term.Float64()
							want, size = want.Add(want, term), size+math.Abs(v)
						}
					}
				}
			}
			if w, _ := want.Float64(); math.Abs(got-w) > 8*size*0x1p-53 {
				t.Errorf("%s, cube of %d: %.17g, want %.17g", c.name, n, got, w)
			}
		}
	}
}

// inverseDistance is c/|(i, j, k) − (s, s, s)|.
func inverseDistance(c int, s *big.Float, i, j, k int) *big.Float {
	b := func(v float64) *big.Float { return new(big.Float).SetPrec(200).SetFloat64(v) }
	r2 := b(0)
	for _, x := range []int{i, j, k} {
		d := b(float64(x))
		d.Sub(d, s)
		r2.Add(r2, d.Mul(d, d))
	}
	q := b(float64(c))
	return q.Quo(q, r2.Sqrt(r2))
}

// An assembly of ions as a table with units against 200 bits, energy and
// potential: Evjen's neutral cube would hide errors behind its symmetry, so the
// charges and places are uneven.
func TestChargesOfNotesAgainstBigFloat(t *testing.T) {
	b := func(text string) *big.Float {
		v, _, err := big.ParseFloat(text, 10, 200, big.ToNearestEven)
		if err != nil {
			t.Fatal(err)
		}
		return v
	}
	var rows [][4]string
	for i := range 60 {
		rows = append(rows, [4]string{fmt.Sprint(float64(i*i%7-3) + 0.5), fmt.Sprint(i % 4), fmt.Sprint(i / 4 % 4), fmt.Sprintf("%d.%d", i/16, i%10)})
	}
	head := "table ions: q [nC], x [mm], y [mm], z [mm]"
	for _, r := range rows {
		head += "\n    " + strings.Join(r[:], " ")
	}
	got := values(t, head, []string{"assembly_energy(ions.q, ions.x, ions.y, ions.z)", "potential(ions.q, ions.x, ions.y, ions.z, (0.5, 0.5, 9) mm)"})
	k := b("1").Quo(b("1"), b("1").Mul(b("3.14159265358979323846264338327950288419716939937510582097494459"), b("4").Mul(b("4"), b("8.8541878188e-12"))))
	over := func(p, q [4]string) *big.Float {
		r2 := b("0")
		for c := 1; c < 4; c++ {
			d := b("0").Sub(b(p[c]), b(q[c]))
			d.Mul(d, b("1e-3"))
			r2.Add(r2, d.Mul(d, d))
		}
		return b("1").Quo(b("1"), r2.Sqrt(r2))
	}
	energy, potential, sizes := b("0"), b("0"), [2]float64{}
	for i, p := range rows {
		q := b("0").Mul(b(p[0]), b("1e-9"))
		for _, other := range rows[:i] {
			add(energy, &sizes[0], b("0").Mul(b("0").Mul(q, k), b("0").Mul(b("0").Mul(b(other[0]), b("1e-9")), over(p, other))))
		}
		add(potential, &sizes[1], b("0").Mul(b("0").Mul(q, k), over(p, [4]string{"", "0.5", "0.5", "9"})))
	}
	for i, w := range []*big.Float{energy, potential} {
		// the cells are read as binary numbers: some ten roundings a term
		if want, _ := w.Float64(); math.Abs(got[i]-want) > 16*sizes[i]*0x1p-53 {
			t.Errorf("%d: %.17g, want %.17g", i, got[i], want)
		}
	}
}

// add adds a term to a sum and its magnitude to a size.
func add(sum *big.Float, size *float64, term *big.Float) {
	v, _ := term.Float64()
	*size += math.Abs(v)
	sum.Add(sum, term)
}

// Readings of a table, their slope and the area under them, in the units of the
// note, against gonum's Fritsch–Butland and straight interpolants.
func TestTablesOfNotesAgainstGonum(t *testing.T) {
	hs := []float64{0, 50, 100, 200, 400, 800, 1600, 5000}
	bs := []float64{0, 120, 410, 830, 1150, 1360, 1520, 1710}
	head := "table bh%s: H [A/m], B [mT]"
	for i := range hs {
		head += fmt.Sprintf("\n    %g %g", hs[i], bs[i])
	}
	var cubic interp.FritschButland
	var straight interp.PiecewiseLinear
	if err := cubic.Fit(hs, bs); err != nil {
		t.Fatal(err)
	}
	if err := straight.Fit(hs, bs); err != nil {
		t.Fatal(err)
	}
	for word, p := range map[string]interp.Predictor{"": &cubic, ", linear": &straight} {
		var exprs []string
		var want []float64
		area := 0.0
		for i := 1; i < len(hs); i++ {
			area += quad.Fixed(p.Predict, hs[i-1], hs[i], 4, nil, 0) // exact for a cubic
			exprs, want = append(exprs, fmt.Sprintf("integral(bh.B for bh.H from 0 A/m to %g A/m)", hs[i])), append(want, area*1e-3)
			for _, part := range []float64{0.1, 0.37, 0.8} {
				h := hs[i-1] + part*(hs[i]-hs[i-1])
				exprs, want = append(exprs, fmt.Sprintf("bh.B at H = %.17g A/m", h)), append(want, p.Predict(h)*1e-3)
				if word == "" {
					exprs = append(exprs, fmt.Sprintf("derivative(bh.B at H = h for h at %.17g A/m)", h))
					want = append(want, cubic.PredictDerivative(h)*1e-3)
				}
			}
		}
		for i, got := range values(t, fmt.Sprintf(head, word), exprs) {
			if math.Abs(got-want[i]) > 1e-9*want[i] {
				t.Errorf("%q: %s = %.16g, want %.16g", word, exprs[i], got, want[i])
			}
		}
	}
}
