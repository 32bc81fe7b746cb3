package eval

import "slices"

// Let evaluates the arguments, stores them in the slots and then evaluates the
// body: a call of a function of the note, or a shared subexpression. The slots
// are the body's own. Each call counts against the budget.
func Let(node int, slots []int, args []Code, body Code) Code {
	if len(slots) != len(args) || len(args) == 0 {
		return body
	}
	cost, bind := min(body.cost, 1<<20), binder(slots, args)
	c := Code{Type: body.Type}
	if r := body.Real; r != nil {
		c.Real = func(f *Frame) float64 {
			if !f.spend(node, cost) {
				return 0
			}
			bind(f)
			return r(f)
		}
	}
	if v := body.vec; v != nil {
		c.vec = func(f *Frame) vec3 {
			if !f.spend(node, cost) {
				return vec3{}
			}
			bind(f)
			return v(f)
		}
	}
	c.Any = func(f *Frame) Value {
		if !f.spend(node, cost) {
			return zero(body.Type)
		}
		bindAny(f, slots, args)
		return body.Any(f)
	}
	c.info = letInfo(slots, args, body)
	c.slots = max(slotsOf(args...), body.slots, slices.Max(slots)+1)
	c.diff = func(d *differ) (Code, error) { return d.let(node, slots, args, body) }
	return c
}

func letInfo(slots []int, args []Code, body Code) *info {
	n := over(args...)
	n.reads = n.reads.with(body.info.reads.without(slots...))
	n.cost++
	n.nested = n.nested || body.nested
	n.breaks = joinBreaks(n.breaks, letBreaks(slots, args, body))
	return n
}

// binder stores the arguments; up to three real ones without allocation.
func binder(slots []int, args []Code) func(*Frame) {
	for _, a := range args {
		if a.Real == nil {
			return func(f *Frame) { bindAny(f, slots, args) }
		}
	}
	switch len(args) {
	case 1:
		s, a := slots[0], args[0].Real
		return func(f *Frame) { f.slots[s] = Value{x: complex(a(f), 0)} }
	case 2:
		s, t, a, b := slots[0], slots[1], args[0].Real, args[1].Real
		return func(f *Frame) {
			x, y := a(f), b(f)
			f.slots[s], f.slots[t] = Real(x), Real(y)
		}
	case 3:
		s, t, u, a, b, c := slots[0], slots[1], slots[2], args[0].Real, args[1].Real, args[2].Real
		return func(f *Frame) {
			x, y, z := a(f), b(f), c(f)
			f.slots[s], f.slots[t], f.slots[u] = Real(x), Real(y), Real(z)
		}
	}
	return func(f *Frame) { bindAny(f, slots, args) }
}

// bindAny evaluates all arguments before it stores any: an argument may call
// the same function.
func bindAny(f *Frame, slots []int, args []Code) {
	var few [4]Value
	vals := few[:0]
	for _, a := range args {
		vals = append(vals, a.Any(f))
	}
	for i, v := range vals {
		f.slots[slots[i]] = v
	}
}
