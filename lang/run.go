package lang

import (
	"context"

	"inkjoule/lang/eval"
)

// This file runs code: the value of a cell and its uncertainty.

// machine is the frame that a note's cells run on.
type machine struct {
	frame  *eval.Frame
	slots  int
	inputs int // number of uncertain inputs met so far, over all analyses of the note
}

func newMachine(ctx context.Context, slots int) *machine {
	return &machine{frame: eval.NewFrame(ctx, slots, eval.Budget{}), slots: slots}
}

// newSlot takes a slot for a local variable.
func (a *analysis) newSlot() int {
	a.machine.slots++
	return a.machine.slots - 1
}

// outcome is what a run gave.
type outcome struct {
	value               eval.Value
	grad                []float64
	standard, low, high float64
	fault               *eval.Fault
}

// run evaluates code with its uncertainty.
func (a *analysis) run(c *cell, node int, code eval.Code) outcome {
	m := a.machine
	v, fault := m.frame.Run(node, code)
	if fault != nil {
		return outcome{fault: fault}
	}
	return outcome{value: v}
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
