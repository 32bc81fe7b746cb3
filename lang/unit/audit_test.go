package unit

import (
	"math"
	"math/big"
	"slices"
	"testing"

	units "github.com/bcicen/go-units"
)

// audited is a customary unit of go-units with its factor as NIST SP 811 (2008)
// appendix B.8 or the BIPM SI Brochure (9th edition, table 8) defines it.
type audited struct {
	symbol string // our phrase, "" where the note language has no such unit
	from   units.Unit
	to     units.Unit
	si     string // our unit for `to`
	want   string // exact definition, as a product of rationals
	source string
}

// auditTable was typed from the definitions, not from go-units.
var auditTable = []audited{
	{"Å", units.Angstrom, units.Meter, "m", "1/10000000000", srcSP811},
	{"in", units.Inch, units.Meter, "m", "0.0254", srcSP811},
	{"ft", units.Foot, units.Meter, "m", "0.3048", srcSP811},
	{"yd", units.Yard, units.Meter, "m", "0.9144", srcSP811},
	{"mi", units.Mile, units.Meter, "m", "1609.344", srcSP811},
	{"", units.Furlong, units.Meter, "m", "201.168", "660 ft, international foot"},
	{"", units.Grain, units.Gram, "g", "0.06479891", srcSP811},
	{"oz", units.Ounce, units.Gram, "g", "28.349523125", srcSP811},
	{"lb", units.Pound, units.Gram, "g", "453.59237", srcSP811},
	{"", units.Stone, units.Gram, "g", "6350.29318", "14 lb"},
	{"t", units.Ton, units.Gram, "g", "1000000", srcSI8}, // its symbol is "t", which is the tonne
	{"lbf·s^2/ft", units.Slug, units.Gram, "g", "8896443230521/609600000", "1 lbf·s²/ft: 4.4482216152605 N / 0.3048 m in grams"},
	{"", units.Pint, units.Liter, "L", "0.56826125", srcSP811},
	{"", units.Gallon, units.Liter, "L", "4.54609", srcSP811},
	{"", units.FluidGallon, units.Liter, "L", "3.785411784", "231 in³; NIST SP 811"},
	{"", units.MilliBar, units.Pascal, "Pa", "100", srcSP811},
	{"", units.CentiBar, units.Pascal, "Pa", "1000", srcSP811},
	{"", units.MicroBar, units.Pascal, "Pa", "0.1", srcSP811},
	{"", units.Barye, units.Pascal, "Pa", "0.1", "1 dyn/cm²"},
	{"bar", units.Bar, units.Pascal, "Pa", "100000", srcSP811},
	{"atm", units.Atm, units.Pascal, "Pa", "101325", srcSP811},
	{"", units.At, units.Pascal, "Pa", "98066.5", srcSP811},
	{"Torr", units.Torr, units.Pascal, "Pa", "20265/152", "101325/760 Pa; NIST SP 811"},
	{"mmHg", units.MmHg, units.Pascal, "Pa", "133.322387415", "conventional, 13595.1 kg/m³ · 9.80665 m/s²; NIST SP 811"},
	{"", units.CmHg, units.Pascal, "Pa", "1333.22387415", "conventional; NIST SP 811"},
	{"", units.MHg, units.Pascal, "Pa", "133322.387415", "conventional"},
	{"", units.MH2O, units.Pascal, "Pa", "9806.65", "conventional, 1000 kg/m³"},
	{"", units.CmH2O, units.Pascal, "Pa", "98.0665", "conventional, 1000 kg/m³; NIST SP 811"},
	{"inHg", units.InHg, units.Pascal, "Pa", "3386.388640341", "25.4 conventional mmHg"},
	{"", units.InH2O, units.Pascal, "Pa", "249.08891", "conventional, 1000 kg/m³; NIST SP 811"},
	{"", units.MmH2O, units.Pascal, "Pa", "9.80665", "conventional, 1000 kg/m³; NIST SP 811"},
	{"psi", units.Psi, units.Pascal, "Pa", "8896443230521/1290320000", "lbf/in²; NIST SP 811"},
	{"eV", units.ElectronVolt, units.Joule, "J", "1.602176634e-19", srcSI8},
	{"cal", units.Calorie, units.Joule, "J", "4.184", srcSP811},
	{"Wh", units.WattHour, units.Joule, "J", "3600", srcSP811},
	{"kWh", units.KiloWattHour, units.Joule, "J", "3600000", srcSP811},
	{"MWh", units.MegaWattHour, units.Joule, "J", "3600000000", srcSP811},
	{"GWh", units.GigaWattHour, units.Joule, "J", "3600000000000", srcSP811},
	{"TWh", units.TeraWattHour, units.Joule, "J", "3600000000000000", srcSP811},
	{"", units.PetaWattHour, units.Joule, "J", "3600000000000000000", srcSP811},
	{"", units.Year, units.Second, "s", "31536000", "365 d; NIST SP 811"},
	{"", units.PlanckTime, units.Second, "s", "5.391247e-44", "CODATA 2022, to its uncertainty of 1.1e-5"},
	{"min", units.Minute, units.Second, "s", "60", srcSI8},
	{"h", units.Hour, units.Second, "s", "3600", srcSI8},
	{"d", units.Day, units.Second, "s", "86400", srcSI8},
}

