package eval

import (
	"math"
	"slices"
	"sort"
)

// jet is a real number with its tangent.
type jet struct{ v, d float64 }

func (a jet) value() Value { return Value{x: complex(a.v, 0), dx: complex(a.d, 0)} }

func (a jet) plus(b jet) jet       { return jet{a.v + b.v, a.d + b.d} }
func (a jet) minus(b jet) jet      { return jet{a.v - b.v, a.d - b.d} }
func (a jet) times(b jet) jet      { return jet{a.v * b.v, along(b.v, a.d) + along(a.v, b.d)} }
func (a jet) scaled(k float64) jet { return jet{k * a.v, k * a.d} }
func (a jet) over(b jet) jet {
	q := a.v / b.v
	return jet{q, (a.d - along(q, b.d)) / b.v}
}

// within moves a value that misses the ends of ascending or descending cells by
// rounding onto them.
func (a jet) within(cells []jet) jet {
	p, q := cells[0].v, cells[len(cells)-1].v
	a.v = max(min(p, q), min(a.v, max(p, q)))
	return a
}

// curve is an interpolant of points with x ascending: straight, or the monotone
// piecewise cubic of F. N. Fritsch and J. Butland, SIAM J. Sci. Stat. Comput. 5
// (1984) 300, with the one-sided three-point slopes of SLATEC's PCHIC at the
// ends. Points carry tangents, so a curve moves with its cells.
type curve struct {
	x, y, slope []jet        // slope is nil for a straight curve
	poly        [][4]float64 // of each interval, in x - x_i
	monotone    bool         // y rises or falls strictly
	moves       bool         // a cell has a tangent
}

// newCurve sorts the points; nil and a reason where x repeats.
func newCurve(xs, ys Value, linear bool) (*curve, string) {
	n := xs.Len()
	if n != ys.Len() || n == 0 {
		return nil, "its columns have different lengths"
	}
	if !xs.Finite() || !ys.Finite() {
		return nil, "a cell is not a finite number"
	}
	c := &curve{x: jets(xs), y: jets(ys)}
	if n > 1 && c.x[0].v > c.x[n-1].v {
		slices.Reverse(c.x)
		slices.Reverse(c.y)
	}
	for i := 1; i < n; i++ {
		if !(c.x[i-1].v < c.x[i].v) {
			return nil, "this column does not rise or fall all the way"
		}
	}
	if !linear && n > 2 {
		c.slope = slopes(c.x, c.y)
	}
	c.monotone = monotone(c.y)
	for i := range n {
		c.moves = c.moves || c.x[i].d != 0 || c.y[i].d != 0
	}
	for i := range n - 1 {
		m0, c2, c3 := c.coefficients(i)
		c.poly = append(c.poly, [4]float64{c.y[i].v, m0.v, c2.v, c3.v})
	}
	return c, ""
}

func monotone(y []jet) bool {
	up := len(y) > 1 && y[1].v > y[0].v
	for i := 1; i < len(y); i++ {
		if y[i].v == y[i-1].v || y[i].v > y[i-1].v != up {
			return false
		}
	}
	return true
}

func jets(v Value) []jet {
	out := make([]jet, v.Len())
	for i := range out {
		e := v.at(i)
		out[i] = jet{real(e.x), real(e.dx)}
	}
	return out
}

// slopes are those of Fritsch and Butland: zero at an extremum, else a weighted
// harmonic mean of the secants on either side.
func slopes(x, y []jet) []jet {
	n := len(x)
	h, s := make([]jet, n-1), make([]jet, n-1)
	for i := range h {
		h[i] = x[i+1].minus(x[i])
		s[i] = y[i+1].minus(y[i]).over(h[i])
	}
	m := make([]jet, n)
	for i := 1; i < n-1; i++ {
		if s[i-1].v*s[i].v <= 0 {
			continue
		}
		w1, w2 := h[i].scaled(2).plus(h[i-1]), h[i-1].scaled(2).plus(h[i])
		m[i] = h[i-1].plus(h[i]).scaled(3).over(w1.over(s[i-1]).plus(w2.over(s[i])))
	}
	m[0] = endSlope(h[0], h[1], s[0], s[1])
	m[n-1] = endSlope(h[n-2], h[n-3], s[n-2], s[n-3])
	return m
}

// endSlope is the slope of the parabola through the three end points, limited
// so that the curve stays monotone.
func endSlope(h0, h1, s0, s1 jet) jet {
	g := h0.scaled(2).plus(h1).times(s0).minus(h0.times(s1)).over(h0.plus(h1))
	switch {
	case g.v*s0.v <= 0:
		return jet{}
	case s0.v*s1.v <= 0 && math.Abs(g.v) > 3*math.Abs(s0.v):
		return s0.scaled(3)
	}
	return g
}

