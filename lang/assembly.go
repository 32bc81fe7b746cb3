package lang

import (
	"fmt"

	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file infers the functions of lists that compute with whole tables.

// assembly infers loop, assembly_energy and potential.
func (e *elab) assembly(c *Call, name string) typed {
	xs := make([]typed, len(c.Args))
	t := typed{Facts: Facts{Known: true}}
	known := true
	for i, a := range c.Args {
		xs[i] = e.expr(a)
		known = known && xs[i].Known
		t.join(xs[i])
	}
	if !known {
		return unknown()
	}
	switch {
	case name == "loop" && len(xs) == 2:
		t.Dim = xs[0].Dim.Mul(xs[1].Dim)
		t.Kind, t.KindBy = ingredientKind(t.Dim, t.kinds)
		return e.built(t, c)(eval.Loop(c.ID, xs[0].code, xs[1].code))
	case name == "loop":
		return e.form(c, "loop(t.x, t.y)")
	case name == "assembly_energy" && (len(xs) == 4 || len(xs) == 5):
		return e.assemblyEnergy(c, xs, t)
	case name == "potential" && (len(xs) == 5 || len(xs) == 6):
		return e.potential(c, xs, t)
	}
	return e.form(c, name+"(t.q, t.x, t.y, t.z, …)")
}

// dimensions checks arguments against the dimensions that a function takes.
func (e *elab) dimensions(c *Call, xs []typed, want ...string) bool {
	for i, w := range want {
		u, err := unit.Parse(w)
		if err == nil && i < len(xs) && !xs[i].Dim.Compatible(u.Dim) && !isZero(c.Args[i]) {
			e.fault("dimension-mismatch", c.Args[i], fmt.Sprintf("%s takes %s here, and this is %s", c.Fn.Text, w, describe(xs[i].Facts)), "")
			return false
		}
	}
	return true
}

// vacuum is eps_0 as an argument that was left out.
func (e *elab) vacuum() eval.Code { return eval.Const(e.a.cells["eps_0"].sym.Value) }

func (e *elab) assemblyEnergy(c *Call, xs []typed, t typed) typed {
	if !e.dimensions(c, xs, "C", "m", "m", "m", "F/m") {
		return unknown()
	}
	eps := e.vacuum()
	if len(xs) == 5 {
		eps = xs[4].code
	}
	t.Dim, t.Kind, t.KindBy = kind.Energy.Dim(), kind.Energy, Inferred
	return e.built(t, c)(eval.AssemblyEnergy(c.ID, xs[0].code, xs[1].code, xs[2].code, xs[3].code, eps))
}

// potential takes the point last, and a permittivity before it where there are
// six arguments: potential(t.q, t.x, t.y, t.z, point[, eps]) in either order.
func (e *elab) potential(c *Call, xs []typed, t typed) typed {
	point, eps := xs[4], e.vacuum()
	if len(xs) == 6 {
		other := xs[5]
		if point.Shape != eval.Vector {
			point, other = other, point
		}
		eps = other.code
	}
	if !e.dimensions(c, xs, "C", "m", "m", "m") {
		return unknown()
	}
	if point.Shape != eval.Vector {
		e.fault("shape-mix", c, "the point is a vector (x, y, z)", "")
		return unknown()
	}
	t.Dim, t.Kind, t.KindBy = kind.ElectricPotential.Dim(), kind.ElectricPotential, Inferred
	return e.built(t, c)(eval.Potential(c.ID, xs[0].code, xs[1].code, xs[2].code, xs[3].code, eps, point.code))
}
