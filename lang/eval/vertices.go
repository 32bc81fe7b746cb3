package eval

import "math"

// Range is a slot with a real number that lies between two limits.
type Range struct {
	Slot      int
	Low, High float64
}

// maxCorners is the number of ranges up to which every corner is tried.
const maxCorners = 10

// Corners gives the least and the greatest value that a real code takes at the
// corners of the box of the ranges: the exact worst case where the code is
// monotone in each slot, without the linearization of WorstCase. Up to ten
// ranges every corner is tried. Beyond, the search climbs: ranges are turned
// from one end to the other one at a time as long as that helps, which finds the same corner where the code is monotone. The slots keep
// their values.
func Corners(f *Frame, node int, c Code, ranges []Range) (lo, hi float64, fault *Fault) {
	var used []Range
	for _, r := range ranges {
		if c.Reads(r.Slot) && r.Low != r.High {
			used = append(used, r)
		}
	}
	b := &box{f: f, node: node, code: c, ranges: used}
	for _, r := range used {
		b.was = append(b.was, f.Get(r.Slot))
	}
	defer b.restore()
	if len(used) <= maxCorners {
		lo, hi = b.every()
	} else {
		lo, hi = b.climb(-1), b.climb(+1)
	}
	return lo, hi, b.fault
}

type box struct {
	f      *Frame
	node   int
	code   Code
	ranges []Range
	was    []Value
	fault  *Fault
}

func (b *box) restore() {
	for i, r := range b.ranges {
		b.f.Set(r.Slot, b.was[i])
	}
}

// at evaluates at a corner: bit i of the corner is range i at its high end.
func (b *box) at(corner []bool) float64 {
	for i, r := range b.ranges {
		x := r.Low
		if corner[i] {
			x = r.High
		}
		b.f.Set(r.Slot, Real(x))
	}
	v, fault := b.f.Run(b.node, b.code)
	if fault != nil && b.fault == nil {
		b.fault = fault
	}
	return v.Re()
}

func (b *box) every() (lo, hi float64) {
	lo, hi = math.Inf(1), math.Inf(-1)
	corner := make([]bool, len(b.ranges))
	for n := range 1 << len(b.ranges) {
		for i := range corner {
			corner[i] = n>>i&1 == 1
		}
		v := b.at(corner)
		if b.fault != nil {
			return 0, 0
		}
		lo, hi = min(lo, v), max(hi, v)
	}
	return lo, hi
}

// climb looks for the corner with the greatest sign·value.
func (b *box) climb(sign float64) float64 {
	corner := make([]bool, len(b.ranges))
	best := sign * b.at(corner)
	for better := true; better && b.fault == nil; {
		better = false
		for i := range corner {
			corner[i] = !corner[i]
			if v := sign * b.at(corner); v > best {
				best, better = v, true
			} else {
				corner[i] = !corner[i]
			}
		}
	}
	return sign * best
}
