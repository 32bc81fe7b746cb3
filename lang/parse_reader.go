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
	span     Span // with a message: what is wrong; zero for the token
}

func (b *breakage) Error() string { return "expected " + b.expected }

// What is expected where a statement or a comparison may go on.
const (
	expectedEnd        = "the end of the statement"
	expectedComparison = "a comparison (`<`, `<=`, `>`, `>=`, `<<`, `>>`)"
)

// limits on one statement, so that every walk over its tree stays shallow.
const (
	maxDepth = 200   // levels of parentheses, calls, signs and powers
	maxTerms = 10000 // operators in one expression
)

// reader reads expressions and definitions from the tokens of a statement. The
// first breakage sticks: from then on peek sees the end, so that every loop
// finishes and no caller has to ask.
type reader struct {
	toks   []lexer.Token // of the whole statement; the last is EOF
	at     int           // index of the next token
	depth  int
	terms  int
	opener int // the innermost open bracket or bar, index + 1
	broken *breakage
}

func (r *reader) peek() *lexer.Token { return r.ahead(0) }

// ahead is the token n places after the next one.
func (r *reader) ahead(n int) *lexer.Token {
	if r.broken != nil {
		return &noToken
	}
	return &r.toks[min(r.at+n, len(r.toks)-1)]
}

// before is the token that was read last.
func (r *reader) before() *lexer.Token {
	if r.at == 0 {
		return &noToken
	}
	return &r.toks[r.at-1]
}

func (r *reader) next() *lexer.Token {
	t := r.peek()
	if r.broken == nil && r.at < len(r.toks)-1 {
		r.at++
	}
	return t
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
		b.at, b.opener = r.at, r.opener
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
	r.opener = r.at + 1
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
		r.fail(expectedEnd)
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