// find is the interval that holds x; the first or last for x beyond.
func (c *curve) find(x float64) int {
	i := sort.Search(len(c.x), func(i int) bool { return c.x[i].v > x }) - 1
	return max(0, min(i, len(c.x)-2))
}

// at is the curve, or its derivative of the given order, at x.
func (c *curve) at(x jet, order int) jet {
	if len(c.x) == 1 {
		if order == 0 {
			return c.y[0]
		}
		return jet{}
	}
	return c.cubic(c.find(x.v), x, order)
}

// cubic is interval i, or its derivative of the given order, at x.
func (c *curve) cubic(i int, x jet, order int) jet {
	if !c.moves {
		v := jet{v: c.plain(i, x.v, order)}
		if x.d != 0 {
			v.d = c.plain(i, x.v, order+1) * x.d
		}
		return v
	}
	t := x.minus(c.x[i])
	m0, c2, c3 := c.coefficients(i)
	switch order {
	case 0:
		return c.y[i].plus(t.times(m0.plus(t.times(c2.plus(t.times(c3))))))
	case 1:
		return m0.plus(t.times(c2.scaled(2).plus(t.times(c3.scaled(3)))))
	case 2:
		return c2.scaled(2).plus(t.times(c3.scaled(6)))
	case 3:
		return c3.scaled(6)
	}
	return jet{}
}

// plain is cubic without tangents.
func (c *curve) plain(i int, x float64, order int) float64 {
	p, t := &c.poly[i], x-c.x[i].v
	switch order {
	case 0:
		return p[0] + t*(p[1]+t*(p[2]+t*p[3]))
	case 1:
		return p[1] + t*(2*p[2]+3*t*p[3])
	case 2:
		return 2*p[2] + 6*t*p[3]
	case 3:
		return 6 * p[3]
	}
	return 0
}

// coefficients are those of y0 + t(m0 + t(c2 + t·c3)) in interval i.
func (c *curve) coefficients(i int) (m0, c2, c3 jet) {
	h := c.x[i+1].minus(c.x[i])
	s := c.y[i+1].minus(c.y[i]).over(h)
	if c.slope == nil {
		return s, jet{}, jet{}
	}
	m0, m1 := c.slope[i], c.slope[i+1]
	c2 = s.scaled(3).minus(m0.scaled(2)).minus(m1).over(h)
	c3 = m0.plus(m1).minus(s.scaled(2)).over(h).over(h)
	return m0, c2, c3
}

// inverse is the x at which a strictly monotone curve has the value y; false
// outside or where the curve is not monotone.
func (c *curve) inverse(y jet) (jet, bool) {
	n := len(c.y)
	if n < 2 || !c.monotone {
		return jet{}, false
	}
	up := c.y[n-1].v > c.y[0].v
	slack := 1e-12 * max(math.Abs(c.y[0].v), math.Abs(c.y[n-1].v))
	if y.v < min(c.y[0].v, c.y[n-1].v)-slack || y.v > max(c.y[0].v, c.y[n-1].v)+slack {
		return jet{}, false
	}
	y = y.within(c.y)
	i := sort.Search(n, func(i int) bool { return c.y[i].v > y.v == up && c.y[i].v != y.v }) - 1
	i = max(0, min(i, n-2))
	x := c.invert(i, y.v)
	return c.moved(i, x, y), true
}

// invert solves cubic i for y by Newton's method kept inside a bracket.
func (c *curve) invert(i int, y float64) float64 {
	a, b := c.x[i].v, c.x[i+1].v
	rising := c.y[i+1].v > c.y[i].v
	if y == c.y[i].v {
		return a
	}
	if y == c.y[i+1].v {
		return b
	}
	x := a + (y-c.y[i].v)/(c.y[i+1].v-c.y[i].v)*(b-a)
	lo, hi := a, b
	for range 100 {
		r := c.plain(i, x, 0) - y
		if r > 0 == rising {
			hi = x
		} else {
			lo = x
		}
		next := x - r/c.plain(i, x, 1)
		if !(next > lo && next < hi) {
			next = lo + (hi-lo)/2
		}
		if math.Abs(next-x) <= 2*epsilon*max(math.Abs(next), math.Abs(b-a)) {
			return next
		}
		x = next
	}
	return x
}

// moved gives the inverse its tangent: (dy - ∂y along the cells)/(∂y/∂x).
func (c *curve) moved(i int, x float64, y jet) jet {
	fixed := c.cubic(i, jet{v: x}, 0)
	if y.d == fixed.d {
		return jet{v: x}
	}
	return jet{x, (y.d - fixed.d) / c.plain(i, x, 1)}
}
