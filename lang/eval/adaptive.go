package eval

import "math"

// problem is an integrand with what is demanded of its integral.
type problem struct {
	node   int
	m      int // components
	primal int // of which belong to the value; the rest are tangents
	body   sampler
	cost   int64
	rel    [2]float64 // relative accuracy of the value and of the tangent
	onAbs  bool       // relative to ∫|f|: for the inner of nested integrals
	// stretch is the rate at which the range grows along the tangents: times
	// the integral it is the size that the tangent cancels from.
	stretch float64
}

// group is 0 for a component of the value, 1 for one of the tangent. Each group
// is judged by its largest component.
func (p *problem) group(c int) int {
	if c < p.primal {
		return 0
	}
	return 1
}

// groups is 2 where there are tangents, else 1.
func (p *problem) groups() int {
	if p.primal < p.m {
		return 2
	}
	return 1
}

// interval is a piece of the range with its estimates.
type interval struct {
	a, b     float64
	err, abs [2]float64
	key      float64 // place in the heap: error over demanded accuracy
	at       int     // first of its m integrals in workspace.sums
	depth    int
	left     bool // a is the left end of the segment
	right    bool
}

// workspace is the storage of one level of nesting, kept by the frame.
type workspace struct {
	iv    []interval
	heap  []int
	sums  []float64
	fx    []float64
	total []float64
	row   []float64
	marks []mark
	err   [2]float64
	abs   [2]float64
	share float64
	segs  []segment
	acc   []float64
	tail  tailState
}

// state is how a piece of work ended.
type state uint8

const (
	converged state = iota
	unsettled       // not accurate enough, nothing left to split
	diverging
	singular  // at a point inside: split there
	undefined // without a finite value at several points
	stopped   // a fault stands
)

// maxIntervals bounds the pieces of one adaptive run: 90,000 evaluations.
const maxIntervals = 6000

// tailDepth is the number of halvings at an end of the range after which that
// end is taken for singular and extrapolated.
const tailDepth = 10

// enter gives the workspace of the next level of nesting.
func (f *Frame) enter(m int) *workspace {
	if f.level == len(f.work) {
		f.work = append(f.work, &workspace{})
	}
	w := f.work[f.level]
	f.level++
	w.row = grow(w.row, m)
	w.fx = grow(w.fx, m*panelSize)
	w.total = grow(w.total, m)
	w.acc = grow(w.acc, m)
	return w
}

func (f *Frame) leave() { f.level-- }

func grow(s []float64, n int) []float64 {
	if cap(s) < n {
		return make([]float64, n)
	}
	return s[:n]
}

// ends tells how the ends of a segment are to be treated.
type ends struct {
	checkLeft, checkRight bool    // compare the panel with the value at the end
	tails                 bool    // extrapolate ends that stay the worst piece
	share                 float64 // of the demanded relative accuracy; 0 is the whole
}

// adaptive integrates over [a, b] into w.total, bisecting the worst piece. Want
// is the absolute error that is good enough besides p.rel, for each group. The
// point is where the integrand is singular, if that is the outcome.
func (f *Frame) adaptive(w *workspace, p *problem, a, b float64, e ends, want [2]float64) (st state, point float64) {
	w.iv, w.heap, w.sums = w.iv[:0], w.heap[:0], w.sums[:0]
	w.err, w.abs = [2]float64{}, [2]float64{}
	clear(w.total)
	w.share = e.share
	if st, point = f.examine(w, p, interval{a: a, b: b, left: true, right: true}, e); st != converged {
		return st, point
	}
	stuck := 0
	for !w.settled(p, want) {
		if len(w.heap) == 0 || len(w.iv) >= maxIntervals {
			return w.giveUp(p)
		}
		i := w.pop()
		v := w.iv[i]
		if e.tails && v.depth >= tailDepth && (v.left || v.right) && !(v.left && v.right) {
			if st, point = f.replaceByTail(w, p, i); st == stopped || st == diverging {
				return st, point
			}
			if st == converged {
				continue
			}
			e.tails = false // no tail after all: halve on
		}
		mid := v.a + (v.b-v.a)/2
		if v.b-v.a < 64*epsilon*max(math.Abs(v.a), math.Abs(v.b)) || !(v.a < mid && mid < v.b) {
			continue // frozen: its error stays in the sum
		}
		before := v.err[0]
		w.remove(p, i)
		l := interval{a: v.a, b: mid, depth: v.depth + 1, left: v.left, at: v.at}
		r := interval{a: mid, b: v.b, depth: v.depth + 1, right: v.right, at: -1}
		if st, point = f.halves(w, p, i, l, r, e); st != converged {
			return st, point
		}
		if stuck = w.stuck(i, stuck, before); stuck > maxStuck && p.onAbs {
			return w.giveUp(p)
		}
	}
	w.resum(p)
	return converged, 0
}

// maxStuck is how many more halvings may fail than help in an inner integral:
// it is noise then, and would be paid for at every point of the outer one.
const maxStuck = 200

// stuck counts halvings that did not lessen the error, less those that did.
func (w *workspace) stuck(left, count int, before float64) int {
	if w.iv[left].err[0]+w.iv[len(w.iv)-1].err[0] >= 0.99*before {
		return count + 1
	}
	return max(0, count-1)
}

