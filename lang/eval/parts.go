package eval

import "math"

// partKernels are Re, Im and conj: linear over the real numbers, which is all
// that a derivative along a real direction needs.
func partKernel(name string) (fn func(complex128) complex128, staysComplex bool) {
	switch name {
	case "Re":
		return func(c complex128) complex128 { return complex(real(c), 0) }, false
	case "Im":
		return func(c complex128) complex128 { return complex(imag(c), 0) }, false
	}
	return func(c complex128) complex128 { return complex(real(c), -imag(c)) }, true
}

// part is Re, Im or conj of any shape. The conjugate of a real value is itself.
func part(node int, name string, a Code) Code {
	if !a.Type.Complex && name != "Im" {
		return a
	}
	fn, stays := partKernel(name)
	t := Type{a.Type.Shape, stays && a.Type.Complex}
	if a.null {
		return nullOf(t)
	}
	c := Code{Type: t, Any: func(f *Frame) Value {
		v := a.Any(f)
		if v.typ.Shape == Scalar {
			return Value{typ: t, x: fn(v.x), dx: fn(v.dx)}
		}
		return gather(f, node, t, v.Len(), func(i int) Value {
			w := v.at(i)
			return Value{typ: Type{Complex: t.Complex}, x: fn(w.x), dx: fn(w.dx)}
		})
	}}
	if t.IsReal() {
		c.Real = func(f *Frame) float64 { return real(fn(a.Any(f).x)) }
	}
	return build(c, a).derive(func(d *differ) (Code, error) {
		return d.linear(a, func(x Code) (Code, error) { return part(node, name, x), nil })
	})
}

// sign is +1 from zero up, -1 below: the slope of |a|.
func sign(node int, a Code) Code {
	k := kernel1{re: func(_ *Frame, _ int, a, _ float64) (float64, float64) { return signOf(a), 0 }}
	c := Code{Type: a.Type, Any: func(f *Frame) Value { return k.each(f, node, a.Any(f)) }}
	if r := a.Real; r != nil {
		c.Real = func(f *Frame) float64 { return signOf(r(f)) }
	}
	return build(c, a).derive(func(*differ) (Code, error) { return nullOf(a.Type), nil })
}

func signOf(x float64) float64 {
	if x < 0 {
		return -1
	}
	return 1
}

// phase is arg(a) in (-π, π]; 0 for 0.
func phase(node int, a Code) Code {
	k := kernel1{
		re: func(_ *Frame, _ int, a, _ float64) (float64, float64) { return math.Atan2(0, a), 0 },
	}
	one := func(f *Frame, v Value) Value {
		if !v.typ.Complex {
			return k.one(f, node, v)
		}
		w := Real(math.Atan2(imag(v.x), real(v.x)))
		if v.dx != 0 {
			w.dx = complex(imag(v.dx/v.x), 0)
		}
		return w
	}
	t := Type{Shape: a.Type.Shape}
	c := Code{Type: t, Any: func(f *Frame) Value {
		v := a.Any(f)
		if v.typ.Shape == Scalar {
			return one(f, v)
		}
		return gather(f, node, t, v.Len(), func(i int) Value { return one(f, v.at(i)) })
	}}
	if t.IsReal() {
		c.Real = func(f *Frame) float64 { v := a.Any(f).x; return math.Atan2(imag(v), real(v)) }
	}
	return build(c, a).derive(func(d *differ) (Code, error) {
		return d.linear(a, func(x Code) (Code, error) {
			if x.null {
				return nullOf(t), nil
			}
			q, err := Div(node, x, a)
			return part(node, "Im", q), err
		})
	})
}
