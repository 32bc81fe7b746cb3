package eval

import "math"

// mark is a place where an integrand is not smooth, with its tangent.
type mark struct{ x, dx float64 }

// segment is a stretch of the range to integrate over; singular ends are those
// at which the integrand has been found to have no finite value.
type segment struct {
	a, b        float64
	left, right end
	infinite    int // +1: out to infinity from a; -1: from minus infinity to b
	splits      int // how often the range has been split to come here
}

// end tells what is known of an end of a segment.
type end uint8

const (
	endOuter end = iota // an end of the range: look for a layer hidden there
	endMark             // a mark: the integrand may jump there
	endPole             // singular
)

// maxSplits bounds the points inside a range at which it is found singular.
const maxSplits = 6

// quadrature integrates the problem over one segment and what it splits into,
// adding to out (m components). False: a fault stands.
func (f *Frame) quadrature(p *problem, seg segment, out []float64) bool {
	w := f.enter(p.m)
	defer f.leave()
	clear(w.acc)
	w.segs = append(w.segs[:0], seg)
	var abs [2]float64
	for len(w.segs) > 0 {
		s := w.segs[len(w.segs)-1]
		w.segs = w.segs[:len(w.segs)-1]
		st, x := f.segment(w, p, s, w.scale(p))
		if st == singular && s.splits < maxSplits && x > s.a && x < s.b {
			w.segs = append(w.segs,
				segment{a: x, b: s.b, left: endPole, right: s.right, infinite: max(s.infinite, 0), splits: s.splits + 1},
				segment{a: s.a, b: x, left: s.left, right: endPole, infinite: min(s.infinite, 0), splits: s.splits + 1})
			continue
		}
		if st != converged {
			f.integralFails(p, st, s, x, w)
			return false
		}
		for k := range p.m {
			w.acc[k] += w.total[k]
		}
		for g := range 2 {
			abs[g] += w.abs[g]
		}
	}
	for k := range p.m {
		if g := p.group(k); math.Abs(w.acc[k]) > roundoff*abs[g] {
			out[k] += w.acc[k]
		}
	}
	return true
}

// roundoff is what rounding leaves of the integral of the magnitude. An
// integral below it is zero: the rest of a cancellation would be noise to an
// outer integral.
const roundoff = 1e-13

// scale is the size of what has been integrated so far.
func (w *workspace) scale(p *problem) (size [2]float64) {
	for k, x := range w.acc[:p.m] {
		size[p.group(k)] = max(size[p.group(k)], math.Abs(x))
	}
	return size
}

// segment integrates one segment into w.total.
func (f *Frame) segment(w *workspace, p *problem, s segment, scale [2]float64) (state, float64) {
	switch {
	case s.infinite != 0:
		return f.infinite(w, p, s, scale)
	case s.left == endPole && s.right == endPole:
		return f.twoTails(w, p, s, scale)
	case s.left == endPole:
		return f.wholeTail(w, p, tail{from: s.a, dir: 1, width: s.b - s.a, pole: true}, scale)
	case s.right == endPole:
		return f.wholeTail(w, p, tail{from: s.b, dir: -1, width: s.b - s.a, pole: true}, scale)
	}
	e := ends{checkLeft: s.left == endOuter, checkRight: s.right == endOuter, tails: true}
	return f.adaptive(w, p, s.a, s.b, e, p.share(scale))
}

// share is the absolute error that does not matter beside an integral of the
// given size.
func (p *problem) share(scale [2]float64) [2]float64 {
	return [2]float64{0.1 * p.rel[0] * scale[0], 0.1 * p.rel[1] * max(scale[1], p.stretch*scale[0])}
}

// wholeTail integrates a segment that is a tail as a whole.
func (f *Frame) wholeTail(w *workspace, p *problem, t tail, scale [2]float64) (state, float64) {
	s, st := f.tail(p, t, scale)
	if st == converged {
		copy(w.total, s.sum)
		w.err, w.abs = s.err, s.abs
	}
	if st == singular {
		return st, s.where
	}
	return st, t.from
}

// twoTails integrates a segment that is singular at both ends.
func (f *Frame) twoTails(w *workspace, p *problem, s segment, scale [2]float64) (state, float64) {
	mid := s.a + (s.b-s.a)/2
	if st, x := f.wholeTail(w, p, tail{from: s.a, dir: 1, width: mid - s.a, pole: true}, scale); st != converged {
		return st, x
	}
	return f.addTail(w, p, tail{from: s.b, dir: -1, width: s.b - mid, pole: true})
}

