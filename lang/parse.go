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
	s := &Stmt{Text: strings.Clone(text)}
	s.parse()
	return s
}

// parse fills Tree, Nodes and Faults from Text. The text is owned by the
// statement, so that its tree does not keep a whole older note alive.
func (s *Stmt) parse() {
	if len(s.Text) > maxStatement {
		s.tooLong()
		return
	}
	toks := scan(s.Text)
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
	lex, err := lexer.Upgrade(&tokenList{left: toks})
	if err != nil {
		return nil, &breakage{expected: "a statement"}
	}
	if !isStatementWord(toks[0].Value) || toks[0].Type != tokWord {
		r := reader{lex: lex}
		d := &Definition{}
		r.definition(d)
		r.end()
		return d, r.broken
	}
	line, err := grammar().ParseFromLexer(lex)
	if err != nil {
		return nil, breakageOf(err, toks)
	}
	return line.finish()
}

// breakageOf turns an error of the grammar into the place where it breaks.
func breakageOf(err error, toks []lexer.Token) *breakage {
	var own *breakage
	if errors.As(err, &own) {
		return own
	}
	var unexpected *participle.UnexpectedTokenError
	if errors.As(err, &unexpected) {
		return &breakage{at: tokenAt(toks, unexpected.Unexpected), expected: expectedWords(unexpected.Message())}
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

// finish gives the one statement of the line and checks what tags cannot say.
func (l *statementLine) finish() (Statement, *breakage) {
	switch {
	case l.Medium != nil:
		return l.Medium, nil
	case l.Region != nil:
		return l.Region, nil
	case l.Table != nil:
		return l.Table, nil
	case l.Regime != nil:
		return l.Regime, nil
	case l.Uses != nil:
		return l.Uses, nil
	case l.Assume != nil:
		return l.Assume, nil
	case l.Criterion != nil:
		return l.Criterion, nil
	case l.Check != nil:
		return l.Check, nil
	case l.Safety != nil:
		return l.Safety, nil
	case l.Waive != nil:
		return l.Waive, nil
	}
	return l.Plot, nil
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
