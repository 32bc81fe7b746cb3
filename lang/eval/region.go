package eval

import "math"

// RegionKind is the shape of a region.
type RegionKind uint8

// The regions, with their parameters (lengths in metres) and the coordinates
// that are bound in an integrand.
const (
	Box       RegionKind = iota + 1 // a, b, c: 0..a, 0..b, 0..c in (x, y, z)
	Ball                            // R: in (r, theta, phi), centre at the origin
	Shell                           // a, b: a <= r <= b in (r, theta, phi)
	Cylinder                        // R, L: r <= R, 0..L in (r, phi, z)
	Tube                            // a, b, L: a <= r <= b, 0..L in (r, phi, z)
	Rectangle                       // a, b: 0..a, 0..b in (x, y), at z = 0
	Disc                            // R: r <= R in (r, phi), at z = 0
	Sphere                          // R: the surface, in (theta, phi)
	Wall                            // R, L: the side of a cylinder, in (phi, z)
	Segment                         // L: 0..L in (x), along the x axis
	Ring                            // R: the circle in (phi), at z = 0
)

// regionFact is what is fixed about a kind of region.
type regionFact struct {
	name   string
	params int
	coords []string
	dims   int // 3 volume, 2 surface, 1 line
}

var regionFacts = map[RegionKind]regionFact{
	Box:       {"box", 3, []string{"x", "y", "z"}, 3},
	Ball:      {"ball", 1, []string{"r", "theta", "phi"}, 3},
	Shell:     {"shell", 2, []string{"r", "theta", "phi"}, 3},
	Cylinder:  {"cylinder", 2, []string{"r", "phi", "z"}, 3},
	Tube:      {"tube", 3, []string{"r", "phi", "z"}, 3},
	Rectangle: {"rectangle", 2, []string{"x", "y"}, 2},
	Disc:      {"disc", 1, []string{"r", "phi"}, 2},
	Sphere:    {"sphere", 1, []string{"theta", "phi"}, 2},
	Wall:      {"wall", 2, []string{"phi", "z"}, 2},
	Segment:   {"segment", 1, []string{"x"}, 1},
	Ring:      {"ring", 1, []string{"phi"}, 1},
}

// RegionNamed is the kind of the region called name; false if there is none.
func RegionNamed(name string) (RegionKind, bool) {
	for k, fact := range regionFacts {
		if fact.name == name {
			return k, true
		}
	}
	return 0, false
}

// String is the kind's name in the language.
func (k RegionKind) String() string { return regionFacts[k].name }

// Params is how many lengths the kind takes.
func (k RegionKind) Params() int { return regionFacts[k].params }

// Dims is 3 for a volume, 2 for a surface, 1 for a line.
func (k RegionKind) Dims() int { return regionFacts[k].dims }

// Coords names the coordinates that the kind binds besides x, y and z.
func (k RegionKind) Coords() []string { return regionFacts[k].coords }

// Region is a region with its lengths, or the boundary of a volume.
type Region struct {
	Kind     RegionKind
	Params   []Code // lengths in metres, real numbers
	Boundary bool   // the closed surface of the volume, normal outward
}

// Coordinates are the slots that a region integral sets for its integrand; -1
// where the integrand does not use one. In every kind of region the Cartesian
// coordinates of the point are there too. N is the unit normal as a Cartesian
// vector: outward on a boundary, along +z on a rectangle or disc, away from the
// centre or axis on a sphere or wall.
type Coordinates struct {
	R, Theta, Phi int // radius, polar angle from +z, azimuth from +x
	X, Y, Z       int
	N             int
}

// check refuses a region with the wrong parameters.
func (r Region) check() error {
	fact, ok := regionFacts[r.Kind]
	if !ok {
		return refuse("", "there is no such region")
	}
	if len(r.Params) != fact.params {
		return refuse("", "%s takes %s, not %d", fact.name, plural(fact.params, "length"), len(r.Params))
	}
	for _, p := range r.Params {
		if !p.Type.IsReal() {
			return refuse("", "%s takes lengths, not %s", fact.name, p.Type)
		}
	}
	if r.Boundary && fact.dims != 3 {
		return refuse("integrate over the surface itself", "only a volume has a boundary; %s has none", fact.name)
	}
	return nil
}

// Measure is the volume of a volume, the area of a surface or a boundary, the
// length of a line, in SI units.
func Measure(node int, r Region) (Code, error) {
	if err := r.check(); err != nil {
		return Code{}, err
	}
	m := maker{node: node}
	v := m.measure(r)
	return v, m.err
}

// maker builds code and keeps the first error, which for the expressions of
// this file cannot occur unless the operands are wrong.
type maker struct {
	node int
	err  error
}

func (m *maker) take(c Code, err error) Code {
	if err != nil {
		if m.err == nil {
			m.err = err
		}
		return Num(0)
	}
	return c
}

func (m *maker) add(a, b Code) Code { return m.take(Add(m.node, a, b)) }
func (m *maker) sub(a, b Code) Code { return m.take(Sub(m.node, a, b)) }
func (m *maker) pow(a Code, k float64) Code {
	return m.take(Pow(m.node, a, Num(k)))
}

func (m *maker) mul(first Code, rest ...Code) Code {
	for _, c := range rest {
		first = m.take(Mul(m.node, first, c))
	}
	return first
}

func (m *maker) sin(a Code) Code { return m.take(Builtin("sin", m.node, []Code{a})) }
func (m *maker) cos(a Code) Code { return m.take(Builtin("cos", m.node, []Code{a})) }

// ringArea is k·(b² - a²).
func (m *maker) ringArea(k float64, a, b Code) Code {
	return m.mul(Num(k), m.sub(m.pow(b, 2), m.pow(a, 2)))
}

func (m *maker) measure(r Region) Code {
	p := r.Params
	if r.Boundary {
		return m.boundaryArea(r)
	}
	const pi = math.Pi
	switch r.Kind {
	case Box:
		return m.mul(p[0], p[1], p[2])
	case Ball:
		return m.mul(Num(4*pi/3), m.pow(p[0], 3))
	case Shell:
		return m.mul(Num(4*pi/3), m.sub(m.pow(p[1], 3), m.pow(p[0], 3)))
	case Cylinder:
		return m.mul(Num(pi), m.pow(p[0], 2), p[1])
	case Tube:
		return m.mul(m.ringArea(pi, p[0], p[1]), p[2])
	case Rectangle:
		return m.mul(p[0], p[1])
	case Disc:
		return m.mul(Num(pi), m.pow(p[0], 2))
	case Sphere:
		return m.mul(Num(4*pi), m.pow(p[0], 2))
	case Wall:
		return m.mul(Num(2*pi), p[0], p[1])
	case Ring:
		return m.mul(Num(2*pi), p[0])
	}
	return p[0]
}

func (m *maker) boundaryArea(r Region) Code {
	p := r.Params
	const pi = math.Pi
	switch r.Kind {
	case Box:
		return m.mul(Num(2), m.add(m.add(m.mul(p[0], p[1]), m.mul(p[1], p[2])), m.mul(p[2], p[0])))
	case Ball:
		return m.mul(Num(4*pi), m.pow(p[0], 2))
	case Shell:
		return m.mul(Num(4*pi), m.add(m.pow(p[0], 2), m.pow(p[1], 2)))
	case Cylinder:
		return m.mul(Num(2*pi), p[0], m.add(p[0], p[1]))
	}
	return m.add(m.mul(Num(2*pi), m.add(p[0], p[1]), p[2]), m.ringArea(2*pi, p[0], p[1]))
}
