package kind

import (
	"slices"
	"strings"
	"testing"

	"inkjoule/lang/unit"
)

// kindRow is a row of the design's table of kinds, as it stands there: kinds of
// one row are parted by "·", further names by ",", units by ",".
type kindRow struct{ kind, also, unit string }

// designKinds is the table of the note language's kinds; the names are those of
// ISO/IEC 80000 (part 6 for electromagnetism, 3 to 5 for the rest).
var designKinds = []kindRow{
	{"electric current", "current", "A"},
	{"electric charge", "charge", "C"},
	{"volumic electric charge", "charge density, volume charge density", "C/m^3"},
	{"areic electric charge", "surface charge density", "C/m^2"},
	{"lineic electric charge", "line charge density", "C/m"},
	{"electric dipole moment", "", "C·m"},
	{"electric polarization", "polarization", "C/m^2"},
	{"electric current density", "current density", "A/m^2"},
	{"lineic electric current", "surface current density", "A/m"},
	{"electric field strength", "electric field", "V/m"},
	{"electric potential", "potential", "V"},
	{"voltage", "potential difference", "V"},
	{"electric flux density", "electric displacement", "C/m^2"},
	{"electric flux", "", "C"},
	{"capacitance", "differential, energy-equivalent, charge-equivalent capacitance (each a kind of its own)", "F"},
	{"lineic capacitance", "capacitance per length", "F/m"},
	{"permittivity", "", "F/m"},
	{"relative permittivity", "", "1"},
	{"electric susceptibility", "", "1"},
	{"dielectric strength", "breakdown strength", "V/m"},
	{"magnetic flux density", "", "T"},
	{"magnetic flux · linked flux", "", "Wb"},
	{"magnetic moment", "", "A·m^2"},
	{"magnetization", "", "A/m"},
	{"magnetic polarization", "", "T"},
	{"magnetic field strength", "magnetic field", "A/m"},
	{"permeability", "", "H/m"},
	{"relative permeability", "initial, amplitude, incremental, effective permeability (each a kind of its own)", "1"},
	{"coercivity", "", "A/m"},
	{"magnetic vector potential", "", "Wb/m"},
	{"magnetomotive force · current linkage", "", "A"},
	{"reluctance", "", "H^-1"},
	{"inductance · mutual inductance", "", "H"},
	{"lineic inductance", "inductance per length", "H/m"},
	{"conductivity", "", "S/m"},
	{"resistivity", "", "Ω·m"},
	{"resistance · reactance · impedance", "", "Ω"},
	{"conductance · susceptance · admittance", "", "S"},
	{"surface resistance", "", "Ω"},
	{"energy", "work, stored energy", "J"},
	{"source work", "energy drawn from a source", "J"},
	{"coenergy", "", "J"},
	{"active energy", "", "J"},
	{"energy density", "volumic electromagnetic energy", "J/m^3"},
	{"coenergy density", "", "J/m^3"},
	{"lineic energy", "energy per length", "J/m"},
	{"areic energy", "energy per area", "J/m^2"},
	{"power", "active power", "W"},
	{"apparent power · complex power", "", "V·A"},
	{"reactive power", "", "var"},
	{"power density", "volumic power, Joule heating", "W/m^3"},
	{"power flux density", "Poynting vector, irradiance", "W/m^2"},
	{"lineic power", "loss per length", "W/m"},
	{"lineic reactive power · lineic current", "charging power, charging current per length", "var/m, A/m"},
	{"safety factor · utilisation · ratio · efficiency · duty ratio", "", "1"},
	{"equivalent radiated power", "EIRP, ERP (two kinds)", "W"},
	{"specific absorption rate", "", "W/kg"},
	{"specific power", "core loss per mass", "W/kg"},
	{"loss factor", "loss tangent, dissipation factor", "1"},
	{"loss angle · phase difference", "", "rad"},
	{"quality factor · power factor · coupling factor · leakage factor · number of turns", "", "1"},
	{"frequency", "", "Hz"},
	{"angular frequency", "", "rad/s"},
	{"period · time · time constant", "", "s"},
	{"wavelength · length · thickness · radius · skin depth", "", "m"},
	{"area", "", "m^2"},
	{"volume", "", "m^3"},
	{"angle", "", "rad"},
	{"solid angle", "", "sr"},
	{"phase speed · group speed", "", "m/s"},
	{"attenuation coefficient · phase coefficient · propagation coefficient", "", "m^-1"},
	{"refractive index", "", "1"},
	{"stiffness", "", "N/m"},
	{"heating rate", "", "K/s"},
	{"mass", "", "kg"},
	{"density", "mass density", "kg/m^3"},
	{"force", "", "N"},
	{"lineic force", "", "N/m"},
	{"torque", "moment of force", "N·m"},
	{"pressure", "stress, electrostatic pressure, magnetic pressure", "Pa"},
	{"temperature", "thermodynamic temperature", "K"},
	{"temperature rise", "temperature difference", "K"},
	{"thermal conductivity", "", "W/(m·K)"},
	{"thermal resistance", "", "K/W"},
	{"specific heat capacity", "", "J/(kg·K)"},
	{"heat", "", "J"},
	{"ratio", "gain, margin, level difference", "1"},
}

