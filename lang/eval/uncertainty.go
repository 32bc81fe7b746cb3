package eval

import (
	"math"
	"slices"
)

// Partial is the derivative of a value by one input, of the value's own shape.
// Inputs are numbered by the caller.
type Partial struct {
	Input int
	D     Value
}

// Gradient is the derivative of a value by every input on which it depends, in
// ascending order of input: a row of sensitivity coefficients (JCGM 100:2008,
// 5.1.3).
type Gradient []Partial

// Uncertain is a slot whose value depends on uncertain inputs.
type Uncertain struct {
	Slot     int
	Gradient Gradient
}

// Propagate evaluates the code and its derivative by every input, by the chain
// rule through the slots: exact to first order, with all correlations that come
// from shared inputs. It makes one dual run for each input, or for each
// component of the slots, whichever are fewer. A derivative that is not finite
// (sqrt at 0) is left so; see Gradient.Finite.
func Propagate(f *Frame, node int, c Code, slots []Uncertain) (Value, Gradient, *Fault) {
	v, fault := f.Run(node, c)
	if fault != nil {
		return v, nil, fault
	}
	var used []Uncertain
	for _, u := range slots {
		if c.Reads(u.Slot) && len(u.Gradient) > 0 {
			used = append(used, u)
		}
	}
	if len(used) == 0 {
		return v, nil, nil
	}
	p := &propagation{f: f, node: node, code: c, used: used, inputs: inputsOf(used), value: v}
	defer p.restore()
	g, fault := p.gradient()
	return v, g, fault
}

// propagation is one call of Propagate.
type propagation struct {
	f      *Frame
	node   int
	code   Code
	used   []Uncertain
	inputs []int
	value  Value
	was    []Value
}

// inputsOf is the union of the inputs, ascending.
func inputsOf(us []Uncertain) (ins []int) {
	for _, u := range us {
		for _, p := range u.Gradient {
			ins = append(ins, p.Input)
		}
	}
	slices.Sort(ins)
	return slices.Compact(ins)
}

func (p *propagation) restore() {
	for i, u := range p.used {
		if i < len(p.was) {
			p.f.slots[u.Slot] = p.was[i]
		}
	}
}

func (p *propagation) gradient() (Gradient, *Fault) {
	components := 0
	for _, u := range p.used {
		v := p.f.Get(u.Slot)
		p.was = append(p.was, v)
		n := v.Len()
		if !v.IsReal() {
			n *= 2
		}
		components += n
	}
	if components < len(p.inputs) {
		return p.bySlots()
	}
	return p.byInputs()
}

// byInputs seeds every slot with its derivative by one input at a time.
func (p *propagation) byInputs() (Gradient, *Fault) {
	var g Gradient
	for _, in := range p.inputs {
		for i, u := range p.used {
			p.f.slots[u.Slot] = p.was[i].Primal()
			if d, ok := u.Gradient.by(in); ok {
				p.f.slots[u.Slot] = p.was[i].WithTangent(d)
			}
		}
		d, fault := p.run()
		if fault != nil {
			return nil, fault
		}
		if !isZero(d) {
			g = append(g, Partial{in, d})
		}
	}
	return g, nil
}

// bySlots takes the derivative by each component of each slot (by its real and
// imaginary part: |z| and conj(z) have no complex derivative) and applies the
// chain rule.
func (p *propagation) bySlots() (Gradient, *Fault) {
	sums := map[int]Value{}
	for i, u := range p.used {
		p.f.slots[u.Slot] = p.was[i].Primal()
	}
	for i, u := range p.used {
		v := p.was[i]
		units := []complex128{1}
		if !v.IsReal() {
			units = append(units, 1i)
		}
		for k := range v.Len() {
			for _, e := range units {
				p.f.slots[u.Slot] = v.WithTangent(oneHot(v, k, e))
				d, fault := p.run()
				if fault != nil {
					return nil, fault
				}
				p.spread(sums, u.Gradient, d, k, e)
			}
		}
		p.f.slots[u.Slot] = v.Primal()
	}
	var g Gradient
	for _, in := range p.inputs {
		if d, ok := sums[in]; ok && !isZero(d) {
			g = append(g, Partial{in, d})
		}
	}
	return g, nil
}

// spread adds d·∂(component k)/∂input for every input of the slot.
func (p *propagation) spread(sums map[int]Value, g Gradient, d Value, k int, e complex128) {
	for _, q := range g {
		x := real(q.D.At(k).x)
		if e == 1i {
			x = imag(q.D.At(k).x)
		}
		if x == 0 || isZero(d) {
			continue
		}
		t := mulKernel.each(p.f, p.node, Real(x), d)
		if s, ok := sums[q.Input]; ok {
			t = addKernel.each(p.f, p.node, s, t)
		}
		sums[q.Input] = t
	}
}

