package lang

import (
	"io"
	"unicode"
	"unicode/utf8"

	"github.com/alecthomas/participle/v2/lexer"
)

// The token types of a statement. Blanks and remarks are dropped here, not by
// the parser; what cannot be a token becomes tokBad, so that lexing never fails
// and the parser says what is wrong in its own words.
const (
	tokWord   lexer.TokenType = iota + 1 // a name or a reserved word
	tokNumber                            // 12, 1.2e-3, 12.0(1)
	tokUnit                              // a unit phrase after a number, a blank or a parenthesis
	tokQuote                             // "text", quotes included
	tokPower                             // ², ⁻¹
	tokAsk                               // __
	tokLine                              // a property or row of a medium or table begins; no text
	tokOp                                // one operator or bracket
	tokBad                               // anything else
)

// lexing is the lexer.Definition of the grammar: it only names the token types,
// since statements are scanned whole (scan) before they are parsed.
type lexing struct{}

func (lexing) Symbols() map[string]lexer.TokenType {
	return map[string]lexer.TokenType{
		"EOF": lexer.EOF, "Word": tokWord, "Number": tokNumber, "Unit": tokUnit, "Quote": tokQuote,
		"Power": tokPower, "Ask": tokAsk, "Line": tokLine, "Op": tokOp, "Bad": tokBad,
	}
}

// Lex scans a whole statement; the file name is not used.
func (lexing) Lex(_ string, r io.Reader) (lexer.Lexer, error) {
	text, err := io.ReadAll(r)
	if err != nil {
		return nil, err
	}
	return &tokenList{left: scan(nil, string(text))}, nil
}

// tokenList serves tokens that are scanned already. The last must be EOF.
type tokenList struct{ left []lexer.Token }

func (l *tokenList) Next() (lexer.Token, error) {
	t := l.left[0]
	if len(l.left) > 1 {
		l.left = l.left[1:]
	}
	return t, nil
}

// layout tells which line ends matter in a statement.
type layout uint8

const (
	flowing layout = iota // none
	listing               // medium: a line that is not deeper than its first property begins one
	rows                  // table: every line after the head is a row
)

// scanner turns the text of one statement into tokens. Pos.Line of a token is
// 0-based within the statement; Pos.Column of the first is the number of tokens,
// which lets a hook see all of them.
type scanner struct {
	text      string
	at        int
	line      int
	lineStart int
	ended     int // line on which the last token ends
	toks      []lexer.Token
	layout    layout
	base      int  // column of the current property's line; -1 before the first
	head      bool // left of the first `=` of a definition, where `in` is a keyword
}

// scan puts the tokens of a statement into the buffer. It never fails; the last
// token is EOF.
func scan(buffer []lexer.Token, text string) []lexer.Token {
	s := scanner{text: text, base: -1, toks: buffer[:0]}
	s.begin()
	for s.skip() {
		s.startLine()
		s.token()
	}
	toks := append(s.toks, lexer.EOFToken(s.pos(len(text))))
	toks[0].Pos.Column = len(toks)
	return toks
}

// begin looks at the first word, which decides the layout of the statement.
func (s *scanner) begin() {
	end := wordEnd(s.text, 0)
	switch word := s.text[:end]; {
	case word == "medium":
		s.layout = listing
	case word == "table":
		s.layout = rows
	default:
		s.head = !isStatementWord(word)
	}
}

func (s *scanner) pos(at int) lexer.Position { return lexer.Position{Offset: at, Line: s.line} }

func (s *scanner) add(kind lexer.TokenType, end int) {
	s.toks = append(s.toks, lexer.Token{Type: kind, Value: s.text[s.at:end], Pos: s.pos(s.at)})
	s.at = end
	s.ended = s.line
}

// last is the token before the current place, or an EOF token at the start.
func (s *scanner) last(back int) *lexer.Token {
	if len(s.toks) < back {
		return &noToken
	}
	return &s.toks[len(s.toks)-back]
}

var noToken = lexer.Token{Type: lexer.EOF, Pos: lexer.Position{Offset: -1}}

// skip passes blanks, line ends and remarks; false at the end of the text.
func (s *scanner) skip() bool {
	for s.at < len(s.text) {
		switch c := s.text[s.at]; {
		case c == '\n', c == '\r':
			s.at += lineEnd(s.text[s.at:])
			s.line++
			s.lineStart = s.at
		case c == '#':
			for s.at < len(s.text) && s.text[s.at] != '\n' && s.text[s.at] != '\r' {
				s.at++
			}
		default:
			n := blank(s.text[s.at:])
			if n == 0 {
				return true
			}
			s.at += n
		}
	}
	return false
}

