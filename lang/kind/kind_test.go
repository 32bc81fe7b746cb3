package kind

import (
	"slices"
	"strings"
	"testing"
	"unicode/utf8"

	"inkjoule/lang/unit"
)

func TestEveryKindParses(t *testing.T) {
	seen := map[string]ID{}
	for _, k := range All() {
		if table[k].Name == "" {
			t.Fatalf("kind %d has no line in the table", k)
		}
		for _, name := range table[k].Names() {
			if other, dup := seen[fold(name)]; dup {
				t.Errorf("%q is a name of %s and %s", name, other, k)
			}
			seen[fold(name)] = k
			for _, q := range append(Qualifiers(), "") {
				gotQ, got, fault := Parse(strings.TrimSpace(q + " " + name))
				if fault != nil || got != k || gotQ.String() != q {
					t.Errorf("%s %q reads as %s %q (%v)", q, name, gotQ, got, fault)
				}
			}
		}
		if u, err := unit.Parse(table[k].Unit); err != nil || !u.Coherent() || k.Unit().Symbol != table[k].Unit {
			t.Errorf("%s: the unit %q is not a coherent unit (%v)", k, table[k].Unit, err)
		}
		if table[k].Symbol == "" {
			t.Errorf("%s has no symbol", k)
		}
	}
}

// TestParents: a specialization has the dimension of its parent, and there are
// no cycles.
func TestParents(t *testing.T) {
	for _, k := range All() {
		p := table[k].Parent
		for steps := 0; p.valid(); p = table[p].Parent {
			if steps++; steps > 5 {
				t.Fatalf("%s has a cycle of parents", k)
			}
			if p.Dim() != k.Dim() {
				t.Errorf("%s is in %s, its parent %s in %s", k, k.Unit(), p, p.Unit())
			}
			if !k.Is(p) || p.Is(k) || Apart(k, p) {
				t.Errorf("%s must be a %s", k, p)
			}
		}
	}
}

func TestUnknownKind(t *testing.T) {
	for _, k := range []ID{0, ID(len(table)), 65535} {
		if k.String() != "" || !k.Unit().IsZero() || k.Is(Energy) || Apart(k, Torque) || !Compatible(k, Energy) || k.Dim() != (unit.Dim{}) {
			t.Errorf("kind %d must be unknown and agree with everything", k)
		}
		if _, known := RootPower(k); known {
			t.Errorf("kind %d decides a level", k)
		}
	}
	if Energy.Is(0) {
		t.Error("energy is no unknown kind")
	}
}

// designApart is the design's list of kinds kept apart, as it stands there.
var designApart = []string{
	"energy density ≠ pressure", "energy ≠ torque", "energy ≠ coenergy", "frequency ≠ angular frequency",
	"power ≠ apparent power ≠ reactive power", "magnetic flux density ≠ magnetic polarization",
	"magnetic field strength ≠ magnetization ≠ surface current density ≠ coercivity",
	"electric flux density ≠ polarization ≠ surface charge density", "permittivity ≠ lineic capacitance",
	"permeability ≠ lineic inductance", "lineic energy ≠ force", "specific absorption rate ≠ specific power",
	"resistance ≠ surface resistance", "temperature ≠ temperature rise", "potential ≠ voltage",
}

func TestKeptApart(t *testing.T) {
	listed := map[[2]ID]bool{{EnergyDensity, CoenergyDensity}: true} // follows from energy ≠ coenergy
	for _, chain := range designApart {
		names := strings.Split(chain, " ≠ ")
		for i, a := range names {
			for _, b := range names[i+1:] {
				x, y := find1(t, a), find1(t, b)
				listed[[2]ID{x, y}] = true
				if !Apart(x, y) || !Apart(y, x) || Compatible(x, y) {
					t.Errorf("%s and %s must be kept apart", a, b)
				}
				if !x.Dim().Compatible(y.Dim()) {
					t.Errorf("%s and %s do not even tie: %s, %s", a, b, x.Unit(), y.Unit())
				}
			}
		}
	}
	for pair := range derived().apart {
		if !listed[pair] && !listed[[2]ID{pair[1], pair[0]}] {
			t.Errorf("%s and %s are kept apart and not listed", pair[0], pair[1])
		}
	}
}

