package lang

import (
	"context"
	"fmt"
	"io/fs"
	"slices"
	"strings"
	"testing"
)

// files gives the notes that a note of a test refers to.
type files map[string]string

func (f files) Read(_ context.Context, path string) (string, error) {
	if text, ok := f[path]; ok {
		return text, nil
	}
	return "", fs.ErrNotExist
}

// A case is a note and what the analysis makes of it: `NAME = SHOWN` for values,
// `RULE "MARKED TEXT"` for findings, advice left out. Values are worked out by
// hand where the comment names no other source.
type analysisCase struct {
	name string
	note string
	want []string
}

func TestAnalysis(t *testing.T) {
	other := files{
		"inputs.joule":     "Inputs\n\n    U_n, static voltage = 24 kV\n    bad = missing*2\n",
		"back.joule":       "Back\n\n    uses \"main.joule\"\n    x_b = 1\n",
		"data/cv.csv":      "v [V],C_d [uF]\n0,10\n100,8\n200,5\n",
		"data/ragged.csv":  "v [V],C_d [uF]\n0,10\n100\n",
		"media/oils.joule": "Oils\n\n    medium oil: linear, isotropic\n        eps_r = 2.2 per \"sheet 1\"\n",
	}
	for _, c := range slices.Concat(valueCases(), statementCases(), faultCases()) {
		t.Run(c.name, func(t *testing.T) {
			note, err := Analyze(t.Context(), indented(c.note), Options{Path: "main.joule", Files: other})
			if err != nil {
				t.Fatal(err)
			}
			got := told(note, c.want)
			if want := slices.Sorted(slices.Values(c.want)); !slices.Equal(got, want) {
				t.Errorf("got\n  %s\nwant\n  %s", strings.Join(got, "\n  "), strings.Join(want, "\n  "))
			}
		})
	}
}

// indented makes calculation of the lines.
func indented(lines string) string {
	return "Note\n\n    " + strings.ReplaceAll(strings.TrimSpace(lines), "\n", "\n    ") + "\n"
}

// told lists the values that are asked for in want, and all findings.
func told(n *Note, want []string) []string {
	var out []string
	for _, w := range want {
		name, _, isValue := strings.Cut(w, " = ")
		if !isValue || strings.Contains(name, `"`) {
			continue
		}
		shown := "unknown"
		if s := n.Lookup(CanonicalName(name)); s != nil && s.Known {
			shown = s.Shown
		}
		out = append(out, name+" = "+shown)
	}
	for _, f := range n.Faults {
		if f.Severity > Advice {
			out = append(out, fmt.Sprintf("%s %q", f.Rule, n.Script.Source.Text[f.Span.Start:f.Span.End]))
		}
	}
	slices.Sort(out)
	return out
}

