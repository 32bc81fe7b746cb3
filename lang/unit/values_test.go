package unit

import (
	"math"
	"math/big"
	"strconv"
	"strings"
	"testing"
)

// Sources of the published values below.
const (
	sp811Sysml = "NIST SP 811 App. B factor as carried in the OMG SysML v2 library USCustomaryUnits.sysml, Systems-Modeling/SysML-v2-Release commit ee25530e"
	scipyConst = "scipy/constants/_constants.py, scipy/scipy commit 3dbf660a"
	openStax   = "OpenStax, University Physics vol. 2, App. B (module m58615), CC BY 4.0"
	kelton     = "BS 350:2004 table 38 as quoted at help.kelton.co.uk/energy/"
	hobby      = "hobbyprojects.com/dictionary_of_units/energy_or_work.html"
	gaussTable = "Gaussian units conversion table (encyclopedia text at liquisearch.com/gaussian_units/electromagnetic_unit_names), c = 29 979 245 800 cm/s"
	crystTable = "International Tables for Crystallography D, 1.5.10, xrpp.iucr.org/Db/ch1o5v0001/sec1o5o10/"
	nbsMagn    = "NBS, Units for magnetic properties (Goldfarb and Fickett), handypdf.com/pdf/magnetic-units-conversion-table"
	memory811  = "from memory: NIST SP 811 (2008) appendix B.8, as printed there (to be confirmed)"
)

// published is a conversion that somebody else printed: times × 1 phrase is
// want unit, to the digits printed.
type published struct {
	id     string
	times  string // rational number of phrases, "" for 1
	phrase string
	want   string // as printed
	unit   string // SI unit, or the unit asked for
	exact  bool   // want is the exact value, not a rounded one
	source string
}

