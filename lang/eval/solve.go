package eval

import "math"

// Solve is the root of left = right as the slot runs over the domain from one
// bound to the other. The domain is sampled for changes of sign and for places
// where the difference touches zero; each is refined to full precision by
// Brent's method. Without a root it faults; with several it gives the least one,
// and Frame.Roots tells how many were found. Roots that lie closer together
// than a two-hundredth of the domain may be missed in pairs. The derivative is
// that of the implicit function.
func Solve(node, slot int, left, right, from, to Code) (Code, error) {
	for _, c := range []Code{left, right, from, to} {
		if !c.Type.IsReal() {
			return Code{}, refuse("", "solve compares real numbers, not %s", c.Type)
		}
	}
	g, err := Sub(node, left, right)
	if err != nil {
		return Code{}, err
	}
	s := &solver{node: node, slot: slot, g: g, from: from, to: to}
	d := &differ{slot: slot, node: node, done: map[*info]Code{}}
	if dg, err := d.of(g); err == nil {
		s.slope = &dg
	}
	c := Code{Real: s.root, Any: s.any}
	c = build(c, g, from, to)
	if c.konst != nil {
		return c, nil
	}
	c.info = over(from, to)
	c.info.reads = c.info.reads.with(g.info.reads.without(slot))
	c.info.nested = g.nested
	c.slots = max(c.slots, slot+1)
	return c.derive(func(d *differ) (Code, error) { return s.derive(d, c) }), nil
}

type solver struct {
	node, slot  int
	g, from, to Code
	slope       *Code // ∂g/∂x, nil where it cannot be formed
}

// Roots is how many roots the Solve of this node found when it last ran, if
// more than one, else 0.
func (f *Frame) Roots(node int) int { return f.roots[node] }

// any adds the tangent of the implicit function: -(∂g along the tangents)/(∂g/∂x).
func (s *solver) any(f *Frame) Value {
	was := f.dual
	f.dual = false
	x := s.root(f)
	f.dual = was
	v := Real(x)
	if !f.ok {
		return v
	}
	saved := f.slots[s.slot]
	f.slots[s.slot] = v
	if dg := s.g.Any(f); dg.dx != 0 && f.ok {
		slope := math.NaN()
		if s.slope != nil {
			slope = s.slope.Real(f)
		}
		v.dx = complex(-real(dg.dx)/slope, 0)
	}
	f.slots[s.slot] = saved
	return v
}

func (s *solver) derive(d *differ, root Code) (Code, error) {
	gp, err := d.inside(s.g, s.slot)
	if err != nil || gp.null {
		return gp, err
	}
	if s.slope == nil {
		return Code{}, refuse("", "this root cannot be differentiated")
	}
	q, err := Div(s.node, Neg(s.node, gp), *s.slope)
	if err != nil {
		return Code{}, err
	}
	return Let(s.node, []int{s.slot}, []Code{root}, q), nil
}

// samples of the domain: evenly spaced, and where it spans decades on one side
// of zero as many spaced evenly in the logarithm.
const samples = 201

func (s *solver) root(f *Frame) float64 {
	a, b := s.from.Real(f), s.to.Real(f)
	if !f.ok {
		return 0
	}
	if a > b {
		a, b = b, a
	}
	if !isFinite(a) || !isFinite(b) {
		f.fail(s.node, RuleNoRoot, "solve needs a finite range", "give the range in which the root is to be looked for")
		return 0
	}
	saved := f.slots[s.slot]
	h := &hunt{s: s, f: f, roots: 0}
	h.scan(a, b, false)
	if h.roots == 0 && f.ok && a*b > 0 && max(math.Abs(a), math.Abs(b)) > 20*min(math.Abs(a), math.Abs(b)) {
		h.scan(a, b, true)
	}
	f.slots[s.slot] = saved
	if f.ok && h.roots == 0 {
		s.fail(f, h, a, b)
	}
	if h.roots > 1 {
		if f.roots == nil {
			f.roots = map[int]int{}
		}
		f.roots[s.node] = h.roots
	} else if f.roots != nil {
		delete(f.roots, s.node)
	}
	return h.first
}

func (s *solver) fail(f *Frame, h *hunt, a, b float64) {
	if h.valid == 0 && f.forgiven.Rule != "" {
		f.fault, f.ok = f.forgiven, false
		return
	}
	found := "the difference of the two sides runs from " + number(h.low) + " to " + number(h.high) + " without crossing zero"
	f.fail(s.node, RuleNoRoot, "no root between "+number(a)+" and "+number(b)+": "+found,
		"widen the range, or check the equation (values in SI units)")
}

