package lang

import (
	"strings"

	"github.com/alecthomas/participle/v2/lexer"

	"inkjoule/lang/kind"
)

// definition reads a definition or a property up to its end, which the caller
// checks.
func (r *reader) definition(d *Definition) {
	start, from := r.peek().Pos.Offset, r.at
	d.Name = r.ident("a name")
	r.head(d)
	if r.accept("=") {
		r.chain(d)
	} else {
		r.fail("`=`")
	}
	for is(r.peek(), "for") {
		d.For = append(d.For, r.boundRange(false))
	}
	d.Per = r.perQuote()
	r.pieces(d)
	d.Span = r.spanFrom(start)
	r.noDeeperStart(from)
}

// head reads what stands between the name and the first `=`.
func (r *reader) head(d *Definition) {
	if t := r.peek(); is(t, "(") && touch(r.before(), t) {
		outer := r.open()
		d.Params = append(d.Params, r.ident("the name of a parameter"))
		for r.accept(",") {
			d.Params = append(d.Params, r.ident("the name of a parameter"))
		}
		r.closing(")", outer)
	}
	if r.accept("in") {
		in := r.dotted("the name of a medium or region")
		d.In = &in
	}
	if r.accept(",") {
		d.Kind = r.kind()
	}
}

// kind reads the words of a qualifier and a kind. They may be reserved ones;
// `per` before a quoted text ends them, and so does `in`, unless it belongs to
// the name of the kind: `number of turns in a winding`.
func (r *reader) kind() *Words {
	w := Words{}
	for t := r.peek(); t.Type == tokWord && (!is(t, "in") || r.kindGoesOn(w.Text)); t = r.peek() {
		if is(t, "per") && r.ahead(1).Type == tokQuote {
			break
		}
		r.next()
		if w.Text == "" {
			w.Text, w.Span = t.Value, spanOf(t)
		} else {
			w.Text += " " + t.Value
			w.Span.End = spanOf(t).End
		}
		r.joinHyphens(&w)
	}
	if w.Text == "" {
		r.fail("the kind of the quantity, such as `voltage` or `peak voltage`")
	}
	return &w
}

// kindGoesOn reports whether the words read so far make a kind together with
// all the words that follow.
func (r *reader) kindGoesOn(words string) bool {
	for i := 0; r.ahead(i).Type == tokWord; i++ {
		words += " " + r.ahead(i).Value
	}
	_, id, fault := kind.Parse(words)
	return fault == nil && id != 0
}

// chain reads the members of a chain of equals, after the first `=`.
func (r *reader) chain(d *Definition) {
	for {
		if t := r.peek(); t.Type == tokAsk && len(d.Members) > 0 {
			d.Members = append(d.Members, r.blank())
		} else {
			d.Members = append(d.Members, r.expr())
		}
		if !r.accept("=") {
			return
		}
	}
}

func (r *reader) blank() *Blank {
	b := &Blank{Node: Node{Span: spanOf(r.next())}}
	if u := r.unit(); u != nil {
		b.Unit = u
		b.Span.End = u.Span.End
	}
	return b
}

// unit reads a unit phrase where the scanner found one.
func (r *reader) unit() *UnitPhrase {
	t := r.peek()
	if t.Type != tokUnit {
		return nil
	}
	if q := qualifiedUnit(t.Value); q != "" {
		end := t.Pos.Offset + len(strings.TrimSuffix(strings.TrimSuffix(t.Value, q), "_"))
		f := qualifierFault(&r.toks[0], q)
		r.failWith(&breakage{message: f.Message, detail: f.Detail,
			fix: qualifierFix(r.toks, q, Edit{Span{end, spanOf(t).End}, ""})})
	}
	r.next()
	return &UnitPhrase{Span: spanOf(t), Text: t.Value}
}

// pieces reads `, EXPR for VAR from A to B [per "…"]`, repeated.
func (r *reader) pieces(d *Definition) {
	if is(r.peek(), ",") && len(d.For) == 0 {
		return
	}
	for r.accept(",") {
		start := r.peek().Pos.Offset
		p := &Piece{X: r.expr()}
		if is(r.peek(), "for") {
			p.For = r.boundRange(false)
		} else {
			r.fail("`for` with the range of this piece")
		}
		p.Per = r.perQuote()
		p.Span = r.spanFrom(start)
		d.Pieces = append(d.Pieces, p)
	}
}

// boundRange reads `for VAR from A to B`, or `for VAR at A` where that may stand.
func (r *reader) boundRange(mayAt bool) *Range {
	g := &Range{Node: Node{Span: spanOf(r.peek())}}
	r.expect("for")
	g.Var = r.boundVar()
	switch {
	case mayAt && r.accept("at"):
		g.At = r.expr()
	case r.accept("from"):
		g.From = r.expr()
		r.expect("to")
		g.To = r.expr()
	case mayAt:
		r.fail("`from` or `at`")
	default:
		r.fail("`from`")
	}
	g.Span = r.spanFrom(g.Span.Start)
	return g
}

// boundVar reads the variable of a range: a name, or a table's column.
func (r *reader) boundVar() Expr {
	id := r.ident("the name of a variable")
	var x Expr = &Name{id.Node, id.Text}
	for is(r.peek(), ".") && r.touchesNext() {
		r.next()
		field := r.ident("the name of a column")
		x = &Member{Node{Span: id.Span.to(field.Span)}, x, field}
	}
	return x
}

// touchesNext reports whether nothing stands between the last token and the next.
func (r *reader) touchesNext() bool { return touch(r.before(), r.peek()) }

// isWordToken reports a word that is not reserved.
func isWordToken(t *lexer.Token) bool { return t.Type == tokWord && !isReserved(t.Value) }