// isoItem is an item of IEC 80000-6:2008: number, names, dimension, units.
type isoItem struct{ item, names, dim, unit string }

// isoItems are the items as the OMG SysML v2 library carries them
// (ISQBase.sysml, ISQElectromagnetism.sysml, "generated from standard
// IEC-80000-6:2008", Systems-Modeling/SysML-v2-Release commit ee25530e). The
// 2022 edition renames some.
var isoItems = []isoItem{
	{"6-1", "electric current", "I^1", "A"},
	{"6-2", "electric charge", "T^1*I^1", "C"},
	{"6-3", "electric charge density, volumic electric charge", "L^-3*T^1*I^1", "C/m^3"},
	{"6-4", "surface density of electric charge, areic electric charge", "L^-2*T^1*I^1", "C/m^2"},
	{"6-5", "linear density of electric charge, lineic electric charge", "L^-1*T^1*I^1", "C/m"},
	{"6-6", "electric dipole moment", "L^1*T^1*I^1", "C*m"},
	{"6-7", "electric polarization", "L^-2*T^1*I^1", "C/m^2"},
	{"6-8", "electric current density, areic electric current", "L^-2*I^1", "A/m^2"},
	{"6-9", "linear electric current density, lineic electric current", "L^-1*I^1", "A/m"},
	{"6-10", "electric field strength", "L^1*M^1*T^-3*I^-1", "V/m"},
	{"6-11.1", "electric potential", "L^2*M^1*T^-3*I^-1", "V"},
	{"6-11.2", "electric potential difference", "L^2*M^1*T^-3*I^-1", "V"},
	{"6-11.3", "voltage, electric tension", "L^2*M^1*T^-3*I^-1", "V"},
	{"6-12", "electric flux density, electric displacement", "L^-2*T^1*I^1", "C/m^2"},
	{"6-13", "capacitance", "L^-2*M^-1*T^4*I^2", "F"},
	{"6-14.1", "electric constant, permittivity of vacuum", "L^-3*M^-1*T^4*I^2", "F/m"},
	{"6-14.2", "permittivity", "L^-3*M^-1*T^4*I^2", "F/m"},
	{"6-15", "relative permittivity", "1", "1"},
	{"6-16", "electric susceptibility", "1", "1"},
	{"6-17", "electric flux", "T^1*I^1", "C"},
	{"6-18", "displacement current density", "L^-2*I^1", "A/m^2"},
	{"6-19.1", "displacement current", "I^1", "A"},
	{"6-19.2", "total current", "I^1", "A"},
	{"6-20", "total current density", "L^-2*I^1", "A/m^2"},
	{"6-21", "magnetic flux density", "M^1*T^-2*I^-1", "T"},
	{"6-22.1", "magnetic flux", "L^2*M^1*T^-2*I^-1", "Wb"},
	{"6-22.2", "linked flux", "L^2*M^1*T^-2*I^-1", "Wb"},
	{"6-23", "magnetic moment, magnetic area moment", "L^2*I^1", "A*m^2"},
	{"6-24", "magnetization", "L^-1*I^1", "A/m"},
	{"6-25", "magnetic field strength, magnetizing field", "L^-1*I^1", "A/m"},
	{"6-26.1", "magnetic constant, permeability of vacuum", "L^1*M^1*T^-2*I^-2", "H/m"},
	{"6-26.2", "permeability", "L^1*M^1*T^-2*I^-2", "H/m"},
	{"6-27", "relative permeability", "1", "1"},
	{"6-28", "magnetic susceptibility", "1", "1"},
	{"6-29", "magnetic polarization", "M^1*T^-2*I^-1", "T"},
	{"6-30", "magnetic dipole moment", "L^3*M^1*T^-2*I^-1", "Wb*m"},
	{"6-31", "coercivity", "L^-1*I^1", "A/m"},
	{"6-32", "magnetic vector potential", "L^1*M^1*T^-2*I^-1", "Wb/m"},
	{"6-33", "electromagnetic energy density, volumic electromagnetic energy", "L^-1*M^1*T^-2", "J/m^3"},
	{"6-34", "Poynting vector", "M^1*T^-3", "W/m^2"},
	{"6-35.1", "phase speed of electromagnetic waves", "L^1*T^-1", "m/s"},
	{"6-35.2", "speed of light, light speed", "L^1*T^-1", "m/s"},
	{"6-36", "source voltage, source tension", "L^2*M^1*T^-3*I^-1", "V"},
	{"6-37.1", "scalar magnetic potential", "I^1", "A"},
	{"6-37.2", "magnetic tension", "I^1", "A"},
	{"6-37.3", "magnetomotive force", "I^1", "A"},
	{"6-37.4", "current linkage", "I^1", "A"},
	{"6-38", "number of turns in a winding", "1", "1"},
	{"6-39", "reluctance", "L^-2*M^-1*T^2*I^2", "H^-1"},
	{"6-40", "permeance", "L^2*M^1*T^-2*I^-2", "H"},
	{"6-41.1", "inductance, self inductance", "L^2*M^1*T^-2*I^-2", "H"},
	{"6-41.2", "mutual inductance", "L^2*M^1*T^-2*I^-2", "H"},
	{"6-42.1", "coupling factor", "1", "1"},
	{"6-42.2", "leakage factor", "1", "1"},
	{"6-43", "conductivity", "L^-3*M^-1*T^3*I^2", "S/m"},
	{"6-44", "resistivity", "L^3*M^1*T^-3*I^-2", "Ω*m"},
	{"6-45", "electric power, instantaneous power", "L^2*M^1*T^-3", "W"},
	{"6-46", "resistance", "L^2*M^1*T^-3*I^-2", "Ω"},
	{"6-47", "conductance", "L^-2*M^-1*T^3*I^2", "S"},
	{"6-48", "phase difference", "1", "rad"},
	{"6-49", "electric current phasor", "I^1", "A"},
	{"6-50", "voltage phasor", "L^2*M^1*T^-3*I^-1", "V"},
	{"6-51.1", "impedance, complex impedance", "L^2*M^1*T^-3*I^-2", "Ω"},
	{"6-51.2", "resistance to alternating current", "L^2*M^1*T^-3*I^-2", "Ω"},
	{"6-51.3", "reactance", "L^2*M^1*T^-3*I^-2", "Ω"},
	{"6-51.4", "modulus of impedance", "L^2*M^1*T^-3*I^-2", "Ω"},
	{"6-52.1", "admittance, complex admittance", "L^-2*M^-1*T^3*I^2", "S"},
	{"6-52.2", "conductance for alternating current", "L^-2*M^-1*T^3*I^2", "S"},
	{"6-52.3", "susceptance", "L^-2*M^-1*T^3*I^2", "S"},
	{"6-52.4", "modulus of admittance", "L^-2*M^-1*T^3*I^2", "S"},
	{"6-53", "quality factor", "1", "1"},
	{"6-54", "loss factor", "1", "1"},
	{"6-55", "loss angle", "1", "rad"},
	{"6-56", "active power", "L^2*M^1*T^-3", "W"},
	{"6-57", "apparent power", "L^2*M^1*T^-3", "V*A"},
	{"6-58", "power factor", "1", "1"},
	{"6-59", "complex power", "L^2*M^1*T^-3", "V*A"},
	{"6-60", "reactive power", "L^2*M^1*T^-3", "V*A, var"},
	{"6-61", "non-active power", "L^2*M^1*T^-3", "V*A"},
	{"6-62", "active energy", "L^2*M^1*T^-2", "J, W*h"},
}

