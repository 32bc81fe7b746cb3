package unit

import (
	"math"
	"testing"
)

func TestCoherent(t *testing.T) {
	for phrase, want := range map[string]string{
		"J/m^3": "J/m^3", "Pa": "J/m^3", "kV/mm": "V/m", "C·m": "C·m", "uC/cm^2": "C/m^2", "mW/cm^2": "W/m^2", "W/(cm^2·K)": "W/(m^2·K)", "V·A": "W",
		"N·m": "J", "lbf/in": "N/m", "psi": "J/m^3", "G": "T", "Oe": "A/m", "statV/cm": "V/m", "°C": "K", "rpm": "Hz", "°/s": "rad/s", "Bq": "s^-1", "1/s": "s^-1",
		"%": "1", "cm^-1": "m^-1", "Wb/m": "Wb/m", "H^-1": "H^-1", "Ω·cm": "Ω·m", "S/cm": "S/m", "ohm/km": "Ω/m", "nV/Hz^(1/2)": "V/Hz^(1/2)", "kWh": "J",
		"A·s/m^3": "C/m^3", "V·m^2": "V·m^2", "S/m^2": "S/m^2", "m^(1/2)/s": "m^(1/2)/s", "J/(g·K)": "J/(kg·K)", "cm^2/(V·s)": "m^2/(V·s)", "mT·m^2": "Wb",
		"erg/(G·cm^3)": "A/m", "rad·V": "V", "Hz·m": "m/s", "lm": "lm", "sr": "sr", "W/sr": "W/sr", "K/W": "K/W", "kg·m^2/s^3": "W", "Pa·m^5": "J·m^2",
	} {
		u := must(t, phrase)
		got := Coherent(u.Dim)
		if got.Symbol != want {
			t.Errorf("%s: coherent unit is %s, want %s", phrase, got.Symbol, want)
		}
		if !got.Coherent() || got.Dim.Base() != u.Dim.Base() {
			t.Errorf("%s: %s is not coherent or has dimension %s, want %s", phrase, got.Symbol, got.Dim, u.Dim)
		}
	}
	if u := Coherent(Dim{invalidRat}); !u.IsZero() {
		t.Errorf("a dimension that overflowed has the unit %s", u)
	}
}

func TestReadableUnits(t *testing.T) {
	seen := map[Dim]string{}
	for _, s := range readable {
		u := must(t, s)
		if !u.Coherent() {
			t.Errorf("%s is not coherent", s)
		}
		if other, dup := seen[u.Dim]; dup {
			t.Errorf("%s is never shown, %s has its dimension", s, other)
		}
		seen[u.Dim] = s
	}
}

// TestChoose holds the prefix that gives 1 to 999 (ISO 80000-1, 7.2.4: prefixes
// in thousands), and what takes none.
func TestChoose(t *testing.T) {
	for _, c := range []struct {
		unit string
		si   float64
		want string
	}{
		{"V/m", 4e6, "MV/m"}, {"J/m^3", 616.3, "J/m^3"}, {"m", 3e-3, "mm"}, {"m", 2500, "km"}, {"F", 4.7e-10, "pF"}, {"Ω·m", 1e13, "TΩ·m"},
		{"V", 999.94, "V"}, {"V", 999.96, "kV"}, {"V", 1000, "kV"}, {"V", 1, "V"}, {"V", 0.99999, "V"}, {"V", 0.9999, "mV"}, {"V", -0.5, "mV"}, {"V", 0, "V"},
		{"V", math.Inf(1), "V"}, {"V", math.NaN(), "V"}, {"V", 1e-40, "qV"}, {"V", 1e40, "QV"},
		{"kg", 3e-5, "mg"}, {"kg", 0.5, "g"}, {"kg", 5000, "kg"}, {"kg/m^3", 8960, "kg/m^3"}, {"kg/m^3", 1e-3, "kg/m^3"},
		{"m^2", 2e-3, "mm^2"}, {"m^2", 5, "m^2"}, {"m^2", 1e7, "km^2"}, {"m^3", 5e-8, "mm^3"}, {"m^3", 2e-3, "m^3"},
		{"s", 3600, "s"}, {"s", 4e-9, "ns"}, {"K", 1e-3, "K"}, {"K", 5e4, "K"}, {"1", 1e-4, "1"}, {"rad", 2e-3, "mrad"}, {"rad", 5e3, "rad"},
		{"rad/s", 3e6, "Mrad/s"}, {"Hz", 2.4e9, "GHz"}, {"H^-1", 1.2e6, "µH^-1"}, {"m^-1", 5e5, "mm^-1"}, {"W/(m^2·K)", 2e4, "kW/(m^2·K)"}, {"K/W", 1e-3, "K/W"},
		{"V/Hz^(1/2)", 4e-9, "nV/Hz^(1/2)"}, {"V·A", 2e6, "MV·A"}, {"var/m", 30, "var/m"}, {"var/m", 3e4, "kvar/m"}, {"A·m^2", 1e-3, "mA·m^2"}, {"m^(1/2)", 1e-6, "m^(1/2)"},
		{"in", 2540, "in"}, {"°C", 300, "°C"}, {"dBm", 1e-3, "dBm"}, {"%", 0.5, "%"},
	} {
		u := must(t, c.unit)
		got := Choose(u, c.si)
		if got.Symbol != c.want || got.Dim != u.Dim {
			t.Errorf("%g in %s: chose %s (%s), want %s", c.si, c.unit, got, got.Dim, c.want)
		}
	}
}
