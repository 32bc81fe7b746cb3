package lang

import (
	"strconv"
	"strings"
	"unicode/utf8"

	"github.com/alecthomas/participle/v2/lexer"

	"inkjoule/lang/unit"
)

// ruleSyntax is the name of every finding about the form of a statement.
const ruleSyntax = "syntax"

// clue is what a slip is recognised by: the tokens, and where they break.
type clue struct {
	toks []lexer.Token
	at   int
	*breakage
}

// slips are the usual mistakes that deserve their own message, tried in order;
// the first that fits explains the breakage. Each returns nil where it does not
// fit.
var slips = [...]func(*clue) *Fault{
	badToken, statementAsName, misspeltStatement, reservedName, deeperLine,
	kindBeforeMedium, missingEqual, chainAfterRange, resultIn, bracketedUnit,
	qualifierAfterUnit, powerOfTen, missingTimes, unitBehindName, numbersInRow, attosecond,
	commaAfterValue, sourceUnquoted, blankAlone, equalInClaim, formOfCall, spreadOfName, strayAt,
}

// explain turns the place where a statement breaks into a fault, with the right
// form where a usual slip explains it.
func explain(toks []lexer.Token, b *breakage) Fault {
	c := &clue{toks, min(b.at, len(toks)-1), b}
	f := c.fault()
	f.Rule, f.Severity = ruleSyntax, Error
	if f.Span == (Span{}) {
		f.Span = c.place()
	}
	if b.opener > 0 && c.wantsClosing() && f.Detail == "" && f.Fix == nil {
		c.openerHint(f)
	}
	return *f
}

func (c *clue) fault() *Fault {
	if c.message != "" {
		return &Fault{Message: c.message, Detail: c.detail, Fix: c.fix, Span: c.span}
	}
	for _, slip := range slips {
		if f := slip(c); f != nil {
			return f
		}
	}
	return &Fault{Message: "expected " + c.expected + ", found " + foundWords(c.tok(0))}
}

// tok is the token n places from the break; an EOF token outside.
func (c *clue) tok(n int) *lexer.Token {
	if i := c.at + n; 0 <= i && i < len(c.toks) {
		return &c.toks[i]
	}
	return &noToken
}

// place is the token that is wrong; where the statement or line ends too early,
// the token before its end.
func (c *clue) place() Span {
	at := c.at
	for at > 0 && c.toks[at].Value == "" {
		at--
	}
	return spanOf(&c.toks[at])
}

// openerHint points to the bracket or bar that is still open.
func (c *clue) openerHint(f *Fault) {
	open := &c.toks[min(c.opener-1, len(c.toks)-1)]
	f.Related = []Related{{Span: spanOf(open), Message: "`" + open.Value + "` is opened here"}}
	if t := c.tok(0); t.EOF() || t.Type == tokLine || is(t, "=") || is(t, ")") || is(t, "]") {
		f.Detail = "close `" + open.Value + "`"
	}
}

// wantsClosing reports that a closing bracket or bar was expected.
func (c *clue) wantsClosing() bool {
	return c.expected == "`)`" || c.expected == "`|`" || c.expected == "`]`"
}

// inExpression reports a break where an expression could have gone on.
func (c *clue) inExpression() bool {
	if !isStatementWord(c.toks[0].Value) && !c.seen("=") {
		return false
	}
	switch c.expected {
	case expectedEnd, expectedComparison, "`to`", "`for`":
		return true
	}
	return c.wantsClosing()
}

// seen reports an operator or word before the break.
func (c *clue) seen(text string) bool {
	for i := range c.toks[:c.at] {
		if is(&c.toks[i], text) {
			return true
		}
	}
	return false
}

// endsOperand reports a token after which an operator is due.
func endsOperand(t *lexer.Token) bool {
	switch t.Type {
	case tokNumber, tokUnit, tokPower:
		return true
	case tokWord:
		return !isReserved(t.Value) || t.Value == "j" || t.Value == "pi" || t.Value == "π"
	}
	return is(t, ")") || is(t, "]") || is(t, "|")
}

// isUnit reports a unit phrase that the unit table knows.
func isUnit(phrase string) bool {
	_, err := unit.Parse(phrase)
	return err == nil
}

// phraseAt is the text of the touching tokens from the break on, as far as they
// can be a unit phrase, and the number of those tokens.
func (c *clue) phraseAt(n int) (text string, count int) {
	for i := n; ; i++ {
		t := c.tok(i)
		ok := t.Type == tokWord || t.Type == tokNumber || t.Type == tokPower || t.Type == tokUnit ||
			t.Type == tokBad && t.Value == "%" ||
			t.Type == tokOp && strings.Contains("/·.^-()⋅−", t.Value)
		if !ok || i > n && !touch(c.tok(i-1), t) {
			return strings.TrimRight(text, "/·.^("), i - n
		}
		text += t.Value
	}
}

// edit replaces the tokens from the n-th to the m-th place after the break.
func (c *clue) edit(n, m int, text string) []Edit {
	return []Edit{{spanOf(c.tok(n)).to(spanOf(c.tok(m))), text}}
}

// insert puts text before the token n places from the break.
func (c *clue) insert(n int, text string) []Edit {
	at := c.tok(n).Pos.Offset
	return []Edit{{Span{at, at}, text}}
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
	return code(t.Value)
}

// code shows a piece of the note in a message, shortened.
func code(s string) string {
	if r := []rune(s); len(r) > 40 {
		s = string(r[:40]) + "…"
	}
	return "`" + strings.Join(strings.Fields(s), " ") + "`"
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
		return expectedEnd
	}
	first, _, _ := strings.Cut(strings.TrimLeft(strings.TrimSuffix(list, ")"), "( "), " ")
	if word, err := strconv.Unquote(strings.Trim(first, "()?*")); err == nil {
		return "`" + word + "`"
	}
	if plain, ok := plainWords[strings.Trim(first, "()?*")]; ok {
		return plain
	}
	return "another form"
}
