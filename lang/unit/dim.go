// Package unit holds dimensions, units and unit phrases.
package unit

// Rat is a small exact rational exponent; the zero value is 0.
type Rat struct{ num, den1 int32 }

// Dim is a dimension: exact rational exponents of the seven SI base
// quantities, with plane angle and cycle tracked beside them. Dims compare
// with ==.
type Dim [9]Rat

// Unit is a unit of measurement.
type Unit struct {
	Symbol string // as written
	Dim    Dim
}
