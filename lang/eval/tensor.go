package eval

// partBuiltins are the functions that are also operators, and the parts of
// complex values.
func partBuiltins() []builtin {
	one := func(name string, takes Takes, gives Gives, doc string, f func(int, Code) (Code, error)) builtin {
		return builtin{Signature{name, 1, 1, []string{"x"}, []Takes{takes}, gives, doc},
			func(_ string, node int, args []Code) (Code, error) { return f(node, args[0]) }}
	}
	partOf := func(name string) func(int, Code) (Code, error) {
		return func(node int, a Code) (Code, error) { return part(node, name, a), nil }
	}
	two := func(name, doc string, f func(int, Code, Code) (Code, error)) builtin {
		return builtin{Signature{name, 2, 2, []string{"a", "b"}, []Takes{TakesVector}, GivesProduct, doc},
			func(_ string, node int, args []Code) (Code, error) { return f(node, args[0], args[1]) }}
	}
	return []builtin{
		one("abs", TakesAny, GivesSame, "magnitude of a number, a phasor or a vector; the same as |x|", Abs),
		one("Re", TakesAny, GivesSame, "real part", partOf("Re")),
		one("Im", TakesAny, GivesSame, "imaginary part", partOf("Im")),
		one("conj", TakesAny, GivesSame, "complex conjugate", partOf("conj")),
		one("arg", TakesAny, GivesAngle, "phase angle, from -pi to pi", argOf),
		two("dot", "dot product, without conjugation; the same as a·b", dotOf),
		two("cross", "cross product; the same as a×b", Cross),
	}
}

func argOf(node int, a Code) (Code, error) {
	if a.Type.Shape == Vector || a.Type.Shape == Tensor {
		return Code{}, refuse("take it of a component", "arg takes a number or a list, not %s", a.Type)
	}
	return phase(node, a), nil
}

func dotOf(node int, a, b Code) (Code, error) {
	if a.Type.Shape != Vector || b.Type.Shape != Vector {
		return Code{}, refuse("", "dot takes two vectors, not %s and %s", a.Type, b.Type)
	}
	return Dot(node, a, b)
}

func tensorBuiltins() []builtin {
	return []builtin{
		{Signature{"diag", 3, 3, []string{"xx", "yy", "zz"}, []Takes{TakesSame}, GivesSame,
			"tensor with these principal values along x, y, z"}, makeDiag},
		{Signature{"tensor", 9, 9, []string{"xx", "xy", "xz", "yx", "yy", "yz", "zx", "zy", "zz"}, []Takes{TakesSame}, GivesSame,
			"tensor from its nine components, row by row"}, makeTensor},
		{Signature{"uniaxial", 3, 3, []string{"across", "along", "axis"}, []Takes{TakesSame, TakesSame, TakesDirection}, GivesSame,
			"tensor of a uniaxial medium: one value along the axis, another across it"}, makeUniaxial},
		{Signature{"rotate", 3, 3, []string{"T", "axis", "angle"}, []Takes{TakesTensor, TakesDirection, TakesAngle}, GivesSame,
			"the tensor turned right-handed about the axis: R·T·Rᵀ"}, makeRotate},
		onTensor("inv", GivesInverse, "inverse of a tensor", inverse),
		onTensor("trace", GivesSame, "sum of the diagonal components of a tensor", func(node int, a Code) (Code, error) { return trace(node, a), nil }),
		onTensor("det", GivesCube, "determinant of a tensor", determinant),
	}
}

func onTensor(name string, gives Gives, doc string, f func(int, Code) (Code, error)) builtin {
	return builtin{Signature{name, 1, 1, []string{"T"}, []Takes{TakesTensor}, gives, doc},
		func(_ string, node int, args []Code) (Code, error) {
			if args[0].Type.Shape != Tensor {
				return Code{}, refuse("", "%s takes a tensor, not %s", name, args[0].Type)
			}
			return f(node, args[0])
		}}
}

func makeTensor(name string, node int, args []Code) (Code, error) {
	t := Type{Shape: Tensor}
	for _, a := range args {
		if a.Type.Shape != Scalar {
			return Code{}, refuse("", "%s takes numbers, not %s", name, a.Type)
		}
		t.Complex = t.Complex || a.Type.Complex
	}
	return assemble(node, t, args), nil
}