// startLine adds a tokLine where a line begins a property or a row.
func (s *scanner) startLine() {
	if s.layout == flowing || s.line == s.ended || len(s.toks) == 0 {
		return
	}
	col := columns(s.text[s.lineStart:s.at])
	switch {
	case s.base < 0 && s.last(1).Value == ",": // the head goes on
		return
	case s.base >= 0 && s.layout == listing && col > s.base: // the property goes on
		return
	}
	s.base = col
	s.add(tokLine, s.at)
}

func (s *scanner) token() {
	r, size := utf8.DecodeRuneInString(s.text[s.at:])
	switch {
	case r == '"':
		s.quote()
	case isDigit(s.text[s.at]), r == '.' && s.pointOpensNumber():
		s.number()
	case r == '_':
		s.ask()
	case isSuperscript(r):
		s.add(tokPower, s.at+superscripts(s.text[s.at:]))
	case unicode.IsLetter(r):
		s.add(tokWord, wordEnd(s.text, s.at))
	case s.layout == rows && s.base < 0 && s.symbolEnd(s.at, false) > s.at: // [°C], x/%
		s.add(tokUnit, s.symbolEnd(s.at, false))
	default:
		s.operator(r, size)
	}
}

// quote reads to the closing quotation mark, over line ends; a text that is
// never closed is bad as a whole.
func (s *scanner) quote() {
	for i := s.at + 1; i < len(s.text); i++ {
		if s.text[i] == '"' {
			lines, lineStart := s.line, s.lineStart
			for k := s.at; k < i; k++ {
				if n := lineEnd(s.text[k:]); n > 0 {
					lines, lineStart = lines+1, k+n
					k += n - 1
				}
			}
			s.add(tokQuote, i+1)
			s.line, s.lineStart, s.ended = lines, lineStart, lines
			return
		}
	}
	s.add(tokBad, len(s.text))
}

// ask reads `__`; a lone `_` is bad, with the word that it may begin.
func (s *scanner) ask() {
	end := s.at
	for end < len(s.text) && s.text[end] == '_' {
		end++
	}
	if after := wordPart(s.text, end); after > end || end-s.at == 1 {
		s.add(tokBad, max(after, end))
		return
	}
	s.add(tokAsk, end)
	s.unit()
}

// operators that are written with more than one character; those that are not
// of the language are bad tokens.
var longOperators = []struct {
	text string
	bad  bool
}{
	{"+/-", false}, {"<<", false}, {">>", false}, {"<=", false}, {">=", false},
	{"==", true}, {":=", true}, {"=<", true}, {"=>", true}, {"!=", true}, {"**", true},
}

func (s *scanner) operator(r rune, size int) {
	rest := s.text[s.at:]
	for _, op := range longOperators {
		if len(rest) >= len(op.text) && rest[:len(op.text)] == op.text {
			kind := tokOp
			if op.bad {
				kind = tokBad
				s.head = false
			}
			s.add(kind, s.at+len(op.text))
			return
		}
	}
	if r == utf8.RuneError && size <= 1 || operatorOf(r) == 0 {
		s.add(tokBad, s.at+s.badLength(r, size))
		return
	}
	s.add(tokOp, s.at+size)
	switch r {
	case '=':
		s.head = false
	case ')':
		if !s.head {
			s.unit()
		}
	}
}

// badLength keeps what belongs together in one bad token: a run of bytes that
// are not UTF-8, a text in curly quotation marks.
func (s *scanner) badLength(r rune, size int) int {
	rest := s.text[s.at:]
	if r == utf8.RuneError && size <= 1 {
		n := 0
		for n < len(rest) {
			if r, size := utf8.DecodeRuneInString(rest[n:]); r != utf8.RuneError || size > 1 {
				break
			}
			n++
		}
		return max(n, 1)
	}
	if isCurly(r) {
		for i, c := range rest {
			if i > 0 && (isCurly(c) || c == '"') {
				return i + utf8.RuneLen(c)
			}
			if c == '\n' || c == '\r' {
				break
			}
		}
	}
	return max(size, 1)
}