// hunt is one search for roots.
type hunt struct {
	s         *solver
	f         *Frame
	roots     int
	first     float64
	valid     int // samples at which both sides had a value
	low, high float64
	x, y      [3]float64 // the last three samples
}

// at evaluates the difference; NaN where it has no value.
func (h *hunt) at(x float64) float64 {
	f := h.f
	if !f.spend(h.s.node, h.s.g.cost+1) {
		return math.NaN()
	}
	f.slots[h.s.slot] = Real(x)
	y := h.s.g.Real(f)
	if !f.ok {
		switch f.fault.Rule {
		case RuleDivision, RuleShape, RuleTable, RuleRange, RuleDiverges:
			f.forgiven, f.ok = f.fault, true
		}
		return math.NaN()
	}
	return y
}

// scan samples the domain, in order of x.
func (h *hunt) scan(a, b float64, logarithmic bool) {
	h.low, h.high, h.valid = math.Inf(1), math.Inf(-1), 0
	h.y = [3]float64{math.NaN(), math.NaN(), math.NaN()}
	for i := 0; i < samples && h.f.ok; i++ {
		u := float64(i) / (samples - 1)
		x := a + (b-a)*u
		if logarithmic {
			x = a * math.Pow(b/a, u)
		}
		if i == samples-1 {
			x = b
		}
		h.step(x, h.at(x))
	}
}

// step takes the next sample and looks for roots up to it.
func (h *hunt) step(x, y float64) {
	if !math.IsNaN(y) {
		h.valid++
		h.low, h.high = min(h.low, y), max(h.high, y)
	}
	h.x = [3]float64{h.x[1], h.x[2], x}
	h.y = [3]float64{h.y[1], h.y[2], y}
	p, q, r := h.y[0], h.y[1], h.y[2]
	switch {
	case r == 0:
		h.found(x)
	case q != 0 && (q < 0) != (r < 0) && !math.IsNaN(q+r):
		if z, ok := h.bracket(h.x[1], x, q, r); ok {
			h.found(z)
		}
	}
	// Three samples of one sign whose middle is nearest to zero may hide two.
	if p*q > 0 && q*r > 0 && math.Abs(q) <= math.Abs(p) && math.Abs(q) < math.Abs(r) {
		h.dip(h.x[0], h.x[2], h.x[1], q)
	}
}

func (h *hunt) found(x float64) {
	if h.roots == 0 || x < h.first {
		h.first = x
	}
	h.roots++
}

// dip looks for the least magnitude between a and c by golden section, stopping
// as soon as the sign changes; a least value that is zero beside the values
// around it is a double root.
func (h *hunt) dip(a, c, mid, y float64) {
	const golden = 0.6180339887498949
	sign, edge := math.Copysign(1, y), max(math.Abs(h.y[0]), math.Abs(h.y[2]))
	best, at := math.Abs(y), mid
	x1, x2 := c-golden*(c-a), a+golden*(c-a)
	y1, y2 := sign*h.at(x1), sign*h.at(x2)
	for range 60 {
		for _, p := range [2][2]float64{{x1, y1}, {x2, y2}} {
			if p[1] < 0 { // crossed: one root on each side
				h.both(p[0], p[1]*sign)
				return
			}
			if p[1] < best {
				best, at = p[1], p[0]
			}
		}
		if !(c-a > 4*epsilon*max(math.Abs(a), math.Abs(c))) || math.IsNaN(y1+y2) {
			break
		}
		if y1 < y2 {
			c, x2, y2 = x2, x1, y1
			x1 = c - golden*(c-a)
			y1 = sign * h.at(x1)
		} else {
			a, x1, y1 = x1, x2, y2
			x2 = a + golden*(c-a)
			y2 = sign * h.at(x2)
		}
	}
	if best <= 1e-14*edge {
		h.found(at)
	}
}

// both finds the two roots on either side of a point of the other sign.
func (h *hunt) both(x, y float64) {
	if z, ok := h.bracket(h.x[0], x, h.y[0], y); ok {
		h.found(z)
	}
	if z, ok := h.bracket(x, h.x[2], y, h.y[2]); ok {
		h.found(z)
	}
}
