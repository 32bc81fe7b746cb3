package rules

import (
	"math/big"
	"strings"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// claim is a definition that says what its value is: a stored energy, a power.
type claim struct {
	view   *view
	note   *lang.Note
	sym    *lang.Symbol
	x      lang.Expr // the defining expression
	stat   kind.Qualifier
	stated bool // the statistic is declared
}

// newClaim reads a name as a claim: a quantity that is defined by an
// expression and not by a plain value; nil for everything else.
func newClaim(v *view, s *lang.Symbol) *claim {
	if s.Role != lang.RoleQuantity || s.Def == nil || s.Stmt == nil || s.Input || len(s.Def.Members) == 0 || len(s.Def.Params) > 0 {
		return nil
	}
	c := &claim{view: v, note: v.note, sym: s, x: s.Def.Members[0]}
	if s.Facts.QualBy == lang.Declared {
		c.stat, c.stated = s.Facts.Qualifier, s.Facts.Qualifier != kind.Unqualified
	}
	return c
}

// newFunctionClaim reads a function as a claim of what it gives; nil for
// everything else.
func newFunctionClaim(v *view, s *lang.Symbol) *claim {
	if s.Role != lang.RoleFunction || s.Def == nil || s.Stmt == nil || len(s.Def.Members) == 0 || len(s.Def.Pieces) > 0 {
		return nil
	}
	c := &claim{view: v, note: v.note, sym: s, x: s.Def.Members[0]}
	if s.Facts.QualBy == lang.Declared {
		c.stat, c.stated = s.Facts.Qualifier, s.Facts.Qualifier != kind.Unqualified
	}
	return c
}

// span is the place of the defining expression.
func (c *claim) span() lang.Span { return c.sym.Stmt.Abs(c.x) }

// text is the defining expression as written.
func (c *claim) text() string {
	s := c.span()
	return c.note.Script.Source.Text[s.Start:s.End]
}

// halved is half of the defining expression, as text.
func (c *claim) halved() string {
	if b, ok := c.x.(*lang.Binary); ok && (b.Op == lang.OpAdd || b.Op == lang.OpSub) || strings.HasPrefix(c.text(), "-") {
		return "1/2 * (" + c.text() + ")"
	}
	return "1/2 * " + c.text()
}

// words are those between the comma and the sign of equality, in lower case.
func (c *claim) words() string {
	if c.sym.Def.Kind == nil {
		return ""
	}
	return strings.ToLower(c.sym.Def.Kind.Text)
}

// declared reports whether the kind is written in the note.
func (c *claim) declared() bool { return c.sym.Facts.KindBy == lang.Declared }

// form is what the kind of the claim is in table 1.4.
func (c *claim) form() (kind.Form, bool) { return kind.FormOf(c.sym.Facts.Kind) }

// squares gives the terms of the claim as squares of its form. False: one of
// them is something else, so the claim as a whole cannot be judged.
func (c *claim) squares(form kind.Form) ([]*square, bool) {
	var out []*square
	for _, p := range c.view.products(c.sym) {
		q := squareOf(c.note, p, form)
		if q == nil || q.pi != 0 {
			return nil, false
		}
		out = append(out, q)
	}
	return out, len(out) > 0
}

// usedElsewhere reports whether another definition uses the claim's name: it
// may then be an intermediate result.
func (c *claim) usedElsewhere() bool { return c.view.used[c.sym.Key] }

// report files a finding on the claim.
func (c *claim) report(p *check.Pass, f lang.Fault) {
	if f.Span == (lang.Span{}) {
		f.Span = c.span()
	}
	p.Report(f)
}

// because names the places of the amplitudes' definitions.
func (c *claim) because(factors []lang.Factor, what func(*lang.Symbol) string) []lang.Related {
	var out []lang.Related
	for _, f := range factors {
		if f.Symbol == nil || f.Symbol.Stmt == nil || c.note.StmtAt(f.Symbol.Span.Start) != f.Symbol.Stmt {
			continue // a constant, or a name of another note
		}
		out = append(out, lang.Related{Span: f.Symbol.Span, Message: what(f.Symbol)})
	}
	return out
}

// pow2 is 2^n.
func pow2(n int) *big.Rat {
	r := big.NewRat(1, 1)
	for ; n > 0; n-- {
		r.Mul(r, big.NewRat(2, 1))
	}
	for ; n < 0; n++ {
		r.Quo(r, big.NewRat(2, 1))
	}
	return r
}

// ratio writes an exact factor as people do: 1/2, 2, 1/4.
func ratio(r *big.Rat) string { return r.RatString() }

// times writes how many times too large or small something is: `2.00`.
func times(r *big.Rat) string { return r.FloatString(2) }
