package lang

import (
	"strings"

	"github.com/alecthomas/participle/v2"
	"github.com/alecthomas/participle/v2/lexer"
)

// The Parse methods below are the grammar's hooks (participle.Parseable); they
// are not meant for other callers. Each reads its node from the tokens at lex.

// hook runs read on the tokens of the statement, from the place of the grammar,
// and puts the grammar behind what was read. It reports the place where that
// breaks.
func hook(lex *lexer.PeekingLexer, read func(r *reader)) error {
	count := lex.Range(0, 1)[0].Pos.Column
	start := int(lex.RawCursor())
	r := reader{toks: lex.Range(0, lexer.RawCursor(count)), at: start}
	read(&r)
	for n := start; n < r.at; n++ {
		lex.Next()
	}
	if r.broken != nil {
		return r.broken
	}
	return nil
}

// parseExpr is the hook for every field of type Expr.
func parseExpr(lex *lexer.PeekingLexer) (Expr, error) {
	var x Expr
	err := hook(lex, func(r *reader) { x = r.expr() })
	return x, err
}

// Parse reads a name that is defined here.
func (i *Ident) Parse(lex *lexer.PeekingLexer) error {
	return hook(lex, func(r *reader) { *i = r.dotted("a name") })
}

// Parse reads a text in double quotation marks.
func (q *Quote) Parse(lex *lexer.PeekingLexer) error {
	if lex.Peek().Type != tokQuote {
		return participle.NextMatch
	}
	return hook(lex, func(r *reader) { *q = r.quote() })
}

// Parse reads one word, which may have hyphens: an adjective, a rule's name.
func (w *Words) Parse(lex *lexer.PeekingLexer) error {
	return hook(lex, func(r *reader) { *w = r.hyphenated("a word") })
}

// Parse reads a property of a medium. A broken one does not break the medium:
// it keeps its name, and what is wrong is kept until the statement is put
// together.
func (d *Definition) Parse(lex *lexer.PeekingLexer) error {
	return hook(lex, func(r *reader) {
		start := r.peek().Pos.Offset
		r.definition(d)
		r.end()
		if r.broken == nil {
			return
		}
		*d = Definition{Name: d.Name, broken: r.broken}
		r.broken = nil
		for t := r.peek(); !t.EOF() && t.Type != tokLine; t = r.peek() {
			r.next()
		}
		d.Span = r.spanFrom(start)
		d.Members = []Expr{&Broken{Node{Span: d.Span}}}
	})
}

// Parse reads a comparison or a chain of them.
func (rel *Relation) Parse(lex *lexer.PeekingLexer) error {
	return hook(lex, func(r *reader) { r.relation(rel, r.toks[0].Value == "check") })
}

// Parse reads `for VAR from A to B`.
func (g *Range) Parse(lex *lexer.PeekingLexer) error {
	return hook(lex, func(r *reader) { *g = *r.boundRange(false) })
}

// Parse reads the shape of a region, which is written like a call.
func (c *Call) Parse(lex *lexer.PeekingLexer) error {
	return hook(lex, func(r *reader) {
		if t := r.peek(); t.Type != tokWord || !is(r.ahead(1), "(") {
			r.fail("a shape, such as `box(a, b, c)`")
			return
		}
		if call, ok := r.operand(false).(*Call); ok && r.broken == nil {
			*c = *call
		}
	})
}

// Parse reads the head of a column: `B [T]`, `B/T`, `S [VA] = U*I`.
func (c *Column) Parse(lex *lexer.PeekingLexer) error {
	return hook(lex, func(r *reader) { r.column(c) })
}

// Parse reads a line of cells.
func (w *Row) Parse(lex *lexer.PeekingLexer) error {
	return hook(lex, func(r *reader) { r.row(w) })
}

// relation reads terms with comparisons between them; `=` in a check alone.
func (r *reader) relation(rel *Relation, equal bool) {
	start := r.peek().Pos.Offset
	rel.Terms = append(rel.Terms, r.expr())
	for {
		op := canonicalOp(r.peek().Value)
		if !isComparison(op) || r.peek().Type != tokOp || op == "=" && !equal {
			break
		}
		r.next()
		rel.Ops = append(rel.Ops, op)
		rel.Terms = append(rel.Terms, r.expr())
	}
	if len(rel.Ops) == 0 {
		r.fail(expectedComparison)
	}
	rel.Span = r.spanFrom(start)
}

func isComparison(op string) bool {
	switch op {
	case "<", "<=", ">", ">=", "<<", ">>", "=":
		return true
	}
	return false
}

// column reads a column's name, its unit in brackets or after a solidus, and
// its formula.
func (r *reader) column(c *Column) {
	start := r.peek().Pos.Offset
	c.Name = r.ident("the name of a column")
	switch {
	case is(r.peek(), "["):
		outer := r.open()
		c.Unit = r.gluedUnit("]")
		r.closing("]", outer)
	case is(r.peek(), "/"):
		r.next()
		c.Unit = r.gluedUnit(",")
	}
	if r.accept("=") {
		c.Formula = r.expr()
	}
	c.Span = r.spanFrom(start)
}

// gluedUnit puts a unit phrase together from tokens, up to the closing text,
// `=`, `per` or the end of the line. A phrase has no blanks.
func (r *reader) gluedUnit(closing string) *UnitPhrase {
	var b strings.Builder
	first := r.peek()
	for t := first; !t.EOF() && t.Type != tokLine && t.Type != tokBad; t = r.peek() {
		if is(t, closing) || is(t, "=") || is(t, "per") || is(t, ",") || t != first && !touch(r.before(), t) {
			break
		}
		b.WriteString(t.Value)
		r.next()
	}
	if b.Len() == 0 {
		r.fail("a unit, or `1` for a plain number")
		return nil
	}
	return &UnitPhrase{Span: r.spanFrom(first.Pos.Offset), Text: b.String()}
}

// row reads numbers, each with its sign, up to the end of the line.
func (r *reader) row(w *Row) {
	start := r.peek().Pos.Offset
	for t := r.peek(); !t.EOF() && t.Type != tokLine; t = r.peek() {
		switch {
		case len(w.Cells) > 0 && touch(r.before(), t):
			r.fail("a blank between two cells")
		case t.Type == tokNumber, r.signTouchesNumber():
			w.Cells = append(w.Cells, r.numeral())
		default:
			r.fail("a number (cells carry no units: the head of the column has the unit)")
		}
	}
	w.Span = r.spanFrom(start)
}

// hyphenated reads words joined by hyphens without blanks.
func (r *reader) hyphenated(what string) Words {
	t := r.peek()
	if t.Type != tokWord {
		r.fail(what)
		return Words{}
	}
	r.next()
	w := Words{Node{Span: spanOf(t)}, t.Value}
	r.joinHyphens(&w)
	return w
}

// joinHyphens adds `-word` as long as it touches what was read.
func (r *reader) joinHyphens(w *Words) {
	for is(r.peek(), "-") && touch(r.before(), r.peek()) && r.ahead(1).Type == tokWord && touch(r.peek(), r.ahead(1)) {
		r.next()
		part := r.next()
		w.Text += "-" + part.Value
		w.Span.End = spanOf(part).End
	}
}

// quoted is the text between the quotation marks, on one line.
func quoted(value string) string {
	text := value[1 : len(value)-1]
	if !strings.ContainsAny(text, "\n\r") {
		return text
	}
	return strings.Join(strings.Fields(text), " ")
}
