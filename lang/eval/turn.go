package eval

import "math"

// turns are the numbers of points with which an integral over a full turn is
// taken by the trapezium rule, which for a periodic smooth integrand converges
// faster than any power (DLMF 3.5(i)). Two successive ones must agree. They are
// odd and share no factor, so that no harmonic of a machine with many poles is
// mistaken for a constant by both.
var turns = [...]int{11, 17, 29, 53, 101}

// turn is the integral of body as the slot makes a full turn, 0 to 2π.
func turn(node, slot int, body Code) Code {
	g, err := Integral(node, slot, Num(0), Num(2*math.Pi), body)
	if err != nil {
		return body // a list: refused before
	}
	for _, b := range body.breaks {
		if b.slot == slot {
			return g
		}
	}
	t := &revolution{node: node, slot: slot, body: body, other: g}
	c := Code{Type: body.Type, Any: t.any}
	if body.Real != nil {
		c.Real = t.fast
	}
	c = build(c, g)
	return c.derive(func(d *differ) (Code, error) {
		return d.linear(body, func(x Code) (Code, error) {
			if !x.Reads(slot) {
				return Mul(node, Num(2*math.Pi), x)
			}
			return turn(node, slot, x), nil
		})
	})
}

// revolution is the compiled form; other is the adaptive integral, taken where
// the integrand turns out not to be smooth.
type revolution struct {
	node, slot  int
	body, other Code
}

// phase0 keeps the points off the axes, where an integrand is singular if
// anywhere.
const phase0 = 0.1

func (t *revolution) fast(f *Frame) float64 {
	saved := f.slots[t.slot]
	f.depth++
	v, ok := t.trapezium(f)
	f.depth--
	f.slots[t.slot] = saved
	if ok || !f.ok {
		return v
	}
	return t.other.Real(f)
}

func (t *revolution) trapezium(f *Frame) (float64, bool) {
	rel := accuracy[min(f.depth-1, 2)]
	last := math.NaN()
	f.slots[t.slot] = Value{}
	for _, n := range turns {
		if !f.spend(t.node, int64(n)*t.body.cost) {
			return 0, false
		}
		step := 2 * math.Pi / float64(n)
		var sum, abs float64
		for i := range n {
			f.slots[t.slot].x = complex(phase0+step*float64(i), 0)
			y := t.body.Real(f)
			sum += y
			abs += math.Abs(y)
		}
		if !f.ok {
			f.forgive()
			return 0, false
		}
		sum, abs = sum*step, abs*step
		size := math.Abs(sum)
		if f.depth > 1 {
			size = abs
		}
		if math.Abs(sum-last) <= max(0.1*rel*size, 1e-14*abs) {
			if math.Abs(sum) <= roundoff*abs {
				sum = 0
			}
			return sum, true
		}
		last = sum
	}
	return 0, false
}

// any takes the sum for values of any type: the same rule by components, of
// tangents too.
func (t *revolution) any(f *Frame) Value {
	saved := f.slots[t.slot]
	f.depth++
	v, ok := t.trapeziumAny(f)
	f.depth--
	f.slots[t.slot] = saved
	if ok || !f.ok {
		return v
	}
	return t.other.Any(f)
}

func (t *revolution) trapeziumAny(f *Frame) (Value, bool) {
	typ := t.body.Type
	s := &anySampler{slot: t.slot, fn: t.body.Any, n: zero(typ).Len(), dual: f.dual}
	s.parts = s.n
	if typ.Complex {
		s.parts *= 2
	}
	m, primal := s.components()
	rel := accuracy[min(f.depth-1, 2)]
	row, sum, last := make([]float64, m), make([]float64, m), make([]float64, m)
	abs := make([]float64, m)
	for round, n := range turns {
		clear(sum)
		clear(abs)
		step := 2 * math.Pi / float64(n)
		for i := range n {
			if !f.spend(t.node, t.body.cost) || !s.point(f, phase0+step*float64(i), row) {
				return zero(typ), false
			}
			for k, y := range row {
				sum[k] += y * step
				abs[k] += math.Abs(y) * step
			}
		}
		if round > 0 && agree(sum, last, abs, primal, rel) {
			for k := range sum {
				if math.Abs(sum[k]) <= roundoff*abs[k] {
					sum[k] = 0
				}
			}
			return s.value(typ, sum), true
		}
		copy(last, sum)
	}
	return zero(typ), false
}

// agree compares two estimates, values and tangents each by their largest
// component of ∫|f|.
func agree(a, b, abs []float64, primal int, rel float64) bool {
	var size, off [2]float64
	for k := range a {
		g := 0
		if k >= primal {
			g = 1
		}
		size[g] = max(size[g], abs[k])
		d := math.Abs(a[k] - b[k])
		if math.IsNaN(d) {
			return false
		}
		off[g] = max(off[g], d)
	}
	return off[0] <= 0.1*rel*size[0] && off[1] <= 0.1*rel*size[1]
}
