package eval

// patches cuts a region into its smooth pieces.
func (m *maker) patches(r Region, at Coordinates) []patch {
	p := r.Params
	if r.Boundary {
		return m.boundary(r, at)
	}
	switch r.Kind {
	case Box:
		return []patch{{factor: Num(1), bind: m.cartesian(at, nil),
			axes: []axis{m.straight(at.X, Num(0), p[0]), m.straight(at.Y, Num(0), p[1]), m.straight(at.Z, Num(0), p[2])}}}
	case Ball:
		return []patch{m.ballLike(at, Num(0), p[0])}
	case Shell:
		return []patch{m.ballLike(at, p[0], p[1])}
	case Cylinder:
		return []patch{m.cylinderLike(at, Num(0), p[0], p[1])}
	case Tube:
		return []patch{m.cylinderLike(at, p[0], p[1], p[2])}
	case Rectangle:
		return []patch{m.plate(at, 2, Num(0), +1, p[0], p[1])}
	case Disc:
		return []patch{m.disc(at, Num(0), p[0], Num(0), +1)}
	case Sphere:
		return []patch{m.sphere(at, p[0], +1)}
	case Wall:
		return []patch{m.wall(at, p[0], p[1], +1)}
	case Ring:
		return []patch{{factor: p[0], axes: []axis{m.azimuth(at.Phi)},
			bind: m.roundly(at, p[0], Num(0), nil)}}
	}
	return []patch{{factor: Num(1), axes: []axis{m.straight(at.X, Num(0), p[0])},
		bind: m.cartesian(at, []binding{{at.Y, Num(0)}, {at.Z, Num(0)}})}}
}

// boundary is the closed surface of a volume.
func (m *maker) boundary(r Region, at Coordinates) []patch {
	p := r.Params
	switch r.Kind {
	case Box:
		var out []patch
		for axis := range 3 {
			a, b := p[(axis+1)%3], p[(axis+2)%3]
			out = append(out, m.plate(at, axis, Num(0), -1, a, b), m.plate(at, axis, p[axis], +1, a, b))
		}
		return out
	case Ball:
		return []patch{m.sphere(at, p[0], +1)}
	case Shell:
		return []patch{m.sphere(at, p[0], -1), m.sphere(at, p[1], +1)}
	case Cylinder:
		return []patch{m.wall(at, p[0], p[1], +1), m.disc(at, Num(0), p[0], Num(0), -1), m.disc(at, Num(0), p[0], p[1], +1)}
	}
	return []patch{
		m.wall(at, p[0], p[2], -1), m.wall(at, p[1], p[2], +1),
		m.disc(at, p[0], p[1], Num(0), -1), m.disc(at, p[0], p[1], p[2], +1),
	}
}

// cartesian binds r, theta and phi from x, y and z, after what is given first.
func (m *maker) cartesian(at Coordinates, first []binding) func(*maker) []binding {
	return func(m *maker) []binding {
		x, y, z := slot(at.X), slot(at.Y), slot(at.Z)
		r := m.take(Abs(m.node, m.take(Triple(m.node, x, y, z))))
		flat := m.take(Abs(m.node, m.take(Triple(m.node, x, y, Num(0)))))
		return append(first[:len(first):len(first)],
			binding{at.R, r},
			binding{at.Theta, m.take(Builtin("atan2", m.node, []Code{flat, z}))},
			binding{at.Phi, m.take(Builtin("atan2", m.node, []Code{y, x}))})
	}
}

// normal binds the unit normal.
func (m *maker) normal(at Coordinates, sign float64, x, y, z Code) binding {
	s := func(c Code) Code { return m.mul(Num(sign), c) }
	return binding{at.N, m.take(Triple(m.node, s(x), s(y), s(z)))}
}

// plate is a rectangle across Cartesian axis k (0, 1, 2) at a place on it.
func (m *maker) plate(at Coordinates, k int, place Code, sign float64, a, b Code) patch {
	s := [3]int{at.X, at.Y, at.Z}
	u, v := s[(k+1)%3], s[(k+2)%3]
	e := [3]Code{Num(0), Num(0), Num(0)}
	e[k] = Num(1)
	return patch{factor: Num(1), axes: []axis{m.straight(u, Num(0), a), m.straight(v, Num(0), b)},
		bind: m.cartesian(at, []binding{{s[k], place}, m.normal(at, sign, e[0], e[1], e[2])})}
}

// roundly binds x and y (and z, theta) from a radius in the plane, phi and z.
func (m *maker) roundly(at Coordinates, r, z Code, more []binding) func(*maker) []binding {
	return func(m *maker) []binding {
		phi := slot(at.Phi)
		bs := []binding{
			{at.X, m.mul(r, m.cos(phi))}, {at.Y, m.mul(r, m.sin(phi))},
			{at.Theta, m.take(Builtin("atan2", m.node, []Code{r, z}))},
		}
		if z.slot != at.Z {
			bs = append(bs, binding{at.Z, z})
		}
		if r.slot != at.R {
			bs = append(bs, binding{at.R, r})
		}
		return append(bs, more...)
	}
}

func (m *maker) cylinderLike(at Coordinates, a, b, l Code) patch {
	return patch{factor: Num(1), bind: m.roundly(at, slot(at.R), slot(at.Z), nil),
		axes: []axis{m.radius(at.R, a, b, 2), m.azimuth(at.Phi), m.straight(at.Z, Num(0), l)}}
}

// disc is a disc or an annulus at height z.
func (m *maker) disc(at Coordinates, a, b, z Code, sign float64) patch {
	return patch{factor: Num(1), axes: []axis{m.radius(at.R, a, b, 2), m.azimuth(at.Phi)},
		bind: m.roundly(at, slot(at.R), z, []binding{m.normal(at, sign, Num(0), Num(0), Num(1))})}
}

func (m *maker) wall(at Coordinates, r, l Code, sign float64) patch {
	phi := slot(at.Phi)
	return patch{factor: r, axes: []axis{m.azimuth(at.Phi), m.straight(at.Z, Num(0), l)},
		bind: m.roundly(at, r, slot(at.Z), []binding{m.normal(at, sign, m.cos(phi), m.sin(phi), Num(0))})}
}

// radial binds x, y and z from spherical coordinates of radius r.
func (m *maker) radial(at Coordinates, r Code, more []binding) func(*maker) []binding {
	return func(m *maker) []binding {
		theta, phi := slot(at.Theta), slot(at.Phi)
		flat := m.mul(r, m.sin(theta))
		bs := []binding{
			{at.X, m.mul(flat, m.cos(phi))}, {at.Y, m.mul(flat, m.sin(phi))}, {at.Z, m.mul(r, m.cos(theta))},
		}
		if r.slot != at.R {
			bs = append(bs, binding{at.R, r})
		}
		return append(bs, more...)
	}
}

func (m *maker) ballLike(at Coordinates, a, b Code) patch {
	return patch{factor: Num(1), bind: m.radial(at, slot(at.R), nil),
		axes: []axis{m.radius(at.R, a, b, 3), m.polar(at.Theta), m.azimuth(at.Phi)}}
}

func (m *maker) sphere(at Coordinates, r Code, sign float64) patch {
	theta, phi := slot(at.Theta), slot(at.Phi)
	n := m.normal(at, sign, m.mul(m.sin(theta), m.cos(phi)), m.mul(m.sin(theta), m.sin(phi)), m.cos(theta))
	return patch{factor: m.pow(r, 2), axes: []axis{m.polar(at.Theta), m.azimuth(at.Phi)},
		bind: m.radial(at, r, []binding{n})}
}