// special rows of designKinds, whose `also` column is prose: what it lists.
var specialRows = map[string][]string{
	"capacitance":               {"differential capacitance", "energy-equivalent capacitance", "charge-equivalent capacitance"},
	"relative permeability":     {"initial permeability", "amplitude permeability", "incremental permeability", "effective permeability"},
	"equivalent radiated power": {"EIRP", "ERP"},
}

// TestDesignKinds holds every row of the design's table: kinds, further names,
// units, and that `each a kind of its own` is a specialization.
func TestDesignKinds(t *testing.T) {
	for _, r := range designKinds {
		names := strings.Split(r.kind, " · ")
		units := strings.Split(r.unit, ", ")
		for i, name := range names {
			k := find1(t, name)
			if k.Info().Name != name {
				t.Errorf("%q is a further name of %q, want a kind", name, k)
			}
			if want := units[min(i, len(units)-1)]; k.Info().Unit != want {
				t.Errorf("%s has the unit %s, want %s", name, k.Info().Unit, want)
			}
		}
		if special := specialRows[r.kind]; special != nil {
			for _, s := range special {
				if k := find1(t, s); k.Info().Parent != find1(t, r.kind) || k.Info().Unit != r.unit {
					t.Errorf("%s must be a kind of its own that specializes %s, in %s", s, r.kind, r.unit)
				}
			}
			continue
		}
		furtherNames(t, r, names)
	}
}

