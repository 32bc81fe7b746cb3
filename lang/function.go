package lang

import (
	"fmt"

	"inkjoule/lang/eval"
	"inkjoule/lang/unit"
)

// This file elaborates functions of the note: their body, pieces and domain.

// function elaborates a definition with parameters. Its body is judged once,
// with parameters of the dimension that the domain fixes; a parameter without
// a domain is unknown there, and the body is judged at each call.
func (e *elab) function(d *Definition) {
	inner := &elab{a: e.a, c: e.c, want: e.want}
	all := true
	for _, p := range d.Params {
		t := unknown()
		if r := rangeOf(d.For, p.Text); r != nil {
			t = e.bounds(r)
		}
		all = all && t.Known
		inner.bind(CanonicalName(p.Text), t)
	}
	t := inner.body(d)
	e.validity(d)
	if !all || !t.Known {
		e.c.sym.Facts.Known = false
		return
	}
	e.settle(d, t)
}

func hasParam(d *Definition, name string) bool {
	for _, p := range d.Params {
		if CanonicalName(p.Text) == CanonicalName(name) {
			return true
		}
	}
	return false
}

// rangeOf finds the clause of a parameter.
func rangeOf(rs []*Range, name string) *Range {
	key := CanonicalName(name)
	for _, r := range rs {
		if n, ok := r.Var.(*Name); ok && CanonicalName(n.Text) == key {
			return r
		}
	}
	return nil
}

// bounds infers what a range's variable carries from its bounds.
func (e *elab) bounds(r *Range) typed {
	if r.From == nil || r.To == nil {
		return unknown()
	}
	from, to := e.expr(r.From), e.expr(r.To)
	if !from.Known || !to.Known {
		return unknown()
	}
	t := from
	if isZero(r.From) || isInf(r.From) {
		t = to
	}
	if !isZero(r.From) && !isZero(r.To) && !isInf(r.From) && !isInf(r.To) && !from.Dim.Compatible(to.Dim) {
		e.fault("dimension-mismatch", r, fmt.Sprintf("the range goes from %s to %s", describe(from.Facts), describe(to.Facts)), "both bounds have one unit")
		return unknown()
	}
	t.blind = from.blind || to.blind
	t.lit = nil
	return t
}

func isInf(x Expr) bool {
	if u, ok := x.(*Unary); ok {
		x = u.X
	}
	n, ok := x.(*Name)
	return ok && n.Text == "inf"
}

// body elaborates a function's members and pieces; the first member decides
// and further ones are verified where the function is written.
func (e *elab) body(d *Definition) typed {
	t := e.expr(d.Members[0])
	if e.quiet == 0 {
		for _, m := range d.Members[1:] {
			if _, ok := m.(*Blank); !ok {
				e.expr(m)
			}
		}
	}
	if len(d.Pieces) == 0 || !t.Known {
		return t
	}
	return e.pieces(d, t)
}

// piece is one branch with its bounds.
type piece struct {
	x        typed
	from, to typed
}

// pieces elaborates a piecewise definition.
func (e *elab) pieces(d *Definition, first typed) typed {
	if len(d.For) == 0 {
		e.fault("syntax", d, "each piece needs its range: `… for x from … to …`", "")
		return unknown()
	}
	v, ok := d.For[len(d.For)-1].Var.(*Name)
	if !ok {
		return unknown()
	}
	local := e.local(CanonicalName(v.Text))
	all := []piece{{x: first}}
	ranges := []*Range{d.For[len(d.For)-1]}
	for _, p := range d.Pieces {
		all = append(all, piece{x: e.expr(p.X)})
		ranges = append(ranges, p.For)
	}
	t := first
	for i, r := range ranges {
		if r == nil || r.From == nil || r.To == nil {
			return unknown()
		}
		all[i].from, all[i].to = e.expr(r.From), e.expr(r.To)
		if !all[i].x.Known || !all[i].from.Known || !all[i].to.Known || local == nil || !local.t.Known {
			return unknown()
		}
		if !all[i].x.Dim.Compatible(first.Dim) {
			e.fault("dimension-mismatch", d, fmt.Sprintf("one piece is %s, another %s", describe(first.Facts), describe(all[i].x.Facts)), "")
			return unknown()
		}
		t.join(all[i].x)
		t.blind = t.blind || all[i].x.blind || all[i].from.blind || all[i].to.blind
	}
	t.lit, t.plain = nil, false
	return e.piecewise(d, local.t, all, t)
}

// piecewise compiles the branches.
func (e *elab) piecewise(d *Definition, v typed, all []piece, t typed) typed {
	ps := make([]eval.Piece, len(all))
	for i, p := range all {
		ps[i] = eval.Piece{From: p.from.code, To: p.to.code, Body: p.x.code}
	}
	return e.built(t, d)(eval.Choose(d.ID, v.code, ps))
}

// domain checks the arguments of a call against the stated ranges: a wrong
// dimension is an error, a value outside a caution.
func (e *elab) domain(c *Call, f *cell, d *Definition, xs []typed) {
	for i, p := range d.Params {
		r := rangeOf(d.For, p.Text)
		if r == nil {
			continue
		}
		quiet := &elab{a: e.a, c: f, quiet: 1}
		t := quiet.bounds(r)
		if !t.Known || !xs[i].Known {
			continue
		}
		if !t.Dim.Compatible(xs[i].Dim) && !isZero(c.Args[i]) {
			e.fault("dimension-mismatch", c.Args[i], fmt.Sprintf("%s takes %s, and this is %s", c.Fn.Text, describe(t.Facts), describe(xs[i].Facts)), "")
			continue
		}
		e.within(c.Args[i], d, r, xs[i], quiet)
	}
}

// within cautions about an argument outside the range, where its value is
// known here: an argument that varies is checked where it varies.
func (e *elab) within(at Expr, d *Definition, r *Range, x typed, bounds *elab) {
	if len(d.Pieces) > 0 {
		return // the choice of the piece tells it
	}
	lowest, highest := bounds.expr(r.From), bounds.expr(r.To)
	v, ok := e.value(x)
	lo, ok1 := e.value(lowest)
	hi, ok2 := e.value(highest)
	if !ok || !ok1 || !ok2 || v.Shape() != eval.Scalar {
		return
	}
	slack := 1e-9 * max(abs(lo.Re()), abs(hi.Re()))
	if v.Re() >= lo.Re()-slack && v.Re() <= hi.Re()+slack {
		return
	}
	s := formatter{unit: unitFor(r, e.a, x.Dim), digits: shownDigits}
	e.report(Fault{
		Rule: "outside-stated-range", Severity: Caution, Span: at.Place(),
		Message: fmt.Sprintf("%s is outside the range for which %s is stated: %s to %s", s.value(v), d.Name.Text, s.value(lo), s.value(hi)),
		Detail:  "extend the range if the source covers it, or find a value for this condition",
		Related: e.relate(e.a.cells[CanonicalName(d.Name.Text)], "the function with its range"),
	})
}

// unitFor is the unit in which a range was written.
func unitFor(r *Range, a *analysis, d unit.Dim) unit.Unit {
	for _, x := range []Expr{r.To, r.From} {
		if p := unitOf(x); p != nil {
			if u := a.readUnit(p.Text); u.err == nil {
				return u.unit
			}
		}
	}
	return unit.Coherent(d)
}

func abs(x float64) float64 {
	if x < 0 {
		return -x
	}
	return x
}
