package unit

import (
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

// symbolGen draws a symbol that is a unit, with or without a prefix.
func symbolGen() *rapid.Generator[string] {
	return rapid.Custom(func(t *rapid.T) string {
		r := &rows[rapid.IntRange(0, len(rows)-1).Draw(t, "row")]
		at := rapid.IntRange(-1, len(prefixes)-1).Draw(t, "prefix")
		if at < 0 || r.prefix&(1<<at) == 0 {
			return r.symbol
		}
		return prefixes[at].symbol + r.symbol
	})
}

// powerGen draws a symbol with a small exponent.
func powerGen() *rapid.Generator[string] {
	return rapid.Custom(func(t *rapid.T) string {
		e := rapid.SampledFrom([]string{"", "", "^2", "^-1", "^3", "^(1/2)", "²", "⁻¹"}).Draw(t, "exponent")
		return symbolGen().Draw(t, "symbol") + e
	})
}

func parsed(t *rapid.T, phrase string) Unit {
	u, err := Parse(phrase)
	if err != nil {
		t.Fatalf("%q: %s", phrase, err.Message)
	}
	return u
}

func near(a, b float64) bool {
	return a == b || math.Abs(a-b) <= 1e-14*max(math.Abs(a), math.Abs(b))
}

func TestConversionIsInvertible(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		u := parsed(t, strings.Join(rapid.SliceOfN(powerGen(), 1, 3).Draw(t, "symbols"), "·"))
		x := rapid.Float64Range(-1e12, 1e12).Draw(t, "x")
		if math.Abs(x) < 1e-9 || math.Abs(u.ToSI(x)) < 1e-290 {
			return // below the normal range of float64 digits are lost
		}
		if y := u.FromSI(u.ToSI(x)); math.Abs(y-x) > 1e-13*math.Abs(x)+math.Abs(u.Offset)*1e-15 {
			t.Fatalf("%v %s comes back as %v", x, u, y)
		}
	})
}

func TestSymbolsCommute(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		a, b, c := powerGen().Draw(t, "a"), powerGen().Draw(t, "b"), powerGen().Draw(t, "c")
		u := parsed(t, a+"·"+b+"·"+c)
		for _, s := range []string{c + "·" + b + "·" + a, b + "." + a + "·" + c, "(" + a + "·" + b + ")·" + c, a + "·" + b + "/(1/" + group(c) + ")"} {
			if v := parsed(t, s); v.Dim != u.Dim || !near(v.Scale(), u.Scale()) {
				t.Fatalf("%s is %s × %s, %s is %s × %s", u, u.Factor, u.Dim, v, v.Factor, v.Dim)
			}
		}
		if q := parsed(t, a+"·"+b+"/("+a+"·"+b+")"); q.Dim != (Dim{}) || !near(q.Scale(), 1) {
			t.Fatalf("%s over itself is %s × %s", a+"·"+b, q.Factor, q.Dim)
		}
	})
}

func group(s string) string { return "(" + s + ")" }

// TestPrintedDimensionReadsBack: a dimension printed by String or shown by
// Coherent reads back as the same dimension.
func TestPrintedDimensionReadsBack(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		var d Dim
		for i := range Angle {
			d[i] = NewRat(rapid.Int64Range(-4, 4).Draw(t, "num"), rapid.Int64Range(1, 3).Draw(t, "den"))
		}
		if u := parsed(t, d.String()); u.Dim != d || !u.Coherent() {
			t.Fatalf("%v prints as %s, which reads as %s", d, d.String(), u.Dim)
		}
		if u := Coherent(d); u.Dim != d || parsed(t, u.Symbol).Dim != d || !u.Coherent() {
			t.Fatalf("%s has the coherent unit %s", d, u)
		}
	})
}

// TestChooseKeepsTheValue: a chosen unit stands for the same quantity, and
// choosing again changes nothing.
func TestChooseKeepsTheValue(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		u := parsed(t, rapid.SampledFrom(readable[:]).Draw(t, "unit"))
		x := math.Pow(10, rapid.Float64Range(-28, 28).Draw(t, "lg x"))
		v := Choose(u, x)
		if v.Dim != u.Dim || v.Offset != 0 || !near(v.ToSI(v.FromSI(x)), x) {
			t.Fatalf("%g %s is shown in %s", x, u, v)
		}
		first, power, rest := leading(u.Symbol)
		if lo, hi := reach(first, rest); power == 1 && lo < 0 && hi == 30 && (v.FromSI(x) < 0.99995 || v.FromSI(x) >= 999.95) {
			t.Fatalf("%g %s is shown as %g %s", x, u, v.FromSI(x), v)
		}
	})
}

