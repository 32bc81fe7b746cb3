package unit

import (
	"strings"
	"unicode"
	"unicode/utf8"
)

// PhraseError is what is wrong with a unit phrase, at bytes [Start, End) of it.
type PhraseError struct {
	Start, End int
	Rule       string // "unknown-unit" or "syntax"
	Symbol     string // the unknown symbol, for unknown-unit
	Message    string // what was found, what was expected
	Detail     string // what to write instead
	Suggest    string // the whole phrase corrected; "" where there is no one form
}

// Error returns the message.
func (e *PhraseError) Error() string { return e.Message }

// Bounds of a phrase: beyond them it is no unit that anybody writes, and the
// arithmetic of exponents stays small.
const (
	maxExponent = 99
	maxDepth    = 8
)

// Parse reads a unit phrase: symbols joined by `·` (or `.`) and `/`, exponents,
// groups in parentheses, no blanks; `1` is dimension one. A `/` divides by the
// next symbol or parenthesis only, and nothing may follow that without
// parentheses (ISO 80000-1, 7.2.3). A level unit stands alone or per length.
func Parse(phrase string) (Unit, *PhraseError) {
	if isLevel(phrase) {
		return parseLevel(phrase)
	}
	p := parser{s: phrase}
	dim, f := p.group()
	if p.err == nil && p.at < len(p.s) {
		p.stray()
	}
	if p.err != nil {
		return Unit{}, p.err
	}
	u := Unit{Symbol: phrase, Dim: dim, Factor: f}
	if p.celsius && p.symbols == 1 && p.plain {
		u.Offset = 273.15 // SI Brochure, 9th ed., 2.3.1: exact
	}
	u, ok := u.finish()
	if !ok || !dim.Valid() {
		p.fail(0, len(phrase), "the unit is outside the range of numbers", "", "")
		return Unit{}, p.err
	}
	return u, nil
}

// parser reads one phrase; the first fault stops it.
type parser struct {
	s       string
	at      int // byte offset of what is read next
	depth   int // of open parentheses
	symbols int
	celsius bool // a °C was read
	plain   bool // no operator, exponent or parenthesis so far
	err     *PhraseError
}

func (p *parser) fail(start, end int, message, detail, suggest string) {
	if p.err == nil {
		p.err = &PhraseError{Start: start, End: end, Rule: "syntax", Message: printable(message), Detail: printable(detail), Suggest: suggest}
	}
}

// operator reads `·`, `⋅`, `.` or `/`; 0 where none follows.
func (p *parser) operator() byte {
	rest := p.s[p.at:]
	switch {
	case rest == "":
		return 0
	case rest[0] == '/':
		p.at++
		return '/'
	case rest[0] == '.':
		p.at++
		return '.'
	case strings.HasPrefix(rest, "·"):
		p.at += len("·")
		return '.'
	case strings.HasPrefix(rest, "⋅"):
		p.at += len("⋅")
		return '.'
	}
	return 0
}

// group reads factors joined by operators, up to `)` or the end.
func (p *parser) group() (Dim, Factor) {
	p.plain = p.symbols == 0 && p.depth == 0
	dim, f := p.factor(true)
	slash := -1 // offset of the group's `/`
	for p.err == nil {
		before := p.at
		op := p.operator()
		if op == 0 {
			break
		}
		p.plain = false
		if slash >= 0 {
			p.afterSlash(slash)
			break
		}
		d, g := p.factor(false)
		if op == '/' {
			slash = before
			dim, f = dim.Div(d), f.Div(g)
			continue
		}
		dim, f = dim.Mul(d), f.Mul(g)
	}
	return dim, f
}

// factor reads a symbol or a group, with its exponent. first allows `1`.
func (p *parser) factor(first bool) (dim Dim, f Factor) {
	start := p.at
	switch c := p.peek(); {
	case c == '(':
		dim, f = p.parenthesis()
	case c == '1' && first && !isDigit(p.byteAt(p.at+1)):
		p.at++
		return Dim{}, Factor{}
	default:
		dim, f = p.symbol()
	}
	if p.err != nil {
		return dim, f
	}
	if e, ok := p.exponent(start); ok && p.err == nil {
		p.plain = false
		return dim.Pow(e), f.Pow(e)
	}
	return dim, f
}

func (p *parser) peek() byte { return p.byteAt(p.at) }

func (p *parser) byteAt(i int) byte {
	if i < len(p.s) {
		return p.s[i]
	}
	return 0
}

// parenthesis reads `( … )`.
func (p *parser) parenthesis() (dim Dim, f Factor) {
	open := p.at
	p.at++
	p.plain = false
	if p.depth++; p.depth > maxDepth {
		p.fail(open, open+1, "parentheses are nested too deeply in the unit", "write the unit with one group", "")
		return dim, f
	}
	dim, f = p.group()
	p.depth--
	p.plain = false
	if p.err != nil {
		return dim, f
	}
	if p.peek() != ')' {
		if p.at < len(p.s) {
			p.stray()
		} else {
			p.fail(open, open+1, "this `(` is not closed in the unit", "close it: `"+p.s+")`", p.s+")")
		}
		return dim, f
	}
	p.at++
	return dim, f
}

// symbol reads a unit symbol.
func (p *parser) symbol() (dim Dim, f Factor) {
	start := p.at
	p.at += symbolLen(p.s[p.at:])
	text := p.s[start:p.at]
	if text == "" {
		p.missing()
		return dim, f
	}
	r, prefix, ok := lookup(text)
	if !ok {
		p.err = p.unknown(start, text)
		return dim, f
	}
	p.symbols++
	p.celsius = p.celsius || r.symbol == "°C"
	return r.dim, r.factor(prefix)
}

// symbolLen is the length of the symbol that s begins with: letters, `_` and
// the signs that are unit symbols.
func symbolLen(s string) int {
	for i := 0; i < len(s); {
		c := s[i]
		if c < utf8.RuneSelf {
			if !(c|0x20 >= 'a' && c|0x20 <= 'z' || c == '_' || c == '%' || c == '\'') {
				return i
			}
			i++
			continue
		}
		r, n := utf8.DecodeRuneInString(s[i:])
		if !symbolRune(r) || isSuperscript(r) {
			return i
		}
		i += n
	}
	return len(s)
}

// symbolRune reports a non-ASCII character that may stand in a symbol. U+030A
// is the ring of an Å written in two characters.
func symbolRune(r rune) bool {
	switch r {
	case '°', '′', '″', '‰', '℃', '℉', '\u030A':
		return true
	}
	return unicode.IsLetter(r)
}

func isDigit(c byte) bool { return c >= '0' && c <= '9' }