func valueCases() []analysisCase {
	return []analysisCase{
		{"a quotient with units", "E = 12 kV / 3 mm", []string{"E = 4.000 MV/m"}},
		{"any order", "W = 1/2*C*U^2 = __ J\nC = 470 uF\nU = 400 V", []string{"W = 37.60 J"}},
		{"Greek twins", "ε_x = 2\ny = eps_x + epsilon_x", []string{"y = 4.000"}},
		{"subscript digits", "x₀ = 2\ny = 3*x_0", []string{"y = 6.000"}},
		{"superscripts", "a = 2 m\nb = a² = __ m²", []string{"b = 4.000 m²"}},
		{"superscripts with a sign", "a = 2 m\nb = (a + a)⁻¹ = __ m^-1\nc = 2 V²\nd = c⁰", []string{"b = 0.2500 m^-1", "d = 1.000"}},
		{"precedence of powers", "a = -2^2\nb = 2^3^2", []string{"a = -4.000", "b = 512.0"}},
		{"a dot and a cross product", "a = (1, 2, 3)\nb = (4, 5, 6)\nc = a·b\nd = a×b", []string{"c = 32.00", "d = (-3.000, 6.000, -3.000)"}},
		{"the triple product", "a = (1, 2, 3)\nb = (4, 5, 6)\nc = (7, 8, 10)\nv = a·b×c", []string{"v = -3.000"}},
		{"components and magnitude", "a = (3, 0, 4) kV/mm\nx = a.x = __ kV/mm\nm = |a| = __ kV/mm", []string{"x = 3.000 kV/mm", "m = 5.000 kV/mm"}},
		{"a tensor on a vector", "T = tensor(1, 2, 3, 4, 5, 6, 7, 8, 10)\nv = T*(1, 0, 2)\nq = T.xz", []string{"v = (7.00, 16.00, 27.00)", "q = 3.000"}},
		{"a turned tensor", "T = rotate(diag(1, 2, 3), (0, 0, 1), 90°)", []string{"T = diag(2.000, 1.000, 3.000)"}},
		{"the inverse and the determinant", "T = diag(2, 4, 5)\na = inv(T)\nb = det(T)\nc = trace(T)", []string{"a = diag(0.5000, 0.2500, 0.2000)", "b = 40.00", "c = 11.00"}},
		{"a complex number", "Z = (3 + 4*j) ohm\nm = |Z|\nφ = arg(Z) = __ °\nc = conj(Z)", []string{"m = 5.000 Ω", "φ = 53.13 °", "c = (3.000 - 4.000*j) Ω"}},
		{"an angle in degrees reaches a sine", "s = sin(30°)", []string{"s = 0.5000"}},
		{"hertz and radians", "f = 50 Hz\nω = 2*pi*f", []string{"ω = 314.2 rad/s"}},
		{"per cent and quotients of units", "a = 5 %\nb = 200*a\nc = 3 mm/2 m", []string{"b = 10.00", "c = 0.001500"}},
		{"temperatures", "T = 25 °C\nT_2 = T + 5 K = __ °C\nd = T_2 - T", []string{"T_2 = 30.00 °C", "d = 5.000 K"}},
		// SI Brochure, 9th ed., 2.3.1: a difference has the same number in °C and in K.
		{"a rise in degrees Celsius", "d, temperature rise = 15 °C ± 2 °C\ne, temperature rise = d + 5 K = 20 °C = __ °C", []string{"d = 15.0(12) °C", "e = 20.0(12) °C"}},
		{"a difference of a Celsius and a kelvin temperature", "T = 85 °C\nT_2, temperature = 300 K\nd = T - T_2\ne = T_2 - T", []string{"d = 58.15 K", "e = -58.15 K"}},
		// 0 dBm is 1 mW (ITU-R V.574-5, 1.1); 60 dBuV is 1 mV.
		{"levels", "P, power = 30 dBm = __ W\nU, voltage = 60 dBuV = __ mV\nG, power gain = 3 dB\nr = G*1", []string{"P = 1.000 W", "U = 1.000 mV", "r = 1.995"}},
		// 1 G = 1e-4 T, 1 Oe = 1000/(4π) A/m: NIST SP 811, B.8.
		{"Gaussian units", "B = 5000 G = __ mT\nH = 1 Oe = __ A/m", []string{"B = 500.0 mT", "H = 79.58 A/m"}},
		// AWG 18 is 1.024 mm: ASTM B258-14, table 1.
		{"a wire gauge", "d = awg(18) = __ mm", []string{"d = 1.024 mm"}},
		{"constants", "x = c_0^2*eps_0*mu_0", []string{"x = 1.000"}},
		{"an integral", "a = integral(x^2 for x from 0 to 3)", []string{"a = 9.000"}},
		{"the first clause is the innermost", "a = integral(x*y for y from 0 to x for x from 0 to 1)", []string{"a = 0.1250"}},
		{"an integral to infinity", "a = integral(exp(-x) for x from 0 to inf)", []string{"a = 1.000"}},
		{"the volume and the boundary of a region", "region b: ball(1 m)\nV = b.volume = __ m^3\nA = integral(1 over b.boundary) = __ m^2", []string{"V = 4.189 m^3", "A = 12.57 m^2"}},
		// Gauss's law for a uniform field: nothing flows out of a closed surface.
		{"a flux through a closed surface", "region c: cylinder(1 m, 2 m)\nQ = integral(n·(0, 0, 3) over c.boundary)", []string{"Q = 0 m^2"}},
		{"a derivative", "a = derivative(x^3 for x at 2)", []string{"a = 12.00"}},
		{"a root", "a = solve(x^3 = 8 for x from 0 to 5)", []string{"a = 2.000"}},
		// Σ1/n² to 100 is π²/6 − 1/100 + 1/20000 − …: Abramowitz and Stegun, 23.2.
		{"a sum", "a = sum(1/n^2 for n from 1 to 100)", []string{"a = 1.635"}},
		{"a table is read", "table t: b [T], h [A/m]\n    0 0\n    0.5 100\n    1.0 300\nx = t.h at b = 0.5 T\ny = t.b[3]\nz = t.h*2", []string{"x = 100.0 A/m", "y = 1.000 T", "z = [0, 200.0, 600.0] A/m"}},
		{"a linear table", "table t, linear: x [m], y [V]\n    0 0\n    2 10\na = t.y at x = 0.5 m", []string{"a = 2.500 V"}},
		{"a computed column", "table t: x [m], y [m] = 2*x\n    1\n    2\na = t.y", []string{"a = [2.000, 4.000] m"}},
		{"a table from a file", "table cv from \"data/cv.csv\"\na = cv.C_d at v = 100 V = __ uF", []string{"a = 8.000 uF"}},
		{"along a table", "table t, linear: x [m], y [V]\n    0 0\n    2 10\na = integral(t.y for t.x from 0 m to 2 m) = __ V·m", []string{"a = 10.00 V·m"}},
		{"the area of a loop", "table t: x [m], y [V]\n    0 0\n    1 0\n    1 1\n    0 1\na = loop(t.x, t.y) = __ V·m", []string{"a = 1.000 V·m"}},
		{"a function with a domain", "f(x) = 2*x for x from 0 m to 3 m\na = f(2 m)", []string{"a = 4.000 m"}},
		{"pieces", "f(x) = x for x from 0 to 2, 10*x for x from 2 to 4\na = f(1)\nb = f(3)", []string{"a = 1.000", "b = 30.00"}},
		{"two parameters", "f(x, y) = x*y\na = f(2 m, 3 s)", []string{"a = 6.000 m·s"}},
		// e²/(4πε₀·1 Å) is 14.40 eV: the Coulomb energy of two elementary charges.
		{"two charges", "table q: c [C], x [m], y [m], z [m]\n    1.602176634e-19 0 0 0\n    1.602176634e-19 1e-10 0 0\nW = assembly_energy(q.c, q.x, q.y, q.z) = __ eV", []string{"W = 14.40 eV"}},
		{"a standard uncertainty", "a = 12.0(1)\nb = 2*a", []string{"b = 24.00(20)"}},
		// u = a/√3 for a rectangular distribution: JCGM 100, 4.3.7.
		{"a tolerance", "a = 10 V ± 5 %\nb = 2*a", []string{"b = 20.00(58) V"}},
		{"correlation in full", "a = 12.0(1)\nb = a - a", []string{"b = 0"}},
		{"worst-case bounds", "a = 10 V ± 1 V\nb = lower(3*a)\nc = upper(3*a)", []string{"b = 27.00 V", "c = 33.00 V"}},
		{"uncertainty through a root", "a = 4.00(2)\nb = solve(x^2 = a for x from 0 to 9)", []string{"b = 2.0000(50)"}},
	}
}

