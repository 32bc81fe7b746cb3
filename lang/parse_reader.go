package lang

import (
	"github.com/alecthomas/participle/v2/lexer"
)

// breakage is the place where a statement breaks: the index of the token, what
// was expected there in plain words, and the bracket that is still open. A
// breakage with a message says all by itself.
type breakage struct {
	at       int
	expected string
	opener   int // index + 1, 0 if none is open
	message  string
	detail   string
	fix      *Fix
	end      int // with a message: index of the last token that is wrong; 0: at alone
}

func (b *breakage) Error() string { return "expected " + b.expected }

// limits on one statement, so that every walk over its tree stays shallow.
const (
	maxDepth = 200   // levels of parentheses, calls, signs and powers
	maxTerms = 10000 // operators in one expression
)

// reader reads expressions and definitions from tokens. The first breakage
// sticks: from then on peek sees the end, so that every loop finishes and no
// caller has to ask.
type reader struct {
	lex    *lexer.PeekingLexer
	depth  int
	terms  int
	opener int // the innermost open bracket or bar, index + 1
	broken *breakage
}

func (r *reader) peek() *lexer.Token {
	if r.broken != nil {
		return &noToken
	}
	return r.lex.Peek()
}

// ahead is the token n places after the next one.
func (r *reader) ahead(n int) *lexer.Token {
	at := r.lex.RawCursor()
	for ; n > 0 && r.broken == nil; n-- {
		if r.lex.Range(at, at+1)[0].EOF() {
			break
		}
		at++
	}
	if r.broken != nil {
		return &noToken
	}
	return &r.lex.Range(at, at+1)[0]
}

// before is the token that was read last.
func (r *reader) before() *lexer.Token {
	at := r.lex.RawCursor()
	if at == 0 {
		return &noToken
	}
	return &r.lex.Range(at-1, at)[0]
}

func (r *reader) next() *lexer.Token {
	if r.broken != nil {
		return &noToken
	}
	return r.lex.Next()
}

// accept reads the operator or word if it comes next.
func (r *reader) accept(text string) bool {
	if !is(r.peek(), text) {
		return false
	}
	r.next()
	return true
}

// fail notes that something else was expected at the next token.
func (r *reader) fail(expected string) {
	r.failWith(&breakage{expected: expected})
}

// failWith notes a breakage at the next token.
func (r *reader) failWith(b *breakage) {
	if r.broken == nil {
		b.at, b.opener = int(r.lex.RawCursor()), r.opener
		r.broken = b
	}
}

// expect reads the operator or word, which must come next.
func (r *reader) expect(text string) {
	if !r.accept(text) {
		r.fail("`" + text + "`")
	}
}

// enter and leave count the levels of nesting.
func (r *reader) enter() bool {
	r.depth++
	if r.depth > maxDepth {
		r.failWith(&breakage{message: "more than 200 levels of nesting",
			detail: "give parts of the expression names of their own"})
		return false
	}
	return true
}

func (r *reader) leave() { r.depth-- }

// open reads an opening bracket or bar and returns the one that was open before.
func (r *reader) open() (outer int) {
	outer = r.opener
	r.opener = int(r.lex.RawCursor()) + 1
	r.next()
	return outer
}

// closing reads the closing bracket or bar.
func (r *reader) closing(text string, outer int) {
	r.expect(text)
	if r.broken == nil {
		r.opener = outer
	}
}

// end fails unless the statement, or the line of a property or row, ends here.
func (r *reader) end() {
	if t := r.peek(); !t.EOF() && t.Type != tokLine {
		r.fail("the end of the statement")
	}
}

// spanFrom is the span from start to the end of the last token read.
func (r *reader) spanFrom(start int) Span {
	return Span{start, max(start, spanOf(r.before()).End)}
}

// ident reads a name that is defined or bound here.
func (r *reader) ident(what string) Ident {
	t := r.peek()
	if t.Type != tokWord || isReserved(t.Value) {
		r.fail(what)
		return Ident{}
	}
	r.next()
	return Ident{Node{Span: spanOf(t)}, t.Value}
}

// dotted reads a name that may belong to a referred note, as in `lib.mica`.
func (r *reader) dotted(what string) Ident {
	id := r.ident(what)
	for is(r.peek(), ".") && touch(r.before(), r.peek()) {
		r.next()
		part := r.ident("a name after the point")
		id.Text += "." + part.Text
		id.Span.End = max(id.Span.End, part.Span.End)
	}
	return id
}

// perQuote reads `per "…"` where it comes next.
func (r *reader) perQuote() *Quote {
	if !r.accept("per") {
		return nil
	}
	q := r.quote()
	return &q
}

func (r *reader) quote() Quote {
	t := r.peek()
	if t.Type != tokQuote {
		r.fail("a text in double quotation marks")
		return Quote{}
	}
	r.next()
	return Quote{Node{Span: spanOf(t)}, quoted(t.Value)}
}