func makeDiag(name string, node int, args []Code) (Code, error) {
	o := Num(0)
	return makeTensor(name, node, []Code{args[0], o, o, o, args[1], o, o, o, args[2]})
}

// bilinearOp is a tensor that is linear in each of two arguments, or a vector
// or tensor linear in the only one (b is then a itself and not used).
type bilinearOp struct {
	entry func(f *Frame, node int, a, b Value, i int) Value
	t     Type
}

func (op bilinearOp) code(node int, a, b Code) Code {
	if a.null || b.null {
		return nullOf(op.t)
	}
	c := Code{Type: op.t, Any: func(f *Frame) Value {
		v, w := a.Any(f), b.Any(f)
		return gather(f, node, op.t, 9, func(i int) Value { return op.entry(f, node, v, w, i) })
	}}
	return build(c, a, b).derive(func(d *differ) (Code, error) {
		return d.bilinear(a, b, func(x, y Code) (Code, error) { return op.code(node, x, y), nil })
	})
}

// outer is the dyadic product a bᵀ of two vectors.
func outer(node int, a, b Code) Code {
	op := bilinearOp{t: Type{Tensor, a.Type.Complex || b.Type.Complex}}
	op.entry = func(f *Frame, node int, v, w Value, i int) Value {
		return mulKernel.one(f, node, v.at(i/3), w.at(i%3))
	}
	return op.code(node, a, b)
}

// rearrange is a tensor whose entries are ± components of a.
func rearrange(node int, a Code, from [9]int, sign [9]float64) Code {
	t := Type{Tensor, a.Type.Complex}
	if a.null {
		return nullOf(t)
	}
	c := Code{Type: t, Any: func(f *Frame) Value {
		v := a.Any(f)
		return gather(f, node, t, 9, func(i int) Value {
			w := v.at(from[i])
			s := complex(sign[i], 0)
			w.x, w.dx = s*w.x, s*w.dx
			return w
		})
	}}
	return build(c, a).derive(func(d *differ) (Code, error) {
		return d.linear(a, func(x Code) (Code, error) { return rearrange(node, x, from, sign), nil })
	})
}

// skew is [a]×, the tensor with [a]×·v = a×v.
func skew(node int, a Code) Code {
	return rearrange(node, a, [9]int{0, 2, 1, 2, 0, 0, 1, 0, 0}, [9]float64{0, -1, 1, 1, 0, -1, -1, 1, 0})
}

func transpose(node int, a Code) Code {
	return rearrange(node, a, [9]int{0, 3, 6, 1, 4, 7, 2, 5, 8}, [9]float64{1, 1, 1, 1, 1, 1, 1, 1, 1})
}

func trace(node int, a Code) Code {
	t := Type{Complex: a.Type.Complex}
	if a.null {
		return nullOf(t)
	}
	c := Code{Type: t, Any: func(f *Frame) Value {
		v := a.Any(f)
		p, q, r := v.at(0), v.at(4), v.at(8)
		return Value{typ: t, x: p.x + q.x + r.x, dx: p.dx + q.dx + r.dx}
	}}
	if t.IsReal() {
		any := c.Any
		c.Real = func(f *Frame) float64 { return real(any(f).x) }
	}
	return build(c, a).derive(func(d *differ) (Code, error) {
		return d.linear(a, func(x Code) (Code, error) { return trace(node, x), nil })
	})
}

// adjugate is the transposed matrix of cofactors: adj(T)·T = det(T)·1.
func adjugate(node int, a Code) Code {
	t := a.Type
	c := Code{Type: t, Any: func(f *Frame) Value { return adjugateOf(f, node, a.Any(f)) }}
	return build(c, a)
}

func adjugateOf(f *Frame, node int, m Value) Value {
	return gather(f, node, m.typ, 9, func(i int) Value {
		r, c := i%3, i/3 // transposed
		r1, r2, c1, c2 := (r+1)%3, (r+2)%3, (c+1)%3, (c+2)%3
		p := mulKernel.one(f, node, m.at(3*r1+c1), m.at(3*r2+c2))
		q := mulKernel.one(f, node, m.at(3*r1+c2), m.at(3*r2+c1))
		return subKernel.one(f, node, p, q)
	})
}