var publishedValues = []published{
	{"UN-01 inch", "", "in", "2.54E-02", "m", true, sp811Sysml},
	{"UN-02 mil", "", "mil", "2.54E-05", "m", true, sp811Sysml},
	{"UN-04 foot", "", "ft", "3.048E-01", "m", true, sp811Sysml},
	{"UN-05 yard", "", "yd", "9.144E-01", "m", true, sp811Sysml},
	{"UN-06 mile", "", "mi", "1.609344E+03", "m", true, sp811Sysml},
	{"UN-07 circular mil", "", "cmil", "5.067075E-10", "m^2", false, sp811Sysml},
	{"UN-08 pound", "", "lb", "4.535924E-01", "kg", false, sp811Sysml},
	{"UN-09 ounce", "", "oz", "2.834952E-02", "kg", false, sp811Sysml},
	{"UN-10 slug", "", "lbf·s^2/ft", "1.459390E+01", "kg", false, sp811Sysml},
	{"UN-11 pound-force", "", "lbf", "4.448222E+00", "N", false, sp811Sysml},
	{"UN-12 ounce-force", "", "ozf", "2.780139E-01", "N", false, sp811Sysml},
	{"UN-13 Btu (IT)", "", "BTU", "1.055056E+03", "J", false, sp811Sysml},
	{"UN-14 Btu (th)", "5/9", "lb·cal/g", "1.054350E+03", "J", false, sp811Sysml},
	{"UN-18 foot poundal", "", "ft^2·lb/s^2", "4.214011E-02", "J", false, sp811Sysml},
	{"UN-19 horsepower (550 ft lbf/s)", "", "hp", "7.456999E+02", "W", false, sp811Sysml},
	{"UN-19 from its definition", "550", "ft·lbf/s", "7.456999E+02", "W", false, sp811Sysml},
	{"UN-23 inch of mercury", "", "inHg", "3.386389E+03", "Pa", false, sp811Sysml},
	{"UN-24 inch of water", "9806.65", "in·kg/(m^2·s^2)", "2.490889E+02", "Pa", false, sp811Sysml},
	{"UN-25 ton of refrigeration", "12000", "BTU/h", "3.516853E+03", "W", false, sp811Sysml},
	{"UN-26 barrel", "9702", "in^3", "1.589873E-01", "m^3", false, sp811Sysml},
	{"UN-31 grain", "1/7000", "lb", "64.79891e-6", "kg", true, scipyConst},
	{"UN-32 pound", "", "lb", "0.45359237", "kg", true, scipyConst},
	{"UN-33 psi", "", "psi", "6894.757293168", "Pa", false, scipyConst},
	{"UN-33 from lbf", "", "lbf/in^2", "6894.757293168", "Pa", false, scipyConst},
	{"UN-34 lbf", "", "lbf", "4.4482216152605", "N", true, scipyConst},
	{"UN-34 from g_n", "9.80665", "lb·m/s^2", "4.4482216152605", "N", true, scipyConst},
	{"UN-35 torr", "", "Torr", "133.3223684", "Pa", false, scipyConst},
	{"UN-36 bar", "", "bar", "1e5", "Pa", true, scipyConst},
	{"UN-37 atm", "", "atm", "101325", "Pa", true, scipyConst},
	{"UN-38 cal", "", "cal", "4.184", "J", true, scipyConst},
	{"UN-39 cal_IT", "", "cal_IT", "4.1868", "J", true, scipyConst},
	{"UN-40 Btu_IT", "", "BTU", "1055.05585262", "J", true, scipyConst},
	{"UN-40 from cal_IT", "5/9", "lb·cal_IT/g", "1055.05585262", "J", true, scipyConst},
	{"UN-41 Btu_th", "5/9", "lb·cal/g", "1054.350264489", "J", false, scipyConst},
	{"UN-42 hp", "", "hp", "745.699871582", "W", false, scipyConst},
	{"UN-43 erg", "", "erg", "1e-7", "J", true, scipyConst},
	{"UN-44 dyne", "", "dyn", "1e-5", "N", true, scipyConst},
	{"UN-45 tonne", "", "t", "1e3", "kg", true, scipyConst},
	{"UN-46 ton TNT", "", "t·kcal/g", "4.184e9", "J", true, scipyConst},
	{"UN-47 eV", "", "eV", "1.602176634e-19", "J", true, scipyConst},
	{"UN-50 Btu_IT", "", "BTU", "1.05505585262", "kJ", true, kelton},
	{"UN-51 cal IT", "", "cal_IT", "4.1868", "J", true, hobby},
	{"UN-51 cal th", "", "cal", "4.184", "J", true, hobby},
	{"UN-52 foot pound-force", "", "ft·lbf", "1.355818", "J", false, hobby},
	{"UN-52 foot poundal", "", "ft^2·lb/s^2", "0.042140", "J", false, hobby},
	{"UN-52 hp hour", "", "hp·h", "2684520", "J", false, hobby},
	{"UN-53 hp", "", "hp", "746", "W", false, openStax},
	{"UN-53 kWh", "", "kWh", "3.600e6", "J", false, openStax},
	{"UN-53 Btu", "", "BTU", "1.055e3", "J", false, openStax},
	{"UN-54 atm", "", "atm", "1.013e5", "Pa", false, openStax},
	{"UN-54 psi", "", "psi", "6.895e3", "Pa", false, openStax},
	{"UN-54 cmHg", "10", "mmHg", "1.333e3", "Pa", false, openStax},
	{"UN-54 pound force", "", "lbf", "4.448", "N", false, openStax},

	{"GU-01 charge", "", "C", "2997924580", "statC", true, gaussTable},
	{"GU-01 charge, franklin", "", "C", "2997924580", "Fr", true, gaussTable},
	{"GU-02 current", "", "A", "2997924580", "statC/s", true, gaussTable},
	{"GU-02 current, statA", "", "A", "2997924580", "statA", true, gaussTable},
	{"GU-03 potential", "", "V", "0.003335640952", "statV", false, gaussTable},
	{"GU-04 electric field", "", "V/m", "3.335640952e-05", "statV/cm", false, gaussTable},
	{"GU-05 magnetic induction", "", "T", "10000", "G", true, gaussTable},
	{"GU-06 magnetic field strength", "", "A/m", "0.01256637061", "Oe", false, gaussTable},
	{"GU-07 magnetic moment", "", "A·m^2", "1000", "erg/G", true, gaussTable},
	{"GU-08 magnetic flux", "", "Wb", "100000000", "G·cm^2", true, gaussTable},
	{"GU-09 resistance", "", "ohm", "1.112650056e-12", "statV/statA", false, gaussTable},
	{"GU-10 resistivity", "", "ohm·m", "1.112650056e-10", "statV·cm/statA", false, gaussTable},
	{"GU-11 capacitance", "", "F", "8.987551787e+11", "statC/statV", false, gaussTable},
	{"GU-12 inductance", "", "H", "1.112650056e-12", "statV·s/statA", false, gaussTable},
	{"GU-13 gauss", "", "G", "1e-4", "T", true, crystTable},
	{"GU-13 emu/cm^3", "", "erg/(G·cm^3)", "1e3", "A/m", true, crystTable},
	{"GU-14 flux", "", "Mx", "1e-8", "Wb", true, nbsMagn},
	{"GU-14 energy density", "", "erg/cm^3", "1e-1", "J/m^3", true, nbsMagn},
	{"GU-15 oersted", "", "Oe", "79.57747", "A/m", false, "reed-sensor.com/glossary/oersted/"},
	{"HY-06 megagauss oersted", "", "MG·Oe", "7957.747", "J/m^3", false, "encyclopedia text on the maximum energy product (readablewiki.com, questionai.com); 1e5/(4π) J/m^3"},
	{"HY-06 as one symbol", "", "MGOe", "7.958", "kJ/m^3", false, "as above"},

	{"UM-01 statvolt", "", "statV", "2.997925E+02", "V", false, memory811},
	{"UM-02 statcoulomb", "", "statC", "3.335641E-10", "C", false, memory811},
	{"UM-03 statampere", "", "statA", "3.335641E-10", "A", false, memory811},
	{"UM-04 statfarad", "", "statC/statV", "1.112650E-12", "F", false, memory811},
	{"UM-05 stathenry", "", "statV·s/statA", "8.987552E+11", "H", false, memory811},
	{"UM-06 statohm", "", "statV/statA", "8.987552E+11", "ohm", false, memory811},
	{"UM-12 gilbert", "", "Oe·cm", "7.957747E-01", "A", false, memory811},
	{"UM-13 maxwell", "", "Mx", "1.0E-08", "Wb", true, memory811},
	{"UM-15 oersted", "", "Oe", "7.957747E+01", "A/m", false, memory811},
	{"UM-16 gauss", "", "G", "1.0E-04", "T", true, memory811},
	{"UM-17 torr", "", "Torr", "1.333224E+02", "Pa", false, memory811},
}

