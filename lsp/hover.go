package lsp

import (
	"context"
	"fmt"
	"strings"
	"unicode"
	"unicode/utf8"

	"go.lsp.dev/protocol"

	"inkjoule/lang"
	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// hovers tell what stands under the cursor: a name, a unit, a kind, a rule, a
// function, a verdict.
func hovers() feature {
	return feature{
		offer: func(_ *client, to *protocol.ServerCapabilities) {
			to.HoverProvider = &protocol.HoverOptions{}
		},
		methods: map[string]method{protocol.MethodTextDocumentHover: request(hover)},
	}
}

func hover(ctx context.Context, v *view, p *protocol.HoverParams) (any, error) {
	s, err := v.spot(ctx, p.TextDocumentPositionParams)
	if err != nil {
		return nil, err
	}
	c, span := s.card()
	if c == nil {
		return (*protocol.Hover)(nil), nil
	}
	return &protocol.Hover{
		Contents: c.content(v.client.markdown("textDocument.hover.contentFormat")),
		Range:    ptr(s.doc.mapper().SpanToRange(span)),
	}, nil
}

// card describes what is at the spot and where that stands; nil for nothing.
func (s *spot) card() (*card, lang.Span) {
	if u := s.use(); u != nil {
		if c := s.derivedCard(u); c != nil {
			return c, u.Span
		}
		return describe(s.note, u.Symbol), u.Span
	}
	stmt := s.stmt()
	if stmt == nil || stmt.Tree == nil {
		return nil, lang.Span{}
	}
	path := s.path()
	for i := len(path) - 1; i >= 0; i-- {
		if c, span := s.nodeCard(stmt, path, i); c != nil {
			return c, span
		}
	}
	return s.verdict(stmt)
}

// derivedCard describes a property that follows from the one that the medium
// states, as mica.eps from mica.eps_r; nil for any other use.
func (s *spot) derivedCard(u *lang.Use) *card {
	part := s.lastPart(u.Span)
	if u.Define || u.Symbol.Role != lang.RoleProperty || u.Stmt == nil || lang.CanonicalName(s.text(part)) == lastKey(u.Symbol.Key) {
		return nil
	}
	for _, t := range s.path() {
		if _, ok := t.(*lang.Member); !ok || u.Stmt.Abs(t) != u.Span {
			continue
		}
		c := &card{head: s.text(u.Span)}
		if facts, ok := s.note.FactsOf(u.Stmt, t); ok {
			describeFacts(c, &lang.Symbol{Role: lang.RoleProperty, Facts: facts})
		}
		c.line("follows from", titleOf(u.Symbol))
		c.line("source", u.Symbol.Per)
		return c
	}
	return nil
}

// nodeCard describes the i-th node of a path where that has a meaning of its
// own.
func (s *spot) nodeCard(stmt *lang.Stmt, path []lang.Tree, i int) (*card, lang.Span) {
	at := s.at - stmt.At
	if phrase := phraseOf(path[i]); phrase != nil && phrase.Span.Contains(at) {
		c, span := unitCard(phrase, at)
		return c, span.Shift(stmt.At)
	}
	var c *card
	switch n := path[i].(type) {
	case *lang.Words:
		c = s.wordsCard(path[i-1], n)
	case *lang.Name:
		if i > 0 {
			if call, ok := path[i-1].(*lang.Call); ok && n == &call.Fn {
				c = functionCard(n.Text)
			}
		}
	}
	return c, stmt.Abs(path[i])
}

// phraseOf is the unit phrase that belongs to a node itself, or nil.
func phraseOf(t lang.Tree) *lang.UnitPhrase {
	switch n := t.(type) {
	case *lang.Literal:
		if n.Spread != nil && n.Spread.Unit != nil && n.Unit == nil {
			return n.Spread.Unit
		}
		return n.Unit
	case *lang.Paren:
		return n.Unit
	case *lang.Triple:
		return n.Unit
	case *lang.Call:
		return n.Unit
	case *lang.Blank:
		return n.Unit
	case *lang.Column:
		return n.Unit
	}
	return nil
}

// unitCard describes the symbol of a phrase at an offset of the statement.
func unitCard(phrase *lang.UnitPhrase, at int) (*card, lang.Span) {
	from, to := wordAround(phrase.Text, at-phrase.Span.Start)
	span := lang.Span{Start: phrase.Span.Start + from, End: phrase.Span.Start + to}
	whole, fault := unit.Parse(phrase.Text)
	c := &card{head: phrase.Text}
	if e, ok := unit.Info(phrase.Text[from:to]); ok {
		if from > 0 || to < len(phrase.Text) {
			c.head = e.Symbol + " in " + phrase.Text
		}
		describeUnit(c, e)
	}
	switch {
	case fault != nil:
		c.paragraph(fault.Message)
	case len(c.parts) == 0 || from > 0 || to < len(phrase.Text):
		c.line("whole unit", fmt.Sprintf("%s × %s", whole.Factor, unit.Coherent(whole.Dim)))
	}
	return c, span
}

func describeUnit(c *card, e unit.Entry) {
	c.line("unit", e.Name)
	if e.Factor != "" {
		factor := "1 " + e.Symbol + " = " + strings.TrimSpace(e.Factor+" "+e.Unit)
		if e.Exact {
			factor += " (exact)"
		}
		c.line("factor", factor)
	}
	c.line("source", e.Source)
}

// wordAround finds the unit symbol around an offset.
func wordAround(text string, at int) (from, to int) {
	part := func(r rune) bool { return unicode.IsLetter(r) || strings.ContainsRune("%°Ω℃_", r) }
	at = max(0, min(at, len(text)))
	for from = at; from > 0; {
		r, size := utf8.DecodeLastRuneInString(text[:from])
		if !part(r) {
			break
		}
		from -= size
	}
	for to = at; to < len(text); {
		r, size := utf8.DecodeRuneInString(text[to:])
		if !part(r) {
			break
		}
		to += size
	}
	return from, to
}

// wordsCard describes a kind, or the rule that a waiver names.
func (s *spot) wordsCard(parent lang.Tree, w *lang.Words) *card {
	switch parent.(type) {
	case *lang.Waive:
		return s.view.ruleCard(w.Text)
	case *lang.Definition:
		return kindCard(w.Text)
	}
	return nil
}

func kindCard(words string) *card {
	w, fault := kind.ParseWords(words)
	if fault != nil {
		return nil
	}
	k := w.Kind
	c := &card{head: words}
	c.line("waveform", w.Waveform.String())
	c.line("coherence", w.Coherence.String())
	c.line("qualifier", w.Qualifier.String())
	if k != 0 {
		info := k.Info()
		c.line("kind", info.Name)
		c.line("also", info.Also)
		c.line("usual symbol", info.Symbol)
		c.line("unit", info.Unit)
	}
	return c
}

// ruleCard tells a rule as its documentation does; nil for an unknown one.
func (v *view) ruleCard(name string) *card {
	r := v.catalogue.Find(name)
	if r == nil {
		return nil
	}
	c := &card{head: r.Name}
	c.paragraph(r.Title + " (" + r.Severity.String() + ").")
	c.line("fires", r.Sees)
	c.line("stays silent", r.Silent)
	c.line("physics", r.Formula)
	c.line("write instead", r.Remedy)
	c.line("source", r.Source)
	c.example(r.Wrong.Note)
	c.paragraph("put right:")
	c.example(r.Right.Note)
	return c
}

// functionCard describes a function of the language; nil for another.
func functionCard(name string) *card {
	for _, f := range eval.Builtins() {
		if f.Name == name {
			c := &card{head: f.Name + "(" + strings.Join(f.Params, ", ") + ")"}
			c.paragraph(f.Doc)
			return c
		}
	}
	return nil
}

// verdict tells how an assumption, criterion or check has come out, from the
// statement's first word.
func (s *spot) verdict(stmt *lang.Stmt) (*card, lang.Span) {
	for i := range s.note.Judged {
		j := &s.note.Judged[i]
		word := lang.Span{Start: stmt.At, End: stmt.At + len(j.Word)}
		if j.Stmt != stmt || !word.Contains(s.at) {
			continue
		}
		c := &card{head: j.Word + " " + j.Text}
		switch {
		case !j.Known:
			c.line("verdict", "not judged")
		case j.Holds:
			c.line("verdict", fmt.Sprintf("holds, margin %.3g", j.Margin))
		default:
			c.line("verdict", fmt.Sprintf("fails, margin %.3g", j.Margin))
		}
		if j.Known && j.Worst != j.Margin {
			c.line("margin in the worst case", fmt.Sprintf("%.3g", j.Worst))
		}
		c.line("source", j.Per)
		return c, word
	}
	return nil, lang.Span{}
}
