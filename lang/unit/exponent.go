package unit

import (
	"strconv"
	"strings"
	"unicode/utf8"
)

// superscripts are the superscript digits, in order.
const superscripts = "⁰¹²³⁴⁵⁶⁷⁸⁹"

func isSuperscript(r rune) bool {
	return r == '⁻' || r == '⁺' || strings.ContainsRune(superscripts, r)
}

// exponent reads `^2`, `^-1`, `^(1/2)`, `²` or `⁻¹` after a factor that begins
// at start; ok is false where none follows.
func (p *parser) exponent(start int) (e Rat, ok bool) {
	c := p.peek()
	if c == 0 || c == '/' || c == ')' || c == '.' {
		return Rat{}, false
	}
	if c == '^' {
		p.at++
		if p.peek() == '(' {
			return p.fraction(), true
		}
		return p.integer(), true
	}
	if isDigit(c) || (c == '-' || strings.HasPrefix(p.s[p.at:], "−")) {
		p.bareExponent(start)
		return Rat{}, false
	}
	if r, _ := utf8.DecodeRuneInString(p.s[p.at:]); isSuperscript(r) {
		return p.superscript(), true
	}
	return Rat{}, false
}

// sign reads an optional sign: `-`, `−` (U+2212) or `+`.
func (p *parser) sign() int64 {
	switch {
	case p.peek() == '-':
		p.at++
		return -1
	case strings.HasPrefix(p.s[p.at:], "−"):
		p.at += len("−")
		return -1
	case p.peek() == '+':
		p.at++
	}
	return 1
}

// digits reads an unsigned integer; −1 where there is none. Long ones
// saturate above maxExponent.
func (p *parser) digits() int64 {
	n := int64(-1)
	for isDigit(p.peek()) {
		n = min(10*max(n, 0)+int64(p.peek()-'0'), 1e6)
		p.at++
	}
	return n
}

// integer reads a signed integer after `^`.
func (p *parser) integer() Rat {
	start := p.at
	sign := p.sign()
	n := p.digits()
	if n < 0 {
		p.fail(start-1, max(p.at, start), "an exponent is missing after `^`", "write an integer, `m^2`, `m^-1`, or a fraction in parentheses, `Hz^(1/2)`", "")
		return Rat{}
	}
	next := p.byteAt(p.at + 1)
	if (p.peek() == '/' || p.peek() == '.') && isDigit(next) {
		p.bareFraction(start, sign*n)
		return Rat{}
	}
	return p.bounded(start, sign*n, 1)
}

// fraction reads `(1/2)`, `(-3/2)` or `(2)` after `^`.
func (p *parser) fraction() Rat {
	start := p.at
	p.at++
	n, d := p.sign(), int64(1)
	num := p.digits()
	if num >= 0 && p.peek() == '/' {
		p.at++
		d = p.digits()
	}
	if num < 0 || d <= 0 || p.peek() != ')' {
		p.fail(start, min(p.at+1, len(p.s)), "the exponent in parentheses is not an integer or a fraction of two integers", "write it so: `Hz^(1/2)`", "")
		return Rat{}
	}
	p.at++
	return p.bounded(start, n*num, d)
}

// superscript reads `²`, `⁻¹`.
func (p *parser) superscript() Rat {
	start, sign, n := p.at, int64(1), int64(-1)
	for p.at < len(p.s) {
		r, size := utf8.DecodeRuneInString(p.s[p.at:])
		i := strings.IndexRune(superscripts, r)
		switch {
		case i >= 0:
			digit := utf8.RuneCountInString(superscripts[:i])
			n = min(10*max(n, 0)+int64(digit), 1e6)
		case (r == '⁻' || r == '⁺') && p.at == start:
			if r == '⁻' {
				sign = -1
			}
		default:
			size = 0
		}
		if size == 0 {
			break
		}
		p.at += size
	}
	if n < 0 {
		p.fail(start, p.at, "a superscript sign has no digit", "write it so: `m⁻¹` or `m^-1`", "")
		return Rat{}
	}
	return p.bounded(start, sign*n, 1)
}

// bounded returns n/d, or a fault where it is beyond any use.
func (p *parser) bounded(start int, n, d int64) Rat {
	if n > maxExponent || n < -maxExponent || d > maxExponent {
		p.fail(start, p.at, "the exponent is too large for a unit", "at most "+strconv.Itoa(maxExponent), "")
		return Rat{}
	}
	return NewRat(n, d)
}

// bareFraction reports `Hz^1/2` and `m^0.5`: p.at is at the `/` or `.`, the
// integer before it begins at start.
func (p *parser) bareFraction(start int, n int64) {
	written := p.peek()
	p.at++
	from := p.at
	m := p.digits()
	frac := strconv.FormatInt(n, 10) + "/" + strconv.FormatInt(m, 10)
	message := "`^` takes the integer only: `" + p.s[:p.at] + "` would divide by a number"
	if written == '.' {
		message = "an exponent is an integer or a fraction in parentheses, not a decimal"
		frac = decimalFraction(p.s[start:p.at], p.at-from)
	}
	if frac == "" {
		p.fail(start, p.at, message, "write it so: `Hz^(1/2)`", "")
		return
	}
	right := p.s[:start] + "(" + frac + ")" + p.s[p.at:]
	p.fail(start, p.at, message, "write `"+right+"`", right)
}

// decimalFraction turns "0.5" (with the number of decimals) into "1/2"; "" where
// that is not possible.
func decimalFraction(text string, decimals int) string {
	if decimals > 3 {
		return ""
	}
	den := int64(1)
	for range decimals {
		den *= 10
	}
	text = strings.Replace(text, "−", "-", 1)
	n, err := strconv.ParseInt(strings.Replace(text, ".", "", 1), 10, 32)
	if err != nil {
		return ""
	}
	return NewRat(n, den).String()
}

// bareExponent reports `m2` and `s-1`: digits at once after a symbol.
func (p *parser) bareExponent(start int) {
	at := p.at
	p.sign()
	if p.digits() < 0 {
		p.at = at
		p.stray()
		return
	}
	right := p.s[:at] + "^" + strings.Replace(p.s[at:], "−", "-", 1)
	p.fail(start, p.at, "a number follows the unit `"+p.s[start:at]+"` directly", "an exponent is written with `^`: `"+right+"`", right)
}
