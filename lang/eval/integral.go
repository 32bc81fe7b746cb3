package eval

import (
	"cmp"
	"math"
	"slices"
)

// accuracy demanded of the outermost integral, relative to its value, and of the
// integrals inside one another, relative to the integral of the magnitude, so
// that the outer ones see a smooth integrand. The first is better than what is
// promised, 1e-9, by a reserve, since an estimate is not a bound.
var accuracy = [3]float64{1e-9 / reserve, 1e-10, 1e-11}

const reserve = 5

// Integral is the integral of body over the slot, from one bound to the other;
// bounds may be infinite. It is accurate to 1e-9 of its value (to 1e-13 of the
// integral of |body| where that is larger), by an error estimate, or a fault:
// integral-diverges or integral-not-converged. Singular ends, and singular
// points inside the range, are extrapolated; principal values are not taken. A
// body of any shape but a list is integrated component by component, vectors in
// Cartesian components. Derivatives are exact, also by uncertain bounds.
func Integral(node, slot int, from, to, body Code) (Code, error) {
	if !from.Type.IsReal() || !to.Type.IsReal() {
		return Code{}, refuse("", "an integral runs between two real numbers, not from %s to %s", from.Type, to.Type)
	}
	if body.Type.Shape == List {
		return Code{}, refuse("integrate its elements one by one, or along a table column", "a list cannot be integrated")
	}
	if !body.Reads(slot) && !infinite(from) && !infinite(to) {
		width, err := Sub(node, to, from)
		if err != nil {
			return Code{}, err
		}
		return Mul(node, body, width)
	}
	g := &integral{node: node, slot: slot, from: from, to: to, body: body}
	for _, b := range body.breaks {
		if b.slot == slot && b.free([]int{slot}) {
			g.breaks = append(g.breaks, b)
		}
	}
	return g.code(), nil
}

func infinite(c Code) bool {
	x, ok := c.number()
	return ok && math.IsInf(x, 0)
}

// integral is the compiled form.
type integral struct {
	node, slot     int
	from, to, body Code
	breaks         []breaks
	real           [3]problem // for each depth of nesting
}

func (g *integral) code() Code {
	c := Code{Type: g.body.Type, Any: g.any}
	if r := g.body.Real; r != nil {
		for d := range g.real {
			g.real[d] = g.problem(d, &realSampler{g.slot, r}, 1, 1)
		}
		c.Real = g.fast
	}
	c = build(c, g.from, g.to, g.body)
	if c.konst != nil {
		return c
	}
	c.info = over(g.from, g.to)
	c.info.reads = c.info.reads.with(g.body.info.reads.without(g.slot))
	c.info.breaks = joinBreaks(c.info.breaks, withoutSlot(g.body.breaks, g.slot))
	c.info.nested = true
	c.slots = max(c.slots, g.slot+1)
	return c.derive(g.derive)
}

func (g *integral) problem(depth int, s sampler, m, primal int) problem {
	depth = min(depth, 2)
	rel := accuracy[depth]
	p := problem{node: g.node, m: m, primal: primal, body: s, cost: g.body.cost + 1,
		rel: [2]float64{rel, rel}, onAbs: depth > 0, floor: roundoff}
	if g.body.nested {
		p.floor = 0.2 * accuracy[min(depth+1, 2)]
	}
	return p
}

// fast integrates a real body without tangents and without allocation.
func (g *integral) fast(f *Frame) float64 {
	a, b := g.from.Real(f), g.to.Real(f)
	base := len(f.marks)
	lo, hi, sign := ordered(mark{x: a}, mark{x: b})
	if !f.rangeOK(g.node, lo.x, hi.x) {
		return 0
	}
	f.mark(g.breaks, lo, hi)
	p := &g.real[min(f.depth, 2)]
	saved := f.slots[g.slot]
	f.depth++
	var out [1]float64
	for i := base; i+1 < len(f.marks); i++ {
		if !f.quadrature(p, between(f.marks, base, i), out[:]) {
			break
		}
	}
	f.depth--
	f.slots[g.slot] = saved
	f.marks = f.marks[:base]
	return sign * out[0]
}

// any integrates a body of any type, with tangents where they are live.
func (g *integral) any(f *Frame) Value {
	a, b := g.from.Any(f), g.to.Any(f)
	base := len(f.marks)
	lo, hi, sign := ordered(mark{real(a.x), real(a.dx)}, mark{real(b.x), real(b.dx)})
	t := g.body.Type
	s := &anySampler{slot: g.slot, fn: g.body.Any, n: zero(t).Len(), dual: f.dual}
	s.parts = s.n
	if t.Complex {
		s.parts *= 2
	}
	m, primal := s.components()
	s.row = make([]float64, m)
	sum := make([]float64, m)
	if !f.rangeOK(g.node, lo.x, hi.x) {
		return s.value(t, sum)
	}
	f.mark(g.breaks, lo, hi)
	p := g.problem(f.depth, s, m, primal)
	saved := f.slots[g.slot]
	f.depth++
	for i := base; i+1 < len(f.marks) && f.ok; i++ {
		s.move(f.marks[i], f.marks[i+1])
		p.stretch = math.Abs(s.rate)
		f.quadrature(&p, between(f.marks, base, i), sum)
	}
	if lo.x == hi.x && f.ok {
		s.boundary(f, sum, lo, hi)
	}
	f.depth--
	f.slots[g.slot] = saved
	f.marks = f.marks[:base]
	for k := range sum {
		sum[k] *= sign
	}
	return s.value(t, sum)
}

