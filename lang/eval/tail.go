package eval

import "math"

// A tail is the integral from a point inside the range up to a singular end, or
// out to infinity. It is cut into pieces whose widths form a geometric series
// of ratio 1/2 (or 2). For an integrand c·d^α (d: distance from the end, or
// from the origin of an infinite range) the pieces form a geometric series too,
// of ratio q = 2^-(α+1): that tells a convergent tail (q < 1) from a divergent
// one (q >= 1), and Wynn's epsilon algorithm sums it from a few pieces, also
// with several powers and logarithms (P. Wynn, Math. Tables Aids Comput. 10
// (1956) 91; its use here as in QUADPACK's QAGS). Nothing is evaluated so near
// the end that rounding of the variable would matter.
type tail struct {
	from    float64 // the end, or the origin of an infinite range
	dir     float64 // +1: the tail lies above from
	width   float64 // distance of the outer edge of piece 0 (inner edge if outward)
	outward bool
	pole    bool // known to be singular: the value at the end means nothing
}

// piece is the interval of piece k, ascending.
func (t tail) piece(k int) (a, b float64) {
	d := t.distance(k)
	a, b = t.from+t.dir*d/2, t.from+t.dir*d
	if t.outward {
		a, b = b, t.from+t.dir*2*d
	}
	if a > b {
		a, b = b, a
	}
	return a, b
}

// distance is the far edge of piece k for an end, the near edge outward.
func (t tail) distance(k int) float64 {
	if t.outward {
		return math.Ldexp(t.width, k)
	}
	return math.Ldexp(t.width, -k)
}

const maxPieces = 100

// pieces is how many pieces may be used: near an end other than zero, the
// rounding of x spoils the distance.
func (t tail) pieces() int {
	if t.outward || t.from == 0 {
		return maxPieces
	}
	n := int(math.Log2(t.width / (2e-9 * math.Abs(t.from))))
	return max(0, min(n, maxPieces))
}

// tailState is the storage of one tail.
type tailState struct {
	sum     []float64     // of the pieces so far
	eps     []wynn        // for each component
	size    [2][]float64  // magnitude of each piece, by group
	err     [2]float64    // of the pieces
	abs     [2]float64    // ∫|f| over the pieces
	end     []float64     // the integrand at the end itself
	where   float64       // what stopped the tail
	last    [2][3]float64 // the last estimates' changes
	nothing [2]bool       // every piece so far was zero
}

func (s *tailState) reset(m int) {
	s.sum = grow(s.sum, m)
	clear(s.sum)
	if cap(s.eps) < m {
		s.eps = make([]wynn, m)
	}
	s.eps = s.eps[:m]
	for i := range s.eps {
		s.eps[i].n = 0
	}
	for g := range 2 {
		s.size[g] = s.size[g][:0]
		s.last[g] = [3]float64{math.Inf(1), math.Inf(1), math.Inf(1)}
	}
	s.err, s.abs, s.nothing = [2]float64{}, [2]float64{}, [2]bool{true, true}
}

// tail integrates a tail; the result is in the state returned. Scale is the
// size of the integral that the tail is part of.
func (f *Frame) tail(p *problem, t tail, scale [2]float64) (*tailState, state) {
	w := f.enter(p.m)
	defer f.leave()
	s := &w.tail
	s.reset(p.m)
	known := !t.outward && !t.pole && f.endValue(p, t.from, s, w.row)
	if !f.ok {
		return s, stopped
	}
	var last limits
	for k := range t.pieces() {
		a, b := t.piece(k)
		want := s.goal(p, scale, 0.02)
		st, x := f.adaptive(w, p, a, b, ends{checkLeft: true, checkRight: true, share: 0.01}, want)
		if st != converged {
			s.where = x
			if st == singular && len(s.size[0]) < 3 {
				return s, singular // a singular point of its own, far from this end
			}
			if st == undefined && t.outward && w.overflown(p) {
				return s, diverging
			}
			return s, s.verdict(p, st, known)
		}
		s.add(p, w)
		d := t.distance(k)
		if !t.outward {
			d /= 2
		}
		last = s.observe(p, k, known, d)
		if s.negligible(p, k, scale, known, d) || s.extrapolated(p, last, scale, 0.1) {
			return s, converged
		}
	}
	if s.extrapolated(p, last, scale, 0.5*reserve) {
		return s, converged
	}
	return s, s.verdict(p, unsettled, known)
}

// endValue evaluates the integrand at the end; false if it has no finite value.
func (f *Frame) endValue(p *problem, x float64, s *tailState, row []float64) bool {
	s.end = grow(s.end, p.m)
	if !p.body.point(f, x, row) {
		return false
	}
	for k := range p.m {
		if !isFinite(row[k]) {
			return false
		}
		s.end[k] = row[k]
	}
	return true
}

