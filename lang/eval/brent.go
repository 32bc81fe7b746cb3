package eval

import "math"

// brent is one refinement of a change of sign by R. P. Brent's method
// (Algorithms for Minimization without Derivatives, 1973, ch. 4): b is the best
// estimate, c lies on the other side of the root, a is the estimate before.
type brent struct {
	a, b, c    float64
	fa, fb, fc float64
	d, e       float64 // the last step and the one before
}

// bracket refines the change of sign between a and b. A pole changes sign too,
// but there the difference grows: it is no root.
func (h *hunt) bracket(a, b, fa, fb float64) (float64, bool) {
	edge := max(math.Abs(fa), math.Abs(fb))
	z := brent{a: a, b: b, c: a, fa: fa, fb: fb, fc: fa, d: b - a, e: b - a}
	for range 200 {
		z.order()
		tol, m := 2*epsilon*math.Abs(z.b), (z.c-z.b)/2
		if math.Abs(m) <= tol || z.fb == 0 {
			break
		}
		z.step(tol, m)
		if z.fb = h.at(z.b); math.IsNaN(z.fb) {
			return 0, false
		}
	}
	return z.b, math.Abs(z.fb) <= edge
}

// order restores what the names stand for after a step.
func (z *brent) order() {
	if (z.fb > 0) == (z.fc > 0) {
		z.c, z.fc = z.a, z.fa
		z.d = z.b - z.a
		z.e = z.d
	}
	if math.Abs(z.fc) < math.Abs(z.fb) {
		z.a, z.b, z.c = z.b, z.c, z.b
		z.fa, z.fb, z.fc = z.fb, z.fc, z.fb
	}
}

// step moves b by interpolation where that is trusted, else to the middle, and
// by tol at least.
func (z *brent) step(tol, m float64) {
	before, last := z.e, z.d
	z.d, z.e = m, m
	if math.Abs(before) >= tol && math.Abs(z.fa) > math.Abs(z.fb) {
		z.interpolate(before, last, tol, m)
	}
	z.a, z.fa = z.b, z.fb
	if math.Abs(z.d) > tol {
		z.b += z.d
	} else {
		z.b += math.Copysign(tol, m)
	}
}

// interpolate takes the secant, or the inverse parabola through three points,
// if its step p/q stays inside and shrinks fast enough.
func (z *brent) interpolate(before, last, tol, m float64) {
	s := z.fb / z.fa
	p, q := 2*m*s, 1-s
	if z.a != z.c {
		u, r := z.fa/z.fc, z.fb/z.fc
		p = s * (2*m*u*(u-r) - (z.b-z.a)*(r-1))
		q = (u - 1) * (r - 1) * (s - 1)
	}
	if p > 0 {
		q = -q
	} else {
		p = -p
	}
	if 2*p < min(3*m*q-math.Abs(tol*q), math.Abs(before*q)) {
		z.d, z.e = p/q, last
	}
}
