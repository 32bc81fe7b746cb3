package eval

import "math"

// Shape is the shape of a value.
type Shape uint8

// The shapes. A Vector has 3 components, a Tensor 3×3, a List any number of
// scalars.
const (
	Scalar Shape = iota
	Vector
	Tensor
	List
)

// String names the shape as a message does: "number", "vector", …
func (s Shape) String() string {
	switch s {
	case Vector:
		return "vector"
	case Tensor:
		return "tensor"
	case List:
		return "list"
	}
	return "number"
}

// Type is the static type of an expression.
type Type struct {
	Shape   Shape
	Complex bool
}

// String gives the type with its article: "a number", "a complex vector".
func (t Type) String() string {
	if t.Complex {
		return "a complex " + t.Shape.String()
	}
	return "a " + t.Shape.String()
}

// IsReal reports whether the type is a real scalar, the type of the fast path.
func (t Type) IsReal() bool { return t == Type{} }

// Value is a value in coherent SI units, with its tangent: the derivative along
// the frame's current direction, of the same shape, zero unless slots were
// seeded. Scalars are held without allocation. Values are immutable; the zero
// Value is the real number 0.
type Value struct {
	typ   Type
	x, dx complex128 // scalar and its tangent; real scalars have imag == 0
	many  *body      // vector, tensor, list
}

// body holds components and, where d is not nil, their tangents. A body is
// never written to once its Value has been handed out.
type body struct{ v, d []complex128 }

// Real is the real number x.
func Real(x float64) Value { return Value{x: complex(x, 0)} }

// Cplx is the complex number c.
func Cplx(c complex128) Value { return Value{typ: Type{Complex: true}, x: c} }

// Vec is a real vector with Cartesian components.
func Vec(x, y, z float64) Value {
	return Value{typ: Type{Shape: Vector}, many: &body{v: reals([]float64{x, y, z})}}
}

// CVec is a complex vector.
func CVec(x, y, z complex128) Value {
	return Value{typ: Type{Vector, true}, many: &body{v: []complex128{x, y, z}}}
}

// Ten is a real tensor, row by row.
func Ten(m [9]float64) Value {
	return Value{typ: Type{Shape: Tensor}, many: &body{v: reals(m[:])}}
}

// CTen is a complex tensor, row by row.
func CTen(m [9]complex128) Value {
	return Value{typ: Type{Tensor, true}, many: &body{v: append([]complex128(nil), m[:]...)}}
}

// ListOf is a list of real numbers.
func ListOf(xs ...float64) Value {
	return Value{typ: Type{Shape: List}, many: &body{v: reals(xs)}}
}

// CList is a list of complex numbers.
func CList(xs ...complex128) Value {
	return Value{typ: Type{List, true}, many: &body{v: append([]complex128(nil), xs...)}}
}

func reals(xs []float64) []complex128 {
	v := make([]complex128, len(xs))
	for i, x := range xs {
		v[i] = complex(x, 0)
	}
	return v
}

// zero is the zero of a type; lists are empty.
func zero(t Type) Value {
	switch t.Shape {
	case Vector:
		return Value{typ: t, many: &body{v: make([]complex128, 3)}}
	case Tensor:
		return Value{typ: t, many: &body{v: make([]complex128, 9)}}
	case List:
		return Value{typ: t, many: &body{}}
	}
	return Value{typ: t}
}

// Type is the value's type, the static type of the Code that gave it.
func (v Value) Type() Type { return v.typ }

// Shape is the value's shape.
func (v Value) Shape() Shape { return v.typ.Shape }

// IsReal reports whether the value is of a real type, of any shape.
func (v Value) IsReal() bool { return !v.typ.Complex }

// Re is the real part of a scalar.
func (v Value) Re() float64 { return real(v.x) }

// Im is the imaginary part of a scalar.
func (v Value) Im() float64 { return imag(v.x) }

// C is a scalar as a complex number.
func (v Value) C() complex128 { return v.x }

// Len is the number of components: 1, 3, 9, or the length of a list.
func (v Value) Len() int {
	if v.typ.Shape == Scalar {
		return 1
	}
	return len(v.many.v)
}

// At is component i (from 0; tensors row by row) as a scalar with its tangent.
// An index outside gives the zero Value.
func (v Value) At(i int) Value {
	if i < 0 || i >= v.Len() {
		return Value{}
	}
	return v.at(i)
}

// at is At for an index known to be inside; a scalar is every component.
func (v Value) at(i int) Value {
	if v.typ.Shape == Scalar {
		return v
	}
	w := Value{typ: Type{Complex: v.typ.Complex}, x: v.many.v[i]}
	if v.many.d != nil {
		w.dx = v.many.d[i]
	}
	return w
}

// HasTangent reports whether the tangent is other than zero.
func (v Value) HasTangent() bool {
	if v.typ.Shape == Scalar {
		return v.dx != 0
	}
	for _, d := range v.many.d {
		if d != 0 {
			return true
		}
	}
	return false
}

// Tangent is the tangent as a value of the same type, itself without tangent.
func (v Value) Tangent() Value {
	if v.typ.Shape == Scalar {
		return Value{typ: v.typ, x: v.dx}
	}
	d := v.many.d
	if d == nil {
		d = make([]complex128, len(v.many.v))
	}
	return Value{typ: v.typ, many: &body{v: d}}
}

// Primal is the value without its tangent.
func (v Value) Primal() Value {
	if v.typ.Shape == Scalar {
		v.dx = 0
		return v
	}
	return Value{typ: v.typ, many: &body{v: v.many.v}}
}

// WithTangent is the value with the tangent d, which must be of the same shape
// and length; otherwise the value is returned without a tangent.
func (v Value) WithTangent(d Value) Value {
	if d.typ.Shape != v.typ.Shape || d.Len() != v.Len() {
		return v.Primal()
	}
	if v.typ.Shape == Scalar {
		v.dx = d.x
		return v
	}
	return Value{typ: v.typ, many: &body{v: v.many.v, d: d.many.v}}
}

// Equal reports whether type and every component are the same; tangents are not
// compared. NaN equals nothing.
func (v Value) Equal(w Value) bool {
	if v.typ != w.typ || v.Len() != w.Len() {
		return false
	}
	for i := range v.Len() {
		if v.at(i).x != w.at(i).x {
			return false
		}
	}
	return true
}

// Finite reports whether no component is infinite or NaN; tangents are not
// looked at.
func (v Value) Finite() bool {
	for i := range v.Len() {
		if !finite(v.at(i).x) {
			return false
		}
	}
	return true
}

func finite(c complex128) bool { return isFinite(real(c)) && isFinite(imag(c)) }

// isFinite is false for infinities and NaN, without a branch for each.
func isFinite(x float64) bool { return math.Abs(x) <= math.MaxFloat64 }
