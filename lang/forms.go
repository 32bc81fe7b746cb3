package lang

import (
	"fmt"
	"math"

	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file infers the forms that bind a variable: integral, sum, derivative,
// solve. Where an integral has several clauses the first is the innermost, so
// that its bounds may depend on the variables of the later ones.

// binding infers a form that binds a variable; ok is false for a plain call.
func (e *elab) binding(c *Call, name string) (t typed, ok bool) {
	switch name {
	case "integral":
		if c.Over != nil {
			return e.overRegion(c), true
		}
		return e.integral(c), true
	case "sum":
		if len(c.For) == 0 {
			return unknown(), false
		}
		return e.summation(c), true
	case "derivative":
		return e.derivative(c), true
	case "solve":
		return e.solve(c), true
	case "loop", "assembly_energy", "potential":
		return e.assembly(c, name), true
	case "lower", "upper":
		return e.worstCase(c, name), true
	}
	return unknown(), false
}

// form reports a bound form that is not written as it should be.
func (e *elab) form(c *Call, right string) typed {
	e.fault("syntax", c, fmt.Sprintf("%s is not written this way", c.Fn.Text), "write "+right)
	return unknown()
}

// variable binds the variable of a range and infers it from the bounds.
type variable struct {
	slot     int
	t        typed
	from, to typed
	saved    *scope
}

// enter elaborates the bounds of a range and binds its variable; leave must
// follow. ok is false where something in it is unknown: the variable is then
// unknown too, so that the body causes no second finding.
func (e *elab) enter(r *Range) (v variable, ok bool) {
	v.saved = e.scope
	n, named := r.Var.(*Name)
	if r.From != nil && r.To != nil {
		v.t = e.bounds(r)
		v.from, v.to = e.again(r.From), e.again(r.To)
	}
	if !named {
		return v, false
	}
	v.slot = e.bind(CanonicalName(n.Text), v.t)
	if e.quiet == 0 {
		e.c.record(n, v.t.Facts)
	}
	return v, v.t.Known
}

// again elaborates an expression that has been elaborated, without recording
// its uses and findings twice.
func (e *elab) again(x Expr) typed {
	e.quiet++
	defer func() { e.quiet-- }()
	return e.expr(x)
}

func (e *elab) leave(v variable) { e.scope = v.saved }

// integral infers integral(BODY for x from A to B …).
func (e *elab) integral(c *Call) typed {
	if len(c.Args) != 1 || len(c.For) == 0 {
		return e.form(c, "integral(EXPR for x from A to B), or integral(EXPR over REGION)")
	}
	if m, ok := c.For[0].Var.(*Member); ok {
		return e.alongTable(c, m)
	}
	return e.nest(c, len(c.For)-1)
}

// nest elaborates clause i and the ones inside it.
func (e *elab) nest(c *Call, i int) typed {
	if i < 0 {
		return e.expr(c.Args[0])
	}
	v, known := e.enter(c.For[i])
	body := e.nest(c, i-1)
	e.leave(v)
	if !known || !body.Known {
		return unknown()
	}
	t := e.integrated(body, v.t.Dim, v.t)
	t.blind = body.blind || v.t.blind
	if body.Shape == eval.List {
		e.fault("shape-mix", c.Args[0], "a list cannot be integrated over a variable", "integrate along a column: integral(t.y for t.x from … to …)")
		return unknown()
	}
	return e.built(t, c)(eval.Integral(c.ID, v.slot, v.from.code, v.to.code, body.code))
}

// integrated is what an integral carries: the integrand times the variable.
func (e *elab) integrated(body typed, d unit.Dim, v typed) typed {
	t := body
	t.lit, t.plain, t.pi = nil, false, 0
	t.Dim = body.Dim.Mul(d)
	t.kinds = mergeKinds(body.kinds, v.kinds)
	t.Kind, t.KindBy = ingredientKind(t.Dim, t.kinds)
	for _, m := range v.Media {
		t.addMedium(m)
	}
	t.Qualifier, t.QualBy = productQualifier(OpMul, body, v)
	t.Waveform = kind.AnyWave // the integral of a square wave is a triangle
	return t
}

// summation infers sum(BODY for n from A to B).
func (e *elab) summation(c *Call) typed {
	if len(c.Args) != 1 || len(c.For) != 1 {
		return e.form(c, "sum(EXPR for n from 1 to 20)")
	}
	v, known := e.enter(c.For[0])
	body := e.expr(c.Args[0])
	e.leave(v)
	if !known || !body.Known {
		return unknown()
	}
	if !v.t.Dim.IsOne() {
		e.fault("dimensioned-argument", c.For[0], "a sum counts in whole numbers, not in "+describe(v.t.Facts), "")
		return unknown()
	}
	body.lit, body.plain, body.blind = nil, false, body.blind || v.t.blind
	return e.built(body, c)(eval.Sum(c.ID, v.slot, v.from.code, v.to.code, body.code))
}

// derivative infers derivative(BODY for x at A).
func (e *elab) derivative(c *Call) typed {
	if len(c.Args) != 1 || len(c.For) != 1 || c.For[0].At == nil {
		return e.form(c, "derivative(EXPR for x at A)")
	}
	r := c.For[0]
	n, ok := r.Var.(*Name)
	at := e.expr(r.At)
	if !ok || !at.Known {
		return unknown()
	}
	saved := e.scope
	slot := e.bind(CanonicalName(n.Text), at)
	if e.quiet == 0 {
		e.c.record(n, at.Facts)
	}
	body := e.expr(c.Args[0])
	e.scope = saved
	if !body.Known {
		return unknown()
	}
	t := body
	t.lit, t.plain, t.pi, t.blind, t.Absolute = nil, false, 0, body.blind || at.blind, false
	t.Dim = body.Dim.Div(at.Dim)
	t.kinds = mergeKinds(body.kinds, at.kinds)
	t.Kind, t.KindBy = ingredientKind(t.Dim, t.kinds)
	t.Qualifier, t.QualBy = productQualifier(OpDiv, body, at)
	t.Waveform = kind.AnyWave
	return e.built(t, c)(eval.Derivative(c.ID, slot, at.code, body.code))
}

// solve infers solve(LEFT = RIGHT for x from A to B).
func (e *elab) solve(c *Call) typed {
	if len(c.Args) != 1 || len(c.For) != 1 || c.Equal == nil {
		return e.form(c, "solve(LEFT = RIGHT for x from A to B)")
	}
	v, known := e.enter(c.For[0])
	left, right := e.expr(c.Args[0]), e.expr(c.Equal)
	e.leave(v)
	if !known || !left.Known || !right.Known {
		return unknown()
	}
	if !left.Dim.Compatible(right.Dim) && !isZero(c.Args[0]) && !isZero(c.Equal) {
		e.fault("dimension-mismatch", c, fmt.Sprintf("the two sides are %s and %s", describe(left.Facts), describe(right.Facts)), "")
		return unknown()
	}
	t := v.t
	t.lit, t.plain, t.blind = nil, false, v.t.blind || left.blind || right.blind
	t.join(left)
	t.join(right)
	t.kinds = v.t.kinds
	e.solves = append(e.solves, c)
	return e.built(t, c)(eval.Solve(c.ID, v.slot, left.code, right.code, v.from.code, v.to.code))
}

// severalRoots cautions about each solve of the cell that found more than one
// root when it last ran.
func (e *elab) severalRoots() {
	for _, c := range e.solves {
		if n := e.a.machine.frame.Roots(c.ID); n > 1 && e.quiet == 0 {
			e.report(Fault{
				Rule: "several-roots", Severity: Caution, Span: c.Span,
				Message: fmt.Sprintf("the equation has %d roots in this range; the least is taken", n),
				Detail:  "narrow the range to the root that is meant",
			})
		}
	}
}

// infinity is the bound `inf`; it fits every unit.
func infinity() typed {
	return typed{Facts: number(), plain: true, code: eval.Num(math.Inf(1))}
}