func must(t testing.TB, phrase string) Unit {
	t.Helper()
	u, err := Parse(phrase)
	if err != nil {
		t.Fatalf("%q: %s (%s)", phrase, err.Message, err.Detail)
	}
	return u
}

func TestPublishedFactors(t *testing.T) {
	for _, c := range publishedValues {
		from, to := must(t, c.phrase), must(t, c.unit)
		if !from.Dim.Compatible(to.Dim) {
			t.Errorf("%s: %s has dimension %s, %s has %s", c.id, c.phrase, from.Dim, c.unit, to.Dim)
			continue
		}
		f := from.Factor.Div(to.Factor)
		if c.exact {
			exactly(t, c, f)
			continue
		}
		got := f.Float64() * number(t, c.times)
		want := number(t, c.want)
		if half := halfDigit(c.want); math.Abs(got-want) > half*(1+1e-9) {
			t.Errorf("%s: %s %s = %.10g %s, printed %s ± %g (%s)", c.id, c.times, c.phrase, got, c.unit, c.want, half, c.source)
		}
	}
}

// exactly compares an exact factor with the printed exact value, without floats.
func exactly(t *testing.T, c published, f Factor) {
	t.Helper()
	want, ok := new(big.Rat).SetString(c.want)
	times := big.NewRat(1, 1)
	if c.times != "" {
		times.SetString(c.times)
	}
	if !ok || f.Pi() != 0 || !f.Exact() {
		t.Fatalf("%s: not a rational factor: %s", c.id, f)
	}
	if got := times.Mul(times, f.Rational()); got.Cmp(want) != 0 {
		t.Errorf("%s: got %s, want exactly %s (%s)", c.id, got.RatString(), c.want, c.source)
	}
}

func number(t testing.TB, s string) float64 {
	t.Helper()
	if s == "" {
		return 1
	}
	r, ok := new(big.Rat).SetString(s)
	if !ok {
		t.Fatalf("not a number: %q", s)
	}
	x, _ := r.Float64()
	return x
}

// halfDigit is half a unit of the last digit written.
func halfDigit(s string) float64 {
	mantissa, e, _ := strings.Cut(strings.ToLower(s), "e")
	exp, _ := strconv.Atoi(e)
	_, frac, _ := strings.Cut(mantissa, ".")
	return 0.5 * math.Pow10(exp-len(frac))
}

