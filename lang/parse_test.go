package lang

import (
	"strings"
	"testing"
)

// example is the note with which the language is introduced.
const example = `Grading capacitor, stored energy
================================

Four mica discs between plates, in oil. Fringing is left out.

    uses "handbook/solids"

    medium mica: linear, uniaxial, homogeneous, lossy
        eps_r     = diag(6.9, 6.9, 8.7)           per "supplier sheet M-7, table 2"
        E_bd      = 118 kV/mm                     per "supplier sheet M-7, table 4"
        tan_delta = 3e-4 for f from 50 Hz to 1 MHz   per "supplier sheet M-7, table 5"

    U, peak voltage = 12.0(1) kV                  per "nameplate"
    d = 3.00 mm ± 0.05 mm                         per "drawing 12-441 rev C"
    R = 40 mm

    assume d << R
    E in mica, peak electric field strength = (0, 0, 1)*U/d = (0, 0, 4.000) kV/mm
    D in mica = mica.eps*E
    w, peak energy density = 1/2 * D·E = 616.3 J/m^3
    region disc in mica: cylinder(R, d)
    W, energy = integral(w over disc) = __ mJ

    criterion |E| <= mica.E_bd/10                 per "design rule 4.2"
`

func TestEveryStatementOfTheExampleIsRead(t *testing.T) {
	want := []string{
		`(uses "handbook/solids")`,
		`(medium mica 'linear' 'uniaxial' 'homogeneous' 'lossy' (def eps_r = (diag 6.9 6.9 8.7) (per "supplier sheet M-7, table 2"))` +
			` (def E_bd = 118[kV/mm] (per "supplier sheet M-7, table 4"))` +
			` (def tan_delta = 3e-4 (for f 50[Hz] 1[MHz]) (per "supplier sheet M-7, table 5")))`,
		`(def U 'peak voltage' = 12.0{u 1 0.1}[kV] (per "nameplate"))`,
		`(def d = 3.00{± 0.05[mm]}[mm] (per "drawing 12-441 rev C"))`,
		`(def R = 40[mm])`,
		`(assume (d << R))`,
		`(def E (in mica) 'peak electric field strength' = (/ (* (vec 0 0 1) U) d) (vec 0 0 4.000 [kV/mm]))`,
		`(def D (in mica) = (* mica.eps E))`,
		`(def w 'peak energy density' = (· (* (/ 1 2) D) E) 616.3[J/m^3])`,
		`(region disc (in mica) (cylinder R d))`,
		`(def W 'energy' = (integral w (over disc)) __[mJ])`,
		`(criterion ((bars E) <= (/ mica.E_bd 10)) (per "design rule 4.2"))`,
	}
	s := Read(example, nil)
	if len(s.Stmts) != len(want) {
		t.Fatalf("%d statements, want %d", len(s.Stmts), len(want))
	}
	for i, st := range s.Stmts {
		if got := sexpr(st.Tree); got != want[i] {
			t.Errorf("%s\n got %s\nwant %s", st.Text, got, want[i])
		}
		if len(st.Faults) > 0 {
			t.Errorf("%s: %v", st.Text, st.Faults)
		}
		if example[st.At:st.At+len(st.Text)] != st.Text {
			t.Errorf("%q does not stand at %d", st.Text, st.At)
		}
	}
	if len(s.Faults) > 0 || len(s.Prose) != 3 {
		t.Errorf("faults %v, lines of prose %v", s.Faults, s.Prose)
	}
}

// reads checks statements without faults against their trees.
func reads(t *testing.T, cases [][2]string) {
	t.Helper()
	for _, c := range cases {
		s := ParseStatement(c[0])
		if got := sexpr(s.Tree); got != c[1] {
			t.Errorf("%s\n got %s\nwant %s", c[0], got, c[1])
		}
		for _, f := range s.Faults {
			t.Errorf("%s: %s (%s)", c[0], f.Message, f.Detail)
		}
	}
}

// readsExpr checks expressions, each as `x = EXPR`.
func readsExpr(t *testing.T, cases [][2]string) {
	t.Helper()
	for i := range cases {
		cases[i][0], cases[i][1] = "x = "+cases[i][0], "(def x = "+cases[i][1]+")"
	}
	reads(t, cases)
}

