package eval

// kernel1 is a function of one number: real and complex forms, each giving
// value and derivative along the tangent.
type kernel1 struct {
	re func(f *Frame, node int, a, da float64) (v, d float64)
	cx func(f *Frame, node int, a, da complex128) (v, d complex128)
}

// kernel2 is a function of two numbers.
type kernel2 struct {
	re func(f *Frame, node int, a, da, b, db float64) (v, d float64)
	cx func(f *Frame, node int, a, da, b, db complex128) (v, d complex128)
}

// one applies the kernel to a scalar.
func (k kernel1) one(f *Frame, node int, a Value) Value {
	if a.typ.Complex {
		v, d := k.cx(f, node, a.x, a.dx)
		return Value{typ: a.typ, x: v, dx: d}
	}
	v, d := k.re(f, node, real(a.x), real(a.dx))
	return Value{x: complex(v, 0), dx: complex(d, 0)}
}

// each applies the kernel to every component.
func (k kernel1) each(f *Frame, node int, a Value) Value {
	if a.typ.Shape == Scalar {
		return k.one(f, node, a)
	}
	return gather(f, node, a.typ, a.Len(), func(i int) Value { return k.one(f, node, a.at(i)) })
}

// one applies the kernel to two scalars; complex if either is.
func (k kernel2) one(f *Frame, node int, a, b Value) Value {
	if a.typ.Complex || b.typ.Complex {
		v, d := k.cx(f, node, a.x, a.dx, b.x, b.dx)
		return Value{typ: Type{Complex: true}, x: v, dx: d}
	}
	v, d := k.re(f, node, real(a.x), real(a.dx), real(b.x), real(b.dx))
	return Value{x: complex(v, 0), dx: complex(d, 0)}
}

// each applies the kernel component by component; a scalar goes with every
// component of the other operand.
func (k kernel2) each(f *Frame, node int, a, b Value) Value {
	if a.typ.Shape == Scalar && b.typ.Shape == Scalar {
		return k.one(f, node, a, b)
	}
	t, n := a.typ, a.Len()
	if a.typ.Shape == Scalar {
		t, n = b.typ, b.Len()
	} else if b.typ.Shape != Scalar && b.Len() != n {
		f.fail(node, RuleShape, "the lists have "+number(float64(n))+" and "+number(float64(b.Len()))+" elements",
			"operations on lists go element by element, so both need the same length")
		n = 0
	}
	t.Complex = a.typ.Complex || b.typ.Complex
	return gather(f, node, t, n, func(i int) Value { return k.one(f, node, a.at(i), b.at(i)) })
}

// gather builds a value of n components from scalars.
func gather(f *Frame, node int, t Type, n int, at func(i int) Value) Value {
	if t.Shape == List && !f.reserve(node, n) {
		return zero(t)
	}
	b := &body{v: make([]complex128, n)}
	for i := range n {
		s := at(i)
		b.v[i] = s.x
		if s.dx != 0 {
			if b.d == nil {
				b.d = make([]complex128, n)
			}
			b.d[i] = s.dx
		}
	}
	if t.Shape != List && n == 0 {
		return zero(t)
	}
	return Value{typ: t, many: b}
}

// along is derivative times tangent; no tangent gives none, also where the
// derivative is infinite.
func along(slope, dx float64) float64 {
	if dx == 0 {
		return 0
	}
	return slope * dx
}

func alongC(slope, dx complex128) complex128 {
	if dx == 0 {
		return 0
	}
	return slope * dx
}

// elementwise is the type of an operation component by component, and whether
// the shapes allow it.
func elementwise(a, b Type) (Type, bool) {
	t := Type{Complex: a.Complex || b.Complex}
	switch {
	case a.Shape == b.Shape:
		t.Shape = a.Shape
	case a.Shape == Scalar && b.Shape == List, a.Shape == List && b.Shape == Scalar:
		t.Shape = List
	default:
		return t, false
	}
	return t, true
}
