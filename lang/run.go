package lang

import (
	"context"
	"fmt"
	"time"

	"inkjoule/lang/eval"
)

// This file runs code: the value of a cell and its uncertainty.

// machine is the frame that a note's cells run on.
type machine struct {
	frame *eval.Frame
	slots int
}

func newMachine(ctx context.Context, slots int) *machine {
	return &machine{frame: eval.NewFrame(ctx, slots, eval.Budget{}), slots: slots}
}

// newSlot takes a slot for a local variable or an input.
func (a *analysis) newSlot() int {
	a.machine.slots++
	return a.machine.slots - 1
}

// outcome is what a run gave.
type outcome struct {
	value               eval.Value
	grad                eval.Gradient
	standard, low, high float64
	fault               *eval.Fault
}

// run evaluates code with its uncertainty: first order, with the correlation
// that comes from shared inputs (JCGM 100:2008, 5.2), and the worst case with
// every input at the limit that does most harm.
func (a *analysis) run(c *cell, node int, code eval.Code) outcome {
	f := a.machine.frame
	b, left := a.allowance()
	if !left {
		return outcome{fault: &eval.Fault{Rule: eval.RuleBudget, Node: node, Message: fmt.Sprintf("the note as a whole has used up its %v", a.total()), Detail: "look for the integrals and sums that take longest; `inkjoule.toml` can raise the budget"}}
	}
	f.Restart(b)
	start := time.Now()
	defer func() { a.spent += time.Since(start) }()
	v, g, fault := eval.Propagate(f, node, code, a.sources(c))
	if fault != nil {
		return outcome{fault: fault}
	}
	o := outcome{value: v}
	if len(g) == 0 || !g.Finite() {
		return o
	}
	o.grad = g
	if v.Shape() == eval.Scalar && v.IsReal() {
		s := a.spreadsOf()
		o.standard = g.Standard(s)
		o.low, o.high = g.WorstCase(v.Re(), s)
	}
	return o
}

// total is what all evaluations of a note may take together.
func (a *analysis) total() time.Duration {
	if t := a.opt.Budget.Time; t > 0 {
		return 5 * t
	}
	return 5 * eval.DefaultTime
}

// allowance is the budget of the next evaluation; false where nothing is left.
func (a *analysis) allowance() (eval.Budget, bool) {
	b := a.opt.Budget
	left := a.total() - a.spent
	if b.Time <= 0 {
		b.Time = eval.DefaultTime
	}
	b.Time = min(b.Time, left)
	return b, left > 0
}

// value runs an expression at once where it reads nothing that varies.
func (e *elab) value(t typed) (eval.Value, bool) {
	if !t.Known || t.blind {
		return eval.Value{}, false
	}
	for s := e.scope; s != nil; s = s.up {
		if s.t.Known && t.code.Reads(s.slot) {
			return eval.Value{}, false
		}
	}
	v, fault := e.a.machine.frame.Run(0, t.code)
	return v, fault == nil
}

// worstCase infers lower(x) and upper(x): the worst-case bounds, as numbers.
func (e *elab) worstCase(c *Call, name string) typed {
	if len(c.Args) != 1 {
		return e.form(c, name+"(x)")
	}
	t := e.expr(c.Args[0])
	if !t.Known || t.blind {
		return t
	}
	if t.Shape != eval.Scalar || t.Complex {
		e.fault("shape-mix", c, name+" takes a real number", "write the magnitude or a component")
		return unknown()
	}
	if _, fixed := e.value(t); !fixed && e.scope != nil {
		e.fault("shape-mix", c, name+" takes an expression without a bound variable", "give it a name of its own first")
		return unknown()
	}
	o := e.a.run(e.c, c.ID, t.code)
	switch {
	case o.fault != nil:
		e.evalFault(o.fault, c)
		t.blind = true
		return t
	case len(o.grad) == 0:
		o.low, o.high = o.value.Re(), o.value.Re()
	}
	t.lit, t.plain = nil, false
	if name == "lower" {
		t.code = eval.Num(o.low)
	} else {
		t.code = eval.Num(o.high)
	}
	return t
}
