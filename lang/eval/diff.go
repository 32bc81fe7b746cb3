package eval

import "slices"

// This file differentiates code into code. Every combinator leaves a closure
// (info.diff) that builds its derivative from the same combinators, so that
// derivatives nest, have a fast path and carry tangents like any other code.
// Terms that are identically zero are dropped on the way (info.null).

// differ is one differentiation with respect to a slot.
type differ struct {
	slot int
	node int
	done map[*info]Code // a subexpression that occurs twice is differentiated once
}

// derive attaches the derivative, unless the code was folded to a constant.
func (c Code) derive(fn func(*differ) (Code, error)) Code {
	if c.konst == nil {
		c.diff = fn
	}
	return c
}

// of is the derivative of c: of the same type, or a scalar null for lists.
func (d *differ) of(c Code) (Code, error) {
	if !c.Reads(d.slot) {
		return nullOf(c.Type), nil
	}
	if r, ok := d.done[c.info]; ok {
		return r, nil
	}
	if c.diff == nil {
		return Code{}, refuse("", "this expression cannot be differentiated")
	}
	r, err := c.diff(d)
	if err == nil && r.cost > maxCost {
		err = refuse("differentiate a simpler expression, or state the derivative", "the derivative is too long to be formed")
	}
	if err == nil {
		d.done[c.info] = r
	}
	return r, err
}

const maxCost = 1 << 20

// inside is of for a body under a binding, which hides the slots it binds.
func (d *differ) inside(body Code, bound ...int) (Code, error) {
	if slices.Contains(bound, d.slot) {
		return nullOf(body.Type), nil
	}
	return d.of(body)
}

// nullOf is a code that is known to be zero, dropped from sums and products.
func nullOf(t Type) Code {
	if t.Shape == List {
		t.Shape = Scalar
	}
	c := Code{Type: t}
	v := zero(t)
	c.Any = func(*Frame) Value { return v }
	switch t {
	case Type{}:
		c.Real = func(*Frame) float64 { return 0 }
	case Type{Shape: Vector}:
		c.vec = func(*Frame) vec3 { return vec3{} }
	}
	c.info = &info{cost: 1, konst: &v, slot: -1, null: true}
	return c
}

// unit is the derivative of a variable by itself.
func unit(t Type) (Code, error) {
	if t.Shape != Scalar {
		return Code{}, refuse("differentiate by one component", "cannot differentiate by %s", t)
	}
	return Num(1), nil
}

// linear differentiates f(a), f linear.
func (d *differ) linear(a Code, f func(Code) (Code, error)) (Code, error) {
	x, err := d.of(a)
	if err != nil {
		return Code{}, err
	}
	return f(x)
}

// both differentiates f(a, b), f linear in the pair.
func (d *differ) both(a, b Code, f func(x, y Code) (Code, error)) (Code, error) {
	x, err := d.of(a)
	if err != nil {
		return Code{}, err
	}
	y, err := d.of(b)
	if err != nil {
		return Code{}, err
	}
	return f(x, y)
}

// bilinear differentiates f(a, b), f linear in each: f(a', b) + f(a, b').
func (d *differ) bilinear(a, b Code, f func(x, y Code) (Code, error)) (Code, error) {
	return d.both(a, b, func(x, y Code) (Code, error) {
		switch {
		case x.null && y.null:
			return f(x, b)
		case x.null:
			return f(a, y)
		case y.null:
			return f(x, b)
		}
		l, err := f(x, b)
		if err != nil {
			return Code{}, err
		}
		r, err := f(a, y)
		if err != nil {
			return Code{}, err
		}
		return Add(d.node, l, r)
	})
}

// quotient is (a' - (a/b)·b')/b.
func (d *differ) quotient(node int, a, b Code) (Code, error) {
	return d.both(a, b, func(x, y Code) (Code, error) {
		if y.null {
			return Div(node, x, b)
		}
		q, err := Div(node, a, b)
		if err != nil {
			return Code{}, err
		}
		n, err := Sub(node, x, product(node, q, y))
		if err != nil {
			return Code{}, err
		}
		return Div(node, n, b)
	})
}

// let is the chain rule through a call: what the body reads directly, plus each
// argument's derivative times the body's by that parameter. Every term binds
// the parameters for itself: an argument may call the same function, and must
// not run while the parameters hold the outer call's values.
func (d *differ) let(node int, slots []int, args []Code, body Code) (Code, error) {
	sum, err := d.inside(body, slots...)
	if err != nil {
		return Code{}, err
	}
	if !sum.null {
		sum = Let(node, slots, args, sum)
	}
	for i, a := range args {
		da, err := d.of(a)
		if err != nil {
			return Code{}, err
		}
		if da.null {
			continue
		}
		inner := &differ{slot: slots[i], node: d.node, done: map[*info]Code{}}
		db, err := inner.of(body)
		if err != nil {
			return Code{}, err
		}
		if db.null {
			continue
		}
		if a.Type.Shape != Scalar {
			return Code{}, refuse("write the function out", "cannot differentiate through a call with %s", a.Type)
		}
		if sum, err = Add(node, sum, product(node, Let(node, slots, args, db), da)); err != nil {
			return Code{}, err
		}
	}
	return sum, nil
}

// Derivative is the derivative of body by the slot, at the value of at: exact,
// of any order when nested, with tangents. It refuses what has no derivative
// that can be formed.
func Derivative(node, slot int, at, body Code) (Code, error) {
	if at.Type.Shape != Scalar || at.Type.Complex {
		return Code{}, refuse("", "a derivative is taken at a real number, not at %s", at.Type)
	}
	d := &differ{slot: slot, node: node, done: map[*info]Code{}}
	r, err := d.of(body)
	if err != nil {
		return Code{}, err
	}
	if body.Type.Shape == List && r.Type.Shape != List {
		if r, err = Mul(node, body, Num(0)); err != nil {
			return Code{}, err
		}
	}
	return Let(node, []int{slot}, []Code{at}, r), nil
}
