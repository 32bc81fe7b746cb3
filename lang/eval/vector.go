package eval

import "math"

// Triple is the vector (x, y, z).
func Triple(node int, x, y, z Code) (Code, error) {
	args := []Code{x, y, z}
	t := Type{Shape: Vector}
	for _, a := range args {
		if a.Type.Shape != Scalar {
			return Code{}, refuse("a vector has three numbers as components", "%s cannot be a component of a vector", a.Type)
		}
		t.Complex = t.Complex || a.Type.Complex
	}
	return assemble(node, t, args), nil
}

// assemble builds a vector or a tensor from scalar components.
func assemble(node int, t Type, args []Code) Code {
	c := Code{Type: t, Any: func(f *Frame) Value {
		return gather(f, node, t, len(args), func(i int) Value { return args[i].Any(f) })
	}}
	if t == (Type{Shape: Vector}) {
		x, y, z := args[0].Real, args[1].Real, args[2].Real
		c.vec = func(f *Frame) vec3 { return vec3{x(f), y(f), z(f)} }
	}
	return build(c, args...).derive(func(d *differ) (Code, error) {
		parts := make([]Code, len(args))
		var err error
		for i, a := range args {
			if parts[i], err = d.of(a); err != nil {
				return Code{}, err
			}
		}
		return assemble(node, t, parts), nil
	})
}

// Component is component i (0, 1, 2 for x, y, z) of a vector.
func Component(node, i int, a Code) (Code, error) {
	if a.Type.Shape != Vector || i < 0 || i > 2 {
		return Code{}, refuse("`.x`, `.y` and `.z` are the components of a vector", "%s has no such component", a.Type)
	}
	return pick(node, i, a), nil
}

// TensorComponent is the component in row i and column k (from 0) of a tensor.
func TensorComponent(node, i, k int, a Code) (Code, error) {
	if a.Type.Shape != Tensor || min(i, k) < 0 || max(i, k) > 2 {
		return Code{}, refuse("`.xx` to `.zz` are the components of a tensor", "%s has no such component", a.Type)
	}
	return pick(node, 3*i+k, a), nil
}

// Cell is cell i (from 0) of a list of n cells.
func Cell(node, i int, a Code) (Code, error) {
	if a.Type.Shape != List || i < 0 {
		return Code{}, refuse("", "%s has no such cell", a.Type)
	}
	return pick(node, i, a), nil
}

func pick(node, i int, a Code) Code {
	c := Code{Type: Type{Complex: a.Type.Complex}, Any: func(f *Frame) Value {
		v := a.Any(f)
		if i >= v.Len() {
			f.fail(node, RuleTable, "the list has "+number(float64(v.Len()))+" cells; cell "+number(float64(i+1))+" is asked for", "cells count from 1")
			return Value{typ: Type{Complex: a.Type.Complex}}
		}
		return v.at(i)
	}}
	switch v := a.vec; {
	case v != nil && i == 0:
		c.Real = func(f *Frame) float64 { return v(f).x }
	case v != nil && i == 1:
		c.Real = func(f *Frame) float64 { return v(f).y }
	case v != nil && i == 2:
		c.Real = func(f *Frame) float64 { return v(f).z }
	case c.Type.IsReal():
		at := c.Any
		c.Real = func(f *Frame) float64 { return real(at(f).x) }
	}
	return build(c, a).derive(func(d *differ) (Code, error) {
		return d.linear(a, func(x Code) (Code, error) {
			if x.null {
				return nullOf(c.Type), nil
			}
			return pick(node, i, x), nil
		})
	})
}

