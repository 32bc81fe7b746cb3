package lang

import (
	"fmt"

	"inkjoule/lang/eval"
)

// This file infers the forms that bind a variable.

func (e *elab) binding(c *Call, name string) (typed, bool) {
	switch name {
	case "integral", "derivative", "solve", "loop", "assembly_energy", "potential", "lower", "upper":
	case "sum":
		if len(c.For) == 0 {
			return unknown(), false
		}
	default:
		return unknown(), false
	}
	e.notYet(c, name)
	return unknown(), true
}

// notYet says that a part of the language is read and not yet evaluated.
func (e *elab) notYet(at Tree, what string) {
	e.report(Fault{Rule: "not-evaluated-yet", Severity: Advice, Span: at.Place(), Message: fmt.Sprintf("%s is not evaluated yet", what)})
}

func (e *elab) bindSlot(key string, t typed) { e.bind(key, t) }

func (e *elab) measure(m *Member, c *cell, field string) typed {
	e.notYet(m, "region")
	return unknown()
}
func (e *elab) lookup(l *Lookup) typed { e.notYet(l, "at"); return unknown() }

func (a *analysis) region(c *cell, r *Region) {}

func (e *elab) uncertain(l *Literal, x float64) eval.Code         { return eval.Num(x) }
func (e *elab) spreadOver(p *Paren, t typed, s *Spread) typed     { return t }
func (e *elab) verifySpread(d *Definition, m Expr, u interface{}) {}
func (e *elab) writeResult(m Expr, u interface{}) *Fix            { return nil }
