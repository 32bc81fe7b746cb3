package lang

import (
	"fmt"

	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file infers properties of media: stated, derived, complex.

// property infers medium.field where the medium states or implies it.
func (e *elab) property(medium *cell, field string, at Tree) (typed, bool) {
	if c := e.a.cells[medium.key+"."+field]; c != nil {
		return e.ownProperty(medium, c, at), true
	}
	if field == "eps_c" {
		return e.complexPermittivity(medium, at)
	}
	for _, d := range derivations(field) {
		c := e.a.cells[medium.key+"."+d.from]
		if c == nil {
			continue
		}
		t := e.ownProperty(medium, c, at)
		if t.Known {
			t = e.derive(t, d, field, at)
		}
		return t, true
	}
	return unknown(), false
}

// ownProperty infers a property that the medium states.
func (e *elab) ownProperty(medium, c *cell, at Tree) typed {
	e.use(c.key, at.Place())
	t := e.cellValue(c, at)
	t.addMedium(medium.key)
	return t
}

// derive gives a property that follows from another one.
func (e *elab) derive(t typed, d derivation, field string, at Tree) typed {
	_, id, _ := kind.Parse(standardProperties()[field])
	t.Kind, t.KindBy, t.kinds, t.lit = id, Inferred, []kind.ID{id}, nil
	if d.how == 'i' {
		t.Dim = unit.Dim{}.Div(t.Dim)
		if t.Shape == eval.Tensor {
			return e.built(t, at)(eval.Builtin("inv", at.Index(), []eval.Code{t.code}))
		}
		return e.built(t, at)(eval.Div(at.Index(), eval.Num(1), t.code))
	}
	by := e.a.cells[d.by]
	k := eval.Const(by.sym.Value)
	if d.how == '*' {
		t.Dim = t.Dim.Mul(by.sym.Facts.Dim)
		return e.built(t, at)(eval.Mul(at.Index(), t.code, k))
	}
	t.Dim = t.Dim.Div(by.sym.Facts.Dim)
	return e.built(t, at)(eval.Div(at.Index(), t.code, k))
}

// complexPermittivity is eps' − j·eps” of a harmonic note (e^{+jωt}), from the
// loss factor or the conductivity that the medium states.
func (e *elab) complexPermittivity(medium *cell, at Tree) (typed, bool) {
	t, ok := e.property(medium, "eps", at)
	if !ok || !t.Known {
		return t, ok
	}
	loss, conducting, ok := e.lossOf(medium, at)
	if !ok {
		return t, true
	}
	if !loss.Known {
		return unknown(), true
	}
	if !conducting && t.Complex {
		e.fault("unknown-property", at, fmt.Sprintf("%s states a complex permittivity and a loss factor: the loss would count twice", medium.title()), "keep one of the two")
		return unknown(), true
	}
	var second eval.Code // eps”
	var err error
	if conducting {
		w, known := e.angularFrequency(at)
		if !known {
			return unknown(), true
		}
		second, err = eval.Div(at.Index(), loss.code, w)
	} else {
		second, err = eval.Mul(at.Index(), t.code, loss.code)
	}
	t.join(loss)
	t.Complex, t.kinds, t.lit = true, []kind.ID{t.Kind}, nil
	return e.minusJ(t, second, err, at), true
}

// minusJ is eps' − j·eps” (e^{+jωt}).
func (e *elab) minusJ(t typed, second eval.Code, err error, at Tree) typed {
	if err != nil {
		return e.refused(at, err)
	}
	im, err := eval.Mul(at.Index(), second, eval.Const(eval.Cplx(1i)))
	if err != nil {
		return e.refused(at, err)
	}
	return e.built(t, at)(eval.Sub(at.Index(), t.code, im))
}

// lossOf finds what makes a medium lossy.
func (e *elab) lossOf(medium *cell, at Tree) (t typed, conducting, ok bool) {
	if e.a.cells[medium.key+".tan_delta"] != nil {
		t, ok = e.property(medium, "tan_delta", at)
		return t, false, ok
	}
	t, ok = e.property(medium, "sigma", at)
	return t, true, ok
}

// angularFrequency is ω of the harmonic regime in force.
func (e *elab) angularFrequency(at Tree) (eval.Code, bool) {
	r := e.c.regime
	if r == nil || r.role != RoleCondition || !r.sym.Facts.Known {
		e.fault("unknown-property", at, "the complex permittivity of a conducting medium needs a frequency", "put `regime: harmonic at f = …` above")
		return eval.Code{}, false
	}
	w := eval.Slot(r.slot, eval.Type{})
	if r.sym.Facts.Dim[unit.Cycle].Sign() <= 0 {
		return w, true
	}
	w, err := eval.Mul(at.Index(), eval.Num(2*pi), w)
	return w, err == nil
}

// unknownProperty reports a property that a medium does not have.
func (e *elab) unknownProperty(m *Member, c *cell) typed {
	e.report(Fault{
		Rule: "unknown-property", Severity: Error, Span: m.Field.Span,
		Message: fmt.Sprintf("medium %s has no property %s", c.title(), m.Field.Text), Detail: e.a.owned(c),
		Related: e.relate(c, "the medium"),
	})
	return unknown()
}

// relate points at the definition of a cell.
func (e *elab) relate(c *cell, message string) []Related {
	if c == nil || c.stmt == nil {
		return nil
	}
	return []Related{{Name: c.key, Message: message}}
}