func TestApartOfSpecializations(t *testing.T) {
	for _, c := range []struct {
		a, b string
		want bool
	}{
		{"heat", "torque", true}, {"source work", "coenergy", true}, {"active energy", "energy", false}, {"heat", "source work", false},
		{"capacitance", "differential capacitance", false}, {"differential capacitance", "energy-equivalent capacitance", false},
		{"dielectric strength", "electric field strength", false}, {"source voltage", "potential", true}, {"ac resistance", "surface resistance", true},
		{"EIRP", "reactive power", false}, {"stress", "energy density", true}, {"complex power", "power", false},
	} {
		if got := Apart(find1(t, c.a), find1(t, c.b)); got != c.want {
			t.Errorf("%s and %s apart: %t, want %t", c.a, c.b, got, c.want)
		}
	}
	if !Meant(Pressure, EnergyDensity) || !Meant(EnergyDensity, Pressure) || Meant(Energy, Torque) {
		t.Error("energy density and pressure are often meant to tie, energy and torque are not")
	}
	if !Comparable(MagneticFieldStrength, Coercivity) || Comparable(Frequency, AngularFrequency) || !Comparable(Voltage, 0) {
		t.Error("a field strength is compared with the coercivity, a frequency never with an angular one")
	}
}

func TestSumAndDifference(t *testing.T) {
	for _, c := range []struct {
		a, b, sum, difference string
		addable, subtractable bool
	}{
		{"temperature", "temperature rise", "temperature", "temperature", true, true},
		{"temperature", "temperature", "temperature", "temperature rise", true, true},
		{"potential", "voltage", "electric potential", "electric potential", true, true},
		{"potential", "potential", "electric potential", "voltage", true, true},
		{"electric flux density", "polarization", "electric flux density", "electric flux density", true, true},          // D = ε₀E + P
		{"magnetic flux density", "magnetic polarization", "magnetic flux density", "magnetic flux density", true, true}, // B = μ₀H + J
		{"magnetic field strength", "magnetization", "", "", true, true},                                                 // B/μ₀
		{"energy", "coenergy", "", "", true, true},
		{"energy", "torque", "", "", false, false},
		{"power", "reactive power", "", "", false, false},
		{"energy density", "pressure", "", "", false, false},
		{"heat", "source work", "energy", "energy", true, true},
		{"heat", "energy", "energy", "energy", true, true},
		{"capacitance", "capacitance", "capacitance", "capacitance", true, true},
		{"radius", "thickness", "length", "length", true, true},
	} {
		a, b := find1(t, c.a), find1(t, c.b)
		sum, ok := Sum(a, b)
		if back, ok2 := Sum(b, a); back != sum || ok != ok2 {
			t.Errorf("%s + %s does not commute", c.a, c.b)
		}
		if ok != c.addable || ok && sum.String() != c.sum {
			t.Errorf("%s + %s is %q, %t; want %q, %t", c.a, c.b, sum, ok, c.sum, c.addable)
		}
		if diff, ok := Difference(a, b); ok != c.subtractable || ok && diff.String() != c.difference {
			t.Errorf("%s − %s is %q, %t; want %q", c.a, c.b, diff, ok, c.difference)
		}
	}
	if k, ok := Sum(0, Energy); k != Energy || !ok {
		t.Error("a sum with an unknown kind is of the known one")
	}
}