func statementCases() []analysisCase {
	return []analysisCase{
		{"a stated result agrees by its digits", "a = 1/3 = 0.33", nil},
		{"a tie goes either way", "a = 5/2 = 2\nb = 5/2 = 3", nil},
		{"a stated result in another unit", "a = 12 kV / 3 mm = 4.0 kV/mm = 40 kV/cm", nil},
		{"a stated result differs", "a = 12 kV / 3 mm = 4.5 kV/mm", []string{`stated-result-differs "4.5 kV/mm"`}},
		{"a stated spread is verified", "a = 10 V ± 1 V\nb = 2*a = 20 V ± 3 V", []string{`stated-result-differs "± 3 V"`}},
		{"numbers put in", "U = 12 kV\nd = 3 mm\nE = U/d = 12 kV / 2 mm", []string{`substituted-member-differs "12 kV / 2 mm"`}},
		{"a criterion holds", "a = 3 V\ncriterion a <= 4 V", nil},
		{"a criterion fails", "a = 3 V\ncriterion a > 4 V", []string{`criterion-fails "a > 4 V"`}},
		{"a criterion within the uncertainty", "a = 3.9 V ± 0.2 V\ncriterion a < 4 V", []string{`criterion-within-uncertainty "a < 4 V"`}},
		{"a chain of relations", "a = 3 V\ncriterion 2 V < a < 2.5 V", []string{`criterion-fails "2 V < a < 2.5 V"`}},
		{"a factor of ten", "d = 1 mm\nR = 5 mm\nassume d << R", []string{`assumption-fails "d << R"`}},
		{"a check by digits", "S = 2.8372 W/m^2\ncheck S = 2.84 W/m^2\ncheck S = 2.85 W/m^2", []string{`check-fails "S = 2.85 W/m^2"`}},
		{"a medium", "medium oil: linear, isotropic\n    eps_r = 2.2\nD = oil.eps*(1 kV/mm) = __ uC/m^2", []string{"D = 19.48 uC/m^2"}},
		{"properties see their siblings", "medium oil: linear\n    k = 2\n    eps_r = k + 1\nx = oil.eps_r", []string{"x = 3.000"}},
		{"a property is a function", "medium gas: linear\n    n(T) = 2*T/(100 K)\nx = gas.n(300 K)", []string{"x = 6.000"}},
		// tan δ = 0.1 on ε_r = 2: ε_r(1 − 0.1j).
		{"the complex permittivity", "regime: harmonic at f = 1 GHz\nmedium resin: linear, lossy\n    eps_r = 2\n    tan_delta = 0.1\nx = resin.eps_c/eps_0", []string{"x = (2.000 - 0.200*j)"}},
		{"the frequency of a regime", "regime: harmonic at f = 50 Hz\nT = 1/f", []string{"T = 20.00 ms"}},
		{"the handbook", "uses \"handbook/gases\"\nx = air.mu_r", []string{"x = 1.000"}},
		{"another note", "uses \"inputs.joule\"\nx = 2*U_n", []string{"x = 48.00 kV"}},
		{"another note by a name", "uses \"inputs.joule\" as in_1\nx = 2*in_1.U_n", []string{"x = 48.00 kV"}},
		{"a medium of another note", "uses \"media/oils.joule\" as m\nx = m.oil.eps_r", []string{"x = 2.200"}},
		{"safety, plot, waive", "safety \"short it\"\nf(x) = x for x from 0 to 1\nplot f(x) for x from 0 to 1\nwaive unused-definition for f: \"for the sheet\"", nil},
	}
}

