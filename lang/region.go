package lang

import (
	"fmt"

	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file infers regions: their measures and the integrals over them.

// region checks the shape of a region.
func (a *analysis) region(c *cell, r *Region) {
	e := &elab{a: a, c: c}
	if r.In != nil {
		e.medium(r.In)
	}
	e.shape(c, r)
}

// shape elaborates the lengths of a region; ok is false where something in it
// is unknown.
func (e *elab) shape(c *cell, r *Region) (s eval.Region, blind, ok bool) {
	if r.Shape == nil {
		return s, false, false
	}
	k, known := eval.RegionNamed(r.Shape.Fn.Text)
	if !known {
		e.fault("unknown-function", &r.Shape.Fn, fmt.Sprintf("%s is no shape of a region", r.Shape.Fn.Text),
			"volumes: box ball shell cylinder tube; surfaces: rectangle disc sphere wall; lines: segment ring")
		return s, false, false
	}
	s.Kind, ok = k, true
	for _, x := range r.Shape.Args {
		t := e.expr(x)
		if t.Known && !t.Dim.Compatible(kind.Length.Dim()) {
			e.fault("dimension-mismatch", x, fmt.Sprintf("%s takes lengths, and this is %s", k, describe(t.Facts)), "")
			ok = false
		}
		ok = ok && t.Known
		blind = blind || t.blind
		s.Params = append(s.Params, t.code)
	}
	if len(r.Shape.Args) != k.Params() {
		e.fault("syntax", r.Shape, fmt.Sprintf("%s takes %d %s, and %d %s given", k, k.Params(), plural("length", k.Params()), len(r.Shape.Args), areOrIs(len(r.Shape.Args))), "")
		ok = false
	}
	return s, blind, ok
}

// regionOf elaborates a region anew for a use of it.
func (e *elab) regionOf(c *cell) (s eval.Region, blind, ok bool) {
	r, isRegion := c.tree.(*Region)
	if !isRegion || c.cyclic {
		return s, false, false
	}
	inner := &elab{a: c.home(e.a), c: c, quiet: 1}
	return inner.shape(c, r)
}

// measure infers disc.volume, .area, .length.
func (e *elab) measure(m *Member, c *cell, field string) typed {
	s, blind, ok := e.regionOf(c)
	if !ok {
		return unknown()
	}
	dims, k := 0, kind.ID(0)
	switch field {
	case "volume":
		dims, k = 3, kind.Volume
	case "area":
		dims, k = 2, kind.Area
		s.Boundary = s.Kind.Dims() == 3
	case "length":
		dims, k = 1, kind.Length
	}
	if dims == 0 || dims != s.Kind.Dims() && !s.Boundary {
		have := []string{"length", "area", "volume and area"}[s.Kind.Dims()-1]
		e.fault("unknown-property", m, fmt.Sprintf("region %s (a %s) has no %s", c.title(), s.Kind, m.Field.Text), "it has "+have)
		return unknown()
	}
	t := typed{Facts: Facts{Known: true, Dim: k.Dim(), Kind: k, KindBy: Inferred}, kinds: []kind.ID{k}, blind: blind}
	return e.built(t, m)(eval.Measure(m.ID, s))
}

// overRegion infers integral(BODY over REGION) and over its boundary.
func (e *elab) overRegion(c *Call) typed {
	if len(c.Args) != 1 {
		return e.form(c, "integral(EXPR over REGION)")
	}
	r, boundary, ok := e.overWhat(c.Over)
	if !ok {
		e.again(c.Args[0])
		return unknown()
	}
	s, blind, ok := e.regionOf(r)
	s.Boundary = boundary
	saved := e.scope
	at := e.coordinates(s)
	body := e.expr(c.Args[0])
	e.scope = saved
	if !ok || !body.Known {
		return unknown()
	}
	dims := s.Kind.Dims()
	if boundary {
		dims--
	}
	d := unit.Dim{}
	d[unit.Length] = unit.Whole(dims)
	t := e.integrated(body, d, typed{plain: true})
	t.blind = body.blind || blind
	if reg, isRegion := r.tree.(*Region); isRegion && reg.In != nil {
		t.addMedium(CanonicalName(reg.In.Text))
	}
	return e.built(t, c)(eval.RegionIntegral(c.ID, s, at, body.code))
}

// overWhat finds the region of `over disc` or `over disc.boundary`.
func (e *elab) overWhat(x Expr) (c *cell, boundary, ok bool) {
	if m, isMember := x.(*Member); isMember && m.Field.Text == "boundary" {
		x, boundary = m.X, true
	}
	switch n := x.(type) {
	case *Name:
		c = e.a.cells[CanonicalName(n.Text)]
		if c == nil {
			e.unknownName(n, n.Text, "unknown-name")
			return nil, false, false
		}
		e.use(c.key, n.Span)
	case *Member:
		c, _ = e.ownerOf(n)
	}
	if c == nil || c.role != RoleRegion {
		if c != nil {
			e.fault("shape-mix", x, fmt.Sprintf("%s is no region", sketch(x)), "name a region, or its boundary as REGION.boundary")
		}
		return nil, false, false
	}
	if c.path == "" && c.tree == nil {
		return nil, false, false
	}
	return c, boundary, true
}

// coordinates binds the coordinates of a region, and the normal of a surface.
func (e *elab) coordinates(s eval.Region) eval.Coordinates {
	at := eval.Coordinates{R: -1, Theta: -1, Phi: -1, X: -1, Y: -1, Z: -1, N: -1}
	slots := map[string]*int{"r": &at.R, "theta": &at.Theta, "phi": &at.Phi, "x": &at.X, "y": &at.Y, "z": &at.Z}
	names := append([]string{"x", "y", "z"}, s.Kind.Coords()...)
	if !cartesian(s.Kind) {
		names = append(regionCoordinates(s.Kind.String()), "x", "y")
	}
	for _, name := range names {
		if *slots[name] >= 0 {
			continue
		}
		t := typed{Facts: Facts{Known: true, Dim: kind.Length.Dim(), Kind: kind.Length, KindBy: Inferred}, kinds: []kind.ID{kind.Length}}
		if name == "theta" || name == "phi" {
			t.Facts = Facts{Known: true, Dim: kind.Angle.Dim(), Kind: kind.Angle, KindBy: Inferred}
			t.kinds = nil
		}
		*slots[name] = e.bind(name, t)
	}
	if s.Boundary || s.Kind.Dims() == 2 {
		at.N = e.bind("n", typed{Facts: Facts{Known: true, Shape: eval.Vector}})
	}
	return at
}

func cartesian(k eval.RegionKind) bool {
	return k == eval.Box || k == eval.Rectangle || k == eval.Segment
}