// addTail adds a tail to what w holds.
func (f *Frame) addTail(w *workspace, p *problem, t tail) (state, float64) {
	var scale [2]float64
	for k, x := range w.total[:p.m] {
		scale[p.group(k)] = max(scale[p.group(k)], math.Abs(x))
	}
	s, st := f.tail(p, t, scale)
	if st == singular {
		return st, s.where
	}
	if st != converged {
		return st, t.from
	}
	for k := range p.m {
		w.total[k] += s.sum[k]
	}
	for g := range 2 {
		w.err[g] += s.err[g]
		w.abs[g] += s.abs[g]
	}
	return converged, 0
}

// replaceByTail replaces interval i, which lies at an end of the segment, by the
// extrapolated tail from it to that end.
func (f *Frame) replaceByTail(w *workspace, p *problem, i int) (state, float64) {
	v := w.iv[i]
	t := tail{from: v.a, dir: 1, width: v.b - v.a}
	if v.next < 0 {
		t.from, t.dir = v.b, -1
	}
	var scale [2]float64
	for k, x := range w.total[:p.m] {
		scale[p.group(k)] = max(scale[p.group(k)], math.Abs(x))
	}
	s, st := f.tail(p, t, scale)
	if st != converged {
		return st, t.from
	}
	w.account(p, i, -1)
	lo, hi := i*p.m, (i+1)*p.m
	copy(w.sums[lo:hi], s.sum)
	f.valueAt(w, p, v.a, v.prev >= 0, w.left[lo:hi])
	f.valueAt(w, p, v.b, v.next >= 0, w.right[lo:hi])
	w.iv[i].err, w.iv[i].abs, w.iv[i].gap, w.iv[i].closed = s.err, s.abs, [2][2]float64{}, true
	w.account(p, i, 1) // not back on the heap: it cannot be refined
	w.meet(p, v.prev, -1)
	w.meet(p, -1, v.next)
	if !f.ok {
		return stopped, 0
	}
	return converged, 0
}

// infinite integrates from a out to infinity (or up from minus infinity to b):
// up to the distance at which the integrand counts most, and a tail from there.
func (f *Frame) infinite(w *workspace, p *problem, s segment, scale [2]float64) (state, float64) {
	from, dir := s.a, float64(s.infinite)
	e := s.left
	if s.infinite < 0 {
		from, e = s.b, s.right
	}
	d, ok := f.reach(p, from, dir, w.row)
	if !ok {
		return stopped, 0
	}
	near := segment{a: from, b: from + d, left: e, right: endMark}
	if dir < 0 {
		near = segment{a: from - d, b: from, left: endMark, right: e}
	}
	st, x := f.segment(w, p, near, scale)
	if st != converged {
		return st, x
	}
	return f.addTail(w, p, tail{from: from, dir: dir, width: d, outward: true})
}

// reach scans distances from 2^-100 to 2^100 (in SI units, so from below any
// length to above any frequency) for the one at which distance times integrand
// is largest: the scale on which the integral lives.
func (f *Frame) reach(p *problem, from, dir float64, row []float64) (float64, bool) {
	lo := -100
	if from != 0 {
		lo = max(lo, math.Ilogb(from)-20)
	}
	best, at := 0.0, max(1, math.Abs(from))
	for k := lo; k <= 100; k += 2 {
		d := math.Ldexp(1, k)
		if !f.spend(p.node, p.cost) {
			return 0, false
		}
		if !p.body.point(f, from+dir*d, row) {
			if f.fault.Rule == RuleBudget {
				return 0, false
			}
			f.ok = true // no value so far out: the tail will tell whether it matters
			continue
		}
		size := 0.0
		for _, y := range row[:p.primal] {
			size = max(size, math.Abs(y)*d)
		}
		if size > best && isFinite(size) {
			best, at = size, d
			if k > 90 {
				at = max(1, math.Abs(from)) // grows without end
			}
		}
	}
	return at, true
}

// integralFails records why an integral has no value.
func (f *Frame) integralFails(p *problem, st state, s segment, x float64, w *workspace) {
	if !f.ok {
		return
	}
	where := "at " + number(x)
	if s.infinite != 0 && x == s.a || s.infinite < 0 && x == s.b {
		where = "towards infinity"
	}
	switch {
	case st == undefined && f.forgiven.Rule == RuleDivision:
		f.fault, f.ok = f.forgiven, false
	case st == diverging:
		f.fail(p.node, RuleDiverges, "the integral has no finite value: the integrand grows too fast "+where+", or falls off too slowly",
			"end the range before this point, or take a difference in which the infinite part cancels (variable in its SI unit)")
	case st == undefined:
		f.fail(p.node, RuleNotConverged, "the integrand is not a finite number near "+number(x)+" (SI unit of the variable)",
			"shorten the range, or look for an exponent that is too large")
	default:
		f.fail(p.node, RuleNotConverged, "the integral does not reach its accuracy of 1e-9",
			"split the range where the integrand jumps, oscillates or is singular (it is worst "+where+", in the SI unit of the variable)")
	}
}