func TestDefinitions(t *testing.T) {
	reads(t, [][2]string{
		{"x = 1", "(def x = 1)"},
		{"x=1", "(def x = 1)"},
		{"E, rms = 3 V/m", "(def E 'rms' = 3[V/m])"},
		{"U, peak-to-peak voltage = 3 V", "(def U 'peak-to-peak voltage' = 3[V])"},
		{"C, energy-equivalent capacitance = 4.02 µF", "(def C 'energy-equivalent capacitance' = 4.02[µF])"},
		{"c, capacitance per length = 3 F/m", "(def c 'capacitance per length' = 3[F/m])"},
		{"N, number of turns in a winding = 3", "(def N 'number of turns in a winding' = 3)"},
		{`x, ratio = 3 per "sheet"`, `(def x 'ratio' = 3 (per "sheet"))`},
		{"f(a, b) in oil, voltage = a + b", "(def f (a b) (in oil) 'voltage' = (+ a b))"},
		{"E in lib.mica = 3 V/m", "(def E (in lib.mica) = 3[V/m])"},
		{"x = a = 12 kV / 3 mm = 4 kV/mm = __ V/m", "(def x = a (/ 12[kV] 3[mm]) 4[kV/mm] __[V/m])"},
		{"x = a = __", "(def x = a __)"},
		{"g(f, T) = f*T for f from 1 Hz to 2 Hz for T from 20 °C to 80 °C",
			"(def g (f T) = (* f T) (for f 1[Hz] 2[Hz]) (for T 20[°C] 80[°C]))"},
		{"e(r) = inner.eps for r from a to m, outer.eps for r from m to b",
			"(def e (r) = inner.eps (for r a m) (piece outer.eps (for r m b)))"},
		{`e(r) = 2 for r from a to m per "p", 3 for r from m to b per "q"`,
			`(def e (r) = 2 (for r a m) (per "p") (piece 3 (for r m b) (per "q")))`},
		{"x = a\n    + b\n    = 3 # ok\n    per \"q\"", `(def x = (+ a b) 3 (per "q"))`},
		{"x = 3 # V = 4", "(def x = 3)"},
		{`x = 3 per "no # remark"`, `(def x = 3 (per "no # remark"))`},
		{"x = 3 per \"a long\n    source\"", `(def x = 3 (per "a long source"))`},
		{"U = integral(E for x from 0 mm to d)", "(def U = (integral E (for x 0[mm] d)))"},
	})
}

func TestOtherStatements(t *testing.T) {
	reads(t, [][2]string{
		{"medium oil", "(medium oil)"},
		{"medium oil:", "(medium oil)"},
		{"medium oil: linear, isotropic,\n        homogeneous\n    eps_r = 2.2\n    mu_r, relative permeability = 1",
			"(medium oil 'linear' 'isotropic' 'homogeneous' (def eps_r = 2.2) (def mu_r 'relative permeability' = 1))"},
		{"medium m: linear per \"sheet\"\n  eps_r(T) = 3 - T/(100 K)\n    for T from 1 K to 2 K\n  sigma = 3 S/m",
			`(medium m 'linear' (per "sheet") (def eps_r (T) = (- 3 (/ T (paren 100[K]))) (for T 1[K] 2[K])) (def sigma = 3[S/m]))`},
		{"region r: box(1 m, 2 m, 3 m)", "(region r (box 1[m] 2[m] 3[m]))"},
		{`region r in oil: shell(a, b) per "drawing"`, `(region r (in oil) (shell a b) (per "drawing"))`},
		{"table bh: H [A/m], B [T]\n    0 0\n    100  0.52\n    -100 -5.2e-1", "(table bh (col H [A/m]) (col B [T]) (row 0 0) (row 100 0.52) (row -100 -5.2e-1))"},
		{"table bh, linear: H/(A/m), B/T,\n      n [1], phi [°] per \"m\"\n    1 2 3 4", `(table bh linear (col H [(A/m)]) (col B [T]) (col n [1]) (col phi [°]) (per "m") (row 1 2 3 4))`},
		{"table t: U [V], I [A], P [W] = U*I\n    1 2\n\n    # remark\n    3 4(1)", "(table t (col U [V]) (col I [A]) (col P [W] = (* U I)) (row 1 2) (row 3 4{u 1 1}))"},
		{`table t from "rows.csv"`, `(table t (from "rows.csv"))`},
		{"table t: x, T/°C, k [W/(m·°C)]", "(table t (col x) (col T [°C]) (col k [W/(m·°C)]))"},
		{"regime: static", "(regime static)"},
		{"regime: harmonic at f = 50 Hz", "(regime harmonic (at f 50[Hz]))"},
		{"regime: transient", "(regime transient)"},
		{`uses "handbook/solids"`, `(uses "handbook/solids")`},
		{`uses "../a b" as lib`, `(uses "../a b" (as lib))`},
		{"assume d << R", "(assume (d << R))"},
		{`assume "no fringing" per "rule"`, `(assume "no fringing" (per "rule"))`},
		{"assume 0 <= x < y", "(assume (0 <= x < y))"},
		{"criterion |E| ≤ 3 kV/mm", "(criterion ((bars E) <= 3[kV/mm]))"},
		{"criterion a ≫ b ", "(criterion (a >> b))"},
		{"criterion a > b >= c >> d", "(criterion (a > b >= c >> d))"},
		{"check S(1 m) = 2.84 W/m^2", "(check ((S 1[m]) = 2.84[W/m^2]))"},
		{`check SF < 1 per "test"`, `(check (SF < 1) (per "test"))`},
		{`safety "Earth it." per "rule 4"`, `(safety "Earth it." (per "rule 4"))`},
		{`waive half-missing-stored-energy for w: "why"`, `(waive half-missing-stored-energy (for w) "why")`},
		{`waive property-out-of-range for mica.eps_r: "why"`, `(waive property-out-of-range (for mica.eps_r) "why")`},
		{`waive torque-energy-kind: "why"`, `(waive torque-energy-kind "why")`},
		{"plot g(x), h for x from 1 to 2", "(plot (g x) h (for x 1 2))"},
		{`plot g(x) for x from 1 mm to 2 mm per "fig"`, `(plot (g x) (for x 1[mm] 2[mm]) (per "fig"))`},
		{"criterion d < 3 in", "(criterion (d < 3[in]))"},
		{"region r in m: disc(2 in)", "(region r (in m) (disc 2[in]))"},
	})
}

