package eval

var addKernel = kernel2{
	re: func(_ *Frame, _ int, a, da, b, db float64) (float64, float64) { return a + b, da + db },
	cx: func(_ *Frame, _ int, a, da, b, db complex128) (complex128, complex128) { return a + b, da + db },
}

var subKernel = kernel2{
	re: func(_ *Frame, _ int, a, da, b, db float64) (float64, float64) { return a - b, da - db },
	cx: func(_ *Frame, _ int, a, da, b, db complex128) (complex128, complex128) { return a - b, da - db },
}

var mulKernel = kernel2{
	re: func(_ *Frame, _ int, a, da, b, db float64) (float64, float64) {
		return a * b, along(b, da) + along(a, db)
	},
	cx: func(_ *Frame, _ int, a, da, b, db complex128) (complex128, complex128) {
		return a * b, alongC(b, da) + alongC(a, db)
	},
}

var divKernel = kernel2{
	re: func(f *Frame, node int, a, da, b, db float64) (float64, float64) {
		if b == 0 {
			f.divided(node)
			return 0, 0
		}
		q := a / b
		return q, (da - along(q, db)) / b
	},
	cx: func(f *Frame, node int, a, da, b, db complex128) (complex128, complex128) {
		if b == 0 {
			f.divided(node)
			return 0, 0
		}
		q := a / b
		return q, (da - alongC(q, db)) / b
	},
}

func (f *Frame) divided(node int) {
	f.fail(node, RuleDivision, "the divisor is zero", "")
}

// Add is a + b: of the same shape, or a list and a number.
func Add(node int, a, b Code) (Code, error) { return sum2(node, "add", a, b, addKernel) }

// Sub is a - b, under the rule of Add.
func Sub(node int, a, b Code) (Code, error) { return sum2(node, "subtract", a, b, subKernel) }

func sum2(node int, word string, a, b Code, k kernel2) (Code, error) {
	t, ok := elementwise(a.Type, b.Type)
	if !ok {
		return Code{}, refuse("", "cannot %s %s and %s", word, a.Type, b.Type)
	}
	minus := word == "subtract"
	if a.null && b.Type == t && !minus {
		return b, nil
	}
	if b.null && a.Type == t {
		return a, nil
	}
	c := Code{Type: t, Any: func(f *Frame) Value { return k.each(f, node, a.Any(f), b.Any(f)) }}
	switch {
	case t.IsReal() && minus:
		c.Real = realSub(a, b)
	case t.IsReal():
		c.Real = realAdd(a, b)
	case a.vec != nil && b.vec != nil:
		c.vec = vecSum(a.vec, b.vec, minus)
	}
	again := func(x, y Code) (Code, error) { return sum2(node, word, x, y, k) }
	return build(c, a, b).derive(func(d *differ) (Code, error) { return d.both(a, b, again) }), nil
}

func vecSum(a, b func(*Frame) vec3, minus bool) func(*Frame) vec3 {
	if minus {
		return func(f *Frame) vec3 {
			v, w := a(f), b(f)
			return vec3{v.x - w.x, v.y - w.y, v.z - w.z}
		}
	}
	return func(f *Frame) vec3 {
		v, w := a(f), b(f)
		return vec3{v.x + w.x, v.y + w.y, v.z + w.z}
	}
}

// Neg is -a.
func Neg(node int, a Code) Code {
	if a.null {
		return a
	}
	k := kernel1{
		re: func(_ *Frame, _ int, a, da float64) (float64, float64) { return -a, -da },
		cx: func(_ *Frame, _ int, a, da complex128) (complex128, complex128) { return -a, -da },
	}
	c := Code{Type: a.Type, Any: func(f *Frame) Value { return k.each(f, node, a.Any(f)) }}
	if r := a.Real; r != nil {
		c.Real = func(f *Frame) float64 { return -r(f) }
	}
	if v := a.vec; v != nil {
		c.vec = func(f *Frame) vec3 { w := v(f); return vec3{-w.x, -w.y, -w.z} }
	}
	return build(c, a).derive(func(d *differ) (Code, error) {
		return d.linear(a, func(x Code) (Code, error) { return Neg(node, x), nil })
	})
}