// Dot is a·b without conjugation: numbers multiply, a tensor acts on a vector
// or a tensor, a vector on a tensor gives Tᵀ·v.
func Dot(node int, a, b Code) (Code, error) {
	as, bs := a.Type.Shape, b.Type.Shape
	t := Type{Complex: a.Type.Complex || b.Type.Complex}
	switch {
	case as == Scalar || bs == Scalar:
		return Mul(node, a, b)
	case as == List || bs == List:
		return Code{}, refuse("write `sum(a*b)` for the sum of the products, `a*b` for the products", "`·` of %s and %s is not defined", a.Type, b.Type)
	case as == Vector && bs == Vector:
	case as == Tensor && bs == Tensor:
		t.Shape = Tensor
	default:
		t.Shape = Vector
	}
	if a.null || b.null {
		return nullOf(t), nil
	}
	rows, mid, cols := contraction(as, bs)
	c := Code{Type: t, Any: func(f *Frame) Value { return contract(f, node, t, [3]int{rows, mid, cols}, a.Any(f), b.Any(f)) }}
	switch {
	case a.vec != nil && b.vec != nil:
		v, w := a.vec, b.vec
		c.Real = func(f *Frame) float64 { return v(f).dot(w(f)) }
	case a.Type == Type{Shape: Tensor} && b.vec != nil:
		c.vec = tensorOnVector(a.Any, b.vec)
	case t.IsReal():
		general := c.Any
		c.Real = func(f *Frame) float64 { return real(general(f).x) }
	}
	return build(c, a, b).derive(func(d *differ) (Code, error) {
		return d.bilinear(a, b, func(x, y Code) (Code, error) { return Dot(node, x, y) })
	}), nil
}

func (v vec3) dot(w vec3) float64 { return v.x*w.x + v.y*w.y + v.z*w.z }

// contraction gives the sizes of (rows×mid)·(mid×cols).
func contraction(a, b Shape) (rows, mid, cols int) {
	rows, mid, cols = 1, 3, 1
	if a == Tensor {
		rows = 3
	}
	if b == Tensor {
		cols = 3
	}
	return rows, mid, cols
}

// contract is the matrix product of components with tangents.
func contract(f *Frame, node int, t Type, size [3]int, a, b Value) Value {
	entry := func(i int) Value {
		r, c := i/size[2], i%size[2]
		sum := Value{typ: Type{Complex: t.Complex}}
		for k := range size[1] {
			p := mulKernel.one(f, node, a.at(r*size[1]+k), b.at(k*size[2]+c))
			sum.x, sum.dx = sum.x+p.x, sum.dx+p.dx
		}
		return sum
	}
	if t.Shape == Scalar {
		return entry(0)
	}
	return gather(f, node, t, size[0]*size[2], entry)
}

func tensorOnVector(ten func(*Frame) Value, vec func(*Frame) vec3) func(*Frame) vec3 {
	return func(f *Frame) vec3 {
		m, v := ten(f).many.v, vec(f)
		row := func(i int) float64 {
			return real(m[i])*v.x + real(m[i+1])*v.y + real(m[i+2])*v.z
		}
		return vec3{row(0), row(3), row(6)}
	}
}

// Cross is the cross product of two vectors.
func Cross(node int, a, b Code) (Code, error) {
	t := Type{Vector, a.Type.Complex || b.Type.Complex}
	if a.Type.Shape != Vector || b.Type.Shape != Vector {
		return Code{}, refuse("`×` takes two vectors; write `*` for a product of numbers", "`×` of %s and %s is not defined", a.Type, b.Type)
	}
	if a.null || b.null {
		return nullOf(t), nil
	}
	c := Code{Type: t, Any: func(f *Frame) Value { return cross(f, node, t, a.Any(f), b.Any(f)) }}
	if v, w := a.vec, b.vec; v != nil && w != nil {
		c.vec = func(f *Frame) vec3 {
			p, q := v(f), w(f)
			return vec3{p.y*q.z - p.z*q.y, p.z*q.x - p.x*q.z, p.x*q.y - p.y*q.x}
		}
	}
	return build(c, a, b).derive(func(d *differ) (Code, error) {
		return d.bilinear(a, b, func(x, y Code) (Code, error) { return Cross(node, x, y) })
	}), nil
}

