package eval

import "math"

// Sum is the sum of body as the slot runs through the whole numbers from one
// bound to the other, both included; an empty range sums to zero. Numbers are
// added with a compensation for rounding. Every term counts against the budget.
func Sum(node, slot int, from, to, body Code) (Code, error) {
	if !from.Type.IsReal() || !to.Type.IsReal() {
		return Code{}, refuse("", "a sum runs between two whole numbers, not from %s to %s", from.Type, to.Type)
	}
	s := &summation{node, slot, from, to, body}
	c := Code{Type: body.Type, Any: s.any}
	if body.Real != nil {
		c.Real = s.fast
	}
	c = build(c, from, to, body)
	if c.konst != nil {
		return c, nil
	}
	c.info = over(from, to)
	c.info.reads = c.info.reads.with(body.info.reads.without(slot))
	c.info.breaks = joinBreaks(c.info.breaks, withoutSlot(body.breaks, slot))
	c.info.nested = body.nested
	c.slots = max(c.slots, slot+1)
	return c.derive(s.derive), nil
}

type summation struct {
	node, slot     int
	from, to, body Code
}

// terms gives the bounds as whole numbers.
func (s *summation) terms(f *Frame) (a, n float64, ok bool) {
	a, b := s.from.Real(f), s.to.Real(f)
	ra, rb := math.Round(a), math.Round(b)
	if math.Abs(a-ra) > 1e-9 || math.Abs(b-rb) > 1e-9*max(1, math.Abs(b)) || !(math.Abs(a) < 1e15 && math.Abs(b) < 1e15) {
		f.fail(s.node, RuleShape, "a sum runs from one whole number to another, not from "+number(a)+" to "+number(b),
			"sum over a whole number and compute the variable from it; for an infinite sum choose a last term")
		return 0, 0, false
	}
	return ra, rb - ra + 1, f.ok
}

func (s *summation) fast(f *Frame) float64 {
	a, n, ok := s.terms(f)
	if !ok {
		return 0
	}
	saved := f.slots[s.slot]
	var sum, lost float64
	for i := 0.0; i < n && f.spend(s.node, s.body.cost+1); i++ {
		f.slots[s.slot] = Real(a + i)
		sum, lost = compensated(sum, lost, s.body.Real(f))
	}
	f.slots[s.slot] = saved
	if !isFinite(sum) {
		return sum
	}
	return sum + lost
}

func (s *summation) any(f *Frame) Value {
	t := s.body.Type
	a, n, ok := s.terms(f)
	if !ok {
		return zero(t)
	}
	saved := f.slots[s.slot]
	var sum neumaier
	total := zero(t)
	for i := 0.0; i < n && f.spend(s.node, s.body.cost+1); i++ {
		f.slots[s.slot] = Real(a + i)
		switch v := s.body.Any(f); {
		case t.Shape == Scalar:
			sum.add(v)
		case i == 0:
			total = v
		default:
			total = addKernel.each(f, s.node, total, v)
		}
	}
	f.slots[s.slot] = saved
	if t.Shape == Scalar {
		return sum.value(t)
	}
	return total
}

func (s *summation) derive(d *differ) (Code, error) {
	if s.from.Reads(d.slot) || s.to.Reads(d.slot) {
		return Code{}, refuse("", "a sum has no derivative by its number of terms")
	}
	db, err := d.inside(s.body, s.slot)
	if err != nil || db.null {
		return db, err
	}
	return Sum(s.node, s.slot, s.from, s.to, db)
}
