package unit

import (
	"math"
	"math/big"
	"strings"
	"testing"
)

// TestSIUnits compares the dimension of each named SI unit with its expression
// in base units in the SI Brochure (9th ed., table 4).
func TestSIUnits(t *testing.T) {
	for symbol, base := range map[string]string{
		"N": "kg·m/s^2", "Pa": "kg·m^-1·s^-2", "J": "kg·m^2·s^-2", "W": "kg·m^2·s^-3", "C": "A·s", "V": "kg·m^2·s^-3·A^-1",
		"F": "kg^-1·m^-2·s^4·A^2", "Ω": "kg·m^2·s^-3·A^-2", "S": "kg^-1·m^-2·s^3·A^2", "Wb": "kg·m^2·s^-2·A^-1", "T": "kg·s^-2·A^-1",
		"H": "kg·m^2·s^-2·A^-2", "lm": "cd·sr", "lx": "cd·sr·m^-2", "Bq": "s^-1", "Gy": "m^2·s^-2", "Sv": "m^2·s^-2", "kat": "mol·s^-1",
		"rad": "rad", "sr": "rad^2", "VA": "kg·m^2·s^-3", "var": "kg·m^2·s^-3", "V·A": "W", "A·h": "Ah", "W·h": "Wh",
	} {
		u, v := must(t, symbol), must(t, base)
		if u.Dim != v.Dim || u.Scale() != v.Scale() {
			t.Errorf("%s is %s × %s, want %s", symbol, u.Factor, u.Dim, base)
		}
	}
}

// definedFactors are factors by their definitions, num/den·π^pi: BIPM SI Brochure,
// 9th ed., table 8; NIST SP 811, App. B; CODATA 2022 for the dalton.
var definedFactors = []struct {
	phrase, want string
	pi           int
}{
	{"min", "60", 0}, {"h", "3600", 0}, {"d", "86400", 0}, {"au", "149597870700", 0},
	{"°", "1/180", 1}, {"′", "1/10800", 1}, {"″", "1/648000", 1}, {"ha", "1e4", 0}, {"L", "1e-3", 0}, {"mL", "1e-6", 0},
	{"t", "1e3", 0}, {"kt", "1e6", 0}, {"Da", "1.66053906892e-27", 0}, {"eV", "1.602176634e-19", 0}, {"MeV", "1.602176634e-13", 0},
	{"kg", "1", 0}, {"g", "1e-3", 0}, {"mg", "1e-6", 0}, {"kWh", "3.6e6", 0}, {"Ah", "3600", 0}, {"mAh", "3.6", 0}, {"VAh", "3600", 0}, {"varh", "3600", 0},
	{"VA", "1", 0}, {"var", "1", 0}, {"%", "1/100", 0}, {"‰", "1/1000", 0}, {"ppm", "1e-6", 0},
	{"rpm", "1/60", 0}, {"km/h", "5/18", 0}, {"kV/mm", "1e6", 0}, {"mm^2", "1e-6", 0}, {"cm^3", "1e-6", 0}, {"µC/cm^2", "1/100", 0},
	{"Oe", "250", -1}, {"Oe^2", "62500", -2}, {"MGOe", "25000", -1}, {"°/min", "1/10800", 1}, {"qm", "1e-30", 0}, {"Qm", "1e30", 0},
	{"cmil", "16129/100000000000000", 1}, {"kcmil", "16129/100000000000", 1}, // π/4·(25.4 µm)²
	{"ksi", "8896443230521/1290320", 0},     // 1000 lbf/in²
	{"(lbf/in)^2/(ft·lb)", "definition", 0}, // see composite
}

func TestFactors(t *testing.T) {
	for _, c := range definedFactors {
		f := must(t, c.phrase).Factor
		want, ok := new(big.Rat).SetString(c.want)
		if !ok {
			want = composite(t)
		}
		if f.Rational().Cmp(want) != 0 || f.Pi() != c.pi {
			t.Errorf("%s: factor %s (π^%d), want %s (π^%d)", c.phrase, f.Rational().RatString(), f.Pi(), want.RatString(), c.pi)
		}
	}
}

// composite is (lbf/in)²/(ft·lb) from the definitions, with math/big: lbf =
// 4.4482216152605 N, in = 0.0254 m, ft = 0.3048 m, lb = 0.45359237 kg.
func composite(t *testing.T) *big.Rat {
	t.Helper()
	r := func(s string) *big.Rat { v, _ := new(big.Rat).SetString(s); return v }
	q := new(big.Rat).Quo(r("4.4482216152605"), r("0.0254"))
	q.Mul(q, q)
	return q.Quo(q, new(big.Rat).Mul(r("0.3048"), r("0.45359237")))
}

