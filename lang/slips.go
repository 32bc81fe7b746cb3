package lang

import (
	"strconv"
	"strings"
	"unicode/utf8"

	"github.com/alecthomas/participle/v2/lexer"
)

// ruleSyntax is the name of every finding about the form of a statement.
const ruleSyntax = "syntax"

// explain turns the place where a statement breaks into a fault, with the right
// form where a usual slip explains it.
func explain(toks []lexer.Token, b *breakage) Fault {
	b.at = min(b.at, len(toks)-1)
	f := Fault{Rule: ruleSyntax, Severity: Error, Span: faultSpan(toks, b.at)}
	if b.message != "" {
		f.Message, f.Detail, f.Fix = b.message, b.detail, b.fix
		return f
	}
	f.Message = "expected " + b.expected + ", found " + foundWords(&toks[b.at])
	return f
}

// faultSpan is the token that is wrong; where the statement ends too early, the
// token before its end.
func faultSpan(toks []lexer.Token, at int) Span {
	for at > 0 && len(toks[at].Value) == 0 {
		at--
	}
	return spanOf(&toks[at])
}

// foundWords describes a token.
func foundWords(t *lexer.Token) string {
	switch {
	case t.EOF():
		return "the end of the statement"
	case t.Type == tokLine:
		return "the end of the line"
	case t.Type == tokQuote:
		return "a quoted text"
	case !utf8.ValidString(t.Value):
		return "bytes that are not UTF-8"
	}
	return "`" + shorten(t.Value) + "`"
}

func shorten(s string) string {
	if r := []rune(s); len(r) > 40 {
		return string(r[:40]) + "…"
	}
	return s
}

// plainWords are the grammar's nodes in words.
var plainWords = map[string]string{
	"Ident": "a name", "Quote": "a text in double quotation marks", "Words": "a word", "Expr": "an expression",
	"Relation": "a comparison", "Range": "`for VARIABLE from A to B`", "Call": "a shape, such as `box(a, b, c)`",
	"Column": "a column", "Row": "a row", "<line>": "a new line", "Definition": "a property",
}

// expectedWords reads what was expected out of the message of the grammar.
func expectedWords(message string) string {
	_, list, ok := strings.Cut(message, " (expected ")
	if !ok {
		return "the end of the statement"
	}
	first, _, _ := strings.Cut(strings.TrimLeft(strings.TrimSuffix(list, ")"), "( "), " ")
	if word, err := strconv.Unquote(first); err == nil {
		return "`" + word + "`"
	}
	if plain, ok := plainWords[strings.Trim(first, "()?*")]; ok {
		return plain
	}
	return "another form"
}

// nearestStatementWord is the statement word that a word resembles, or "".
func nearestStatementWord(word string) string {
	if isStatementWord(word) {
		return word
	}
	return ""
}

func plainCount(n int) string { return strconv.Itoa(n) }

func formCautions(Statement, []lexer.Token) []Fault { return nil }
