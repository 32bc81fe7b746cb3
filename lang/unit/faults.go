package unit

import (
	"strings"
	"unicode"
	"unicode/utf8"
)

// afterSlash reports `W/m·K` and `J/kg/K`: a second operator after a `/`, which
// was just read. The form offered collects what follows the `/`.
func (p *parser) afterSlash(slash int) {
	end := groupEnd(p.s, slash)
	parts := splitFactors(p.s[slash+1 : end])
	if len(parts) < 2 {
		p.missing()
		return
	}
	below := "/(" + strings.Join(parts, "·") + ")"
	right := p.s[:slash] + below + p.s[end:]
	p.fail(slash, end, "`"+p.s[slash:end]+"` can be read in two ways: a `/` divides by the next symbol or parenthesis only",
		"write `"+right+"` if all of it divides (ISO 80000-1)", right)
}

// groupEnd is the offset of the `)` that closes the group in which from lies,
// or the end.
func groupEnd(s string, from int) int {
	depth := 0
	for i := from; i < len(s); i++ {
		switch s[i] {
		case '(':
			depth++
		case ')':
			if depth--; depth < 0 {
				return i
			}
		}
	}
	return len(s)
}

// splitFactors splits at the operators outside parentheses and takes the
// parentheses off factors that are products. Empty factors are left out.
func splitFactors(s string) []string {
	var parts []string
	depth, from := 0, 0
	for i, r := range s {
		switch {
		case r == '(':
			depth++
		case r == ')':
			depth--
		case depth == 0 && isOperator(r) && !decimalPoint(s, i):
			parts = appendFactor(parts, s[from:i])
			from = i + utf8.RuneLen(r)
		}
	}
	return appendFactor(parts, s[from:])
}

func appendFactor(parts []string, s string) []string {
	if s == "" {
		return parts
	}
	return append(parts, bare(s))
}

func isOperator(r rune) bool { return r == '/' || r == '.' || r == '·' || r == '⋅' }

// decimalPoint reports a `.` before a digit, which is no operator.
func decimalPoint(s string, i int) bool {
	return s[i] == '.' && i+1 < len(s) && isDigit(s[i+1])
}

// bare takes the parentheses off `(kg·K)`.
func bare(s string) string {
	if len(s) > 2 && s[0] == '(' && groupEnd(s[1:], 0) == len(s)-2 && !strings.Contains(s, "/") {
		return s[1 : len(s)-1]
	}
	return s
}

// missing reports that a symbol was expected at p.at.
func (p *parser) missing() {
	if p.s == "" {
		p.fail(0, 0, "a unit is missing", "write a unit, or `1` for a plain number", "")
		return
	}
	if p.at >= len(p.s) {
		p.fail(trailing(p.s), len(p.s), "the unit ends after an operator", "write a symbol after it, or drop it", strings.TrimRight(p.s, "/.·⋅"))
		return
	}
	p.stray()
}

// trailing is the offset of the last character of s.
func trailing(s string) int {
	_, n := utf8.DecodeLastRuneInString(s)
	return len(s) - n
}

// stray reports a character that does not belong at p.at.
func (p *parser) stray() {
	r, n := utf8.DecodeRuneInString(p.s[p.at:])
	end := p.at + n
	switch {
	case unicode.IsSpace(r):
		p.blank()
	case r == '*' || r == '×':
		right := p.s[:p.at] + "·" + strings.TrimPrefix(strings.TrimPrefix(p.s[p.at:end], "*"), "×") + p.s[end:]
		p.fail(p.at, end, "`"+string(r)+"` is not part of a unit", "units are multiplied with `·`: `"+right+"`", right)
	case r == ')':
		p.fail(p.at, end, "this `)` closes nothing in the unit", "drop it: `"+p.s[:p.at]+p.s[end:]+"`", p.s[:p.at]+p.s[end:])
	case r >= '0' && r <= '9':
		p.fail(p.at, end, "a number stands inside the unit", "the number goes before the unit: `5 kV/mm`", "")
	case (r == '(' || symbolRune(r) || r < utf8.RuneSelf && unicode.IsLetter(r)) && p.at > 0:
		right := p.s[:p.at] + "·" + p.s[p.at:]
		p.fail(p.at, end, "an operator is missing before `"+p.s[p.at:p.at+n]+"`", "write `·` or `/` between the units: `"+right+"`", right)
	default:
		p.fail(p.at, end, "`"+printable(p.s[p.at:end])+"` does not belong in a unit", "a unit is symbols joined by `·` and `/`, with exponents: `W/(m^2·K)`", "")
	}
}

// printable makes text fit for a message: valid, and no longer than a line.
func printable(s string) string {
	const longest = 240
	if len(s) > longest {
		cut := longest
		for cut > longest-utf8.UTFMax && !utf8.RuneStart(s[cut]) {
			cut--
		}
		s = s[:cut] + "…"
	}
	return strings.ToValidUTF8(s, "\uFFFD")
}

// blank reports a blank inside the phrase.
func (p *parser) blank() {
	right := strings.Join(strings.Fields(p.s), "")
	detail := "write it without blanks"
	suggest := ""
	if _, err := Parse(right); err == nil {
		suggest = right
		detail += ": `" + right + "`"
	}
	p.fail(p.at, len(p.s), "a unit has no blanks inside", detail, suggest)
}

// unknown reports a symbol that is no unit.
func (p *parser) unknown(start int, symbol string) *PhraseError {
	if isLevel(symbol) {
		return levelInside(start, start+len(symbol))
	}
	e := &PhraseError{Start: start, End: start + len(symbol), Rule: "unknown-unit", Symbol: symbol,
		Message: "`" + printable(symbol) + "` is not a unit"}
	a := advise(symbol)
	e.Detail = a.detail
	if a.write != "" {
		e.Suggest = p.s[:start] + grouped(a.write, p.s[:start]) + p.s[start+len(symbol):]
	}
	return e
}

// grouped puts a product in parentheses where it follows a `/`.
func grouped(s, before string) string {
	if strings.HasSuffix(before, "/") && strings.ContainsAny(s, "·/") {
		return "(" + s + ")"
	}
	return s
}