func faultCases() []analysisCase {
	return []analysisCase{
		{"an unknown name", "a = b + 1", []string{`unknown-name "b"`}},
		{"unknown is told once", "a = b + 1\nc = a*2 = 3\ncriterion c < 1", []string{`unknown-name "b"`}},
		{"an unknown unit", "a = 3 kW/blub", []string{`unknown-unit "blub"`}},
		{"a name that a unit phrase hides", "B0_20 = 2 T\na = 1.4 T/B0_20", []string{`unknown-unit "B"`}},
		{"an unknown kind", "a, electric feld strength = 3 V/m", []string{`unknown-kind "electric feld strength"`}},
		{"an unknown function", "a = sine(3)", []string{`unknown-function "sine"`}},
		{"an unknown property", "medium oil: linear\n    eps_r = 2\na = oil.eps_q", []string{`unknown-property "eps_q"`}},
		{"an unknown note", "uses \"lost.joule\"\na = 1", []string{`unknown-note "\"lost.joule\""`}},
		{"a circle of notes", "uses \"back.joule\"\na = x_b", []string{}},
		{"a name without value elsewhere", "uses \"inputs.joule\" as in_1\nx = in_1.bad", []string{`unknown-name "in_1.bad"`}},
		{"a ragged file", "table cv from \"data/ragged.csv\"", []string{`syntax "\"data/ragged.csv\""`}},
		{"defined twice", "a = 1\na = 2", []string{`name-defined-twice "a"`}},
		{"a constant redefined", "eps_0 = 1 F/m", []string{`constant-redefined "eps_0"`}},
		{"a circle", "a = b + 1\nb = a*2", []string{`cyclic-definition "a"`}},
		{"dimensions in a sum", "a = 3 V\nb = a + 2 m", []string{`dimension-mismatch "a + 2 m"`}},
		{"a declared kind of another dimension", "W, energy = 3 W", []string{`dimension-mismatch "3 W"`}},
		{"a vector and a number", "a = (1, 2, 3)\nb = a + 1", []string{`shape-mix "a + 1"`}},
		{"a product of two vectors", "a = (1, 2, 3)\nb = a*a", []string{`shape-mix "a*a"`}},
		{"a dimensioned argument", "a = exp(3 V)", []string{`dimensioned-argument "3 V"`}},
		{"a function that has no value for its argument", "f(x) = ln(x)\na = f(3)\nb = f(3 V)", []string{`dimensioned-argument "f(3 V)"`}},
		{"a function through a function", "f(x) = ln(x)\ng(y) = 2*f(y)\nb = g(3 V)", []string{`dimensioned-argument "g(3 V)"`}},
		{"a broken function is told once", "f(x) = x*lost\nb = f(3 V)", []string{`unknown-name "lost"`}},
		{"two absolute temperatures", "a = 25 °C + 5 °C", []string{`temperature-offset "25 °C + 5 °C"`}},
		{"a division by zero", "z = 2 - 2\na = 1/z", []string{`division-by-zero "1/z"`}},
		{"a diverging integral", "a = integral(1/x for x from 0 to 1)", []string{`integral-diverges "integral(1/x for x from 0 to 1)"`}},
		{"no root", "a = solve(x^2 = -1 for x from 0 to 1)", []string{`no-root "solve(x^2 = -1 for x from 0 to 1)"`}},
		{"several roots", "a = solve(x^2 = 4 for x from -3 to 3)", []string{`several-roots "solve(x^2 = 4 for x from -3 to 3)"`}},
		{"outside a table", "table t: x [m], y [V]\n    0 0\n    2 10\na = t.y at x = 3 m", []string{`table-outside-rows "t.y at x = 3 m"`}},
		{"outside a domain", "f(x) = 2*x for x from 0 to 3\na = f(4)", []string{`outside-stated-range "4"`}},
		{"outside all pieces", "f(x) = x for x from 0 to 2, 10*x for x from 2 to 4\na = f(5)", []string{`outside-stated-range "f(5)"`}},
		{"a waiver that silences nothing is for check", "a = 3 V\nb = a\nwaive no-such-rule: \"x\"", []string{}},
		{"the other statements keep their values", "a = 1/0\nb = 2*3", []string{`division-by-zero "1/0"`, "b = 6.000"}},
	}
}

