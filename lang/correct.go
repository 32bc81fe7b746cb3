package lang

import (
	"fmt"
	"math"

	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file makes the corrections that write a computed value into the note.

// writeResult replaces a stated result by the computed value: in the author's
// unit, with as many digits as were written.
func (e *elab) writeResult(m Expr, u unit.Unit) *Fix {
	v := e.c.sym.Value
	root, _ := kind.RootPower(e.c.sym.Facts.Kind)
	f := formatter{unit: u, root: root, digits: significantDigits(m)}
	l, ok := m.(*Literal)
	if ok && v.Shape() == eval.Scalar && v.IsReal() {
		return &Fix{Title: "Write the computed value", Edits: []Edit{{l.Num.Span, f.bare(v)}}}
	}
	if hasSpread(m) {
		return nil
	}
	return &Fix{Title: "Write the computed value", Edits: []Edit{{m.Place(), f.value(v)}}}
}

func hasSpread(m Expr) bool {
	found := false
	Walk(m, func(t Tree) bool {
		switch t := t.(type) {
		case *Literal:
			found = found || t.Spread != nil
		case *Paren:
			found = found || t.Spread != nil
		}
		return !found
	})
	return found
}

// Answer is the edit that writes the value which a symbol's `__` asks for, in
// the unit that it names; ok is false where there is nothing to write.
func (n *Note) Answer(s *Symbol) (Edit, bool) {
	if s == nil || s.Asked == nil || !s.Result.Known || s.Stmt == nil {
		return Edit{}, false
	}
	return Edit{Span: s.Stmt.Abs(s.Asked), New: s.Shown}, true
}

// verifySpread compares the uncertainty that a stated result carries with the
// computed one, by its own digits: a standard uncertainty with the standard
// uncertainty, a limit with half the width of the worst case.
func (e *elab) verifySpread(d *Definition, m Expr, u unit.Unit) {
	l, ok := m.(*Literal)
	if !ok || l.Spread == nil || u.Level != nil {
		return
	}
	sp := l.Spread
	r := e.c.sym.Result
	have := (r.High - r.Low) / 2
	what := "worst-case limit"
	if sp.Standard {
		have, what = r.Standard, "standard uncertainty"
	}
	have /= u.Scale()
	if sp.Unit != nil && !sameUnit(sp.Unit, l.Unit) {
		su, good := e.unit(sp.Unit)
		if !good {
			return
		}
		if su.Dim.IsOne() && !u.Dim.IsOne() { // in percent of the value
			have = have / math.Abs(l.Num.Value) / su.Scale()
		} else {
			have = have * u.Scale() / su.Scale()
		}
	}
	tol := 0.5 * math.Pow(10, float64(spreadDigit(l)))
	if math.Abs(have-sp.Size) <= tol*(1+relativeSlack) {
		return
	}
	e.report(Fault{
		Rule: "stated-result-differs", Severity: Error, Span: sp.Span,
		Message: fmt.Sprintf("the %s of %s is %s, not %s", what, d.Name.Text, number4(have), number4(sp.Size)),
		Detail:  "write the computed uncertainty, or correct those of the inputs",
	})
}

func sameUnit(a, b *UnitPhrase) bool { return a != nil && b != nil && a.Text == b.Text }

// spreadDigit is the power of ten of the last digit of a spread: that of the
// value for digits in parentheses, its own otherwise.
func spreadDigit(l *Literal) int {
	if l.Spread.Standard && l.Spread.Num.LastDigit == 0 && l.Spread.Size != l.Spread.Num.Value {
		return l.Num.LastDigit
	}
	return l.Spread.Num.LastDigit
}
