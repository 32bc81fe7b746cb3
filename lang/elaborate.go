package lang

import (
	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
)

// This file is the hardest of the package: one walk over an expression that
// infers what every node carries (infer*.go) and, where that is known, builds
// the code that computes it (compile*.go). Both happen in one walk because the
// body of a function is inferred anew at each call: its parameters have the
// dimensions of the arguments, so the same body has other facts there.
//
// Unknown in, unknown out: a node whose Facts are not Known has no code, and
// whatever is built on it stays unknown without a second finding.

// typed is an expression with what it carries and how to compute it.
type typed struct {
	Facts
	code  eval.Code
	pi    int       // power of π among its plain-number factors, for 2π·Hz
	kinds []kind.ID // kinds of the names that entered, without repetition
	plain bool      // a pure number: literals, π and operations on them only
	lit   *Literal  // the literal itself, for messages and level units
	blind bool      // what it carries is known, its value is not: nothing is evaluated
}

// unknown is the expression about which nothing is known.
func unknown() typed { return typed{} }

// number is a dimensionless real scalar.
func number() Facts { return Facts{Known: true} }

// elab is the elaboration of one cell.
type elab struct {
	a       *analysis
	c       *cell
	scope   *scope
	quiet   int     // > 0 inside a called function's body: nothing is recorded
	want    kind.ID // declared kind of the definition, for level units
	depth   int
	work    int // nodes visited, to bound the inlining of functions
	solves  []*Call
	along   *along
	stating bool   // inside a further member: a spread there is a claim, no input
	whole   Expr   // the member of the chain that is elaborated
	hushed  *Fault // inside a called function: the first fault, which the call tells
}

// scope is a chain of local names.
type scope struct {
	up   *scope
	key  string
	t    typed
	slot int
}

// bind enters a local name with a slot of its own.
func (e *elab) bind(key string, t typed) int {
	slot := e.a.newSlot()
	t.code = eval.Slot(slot, eval.Type{Shape: t.Shape, Complex: t.Complex})
	t.lit, t.plain, t.pi = nil, false, 0
	e.scope = &scope{up: e.scope, key: key, t: t, slot: slot}
	return slot
}

// built completes an expression with its code, or reports what package eval
// found wrong with the shapes.
func (e *elab) built(t typed, at Tree) func(eval.Code, error) typed {
	return func(c eval.Code, err error) typed {
		if err != nil {
			return e.refused(at, err)
		}
		t.code = c
		return t
	}
}

func (e *elab) local(key string) *scope {
	for s := e.scope; s != nil; s = s.up {
		if s.key == key {
			return s
		}
	}
	return nil
}

// fault reports a finding of the cell; inside a called function, whose body is
// judged where it stands, the first one is left for the call to tell.
func (e *elab) fault(rule string, at Tree, message, detail string) {
	e.report(Fault{Rule: rule, Severity: Error, Span: at.Place(), Message: message, Detail: detail})
}

func (e *elab) report(f Fault) {
	switch {
	case e.quiet == 0:
		e.c.fault(f)
	case e.hushed == nil && f.Severity == Error:
		e.hushed = &f
	}
}

// maxWork bounds the nodes that one definition may inline through functions.
const maxWork = 200_000

// expr elaborates an expression.
func (e *elab) expr(x Expr) typed {
	e.work++
	if e.work > maxWork {
		if e.work == maxWork+1 {
			e.c.fault(Fault{
				Rule: "over-budget", Severity: Error, Span: e.c.place(),
				Message: "the functions called here call each other too many times",
				Detail:  "give intermediate results names of their own",
			})
		}
		return unknown()
	}
	t := e.node(x)
	if e.quiet == 0 && x != nil {
		e.c.record(x, t.Facts)
	}
	return t
}

// node dispatches on the kind of expression.
func (e *elab) node(x Expr) typed {
	switch x := x.(type) {
	case *Literal:
		return e.literal(x)
	case *Name:
		return e.name(x)
	case *Member:
		return e.member(x)
	case *Cell:
		return e.cell(x)
	case *Lookup:
		return e.lookup(x)
	case *Unary:
		return e.unary(x)
	case *Binary:
		return e.binary(x)
	case *Paren:
		return e.paren(x)
	case *Bars:
		return e.bars(x)
	case *Triple:
		return e.triple(x)
	case *Call:
		return e.call(x)
	}
	return unknown()
}

// join adds the media and kinds of y to t.
func (t *typed) join(y typed) {
	for _, m := range y.Media {
		t.addMedium(m)
	}
	t.kinds = mergeKinds(t.kinds, y.kinds)
	t.plain = t.plain && y.plain
	t.blind = t.blind || y.blind
}

func (t *typed) addMedium(key string) {
	for _, m := range t.Media {
		if m == key {
			return
		}
	}
	t.Media = append(t.Media[:len(t.Media):len(t.Media)], key)
}

func mergeKinds(a, b []kind.ID) []kind.ID {
	out := a[:len(a):len(a)]
	for _, k := range b {
		found := false
		for _, o := range out {
			found = found || o == k
		}
		if !found {
			out = append(out, k)
		}
	}
	return out
}
