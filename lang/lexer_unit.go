package lang

import (
	"strings"
	"unicode"
	"unicode/utf8"
)

// unit adds a unit phrase where one follows after blanks on the same line.
func (s *scanner) unit() {
	at := s.at
	for at < len(s.text) {
		n := blank(s.text[at:])
		if n == 0 {
			break
		}
		at += n
	}
	if at == s.at && !strings.HasPrefix(s.text[at:], "°") {
		return
	}
	if end := s.phraseEnd(at); end > at {
		s.at = at
		s.add(tokUnit, end)
	}
}

// phraseEnd is the end of the unit phrase that begins at at, or at itself.
// A phrase has no blanks and goes on as long as an operator is followed at once
// by a symbol or by a group of symbols that closes without a blank.
func (s *scanner) phraseEnd(at int) int {
	end := s.symbolEnd(at, true)
	if end == at {
		return at
	}
	for end < len(s.text) {
		op := phraseOperator(s.text[end:])
		if op == 0 {
			break
		}
		next := s.operandEnd(end + op)
		if next == end+op {
			break
		}
		end = next
	}
	return s.withLoosePower(at, end)
}

// operandEnd is the end of a symbol or a group, with its exponent.
func (s *scanner) operandEnd(at int) int {
	if strings.HasPrefix(s.text[at:], "(") {
		if end := s.groupEnd(at); end > at {
			return exponentEnd(s.text, end)
		}
		return at
	}
	return s.symbolEnd(at, false)
}

// groupEnd is the end of `(symbol op symbol …)` without blanks, or at itself.
// Groups do not nest.
func (s *scanner) groupEnd(at int) int {
	end := s.symbolEnd(at+1, false)
	if end == at+1 {
		return at
	}
	for {
		if strings.HasPrefix(s.text[end:], ")") {
			return end + 1
		}
		op := phraseOperator(s.text[end:])
		next := s.symbolEnd(end+op, false)
		if op == 0 || next == end+op {
			return at
		}
		end = next
	}
}

// symbolEnd is the end of one symbol with its exponent, or at itself. `in` is
// the inch except where it is the keyword.
func (s *scanner) symbolEnd(at int, first bool) int {
	rest := s.text[at:]
	if rest == "" {
		return at
	}
	r, size := utf8.DecodeRuneInString(rest)
	end := at
	switch {
	case unicode.IsLetter(r):
		end = wordPart(s.text, at)
		if word := s.text[at:end]; isReserved(word) && (word != "in" || first && s.head) {
			return at
		}
		if s.text[at:end] == "dB" && strings.HasPrefix(s.text[end:], "(") {
			end = s.groupEnd(end) // dB(uV/m)
		}
	case r == '°':
		end = wordEnd(s.text, at+size)
	case r == '%', r == '℃', r == '‰':
		end = at + size
	default:
		return at
	}
	return exponentEnd(s.text, end)
}

// phraseOperator is the length of the operator of a phrase, else 0.
func phraseOperator(s string) int {
	for _, op := range [...]string{"/", "·", ".", "⋅"} {
		if strings.HasPrefix(s, op) {
			return len(op)
		}
	}
	return 0
}

// exponentEnd is the end of the exponent at at (`^-2`, `^(1/2)`, `⁻¹`), or at.
func exponentEnd(text string, at int) int {
	rest := text[at:]
	if n := superscripts(rest); n > 0 {
		return at + n
	}
	if !strings.HasPrefix(rest, "^") {
		return at
	}
	if n := integer(rest[1:]); n > 0 {
		return at + 1 + n
	}
	if !strings.HasPrefix(rest, "^(") {
		return at
	}
	n := integer(rest[2:])
	if n == 0 {
		return at
	}
	end := 2 + n
	if strings.HasPrefix(rest[end:], "/") {
		d := digits(rest[end+1:])
		if d == 0 {
			return at
		}
		end += 1 + d
	}
	if !strings.HasPrefix(rest[end:], ")") {
		return at
	}
	return at + end + 1
}

// withLoosePower takes in `/2` after `^1`: nobody writes the power one, so
// `Hz^1/2` means a root that wants parentheses, which the phrase's check says.
func (s *scanner) withLoosePower(at, end int) int {
	if !strings.HasSuffix(s.text[at:end], "^1") || !strings.HasPrefix(s.text[end:], "/") {
		return end
	}
	return end + 1 + digits(s.text[end+1:]) - b2i(digits(s.text[end+1:]) == 0)
}

func b2i(b bool) int {
	if b {
		return 1
	}
	return 0
}

// digits is the length of the run of decimal digits at the start of s.
func digits(s string) int {
	n := 0
	for n < len(s) && isDigit(s[n]) {
		n++
	}
	return n
}

// integer is the length of the signed integer at the start of s, else 0.
func integer(s string) int {
	sign := signLength(s)
	n := digits(s[sign:])
	if n == 0 {
		return 0
	}
	return sign + n
}

// signLength is the length of a sign at the start of s, else 0.
func signLength(s string) int {
	for _, sign := range [...]string{"-", "+", "−"} {
		if strings.HasPrefix(s, sign) {
			return len(sign)
		}
	}
	return 0
}