// Mul is a * b: numbers, a number with any shape, lists element by element,
// and a tensor on a vector or a tensor. Two vectors are refused.
func Mul(node int, a, b Code) (Code, error) {
	as, bs := a.Type.Shape, b.Type.Shape
	switch {
	case as == Vector && bs == Vector:
		return Code{}, refuse("write `a·b` for the dot product or `a×b` for the cross product", "`*` of two vectors is ambiguous")
	case as == Tensor && (bs == Vector || bs == Tensor):
		return Dot(node, a, b)
	case as == Vector && bs == Tensor:
		return Code{}, refuse("a tensor acts on the vector to its right: write `T*v`, or `v·T` for the transposed product",
			"`*` of a vector and a tensor is ambiguous")
	case as != Scalar && bs != Scalar && as != bs:
		return Code{}, refuse("", "cannot multiply %s by %s", a.Type, b.Type)
	}
	return product(node, a, b), nil
}

// product is the product component by component.
func product(node int, a, b Code) Code {
	t := Type{Shape: max(a.Type.Shape, b.Type.Shape), Complex: a.Type.Complex || b.Type.Complex}
	if (a.null || b.null) && t.Shape != List {
		return nullOf(t)
	}
	if x, ok := a.number(); ok && x == 1 && b.Type == t {
		return b
	}
	if x, ok := b.number(); ok && x == 1 && a.Type == t {
		return a
	}
	c := Code{Type: t, Any: func(f *Frame) Value { return mulKernel.each(f, node, a.Any(f), b.Any(f)) }}
	switch {
	case t.IsReal():
		c.Real = realMul(a, b)
	case a.Real != nil && b.vec != nil:
		c.vec = vecScale(a.Real, b.vec)
	case a.vec != nil && b.Real != nil:
		c.vec = vecScale(b.Real, a.vec)
	}
	return build(c, a, b).derive(func(d *differ) (Code, error) {
		return d.bilinear(a, b, func(x, y Code) (Code, error) { return product(node, x, y), nil })
	})
}

func vecScale(s func(*Frame) float64, v func(*Frame) vec3) func(*Frame) vec3 {
	return func(f *Frame) vec3 {
		x, w := s(f), v(f)
		return vec3{x * w.x, x * w.y, x * w.z}
	}
}

// Div is a / b with a number, or a list of the same length as the list a, as
// divisor. A divisor of zero is the fault division-by-zero.
func Div(node int, a, b Code) (Code, error) {
	if s := b.Type.Shape; s != Scalar && (s != List || a.Type.Shape != List && a.Type.Shape != Scalar) {
		hint := ""
		if s == Tensor {
			hint = "write `inv(T)*x` to divide by a tensor"
		}
		return Code{}, refuse(hint, "cannot divide %s by %s", a.Type, b.Type)
	}
	t := Type{Shape: max(a.Type.Shape, b.Type.Shape), Complex: a.Type.Complex || b.Type.Complex}
	c := Code{Type: t, Any: func(f *Frame) Value { return divKernel.each(f, node, a.Any(f), b.Any(f)) }}
	if t.IsReal() {
		c.Real = realDiv(node, a, b)
	}
	if a.vec != nil && b.Real != nil {
		c.vec = vecDiv(node, a.vec, b.Real)
	}
	return build(c, a, b).derive(func(d *differ) (Code, error) { return d.quotient(node, a, b) }), nil
}

func vecDiv(node int, v func(*Frame) vec3, s func(*Frame) float64) func(*Frame) vec3 {
	return func(f *Frame) vec3 {
		w, x := v(f), s(f)
		if x == 0 {
			f.divided(node)
			return vec3{}
		}
		return vec3{w.x / x, w.y / x, w.z / x}
	}
}
