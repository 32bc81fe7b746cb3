package eval

import "math"

// wynn runs the epsilon algorithm on partial sums. It keeps the latest ascending
// diagonal of the table; the even columns hold estimates of the limit.
type wynn struct {
	n    int
	e    [wynnDepth]float64
	best [3]float64 // the latest estimates, oldest first
}

// wynnDepth bounds the diagonal: rounding grows with every column.
const wynnDepth = 16

// push adds a partial sum: new[j+1] = old[j-1] + 1/(new[j] - old[j]). The
// estimate is the even column that moved least.
func (w *wynn) push(sum float64) {
	prev, cur := 0.0, sum
	est, least := sum, math.Inf(1)
	n := min(w.n, wynnDepth-1)
	for j := range n {
		old := w.e[j]
		w.e[j] = cur
		diff := cur - old
		if j%2 == 0 && math.Abs(diff) < least {
			est, least = cur, math.Abs(diff)
		}
		if diff == 0 || !isFinite(diff) {
			n = j
			break
		}
		prev, cur = old, prev+1/diff
	}
	w.e[n] = cur
	w.n = n + 1
	w.best = [3]float64{w.best[1], w.best[2], est}
}

// limit is the latest estimate and how far it lies from the two before it.
func (w *wynn) limit() (lim, change float64) {
	lim = w.best[2]
	change = max(math.Abs(lim-w.best[1]), math.Abs(lim-w.best[0]))
	if math.IsNaN(change) {
		change = math.Inf(1)
	}
	return lim, change
}