// move sets how the nodes of the stretch between two marks move with them.
func (s *anySampler) move(a, b mark) {
	s.origin, s.start, s.rate = a.x, a.dx, 0
	switch {
	case math.IsInf(a.x, 0) && math.IsInf(b.x, 0):
		s.origin, s.start = 0, 0
	case math.IsInf(a.x, 0):
		s.origin, s.start = b.x, b.dx
	case !math.IsInf(b.x, 0):
		s.rate = (b.dx - a.dx) / (b.x - a.x)
	}
}

// boundary is the derivative of an integral over an empty range: the integrand
// times the rate at which the range opens.
func (s *anySampler) boundary(f *Frame, sum []float64, lo, hi mark) {
	if !s.dual || lo.dx == hi.dx {
		return
	}
	s.origin, s.start, s.rate = lo.x, 0, 0
	if !s.point(f, lo.x, s.row) {
		return
	}
	for k := range s.parts {
		sum[s.parts+k] = s.row[k] * (hi.dx - lo.dx)
	}
}

// ordered sorts the bounds; the sign is that of the integral.
func ordered(a, b mark) (lo, hi mark, sign float64) {
	if b.x < a.x {
		return b, a, -1
	}
	return a, b, 1
}

func (f *Frame) rangeOK(node int, a, b float64) bool {
	if f.ok && (math.IsNaN(a) || math.IsNaN(b)) {
		f.fail(node, RuleNotConverged, "a bound of the integral is not a number", "look at how the bound is computed")
	}
	return f.ok && f.spend(node, 1)
}

// mark pushes the bounds and, between them, the places where the integrand is
// not smooth, ascending, onto f.marks; an empty range pushes nothing.
func (f *Frame) mark(bs []breaks, lo, hi mark) {
	base := len(f.marks)
	if lo.x == hi.x {
		return
	}
	f.marks = append(f.marks, lo)
	for _, b := range bs {
		for _, c := range b.at {
			v := c.Any(f)
			f.markInside(mark{real(v.x), real(v.dx)}, lo, hi)
		}
		i, _ := slices.BinarySearch(b.knots, lo.x)
		for ; i < len(b.knots) && b.knots[i] < hi.x; i++ {
			f.markInside(mark{x: b.knots[i]}, lo, hi)
		}
	}
	if math.IsInf(lo.x, 0) && math.IsInf(hi.x, 0) && len(f.marks) == base+1 {
		f.marks = append(f.marks, mark{})
	}
	f.marks = append(f.marks, hi)
	ms := f.marks[base:]
	if len(ms) > 3 {
		slices.SortStableFunc(ms, func(a, b mark) int { return cmp.Compare(a.x, b.x) })
		ms = slices.CompactFunc(ms, func(a, b mark) bool { return a.x == b.x })
		f.marks = f.marks[:base+len(ms)]
	}
}

// markInside pushes a mark that lies inside the range by more than rounding.
func (f *Frame) markInside(m, lo, hi mark) {
	if d := 4 * epsilon * math.Abs(m.x); m.x-d > lo.x && m.x+d < hi.x {
		f.marks = append(f.marks, m)
	}
}

// between is the segment from mark i to the next.
func between(marks []mark, base, i int) segment {
	s := segment{a: marks[i].x, b: marks[i+1].x}
	if i > base {
		s.left = endMark
	}
	if i+2 < len(marks) {
		s.right = endMark
	}
	switch {
	case math.IsInf(s.b, 1):
		s.infinite = 1
	case math.IsInf(s.a, -1):
		s.infinite = -1
	}
	return s
}

// derive is Leibniz's rule. (Uncertain bounds do not come this way: they move
// the nodes, see anySampler.)
func (g *integral) derive(d *differ) (Code, error) {
	in, err := d.inside(g.body, g.slot)
	if err != nil {
		return Code{}, err
	}
	for _, b := range g.breaks {
		if !b.free([]int{d.slot}) {
			return Code{}, refuse("split the integral there", "cannot differentiate an integral whose integrand jumps at a place that moves")
		}
	}
	sum := in
	if !in.null {
		if sum, err = Integral(g.node, g.slot, g.from, g.to, in); err != nil {
			return Code{}, err
		}
	}
	for i, bound := range []Code{g.from, g.to} {
		db, err := d.of(bound)
		if err != nil {
			return Code{}, err
		}
		if db.null {
			continue
		}
		term := product(g.node, Let(g.node, []int{g.slot}, []Code{bound}, g.body), db)
		if i == 0 {
			term = Neg(g.node, term)
		}
		if sum, err = Add(g.node, sum, term); err != nil {
			return Code{}, err
		}
	}
	return sum, nil
}