// TestEveryPrefix holds that each unit takes exactly the prefixes of its set,
// and that prefix and symbol read as that product wherever they are not
// themselves a whole symbol.
func TestEveryPrefix(t *testing.T) {
	for i := range rows {
		r := &rows[i]
		for at, p := range prefixes {
			s := p.symbol + r.symbol
			if _, whole := index[s]; whole {
				continue
			}
			got, gotAt, ok := lookup(s)
			want := r.prefix&(1<<at) != 0
			if is := ok && got == r && gotAt == at; is != want {
				t.Errorf("%s reads as %s%s: %t, want %t", s, p.name, r.name, is, want)
			} else if scale := r.factor(-1).Mul(ratio(1, 1, p.exp)).Float64(); want && must(t, s).Scale() != scale {
				t.Errorf("%s has scale %g, want %g", s, must(t, s).Scale(), scale)
			}
		}
	}
}

// TestWholeSymbolFirst lists the symbols that would also read as prefix and
// unit, if the whole were not tried first.
func TestWholeSymbolFirst(t *testing.T) {
	want := map[string]string{
		"cd": "candela", "min": "minute", "ft": "foot", "yd": "yard", "au": "astronomical unit", "mol": "mole", "Pa": "pascal",
		"Torr": "torr", "h": "hour", "ha": "hectare", "T": "tesla", "m": "metre", "kg": "kilogram", "dam": "decametre", "Gy": "gray",
		"mmHg": "conventional millimetre of mercury", "mil": "mil (0.001 in)", "dag": "decagram", "pT": "picotesla", "PT": "petatesla", "hp": "horsepower (550 ft·lbf/s)",
	}
	for symbol, name := range want {
		e, ok := Info(symbol)
		if !ok || e.Name != name {
			t.Errorf("%s is %q, want %q", symbol, e.Name, name)
		}
	}
}

// TestTwins holds that every spelling of a unit reads the same.
func TestTwins(t *testing.T) {
	for _, c := range [][]string{
		{"µm", "um", "μm"}, {"Ω", "ohm", "Ω"}, {"kΩ", "kohm", "kΩ"}, {"°", "deg"}, {"°C", "degC", "℃"}, {"Å", "Å", "Å"}, {"µΩ·cm", "uohm.cm", "μΩ⋅cm"},
		{"′", "'", "arcmin"}, {"″", "''", "arcsec"}, {"m^2", "m²"}, {"m^-1", "m⁻¹", "m^−1", "1/m"}, {"m^(-1)", "m^-1"}, {"m^10", "m¹⁰"}, {"N·m", "N.m", "N⋅m"}, {"W/(m²·K)", "W/(m^2·K)", "W·m^-2·K^-1"},
		{"lb", "lbm"}, {"mil", "thou"}, {"L", "l"}, {"Da", "u"}, {"BTU", "Btu"}, {"Torr", "torr"}, {"V/m", "(V)/(m)"}, {"V^(1/2)", "V^(2/4)"},
	} {
		first := must(t, c[0])
		for _, s := range c[1:] {
			u := must(t, s)
			if u.Dim != first.Dim || u.Scale() != first.Scale() || u.Offset != first.Offset {
				t.Errorf("%q and %q differ: %s %s, %s %s", c[0], s, first.Factor, first.Dim, u.Factor, u.Dim)
			}
			if u.Symbol != s {
				t.Errorf("%q became %q", s, u.Symbol)
			}
		}
	}
}

func TestAngleAndCycle(t *testing.T) {
	hz, rads, s1 := must(t, "Hz"), must(t, "rad/s"), must(t, "s^-1")
	if hz.Dim == rads.Dim || hz.Dim == s1.Dim || rads.Dim == s1.Dim {
		t.Error("Hz, rad/s and 1/s must stay apart")
	}
	if !hz.Dim.Compatible(rads.Dim) || !hz.Dim.Compatible(s1.Dim) {
		t.Error("Hz, rad/s and 1/s must not make a dimension error")
	}
	if must(t, "Bq").Dim != s1.Dim {
		t.Error("Bq is 1/s")
	}
	if must(t, "rpm").Dim != hz.Dim {
		t.Error("rpm carries a cycle")
	}
	if !must(t, "sr").Dim.IsOne() || must(t, "sr").Dim != must(t, "rad^2").Dim {
		t.Error("sr is rad², of dimension one")
	}
	if got := must(t, "°").ToSI(90); got != math.Pi/2 {
		t.Errorf("90° = %v rad", got)
	}
	if got := must(t, "rpm").ToSI(3000); got != 50 {
		t.Errorf("3000 rpm = %v Hz", got)
	}
}