// run gives the tangent of a dual run. The value itself is known to have none of
// its faults, so one that comes up now is the tangent's: it has no value.
func (p *propagation) run() (Value, *Fault) {
	v, fault := p.f.RunDual(p.node, p.code)
	switch {
	case fault == nil:
		return v.Tangent(), nil
	case fault.Rule == RuleBudget:
		return Value{}, fault
	}
	p.f.fault, p.f.ok = Fault{}, true
	return mulKernel.each(p.f, p.node, Real(math.NaN()), p.value.Primal()), nil
}

// oneHot is the tangent e in component k of a value like v.
func oneHot(v Value, k int, e complex128) Value {
	if v.typ.Shape == Scalar {
		return Value{typ: v.typ, x: e}
	}
	b := &body{v: make([]complex128, v.Len())}
	b.v[k] = e
	return Value{typ: v.typ, many: b}
}

func isZero(v Value) bool {
	for i := range v.Len() {
		if v.at(i).x != 0 {
			return false
		}
	}
	return true
}

// by is the derivative by one input.
func (g Gradient) by(input int) (Value, bool) {
	i, ok := slices.BinarySearchFunc(g, input, func(p Partial, in int) int { return p.Input - in })
	if !ok {
		return Value{}, false
	}
	return g[i].D, true
}

// Component is the gradient of component k of a value (0 for a scalar) as real
// numbers: of its real part, or of its imaginary part.
func (g Gradient) Component(k int, imaginary bool) Gradient {
	var out Gradient
	for _, p := range g {
		x := p.D.At(k).x
		d := real(x)
		if imaginary {
			d = imag(x)
		}
		if d != 0 {
			out = append(out, Partial{p.Input, Real(d)})
		}
	}
	return out
}

// Finite reports whether every derivative is a finite number; if not, there is
// no first-order uncertainty at this point.
func (g Gradient) Finite() bool {
	for _, p := range g {
		if !p.D.Finite() {
			return false
		}
	}
	return true
}

// Spread is how far an input may lie from its value.
type Spread struct {
	Standard float64 // standard uncertainty u (JCGM 100:2008, 2.3.1)
	Limit    float64 // worst case: the limit as written, or 2u
}

// WithinLimit is the spread of an input known to lie within ±a: a rectangular
// distribution, u = a/sqrt(3) (JCGM 100:2008, 4.3.7).
func WithinLimit(a float64) Spread { return Spread{math.Abs(a) / math.Sqrt(3), math.Abs(a)} }

// WithStandard is the spread of an input of standard uncertainty u.
func WithStandard(u float64) Spread { return Spread{math.Abs(u), 2 * math.Abs(u)} }

// Spreads gives the spread of each input and, where Correlation is not nil, the
// correlation coefficients between inputs.
type Spreads struct {
	Of          func(input int) Spread
	Correlation func(a, b int) float64
}

// Covariance is Σ c_i·c'_j·u_i·u_j·r_ij of two real values that depend on the
// same inputs (JCGM 100:2008, H.2.3, equation (H.9); with g = h the law of
// propagation of uncertainty, 5.2.2, equation (16)).
func Covariance(g, h Gradient, s Spreads) float64 {
	var sum, lost float64
	for _, p := range g {
		up := p.D.Re() * s.Of(p.Input).Standard
		for _, q := range h {
			r := 0.0
			switch {
			case p.Input == q.Input:
				r = 1
			case s.Correlation != nil:
				r = s.Correlation(p.Input, q.Input)
			}
			if r != 0 {
				sum, lost = compensated(sum, lost, up*r*q.D.Re()*s.Of(q.Input).Standard)
			}
		}
	}
	return sum + lost
}

// Standard is the combined standard uncertainty of a real value (JCGM 100:2008,
// 5.1.2 and 5.2.2).
func (g Gradient) Standard(s Spreads) float64 {
	if s.Correlation != nil {
		return math.Sqrt(max(0, Covariance(g, g, s)))
	}
	u := 0.0
	for _, p := range g {
		u = math.Hypot(u, p.D.Re()*s.Of(p.Input).Standard)
	}
	return u
}

// WorstCase gives bounds of a real value to first order: every input at the
// limit that does most harm, Σ |c_i|·a_i.
func (g Gradient) WorstCase(v float64, s Spreads) (lo, hi float64) {
	var sum float64
	for _, p := range g {
		sum += math.Abs(p.D.Re()) * s.Of(p.Input).Limit
	}
	return v - sum, v + sum
}