// goal is a share of the accuracy demanded of the whole.
func (s *tailState) goal(p *problem, scale [2]float64, share float64) (want [2]float64) {
	for k, x := range s.sum {
		g := p.group(k)
		scale[g] = max(scale[g], math.Abs(x))
	}
	if p.onAbs {
		scale = [2]float64{max(scale[0], s.abs[0]), max(scale[1], s.abs[1])}
	}
	scale[1] = max(scale[1], p.stretch*scale[0])
	for g := range 2 {
		want[g] = share * p.rel[g] * scale[g]
	}
	return want
}

// add takes over a piece from the workspace.
func (s *tailState) add(p *problem, w *workspace) {
	var size [2]float64
	for k, x := range w.total[:p.m] {
		g := p.group(k)
		size[g] = max(size[g], math.Abs(x))
		s.sum[k] += x
		s.eps[k].push(s.sum[k])
	}
	for g := range 2 {
		s.size[g] = append(s.size[g], size[g])
		s.nothing[g] = s.nothing[g] && size[g] == 0
		s.err[g] += w.err[g]
		s.abs[g] += w.abs[g]
	}
}

// negligible reports whether the pieces die out so fast that what is left can
// be bounded by the last one.
func (s *tailState) negligible(p *problem, k int, scale [2]float64, known bool, d float64) bool {
	want := s.goal(p, scale, 0.05)
	for c := range s.sum {
		if known && math.Abs(s.end[c])*d > want[p.group(c)] {
			return false
		}
	}
	for g := range p.groups() {
		z := s.size[g]
		switch {
		case s.nothing[g] && (g == 1 || k >= zeroPieces):
		case k >= 2 && z[k] <= want[g] && z[k] <= 0.9*z[k-1] && z[k-1] <= 0.9*z[k-2]:
		default:
			return false
		}
	}
	return true
}

// zeroPieces is after how many vanishing pieces a tail is taken for zero.
const zeroPieces = 60

// limits are the state of the extrapolation after piece k.
type limits struct {
	k      int
	known  bool
	hidden [2]float64 // what the end's own value leaves room for
}

// observe takes over the new estimates; d is the distance still to go.
func (s *tailState) observe(p *problem, k int, known bool, d float64) limits {
	l := limits{k: k, known: known}
	var change [2]float64
	for c := range s.sum {
		g := p.group(c)
		lim, diff := s.eps[c].limit()
		change[g] = max(change[g], diff)
		if known {
			l.hidden[g] = max(l.hidden[g], math.Abs(lim-s.sum[c]-s.end[c]*d))
		}
	}
	for g := range 2 {
		s.last[g] = [3]float64{s.last[g][1], s.last[g][2], change[g]}
	}
	return l
}

// extrapolated reports whether the epsilon algorithm has settled on a limit, to
// a share of the accuracy demanded, for pieces that shrink; it puts the limit
// into sum.
func (s *tailState) extrapolated(p *problem, l limits, scale [2]float64, share float64) bool {
	want := s.goal(p, scale, share)
	for g := range p.groups() {
		c := s.last[g]
		if l.k < 5 || !s.shrinking(g, l.k, want[g]) || !(max(c[0], c[1], c[2], l.hidden[g]) <= want[g]) {
			return false
		}
	}
	for c := range s.sum {
		s.sum[c], _ = s.eps[c].limit()
	}
	for g := range p.groups() {
		s.err[g] += s.last[g][0] + s.last[g][1] + s.last[g][2]
	}
	return true
}

// shrinking reports whether the last pieces form a series that converges
// geometrically, or do not matter.
func (s *tailState) shrinking(g, k int, small float64) bool {
	z := s.size[g]
	for i := k - 3; i <= k; i++ {
		if z[i] > 0.1*small && z[i] >= (1-1e-4)*z[i-1] {
			return false
		}
	}
	return true
}

// overflown reports whether the last panel holds an infinite value, rather than
// none at all.
func (w *workspace) overflown(p *problem) bool {
	for _, y := range w.fx[:p.primal*panelSize] {
		if math.IsInf(y, 0) {
			return true
		}
	}
	return false
}

// verdict tells a divergent tail from one that is only slow: its pieces do not
// shrink, to the end, and the last is as large as any.
func (s *tailState) verdict(p *problem, st state, known bool) state {
	z := s.size[0]
	if st == stopped || st == undefined && len(z) < 10 {
		return st
	}
	if known || len(z) < 12 {
		return unsettled
	}
	peak := 0.0
	for _, x := range z {
		peak = max(peak, x)
	}
	for i := len(z) - 10; i < len(z); i++ {
		if z[i] == 0 || z[i] < (1-1e-4)*z[i-1] || z[i] < 0.9*peak && i == len(z)-1 {
			return unsettled
		}
	}
	return diverging
}
