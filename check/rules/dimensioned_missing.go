package rules

import (
	"slices"

	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// missing tells what an argument lacks, by the dimension that is left; "" where
// that does not tell.
func missing(c *lang.Call, d unit.Dim) string {
	for _, m := range lacking {
		if m.dim().Base() == d.Base() && slices.Contains(m.of, c.Fn.Text) {
			return m.text
		}
	}
	return ""
}

// The functions that decay and those that swing.
var (
	decays = []string{"exp", "sinh", "cosh", "tanh", "erf"}
	swings = []string{"sin", "cos", "tan", "exp"}
)

// lacking tells what an argument lacks; read only. The order decides.
var lacking = []struct {
	dim  func() unit.Dim
	of   []string
	text string
}{
	{func() unit.Dim { return kind.Energy.Dim().Div(kind.Temperature.Dim()) }, decays, "An energy goes with k_B*T: write `E/(k_B*T)`."},
	{func() unit.Dim { return unit.Dim{unit.Amount: unit.Whole(-1)} }, decays, "An energy per mole goes with the molar gas constant: write `E_m/(N_A*k_B*T)`."},
	{func() unit.Dim { return kind.Voltage.Dim().Div(kind.Temperature.Dim()) }, decays, "A voltage goes with the charge over k_B*T: write `q_e*U/(k_B*T)`."},
	{func() unit.Dim { return unit.Dim{}.Div(kind.ElectricCharge.Dim()) }, decays, "The charge is missing: write `q_e*U/(k_B*T)`."},
	{func() unit.Dim { return kind.Speed.Dim() }, swings, "A frequency times a length is a speed: divide by the phase speed, or use the phase coefficient 2*pi/lambda."},
	{kind.Time.Dim, decays, "Divide the time by the time constant."},
	{kind.Time.Dim, swings, "Multiply the time by the angular frequency."},
	{kind.Frequency.Dim, swings, "Multiply the frequency by a time."},
	{kind.Length.Dim, decays, "Divide the length by the decay length, or multiply it by the attenuation coefficient."},
	{kind.Length.Dim, swings, "Multiply the length by the phase coefficient 2*pi/lambda."},
	{func() unit.Dim { return unit.Dim{}.Div(kind.Length.Dim()) }, swings, "Multiply the coefficient by a length."},
}