// furtherNames holds that each further name stands for a kind of its row.
func furtherNames(t *testing.T, r kindRow, names []string) {
	t.Helper()
	if r.also == "" {
		return
	}
	for _, also := range strings.Split(r.also, ", ") {
		if k := find1(t, also); !slices.Contains(names, k.Info().Name) {
			t.Errorf("%q is a name of %q, want one of %q", also, k, names)
		}
	}
}

func find1(t *testing.T, name string) ID {
	t.Helper()
	q, k, fault := Parse(name)
	if fault != nil || q != Unqualified || k == 0 {
		t.Fatalf("%q is no kind: %v", name, fault)
	}
	return k
}

// leftOut are the items of IEC 80000-6 that the note language has no kind for:
// constants, and quantities that are a kind with a phasor or a modulus.
var leftOut = []string{
	"6-14.1", "6-26.1", "6-35.2", "6-49", "6-50", "6-51.4", "6-52.2", "6-52.4",
}

// TestISOVocabulary compares names, dimensions and units with IEC 80000-6.
func TestISOVocabulary(t *testing.T) {
	for _, item := range isoItems {
		k := ID(0)
		for _, name := range strings.Split(item.names, ", ") {
			if got, ok := derived().byName[fold(name)]; ok {
				if k != 0 && got != k {
					t.Errorf("item %s: its names are of two kinds, %s and %s", item.item, k, got)
				}
				k = got
			}
		}
		if k == 0 != slices.Contains(leftOut, item.item) {
			t.Errorf("item %s %q: kind %q, left out: %t", item.item, item.names, k, k != 0)
		}
		if k != 0 {
			sameUnit(t, k, item)
		}
	}
}

