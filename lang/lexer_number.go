package lang

import (
	"unicode"
	"unicode/utf8"
)

// pointOpensNumber reports whether the point at the current place begins a
// number without a leading zero: it follows no name, bracket or number.
func (s *scanner) pointOpensNumber() bool {
	if s.at+1 >= len(s.text) || !isDigit(s.text[s.at+1]) {
		return false
	}
	last := s.last(1)
	touching := last.Pos.Offset+len(last.Value) == s.at
	return !touching || last.Type == tokOp && last.Value != ")" && last.Value != "]"
}

// number reads `12`, `0.5`, `1.2e-3`, `12.0(1)`, `1.2(4)e-3` and the unit after
// it. A number that runs into a letter or a second point is bad as a whole.
func (s *scanner) number() {
	end := numberEnd(s.text, s.at)
	if bad := badNumberEnd(s.text, end); bad > end || s.text[s.at] == '.' {
		s.add(tokBad, max(bad, end))
		return
	}
	power := s.afterCaret()
	s.add(tokNumber, end)
	if power || s.layout == rows && s.base >= 0 {
		return
	}
	s.unit()
	s.markDecimalComma()
}

// numberEnd is the end of the number at at, as far as it is well formed.
func numberEnd(text string, at int) int {
	at += digits(text[at:])
	if at+1 < len(text) && text[at] == '.' && isDigit(text[at+1]) {
		at += 1 + digits(text[at+1:])
	}
	at = spreadEnd(text, at)
	if at < len(text) && (text[at] == 'e' || text[at] == 'E') {
		if n := integer(text[at+1:]); n > 0 {
			at += 1 + n
		}
	}
	return at
}

// spreadEnd is the end of `(1)` or `(0.1)` directly after a number, or at.
func spreadEnd(text string, at int) int {
	if at >= len(text) || text[at] != '(' {
		return at
	}
	end := at + 1 + digits(text[at+1:])
	if end == at+1 {
		return at
	}
	if end+1 < len(text) && text[end] == '.' && isDigit(text[end+1]) {
		end += 1 + digits(text[end+1:])
	}
	if end < len(text) && text[end] == ')' {
		return end + 1
	}
	return at
}

// badNumberEnd is the end of what runs into a number (`12kV`, `1.2.3`, `5%`),
// or at if nothing does. A degree sign may touch its number.
func badNumberEnd(text string, at int) int {
	if at >= len(text) {
		return at
	}
	r, _ := utf8.DecodeRuneInString(text[at:])
	switch {
	case r == '.' && at+1 < len(text) && isDigit(text[at+1]):
		end := at
		for end < len(text) && (isDigit(text[end]) || text[end] == '.') {
			end++
		}
		return end
	case r == '°' && wordEnd(text, at+len("°")) == at+len("°"):
		return at
	case unicode.IsLetter(r), r == '_', r == '%', r == '°', r == '℃':
		s := scanner{text: text}
		return max(s.phraseEnd(at), wordPart(text, at))
	}
	return at
}

// afterCaret reports whether the next token is an exponent, which takes no unit.
func (s *scanner) afterCaret() bool {
	last := s.last(1)
	if last.Type == tokOp && (is(last, "-") || last.Value == "+") {
		last = s.last(2)
	}
	return last.Type == tokOp && last.Value == "^"
}

// markDecimalComma turns the comma of `1,5 mm` into a bad token: a unit that
// follows digit-comma-digit leaves open what the comma means.
func (s *scanner) markDecimalComma() {
	if s.last(1).Type != tokUnit || len(s.toks) < 4 {
		return
	}
	whole, comma, part := s.last(4), s.last(3), s.last(2)
	if comma.Value == "," && whole.Type == tokNumber && part.Type == tokNumber && touch(whole, comma) && touch(comma, part) {
		comma.Type = tokBad
	}
}
