// Package eval computes: values, operations, integrals, tables.
package eval

// Shape is the shape of a value.
type Shape uint8

// The shapes.
const (
	Scalar Shape = iota
	Vector
	Tensor
	List
)

// Value is a value in coherent SI units.
type Value struct{ Shape Shape }