func TestCelsius(t *testing.T) {
	c := must(t, "°C")
	if !c.Affine() || c.ToSI(25) != 298.15 || math.Abs(c.FromSI(298.15)-25) > 1e-12 || c.ToSI(-273.15) != 0 {
		t.Errorf("25 °C = %v K", c.ToSI(25)) // SI Brochure, 9th ed., 2.3.1
	}
	if d := c.Difference(); d.Affine() || d.ToSI(25) != 25 || d.Symbol != "°C" {
		t.Error("a difference in °C is a kelvin")
	}
	for _, s := range []string{"V/°C", "W/(m·°C)", "°C^2", "°C·m", "(°C)", "1/°C", "°C^-1"} {
		if u := must(t, s); u.Affine() {
			t.Errorf("%s has an offset", s)
		}
	}
}

// TestCorrectRounding holds that decimal prefixes do not cost digits: n mm is
// the float64 nearest to n/1000.
func TestCorrectRounding(t *testing.T) {
	for _, c := range []struct {
		phrase string
		exp    int64
	}{{"mm", -3}, {"um", -6}, {"pF", -12}, {"kV/mm", 6}, {"uC/cm^2", -2}, {"nC/cm^2", -5}, {"mm^3", -9}, {"cm^-1", 2}, {"fF", -15}} {
		u := must(t, c.phrase)
		p := new(big.Rat).SetInt(new(big.Int).Exp(big.NewInt(10), big.NewInt(abs64(c.exp)), nil))
		if c.exp < 0 {
			p.Inv(p)
		}
		for n := range int64(2000) {
			want, _ := new(big.Rat).Mul(big.NewRat(n, 1), p).Float64()
			if got := u.ToSI(float64(n)); got != want {
				t.Fatalf("%d %s = %v, nearest float is %v", n, c.phrase, got, want)
			}
		}
	}
}

func abs64(n int64) int64 {
	if n < 0 {
		return -n
	}
	return n
}

func TestZeroUnit(t *testing.T) {
	var u Unit
	if !u.IsZero() || u.ToSI(3) != 3 || u.FromSI(3) != 3 || u.Scale() != 1 || must(t, "1").IsZero() || must(t, "1").ToSI(3) != 3 {
		t.Error("the zero unit converts like dimension one and is told from a written 1")
	}
}

func TestDimString(t *testing.T) {
	for phrase, want := range map[string]string{
		"J": "kg·m^2/s^2", "V": "kg·m^2/(s^3·A)", "m^-1": "m^-1", "1/(m·s)": "1/(m·s)", "1": "1", "m^(1/2)": "m^(1/2)", "s^(-1/2)": "s^(-1/2)",
		"Hz": "cycle/s", "rad/s": "rad/s", "K/W": "s^3·K/(kg·m^2)", "s^-2": "s^-2",
	} {
		if got := must(t, phrase).Dim.String(); got != want {
			t.Errorf("%s prints as %s, want %s", phrase, got, want)
		}
	}
}

func TestTableIsComplete(t *testing.T) {
	seen := map[string]string{}
	for i := range rows {
		r := &rows[i]
		if r.name == "" || r.source == "" {
			t.Errorf("%s has no name or source", r.symbol)
		}
		for _, s := range append(strings.Fields(r.also), r.symbol) {
			if other, dup := seen[s]; dup {
				t.Errorf("%q stands for %s and %s", s, other, r.name)
			}
			seen[s] = r.name
			if n := symbolLen(s); n != len(s) {
				t.Errorf("%q is no symbol of the phrase grammar", s)
			}
		}
		if f := r.factor(-1); !(f.Float64() > 0) {
			t.Errorf("%s has factor %g", r.symbol, f.Float64())
		}
	}
	// The list of the note language: nothing of it may be missing.
	for _, s := range strings.Fields(`mil in ft lb oz lbf psi hp BTU G Oe Mx statV statC dyn erg cal cal_IT atm bar Torr eV Da
		thou yd mmHg inHg Wh kWh Ah mAh VA kVA var rpm % ppm ° ' '' arcmin arcsec d h min au L l ha t ohm um deg degC Å ℃ dB dBm dBW dBi dBd dBuV dBuV/m dB(uV/m) dB/m Np`) {
		must(t, s)
	}
}
