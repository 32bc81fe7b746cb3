package eval

import "slices"

// Code is a compiled expression. The zero Code is not valid.
type Code struct {
	Type Type
	// Real evaluates a real number without allocating and without derivatives;
	// nil unless Type is a real number.
	Real func(*Frame) float64
	// Any evaluates a value of any type, with its tangent.
	Any func(*Frame) Value

	vec   func(*Frame) vec3 // Real's counterpart for real vectors, or nil
	slots int               // how many slots a frame needs
	*info
}

// info is what is known of a Code at compile time. It is shared and not
// changed once built.
type info struct {
	reads  reads
	cost   int64  // closures run by one evaluation, loops and calls counted once
	konst  *Value // the value of a constant, else nil
	slot   int    // the slot that it reads, if it is nothing but a slot; else -1
	null   bool   // known to be zero
	nested bool   // holds integrals: it is known no better than they are
	breaks []breaks
	diff   func(*differ) (Code, error)
}

// vec3 is a real vector in registers.
type vec3 struct{ x, y, z float64 }

// reads is the set of slots that a Code reads, sorted; all stands for a set too
// large to be worth keeping.
type reads struct {
	slots []int
	all   bool
}

const maxReads = 64

func (r reads) has(slot int) bool {
	if r.all {
		return true
	}
	_, found := slices.BinarySearch(r.slots, slot)
	return found
}

// with is the union; it shares storage where one set holds the other.
func (r reads) with(s reads) reads {
	switch {
	case r.all || len(s.slots) == 0 && !s.all:
		return r
	case s.all || len(r.slots) == 0:
		return s
	}
	u := append(slices.Clone(r.slots), s.slots...)
	slices.Sort(u)
	u = slices.Compact(u)
	if len(u) > maxReads {
		return reads{all: true}
	}
	return reads{slots: u}
}

// without removes bound slots.
func (r reads) without(slots ...int) reads {
	if r.all || !slices.ContainsFunc(slots, r.has) {
		return r
	}
	return reads{slots: slices.DeleteFunc(slices.Clone(r.slots), func(s int) bool {
		return slices.Contains(slots, s)
	})}
}

// Reads reports whether the code may read the slot.
func (c Code) Reads(slot int) bool { return c.info.reads.has(slot) }

// Constant is the value of code that reads nothing, and whether it is that.
func (c Code) Constant() (Value, bool) {
	if c.konst == nil {
		return Value{}, false
	}
	return *c.konst, true
}

// number is the constant real number that the code is.
func (c Code) number() (float64, bool) {
	if c.konst == nil || !c.Type.IsReal() {
		return 0, false
	}
	return real(c.konst.x), true
}

// Const is a constant; its tangent is dropped.
func Const(v Value) Code {
	v = v.Primal()
	c := Code{Type: v.typ, Any: func(*Frame) Value { return v }}
	c.info = &info{cost: 1, konst: &v, slot: -1}
	switch v.typ {
	case Type{}:
		x := real(v.x)
		c.Real = func(*Frame) float64 { return x }
	case Type{Shape: Vector}:
		w := v.vec3()
		c.vec = func(*Frame) vec3 { return w }
	}
	return c
}

// Num is the constant real number x.
func Num(x float64) Code { return Const(Real(x)) }

// Slot reads slot i, which must hold a value of type t whenever it runs.
func Slot(i int, t Type) Code {
	c := Code{Type: t, Any: func(f *Frame) Value { return f.slots[i] }, slots: i + 1}
	c.info = &info{cost: 1, slot: i, reads: reads{slots: []int{i}}}
	switch t {
	case Type{}:
		c.Real = func(f *Frame) float64 { return real(f.slots[i].x) }
	case Type{Shape: Vector}:
		c.vec = func(f *Frame) vec3 { return f.slots[i].vec3() }
	}
	c.diff = func(d *differ) (Code, error) { return unit(t) } // of calls it for slot i only
	return c
}

func (v Value) vec3() vec3 {
	if v.many == nil {
		return vec3{}
	}
	return vec3{real(v.many.v[0]), real(v.many.v[1]), real(v.many.v[2])}
}

// over starts the info of a code that evaluates its arguments once each.
func over(args ...Code) *info {
	n := &info{cost: 1, slot: -1}
	for _, a := range args {
		n.reads = n.reads.with(a.info.reads)
		n.cost = min(n.cost+a.cost, 1<<40)
		n.breaks = joinBreaks(n.breaks, a.breaks)
		n.nested = n.nested || a.nested
	}
	return n
}

func slotsOf(args ...Code) (n int) {
	for _, a := range args {
		n = max(n, a.slots)
	}
	return n
}

// build completes a code from its general closure and its fast one. Any takes
// the fast path whenever no tangents are live. Constant arguments are folded
// unless they fault, which is then left to each run.
func build(c Code, args ...Code) Code {
	c.info = over(args...)
	c.slots = slotsOf(args...)
	general := c.Any
	switch fast, vec := c.Real, c.vec; {
	case fast != nil:
		c.Any = func(f *Frame) Value {
			if f.dual {
				return general(f)
			}
			return Value{x: complex(fast(f), 0)}
		}
	case vec != nil:
		c.Any = func(f *Frame) Value {
			if f.dual {
				return general(f)
			}
			return vec(f).value()
		}
	}
	if folded, ok := fold(c, args); ok {
		return folded
	}
	return c
}

func (v vec3) value() Value { return Vec(v.x, v.y, v.z) }

func fold(c Code, args []Code) (Code, bool) {
	for _, a := range args {
		if a.konst == nil {
			return Code{}, false
		}
	}
	f := &Frame{ok: true, budget: Budget{Memory: 1 << 24}, chunk: 1 << 20}
	v := c.Any(f)
	if !f.ok || !v.Finite() {
		return Code{}, false
	}
	return Const(v), true
}