// sameUnit compares dimension and units of a kind with those of an item.
func sameUnit(t *testing.T, k ID, item isoItem) {
	t.Helper()
	if want := isoDim(t, item.dim); !k.Dim().Compatible(want) {
		t.Errorf("item %s %s has dimension %s, want %s", item.item, k, k.Dim(), want)
	}
	for _, phrase := range strings.Split(strings.ReplaceAll(item.unit, "*", "·"), ", ") {
		u, err := unit.Parse(phrase)
		if err != nil || !u.Dim.Compatible(k.Dim()) || u.Scale() != 1 && phrase != "W·h" {
			t.Errorf("item %s: the unit %s does not fit %s in %s (%v)", item.item, phrase, k, k.Unit(), err)
		}
	}
}

// isoDim reads `L^2*M^1*T^-3*I^-1`, or `1`.
func isoDim(t *testing.T, s string) unit.Dim {
	t.Helper()
	base := strings.NewReplacer("L", "m", "M", "kg", "T", "s", "I", "A", "*", "·").Replace(s)
	u, err := unit.Parse(base)
	if err != nil {
		t.Fatalf("dimension %q: %v", s, err)
	}
	return u.Dim
}

// TestExtraKinds lists the kinds that stand in neither table, so that one more
// is a decision.
func TestExtraKinds(t *testing.T) {
	known := map[ID]bool{}
	for _, r := range designKinds {
		for _, name := range append(strings.Split(r.kind, " · "), specialRows[r.kind]...) {
			known[find1(t, name)] = true
		}
	}
	for _, item := range isoItems {
		for _, name := range strings.Split(item.names, ", ") {
			known[derived().byName[fold(name)]] = true
		}
	}
	var extra []string
	for _, k := range All() {
		if !known[k] {
			extra = append(extra, k.String())
		}
	}
	if want := []string{
		"power ratio", "amplitude ratio", "speed",
		"rated voltage", "incremental inductance", "reversible permeability", "complex permeability",
		"saturation flux density", "flux density at the knee", "saturation current", "remanent flux density", "remanent polarization",
		"energy product", "recoverable energy", "recoverable energy density", "air gap",
		"optic axis", "impermittivity", "relative impermittivity",
		"crest factor", "line-to-line voltage", "line-to-earth voltage", "earth fault factor",
		"withstand voltage", "breakdown voltage", "inception voltage", "inception field strength", "incident electric field strength",
		"peak envelope power", "pulse duration", "pulse repetition frequency", "reaction", "transient thermal impedance", "heat flow rate",
		"polarization loss factor", "direct-current conductivity",
		"total loss factor", "loss index", "polarization loss index", "effective conductivity",
		"angular wavenumber", "mean free path", "surface roughness", "required safety factor", "demagnetizing factor", "relative tolerance",
		"external electric potential", "permanent electric dipole moment", "induced electric dipole moment", "polarizability", "interaction energy", "vacuum energy density",
		"capacitance coefficient", "partial capacitance",
		"internal energy", "internal energy density", "constant-stress relative permittivity", "constant-strain relative permittivity", "mechanical resonance frequency", "tangential electric field strength", "normal electric field strength",
		"charging heat", "permanent magnetic moment", "induced magnetic moment", "vacuum energy",
		"wave impedance", "reflection coefficient", "transmission coefficient",
		"antenna factor", "effective area", "acceleration",
		"coefficient of heat transfer", "heat capacity",
	}; !slices.Equal(extra, want) {
		t.Errorf("further kinds: %q, want %q", extra, want)
	}
}
