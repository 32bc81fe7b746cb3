package eval

import (
	"context"
	"math"
	"time"
)

// Budget limits an evaluation. A zero field takes the default.
type Budget struct {
	Steps  int64         // operations, counted wherever there is a loop or a call; default 5e8, about a second
	Memory int64         // bytes of the largest list; default 256 MiB
	Time   time.Duration // default DefaultTime
}

// DefaultTime is what one evaluation may take where nothing else is said.
const DefaultTime = 2 * time.Second

// Filled is the budget with the defaults in the place of zero fields.
func (b Budget) Filled() Budget {
	if b.Steps <= 0 {
		b.Steps = 5e8
	}
	if b.Memory <= 0 {
		b.Memory = 256 << 20
	}
	if b.Time <= 0 {
		b.Time = DefaultTime
	}
	return b
}

// Frame holds what a Code runs on. It belongs to one goroutine.
type Frame struct {
	slots []Value
	dual  bool // tangents are live: the real fast path must not be taken
	ok    bool // no fault yet

	ctx      context.Context
	deadline time.Time
	budget   Budget
	chunk    int64 // steps until the next look at the clock
	steps    int64 // steps left after the chunk

	fault    Fault
	forgiven Fault // the last fault that an integrand had at a single point
	level    int   // workspaces in use
	depth    int   // nested integrals
	marks    []mark
	curves   map[[4]any]*prepared
	roots    map[int]int // nodes of equations with more than one root
	work     []*workspace
}

// chunkSteps is how many steps pass between two looks at clock and context:
// some 50 µs.
const chunkSteps = 1 << 14

// NewFrame makes a frame of n slots, all zero. The clock of the budget starts
// now.
func NewFrame(ctx context.Context, n int, b Budget) *Frame {
	f := &Frame{slots: make([]Value, n), ctx: ctx, budget: b}
	f.Restart(b)
	return f
}

// Restart clears the fault and starts a new budget; slots stay.
func (f *Frame) Restart(b Budget) {
	b = b.Filled()
	f.budget, f.steps = b, b.Steps
	f.chunk, f.deadline = 0, time.Now().Add(b.Time)
	f.fault, f.ok = Fault{}, true
}

// Set puts a value, with its tangent if it has one, into slot i. Slots beyond
// the end are added.
func (f *Frame) Set(i int, v Value) {
	for i >= len(f.slots) {
		f.slots = append(f.slots, Value{})
	}
	f.slots[i] = v
}

// Get is the value of slot i, zero beyond the end.
func (f *Frame) Get(i int) Value {
	if i < 0 || i >= len(f.slots) {
		return Value{}
	}
	return f.slots[i]
}

// Fault is the first fault since the last Run, or nil.
func (f *Frame) Fault() *Fault {
	if f.ok {
		return nil
	}
	ft := f.fault
	return &ft
}

// Run evaluates without derivatives. The result of a faulting run is the zero
// Value. A result that is not finite is a fault of the given node.
func (f *Frame) Run(node int, c Code) (Value, *Fault) { return f.run(node, c, false) }

// RunDual evaluates with derivatives along the tangents of the slots.
func (f *Frame) RunDual(node int, c Code) (Value, *Fault) { return f.run(node, c, true) }

func (f *Frame) run(node int, c Code, dual bool) (Value, *Fault) {
	f.fault, f.forgiven, f.ok = Fault{}, Fault{}, true
	f.level, f.depth, f.marks = 0, 0, f.marks[:0]
	f.dual = dual
	if c.slots > len(f.slots) {
		f.Set(c.slots-1, Value{})
	}
	v := c.Any(f)
	f.dual = false
	if !dual {
		v = v.Primal()
	}
	if f.ok && !v.Finite() {
		f.fail(node, RuleBudget, "the value is beyond the range of numbers (1.8e308)",
			"look for an exponent or an argument of exp that is too large")
	}
	if !f.ok {
		return Value{}, f.Fault()
	}
	return v, nil
}

// fail records the first fault.
func (f *Frame) fail(node int, rule, message, detail string) {
	if f.ok {
		f.fault = Fault{Rule: rule, Node: node, Message: message, Detail: detail}
		f.ok = false
	}
}

// spend takes n steps from the budget and reports whether to go on.
func (f *Frame) spend(node int, n int64) bool {
	f.chunk -= n
	if f.chunk >= 0 {
		return f.ok
	}
	return f.refill(node)
}

// refill accounts for the chunk that was used up and looks at the clock.
func (f *Frame) refill(node int) bool {
	f.steps += f.chunk // the part by which the chunk was overdrawn
	f.chunk = 0
	switch {
	case !f.ok:
		return false
	case f.steps <= 0:
		f.fail(node, RuleBudget, "the evaluation takes too many steps",
			"shorten the range, or split the calculation")
	case f.ctx != nil && f.ctx.Err() != nil:
		f.fail(node, RuleBudget, "the evaluation was stopped", "")
	case time.Now().After(f.deadline):
		f.fail(node, RuleBudget, "the evaluation takes too long",
			"shorten the range, or split the calculation")
	}
	if !f.ok {
		f.chunk = math.MinInt64 / 2 // every further step comes here
		return false
	}
	f.chunk = min(chunkSteps, f.steps)
	f.steps -= f.chunk
	return true
}

// reserve allows for a list of n cells: its size against the memory budget, its
// making against the steps. Lists are garbage soon after, so sizes do not add up.
func (f *Frame) reserve(node, n int) bool {
	if int64(n)*16 > f.budget.Memory {
		f.fail(node, RuleBudget, "a list of this evaluation takes too much memory", "shorten the list")
	}
	return f.spend(node, int64(n))
}