// failing is what the audit finds wrong in go-units v1.0.5, by its own name of
// the unit. A new version that repairs or breaks a unit fails the test.
var failing = []string{
	"bar",
	"centibar",
	"centimeter of Mercury",
	"centimeter of Water Column",
	"electronvolt",
	"inch of Mercury",
	"inch of Water Column",
	"megawatt-hour",
	"meter of Mercury",
	"meter of Water Column",
	"microbar",
	"millibar",
	"millimeter of Mercury",
	"millimeter of Water Column",
	"planck time",
	"pound-force per square inch",
	"slug",
	"standard atmosphere",
	"ton",
	"year",
}

// TestAuditGoUnits prints each factor of go-units that is not the defined one,
// and holds the list of them and our own factors.
func TestAuditGoUnits(t *testing.T) {
	var wrong []string
	for _, a := range auditTable {
		want, ok := new(big.Rat).SetString(a.want)
		if !ok {
			t.Fatalf("%s: %q is not a number", a.from.Name, a.want)
		}
		right, _ := want.Float64()
		v, err := units.ConvertFloat(1, a.from, a.to)
		if got := v.Float(); err != nil || math.Abs(got-right) > 1e-10*right {
			wrong = append(wrong, a.from.Name)
			t.Logf("go-units: 1 %s = %.10g %s, defined as %.10g (off by %+.2g): %s", a.from.Name, got, a.to.Name, right, got/right-1, a.source)
		}
		ours(t, a, want)
	}
	slices.Sort(wrong)
	if !slices.Equal(wrong, failing) {
		t.Errorf("failing factors of go-units changed:\n got %q\nwant %q", wrong, failing)
	}
}

// ours holds our factor of the unit, exactly.
func ours(t *testing.T, a audited, want *big.Rat) {
	t.Helper()
	if a.symbol == "" {
		return
	}
	got := must(t, a.symbol).Factor.Div(must(t, a.si).Factor).Rational()
	if got == nil || got.Cmp(want) != 0 {
		t.Errorf("%s: our factor is %v, defined as %s (%s)", a.symbol, got, want.RatString(), a.source)
	}
}

// TestGoUnitsMixesDimensions records that go-units converts an energy to a power
// (its kWh to TWh are registered in watts), so that it can never be asked for a
// conversion that a note wrote.
func TestGoUnitsMixesDimensions(t *testing.T) {
	v, err := units.ConvertFloat(1, units.Joule, units.Watt)
	if err != nil {
		t.Fatalf("go-units no longer converts 1 J to watts (%v): amend the audit and this record", err)
	}
	t.Logf("go-units: 1 J = %g W", v.Float())
	if must(t, "J").Dim.Compatible(must(t, "W").Dim) {
		t.Error("ours does too")
	}
}

// TestSuppliedUnitsAreAudited holds that whatever go-units supplies is in the
// audit and passes.
func TestSuppliedUnitsAreAudited(t *testing.T) {
	passed := map[string]bool{}
	for _, a := range auditTable {
		passed[a.symbol] = !slices.Contains(failing, a.from.Name)
	}
	for symbol := range supplied() {
		if !passed[symbol] {
			t.Errorf("%s is supplied by go-units and has not passed the audit", symbol)
		}
	}
	for i := range rows {
		if _, ok := supplied()[rows[i].symbol]; ok != (rows[i].num == 0) {
			t.Errorf("%s: the table and the supplied units disagree about who has the factor", rows[i].symbol)
		}
	}
}

// TestEveryUnitIsAudited holds that each unit beyond the SI, and each level, is
// in one of the lists of published or defined factors, so that a new line of the
// table needs a figure from outside.
func TestEveryUnitIsAudited(t *testing.T) {
	seen := map[string]bool{"dB": true, "Np": true} // by kind: TestLevelByKind
	for _, c := range publishedValues {
		seen[c.phrase], seen[c.unit] = true, true
	}
	for _, c := range auditTable {
		seen[c.symbol] = true
	}
	for _, c := range definedFactors {
		seen[c.phrase] = true
	}
	for _, c := range levelValues {
		seen[c.phrase] = true
	}
	for _, r := range rows {
		if r.source != srcSI && !seen[r.symbol] {
			t.Errorf("%s (%s) has no published factor beside it", r.symbol, r.name)
		}
	}
	for _, r := range levelRows {
		if !seen[r.symbol] {
			t.Errorf("%s (%s) has no published value beside it", r.symbol, r.name)
		}
	}
}
