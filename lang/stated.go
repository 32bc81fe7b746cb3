package lang

import (
	"fmt"
	"math"

	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file verifies the chain of equals: stated results by the digits
// written, substituted members to half a percent.

// relativeSlack is added to half a unit of the last digit, for the rounding
// of the evaluation itself (language.md, "Definitions").
const relativeSlack = 1e-9

// substitutionTolerance is how far numbers put in may be off.
const substitutionTolerance = 5e-3

// chain verifies the further members of a definition.
func (e *elab) chain(d *Definition) {
	for _, m := range d.Members[1:] {
		if b, ok := m.(*Blank); ok {
			e.c.sym.Asked = b
			e.blank(b)
			continue
		}
		e.member2(d, m)
	}
}

// blank checks the unit that a `__` asks for.
func (e *elab) blank(b *Blank) {
	if b.Unit == nil {
		return
	}
	if u, ok := e.unit(b.Unit); ok && !u.Dim.Compatible(e.c.sym.Facts.Dim) && e.c.sym.Facts.Known {
		e.unitMisfit(b, b.Unit, u)
	}
}

// unitMisfit reports a stated or asked unit of another dimension.
func (e *elab) unitMisfit(at Tree, p *UnitPhrase, u unit.Unit) {
	f := e.c.sym.Facts
	e.report(Fault{
		Rule: "dimension-mismatch", Severity: Error, Span: p.Span,
		Message: fmt.Sprintf("%s is not a unit of %s", p.Text, describe(f)),
		Detail:  fmt.Sprintf("a unit of the right dimension is %s", unit.Coherent(f.Dim).Symbol),
	})
}

// member2 verifies one further member against the computed value.
func (e *elab) member2(d *Definition, m Expr) {
	e.stating, e.whole = true, m
	t := e.expr(m)
	e.stating = false
	f := e.c.sym.Facts
	if !t.Known || !f.Known {
		return
	}
	stated := isLiteral(m) || isNumeric(m)
	if !t.Dim.Compatible(f.Dim) {
		if p := unitOf(m); p != nil {
			u, _ := e.unit(p)
			e.unitMisfit(m, p, u)
			return
		}
		e.fault("dimension-mismatch", m, fmt.Sprintf("this is %s, and %s is %s", describe(t.Facts), d.Name.Text, describe(f)), "")
		return
	}
	if t.Shape != f.Shape && !(t.Shape == eval.Scalar && f.Shape == eval.List) {
		e.fault("shape-mix", m, fmt.Sprintf("this is %s, and %s is %s", shapeName(t.Shape), d.Name.Text, shapeName(f.Shape)), "")
		return
	}
	if stated {
		e.c.sym.Stated = true
	}
	if !e.c.sym.Result.Known {
		return
	}
	r := e.a.run(e.c, m.Index(), t.code)
	if r.fault != nil {
		e.evalFault(r.fault, m)
		return
	}
	if stated {
		e.verifyStated(d, m, r.value)
	} else {
		e.verifySubstituted(d, m, r.value)
	}
}

// unitOf is the unit phrase at the end of a stated member.
func unitOf(m Expr) *UnitPhrase {
	switch m := m.(type) {
	case *Literal:
		return m.Unit
	case *Paren:
		if m.Unit != nil {
			return m.Unit
		}
		return unitOf(m.X)
	case *Triple:
		return m.Unit
	case *Call:
		return m.Unit
	case *Unary:
		return unitOf(m.X)
	case *Blank:
		return m.Unit
	}
	return nil
}

// verifyStated compares by written digits, component by component.
func (e *elab) verifyStated(d *Definition, m Expr, stated eval.Value) {
	u := unit.Unit{}
	if p := unitOf(m); p != nil {
		u, _ = e.unit(p)
	}
	u = e.ofDifference(u)
	digit, ok := finestDigit(m)
	if !ok {
		return
	}
	root, _ := kind.RootPower(e.c.sym.Facts.Kind)
	if agrees(e.c.sym.Value, stated, u, digit, root) {
		e.verifySpread(d, m, u)
		return
	}
	e.report(e.differs(d, m, stated, u))
}

// differs words the finding of a stated result that is not the computed one.
func (e *elab) differs(d *Definition, m Expr, stated eval.Value, u unit.Unit) Fault {
	s := formatter{unit: u, digits: significantDigits(m) + 1}
	got := s.value(e.c.sym.Value)
	f := Fault{
		Rule: "stated-result-differs", Severity: Error, Span: m.Place(),
		Message: fmt.Sprintf("%s is %s, not %s", d.Name.Text, got, PrintExpr(m)),
		Detail:  "write the computed value, or correct the formula or its inputs",
		Fix:     e.writeResult(m, u),
	}
	if r, ok := ratio(stated, e.c.sym.Value); ok {
		f.Message += fmt.Sprintf(" (%s)", factorText("stated / computed", r))
		if h := ratioHint(r); h != "" {
			f.Detail += "; " + h
		}
	}
	return f
}

// verifySubstituted compares numbers put in with the formula.
func (e *elab) verifySubstituted(d *Definition, m Expr, v eval.Value) {
	r, ok := ratio(v, e.c.sym.Value)
	if !ok && v.Equal(e.c.sym.Value) || ok && math.Abs(r-1) <= substitutionTolerance {
		return
	}
	s := formatter{unit: unit.Coherent(e.c.sym.Facts.Dim), digits: 4}
	msg := fmt.Sprintf("this gives %s, and the formula before it %s", s.value(v), s.value(e.c.sym.Value))
	if ok {
		msg += fmt.Sprintf(" (ratio %s)", number4(r))
	}
	e.fault("substituted-member-differs", m, msg, "check the numbers that were put in")
}

// ratio is v / w where that is a number: scalars, or the magnitudes of others.
func ratio(v, w eval.Value) (float64, bool) {
	a, b := norm(v), norm(w)
	if b == 0 || math.IsNaN(a) || math.IsNaN(b) || math.IsInf(a, 0) {
		return 0, false
	}
	r := a / b
	if v.IsReal() && w.IsReal() && v.Shape() == eval.Scalar && v.Re()*w.Re() < 0 {
		r = -r
	}
	if v.Shape() != eval.Scalar || !v.IsReal() || !w.IsReal() {
		if distance(v, w) > substitutionTolerance*b && math.Abs(r-1) <= substitutionTolerance {
			return 0, false
		}
	}
	return r, true
}

// factorText writes a factor; one that is 1 but for a trifle as a difference.
func factorText(what string, r float64) string {
	if d := r - 1; d != 0 && math.Abs(d) < 1e-3 {
		return fmt.Sprintf("%s − 1 = %s", what, decimal(d, formatter{digits: 2}.scale(math.Abs(d))))
	}
	return fmt.Sprintf("%s = %s", what, number4(r))
}

// agrees compares computed and stated values, half a last digit in the unit.
func agrees(computed, stated eval.Value, u unit.Unit, digit int, root bool) bool {
	half := 0.5 * math.Pow(10, float64(digit))
	if u.Level != nil {
		return levelAgrees(computed, stated, u, half, root)
	}
	scale := 1.0
	if !u.IsZero() {
		scale = u.ToSI(1) - u.ToSI(0)
	}
	n := max(computed.Len(), stated.Len())
	for i := 0; i < n; i++ {
		c, s := computed.At(i).C(), stated.At(i).C()
		tol := half*scale*(1+relativeSlack) + relativeSlack*cabs(c)
		if math.Abs(real(c)-real(s)) > tol || math.Abs(imag(c)-imag(s)) > tol {
			return false
		}
	}
	return true
}

// levelAgrees compares in decibels: the digits written are those of the level.
func levelAgrees(computed, stated eval.Value, u unit.Unit, half float64, root bool) bool {
	c, s := u.Level.FromLinear(computed.Re(), root), u.Level.FromLinear(stated.Re(), root)
	return math.Abs(c-s) <= half*(1+relativeSlack)
}

func cabs(c complex128) float64 { return math.Hypot(real(c), imag(c)) }

// finestDigit is the power of ten of the finest last digit written.
func finestDigit(x Expr) (int, bool) {
	best, found := 0, false
	Walk(x, func(t Tree) bool {
		if l, ok := t.(*Literal); ok && (!found || l.Num.LastDigit < best) {
			best, found = l.Num.LastDigit, true
		}
		return true
	})
	return best, found
}
