package lang

import (
	"fmt"
	"strings"
	"sync"

	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file infers calls: functions of the note, built-in functions and what
// dimensions those take and give.

// call infers a function call or a form that binds a variable.
func (e *elab) call(c *Call) typed {
	if c.Of != nil {
		return e.propertyCall(c)
	}
	key := CanonicalName(c.Fn.Text)
	if o := e.c.owner; o != nil && o.role == RoleMedium && len(e.a.propertyCells(o.key, key)) > 0 {
		return e.mediumCall(c, o)
	}
	if f := e.a.cells[key]; f != nil && f.role == RoleFunction {
		e.use(f.key, c.Fn.Span)
		return e.applied(c, f)
	}
	if form, ok := e.binding(c, c.Fn.Text); ok {
		return form
	}
	sig, ok := signatures()[c.Fn.Text]
	if !ok {
		return e.unknownFunction(c)
	}
	xs := make([]typed, len(c.Args))
	for i, a := range c.Args {
		xs[i] = e.expr(a)
		if !xs[i].Known {
			for _, rest := range c.Args[i+1:] {
				e.expr(rest)
			}
			return unknown()
		}
	}
	if !e.arity(c, sig, len(xs)) {
		return unknown()
	}
	return e.builtin(c, sig, xs)
}

// signatures are the built-in functions by name.
var signatures = sync.OnceValue(func() map[string]eval.Signature {
	m := map[string]eval.Signature{}
	for _, s := range eval.Builtins() {
		m[s.Name] = s
	}
	return m
})

// FunctionNames are the names of the built-in functions and of the forms that
// bind a variable.
func FunctionNames() []string {
	out := []string{"integral", "derivative", "solve", "loop", "assembly_energy", "potential", "lower", "upper"}
	for n := range signatures() {
		out = append(out, n)
	}
	return sorted(out)
}

// arity checks the number of arguments; where one more than fits was written,
// a decimal comma may be the cause.
func (e *elab) arity(c *Call, sig eval.Signature, n int) bool {
	if n >= sig.Min && (sig.Max < 0 || n <= sig.Max) {
		return true
	}
	detail := fmt.Sprintf("write %s(%s)", sig.Name, strings.Join(sig.Params, ", "))
	if sig.Max >= 0 && n > sig.Max {
		detail += "; was a decimal comma written? numbers take a decimal point"
	}
	e.fault("syntax", c, fmt.Sprintf("%s takes %d %s, and %d %s given", sig.Name, sig.Min, plural("argument", sig.Min), n, areOrIs(n)), detail)
	return false
}

func areOrIs(n int) string {
	if n == 1 {
		return "is"
	}
	return "are"
}

// builtin infers a built-in function of known arguments.
func (e *elab) builtin(c *Call, sig eval.Signature, xs []typed) typed {
	t := typed{Facts: Facts{Known: true}, plain: true}
	codes := make([]eval.Code, len(xs))
	for i, x := range xs {
		codes[i] = x.code
		t.join(x)
	}
	if !e.takes(c, sig, xs) {
		return unknown()
	}
	give(sig, xs, &t)
	t = e.built(t, c)(eval.Builtin(c.Fn.Text, c.ID, codes))
	if !t.Known {
		return t
	}
	t.Shape, t.Complex = t.code.Type.Shape, t.code.Type.Complex
	if c.Unit != nil {
		return e.withUnit(c, t, c.Unit)
	}
	return t
}

// give sets what a built-in function gives.
func give(sig eval.Signature, xs []typed, t *typed) {
	x := xs[0]
	switch sig.Gives {
	case eval.GivesAngle:
		t.Dim[unit.Angle] = unit.Whole(1)
	case eval.GivesSame:
		t.Dim, t.Kind, t.KindBy = x.Dim, x.Kind, min(x.KindBy, Inferred)
		t.Qualifier, t.QualBy, t.Absolute = x.Qualifier, x.QualBy, x.Absolute
	case eval.GivesProduct:
		t.Dim, t.pi = cyclesToAngle(x.Dim.Mul(xs[1].Dim), x.pi+xs[1].pi)
		t.Kind, t.KindBy = ingredientKind(t.Dim, t.kinds)
		if sig.Name == "cross" {
			t.Kind, t.KindBy = crossKind(x, xs[1], t.Dim)
		}
		t.Qualifier, t.QualBy = productQualifier(OpMul, x, xs[1])
	case eval.GivesSqrt:
		giveRoot(x, unit.NewRat(1, 2), t)
	case eval.GivesCbrt:
		giveRoot(x, unit.NewRat(1, 3), t)
	case eval.GivesInverse:
		t.Dim = x.Dim.Pow(unit.Whole(-1))
	case eval.GivesCube:
		t.Dim = x.Dim.Pow(unit.Whole(3))
	case eval.GivesLength:
		t.Dim[unit.Length] = unit.Whole(1)
	}
}

func giveRoot(x typed, p unit.Rat, t *typed) {
	t.Dim = x.Dim.Pow(p)
	t.Kind, t.KindBy = powerKind(x, t.Dim, p, true)
	t.Qualifier, t.QualBy = powerQualifier(x, p, true)
}

// refused reports what package eval found wrong with shapes.
func (e *elab) refused(at Tree, err error) typed {
	msg, detail := err.Error(), ""
	if s, ok := err.(*eval.ShapeError); ok {
		msg, detail = s.Message, s.Detail
	}
	e.fault("shape-mix", at, msg, detail)
	return unknown()
}

// takes checks the dimensions of the arguments.
func (e *elab) takes(c *Call, sig eval.Signature, xs []typed) bool {
	same := 0
	for i, x := range xs {
		switch sig.Takes[min(i, len(sig.Takes)-1)] {
		case eval.TakesNumber, eval.TakesAngle, eval.TakesWhole:
			if !x.Dim.IsOne() {
				e.fault("dimensioned-argument", c.Args[i],
					fmt.Sprintf("%s takes a plain number, and this is %s", c.Fn.Text, describe(x.Facts)), "divide it by a reference value of the same unit")
				return false
			}
		case eval.TakesSame:
			same = i + 1
		}
	}
	return same < 2 || e.sameDimension(c, xs, same)
}

// sameDimension wants one dimension for the first n arguments; a literal 0
// fits every dimension.
func (e *elab) sameDimension(c *Call, xs []typed, n int) bool {
	ref := 0
	for ref < n-1 && isZero(c.Args[ref]) {
		ref++
	}
	for i := range xs[:n] {
		if !isZero(c.Args[i]) && !xs[i].Dim.Compatible(xs[ref].Dim) {
			e.fault("dimension-mismatch", c.Args[i],
				fmt.Sprintf("the arguments of %s have one unit: %s stands beside %s", c.Fn.Text, describe(xs[i].Facts), describe(xs[ref].Facts)), "")
			return false
		}
	}
	xs[0].Dim, xs[0].Kind, xs[0].KindBy = xs[ref].Dim, xs[ref].Kind, xs[ref].KindBy
	return true
}

// unknownFunction reports a name that is no function.
func (e *elab) unknownFunction(c *Call) typed {
	for _, a := range c.Args {
		e.expr(a)
	}
	if o := e.a.cells[CanonicalName(c.Fn.Text)]; o != nil {
		if o.sym.Facts.Known || o.role != RoleQuantity {
			e.fault("unknown-function", &c.Fn, fmt.Sprintf("%s is a %s, not a function", c.Fn.Text, roleName(o.role)), fmt.Sprintf("to multiply, write %s*(…)", c.Fn.Text))
		}
		return unknown()
	}
	detail := ""
	if n := nearest(c.Fn.Text, FunctionNames()); n != "" {
		detail = fmt.Sprintf("did you mean %s?", n)
	}
	e.fault("unknown-function", &c.Fn, fmt.Sprintf("there is no function %s", c.Fn.Text), detail)
	return unknown()
}

// withUnit multiplies a constant parenthesis, vector or tensor by its unit.
func (e *elab) withUnit(at Tree, t typed, p *UnitPhrase) typed {
	u, ok := e.unit(p)
	switch {
	case !ok:
		return unknown()
	case !t.Dim.IsOne():
		e.fault("dimension-mismatch", at, fmt.Sprintf("a unit follows %s", describe(t.Facts)), "a unit can follow only a parenthesis of plain numbers")
		return unknown()
	case u.Level != nil || u.Affine():
		e.fault("syntax", at, fmt.Sprintf("%s cannot follow a parenthesis", p.Text), "write the number and its unit together")
		return unknown()
	}
	t.Dim, t.plain, t.lit = u.Dim, false, nil
	return e.built(t, at)(eval.Mul(at.Index(), t.code, eval.Num(u.Scale())))
}

// applied infers a call of a function of the note: its body, with its
// parameters bound to the arguments.
func (e *elab) applied(c *Call, f *cell) typed {
	d, ok := f.tree.(*Definition)
	xs := make([]typed, len(c.Args))
	known := ok && !f.cyclic
	for i, a := range c.Args {
		xs[i] = e.expr(a)
		known = known && xs[i].Known
	}
	if !known || e.depth > maxCallDepth {
		return unknown()
	}
	if len(xs) != len(d.Params) {
		e.fault("syntax", c, fmt.Sprintf("%s takes %d %s, and %d are given", c.Fn.Text, len(d.Params), plural("argument", len(d.Params)), len(xs)), "")
		return unknown()
	}
	return e.instance(c, f, d, xs)
}

// maxCallDepth bounds calls inside calls.
const maxCallDepth = 100

// instance elaborates the body of a function for one call.
func (e *elab) instance(c *Call, f *cell, d *Definition, xs []typed) typed {
	slots, codes := make([]int, len(xs)), make([]eval.Code, len(xs))
	inner := &elab{a: f.home(e.a), c: f, quiet: 1, depth: e.depth + 1, work: e.work}
	blind := false
	for i, p := range d.Params {
		codes[i] = xs[i].code
		slots[i] = inner.bind(CanonicalName(p.Text), xs[i])
		blind = blind || xs[i].blind
	}
	e.domain(c, f, d, xs)
	t := inner.body(d)
	e.work = inner.work
	if !t.Known {
		e.cannotApply(c, f, inner.hushed)
		return t
	}
	t.code = eval.Let(c.ID, slots, codes, t.code)
	t.blind, t.lit, t.plain = t.blind || blind, nil, false
	return f.declaredOver(t)
}

// cannotApply tells at the call why the body of a function has no value with these
// arguments, unless the function is told to be wrong by itself.
func (e *elab) cannotApply(c *Call, f *cell, why *Fault) {
	if why == nil || len(f.faults) > 0 {
		return
	}
	e.fault(why.Rule, c, fmt.Sprintf("with these arguments %s has no value: %s", sketch(c), why.Message), why.Detail)
}

// declaredOver puts what a function declares over what its body gives.
func (c *cell) declaredOver(t typed) typed {
	s := c.sym.Facts
	if s.Kind != 0 && s.KindBy >= Inferred && s.Kind.Dim().Compatible(t.Dim) {
		t.Kind, t.KindBy, t.kinds = s.Kind, Declared, []kind.ID{s.Kind}
		t.Dim = absorb(s.Kind, t.Dim)
	}
	if s.Qualifier != kind.Unqualified {
		t.Qualifier, t.QualBy = s.Qualifier, s.QualBy
	}
	for _, m := range s.Media {
		t.addMedium(m)
	}
	return t
}

// list writes "a, b and c".
func list(names []string) string {
	if len(names) < 2 {
		return strings.Join(names, "")
	}
	return strings.Join(names[:len(names)-1], ", ") + " and " + names[len(names)-1]
}

func plural(word string, n int) string {
	if n == 1 {
		return word
	}
	return word + "s"
}

// propertyCall infers mica.eps_r(T): a property that is a function, stated or
// derived from one that is.
func (e *elab) propertyCall(c *Call) typed {
	n, ok := c.Of.(*Name)
	medium, through := e.ownerOf(c.Of)
	if ok {
		medium = e.a.cells[CanonicalName(n.Text)]
	}
	switch {
	case through && medium.role == RoleMedium:
		return e.mediumCall(c, medium)
	case !ok:
		e.expr(c.Of)
		e.fault("unknown-function", &c.Fn, fmt.Sprintf("%s has no function %s", sketch(c.Of), c.Fn.Text), "")
		return unknown()
	case medium == nil:
		e.unknownName(n, n.Text, "unknown-name")
		return unknown()
	case medium.role == RoleNote:
		return e.foreignCall(c, medium)
	case medium.role != RoleMedium:
		e.fault("unknown-function", &c.Fn, fmt.Sprintf("%s is a %s and has no function %s", n.Text, roleName(medium.role), c.Fn.Text), "")
		return unknown()
	}
	return e.mediumCall(c, medium)
}

// mediumCall calls a property of a medium that is a function.
func (e *elab) mediumCall(c *Call, medium *cell) typed {
	if c.Of != nil {
		e.use(medium.key, c.Of.Place())
	}
	field := CanonicalName(c.Fn.Text)
	if f := e.a.cells[medium.key+"."+field]; f != nil {
		return e.applyProperty(c, medium, f)
	}
	for _, d := range derivations(field) {
		if f := e.a.cells[medium.key+"."+d.from]; f != nil {
			if t := e.applyProperty(c, medium, f); t.Known {
				return e.derive(t, d, field, c)
			}
			return unknown()
		}
	}
	return e.unknownProperty(&Member{Node: c.Node, X: c.Of, Field: Ident(c.Fn)}, medium)
}

// applyProperty calls a property, which must be a function.
func (e *elab) applyProperty(c *Call, medium, f *cell) typed {
	e.use(f.key, c.Fn.Span)
	d, ok := f.tree.(*Definition)
	if !ok || len(d.Params) == 0 {
		e.fault("unknown-function", &c.Fn, fmt.Sprintf("%s is a value, not a function", f.title()), "leave the parenthesis out, or state the property as a function")
		return unknown()
	}
	t := e.applied(c, f)
	t.addMedium(medium.key)
	return t
}
