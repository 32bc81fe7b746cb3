package kind

// Form is a quadratic quantity of table 1.4 of the rules: what k multiplies
// εE², CV², LI², σE², J·E, E×H*.
type Form uint8

// The forms.
const (
	StoredEnergy Form = iota + 1 // electric or magnetic energy, energy density
	TotalEnergy                  // electric + magnetic where both are equal: travelling plane wave, resonator
	Dissipation                  // σE², J·E, ωε″E², RI², and U·I in phase
	Flux                         // |E|²/η, Re(E×H*)
	FieldForce                   // electrostatic or magnetic force and pressure
	DrawnEnergy                  // drawn from an ideal constant-voltage source to charge C
	CycleHeat                    // heat per full charge and discharge of C from a fixed V
)

// coefficients is table 1.4: the expected k of a form, by the qualifier of the
// amplitudes that it is made of and that of the result.
var coefficients = []struct {
	form     Form
	from, to Qualifier
	num, den int
}{
	{StoredEnergy, Static, Static, 1, 2},
	{StoredEnergy, Instantaneous, Instantaneous, 1, 2},
	{StoredEnergy, Instantaneous, Peak, 1, 2}, // at the crest
	{StoredEnergy, Peak, Peak, 1, 2},
	{StoredEnergy, RMS, Peak, 1, 1},
	{StoredEnergy, Peak, Average, 1, 4},
	{StoredEnergy, RMS, Average, 1, 2},

	{TotalEnergy, Instantaneous, Instantaneous, 1, 1}, // plane wave only
	{TotalEnergy, Peak, Average, 1, 2},
	{TotalEnergy, RMS, Average, 1, 1},

	{Dissipation, Static, Static, 1, 1},
	{Dissipation, Static, Average, 1, 1},
	{Dissipation, Instantaneous, Instantaneous, 1, 1},
	{Dissipation, Peak, Average, 1, 2},
	{Dissipation, RMS, Average, 1, 1},

	{Flux, Static, Static, 1, 1},
	{Flux, Static, Average, 1, 1},
	{Flux, Instantaneous, Instantaneous, 1, 1},
	{Flux, Peak, Average, 1, 2},
	{Flux, RMS, Average, 1, 1},

	{FieldForce, Static, Static, 1, 2},
	{FieldForce, Static, Average, 1, 2},
	{FieldForce, Instantaneous, Instantaneous, 1, 2},
	{FieldForce, Peak, Average, 1, 4},
	{FieldForce, RMS, Average, 1, 2},

	{DrawnEnergy, Static, Static, 1, 1},
	{CycleHeat, Static, Static, 1, 1},

	// Not in the table, from sin² having the maximum 1 and the mean 1/2: the
	// crest of a power, flux or force, and of the total of a plane wave.
	{Dissipation, Peak, Peak, 1, 1},
	{Dissipation, RMS, Peak, 2, 1},
	{Flux, Peak, Peak, 1, 1},
	{Flux, RMS, Peak, 2, 1},
	{FieldForce, Peak, Peak, 1, 2},
	{FieldForce, RMS, Peak, 1, 1},
}

// Coefficient returns the expected coefficient num/den of a form whose
// amplitudes carry the qualifier from and whose result carries to; ok is false
// where the table has no entry. It holds for sinusoidal quantities in linear,
// nondispersive media.
func Coefficient(form Form, from, to Qualifier) (num, den int, ok bool) {
	for _, c := range coefficients {
		if c.form == form && c.from == from && c.to == to {
			return c.num, c.den, true
		}
	}
	return 0, 0, false
}

// Results returns the qualifiers of the result that make the coefficient
// num/den right for amplitudes of the qualifier from; none: the coefficient is
// wrong for every statistic.
func Results(form Form, from Qualifier, num, den int) []Qualifier {
	var list []Qualifier
	for _, c := range coefficients {
		if c.form == form && c.from == from && c.num*den == num*c.den {
			list = append(list, c.to)
		}
	}
	return list
}

// FormOf returns the form that a kind takes in the table by default; ok is
// false for kinds that are not quadratic in the fields. A rule decides for
// itself about TotalEnergy and CycleHeat.
func FormOf(k ID) (Form, bool) {
	switch k.Info().Class {
	case ClassEnergy:
		return StoredEnergy, true
	case ClassPower:
		return Dissipation, true
	case ClassPowerFlux:
		return Flux, true
	case ClassForce:
		return FieldForce, true
	case ClassSourceWork:
		return DrawnEnergy, true
	}
	return 0, false
}
