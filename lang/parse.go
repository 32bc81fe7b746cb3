package lang

import (
	"errors"
	"strings"

	"github.com/alecthomas/participle/v2"
	"github.com/alecthomas/participle/v2/lexer"
)

// ParseStatement parses the text of one statement, from its first character to
// the end of its last continuation line. It cannot fail: what is not a
// statement becomes an Unread with one fault.
func ParseStatement(text string) *Stmt {
	var p statementParser
	return p.parse(text)
}

// statementParser parses one statement after the other with the same buffer.
type statementParser struct{ toks []lexer.Token }

// parse gives the statement its own copy of the text, so that its tree does not
// keep a whole older note alive.
func (p *statementParser) parse(text string) *Stmt {
	s := &Stmt{Text: strings.Clone(text)}
	if len(text) > maxStatement {
		s.tooLong()
		return s
	}
	p.toks = scan(p.toks, s.Text)
	s.build(p.toks)
	return s
}

// build fills Tree, Nodes and Faults.
func (s *Stmt) build(toks []lexer.Token) {
	tree, broken := parseTokens(toks)
	if broken != nil {
		s.Faults = append(s.Faults, explain(toks, broken))
		tree = &Unread{Name: definedName(toks)}
	}
	setSpan(tree, statementSpan(toks))
	s.Tree = tree
	s.brokenProperties(toks)
	s.Faults = append(s.Faults, formCautions(tree, toks)...)
	s.number()
}

// maxStatement is the longest statement in bytes that is read: tables of some
// hundred thousand cells pass, a file that is no note does not take all memory.
const maxStatement = 4 << 20

func (s *Stmt) tooLong() {
	end := min(len(s.Text), 80)
	s.Tree = &Unread{Node: Node{Span: Span{0, len(s.Text)}}}
	s.Nodes = 1
	s.Faults = []Fault{{Rule: ruleSyntax, Severity: Error, Span: Span{0, end},
		Message: "this statement is longer than 4 MB, so it is not read",
		Detail:  "divide it; a blank line and a line that is less indented end a statement"}}
}

// parseTokens gives the tree, or the place where it breaks.
func parseTokens(toks []lexer.Token) (Statement, *breakage) {
	if !isStatementWord(toks[0].Value) || toks[0].Type != tokWord {
		r := reader{toks: toks}
		d := &Definition{}
		r.definition(d)
		r.end()
		return d, r.broken
	}
	lex, err := lexer.Upgrade(&tokenList{left: toks})
	if err != nil {
		return nil, &breakage{expected: "a statement"}
	}
	tree, err := productions()[toks[0].Value](lex)
	if err != nil {
		return nil, breakageOf(err, toks)
	}
	if c, ok := tree.(interface{ check() *breakage }); ok {
		return tree, c.check()
	}
	return tree, nil
}

// breakageOf turns an error of the grammar into the place where it breaks.
func breakageOf(err error, toks []lexer.Token) *breakage {
	var own *breakage
	if errors.As(err, &own) {
		return own
	}
	var unexpected *participle.UnexpectedTokenError
	if errors.As(err, &unexpected) {
		b := &breakage{at: tokenAt(toks, unexpected.Unexpected), expected: expectedWords(unexpected.Message())}
		if toks[0].Value == "medium" || toks[0].Value == "table" {
			b.expected = strings.Replace(b.expected, expectedEnd, "a comma or a new line", 1)
		}
		return b
	}
	return &breakage{expected: "a statement"}
}

// tokenAt is the index of a token that was reported by its value.
func tokenAt(toks []lexer.Token, t lexer.Token) int {
	for i := range toks {
		if toks[i].Pos.Offset == t.Pos.Offset && toks[i].Type == t.Type {
			return i
		}
	}
	return len(toks) - 1
}

// check refuses a table without columns.
func (t *Table) check() *breakage {
	if len(t.Columns) > 0 || t.File != nil {
		return nil
	}
	return &breakage{span: t.Name.Span, message: "this table has no columns",
		detail: "name them behind a colon, each with its unit: `table " + t.Name.Text + ": H [A/m], B [T]`"}
}

// check refuses words that name no regime.
func (g *Regime) check() *breakage {
	switch g.Word.Text {
	case "harmonic":
		return nil
	case "static", "transient":
		if g.Name == nil {
			return nil
		}
		return &breakage{span: g.Name.Span, message: "a " + g.Word.Text + " regime has no frequency",
			detail: "write `regime: " + g.Word.Text + "` or `regime: harmonic at " + g.Name.Text + " = …`"}
	}
	return &breakage{span: g.Word.Span, message: code(g.Word.Text) + " names no regime",
		detail: "a regime is `static`, `harmonic at f = …` or `transient`"}
}

// check refuses a waiver for anything but a name or a property.
func (w *Waive) check() *breakage {
	switch x := w.For.(type) {
	case nil, *Name:
		return nil
	case *Member:
		if _, ok := x.X.(*Name); ok {
			return nil
		}
	}
	return &breakage{span: w.For.Place(), message: "a waiver is for a name or a property",
		detail: "write `waive RULE for NAME: \"reason\"`, or leave `for` out to waive it for the note"}
}

// definedName is the name that a broken statement would have defined.
func definedName(toks []lexer.Token) *Ident {
	at := 0
	if toks[0].Type == tokWord && len(toks) > 2 && toks[1].Type == tokWord && namesSecond(toks[0].Value) {
		at = 1
	}
	t := toks[at]
	if t.Type != tokWord || isReserved(t.Value) {
		return nil
	}
	return identOf(&t)
}

// namesSecond reports that the word, or the statement word that it resembles,
// is followed by the name that the statement defines.
func namesSecond(word string) bool {
	switch nearestStatementWord(word) {
	case "medium", "region", "table":
		return true
	}
	return false
}

// brokenProperties turns what is broken in a medium's properties into faults.
func (s *Stmt) brokenProperties(toks []lexer.Token) {
	m, ok := s.Tree.(*Medium)
	if !ok {
		return
	}
	for _, d := range m.Properties {
		if d.broken != nil {
			s.Faults = append(s.Faults, explain(toks, d.broken))
			d.broken = nil
		}
	}
}

func statementSpan(toks []lexer.Token) Span {
	if len(toks) < 2 {
		return Span{}
	}
	return spanOf(&toks[0]).to(spanOf(&toks[len(toks)-2]))
}

func setSpan(t Statement, span Span) { t.(interface{ node() *Node }).node().Span = span }

func (n *Node) node() *Node { return n }

// number gives every node its index, in pre-order.
func (s *Stmt) number() {
	s.Nodes = 0
	s.numberFrom(s.Tree)
}

func (s *Stmt) numberFrom(t Tree) {
	t.(interface{ node() *Node }).node().ID = s.Nodes
	s.Nodes++
	eachChild(t, s.numberFrom)
}

func spanOf(t *lexer.Token) Span { return Span{t.Pos.Offset, t.Pos.Offset + len(t.Value)} }

// to is the span from the start of s to the end of e.
func (s Span) to(e Span) Span { return Span{s.Start, e.End} }

func identOf(t *lexer.Token) *Ident { return &Ident{Node{Span: spanOf(t)}, t.Value} }