func TestByDim(t *testing.T) {
	for _, c := range []struct {
		unit  string
		has   []ID
		lacks []ID
	}{
		{"Hz", []ID{Frequency}, []ID{AngularFrequency}},
		{"rpm", []ID{Frequency}, []ID{AngularFrequency}},
		{"rad/s", []ID{AngularFrequency}, []ID{Frequency}},
		{"s^-1", nil, []ID{Frequency, AngularFrequency}},
		{"rad/m", []ID{PhaseCoefficient, AttenuationCoefficient}, nil},
		{"m^-1", []ID{PhaseCoefficient, AttenuationCoefficient}, nil},
		{"°", []ID{Angle, LossAngle, PhaseDifference}, []ID{Ratio}},
		{"1", []ID{Ratio, LossFactor, RelativePermittivity}, []ID{Angle, SolidAngle}},
		{"sr", []ID{SolidAngle}, []ID{Angle}},
		{"kV/mm", []ID{ElectricFieldStrength, DielectricStrength}, []ID{Voltage}},
		{"N·m/rad", []ID{Torque, Energy}, nil},
		{"mol", nil, []ID{Energy}},
	} {
		u, err := unit.Parse(c.unit)
		if err != nil {
			t.Fatal(err)
		}
		got := ByDim(u.Dim)
		for _, k := range c.has {
			if !slices.Contains(got, k) {
				t.Errorf("%s is not among the kinds of %s", k, c.unit)
			}
		}
		for _, k := range c.lacks {
			if slices.Contains(got, k) {
				t.Errorf("%s is among the kinds of %s", k, c.unit)
			}
		}
	}
}

func TestDefault(t *testing.T) {
	for phrase, want := range map[string]string{
		"V/m": "electric field strength", "kV/mm": "electric field strength", "Hz": "frequency", "rad/s": "angular frequency", "C": "electric charge", "S/m": "conductivity",
		"uF": "capacitance", "mH": "inductance", "mm": "length", "ns": "time", "W/m^2": "power flux density", "W/m^3": "power density", "kg/m^3": "density",
		"J/m^3": "", "J": "", "W": "", "N·m": "", "T": "", "A/m": "", "C/m^2": "", "F/m": "", "H/m": "", "V": "", "A": "", "K": "", "Ω": "", "W/kg": "", "1": "", "s^-1": "", "N/m": "",
	} {
		u, err := unit.Parse(phrase)
		if err != nil {
			t.Fatal(err)
		}
		k, ok := Default(u.Dim)
		if k.String() != want || ok != (want != "") {
			t.Errorf("%s is taken for %q, want %q", phrase, k, want)
		}
	}
	for d, list := range derived().byDim {
		n := 0
		for _, k := range list {
			if table[k].Plain {
				n++
			}
		}
		if n > 1 {
			t.Errorf("%s has %d plain kinds", d, n)
		}
	}
}

// TestRootPower: ISO 80000-1:2009, annex C: fields, voltages and currents are
// root-power quantities, energies and powers power quantities.
func TestRootPower(t *testing.T) {
	for name, want := range map[string]string{
		"voltage": "20", "electric field strength": "20", "magnetic field strength": "20", "current": "20", "dielectric strength": "20", "amplitude ratio": "20",
		"power": "10", "power flux density": "10", "energy": "10", "energy density": "10", "EIRP": "10", "specific absorption rate": "10", "power ratio": "10", "heat": "10",
		"ratio": "?", "gain": "?", "length": "?", "permittivity": "?", "pressure": "?", "loss factor": "?",
	} {
		root, known := RootPower(find1(t, name))
		got := map[[2]bool]string{{true, true}: "20", {false, true}: "10", {false, false}: "?"}[[2]bool{root, known}]
		if got != want {
			t.Errorf("%s: %s lg, want %s lg", name, got, want)
		}
	}
}

