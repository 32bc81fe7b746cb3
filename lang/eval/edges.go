package eval

import "math"

// A panel sees nothing of the outermost 0.4 % of its interval. A jump there, or
// a layer (a skin of current at the end of the range), would go unnoticed: both
// rules agree on what they see. So each panel also predicts the values at its
// ends, from the polynomial through its nodes, and where two panels meet, or at
// an end of the range, these are compared: with the neighbour's prediction, or
// with the integrand itself. A difference adds to the error, for the width that
// is out of sight. Panels that have not resolved the integrand have no say;
// they are halved anyway.

// meet compares two neighbours; either may be -1, beyond the range.
func (w *workspace) meet(p *problem, i, j int) {
	if i >= 0 {
		w.judge(p, i, 1)
	}
	if j >= 0 {
		w.judge(p, j, 0)
	}
}

// judge sets what one end (0 left, 1 right) of interval i adds to its error.
func (w *workspace) judge(p *problem, i, side int) {
	v := &w.iv[i]
	own, other, at, beyond := w.left, w.right, i*p.m, v.prev
	if side == 1 {
		own, other, beyond = w.right, w.left, v.next
	}
	to := beyond * p.m
	if beyond < 0 {
		other, to = w.ends, side*p.m
	}
	d := (1 - kronrodNodes[panelSize-1]) * (v.b - v.a) / 2
	var gap [2]float64
	for k := range p.m {
		g := p.group(k)
		if !v.resolved(g) || beyond >= 0 && !w.iv[beyond].closed && !w.iv[beyond].resolved(g) {
			continue
		}
		if off := d * math.Abs(own[at+k]-other[to+k]); off > 1e-10*v.abs[g] { // false for NaN
			gap[g] = max(gap[g], off)
		}
	}
	w.setGap(p, i, side, gap)
}

// setGap changes what an end adds to the error, and the interval's place.
func (w *workspace) setGap(p *problem, i, side int, gap [2]float64) {
	v := &w.iv[i]
	if v.gap[side] == gap {
		return
	}
	if !v.counted {
		v.gap[side] = gap
		return
	}
	w.account(p, i, -1)
	v.gap[side] = gap
	w.account(p, i, 1)
	if v.heapAt >= 0 {
		w.move(p, i)
	}
}