func TestPrecedence(t *testing.T) {
	readsExpr(t, [][2]string{
		{"a + b - c", "(- (+ a b) c)"},
		{"a − b", "(- a b)"},
		{"a*b/c*d", "(* (/ (* a b) c) d)"},
		{"a/b·c", "(· (/ a b) c)"},
		{"a⋅b", "(· a b)"},
		{"a·b×c", "(· a (× b c))"},
		{"a·b×c×d", "(· a (× (× b c) d))"},
		{"a×b·c", "(· (× a b) c)"},
		{"a*b×c", "(× (* a b) c)"},
		{"a/b×c", "(× (/ a b) c)"},
		{"a·b*c×d", "(× (* (· a b) c) d)"},
		{"(a·b)×c", "(× (paren (· a b)) c)"},
		{"a^b^c", "(^ a (^ b c))"},
		{"-a^2", "(neg (^ a 2))"},
		{"-3^2", "(neg (^ 3 2))"},
		{"-3²", "(neg (^ 3 ²))"},
		{"-a*b", "(* (neg a) b)"},
		{"a*-b", "(* a (neg b))"},
		{"+a", "(pos a)"},
		{"--a", "(neg (neg a))"},
		{"a^-2", "(^ a -2)"},
		{"a^-b^c", "(^ a (neg (^ b c)))"},
		{"2^-3^2", "(^ 2 (neg (^ 3 2)))"},
		{"r⁻³", "(^ r ⁻³)"},
		{"(a + b)²/2", "(/ (^ (paren (+ a b)) ²) 2)"},
		{"a.x^2", "(^ a.x 2)"},
		{"|a|*|b - |c||", "(* (bars a) (bars (- b (bars c))))"},
		{"||a| - b|", "(bars (- (bars a) b))"},
		{"-|a|", "(neg (bars a))"},
		{"1/2*D·E", "(· (* (/ 1 2) D) E)"},
	})
}

