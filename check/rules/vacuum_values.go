package rules

import (
	"math"

	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file holds the constants whose digits are recognised by rule
// vacuum-constant-slip.

// vacuumValue is a constant with the powers of ten that something other than a
// slip gives to its digits.
type vacuumValue struct {
	name     string
	dim      func() unit.Dim
	value    float64 // CODATA 2022, in SI units
	from, to int     // powers of ten above the constant that are plausible
	lowest   int     // a number so much smaller is another quantity
	least    int     // significant digits that tell it from chance
	medium   bool    // media have values of the same dimension
}

// vacuumValues is read only. CODATA 2022; a relative permittivity reaches
// hundreds in solids, a relative permeability 10⁵ in soft alloys (common
// knowledge of the trade).
var vacuumValues = [...]vacuumValue{
	{"eps_0", kind.Permittivity.Dim, 8.8541878188e-12, 0, 2, -99, 3, true},
	{"mu_0", kind.Permeability.Dim, 1.25663706127e-6, 0, 5, -99, 3, true},
	{"c_0", kind.Speed.Dim, 299792458, -99, 0, -99, 3, false},
	{"k_B", func() unit.Dim { return kind.Energy.Dim().Div(kind.Temperature.Dim()) }, 1.380649e-23, 0, 0, -6, 3, false},
	{"q_e", kind.ElectricCharge.Dim, 1.602176634e-19, 0, 0, -6, 4, false},
}

// largestSlip is the power of ten from which on a heat capacity or a charge that
// has the digits of k_B or q_e is simply that.
const largestSlip = 3

// hasUnit reports a number of the constant's dimension.
func (v *vacuumValue) hasUnit(d unit.Dim) bool { return d.Base() == v.dim().Base() }

// power is the power of ten of the number over the constant.
func (v *vacuumValue) power(c constantNumber) int {
	return int(math.Round(math.Log10(math.Abs(c.value) / v.value)))
}

// digitsOf reports that the number has the digits of the constant: within half
// its last digit, and within 0.1 % besides.
func (v *vacuumValue) digitsOf(c constantNumber) bool {
	if c.value <= 0 {
		return false
	}
	n := v.power(c)
	if (v.name == "k_B" || v.name == "q_e") && n > largestSlip {
		return false
	}
	return math.Abs(c.value/v.value/math.Pow(10, float64(n))-1) <= 1e-3+math.Min(c.relative, 5e-3)
}

// lacks reports a dimension that is off by one such constant above or below.
func (v *vacuumValue) lacks(m mismatch) bool {
	return m.factor() == unit.Dim{}.Div(v.dim()).Base() || m.factor() == v.dim().Base()
}