// halves evaluates both halves of interval i, the left one in its place.
func (f *Frame) halves(w *workspace, p *problem, i int, l, r interval, e ends) (state, float64) {
	if st, x := f.measure(w, p, &l, e); st != converged {
		return st, x
	}
	w.iv[i] = l
	w.insert(p, i)
	return f.examine(w, p, r, e)
}

// examine evaluates a new interval and adds it.
func (f *Frame) examine(w *workspace, p *problem, v interval, e ends) (state, float64) {
	v.at = len(w.sums)
	for range p.m {
		w.sums = append(w.sums, 0)
	}
	if st, x := f.measure(w, p, &v, e); st != converged {
		return st, x
	}
	w.iv = append(w.iv, v)
	w.insert(p, len(w.iv)-1)
	return converged, 0
}

// measure applies the rule to an interval.
func (f *Frame) measure(w *workspace, p *problem, v *interval, e ends) (state, float64) {
	if !f.spend(p.node, panelSize*p.cost) {
		return stopped, 0
	}
	c, h := v.a+(v.b-v.a)/2, (v.b-v.a)/2
	if !p.body.panel(f, c, h, w.fx[:p.m*panelSize]) {
		return stopped, 0
	}
	v.err, v.abs = [2]float64{}, [2]float64{}
	bad := false
	for k := range p.m {
		s, err, abs := panelSum(h, w.fx[k*panelSize:(k+1)*panelSize])
		bad = bad || !isFinite(s)
		g := p.group(k)
		w.sums[v.at+k] = s
		v.err[g], v.abs[g] = max(v.err[g], err), max(v.abs[g], abs)
	}
	if bad {
		return w.bad(p, c, h)
	}
	if v.left && e.checkLeft {
		f.checkEdge(w, p, v, false)
	}
	if v.right && e.checkRight {
		f.checkEdge(w, p, v, true)
	}
	if !f.ok {
		return stopped, 0
	}
	return converged, 0
}

// bad finds the single node at which the integrand has no finite value. Where
// there are several the integrand is not finite on a stretch.
func (w *workspace) bad(p *problem, c, h float64) (state, float64) {
	at, n := 0, 0
	for i := range kronrodNodes {
		good := true
		for k := range p.m {
			good = good && isFinite(w.fx[k*panelSize+i])
		}
		if !good {
			at, n = i, n+1
		}
	}
	if n == 1 {
		return singular, c + h*kronrodNodes[at]
	}
	return undefined, c + h*kronrodNodes[at]
}

// checkEdge adds to the error what hides at the end of the range: the
// difference between the value there and the panel's prediction, times the
// distance to the first node. An end without a finite value tells nothing.
func (f *Frame) checkEdge(w *workspace, p *problem, v *interval, right bool) {
	x, d := v.a, (1-kronrodNodes[panelSize-1])*(v.b-v.a)/2
	if right {
		x = v.b
	}
	if !p.body.point(f, x, w.row) {
		return
	}
	for k := range p.m {
		y := w.row[k]
		if !isFinite(y) {
			return
		}
		off := d * math.Abs(y-edgeValue(w.fx[k*panelSize:(k+1)*panelSize], right))
		if off > 1e-10*v.abs[p.group(k)] {
			v.err[p.group(k)] += off
		}
	}
}

// settled reports whether the sum of the errors is within the demand.
func (w *workspace) settled(p *problem, want [2]float64) bool {
	for g := range 2 {
		if w.err[g] > max(want[g], w.demand(p, g)) {
			return false
		}
	}
	return true
}

// demand is the accuracy demanded of a group: relative to its integral (or to
// the integral of the magnitude), but not beyond what rounding leaves of that.
func (w *workspace) demand(p *problem, g int) float64 {
	size := w.size(p, g)
	if g == 1 && p.stretch != 0 {
		size = max(size, p.stretch*w.size(p, 0))
	}
	if w.share != 0 {
		size *= w.share
	}
	return max(p.rel[g]*size, roundoff*w.abs[g])
}

// size is what the accuracy of a group is relative to.
func (w *workspace) size(p *problem, g int) (size float64) {
	if p.onAbs {
		return w.abs[g]
	}
	for k, s := range w.total[:p.m] {
		if p.group(k) == g {
			size = max(size, math.Abs(s))
		}
	}
	return size
}

// giveUp tells how an integral failed: by a piece that cannot be halved any
// more, which is where the integrand is singular, or by sheer number.
func (w *workspace) giveUp(p *problem) (state, float64) {
	worst, at := 0.0, -1
	for i, v := range w.iv {
		if k := w.urgency(p, v); v.depth >= 40 && k > worst {
			worst, at = k, i
		}
	}
	w.resum(p)
	if at < 0 {
		return unsettled, 0
	}
	v := w.iv[at]
	return singular, v.a + (v.b-v.a)/2
}

// resum forms total and errors afresh, which incremental updates have rounded.
func (w *workspace) resum(p *problem) {
	if len(w.iv) == 1 {
		return
	}
	clear(w.total)
	w.err, w.abs = [2]float64{}, [2]float64{}
	for k := range p.m {
		var sum, lost float64
		for i := range w.iv {
			sum, lost = compensated(sum, lost, w.sums[w.iv[i].at+k])
		}
		w.total[k] = sum + lost
	}
	for i := range w.iv {
		for g := range 2 {
			w.err[g] += w.iv[i].err[g]
			w.abs[g] += w.iv[i].abs[g]
		}
	}
}