func determinantOf(f *Frame, node int, m, adj Value) Value {
	d := Value{typ: Type{Complex: m.typ.Complex}}
	for k := range 3 {
		p := mulKernel.one(f, node, m.at(k), adj.at(3*k))
		d.x, d.dx = d.x+p.x, d.dx+p.dx
	}
	return d
}

func determinant(node int, a Code) (Code, error) {
	t := Type{Complex: a.Type.Complex}
	c := Code{Type: t, Any: func(f *Frame) Value {
		m := a.Any(f)
		return determinantOf(f, node, m, adjugateOf(f, node, m))
	}}
	if t.IsReal() {
		any := c.Any
		c.Real = func(f *Frame) float64 { return real(any(f).x) }
	}
	// Jacobi's formula: d det(T) = trace(adj(T)·dT).
	return build(c, a).derive(func(d *differ) (Code, error) {
		return d.linear(a, func(x Code) (Code, error) {
			p, err := Dot(node, adjugate(node, a), x)
			return trace(node, p), err
		})
	}), nil
}

// inverse is adj(T)/det(T).
func inverse(node int, a Code) (Code, error) {
	c := Code{Type: a.Type, Any: func(f *Frame) Value {
		m := a.Any(f)
		adj := adjugateOf(f, node, m)
		det := determinantOf(f, node, m, adj)
		if det.x == 0 {
			f.fail(node, RuleDivision, "the tensor has no inverse: its determinant is zero", "")
			return zero(a.Type)
		}
		return divKernel.each(f, node, adj, det)
	}}
	return build(c, a).derive(func(d *differ) (Code, error) {
		return d.linear(a, func(x Code) (Code, error) {
			i, err := inverse(node, a)
			if err != nil {
				return Code{}, err
			}
			l, err := Dot(node, i, x)
			if err != nil {
				return Code{}, err
			}
			r, err := Dot(node, l, i)
			return Neg(node, r), err
		})
	}), nil
}

var identity = Ten([9]float64{1, 0, 0, 0, 1, 0, 0, 0, 1})

// direction is axis/|axis|.
func direction(name string, node int, axis Code) (Code, error) {
	if axis.Type != (Type{Shape: Vector}) {
		return Code{}, refuse("give the axis as a vector, `(0, 0, 1)` for z", "the axis of %s is a real vector, not %s", name, axis.Type)
	}
	l, err := Abs(node, axis)
	if err != nil {
		return Code{}, err
	}
	return Div(node, axis, l)
}

// makeUniaxial is across·1 + (along - across)·n nᵀ.
func makeUniaxial(name string, node int, args []Code) (Code, error) {
	if args[0].Type.Shape != Scalar || args[1].Type.Shape != Scalar {
		return Code{}, refuse("", "%s takes two numbers and an axis", name)
	}
	n, err := direction(name, node, args[2])
	if err != nil {
		return Code{}, err
	}
	diff, err := Sub(node, args[1], args[0])
	if err != nil {
		return Code{}, err
	}
	return Add(node, product(node, args[0], Const(identity)), product(node, diff, outer(node, n, n)))
}

// rotation is Rodrigues' tensor R = cos·1 + sin·[n]× + (1 - cos)·n nᵀ.
func rotation(node int, n, angle Code) (Code, error) {
	cos, sin := call1("cos", node, angle), call1("sin", node, angle)
	rest, err := Sub(node, Num(1), cos)
	if err != nil {
		return Code{}, err
	}
	r, err := Add(node, product(node, cos, Const(identity)), product(node, sin, skew(node, n)))
	if err != nil {
		return Code{}, err
	}
	return Add(node, r, product(node, rest, outer(node, n, n)))
}

func makeRotate(name string, node int, args []Code) (Code, error) {
	if args[0].Type.Shape != Tensor || !args[2].Type.IsReal() {
		return Code{}, refuse("write `rotate(T, axis, angle)`", "%s takes a tensor, a vector and a real angle", name)
	}
	n, err := direction(name, node, args[1])
	if err != nil {
		return Code{}, err
	}
	r, err := rotation(node, n, args[2])
	if err != nil {
		return Code{}, err
	}
	rt, err := Dot(node, r, args[0])
	if err != nil {
		return Code{}, err
	}
	return Dot(node, rt, transpose(node, r))
}