func TestParseFaults(t *testing.T) {
	for _, c := range []struct{ words, at, suggest string }{
		{"voltage rms", "voltage rms", "rms voltage"},
		{"mean power", "mean power", "average power"},
		{"dc voltage", "dc voltage", "static voltage"},
		{"voltage amplitude", "voltage amplitude", "peak voltage"},
		{"amplitude", "amplitude", "peak"},
		{"effective voltage", "effective voltage", "rms voltage"},
		{"peak elecric field strenght", "elecric field strenght", "peak electric field strength"},
		{"permitivity", "permitivity", "permittivity"},
		{"energi", "energi", "energy"},
		{"field strength", "field strength", ""},
		{"flux density", "flux density", ""},
		{"rms rms", "rms", ""},
		{"energy density in mica", "energy density in mica", ""},
		{"foo bar", "foo bar", ""},
		{"  ", "  ", ""},
		{"", "", ""},
		{strings.Repeat("energy ", 10000), strings.Repeat("energy ", 10000), ""},
		{"\xff\xfe", "\xff\xfe", ""},
	} {
		_, k, f := Parse(c.words)
		if f == nil {
			t.Errorf("%q reads as %s", c.words, k)
			continue
		}
		if got := c.words[f.Start:f.End]; got != c.at || f.Suggest != c.suggest || f.Detail == "" || len(f.Message)+len(f.Detail) > 400 || !utf8.ValidString(f.Message) {
			t.Errorf("%.40q: points at %.40q and offers %q (%s); want %q", c.words, got, f.Suggest, f.Detail, c.suggest)
		}
		if c.suggest != "" {
			if _, _, again := Parse(c.suggest); again != nil {
				t.Errorf("the offer %q does not parse", c.suggest)
			}
		}
	}
	if q, k, f := Parse("Peak To Peak  Voltage"); f != nil || q != PeakToPeak || k != Voltage {
		t.Errorf("case and blanks: %s %s %v", q, k, f)
	}
	if q, _, f := Parse("rms foo"); f == nil || q != RMS {
		t.Error("a readable qualifier is returned with the fault")
	}
}

func TestNearest(t *testing.T) {
	for words, want := range map[string][]string{
		"field strength":            {"electric field strength", "magnetic field strength"},
		"flux density":              {"power flux density", "electric flux density", "magnetic flux density"},
		"electric field intensitiy": {"electric field intensity"},
		"capacitence":               {"capacitance"},
		"power loss":                {"power"},
		"foo":                       nil,
		"":                          nil,
	} {
		got := Nearest(words, 3)
		if len(got) < len(want) || !slices.Equal(got[:len(want)], want) || want == nil && len(got) > 0 {
			t.Errorf("near %q: %q, want first %q", words, got, want)
		}
	}
}

func TestDistance(t *testing.T) {
	for _, c := range []struct {
		a, b string
		want int
	}{{"", "", 0}, {"abc", "", 3}, {"", "ab", 2}, {"kitten", "sitting", 3}, {"volume", "volume", 0}, {"a", "b", 1}, {"ε", "e", 1}} {
		if got := distance(c.a, c.b); got != c.want {
			t.Errorf("distance(%q, %q) = %d, want %d", c.a, c.b, got, c.want)
		}
	}
}

func FuzzParse(f *testing.F) {
	for _, k := range All() {
		for _, name := range table[k].Names() {
			f.Add(name)
		}
	}
	for _, q := range Qualifiers() {
		f.Add(q + " energy")
	}
	f.Add("voltage rms")
	f.Add("energy density in mica")
	f.Add("mean\t power\x80")
	f.Fuzz(func(t *testing.T, words string) {
		q, k, fault := Parse(words)
		if fault != nil {
			if fault.Start < 0 || fault.Start > fault.End || fault.End > len(words) || fault.Message == "" || fault.Detail == "" {
				t.Fatalf("%q: %+v", words, *fault)
			}
			if fault.Suggest != "" {
				if _, _, again := Parse(fault.Suggest); again != nil {
					t.Fatalf("%q: the offer %q does not parse", words, fault.Suggest)
				}
			}
			return
		}
		printed := strings.TrimSpace(q.String() + " " + k.String())
		if q2, k2, again := Parse(printed); again != nil || q2 != q || k2 != k {
			t.Fatalf("%q prints as %q, which reads as %s %s", words, printed, q2, k2)
		}
	})
}

func BenchmarkParse(b *testing.B) {
	for _, s := range []string{"energy density", "peak electric field strength", "elecric field strenght"} {
		b.Run(strings.ReplaceAll(s, " ", "_"), func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				Parse(s)
			}
		})
	}
}
