package lang

import (
	"fmt"
	"math"
	"slices"

	"inkjoule/lang/eval"
	"inkjoule/lang/unit"
)

// This file carries uncertainty: every literal with a spread is an input, and
// a cell's gradient tells how its value depends on the inputs. Numbers of
// inputs are never used twice in the life of a note, so that a cell that is
// taken over keeps its gradient.

// input is an uncertain literal of a cell.
type input struct {
	id     int
	node   int // Node.ID of the literal
	slot   int
	value  eval.Value
	spread eval.Spread
}

// uncertain gives the code of a literal with a spread; x is its value in SI.
func (e *elab) uncertain(l *Literal, u unit.Unit, x float64) eval.Code {
	if e.stating {
		return eval.Num(x)
	}
	if in, ok := e.knownInput(l.ID); ok {
		return in
	}
	s, ok := e.spread(l.Spread, l, u)
	if !ok || e.quiet > 0 {
		return eval.Num(x)
	}
	return e.input(l.ID, eval.Real(x), s)
}

// knownInput is the code of an input that the cell has met before: the body of a
// function is elaborated at each call and has one set of inputs.
func (e *elab) knownInput(node int) (eval.Code, bool) {
	for _, in := range e.c.inputs {
		if in.node == node {
			return eval.Slot(in.slot, in.value.Type()), true
		}
	}
	return eval.Code{}, false
}

// input makes a new input with a slot of its own.
func (e *elab) input(node int, v eval.Value, s eval.Spread) eval.Code {
	in := input{id: e.a.inputs, node: node, slot: e.a.newSlot(), value: v, spread: s}
	e.a.inputs++
	e.a.spreads[in.id] = s
	e.c.inputs = append(e.c.inputs, in)
	e.a.machine.frame.Set(in.slot, v)
	return eval.Slot(in.slot, v.Type())
}

// replaceInputs gives the inputs of a cell that was taken over their slots in the
// frame of this analysis.
func (a *analysis) replaceInputs(c *cell) {
	if len(c.inputs) == 0 {
		return
	}
	c.inputs = slices.Clone(c.inputs)
	for i := range c.inputs {
		in := &c.inputs[i]
		in.slot = a.newSlot()
		a.spreads[in.id] = in.spread
		a.machine.frame.Set(in.slot, in.value)
	}
}

// spread is how far a literal may lie from its value, in SI units. A spread in
// percent is of the value; one in °C is a difference.
func (e *elab) spread(s *Spread, l *Literal, u unit.Unit) (eval.Spread, bool) {
	size := s.Size
	switch {
	case s.Unit == nil || sameUnit(s.Unit, l.Unit):
		if u.Level != nil {
			size = e.levelSpread(l, u, size)
		} else {
			size *= u.Difference().Scale()
		}
	default:
		su, ok := e.unit(s.Unit)
		if !ok {
			return eval.Spread{}, false
		}
		if relative := su.Dim.IsOne() && (u.IsZero() || !u.Dim.IsOne()); relative {
			size = math.Abs(u.ToSI(l.Num.Value)) * size * su.Scale()
		} else if su.Dim.Compatible(u.Dim) && (s.Unit.Text == "%") == (l.Unit != nil && l.Unit.Text == "%") {
			size *= su.Difference().Scale()
		} else if su.Dim.Compatible(u.Dim) {
			e.fault("syntax", l, fmt.Sprintf("%s: percentage points, or percent of the value?", l.Num.Text+" ± …"), "write the tolerance in the unit of the value")
			return eval.Spread{}, false
		} else {
			e.fault("dimension-mismatch", l, fmt.Sprintf("the tolerance is in %s, and the value is not", s.Unit.Text), "write both in one unit, or the tolerance in %")
			return eval.Spread{}, false
		}
	}
	if s.Standard {
		return eval.WithStandard(size), true
	}
	return eval.WithinLimit(size), true
}

// levelSpread turns the tolerance of a level into one of the linear quantity,
// to first order.
func (e *elab) levelSpread(l *Literal, u unit.Unit, size float64) float64 {
	x, _ := e.toSI(l, u)
	up := *l
	up.Num.Value += size
	y, _ := e.toSI(&up, u)
	down := *l
	down.Num.Value -= size
	z, _ := e.toSI(&down, u)
	return math.Max(math.Abs(y-x), math.Abs(x-z))
}

// spreadOver gives a constant parenthesis its spread: (12.0 ± 0.1) kV.
func (e *elab) spreadOver(p *Paren, t typed) typed {
	u := unit.Unit{}
	if p.Unit != nil {
		u, _ = e.unit(p.Unit)
	}
	v, fault := e.a.machine.frame.Run(p.ID, t.code)
	if fault != nil || v.Shape() != eval.Scalar || !v.IsReal() {
		return t
	}
	l := &Literal{Node: p.Node, Num: Numeral{Span: p.Span, Text: sketch(p.X), Value: u.FromSI(v.Re())}, Unit: p.Unit}
	if in, ok := e.knownInput(p.ID); ok {
		t.code = in
		return t
	}
	s, ok := e.spread(p.Spread, l, u)
	if !ok || e.quiet > 0 || e.stating {
		return t
	}
	t.code = e.input(p.ID, v, s)
	return t
}

// sources are the uncertain slots that the code of a cell may read: its own
// inputs, the cells that it needs, and what the functions and regions among
// them read.
func (a *analysis) sources(c *cell) []eval.Uncertain {
	var out []eval.Uncertain
	seen := map[*cell]bool{}
	var visit func(d *cell, whole bool)
	visit = func(d *cell, whole bool) {
		if d == nil || seen[d] {
			return
		}
		seen[d] = true
		if !whole && len(d.grad) > 0 {
			out = append(out, eval.Uncertain{Slot: d.slot, Gradient: d.grad})
		}
		if whole || d.isBody() {
			for _, in := range d.inputs {
				out = append(out, eval.Uncertain{Slot: in.slot, Gradient: eval.Gradient{{Input: in.id, D: one(in.value)}}})
			}
			for _, x := range d.deps {
				if d.view != nil && x != nil {
					x = d.view.cells[x.key]
				}
				visit(x, false)
			}
		}
	}
	visit(c, true)
	visit(c.regime, false)
	return out
}

// isBody reports a cell that is elaborated where it is used, not evaluated
// once: a function, a function property, a region.
func (c *cell) isBody() bool {
	return c.role == RoleFunction || c.role == RoleRegion || c.role == RoleProperty && len(definitionOf(c).Params) > 0
}

func definitionOf(c *cell) *Definition {
	if d, ok := c.tree.(*Definition); ok {
		return d
	}
	return &Definition{}
}

// one is the unit of a value's type: the derivative of an input by itself.
func one(v eval.Value) eval.Value {
	if v.IsReal() {
		return eval.Real(1)
	}
	return eval.Cplx(1)
}

// spreadsOf gives package eval the spread of each input.
func (a *analysis) spreadsOf() eval.Spreads {
	return eval.Spreads{Of: func(i int) eval.Spread { return a.spreads[i] }}
}
