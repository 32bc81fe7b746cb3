package lang

import (
	"fmt"
	"strings"

	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file infers calls: functions of the note, built-in functions and what
// dimensions those take and give.

// call infers a function call or a form that binds a variable.
func (e *elab) call(c *Call) typed {
	key := CanonicalName(c.Fn.Text)
	if f := e.a.cells[key]; f != nil && f.role == RoleFunction {
		e.use(f.key, c.Fn.Span)
		return e.applied(c, f)
	}
	if form, ok := e.binding(c, c.Fn.Text); ok {
		return form
	}
	rule, ok := builtinRules[c.Fn.Text]
	if !ok {
		return e.unknownFunction(c)
	}
	xs := make([]typed, len(c.Args))
	for i, a := range c.Args {
		xs[i] = e.expr(a)
		if xs[i].blindOrUnknown() {
			for _, rest := range c.Args[i+1:] {
				e.expr(rest)
			}
			return unknown()
		}
	}
	if !e.arity(c, rule, len(xs)) {
		return unknown()
	}
	return e.builtin(c, rule, xs)
}

// blindOrUnknown reports an operand that nothing can be built on.
func (t typed) blindOrUnknown() bool { return !t.Known }

// dimRule tells which dimensions a built-in function takes and gives.
type dimRule struct {
	args [2]int // least and greatest number of arguments
	take byte   // '1' plain numbers or angles, 's' one dimension for all, '*' anything, 't' tensor·vector functions judged apart
	give func(e *elab, c *Call, xs []typed, t *typed) bool
}

func giveOne(_ *elab, _ *Call, _ []typed, t *typed) bool { return true }

func giveAngle(_ *elab, _ *Call, _ []typed, t *typed) bool {
	t.Dim[unit.Angle] = unit.Whole(1)
	return true
}

// giveSame keeps what the first argument carries.
func giveSame(_ *elab, _ *Call, xs []typed, t *typed) bool {
	t.Dim, t.Kind, t.KindBy = xs[0].Dim, xs[0].Kind, min(xs[0].KindBy, Inferred)
	t.Qualifier, t.QualBy, t.Absolute = xs[0].Qualifier, xs[0].QualBy, xs[0].Absolute
	return true
}

// giveRoot gives the power 1/n of the dimension.
func giveRoot(n int64) func(*elab, *Call, []typed, *typed) bool {
	return func(_ *elab, _ *Call, xs []typed, t *typed) bool {
		p := unit.NewRat(1, n)
		t.Dim = xs[0].Dim.Pow(p)
		t.Kind, t.KindBy = powerKind(xs[0], t.Dim, p, true)
		t.Qualifier, t.QualBy = powerQualifier(xs[0], p, true)
		return true
	}
}

func givePower(n int) func(*elab, *Call, []typed, *typed) bool {
	return func(_ *elab, _ *Call, xs []typed, t *typed) bool {
		t.Dim = xs[0].Dim.Pow(unit.Whole(n))
		return true
	}
}

func giveLength(_ *elab, _ *Call, _ []typed, t *typed) bool {
	t.Dim[unit.Length] = unit.Whole(1)
	return true
}

// giveProduct is for dot and cross.
func giveProduct(_ *elab, _ *Call, xs []typed, t *typed) bool {
	t.Dim, t.pi = cyclesToAngle(xs[0].Dim.Mul(xs[1].Dim), xs[0].pi+xs[1].pi)
	t.Kind, t.KindBy = ingredientKind(t.Dim, t.kinds)
	t.Qualifier, t.QualBy = productQualifier(OpMul, xs[0], xs[1])
	return true
}

// giveFirst keeps the first argument's dimension, whatever the others are.
func giveFirst(e *elab, c *Call, xs []typed, t *typed) bool { return giveSame(e, c, xs, t) }

// builtinRules lists the built-in functions of language.md by the dimensions
// that they take and give; shapes are the business of package eval.
var builtinRules = map[string]dimRule{
	"sqrt": {[2]int{1, 1}, '*', giveRoot(2)}, "cbrt": {[2]int{1, 1}, '*', giveRoot(3)},
	"exp": {[2]int{1, 1}, '1', giveOne}, "ln": {[2]int{1, 1}, '1', giveOne}, "log10": {[2]int{1, 1}, '1', giveOne},
	"sin": {[2]int{1, 1}, '1', giveOne}, "cos": {[2]int{1, 1}, '1', giveOne}, "tan": {[2]int{1, 1}, '1', giveOne},
	"sinh": {[2]int{1, 1}, '1', giveOne}, "cosh": {[2]int{1, 1}, '1', giveOne}, "tanh": {[2]int{1, 1}, '1', giveOne},
	"asin": {[2]int{1, 1}, '1', giveAngle}, "acos": {[2]int{1, 1}, '1', giveAngle}, "atan": {[2]int{1, 1}, '1', giveAngle},
	"atan2": {[2]int{2, 2}, 's', giveAngle}, "arg": {[2]int{1, 1}, '*', giveAngle},
	"abs": {[2]int{1, 1}, '*', giveSame}, "min": {[2]int{1, 99}, 's', giveSame}, "max": {[2]int{1, 99}, 's', giveSame},
	"sum": {[2]int{1, 1}, '*', giveSame}, "mean": {[2]int{1, 99}, 's', giveSame},
	"dot": {[2]int{2, 2}, '*', giveProduct}, "cross": {[2]int{2, 2}, '*', giveProduct},
	"Re": {[2]int{1, 1}, '*', giveSame}, "Im": {[2]int{1, 1}, '*', giveSame}, "conj": {[2]int{1, 1}, '*', giveSame},
	"diag": {[2]int{3, 3}, 's', giveSame}, "tensor": {[2]int{6, 9}, 's', giveSame},
	"uniaxial": {[2]int{3, 3}, 'u', giveSame}, "rotate": {[2]int{3, 3}, 'r', giveFirst},
	"inv": {[2]int{1, 1}, '*', givePower(-1)}, "trace": {[2]int{1, 1}, '*', giveSame}, "det": {[2]int{1, 1}, '*', givePower(3)},
	"ellipK": {[2]int{1, 1}, '1', giveOne}, "ellipE": {[2]int{1, 1}, '1', giveOne}, "erf": {[2]int{1, 1}, '1', giveOne},
	"besselJ": {[2]int{2, 2}, '1', giveOne}, "besselY": {[2]int{2, 2}, '1', giveOne},
	"awg": {[2]int{1, 1}, '1', giveLength},
}

// FunctionNames are the names of the built-in functions and of the forms that
// bind a variable.
func FunctionNames() []string {
	out := []string{"integral", "derivative", "solve", "loop", "assembly_energy", "potential", "lower", "upper"}
	for n := range builtinRules {
		out = append(out, n)
	}
	return sorted(out)
}

// arity checks the number of arguments; where one more than fits was written,
// a decimal comma may be the cause.
func (e *elab) arity(c *Call, r dimRule, n int) bool {
	if n >= r.args[0] && n <= r.args[1] {
		return true
	}
	want := fmt.Sprint(r.args[0])
	if r.args[1] > r.args[0] {
		want = fmt.Sprintf("%d to %d", r.args[0], r.args[1])
	}
	detail := ""
	if n > r.args[1] {
		detail = "was a decimal comma written? numbers take a decimal point"
	}
	e.fault("syntax", c, fmt.Sprintf("%s takes %s %s, and %d are given", c.Fn.Text, want, plural("argument", r.args[1]), n), detail)
	return false
}

// builtin infers a built-in function of known arguments.
func (e *elab) builtin(c *Call, r dimRule, xs []typed) typed {
	t := typed{Facts: Facts{Known: true}, plain: true}
	codes := make([]eval.Code, len(xs))
	for i, x := range xs {
		codes[i] = x.code
		t.join(x)
	}
	if !e.takes(c, r.take, xs) || !r.give(e, c, xs, &t) {
		return unknown()
	}
	code, err := eval.Builtin(c.Fn.Text, c.ID, codes)
	if err != nil {
		return e.refused(c, err)
	}
	t.code, t.Shape, t.Complex = code, code.Type.Shape, code.Type.Complex
	if c.Unit != nil {
		return e.withUnit(c, t, c.Unit, nil)
	}
	return t
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
func (e *elab) takes(c *Call, take byte, xs []typed) bool {
	switch take {
	case '1':
		return e.plainArguments(c, xs)
	case 's':
		return e.sameDimension(c, xs, len(xs))
	case 'u':
		return e.sameDimension(c, xs, 2)
	case 'r':
		if !xs[2].Dim.IsOne() {
			e.fault("dimensioned-argument", c.Args[2], "an angle is needed here, not "+describe(xs[2].Facts), "write it in ° or rad")
			return false
		}
	}
	return true
}

// plainArguments wants plain numbers or angles.
func (e *elab) plainArguments(c *Call, xs []typed) bool {
	for i, x := range xs {
		if !x.Dim.IsOne() {
			e.fault("dimensioned-argument", c.Args[i],
				fmt.Sprintf("%s takes a plain number, and this is %s", c.Fn.Text, describe(x.Facts)), "divide it by a reference value of the same unit")
			return false
		}
	}
	return true
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
func (e *elab) withUnit(at Tree, t typed, p *UnitPhrase, s *Spread) typed {
	if p != nil {
		u, ok := e.unit(p)
		if !ok {
			return unknown()
		}
		if !t.Dim.IsOne() {
			e.fault("dimension-mismatch", at, fmt.Sprintf("a unit follows %s", describe(t.Facts)), "a unit can follow only a parenthesis of plain numbers")
			return unknown()
		}
		if u.Level != nil || u.Affine() {
			e.fault("syntax", at, fmt.Sprintf("%s cannot follow a parenthesis", p.Text), "write the number and its unit together")
			return unknown()
		}
		t.Dim, t.plain = u.Dim, false
		code, err := eval.Mul(at.Index(), t.code, eval.Num(u.Scale()))
		if err != nil {
			return e.refused(at, err)
		}
		t.code = code
	}
	t.lit = nil
	return t
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
	inner := &elab{a: e.a, c: f, quiet: 1, depth: e.depth + 1, work: e.work}
	blind := false
	for i, p := range d.Params {
		slots[i], codes[i] = e.a.newSlot(), xs[i].code
		x := xs[i]
		x.code = eval.Slot(slots[i], eval.Type{Shape: x.Shape, Complex: x.Complex})
		x.lit, x.plain, x.pi = nil, false, 0
		inner.bind(CanonicalName(p.Text), x)
		blind = blind || x.blind
	}
	e.domain(c, f, d, xs)
	t := inner.body(d)
	e.work = inner.work
	if !t.Known {
		return t
	}
	if len(xs) > 0 && !blind {
		t.code = eval.Let(c.ID, slots, codes, t.code)
	}
	t.blind, t.lit, t.plain = t.blind || blind, nil, false
	if s := f.sym.Facts; s.Kind != 0 && s.KindBy == Declared {
		if k := s.Kind.Info(); k.Dim.Compatible(t.Dim) {
			t.Kind, t.KindBy, t.kinds = s.Kind, Declared, []kind.ID{s.Kind}
			t.Dim = absorb(s.Kind, t.Dim)
		}
	}
	if s := f.sym.Facts; s.Qualifier != kind.Unqualified {
		t.Qualifier, t.QualBy = s.Qualifier, s.QualBy
	}
	for _, m := range f.sym.Facts.Media {
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