func cross(f *Frame, node int, t Type, a, b Value) Value {
	return gather(f, node, t, 3, func(i int) Value {
		j, k := (i+1)%3, (i+2)%3
		p := mulKernel.one(f, node, a.at(j), b.at(k))
		q := mulKernel.one(f, node, a.at(k), b.at(j))
		return subKernel.one(f, node, p, q)
	})
}

// Abs is |a|: the magnitude of a number, a phasor or a vector, and of each
// element of a list.
func Abs(node int, a Code) (Code, error) {
	switch a.Type.Shape {
	case Tensor:
		return Code{}, refuse("write `det(T)` or `trace(T)`, or take the magnitude of a vector", "the magnitude of a tensor is not defined")
	case Vector:
		return norm(node, a), nil
	}
	c := Code{Type: Type{Shape: a.Type.Shape}, Any: func(f *Frame) Value {
		v := a.Any(f)
		if v.typ.Shape == Scalar {
			return magnitude(v)
		}
		return gather(f, node, Type{Shape: List}, v.Len(), func(i int) Value { return magnitude(v.at(i)) })
	}}
	switch {
	case a.Real != nil:
		r := a.Real
		c.Real = func(f *Frame) float64 { return math.Abs(r(f)) }
	case c.Type.IsReal():
		r := a.Any
		c.Real = func(f *Frame) float64 { v := r(f); return math.Hypot(real(v.x), imag(v.x)) }
	}
	return build(c, a).derive(func(d *differ) (Code, error) { return d.magnitude(node, a) }), nil
}

// magnitude of a scalar; at zero the slope is that of positive numbers.
func magnitude(v Value) Value {
	x, dx := v.x, v.dx
	if !v.typ.Complex {
		if real(x) < 0 {
			x, dx = -x, -dx
		}
		return Value{x: x, dx: dx}
	}
	r := math.Hypot(real(x), imag(x))
	w := Real(r)
	switch {
	case dx == 0:
	case r == 0:
		w.dx = complex(math.Hypot(real(dx), imag(dx)), 0)
	default:
		w.dx = complex(real(x)/r*real(dx)+imag(x)/r*imag(dx), 0)
	}
	return w
}

// norm is the length of a vector, scaled against overflow.
func norm(node int, a Code) Code {
	c := Code{Any: func(f *Frame) Value { return length(a.Any(f)) }}
	if v := a.vec; v != nil {
		c.Real = func(f *Frame) float64 { return v(f).length() }
	} else {
		c.Real = func(f *Frame) float64 { return real(length(a.Any(f)).x) }
	}
	return build(c, a).derive(func(d *differ) (Code, error) { return d.magnitude(node, a) })
}

func (v vec3) length() float64 {
	s := v.dot(v)
	if s > 1e-280 && s < 1e280 {
		return math.Sqrt(s)
	}
	return math.Hypot(math.Hypot(v.x, v.y), v.z)
}

func length(v Value) Value {
	var r, dr float64
	for i := range v.Len() {
		m := magnitude(v.at(i))
		r = math.Hypot(r, real(m.x))
	}
	for i := range v.Len() {
		m := magnitude(v.at(i))
		switch {
		case m.dx == 0:
		case r == 0:
			dr = math.Hypot(dr, real(m.dx))
		default:
			dr += real(m.x) / r * real(m.dx)
		}
	}
	return Value{x: complex(r, 0), dx: complex(dr, 0)}
}

// magnitude is Re(conj(a)·a')/|a|.
func (d *differ) magnitude(node int, a Code) (Code, error) {
	x, err := d.of(a)
	if err != nil {
		return Code{}, err
	}
	if x.null {
		return nullOf(Type{}), nil
	}
	if !a.Type.Complex && a.Type.Shape != Vector {
		return product(node, sign(node, a), x), nil
	}
	l, err := Abs(node, a)
	if err != nil {
		return Code{}, err
	}
	p := product(node, part(node, "conj", a), x)
	if a.Type.Shape == Vector {
		if p, err = Dot(node, part(node, "conj", a), x); err != nil {
			return Code{}, err
		}
	}
	return Div(node, part(node, "Re", p), l)
}
