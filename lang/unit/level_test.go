package unit

import (
	"math"
	"testing"
)

// levelValues are levels by the definitions of IEC 60027-3 and by everyday
// correspondences (30 dBm = 1 W, 120 dBµV = 1 V).
var levelValues = []struct {
	phrase string
	level  float64
	want   float64
	unit   string
}{
	{"dBm", 0, 1e-3, "W"},
	{"dBm", 30, 1, "W"},
	{"dBm", -30, 1e-6, "W"},
	{"dBW", 10, 10, "W"},
	{"dBi", 3, 1.9952623149688795, "1"},   // 10^0.3
	{"dBd", 0, 1.6405897731995394, "1"},   // 2.15 dB over isotropic, 10^0.215
	{"dBuV", 120, 1, "V"},                 // 20 lg(1 V / 1 µV)
	{"dBµV", 60, 1e-3, "V"},               // U+00B5
	{"dBμV/m", 40, 1e-4, "V/m"},           // U+03BC
	{"dBuV/m", 54, 5.011872336e-4, "V/m"}, // 10^(54/20) µV/m
	{"dB(uV/m)", 54, 5.011872336e-4, "V/m"},
	{"dB(mW)", 30, 1, "W"},
	{"dB(W/m^2)", -10, 0.1, "W/m^2"},
	{"dBuA/m", 51.5, 3.758374e-4, "A/m"},
	{"dB(A)", 20, 10, "A"},
	{"dBuA", 40, 1e-4, "A"},
}

func TestLevels(t *testing.T) {
	for _, c := range levelValues {
		u, want := must(t, c.phrase), must(t, c.unit)
		got := u.ToSI(c.level)
		if u.Dim != want.Dim || math.Abs(got/c.want-1) > 1e-6 {
			t.Errorf("%g %s = %.10g (%s), want %.10g %s", c.level, c.phrase, got, u.Dim, c.want, c.unit)
		}
		if back := u.FromSI(got); math.Abs(back-c.level) > 1e-9 {
			t.Errorf("%s: %g comes back as %g", c.phrase, c.level, back)
		}
	}
}

// TestLevelByKind: 20 dB is a factor of 100 in power and 10 in voltage; 1 Np is
// a factor e in voltage (ISO 80000-3:2006, 3-22), 8.686 dB.
func TestLevelByKind(t *testing.T) {
	db, np := must(t, "dB"), must(t, "Np")
	if !db.ByKind() || !np.ByKind() || must(t, "dBm").ByKind() {
		t.Error("dB and Np leave 10 or 20 lg to the kind, dBm does not")
	}
	for _, c := range []struct {
		u     Unit
		level float64
		root  bool
		want  float64
	}{{db, 20, false, 100}, {db, 20, true, 10}, {np, 1, true, math.E}, {np, 1, false, math.E * math.E}, {db, 0, true, 1}, {db, -3, false, 0.5011872336}} {
		got := c.u.Level.ToLinear(c.level, c.root)
		if math.Abs(got/c.want-1) > 1e-9 {
			t.Errorf("%g %s, root-power %t = %g, want %g", c.level, c.u, c.root, got, c.want)
		}
		if back := c.u.Level.FromLinear(got, c.root); math.Abs(back-c.level) > 1e-12 {
			t.Errorf("%g %s comes back as %g", c.level, c.u, back)
		}
	}
	if x := db.ToSI(20); !math.IsNaN(x) {
		t.Errorf("dB without a kind converts to %g, want NaN", x)
	}
}

// TestAttenuation: 1 Np/m = 8.685889638 dB/m (20/ln 10; IEC 60027-3).
func TestAttenuation(t *testing.T) {
	db, np := must(t, "dB/m"), must(t, "Np/m")
	if db.Level != nil || db.Dim != np.Dim || np.ToSI(1) != 1 {
		t.Fatal("a level per length is an attenuation coefficient in m^-1")
	}
	if got := db.FromSI(np.ToSI(1)); math.Abs(got-8.685889638065035) > 1e-12 {
		t.Errorf("1 Np/m = %v dB/m", got)
	}
	if got := must(t, "dB/km").ToSI(8.685889638065035); math.Abs(got-1e-3) > 1e-15 {
		t.Errorf("8.686 dB/km = %v m^-1, want 1e-3", got)
	}
}

func TestBeyondLevels(t *testing.T) {
	if u := must(t, "dBq"); u.Level != nil || u.Scale() != 0.1 {
		t.Error("dBq is a decibecquerel")
	}
	for phrase, rule := range map[string]string{"dB/s": "syntax", "V/dB": "syntax", "dBm/Hz": "syntax", "dB(°C)": "syntax", "dB(dBm)": "syntax", "dBx": "unknown-unit",
		"dBM": "unknown-unit", "dB(": "syntax", "dB()": "syntax", "dB(foo)": "unknown-unit", "dB/foo": "unknown-unit", "dB^2": "syntax", "dB·m": "syntax", "Np(V)": "syntax"} {
		u, err := Parse(phrase)
		if err == nil {
			t.Errorf("%q reads as %s", phrase, u.Dim)
		} else if err.Rule != rule || err.Start < 0 || err.End > len(phrase) || err.Start > err.End || err.Detail == "" {
			t.Errorf("%q: %+v, want rule %s", phrase, *err, rule)
		}
	}
}
