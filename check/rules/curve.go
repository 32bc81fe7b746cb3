package rules

import (
	"cmp"
	"math"
	"slices"

	"inkjoule/lang"
	"inkjoule/lang/eval"
)

// This file reads characteristics out of tables: y over x, with straight lines
// between the rows. That is coarser than the interpolation of the language and
// serves verdicts and orders of size, never a value of the note.

// curve is a characteristic with x ascending.
type curve struct{ x, y []float64 }

// curveOf reads two columns of a table; ok is false where one is unknown, or
// where the rows are fewer than two or do not make y a function of x.
func curveOf(n *lang.Note, table, x, y string) (k curve, ok bool) {
	xs, okX := columnOf(n, table+"."+x)
	ys, okY := columnOf(n, table+"."+y)
	if !okX || !okY || len(xs) != len(ys) || len(xs) < 2 {
		return k, false
	}
	order := make([]int, len(xs))
	for i := range order {
		order[i] = i
	}
	slices.SortStableFunc(order, func(a, b int) int { return cmp.Compare(xs[a], xs[b]) })
	for i, j := range order {
		if i > 0 && xs[j] == k.x[i-1] {
			return k, false
		}
		k.x, k.y = append(k.x, xs[j]), append(k.y, ys[j])
	}
	return k, true
}

// columnOf gives the numbers of a column, in SI units.
func columnOf(n *lang.Note, key string) ([]float64, bool) {
	s := n.Lookup(key)
	if s == nil || !s.Result.Known || s.Facts.Shape != eval.List || s.Facts.Complex {
		return nil, false
	}
	out := make([]float64, s.Value.Len())
	for i := range out {
		out[i] = s.Value.At(i).Re()
	}
	return out, true
}

// reaches reports whether the rows span a to b.
func (k curve) reaches(a, b float64) bool {
	slack := 1e-9 * (math.Abs(a) + math.Abs(b))
	return k.x[0] <= a+slack && b <= k.x[len(k.x)-1]+slack
}

// at reads y at x.
func (k curve) at(x float64) float64 {
	i, found := slices.BinarySearch(k.x, x)
	switch {
	case found:
		return k.y[i]
	case i == 0:
		return k.y[0]
	case i == len(k.x):
		return k.y[i-1]
	}
	t := (x - k.x[i-1]) / (k.x[i] - k.x[i-1])
	return k.y[i-1] + t*(k.y[i]-k.y[i-1])
}

// pieces calls f with each straight piece between a and b.
func (k curve) pieces(a, b float64, f func(x0, x1, y0, y1 float64)) {
	x0 := a
	for i := 0; i <= len(k.x) && x0 < b; i++ {
		x1 := b
		if i < len(k.x) {
			x1 = math.Min(k.x[i], b)
		}
		if x1 > x0 {
			f(x0, x1, k.at(x0), k.at(x1))
			x0 = x1
		}
	}
}

// moment is ∫ x·y dx from a to b; exact for straight pieces by Simpson's rule.
func (k curve) moment(a, b float64) float64 {
	sum := 0.0
	k.pieces(a, b, func(x0, x1, y0, y1 float64) {
		sum += (x1 - x0) / 6 * (x0*y0 + (x0+x1)*(y0+y1) + x1*y1)
	})
	return sum
}

// area is ∫ y dx from a to b.
func (k curve) area(a, b float64) float64 {
	sum := 0.0
	k.pieces(a, b, func(x0, x1, y0, y1 float64) { sum += (x1 - x0) * (y0 + y1) / 2 })
	return sum
}

// proportional reports y = k·x within the tolerance of the largest y, up to x.
func (k curve) proportional(x, tolerance float64) bool {
	if x == 0 || k.at(x) == 0 {
		return false
	}
	slope := k.at(x) / x
	limit := tolerance * math.Abs(k.at(x))
	for i, xi := range k.x {
		if xi <= x && math.Abs(k.y[i]-slope*xi) > limit {
			return false
		}
	}
	return true
}
