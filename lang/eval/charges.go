package eval

import "math"

// Loop is the area of the closed polygon through the points (x_i, y_i), the
// energy of one cycle around a loop; positive whichever way it runs.
func Loop(node int, x, y Code) (Code, error) {
	if err := realLists("loop", x, y); err != nil {
		return Code{}, err
	}
	c := Code{Any: func(f *Frame) Value { return polygon(f, node, x.Any(f), y.Any(f)) }}
	any := c.Any
	c.Real = func(f *Frame) float64 { return real(any(f).x) }
	return build(c, x, y).derive(func(*differ) (Code, error) {
		return Code{}, refuse("", "the area of a loop cannot be differentiated")
	}), nil
}

func realLists(name string, args ...Code) error {
	for _, a := range args {
		if a.Type != (Type{Shape: List}) {
			return refuse("give table columns", "%s takes lists of real numbers, not %s", name, a.Type)
		}
	}
	return nil
}

// polygon is Gauss's area formula. Coordinates are taken from the first point,
// so that a small loop far from the origin keeps its digits.
func polygon(f *Frame, node int, x, y Value) Value {
	n := x.Len()
	if !sameLengths(f, node, x, y) || !f.spend(node, int64(n)) || n == 0 {
		return Value{}
	}
	xs, ys := jets(x), jets(y)
	var sum neumaier
	for i := 1; i+1 < n; i++ {
		ax, ay := xs[i].minus(xs[0]), ys[i].minus(ys[0])
		bx, by := xs[i+1].minus(xs[0]), ys[i+1].minus(ys[0])
		sum.add(ax.times(by).minus(bx.times(ay)).scaled(0.5).value())
	}
	return magnitude(sum.value(Type{}))
}

func sameLengths(f *Frame, node int, first Value, rest ...Value) bool {
	for _, v := range rest {
		if v.Len() != first.Len() {
			f.fail(node, RuleShape, "the lists have "+number(float64(first.Len()))+" and "+number(float64(v.Len()))+" elements",
				"each charge needs one value in every list")
		}
	}
	return f.ok
}

// AssemblyEnergy is the energy of point charges q at (x, y, z) in a medium of
// permittivity eps: Σ q_i q_j/(4π·eps·r_ij), each pair counted once. Two charges
// in one place are a division by zero.
func AssemblyEnergy(node int, q, x, y, z, eps Code) (Code, error) {
	return coulomb(node, "assembly_energy", []Code{q, x, y, z}, eps, nil)
}

// Potential is the potential Σ q_i/(4π·eps·|point - r_i|) of point charges at a
// point, a real vector.
func Potential(node int, q, x, y, z, eps, point Code) (Code, error) {
	if point.Type != (Type{Shape: Vector}) {
		return Code{}, refuse("write `(x, y, z)`", "potential is taken at a point, not at %s", point.Type)
	}
	return coulomb(node, "potential", []Code{q, x, y, z}, eps, &point)
}

func coulomb(node int, name string, lists []Code, eps Code, point *Code) (Code, error) {
	if err := realLists(name, lists...); err != nil {
		return Code{}, err
	}
	if !eps.Type.IsReal() {
		return Code{}, refuse("", "the permittivity of %s is a real number, not %s", name, eps.Type)
	}
	args := append(append([]Code(nil), lists...), eps)
	if point != nil {
		args = append(args, *point)
	}
	c := Code{Any: func(f *Frame) Value {
		var v [4]Value
		for i, l := range lists {
			v[i] = l.Any(f)
		}
		if !sameLengths(f, node, v[0], v[1:]...) {
			return Value{}
		}
		ch := charges{f: f, node: node}
		for i := range ch.q {
			ch.q[i] = jets(v[i])
		}
		sum := Value{}
		if point != nil {
			sum = ch.potential(point.Any(f))
		} else {
			sum = ch.energy()
		}
		den := eps.Any(f)
		den.x, den.dx = 4*math.Pi*den.x, 4*math.Pi*den.dx
		return divKernel.one(f, node, sum, den)
	}}
	any := c.Any
	c.Real = func(f *Frame) float64 { return real(any(f).x) }
	return build(c, args...).derive(func(*differ) (Code, error) {
		return Code{}, refuse("", "%s cannot be differentiated; write the sum out", name)
	}), nil
}

// charges are charge and coordinates of each point.
type charges struct {
	f    *Frame
	node int
	q    [4][]jet
}

// energy is Σ q_i q_j/r_ij over the pairs, compensated within and across rows.
func (c charges) energy() Value {
	n := len(c.q[0])
	var sum, lost, dsum, dlost float64
	for i := 1; i < n; i++ {
		if !c.f.spend(c.node, int64(i)) {
			return Value{}
		}
		row, ok := c.row(i)
		if !ok {
			c.f.fail(c.node, RuleDivision, "charges "+number(float64(c.twin(i)+1))+" and "+number(float64(i+1))+" are in one place", "their energy is infinite; move one of them")
			return Value{}
		}
		e := row.times(c.q[0][i])
		sum, lost = compensated(sum, lost, e.v)
		dsum, dlost = compensated(dsum, dlost, e.d)
	}
	return jet{sum + lost, dsum + dlost}.value()
}

// row is the potential of the charges before charge i at its place, times 4π·eps.
func (c charges) row(i int) (jet, bool) {
	q, x, y, z := c.q[0], c.q[1], c.q[2], c.q[3]
	if !c.f.dual {
		var sum, lost float64
		for j := range i {
			dx, dy, dz := x[i].v-x[j].v, y[i].v-y[j].v, z[i].v-z[j].v
			sum, lost = compensated(sum, lost, q[j].v/math.Sqrt(dx*dx+dy*dy+dz*dz))
		}
		return jet{v: sum + lost}, isFinite(sum)
	}
	var sum jet
	for j := range i {
		sum = sum.plus(c.term(j, x[i], y[i], z[i]))
	}
	return sum, isFinite(sum.v)
}

// term is q_j/r for a field point, with tangent.
func (c charges) term(j int, x, y, z jet) jet {
	dx, dy, dz := x.minus(c.q[1][j]), y.minus(c.q[2][j]), z.minus(c.q[3][j])
	r := math.Sqrt(dx.v*dx.v + dy.v*dy.v + dz.v*dz.v)
	dr := (dx.v*dx.d + dy.v*dy.d + dz.v*dz.d) / r
	return c.q[0][j].over(jet{r, dr})
}

// twin is the charge before i that is nearest to it.
func (c charges) twin(i int) (at int) {
	best := math.Inf(1)
	for j := range i {
		if t := c.term(j, c.q[1][i], c.q[2][i], c.q[3][i]); 1/math.Abs(t.v) < best || math.IsNaN(t.v) {
			best, at = 1/math.Abs(t.v), j
		}
	}
	return at
}

func (c charges) potential(p Value) Value {
	var sum neumaier
	x, y, z := jetOf(p.at(0)), jetOf(p.at(1)), jetOf(p.at(2))
	if !c.f.spend(c.node, int64(len(c.q[0]))) {
		return Value{}
	}
	for j := range c.q[0] {
		t := c.term(j, x, y, z)
		if !isFinite(t.v) {
			c.f.fail(c.node, RuleDivision, "the point is at charge "+number(float64(j+1)), "the potential is infinite there")
			return Value{}
		}
		sum.add(t.value())
	}
	return sum.value(Type{})
}

func jetOf(v Value) jet { return jet{real(v.x), real(v.dx)} }