// TestDoubtfulValues holds misprints and data errors that others carry: ours
// must disagree with them.
func TestDoubtfulValues(t *testing.T) {
	cases := []struct {
		id, times, phrase, unit string
		wrong                   float64
		source                  string
	}{
		{"UN-55 gallon is 231 in^3 = 3.785412 L", "231", "in^3", "L", 3.788, openStax},
		{"UN-55 cubic foot is 7.480519 gal", "1/231", "ft^3/in^3", "1", 7.477, openStax},
		{"UN-53 calorie of 4.186 J is the one of 15 °C", "", "cal", "J", 4.186, openStax},
		{"UN-20 electric horsepower of 746 W", "", "hp", "W", 746, sp811Sysml},
		{"UN-21 boiler horsepower", "", "hp", "W", 9809.50, sp811Sysml},
		{"UM-18 metric horsepower", "", "hp", "W", 735.4988, memory811},
		{"UD-1 tonne of 1e-3 kg", "", "t", "kg", 1e-3, "SI.sysml, line 99"},
		{"UD-2 electronvolt of CODATA 2006", "", "eV", "J", 1.602176487e-19, "SI.sysml, line 95"},
		{"UD-3 astronomical unit off by 1e11", "", "au", "m", 149597870691e11, "SI.sysml, line 102"},
		{"UD-3 astronomical unit before 2012", "", "au", "m", 149597870691, "SI.sysml, line 102"},
	}
	for _, c := range cases {
		f := must(t, c.phrase).Factor.Div(must(t, c.unit).Factor)
		got := f.Float64() * number(t, c.times)
		if math.Abs(got-c.wrong) <= 1e-11*c.wrong {
			t.Errorf("%s: %s is %g %s, the doubtful value (%s)", c.id, c.phrase, got, c.unit, c.source)
		}
	}
	// The right values beside them: the rows' own, and the definitions.
	for _, c := range []published{
		{"gallon", "231", "in^3", "3.785412", "L", false, openStax + ", corrected"},
		{"cubic foot", "1/231", "ft^3/in^3", "7.480519", "1", false, openStax + ", corrected"},
		{"au", "", "au", "149597870700", "m", true, "IAU 2012 resolution B2"},
	} {
		got := must(t, c.phrase).Factor.Div(must(t, c.unit).Factor).Float64() * number(t, c.times)
		if math.Abs(got-number(t, c.want)) > halfDigit(c.want) {
			t.Errorf("%s: got %.9g, want %s", c.id, got, c.want)
		}
	}
}

// TestOutsideTheLanguage lists units of the published tables that the note
// language leaves out: they must be unknown, not silently something else.
func TestOutsideTheLanguage(t *testing.T) {
	for _, s := range []string{"uin", "therm", "slug", "pdl", "gal", "bbl", "gr", "abA", "abV", "abF", "abH", "Gb", "Fahrenheit", "inH2O", "at", "st", "yr", "kn", "TNT"} {
		if u, err := Parse(s); err == nil {
			t.Errorf("%q reads as %s · %s", s, u.Factor, u.Dim)
		}
	}
}

// TestWireGauge converts the diameters of the AWG formula with our inch.
// d(n) = 0.005 in · 92^((36−n)/39): NBS Handbook 100 (1966), exact definition.
func TestWireGauge(t *testing.T) {
	in, mm, mm2 := must(t, "in"), must(t, "mm"), must(t, "mm^2")
	d := func(n float64) float64 { return in.ToSI(0.005 * math.Pow(92, (36-n)/39)) }
	for _, c := range []struct {
		id       string
		n, want  float64
		tol      float64
		diameter bool
	}{
		{"WG-04 0000 AWG, 0.4600 in", -3, 11.684, 5e-9, true}, // NBS Handbook 100, exact: 0.46 in
		{"WG-04 36 AWG, 0.0050 in", 36, 0.127, 5e-9, true},
		{"WG-06 12 AWG", 12, 2.053, 5e-4, true}, // OpenStax, University Physics vol. 2, 9.2, 9.3, 9.6
		{"WG-06 14 AWG", 14, 1.628, 5e-4, true},
		{"WG-06 10 AWG", 10, 2.588, 5e-4, true},
		{"WG-06 5 AWG", 5, 4.621, 5e-4, true},
		{"WG-07 10 AWG", 10, 5.26, 5e-3 * 5.26, false}, // OpenStax, as above, rel 5e-3
		{"WG-07 5 AWG", 5, 16.8, 5e-3 * 16.8, false},
		{"WG-07 20 AWG", 20, 0.52, 5e-3 * 0.52, false},
	} {
		got := mm.FromSI(d(c.n))
		if !c.diameter {
			got = mm2.FromSI(math.Pi / 4 * d(c.n) * d(c.n))
		}
		if math.Abs(got-c.want) > c.tol {
			t.Errorf("%s: got %.6g, want %g", c.id, got, c.want)
		}
	}
	// WG-06 prints 8.252 mm for 0 AWG; the formula gives 8.2515, which rounds to
	// 8.251. The book's figure is that of 324.9 mil, so that is what is converted.
	if got := mm.FromSI(must(t, "mil").ToSI(324.9)); math.Abs(got-8.252) > 5e-4 {
		t.Errorf("WG-06 0 AWG: 324.9 mil is %.6g mm, want 8.252", got)
	}
	// WG-05, diameters 25.3, 20.1, 15.9 mil rounded from the formula.
	for n, mil := range map[float64]float64{22: 25.3, 24: 20.1, 26: 15.9} {
		if got := must(t, "mil").FromSI(d(n)); math.Abs(got-mil) > 0.05 {
			t.Errorf("WG-05: %g AWG is %.4g mil, want %g", n, got, mil)
		}
	}
}
