package rules

import (
	"math"
	"math/cmplx"
	"strings"

	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// This file evaluates functions of a note at points of its own choosing, so that
// a rule can tell how much a property varies around the point of use.

// probe evaluates scalar expressions, real or complex, in SI units.
type probe struct {
	note  *lang.Note
	owner *lang.Symbol // medium whose properties come first
	local map[string]complex128
	depth int
}

// deepest bounds how many functions a probe enters one inside another.
const deepest = 32

// functionAt is the value of a function of the note or of a medium; ok is false
// where something in it is no plain scalar, or where the arguments do not fit.
func functionAt(n *lang.Note, fn *lang.Symbol, args ...complex128) (complex128, bool) {
	return probe{note: n}.call(fn, args)
}

func (p probe) call(fn *lang.Symbol, args []complex128) (complex128, bool) {
	d := fn.Def
	if d == nil || len(d.Params) != len(args) || len(d.Members) == 0 || len(d.Pieces) > 0 || p.depth > deepest {
		return 0, false
	}
	in := probe{note: p.note, owner: fn.Owner, local: map[string]complex128{}, depth: p.depth + 1}
	for i, param := range d.Params {
		in.local[lang.CanonicalName(param.Text)] = args[i]
	}
	return in.value(d.Members[0])
}

// value evaluates an expression.
func (p probe) value(x lang.Expr) (complex128, bool) {
	switch x := x.(type) {
	case *lang.Literal:
		v, ok := literalSI(x)
		return complex(v, 0), ok
	case *lang.Name:
		return p.name(lang.CanonicalName(x.Text))
	case *lang.Member:
		return p.member(x)
	case *lang.Paren:
		if x.Unit != nil || x.Spread != nil {
			return 0, false
		}
		return p.value(x.X)
	case *lang.Unary:
		v, ok := p.value(x.X)
		if x.Op == lang.OpSub {
			v = -v
		}
		return v, ok
	case *lang.Bars:
		v, ok := p.value(x.X)
		return complex(cmplx.Abs(v), 0), ok
	case *lang.Binary:
		return p.binary(x)
	case *lang.Lookup:
		return p.reading(x)
	case *lang.Call:
		return p.function(x)
	}
	return 0, false
}

func (p probe) name(key string) (complex128, bool) {
	if v, ok := p.local[key]; ok {
		return v, true
	}
	switch key {
	case "pi":
		return math.Pi, true
	case "j":
		return 1i, true
	}
	if p.owner != nil {
		if s := p.note.Lookup(p.owner.Key + "." + key); s != nil {
			return scalarValue(s)
		}
	}
	return scalarValue(p.note.Lookup(key))
}

// scalarValue is the known value of a name that is a scalar.
func scalarValue(s *lang.Symbol) (complex128, bool) {
	if s == nil || !s.Known || s.Value.Len() != 1 || s.Role == lang.RoleFunction {
		return 0, false
	}
	return s.Value.C(), true
}

// member is a property that the medium states, or eps and mu from their
// relative twins.
func (p probe) member(m *lang.Member) (complex128, bool) {
	o, ok := m.X.(*lang.Name)
	if !ok {
		return 0, false
	}
	key := lang.CanonicalName(o.Text) + "." + lang.CanonicalName(m.Field.Text)
	if s := p.note.Lookup(key); s != nil {
		return scalarValue(s)
	}
	for _, t := range twins {
		if medium, is := strings.CutSuffix(key, "."+t.absolute); is {
			v, ok1 := scalarValue(p.note.Lookup(medium + "." + t.relative))
			k, ok2 := scalarValue(p.note.Lookup(t.constant))
			return v * k, ok1 && ok2
		}
	}
	return 0, false
}

// twins are the absolute properties that follow from relative ones; read only.
var twins = []struct{ absolute, relative, constant string }{{"eps", "eps_r", "eps_0"}, {"mu", "mu_r", "mu_0"}}

// statedProperty is the name with a key, or for a property that the medium does
// not state its relative twin.
func statedProperty(n *lang.Note, key string) *lang.Symbol {
	if s := n.Lookup(key); s != nil {
		return s
	}
	for _, t := range twins {
		if medium, is := strings.CutSuffix(key, "."+t.absolute); is {
			return n.Lookup(medium + "." + t.relative)
		}
	}
	return nil
}

func (p probe) binary(x *lang.Binary) (complex128, bool) {
	a, ok1 := p.value(x.X)
	b, ok2 := p.value(x.Y)
	if !ok1 || !ok2 {
		return 0, false
	}
	switch x.Op {
	case lang.OpAdd:
		return a + b, true
	case lang.OpSub:
		return a - b, true
	case lang.OpMul, lang.OpDot:
		return a * b, true
	case lang.OpDiv:
		return a / b, b != 0
	case lang.OpPow:
		if n := real(b); imag(b) == 0 && n == math.Round(n) && math.Abs(n) <= 8 {
			return wholePower(a, int(n)), a != 0 || n > 0
		}
		return cmplx.Pow(a, b), a != 0
	}
	return 0, false
}

// wholePower avoids the rounding of a general power.
func wholePower(a complex128, n int) complex128 {
	out := complex(1, 0)
	for range n {
		out *= a
	}
	for range -n {
		out /= a
	}
	return out
}

// reading reads a column at a value of another one, between straight rows.
func (p probe) reading(l *lang.Lookup) (complex128, bool) {
	m, ok := l.X.(*lang.Member)
	if !ok {
		return 0, false
	}
	table, y := columnOwner(p.note, m)
	if table == nil {
		return 0, false
	}
	k, ok1 := curveOf(p.note, table.Key, lang.CanonicalName(l.Column.Text), y)
	at, ok2 := p.value(l.Value)
	if !ok1 || !ok2 || !k.reaches(real(at), real(at)) {
		return 0, false
	}
	return complex(k.at(real(at)), 0), true
}

// plainFunctions are the built-in functions that a probe knows; read only.
var plainFunctions = map[string]func(complex128) complex128{
	"sqrt": cmplx.Sqrt, "exp": cmplx.Exp, "ln": cmplx.Log, "log10": cmplx.Log10, "sin": cmplx.Sin, "cos": cmplx.Cos, "tan": cmplx.Tan,
	"atan": cmplx.Atan, "sinh": cmplx.Sinh, "cosh": cmplx.Cosh, "tanh": cmplx.Tanh, "conj": cmplx.Conj,
	"Re":  func(x complex128) complex128 { return complex(real(x), 0) },
	"Im":  func(x complex128) complex128 { return complex(imag(x), 0) },
	"abs": func(x complex128) complex128 { return complex(cmplx.Abs(x), 0) },
}

func (p probe) function(c *lang.Call) (complex128, bool) {
	if len(c.For) > 0 || c.Over != nil || c.Equal != nil || c.Unit != nil {
		return 0, false
	}
	args := make([]complex128, len(c.Args))
	for i, a := range c.Args {
		v, ok := p.value(a)
		if !ok {
			return 0, false
		}
		args[i] = v
	}
	key := lang.CanonicalName(c.Fn.Text)
	if p.owner != nil && c.Of == nil {
		if s := p.note.Lookup(p.owner.Key + "." + key); s != nil {
			return p.call(s, args)
		}
	}
	if s := calledFunction(p.note, c); s != nil {
		return p.call(s, args)
	}
	if f, ok := plainFunctions[c.Fn.Text]; ok && len(args) == 1 && c.Of == nil {
		return f(args[0]), true
	}
	return 0, false
}

// logSlope is (x/y)·dy/dx of the real part of a function of one argument at x;
// ok is false where the function cannot be read there or is zero.
func logSlope(n *lang.Note, fn *lang.Symbol, x float64) (float64, bool) {
	const step = 1e-4
	mid, ok := functionAt(n, fn, complex(x, 0))
	lo, ok1 := functionAt(n, fn, complex(x*(1-step), 0))
	hi, ok2 := functionAt(n, fn, complex(x*(1+step), 0))
	if !ok || !ok1 || !ok2 || real(mid) == 0 {
		return 0, false
	}
	return (real(hi) - real(lo)) / (2 * step * real(mid)), true
}

// varying is a place where a value is read off: a property or function called
// with one argument, or a reading of a table.
type varying struct {
	call  *lang.Call   // of a function, or nil
	read  *lang.Lookup // of a table, or nil
	fn    *lang.Symbol // the function
	facts lang.Facts   // what is read
	over  lang.Facts   // the argument
	owner *lang.Symbol // medium that the statement belongs to
}

// point evaluates the argument.
func (v varying) point(n *lang.Note) (float64, bool) {
	p := probe{note: n, owner: v.owner}
	x := lang.Expr(nil)
	if v.call != nil {
		x = v.call.Args[0]
	} else {
		x = v.read.Value
	}
	at, ok := p.value(x)
	return real(at), ok && imag(at) == 0
}

// slope is (x/y)·dy/dx at the point.
func (v varying) slope(n *lang.Note) (float64, bool) {
	x, ok := v.point(n)
	if !ok || x == 0 {
		return 0, false
	}
	if v.call != nil {
		return logSlope(n, v.fn, x)
	}
	m, ok := v.read.X.(*lang.Member)
	if !ok {
		return 0, false
	}
	table, y := columnOwner(n, m)
	if table == nil {
		return 0, false
	}
	k, ok := curveOf(n, table.Key, lang.CanonicalName(v.read.Column.Text), y)
	if !ok {
		return 0, false
	}
	return k.logSlope(x)
}

// logSlope is (x/y)·dy/dx of the rows around x.
func (k curve) logSlope(x float64) (float64, bool) {
	y := k.at(x)
	for i := 1; i < len(k.x); i++ {
		if k.x[i-1] <= x && x <= k.x[i] && y != 0 {
			return (k.y[i] - k.y[i-1]) / (k.x[i] - k.x[i-1]) * x / y, true
		}
	}
	return 0, false
}

// variesOver lists the readings that go into a name: of functions with one
// argument of the kind, and of tables at a value of the kind. It looks into the
// names that enter tells.
func variesOver(n *lang.Note, s *lang.Symbol, k kind.ID, enter func(*lang.Symbol) bool) []varying {
	seek := &varySeeker{note: n, kind: k, enter: enter, seen: map[string]bool{}}
	seek.symbol(s)
	return seek.found
}

type varySeeker struct {
	note  *lang.Note
	kind  kind.ID
	enter func(*lang.Symbol) bool
	seen  map[string]bool
	found []varying
}

func (v *varySeeker) symbol(s *lang.Symbol) {
	if s == nil || s.Stmt == nil || v.seen[s.Key] {
		return
	}
	v.seen[s.Key] = true
	for _, x := range definedBy(s) {
		v.expr(s, x)
	}
}

// expr looks at an expression of the definition of s. What stands under a
// derivative is not read: its slope is taken there.
func (v *varySeeker) expr(s *lang.Symbol, x lang.Expr) {
	d := &dependence{note: v.note}
	lang.Walk(x, func(t lang.Tree) bool {
		switch t := t.(type) {
		case *lang.Call:
			if t.Fn.Text == "derivative" {
				return false
			}
			if fn := calledIn(v.note, s, t); fn != nil && len(t.Args) == 1 {
				v.add(s, t, t.Args[0], varying{call: t, fn: fn})
			}
		case *lang.Lookup:
			v.add(s, t, t.Value, varying{read: t})
			return false
		}
		for _, key := range d.names(s, t) {
			if next := statedProperty(v.note, key); next != nil && v.enter(next) {
				v.symbol(next)
			}
		}
		return true
	})
}

// calledIn is the function that a call in the definition of s names: siblings
// come first.
func calledIn(n *lang.Note, s *lang.Symbol, c *lang.Call) *lang.Symbol {
	if s.Owner != nil && c.Of == nil {
		if fn := n.Lookup(s.Owner.Key + "." + lang.CanonicalName(c.Fn.Text)); fn != nil {
			return fn
		}
	}
	return calledFunction(n, c)
}

// add keeps a reading whose argument is of the kind.
func (v *varySeeker) add(s *lang.Symbol, whole, argument lang.Expr, found varying) {
	f, ok := v.note.FactsOf(s.Stmt, argument)
	if !ok || !isOf(f, v.kind) {
		return
	}
	found.facts, _ = v.note.FactsOf(s.Stmt, whole)
	if roleOf(found.facts) == roleNumber {
		found.facts = s.Facts // a plain number is what it is declared to be
	}
	found.over, found.owner = f, s.Owner
	v.found = append(v.found, found)
}