// A relation that fails tells both values with the digits in which they differ.
func TestFailingRelationsShowWhatDiffers(t *testing.T) {
	for relation, want := range map[string]string{
		"a < b":          "a is 3.0001 V, b is 3.0000 V (margin",
		"a < 3.00009 V":  "a is 3.00010 V, against 3.00009 V (margin",
		"3.2 V < a":      "a is 3.000 V, against 3.200 V (margin",
		"a < a":          "a is 3.000 V, a is 3.000 V (margin",
		"|a| < b < 9 kV": "|a| is 3.0001 V, b is 3.0000 V (margin",
	} {
		note, err := Analyze(t.Context(), indented("a = 3.0001 V\nb = 3 V\ncheck "+relation), Options{})
		if err != nil {
			t.Fatal(err)
		}
		said := ""
		for _, f := range note.Faults {
			if f.Rule == "check-fails" {
				said += f.Message
			}
		}
		if !strings.Contains(said, relation+" does not hold: "+want) {
			t.Errorf("%s: %q", relation, said)
		}
	}
}

// The kind of what it is compared with says whether a level counts a power or
// a field: 13 dB are 19.95 in power and 4.467 in voltage.
func TestLevelsInRelations(t *testing.T) {
	note := "G, power gain = 20\na, voltage ratio = 20\nx = 20\nb = nowhere\n"
	for relation, want := range map[string]string{
		"criterion G > 13.00 dB":          "",
		"criterion 13.02 dB < G":          "criterion-fails",
		"check G = 13.01 dB":              "",
		"check G = 13.02 dB":              "check-fails",
		"check a = 26.02 dB":              "",
		"check a = 26.03 dB":              "check-fails",
		"criterion 26.0 dB < a < 26.1 dB": "",
		"criterion 2.9 Np < a < 3.0 Np":   "",
		"criterion G > 1.5 Np":            "criterion-fails",
		"criterion x > 13 dB":             "unknown-kind",
		"criterion b > 13 dB":             "", // b is told where it stands
		"check 3 dB < 4 dB":               "unknown-kind unknown-kind",
	} {
		n, err := Analyze(t.Context(), indented(note+relation), Options{})
		if err != nil {
			t.Fatal(err)
		}
		var got []string
		for _, f := range n.Faults {
			if f.Severity == Error && f.Rule != "unknown-name" {
				got = append(got, f.Rule)
			}
		}
		if strings.Join(got, " ") != want {
			t.Errorf("%s: %q, want %q", relation, got, want)
		}
	}
}
