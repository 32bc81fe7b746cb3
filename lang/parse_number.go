package lang

import (
	"math"
	"strconv"
	"strings"

	"github.com/alecthomas/participle/v2/lexer"
)

// literal reads a number with its sign, its unit and its spread.
func (r *reader) literal() Expr {
	l := r.numeral()
	l.Unit = r.unit()
	if s := r.spread(l.Spread != nil, l.Unit); s != nil {
		l.Spread = s
	}
	l.Span = r.spanFrom(l.Span.Start)
	return l
}

// numeral reads a number with its sign and its standard uncertainty.
func (r *reader) numeral() *Literal {
	sign := ""
	t := r.next()
	span := spanOf(t)
	if t.Type == tokOp {
		sign = t.Value
		t = r.next()
		span = span.to(spanOf(t))
	}
	l := &Literal{Node: Node{Span: span}}
	mantissa, inner, exponent := splitNumber(t.Value)
	l.Num = numeralOf(span, sign+mantissa+exponent)
	if inner != "" {
		at := t.Pos.Offset + len(mantissa)
		l.Spread = standardSpread(Span{at, at + len(inner) + 2}, inner, l.Num)
	}
	if !isFinite(l.Num) {
		r.failWith(&breakage{message: "this number is outside the range from 1e-308 to 1e308", span: span})
	}
	return l
}

// isFinite reports that the nearest float is neither infinite nor a lost digit.
func isFinite(n Numeral) bool {
	if n.Value == 0 {
		mantissa, _, _ := strings.Cut(strings.ToLower(n.Text), "e")
		return !strings.ContainsAny(mantissa, "123456789")
	}
	return !math.IsInf(n.Value, 0)
}

// splitNumber divides `1.2(4)e-3` into `1.2`, `4` and `e-3`.
func splitNumber(text string) (mantissa, inner, exponent string) {
	mantissa = text
	if i := strings.IndexAny(text, "eE"); i >= 0 {
		mantissa, exponent = text[:i], text[i:]
	}
	if i := strings.IndexByte(mantissa, '('); i >= 0 {
		mantissa, inner = mantissa[:i], mantissa[i+1:len(mantissa)-1]
	}
	return mantissa, inner, exponent
}

// numeralOf reads a number as written; its digits end at 10^LastDigit.
func numeralOf(span Span, text string) Numeral {
	plain := strings.ReplaceAll(text, "−", "-")
	value, _ := strconv.ParseFloat(plain, 64)
	n := Numeral{Span: span, Text: text, Value: value}
	mantissa, _, exponent := splitNumber(plain)
	if exponent != "" {
		n.LastDigit, _ = strconv.Atoi(exponent[1:])
		n.LastDigit = max(-maxExponent, min(n.LastDigit, maxExponent))
	}
	if i := strings.IndexByte(mantissa, '.'); i >= 0 {
		n.LastDigit -= len(mantissa) - i - 1
	}
	return n
}

// maxExponent bounds the exponent of a last digit; the value is checked apart.
const maxExponent = 100000

// standardSpread is the uncertainty written in parentheses: in units of the last
// digit (`12.0(1)`), or as a value where it has a point (`12.0(0.1)`).
func standardSpread(span Span, inner string, of Numeral) *Spread {
	s := &Spread{Span: span, Standard: true, Num: numeralOf(Span{span.Start + 1, span.End - 1}, inner)}
	power := of.LastDigit
	if strings.Contains(inner, ".") {
		power = exponentOf(of.Text)
	}
	s.Size, _ = strconv.ParseFloat(inner+"e"+strconv.Itoa(power), 64)
	return s
}

// exponentOf is the power of ten that a number is written with.
func exponentOf(text string) int {
	_, _, exponent := splitNumber(strings.ReplaceAll(text, "−", "-"))
	if exponent == "" {
		return 0
	}
	n, _ := strconv.Atoi(exponent[1:])
	return max(-maxExponent, min(n, maxExponent))
}

// spread reads `± 0.05 mm` after a literal. already: it has an uncertainty.
func (r *reader) spread(already bool, unit *UnitPhrase) *Spread {
	t := r.peek()
	if !is(t, "±") {
		return nil
	}
	if already {
		r.failWith(&breakage{message: "two uncertainties of one number",
			detail: "keep either the standard uncertainty in parentheses or the limits after ±"})
		return nil
	}
	r.next()
	if r.peek().Type != tokNumber {
		r.fail("a number after ±")
		return nil
	}
	l := r.numeral()
	l.Unit = r.unit()
	s := &Spread{Span: r.spanFrom(t.Pos.Offset), Num: l.Num, Size: l.Num.Value, Unit: l.Unit}
	r.checkSpread(l, unit, s.Span)
	return s
}

// checkSpread refuses what could be read in two ways.
func (r *reader) checkSpread(l *Literal, unit *UnitPhrase, span Span) {
	switch {
	case l.Spread != nil || is(r.peek(), "±"):
		r.failWith(&breakage{span: span, message: "two uncertainties of one number", detail: "write one of them"})
	case l.Unit == nil:
	case unit == nil && l.Unit.Text != "%":
		r.failWith(&breakage{span: span, message: "the limits have a unit, the number has none",
			detail: "write the unit behind a parenthesis: `(12.0 ± 0.1) kV`"})
	case unit != nil && unit.Text == "%" && l.Unit.Text == "%":
		r.failWith(&breakage{span: span, message: "`% ± %` can mean percentage points or a relative limit",
			detail: "write plain numbers: `0.05 ± 0.01` for points, `0.05 ± 1 %` for a relative limit"})
	}
}

// superscriptLiteral is the exponent that superscripts write.
func superscriptLiteral(t *lexer.Token) *Literal {
	value, _ := strconv.ParseFloat(asciiNumber(t.Value), 64)
	return &Literal{Node: Node{Span: spanOf(t)}, Num: Numeral{Span: spanOf(t), Text: t.Value, Value: value}}
}

func superscriptDigit(c rune) byte {
	n := byte('0')
	for _, d := range superscriptDigits {
		if d == c {
			return n
		}
		n++
	}
	return '?'
}