func TestOperands(t *testing.T) {
	readsExpr(t, [][2]string{
		{"mica.eps.xz", "mica.eps.xz"},
		{"lib.mica.eps_r(300 K)", "(lib.mica.eps_r 300[K])"},
		{"f(x, 1).y", "(f x 1).y"},
		{"t.B[2]", "(cell t.B 2)"},
		{"sum(t.q[n]*2 for n from 1 to 3)", "(sum (* (cell t.q n) 2) (for n 1 3))"},
		{"bh.B at H = 200 A/m", "(at bh.B H 200[A/m])"},
		{"bh.B at H = 200 A/m * 3", "(* (at bh.B H 200[A/m]) 3)"},
		{"mica.eps at T = T_hot at f = (2 kHz)", "(at (at mica.eps T T_hot) f (paren 2[kHz]))"},
		{"bh.B at H = f(3).x", "(at bh.B H (f 3).x)"},
		{"bh.B at H = -3 A/m", "(at bh.B H -3[A/m])"},
		{"(0, 0, 1)", "(vec 0 0 1)"},
		{"(0,0,1)", "(vec 0 0 1)"},
		{"((1, 2, 3))", "(paren (vec 1 2 3))"},
		{"integral(bh.H for bh.B from 0 T to 1.2 T)", "(integral bh.H (for bh.B 0[T] 1.2[T]))"},
		{"integral(g for x from 0 to inf for y from 0 to x)", "(integral g (for x 0 inf) (for y 0 x))"},
		{"integral(D·n over disc.boundary)", "(integral (· D n) (over disc.boundary))"},
		{"loop(bh.H, bh.B)", "(loop bh.H bh.B)"},
		{"derivative(x^2 for x at 3 m)", "(derivative (^ x 2) (for x at 3[m]))"},
		{"solve(x^2 = 2 for x from 0 to 2)", "(solve (^ x 2) (= 2) (for x 0 2))"},
		{"solve(x = cos(x) for x from 0 to 1)", "(solve x (= (cos x)) (for x 0 1))"},
		{"sum(t.q)", "(sum t.q)"},
		{"2*pi*f", "(* (* 2 pi) f)"},
		{"3*j", "(* 3 j)"},
		{"2*π", "(* 2 π)"},
	})
}

func TestUnitPhrases(t *testing.T) {
	readsExpr(t, [][2]string{
		{"13.3 kV/mm", "13.3[kV/mm]"},
		{"5 W/(m^2·K)", "5[W/(m^2·K)]"},
		{"8.8e-12 F/m", "8.8e-12[F/m]"},
		{"3 m^-1", "3[m^-1]"},
		{"3 m⁻¹", "3[m⁻¹]"},
		{"1 N·m", "1[N·m]"},
		{"1 N.m", "1[N.m]"},
		{"5 %", "5[%]"},
		{"30 °", "30[°]"},
		{"30°", "30[°]"},
		{"25 °C", "25[°C]"},
		{"25 ℃", "25[℃]"},
		{"-40 °C", "-40[°C]"},
		{"−30 dBm", "−30[dBm]"},
		{"54 dB(uV/m)", "54[dB(uV/m)]"},
		{"3 Å", "3[Å]"},
		{"3 Ω", "3[Ω]"},
		{"1 V/Hz^(1/2)", "1[V/Hz^(1/2)]"},
		{"3 W/m·K", "3[W/m·K]"},     // a fault of the phrase, told by the unit table
		{"3 Hz^1/2", "3[Hz^1/2]"},   // likewise
		{"3 J/kg/K", "3[J/kg/K]"},   // likewise
		{"12\u00a0kV", "12[kV]"},    // no-break space
		{"2 nC*V1", "(* 2[nC] V1)"}, // `*` is never part of a phrase
		{"17 kV/5 mm", "(/ 17[kV] 5[mm])"},
		{"17 kV / 5 mm", "(/ 17[kV] 5[mm])"},
		{"3 nC/(4*pi*eps_0*r)", "(/ 3[nC] (paren (* (* (* 4 pi) eps_0) r)))"},
		{"3 kV / d", "(/ 3[kV] d)"},
		{"3 kV/d", "3[kV/d]"},
		{"20 V/r", "20[V/r]"},
		{"1/2 C*U^2", "(* (/ 1 2[C]) (^ U 2))"},
		{"3 m/pi", "(/ 3[m] pi)"}, // a reserved word is no symbol
		{"3 V/(a + b)", "(/ 3[V] (paren (+ a b)))"},
		{"3 V/(a·b)", "3[V/(a·b)]"},
		{"3 in", "3[in]"},
		{"3 lb/in", "3[lb/in]"},
		{"a^2 + 3 m", "(+ (^ a 2) 3[m])"},
		{"(0, 0, 4) kV/mm", "(vec 0 0 4 [kV/mm])"},
		{"diag(2e4, 2e4, 150) S/m", "(diag 2e4 2e4 150 [S/m])"},
		{"(3.2 + 1.5*j) ohm", "(paren (+ 3.2 (* 1.5 j)) [ohm])"},
		{"(18.5 + 139.5*j) m^-1", "(paren (+ 18.5 (* 139.5 j)) [m^-1])"},
		{"(1/4) in", "(paren (/ 1 4) [in])"},
		{"3 m\n   - b", "(- 3[m] b)"},
	})
	reads(t, [][2]string{
		{"f(x) in m = 3", "(def f (x) (in m) = 3)"}, // `in` is the keyword left of `=`
		{"x = (1\n   ) per \"q\"", `(def x = (paren 1) (per "q"))`},
	})
}

