package eval

// The pieces of an adaptive integral form a heap by urgency. Totals are kept
// up to date as pieces come and go.

// urgency is the error of a piece over what is demanded of the whole, the larger
// of value and tangent.
func (w *workspace) urgency(p *problem, i int) (k float64) {
	for g := range 2 {
		if e := w.iv[i].total(g); e > 0 {
			k = max(k, e/max(w.demand(p, g), e*1e-30))
		}
	}
	return k
}

// insert adds interval i to the totals and to the heap.
func (w *workspace) insert(p *problem, i int) {
	w.account(p, i, 1)
	w.iv[i].key, w.iv[i].heapAt = w.urgency(p, i), len(w.heap)
	w.heap = append(w.heap, i)
	w.up(len(w.heap) - 1)
}

// account adds interval i to the totals (sign 1) or takes it out (-1).
func (w *workspace) account(p *problem, i int, sign float64) {
	v := &w.iv[i]
	v.counted = sign > 0
	for k := range p.m {
		w.total[k] += sign * w.sums[i*p.m+k]
	}
	for g := range 2 {
		w.err[g] = max(0, w.err[g]+sign*v.total(g))
		w.abs[g] = max(0, w.abs[g]+sign*v.abs[g])
	}
}

// pop takes the most urgent interval off the heap.
func (w *workspace) pop() int {
	top, last := w.heap[0], len(w.heap)-1
	w.place(0, w.heap[last])
	w.heap = w.heap[:last]
	w.iv[top].heapAt = -1
	if last > 0 {
		w.down(0)
	}
	return top
}

// move restores the place of an interval whose error has changed.
func (w *workspace) move(p *problem, i int) {
	w.iv[i].key = w.urgency(p, i)
	w.up(w.iv[i].heapAt)
	w.down(w.iv[i].heapAt)
}

func (w *workspace) place(at, i int) {
	w.heap[at] = i
	w.iv[i].heapAt = at
}

func (w *workspace) swap(a, b int) {
	i, j := w.heap[a], w.heap[b]
	w.place(a, j)
	w.place(b, i)
}

func (w *workspace) keyAt(at int) float64 { return w.iv[w.heap[at]].key }

func (w *workspace) up(c int) {
	for c > 0 {
		up := (c - 1) / 2
		if w.keyAt(up) >= w.keyAt(c) {
			return
		}
		w.swap(up, c)
		c = up
	}
}

func (w *workspace) down(c int) {
	for {
		kid := 2*c + 1
		if kid >= len(w.heap) {
			return
		}
		if kid+1 < len(w.heap) && w.keyAt(kid+1) > w.keyAt(kid) {
			kid++
		}
		if w.keyAt(c) >= w.keyAt(kid) {
			return
		}
		w.swap(c, kid)
		c = kid
	}
}