func TestRationals(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		draw := func(s string) Rat {
			return NewRat(rapid.Int64Range(-1e4, 1e4).Draw(t, s), rapid.Int64Range(1, 1e4).Draw(t, s))
		}
		a, b, c := draw("a"), draw("b"), draw("c")
		switch {
		case a.Add(b) != b.Add(a), a.Mul(b) != b.Mul(a), a.Sub(a) != Rat{}, a.Add(b).Sub(b) != a && a.Add(b).Valid():
			t.Fatalf("%s and %s", a, b)
		case a.Mul(b.Add(c)) != a.Mul(b).Add(a.Mul(c)) && a.Mul(b).Add(a.Mul(c)).Valid() && a.Mul(b.Add(c)).Valid():
			t.Fatalf("%s·(%s + %s)", a, b, c)
		case a.Sign() != -a.Neg().Sign(), a.IsZero() != (a.Sign() == 0):
			t.Fatalf("sign of %s", a)
		}
	})
}

// TestOverflowAbsorbs: an exponent that does not fit makes the one invalid
// value, which nothing turns valid again.
func TestOverflowAbsorbs(t *testing.T) {
	big := NewRat(math.MaxInt32, 1)
	for _, r := range []Rat{big.Add(big), big.Mul(big), NewRat(1, 0), NewRat(math.MinInt64, 1), NewRat(1, math.MinInt64), NewRat(math.MaxInt64, 2), NewRat(1, math.MaxInt32).Mul(NewRat(1, math.MaxInt32))} {
		if r.Valid() || r.Add(Whole(1)).Valid() || r.Mul(Rat{}).Valid() || r.Neg().Valid() || r.IsZero() || r.String() != "?" || !math.IsNaN(r.Float64()) {
			t.Errorf("%v is not the invalid value", r)
		}
	}
	d := Dim{Length: big}
	if d.Mul(d).Valid() || d.Mul(d).Compatible(d.Mul(d)) || d.Pow(Whole(2)).Valid() || !d.Valid() {
		t.Error("a dimension that overflowed must be invalid and compatible with nothing")
	}
}

func FuzzParse(f *testing.F) {
	for i := range rows {
		f.Add(rows[i].symbol)
		f.Add("k" + rows[i].symbol + "^-2/(m·s)")
	}
	for _, s := range readable {
		f.Add(s)
	}
	for _, c := range publishedValues {
		f.Add(c.phrase)
	}
	for _, r := range levelRows {
		f.Add(r.symbol)
	}
	for _, s := range []string{"W/m·K", "J/kg/K", "Hz^1/2", "m ^2", "dB(uV/m)", "m⁻¹", "((m)", "m^(−1/2)", "1/s", "Vrms", "lbf^99·lbf^99", "l^70"} {
		f.Add(s)
	}
	f.Fuzz(func(t *testing.T, s string) {
		u, err := Parse(s)
		if err != nil {
			if err.Start < 0 || err.End > len(s) || err.Start > err.End || err.Message == "" || err.Rule != "syntax" && err.Rule != "unknown-unit" {
				t.Fatalf("%q: %+v", s, *err)
			}
			return
		}
		if u.Symbol != s || !u.Dim.Valid() || !(u.Scale() > 0) || math.IsInf(u.Scale(), 0) {
			t.Fatalf("%q reads as %s × %s, scale %g", s, u.Factor, u.Dim, u.Scale())
		}
		if c := Coherent(u.Dim); u.Dim.Base() != c.Dim.Base() {
			t.Fatalf("%q: coherent unit %s has dimension %s, not %s", s, c, c.Dim, u.Dim)
		}
		Choose(u, 1234.5)
		Parts(s)
	})
}

func BenchmarkParse(b *testing.B) {
	for _, s := range []string{"kV", "kV/mm", "W/(m^2·K)", "in", "dBm", "°C", "W/m·K", "foo"} {
		b.Run(strings.ReplaceAll(s, "/", "÷"), func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				_, _ = Parse(s)
			}
		})
	}
}

func BenchmarkToSI(b *testing.B) {
	u := must(b, "kV/mm")
	x := 4.0
	for b.Loop() {
		x = u.FromSI(u.ToSI(x))
	}
}

func BenchmarkShow(b *testing.B) {
	for _, s := range []string{"V/m", "V·m^2"} {
		d := must(b, s).Dim
		b.Run(strings.ReplaceAll(s, "/", "÷"), func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				Choose(Coherent(d), 4e6)
			}
		})
	}
}
