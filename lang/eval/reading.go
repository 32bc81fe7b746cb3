package eval

import "math"

// reading is one way of reading a table: column y where column x is given.
type reading struct {
	t     *Table
	node  int
	y, x  int
	order int       // of the derivative by the place; 0 reads the column itself
	ready *prepared // where the columns are constants
}

// prepared holds the curves that a reading needs, for given columns.
type prepared struct {
	direct *curve // y over x, or nil
	byAxis *curve // x over the axis, to be inverted
	onAxis *curve // y over the axis; nil where y is the axis
	why    string // why there are no curves
}

func newReading(t *Table, node int, yx [2]int, order int) *reading {
	r := &reading{t: t, node: node, y: yx[0], x: yx[1], order: order}
	a, ok0 := t.Columns[0].Data.Constant()
	x, ok1 := t.Columns[r.x].Data.Constant()
	y, ok2 := t.Columns[r.y].Data.Constant()
	if ok0 && ok1 && ok2 {
		r.ready = r.prepare(a, x, y)
	}
	return r
}

// prepare forms the curves. A column read along itself needs none.
func (r *reading) prepare(a, x, y Value) *prepared {
	p := &prepared{}
	switch {
	case r.x == r.y:
		p.direct, p.why = newCurve(x, x, true)
	case r.x == 0 || !monotone(jets(a)):
		p.direct, p.why = newCurve(x, y, r.t.Linear)
	default:
		if p.byAxis, p.why = newCurve(a, x, r.t.Linear); p.why == "" && r.y != 0 {
			p.onAxis, p.why = newCurve(a, y, r.t.Linear)
		}
	}
	return p
}

// curves gives the curves in this frame, nil and a fault where there are none.
// Those of computed columns are kept for as long as the columns stay the same.
func (r *reading) curves(f *Frame) *prepared {
	p := r.ready
	if p == nil {
		a, x, y := r.t.Columns[0].Data.Any(f), r.t.Columns[r.x].Data.Any(f), r.t.Columns[r.y].Data.Any(f)
		key := [4]any{a.many, x.many, y.many, r}
		if p = f.curves[key]; p == nil {
			if !f.ok || !f.spend(r.node, int64(x.Len())) || !f.reserve(r.node, 8*x.Len()) {
				return nil
			}
			if f.curves == nil || len(f.curves) > 256 {
				f.curves = map[[4]any]*prepared{}
			}
			p = r.prepare(a, x, y)
			f.curves[key] = p
		}
	}
	if p.why != "" {
		r.unreadable(f, p.why)
		return nil
	}
	return p
}

func (r *reading) unreadable(f *Frame, why string) {
	f.fail(r.node, RuleTable, "table "+r.t.Name+" cannot be read along "+r.t.Columns[r.x].Name+": "+why,
		"sort the rows so that this column rises or falls all the way, or read along another column")
}

func (r *reading) fast(f *Frame, at float64) float64 { return r.read(f, jet{v: at}).v }

func (r *reading) any(f *Frame, at Value) Value { return r.read(f, jetOf(at)).value() }

// read is the reading with its tangent.
func (r *reading) read(f *Frame, at jet) jet {
	p := r.curves(f)
	if p == nil {
		return jet{}
	}
	if p.direct != nil {
		if !r.inside(f, p.direct.x, at.v) {
			return jet{}
		}
		if r.x == r.y {
			return [4]jet{at, {v: 1}, {}, {}}[r.order]
		}
		return p.direct.at(at.within(p.direct.x), r.order)
	}
	if !p.byAxis.monotone {
		r.unreadable(f, "this column does not rise or fall all the way")
		return jet{}
	}
	axis, ok := p.byAxis.inverse(at)
	if !ok {
		r.inside(f, p.byAxis.y, at.v)
		return jet{}
	}
	if r.y == 0 {
		return inverseOrder(p.byAxis, axis, r.order)
	}
	return r.through(p, axis)
}

// inside reports whether the ends of the ascending or descending cells enclose
// the place, up to rounding, with a fault if not.
func (r *reading) inside(f *Frame, cells []jet, x float64) bool {
	a, b := cells[0].v, cells[len(cells)-1].v
	lo, hi := min(a, b), max(a, b)
	slack := 1e-12 * max(math.Abs(lo), math.Abs(hi))
	if x >= lo-slack && x <= hi+slack {
		return true
	}
	f.fail(r.node, RuleTable, "table "+r.t.Name+" has no rows for "+r.t.Columns[r.x].Name+" = "+number(x)+": its rows run from "+number(lo)+" to "+number(hi),
		"add rows, or keep the reading inside them; a table is not extrapolated (values in SI units)")
	return false
}

// inverseOrder is the derivative of the given order of the inverse of a curve:
// 1/y', -y”/y'^3, (3y”^2 - y'·y”')/y'^5.
func inverseOrder(c *curve, axis jet, order int) jet {
	if order == 0 {
		return axis
	}
	d1, d2 := c.at(axis, 1), c.at(axis, 2)
	p := d1.times(d1)
	switch order {
	case 1:
		return jet{v: 1}.over(d1)
	case 2:
		return d2.scaled(-1).over(p.times(d1))
	}
	return d2.times(d2).scaled(3).minus(d1.times(c.at(axis, 3))).over(p.times(p).times(d1))
}

// through is the column y read at the axis value u found from column x, or its
// derivative by x: the chain rule on y(u(x)).
func (r *reading) through(p *prepared, axis jet) jet {
	y := func(k int) jet { return p.onAxis.at(axis, k) }
	u := func(k int) jet { return inverseOrder(p.byAxis, axis, k) }
	switch r.order {
	case 0:
		return y(0)
	case 1:
		return y(1).times(u(1))
	case 2:
		return y(2).times(u(1)).times(u(1)).plus(y(1).times(u(2)))
	}
	u1 := u(1)
	return y(3).times(u1).times(u1).times(u1).plus(y(2).times(u1).times(u(2)).scaled(3)).plus(y(1).times(u(3)))
}
