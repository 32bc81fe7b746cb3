package eval

import "math"

// binaryBuiltins are atan2 and the Bessel functions of whole order.
func binaryBuiltins() []builtin {
	return []builtin{
		{Signature{"atan2", 2, 2, []string{"y", "x"}, []Takes{TakesSame}, GivesAngle,
			"angle of the point (x, y), from -pi to pi"}, makeAtan2},
		{Signature{"besselJ", 2, 2, []string{"n", "x"}, []Takes{TakesWhole, TakesNumber}, GivesNumber,
			"Bessel function of the first kind and whole order n"}, makeBessel},
		{Signature{"besselY", 2, 2, []string{"n", "x"}, []Takes{TakesWhole, TakesNumber}, GivesNumber,
			"Bessel function of the second kind and whole order n"}, makeBessel},
	}
}

// onReals checks that arguments are real numbers, or one of them a list.
func onReals(name string, args []Code) (Type, error) {
	t := Type{}
	for _, a := range args {
		r, ok := elementwise(t, a.Type)
		if !ok || a.Type.Complex || a.Type.Shape == Vector || a.Type.Shape == Tensor {
			return t, refuse("", "%s takes real numbers, not %s", name, a.Type)
		}
		t = r
	}
	return t, nil
}

var atan2Kernel = kernel2{re: func(_ *Frame, _ int, y, dy, x, dx float64) (float64, float64) {
	v := math.Atan2(y, x)
	if dy == 0 && dx == 0 {
		return v, 0
	}
	r := math.Hypot(x, y)
	return v, x/r*(dy/r) - y/r*(dx/r)
}}

func makeAtan2(name string, node int, args []Code) (Code, error) {
	t, err := onReals(name, args)
	if err != nil {
		return Code{}, err
	}
	y, x := args[0], args[1]
	c := Code{Type: t, Any: func(f *Frame) Value { return atan2Kernel.each(f, node, y.Any(f), x.Any(f)) }}
	if t.IsReal() {
		p, q := y.Real, x.Real
		c.Real = func(f *Frame) float64 { return math.Atan2(p(f), q(f)) }
	}
	return build(c, args...).derive(func(d *differ) (Code, error) {
		return d.both(y, x, func(dy, dx Code) (Code, error) {
			n, err := Sub(node, product(node, x, dy), product(node, y, dx))
			if err != nil {
				return Code{}, err
			}
			r, err := Add(node, product(node, x, x), product(node, y, y))
			if err != nil {
				return Code{}, err
			}
			return Div(node, n, r)
		})
	}), nil
}

// bessel is J or Y of whole order, with the faults of its domain.
func bessel(f *Frame, node int, name string, n, x float64) float64 {
	if n != math.Trunc(n) || math.Abs(n) > 1e6 {
		f.fail(node, RuleShape, name+" takes a whole number as its order, not "+number(n), "")
		return 0
	}
	if !f.spend(node, int64(math.Abs(n))/4) { // the recurrence runs over the orders
		return 0
	}
	if name == "besselJ" {
		return math.Jn(int(n), x)
	}
	if why := logDomain(x); why != "" {
		f.outside(node, name, x, why)
		return 0
	}
	return math.Yn(int(n), x)
}

func makeBessel(name string, node int, args []Code) (Code, error) {
	t, err := onReals(name, args)
	if err != nil {
		return Code{}, err
	}
	k := kernel2{re: func(f *Frame, node int, n, _, x, dx float64) (float64, float64) {
		v := bessel(f, node, name, n, x)
		if dx == 0 {
			return v, 0
		}
		return v, (bessel(f, node, name, n-1, x) - bessel(f, node, name, n+1, x)) / 2 * dx // A&S 9.1.27
	}}
	n, x := args[0], args[1]
	c := Code{Type: t, Any: func(f *Frame) Value { return k.each(f, node, n.Any(f), x.Any(f)) }}
	if t.IsReal() {
		p, q := n.Real, x.Real
		c.Real = func(f *Frame) float64 { return bessel(f, node, name, p(f), q(f)) }
	}
	return build(c, args...).derive(func(d *differ) (Code, error) { return d.bessel(name, node, n, x) }), nil
}

func (d *differ) bessel(name string, node int, n, x Code) (Code, error) {
	return d.both(n, x, func(dn, dx Code) (Code, error) {
		if !dn.null {
			return Code{}, refuse("", "%s has no derivative by its order", name)
		}
		var side [2]Code
		for i, step := range []float64{-1, 1} {
			m, err := Add(node, n, Num(step))
			if err != nil {
				return Code{}, err
			}
			if side[i], err = makeBessel(name, node, []Code{m, x}); err != nil {
				return Code{}, err
			}
		}
		s, err := Sub(node, side[0], side[1])
		if err != nil {
			return Code{}, err
		}
		return Mul(node, product(node, Num(0.5), s), dx)
	})
}
