package eval

import "math"

// sampler evaluates an integrand of m components. Component-wise storage: the
// 15 values of component c of a panel are out[15c : 15c+15].
type sampler interface {
	// panel fills out with the values at the Kronrod nodes of the interval of
	// centre c and half-width h. False: a fault stands and all stops.
	panel(f *Frame, c, h float64, out []float64) bool
	// point fills out[0:m] with the values at x.
	point(f *Frame, x float64, out []float64) bool
}

// realSampler is a real integrand without tangents.
type realSampler struct {
	slot int
	fn   func(*Frame) float64
}

func (s *realSampler) panel(f *Frame, c, h float64, out []float64) bool {
	f.slots[s.slot] = Value{}
	for i, t := range kronrodNodes {
		f.slots[s.slot].x = complex(c+h*t, 0)
		y := s.fn(f)
		if !f.ok {
			if !f.forgive() {
				return false
			}
			y = math.NaN()
		}
		out[i] = y
	}
	return true
}

func (s *realSampler) point(f *Frame, x float64, out []float64) bool {
	f.slots[s.slot] = Real(x)
	out[0] = s.fn(f)
	if !f.ok {
		out[0] = math.NaN()
		return f.forgive()
	}
	return true
}

// forgive withdraws a fault that an integrand may have at single points: a
// pole that happens to be hit. The quadrature then splits there.
func (f *Frame) forgive() bool {
	if f.fault.Rule == RuleDivision || f.fault.Rule == RuleDiverges {
		f.forgiven, f.ok = f.fault, true
		return true
	}
	return false
}

// anySampler is an integrand of any shape, with tangents if the frame is dual.
// Components: real parts, imaginary parts where complex, then the same of the
// tangent. The nodes move with uncertain bounds: at x the variable has the
// tangent start + rate·(x - origin), and the interval stretches by rate, which
// is what keeps the derivative exact also where the integrand is singular at a
// bound (Leibniz's rule has infinite terms there).
type anySampler struct {
	slot                int
	fn                  func(*Frame) Value
	parts               int // components of the value: 1, 2, 3, 6, 9, 18
	n                   int // scalars in the value
	dual                bool
	origin, start, rate float64
	row                 []float64
}

func (s *anySampler) panel(f *Frame, c, h float64, out []float64) bool {
	for i, t := range kronrodNodes {
		if !s.point(f, c+h*t, s.row) {
			return false
		}
		for k, y := range s.row {
			out[k*panelSize+i] = y
		}
	}
	return true
}

func (s *anySampler) point(f *Frame, x float64, out []float64) bool {
	v := Real(x)
	if s.dual {
		v.dx = complex(s.start+s.rate*(x-s.origin), 0)
	}
	f.slots[s.slot] = v
	y := s.fn(f)
	if !f.ok {
		out[0] = math.NaN()
		return f.forgive()
	}
	for i := range s.n {
		e := y.at(i)
		out[i] = real(e.x)
		if s.parts > s.n {
			out[s.n+i] = imag(e.x)
		}
		if s.dual {
			out[s.parts+i] = real(e.dx) + s.rate*real(e.x)
			if s.parts > s.n {
				out[s.parts+s.n+i] = imag(e.dx) + s.rate*imag(e.x)
			}
		}
	}
	return true
}

// components is how many components the sampler gives, and how many of them
// belong to the value itself.
func (s *anySampler) components() (m, primal int) {
	if s.dual {
		return 2 * s.parts, s.parts
	}
	return s.parts, s.parts
}

// value puts integrated components together again.
func (s *anySampler) value(t Type, sum []float64) Value {
	part := func(base int) (v []complex128) {
		for i := range s.n {
			c := complex(sum[base+i], 0)
			if s.parts > s.n {
				c = complex(sum[base+i], sum[base+s.n+i])
			}
			v = append(v, c)
		}
		return v
	}
	v := part(0)
	var d []complex128
	if s.dual {
		d = part(s.parts)
	}
	if t.Shape == Scalar {
		r := Value{typ: t, x: v[0]}
		if d != nil {
			r.dx = d[0]
		}
		return r
	}
	return Value{typ: t, many: &body{v: v, d: d}}
}
