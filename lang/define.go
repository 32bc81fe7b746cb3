package lang

import (
	"fmt"

	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file elaborates definitions: the declared kind, the value, the chain of
// equals, the range of validity.

// define elaborates and evaluates a definition, property or condition.
func (a *analysis) define(c *cell, d *Definition) {
	e := &elab{a: a, c: c}
	c.sym.Input = len(d.Members) > 0 && isLiteral(d.Members[0])
	if c.sym.Input && c.role == RoleQuantity && d.Per == nil {
		e.report(Fault{
			Rule: "input-without-source", Severity: Advice, Span: d.Name.Span,
			Message: fmt.Sprintf("the input %s does not say where it comes from", d.Name.Text), Detail: "add its source: per \"drawing, sheet, nameplate …\"",
		})
	}
	e.declared(d)
	if d.In != nil {
		e.medium(d.In)
	}
	if len(d.Members) == 0 {
		return
	}
	if len(d.Params) > 0 {
		e.function(d)
		return
	}
	e.whole = d.Members[0]
	t := e.expr(d.Members[0])
	if !t.Known {
		return
	}
	e.settle(d, t)
	e.evaluate(d, t)
	e.chain(d)
	e.display(d)
	e.validity(d)
}

// declared reads the words after the comma.
func (e *elab) declared(d *Definition) {
	words, by := "", Declared
	if d.Kind != nil {
		words = d.Kind.Text
	} else if e.c.role == RoleProperty {
		words, by = standardProperties()[CanonicalName(d.Name.Text)], Inferred
	}
	if words == "" {
		return
	}
	w, bad := kind.ParseWords(words)
	if bad != nil {
		e.fault("unknown-kind", d.Kind, bad.Message, bad.Detail)
		return
	}
	q, id := w.Qualifier, w.Kind
	e.want = id
	f := &e.c.sym.Facts
	if id != 0 {
		f.Kind, f.KindBy = id, by
	}
	if q != kind.Unqualified {
		f.Qualifier, f.QualBy = q, Declared
	}
	f.Waveform, f.Coherence = w.Waveform, w.Coherence
}

// medium checks the name after `in` and binds the quantity to it.
func (e *elab) medium(in *Ident) {
	key := CanonicalName(in.Text)
	c := e.a.cells[key]
	if c == nil {
		e.unknownName(in, in.Text, "unknown-name")
		return
	}
	e.use(key, in.Span)
	switch c.role {
	case RoleMedium:
		e.c.sym.Facts.Media = []string{key}
	case RoleRegion:
		if r, ok := c.tree.(*Region); ok && r.In != nil {
			e.c.sym.Facts.Media = []string{CanonicalName(r.In.Text)}
		}
	default:
		e.fault("unknown-name", in, fmt.Sprintf("%s is a %s; `in` names the medium or region that the quantity belongs to", in.Text, roleName(c.role)), "")
	}
}

// settle joins what is declared with what the formula gives.
func (e *elab) settle(d *Definition, t typed) {
	f := &e.c.sym.Facts
	declared := *f
	bound := f.Media
	*f = t.Facts
	f.Media = bound
	for _, m := range t.Media {
		tt := typed{Facts: *f}
		tt.addMedium(m)
		f.Media = tt.Media
	}
	if declared.Kind != 0 {
		f.Kind, f.KindBy = declared.Kind, declared.KindBy
		if !e.fitsKind(d, t, declared.Kind) {
			*f = Facts{}
			return
		}
		f.Dim = absorb(declared.Kind, t.Dim)
	}
	if declared.Qualifier != kind.Unqualified {
		f.Qualifier, f.QualBy = declared.Qualifier, Declared
	}
	if declared.Waveform != 0 {
		f.Waveform = declared.Waveform
	}
	if declared.Coherence != 0 {
		f.Coherence = declared.Coherence
	}
	e.c.pi, e.c.plain, e.c.from = t.pi, t.plain, t.kinds
}

// absorb gives the dimension of the declared kind: rad and cycle are part of a
// kind, not of how it was reached.
func absorb(id kind.ID, d unit.Dim) unit.Dim {
	k := id.Dim()
	d[unit.Angle], d[unit.Cycle] = k[unit.Angle], k[unit.Cycle]
	return d
}

// fitsKind checks the value's dimension against the declared kind's.
func (e *elab) fitsKind(d *Definition, t typed, id kind.ID) bool {
	k := id.Dim()
	if k.Compatible(t.Dim) {
		return true
	}
	e.report(Fault{
		Rule: "dimension-mismatch", Severity: Error, Span: d.Members[0].Place(),
		Message: fmt.Sprintf("%s is declared as %s (%s), and this is %s", d.Name.Text, id, id.Info().Unit, describe(Facts{Dim: t.Dim})),
		Detail:  fmt.Sprintf("the quotient of the two is %s", unit.Coherent(t.Dim.Div(k)).Symbol),
	})
	return false
}

// evaluate runs the code and keeps the value with its gradient.
func (e *elab) evaluate(d *Definition, t typed) {
	c := e.c
	if !c.sym.Facts.Known {
		return
	}
	if t.blind {
		return
	}
	r := e.a.run(c, d.Members[0].Index(), t.code)
	if r.fault != nil {
		e.evalFault(r.fault, d.Members[0])
		c.sym.Why = r.fault.Message
		return
	}
	e.severalRoots()
	c.sym.Result.Known = true
	c.sym.Value, c.grad = r.value, r.grad
	c.sym.Standard, c.sym.Low, c.sym.High = r.standard, r.low, r.high
}

// evalFault places a fault of evaluation; one without a rule is the
// consequence of another finding.
func (e *elab) evalFault(f *eval.Fault, whole Tree) {
	if f.Rule == "" {
		return
	}
	at := whole.Place()
	if n := e.nodeByID(f.Node); n != nil {
		at = n.Place()
	}
	e.report(Fault{Rule: f.Rule, Severity: Error, Span: at, Message: f.Message, Detail: f.Detail})
}

// nodeByID finds a node of the cell by its index; 0 means none.
func (e *elab) nodeByID(id int) Tree {
	if id <= e.c.base {
		return nil
	}
	var found Tree
	Walk(e.c.tree, func(t Tree) bool {
		if t.Index() == id {
			found = t
		}
		return found == nil
	})
	return found
}

// isLiteral reports an input: a literal, a vector or tensor of literals.
func isLiteral(x Expr) bool {
	switch x := x.(type) {
	case *Literal:
		return true
	case *Unary:
		return isLiteral(x.X)
	case *Paren:
		return x.Unit != nil && isNumeric(x.X) || x.Spread != nil || isLiteral(x.X)
	case *Triple:
		return isNumeric(x.X[0]) && isNumeric(x.X[1]) && isNumeric(x.X[2])
	case *Call:
		return literalTensor(x)
	}
	return false
}

// literalTensor reports diag(1, 2, 3) and the like: a tensor written out.
func literalTensor(c *Call) bool {
	switch c.Fn.Text {
	case "diag", "tensor", "uniaxial":
	default:
		return false
	}
	for _, a := range c.Args {
		if !isNumeric(a) {
			return false
		}
	}
	return len(c.Args) > 0
}

// isNumeric reports an expression of literals and j only: a constant complex
// number such as 18.5 + 139.5*j is a literal.
func isNumeric(x Expr) bool {
	switch x := x.(type) {
	case *Literal:
		return true
	case *Name:
		return x.Text == "j"
	case *Unary:
		return isNumeric(x.X)
	case *Paren:
		return isNumeric(x.X)
	case *Triple:
		return isNumeric(x.X[0]) && isNumeric(x.X[1]) && isNumeric(x.X[2])
	case *Binary:
		return (x.Op == OpAdd || x.Op == OpSub || isJ(x.X) || isJ(x.Y)) && isNumeric(x.X) && isNumeric(x.Y)
	}
	return false
}

func isJ(x Expr) bool {
	n, ok := x.(*Name)
	return ok && n.Text == "j"
}

// validity elaborates the validity ranges of a value or function, which order
// nothing and are checked where the value is used: against the note's quantity
// of that name, which they thereby use. Ranges of parameters are none.
func (e *elab) validity(d *Definition) {
	for _, r := range d.For {
		n, ok := r.Var.(*Name)
		if !ok || hasParam(d, n.Text) {
			continue
		}
		t := e.bounds(r)
		key := CanonicalName(n.Text)
		e.use(key, n.Span) // there may be no such quantity now, and one after the next edit
		if !t.Known {
			continue
		}
		lo, ok1 := e.value(e.again(r.From))
		hi, ok2 := e.value(e.again(r.To))
		if ok1 && ok2 {
			v := Validity{Name: n.Text, Key: key, Low: lo.Re(), High: hi.Re(), Unit: unitFor(r, e.a, t.Dim), Span: r.Span}
			e.c.sym.Valid = append(e.c.sym.Valid, v)
		}
	}
}
