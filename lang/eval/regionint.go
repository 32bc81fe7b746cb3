package eval

import "math"

// A region integral is a nest of one-dimensional integrals, outermost first,
// each with the weight that its coordinate has in the element of volume, area
// or length. A coordinate of which the integrand does not depend is not
// integrated over: the integral of its weight is known in closed form.

// axis is one coordinate of a nest.
type axis struct {
	slot     int
	from, to Code
	weight   func(m *maker, x Code) Code // nil: 1
	total    Code                        // integral of the weight from from to to
	full     bool                        // a full turn: the integrand is periodic
}

// patch is one smooth piece of a region: a nest of axes, what the coordinates
// are there, and a constant factor of the element (a surface at fixed r).
type patch struct {
	axes   []axis
	factor Code
	bind   func(m *maker) []binding // outermost first; may use earlier slots
}

// binding gives a slot its value at each point.
type binding struct {
	slot int
	to   Code
}

// RegionIntegral is the integral of body over the region, element included. A
// vector body is integrated by Cartesian components, whatever the coordinates.
// Accuracy and faults are those of Integral.
func RegionIntegral(node int, r Region, at Coordinates, body Code) (Code, error) {
	if err := r.check(); err != nil {
		return Code{}, err
	}
	if body.Type.Shape == List {
		return Code{}, refuse("", "a list cannot be integrated over a region")
	}
	m := &maker{node: node}
	at, own := at.private(firstFree(r, at, body))
	var sum Code
	for i, p := range m.patches(r, at) {
		c := m.over(p, body)
		if i > 0 {
			c = m.add(sum, c)
		}
		sum = c
	}
	return guard(sum, own), m.err
}

// over integrates the body over one patch.
func (m *maker) over(p patch, body Code) Code {
	bs := p.bind(m)
	for i := len(bs) - 1; i >= 0; i-- {
		if b := bs[i]; b.slot >= 0 && body.Reads(b.slot) {
			body = Let(m.node, []int{b.slot}, []Code{b.to}, body)
		}
	}
	for i := len(p.axes) - 1; i >= 0; i-- {
		body = m.along(p.axes[i], body)
	}
	return m.mul(p.factor, body)
}

// along integrates over one axis.
func (m *maker) along(a axis, body Code) Code {
	if !body.Reads(a.slot) {
		return m.mul(a.total, body)
	}
	if a.full {
		return turn(m.node, a.slot, body)
	}
	if a.weight != nil {
		body = m.mul(a.weight(m, Slot(a.slot, Type{})), body)
	}
	return m.take(Integral(m.node, a.slot, a.from, a.to, body))
}

// private gives the coordinates that the integrand does not name slots from
// first on, and lists those.
func (c Coordinates) private(first int) (Coordinates, []int) {
	var own []int
	for _, s := range []*int{&c.R, &c.Theta, &c.Phi, &c.X, &c.Y, &c.Z} {
		if *s < 0 {
			*s = first + len(own)
			own = append(own, *s)
		}
	}
	return c, own
}

// firstFree is a slot number beyond all that a region integral touches.
func firstFree(r Region, at Coordinates, body Code) int {
	return max(slotsOf(r.Params...), body.slots, max(at.R, at.Theta, at.Phi, at.X, at.Y, at.Z, at.N)+1)
}

// guard restores slots that code uses for itself: they are beyond those of the
// code, but other code of the frame may keep values there.
func guard(c Code, own []int) Code {
	if c.konst != nil || len(own) == 0 {
		return c
	}
	fast, general, inner := c.Real, c.Any, c.info
	if fast != nil {
		c.Real = func(f *Frame) float64 {
			saved := f.keep(own)
			v := fast(f)
			f.restore(own, saved)
			return v
		}
	}
	c.Any = func(f *Frame) Value {
		saved := f.keep(own)
		v := general(f)
		f.restore(own, saved)
		return v
	}
	c.vec, c.slots = nil, max(c.slots, own[len(own)-1]+1)
	outer := *inner
	outer.slot = -1
	outer.diff = func(d *differ) (Code, error) {
		r, err := inner.diff(d)
		if err != nil {
			return r, err
		}
		return guard(r, own), nil
	}
	c.info = &outer
	return c
}

// maxOwn bounds the private slots: the six coordinates.
const maxOwn = 6

func (f *Frame) keep(slots []int) (saved [maxOwn]Value) {
	for i, s := range slots {
		saved[i] = f.slots[s]
	}
	return saved
}

func (f *Frame) restore(slots []int, saved [maxOwn]Value) {
	for i, s := range slots {
		f.slots[s] = saved[i]
	}
}

func slot(i int) Code { return Slot(i, Type{}) }

// straight is an axis of weight 1.
func (m *maker) straight(slot int, from, to Code) axis {
	return axis{slot: slot, from: from, to: to, total: m.sub(to, from)}
}

func (m *maker) azimuth(slot int) axis {
	return axis{slot: slot, from: Num(0), to: Num(2 * math.Pi), total: Num(2 * math.Pi), full: true}
}

// polar is the angle from +z, of weight sin(theta).
func (m *maker) polar(slot int) axis {
	return axis{slot: slot, from: Num(0), to: Num(math.Pi), total: Num(2),
		weight: func(m *maker, x Code) Code { return m.sin(x) }}
}

// radius has the weight r^(k-1).
func (m *maker) radius(slot int, from, to Code, k float64) axis {
	return axis{slot: slot, from: from, to: to,
		total:  m.mul(Num(1/k), m.sub(m.pow(to, k), m.pow(from, k))),
		weight: func(m *maker, x Code) Code { return m.pow(x, k-1) }}
}
