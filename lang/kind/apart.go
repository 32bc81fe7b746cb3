package kind

// keptApart lists the kinds that must not be equated, added or compared
// although their dimensions tie, each chain pairwise (kinds of ISO/IEC 80000;
// the list of the note language).
var keptApart = []struct {
	kinds []ID
	meant bool // see Meant
}{
	{[]ID{EnergyDensity, Pressure}, true},
	{[]ID{Energy, Torque}, false},
	{[]ID{Energy, Coenergy}, false},
	{[]ID{EnergyDensity, CoenergyDensity}, false},
	{[]ID{Frequency, AngularFrequency}, false},
	{[]ID{Power, ApparentPower, ReactivePower}, false},
	{[]ID{MagneticFluxDensity, MagneticPolarization}, false},
	{[]ID{MagneticFieldStrength, Magnetization, LineicElectricCurrent, Coercivity}, false},
	{[]ID{ElectricFluxDensity, ElectricPolarization, AreicElectricCharge}, false},
	{[]ID{Permittivity, LineicCapacitance}, false},
	{[]ID{Permeability, LineicInductance}, false},
	{[]ID{LineicEnergy, Force}, false},
	{[]ID{SpecificAbsorptionRate, SpecificPower}, false},
	{[]ID{Resistance, SurfaceResistance}, false},
	{[]ID{Temperature, TemperatureRise}, false},
	{[]ID{ElectricPotential, Voltage}, false},
}

// Apart reports whether two kinds must not be equated, added or compared.
// Unknown is apart from nothing. A specialization is apart from what its
// parents are apart from: active energy and torque.
func Apart(a, b ID) bool {
	t := derived()
	for x := a; x.valid(); x = table[x].Parent {
		for y := b; y.valid(); y = table[y].Parent {
			if t.apart[[2]ID{x, y}] {
				return true
			}
		}
	}
	return false
}

// Meant reports kinds that are kept apart although they are equal in value by
// physics, so that equating them is often meant: the energy density at a
// conductor surface is the pressure on it.
func Meant(a, b ID) bool {
	for _, chain := range keptApart {
		if chain.meant && (a.Is(chain.kinds[0]) && b.Is(chain.kinds[1]) || a.Is(chain.kinds[1]) && b.Is(chain.kinds[0])) {
			return true
		}
	}
	return false
}

// Comparable reports whether `<` between the kinds makes sense: they are not
// apart, or the one is the limit of the other (a field strength against the
// coercivity).
func Comparable(a, b ID) bool {
	limit := a.Is(MagneticFieldStrength) && b.Is(Coercivity) || a.Is(Coercivity) && b.Is(MagneticFieldStrength)
	return limit || !Apart(a, b)
}

// sums are the sums of unlike kinds that physics makes: D = ε₀E + P,
// B = μ₀H + J, B/μ₀ = H + M, a potential and a voltage, a temperature and a
// rise. The result is 0 where the sum has no kind of its own.
var sums = []struct{ a, b, sum ID }{
	{ElectricFluxDensity, ElectricPolarization, ElectricFluxDensity},
	{MagneticFluxDensity, MagneticPolarization, MagneticFluxDensity},
	{MagneticFieldStrength, Magnetization, 0},
	{ElectricPotential, Voltage, ElectricPotential},
	{Temperature, TemperatureRise, Temperature},
	{Energy, Coenergy, 0}, // W + W′ = ∫d(E·D) = E·D
	{EnergyDensity, CoenergyDensity, 0},
}

// Sum returns the kind of a + b and whether the two may be added. A sum with an
// unknown kind is of the known one.
func Sum(a, b ID) (ID, bool) {
	switch {
	case a == 0 || a == b || a.Is(b):
		return b, true
	case b == 0 || b.Is(a):
		return a, true
	}
	for _, s := range sums {
		if a.Is(s.a) && b.Is(s.b) || a.Is(s.b) && b.Is(s.a) {
			return s.sum, true
		}
	}
	return common(a, b), !Apart(a, b)
}

// Difference returns the kind of a − b and whether the two may be subtracted:
// two temperatures differ by a temperature rise, two potentials by a voltage.
func Difference(a, b ID) (ID, bool) {
	switch {
	case a.Is(Temperature) && b.Is(Temperature):
		return TemperatureRise, true
	case a.Is(ElectricPotential) && b.Is(ElectricPotential):
		return Voltage, true
	}
	return Sum(a, b)
}

// common is the nearest kind that both specialize, 0 for none.
func common(a, b ID) ID {
	for ; a.valid(); a = table[a].Parent {
		if b.Is(a) {
			return a
		}
	}
	return 0
}
