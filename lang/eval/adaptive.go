package eval

import "math"

// maxIntervals bounds the pieces of one adaptive run: 90,000 evaluations.
const maxIntervals = 6000

// tailDepth is the number of halvings at an end of the range after which that
// end is taken for singular and extrapolated.
const tailDepth = 10

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
	w.iv, w.heap, w.sums, w.left, w.right = w.iv[:0], w.heap[:0], w.sums[:0], w.left[:0], w.right[:0]
	w.err, w.abs = [2]float64{}, [2]float64{}
	clear(w.total)
	w.share = e.share
	if st, point = f.first(w, p, a, b, e); st != converged {
		return st, point
	}
	stuck := 0
	for !w.settled(p, want, 1) {
		if len(w.heap) == 0 || len(w.iv) >= maxIntervals {
			return w.giveUp(p, want)
		}
		i := w.pop()
		if e.tails && w.atEnd(i) {
			if st, point = f.replaceByTail(w, p, i); st == stopped || st == diverging {
				return st, point
			}
			if st == converged {
				continue
			}
			e.tails = false // no tail after all: halve on
		}
		if w.iv[i].narrow() {
			continue // its error stays in the sum
		}
		before := w.iv[i].err[0]
		if st, point = f.halve(w, p, i); st != converged {
			return st, point
		}
		if stuck = w.stuck(i, stuck, before); stuck > maxStuck && p.onAbs {
			return w.giveUp(p, want)
		}
	}
	w.resum(p)
	return converged, 0
}

// atEnd reports whether a piece lies at one end of the range and has been
// halved often enough for that end to be taken for singular.
func (w *workspace) atEnd(i int) bool {
	v := &w.iv[i]
	return v.depth >= tailDepth && (v.prev < 0) != (v.next < 0)
}

// narrow reports whether halving would not separate the nodes.
func (v *interval) narrow() bool {
	mid := v.a + (v.b-v.a)/2
	return v.b-v.a < 64*epsilon*max(math.Abs(v.a), math.Abs(v.b)) || !(v.a < mid && mid < v.b)
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

// first evaluates the whole range as the first interval.
func (f *Frame) first(w *workspace, p *problem, a, b float64, e ends) (state, float64) {
	w.add(p, interval{a: a, b: b, prev: -1, next: -1, heapAt: -1})
	if st, x := f.measure(w, p, 0); st != converged {
		return st, x
	}
	f.valueAt(w, p, a, e.checkLeft, w.ends[:p.m])
	f.valueAt(w, p, b, e.checkRight, w.ends[p.m:2*p.m])
	if !f.ok {
		return stopped, 0
	}
	w.judge(p, 0, 0)
	w.judge(p, 0, 1)
	w.insert(p, 0)
	return converged, 0
}

// add makes room for an interval.
func (w *workspace) add(p *problem, v interval) {
	w.iv = append(w.iv, v)
	for range p.m {
		w.sums = append(w.sums, 0)
		w.left = append(w.left, 0)
		w.right = append(w.right, 0)
	}
}

// halve replaces interval i, which is off the heap, by its halves: the left one
// in its place, the right one last.
func (f *Frame) halve(w *workspace, p *problem, i int) (state, float64) {
	w.account(p, i, -1)
	v := w.iv[i]
	mid, n := v.a+(v.b-v.a)/2, len(w.iv)
	w.add(p, interval{a: mid, b: v.b, depth: v.depth + 1, prev: i, next: v.next, heapAt: -1})
	w.iv[i] = interval{a: v.a, b: mid, depth: v.depth + 1, prev: v.prev, next: n, heapAt: -1}
	if v.next >= 0 {
		w.iv[v.next].prev = n
	}
	if st, x := f.measure(w, p, i); st != converged {
		return st, x
	}
	if st, x := f.measure(w, p, n); st != converged {
		return st, x
	}
	w.meet(p, v.prev, i)
	w.meet(p, i, n)
	w.meet(p, n, v.next)
	w.insert(p, i)
	w.insert(p, n)
	return converged, 0
}

// valueAt is the integrand at an end of the range, NaN where it has no finite
// value or is not asked for.
func (f *Frame) valueAt(w *workspace, p *problem, x float64, ask bool, out []float64) {
	good := ask && p.body.point(f, x, w.row)
	for k := range out {
		out[k] = math.NaN()
		if good && isFinite(w.row[k]) {
			out[k] = w.row[k]
		}
	}
}

// measure applies the rule to interval i.
func (f *Frame) measure(w *workspace, p *problem, i int) (state, float64) {
	if !f.spend(p.node, panelSize*p.cost) {
		return stopped, 0
	}
	v := &w.iv[i]
	c, h := v.a+(v.b-v.a)/2, (v.b-v.a)/2
	if !p.body.panel(f, c, h, w.fx[:p.m*panelSize]) {
		return stopped, 0
	}
	bad := false
	for k := range p.m {
		fx := w.fx[k*panelSize : (k+1)*panelSize]
		s, err, abs := panelSum(h, fx)
		bad = bad || !isFinite(s)
		g, at := p.group(k), i*p.m+k
		w.sums[at] = s
		v.err[g], v.abs[g] = max(v.err[g], err), max(v.abs[g], abs)
		w.left[at], w.right[at] = edgeValues(fx)
	}
	if bad {
		return w.bad(p, c, h)
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

// settled reports whether the sum of the errors is within the demand, times
// slack.
func (w *workspace) settled(p *problem, want [2]float64, slack float64) bool {
	for g := range 2 {
		if w.err[g] > slack*max(want[g], w.demand(p, g)) {
			return false
		}
	}
	return true
}

// demand is the accuracy demanded of a group: relative to its integral (or to
// the integral of the magnitude), but not beyond the noise of that.
func (w *workspace) demand(p *problem, g int) float64 {
	size := w.size(p, g)
	if g == 1 && p.stretch != 0 {
		size = max(size, p.stretch*w.size(p, 0))
	}
	if w.share != 0 {
		size *= w.share
	}
	return max(p.rel[g]*size, p.floor*w.abs[g])
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
func (w *workspace) giveUp(p *problem, want [2]float64) (state, float64) {
	worst, at := 0.0, -1
	for i := range w.iv {
		if k := w.urgency(p, i); w.iv[i].depth >= 40 && k > worst {
			worst, at = k, i
		}
	}
	w.resum(p)
	switch {
	case w.settled(p, want, reserve): // the promise is kept without the reserve
		return converged, 0
	case at < 0:
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
	w.err, w.abs = [2]float64{}, [2]float64{}
	for k := range p.m {
		var sum, lost float64
		for i := range w.iv {
			sum, lost = compensated(sum, lost, w.sums[i*p.m+k])
		}
		w.total[k] = sum + lost
	}
	for i := range w.iv {
		for g := range 2 {
			w.err[g] += w.iv[i].total(g)
			w.abs[g] += w.iv[i].abs[g]
		}
	}
}
