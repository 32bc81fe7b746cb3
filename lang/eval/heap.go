package eval

// The pieces of an adaptive integral form a heap by urgency. Totals are kept
// up to date as pieces come and go.

// urgency is the error of a piece over the size of the whole, the larger of
// value and tangent.
func (w *workspace) urgency(p *problem, v interval) (k float64) {
	for g := range 2 {
		if v.err[g] > 0 {
			k = max(k, v.err[g]/max(w.demand(p, g), v.err[g]*1e-30))
		}
	}
	return k
}

// insert adds interval i to the totals and to the heap.
func (w *workspace) insert(p *problem, i int) {
	v := &w.iv[i]
	w.account(p, v, 1)
	v.key = w.urgency(p, *v)
	w.heap = append(w.heap, i)
	for c := len(w.heap) - 1; c > 0; {
		up := (c - 1) / 2
		if w.iv[w.heap[up]].key >= w.iv[w.heap[c]].key {
			return
		}
		w.heap[up], w.heap[c] = w.heap[c], w.heap[up]
		c = up
	}
}

// remove takes interval i out of the totals.
func (w *workspace) remove(p *problem, i int) { w.account(p, &w.iv[i], -1) }

func (w *workspace) account(p *problem, v *interval, sign float64) {
	for k := range p.m {
		w.total[k] += sign * w.sums[v.at+k]
	}
	for g := range 2 {
		w.err[g] = max(0, w.err[g]+sign*v.err[g])
		w.abs[g] = max(0, w.abs[g]+sign*v.abs[g])
	}
}

// pop takes the most urgent interval off the heap.
func (w *workspace) pop() int {
	top, last := w.heap[0], len(w.heap)-1
	w.heap[0] = w.heap[last]
	w.heap = w.heap[:last]
	for c := 0; ; {
		kid := 2*c + 1
		if kid >= last {
			return top
		}
		if kid+1 < last && w.iv[w.heap[kid+1]].key > w.iv[w.heap[kid]].key {
			kid++
		}
		if w.iv[w.heap[c]].key >= w.iv[w.heap[kid]].key {
			return top
		}
		w.heap[c], w.heap[kid] = w.heap[kid], w.heap[c]
		c = kid
	}
}
