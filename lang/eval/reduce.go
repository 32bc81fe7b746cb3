package eval

import "math"

// reductions are min, max, sum and mean: of one list, or of several numbers.
func reductions() []builtin {
	sig := func(name, doc string) builtin {
		return builtin{Signature{name, 1, -1, []string{"x", "…"}, []Takes{TakesSame}, GivesSame, doc}, makeReduction}
	}
	return []builtin{
		sig("min", "the least of its arguments, or of the elements of a list"),
		sig("max", "the greatest of its arguments, or of the elements of a list"),
		sig("sum", "sum of its arguments, or of the elements of a list"),
		sig("mean", "arithmetic mean of its arguments, or of the elements of a list"),
	}
}

func makeReduction(name string, node int, args []Code) (Code, error) {
	extreme := name == "min" || name == "max"
	t := Type{}
	for _, a := range args {
		if a.Type.Shape == Vector || a.Type.Shape == Tensor || a.Type.Shape == List && len(args) > 1 {
			return Code{}, refuse("", "%s takes numbers or one list, not %s", name, a.Type)
		}
		if extreme && a.Type.Complex {
			return Code{}, refuse("compare magnitudes: `|x|`", "%s takes real numbers, not %s", name, a.Type)
		}
		t.Complex = t.Complex || a.Type.Complex
	}
	items := itemsOf(args)
	c := Code{Type: t, Any: func(f *Frame) Value { return reduce(f, node, name, t, items(f)) }}
	if t.IsReal() {
		c.Real = realReduction(name, args, c.Any)
	}
	return build(c, args...).derive(func(d *differ) (Code, error) { return d.reduction(name, node, args) }), nil
}

// itemsOf is the elements of one list, or the values of several codes.
func itemsOf(args []Code) func(*Frame) []Value {
	return func(f *Frame) []Value {
		if len(args) == 1 {
			v := args[0].Any(f)
			vs := make([]Value, v.Len())
			for i := range vs {
				vs[i] = v.at(i)
			}
			return vs
		}
		vs := make([]Value, len(args))
		for i, a := range args {
			vs[i] = a.Any(f)
		}
		return vs
	}
}

// realReduction is the fast form of the usual case, two numbers.
func realReduction(name string, args []Code, general func(*Frame) Value) func(*Frame) float64 {
	if len(args) == 2 {
		x, y := args[0].Real, args[1].Real
		switch name {
		case "min":
			return func(f *Frame) float64 { return min(x(f), y(f)) }
		case "max":
			return func(f *Frame) float64 { return max(x(f), y(f)) }
		}
	}
	return func(f *Frame) float64 { return real(general(f).x) }
}

func reduce(f *Frame, node int, name string, t Type, vs []Value) Value {
	if !f.spend(node, int64(len(vs))) {
		return zero(t)
	}
	if len(vs) == 0 && name != "sum" {
		f.fail(node, RuleShape, name+" of an empty list", "")
		return zero(t)
	}
	if name == "min" || name == "max" {
		return vs[extremeOf(name, vs)]
	}
	var s neumaier
	for _, v := range vs {
		s.add(v)
	}
	sum := s.value(t)
	if name == "mean" {
		n := complex(float64(len(vs)), 0)
		sum.x, sum.dx = sum.x/n, sum.dx/n
	}
	return sum
}

// extremeOf is the index of the first least or greatest value.
func extremeOf(name string, vs []Value) int {
	at := 0
	for i, v := range vs {
		x, best := real(v.x), real(vs[at].x)
		if math.IsNaN(x) || name == "min" && x < best || name == "max" && x > best {
			at = i
		}
	}
	return at
}

// neumaier sums with a compensation for what rounding drops, kept apart until
// the end (A. Neumaier, ZAMM 54 (1974) 39), in each of the four parts: real,
// imaginary, their tangents.
type neumaier struct{ sum, lost [4]float64 }

func (s *neumaier) add(v Value) {
	for i, x := range [4]float64{real(v.x), imag(v.x), real(v.dx), imag(v.dx)} {
		s.sum[i], s.lost[i] = compensated(s.sum[i], s.lost[i], x)
	}
}

// compensated adds x to a sum and its rounding loss (Knuth's TwoSum, The Art of
// Computer Programming 2, 4.2.2: no branch, exact whichever is larger).
func compensated(sum, lost, x float64) (float64, float64) {
	t := sum + x
	y := t - sum
	return t, lost + ((sum - (t - y)) + (x - y))
}

func (s *neumaier) value(t Type) Value {
	p := func(i int) float64 {
		if isFinite(s.sum[i]) {
			return s.sum[i] + s.lost[i]
		}
		return s.sum[i]
	}
	return Value{typ: t, x: complex(p(0), p(1)), dx: complex(p(2), p(3))}
}

// reduction differentiates: sum and mean are linear, min and max take the
// derivative of the argument that is chosen.
func (d *differ) reduction(name string, node int, args []Code) (Code, error) {
	ds := make([]Code, len(args))
	var err error
	for i, a := range args {
		if ds[i], err = d.of(a); err != nil {
			return Code{}, err
		}
		if ds[i].null && a.Type.Shape == List {
			return nullOf(Type{Complex: a.Type.Complex}), nil
		}
	}
	if name == "sum" || name == "mean" {
		return makeReduction(name, node, ds)
	}
	items, slopes := itemsOf(args), itemsOf(ds)
	c := Code{Any: func(f *Frame) Value {
		vs := items(f)
		if len(vs) == 0 {
			return Value{}
		}
		return slopes(f)[extremeOf(name, vs)]
	}}
	any := c.Any
	c.Real = func(f *Frame) float64 { return real(any(f).x) }
	return build(c, append(append([]Code(nil), args...), ds...)...).derive(func(*differ) (Code, error) {
		return Code{}, refuse("", "%s has no second derivative that can be formed", name)
	}), nil
}