func TestNumbers(t *testing.T) {
	cases := []struct {
		text      string
		value     float64
		lastDigit int
		spread    float64
		standard  bool
	}{
		{"12", 12, 0, 0, false},
		{"0.5", 0.5, -1, 0, false},
		{"1.2e-3", 1.2e-3, -4, 0, false},
		{"1E6", 1e6, 6, 0, false},
		{"12.0e3", 12e3, 2, 0, false},
		{"4.000", 4, -3, 0, false},
		{"-2.50", -2.5, -2, 0, false},
		{"−2.5e−3", -2.5e-3, -4, 0, false},
		{"+3", 3, 0, 0, false},
		{"12.0(1)", 12, -1, 0.1, true},
		{"12.0(12)", 12, -1, 1.2, true},
		{"1.2(4)e-3", 1.2e-3, -4, 0.4e-3, true},
		{"12.0(0.1)", 12, -1, 0.1, true},
		{"1.25(0.5)e2", 125, 0, 50, true},
		{"6.02214076e23", 6.02214076e23, 15, 0, false},
		{"12.0 ± 0.1", 12, -1, 0.1, false},
		{"12.0 +/- 0.25", 12, -1, 0.25, false},
		{"3 mm ± 0.05 mm", 3, 0, 0.05, false},
		{"3 mm ± 5 %", 3, 0, 5, false},
	}
	for _, c := range cases {
		d, ok := ParseStatement("x = " + c.text + " per \"q\"").Tree.(*Definition)
		if !ok {
			t.Errorf("%s is not read", c.text)
			continue
		}
		l := d.Members[0].(*Literal)
		if l.Num.Value != c.value || l.Num.LastDigit != c.lastDigit {
			t.Errorf("%s: value %v, last digit %d; want %v, %d", c.text, l.Num.Value, l.Num.LastDigit, c.value, c.lastDigit)
		}
		var size float64
		var standard bool
		if l.Spread != nil {
			size, standard = l.Spread.Size, l.Spread.Standard
		}
		if size != c.spread || standard != c.standard {
			t.Errorf("%s: spread %v, standard %v; want %v, %v", c.text, size, standard, c.spread, c.standard)
		}
	}
	readsExpr(t, [][2]string{
		{"(12.0 ± 0.1) kV", "(paren 12.0{± 0.1} [kV])"},
		{"(3 + 4*j) V ± 5 %", "(paren (+ 3 (* 4 j)) [V] {± 5[%]})"},
		{"871 J ± 87 J", "871{± 87[J]}[J]"},
	})
}

// Spans are the places of the text that the nodes stand for.
func TestSpansAndIndices(t *testing.T) {
	s := ParseStatement("E in mica, peak voltage = (0, 0, 1)*U/d = 3.0(1) kV per \"q\"")
	want := []string{"E", "mica", "peak voltage", "(0, 0, 1)*U/d", "(0, 0, 1)*U", "(0, 0, 1)", "0", "0", "1", "U", "d", "3.0(1) kV", "\"q\""}
	var got []string
	next := 0
	Walk(s.Tree, func(n Tree) bool {
		if n.Index() != next {
			t.Errorf("index %d, want %d", n.Index(), next)
		}
		next++
		if n != Tree(s.Tree) {
			got = append(got, s.Text[n.Place().Start:n.Place().End])
		}
		return true
	})
	if strings.Join(got, "|") != strings.Join(want, "|") {
		t.Errorf("got  %q\nwant %q", got, want)
	}
	if s.Nodes != next || s.Tree.Place() != (Span{0, len(s.Text)}) {
		t.Errorf("%d nodes, %v; walked %d", s.Nodes, s.Tree.Place(), next)
	}
}
