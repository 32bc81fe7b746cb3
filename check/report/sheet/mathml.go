package sheet

import (
	"html"
	"strings"
	"unicode/utf8"

	"inkjoule/lang"
)

// This file writes expressions as MathML Core, which browsers typeset.

// math wraps an expression for use in a line of text.
func math(inner string) string { return "<math>" + inner + "</math>" }

// expr writes an expression.
func expr(x lang.Expr) string {
	switch x := x.(type) {
	case *lang.Literal:
		return literal(x)
	case *lang.Name:
		return name(x.Text)
	case *lang.Member:
		return row(expr(x.X), op("."), name(x.Field.Text))
	case *lang.Cell:
		return row(expr(x.X), op("["), expr(x.At), op("]"))
	case *lang.Lookup:
		return row(expr(x.X), words(" at "), name(x.Column.Text), op("="), expr(x.Value))
	case *lang.Unary:
		return row(op(minus(string(x.Op))), expr(x.X))
	case *lang.Binary:
		return binary(x)
	case *lang.Paren:
		return row(op("("), expr(x.X), op(")"), units(x.Unit))
	case *lang.Bars:
		return row(op("|"), expr(x.X), op("|"))
	case *lang.Triple:
		return row(op("("), expr(x.X[0]), op(","), expr(x.X[1]), op(","), expr(x.X[2]), op(")"), units(x.Unit))
	case *lang.Call:
		return call(x)
	}
	return ""
}

func row(parts ...string) string { return "<mrow>" + strings.Join(parts, "") + "</mrow>" }

func op(s string) string { return "<mo>" + html.EscapeString(s) + "</mo>" }

func words(s string) string { return "<mtext>" + html.EscapeString(s) + "</mtext>" }

func minus(s string) string { return strings.ReplaceAll(s, "-", "−") }

// literal writes a number with its spread and unit.
func literal(l *lang.Literal) string {
	text := minus(l.Num.Text)
	out := "<mn>" + html.EscapeString(text) + "</mn>"
	if mantissa, exponent, ok := strings.Cut(strings.ToLower(text), "e"); ok {
		out = row("<mn>"+html.EscapeString(mantissa)+"</mn>", op("·"), "<msup><mn>10</mn><mn>"+html.EscapeString(strings.TrimPrefix(exponent, "+"))+"</mn></msup>")
	}
	if l.Spread != nil && l.Spread.Standard {
		return row(out, "<mn>("+html.EscapeString(l.Spread.Num.Text)+")</mn>", units(l.Unit))
	}
	out = row(out, units(l.Unit))
	if l.Spread != nil {
		out = row(out, op("±"), "<mn>"+html.EscapeString(l.Spread.Num.Text)+"</mn>", units(l.Spread.Unit))
	}
	return out
}

// units writes a unit phrase after a thin space.
func units(u *lang.UnitPhrase) string {
	if u == nil {
		return ""
	}
	return "<mspace width=\"0.17em\"/><mtext>" + html.EscapeString(unitText(u.Text)) + "</mtext>"
}

// unitText writes a unit phrase as print has it: superscripts, µ, Ω, °C.
func unitText(phrase string) string {
	phrase = strings.NewReplacer("ohm", "Ω", "degC", "°C", "deg", "°", ".", "·").Replace(phrase)
	var b strings.Builder
	raised := false
	for i, r := range phrase {
		switch {
		case r == '^':
			raised = true
		case raised && strings.ContainsRune("-0123456789", r):
			b.WriteString(superscripts[r])
		case r == 'u' && (i == 0 || strings.ContainsAny(phrase[i-1:i], "·/(")) && i+1 < len(phrase):
			b.WriteRune('µ')
			raised = false
		default:
			raised = false
			b.WriteRune(r)
		}
	}
	return b.String()
}

// superscripts is read only.
var superscripts = map[rune]string{'-': "⁻", '0': "⁰", '1': "¹", '2': "²", '3': "³", '4': "⁴", '5': "⁵", '6': "⁶", '7': "⁷", '8': "⁸", '9': "⁹"}

// name writes a name: its first segment, the others as subscripts.
func name(text string) string {
	segments := strings.Split(text, "_")
	base := letter(segments[0])
	if len(segments) == 1 {
		return base
	}
	subs := make([]string, 0, len(segments)-1)
	for _, s := range segments[1:] {
		subs = append(subs, letter(s))
	}
	return "<msub>" + base + row(strings.Join(subs, op(","))) + "</msub>"
}

// letter writes a segment of a name: one letter slanted, words upright.
func letter(segment string) string {
	if strings.Trim(segment, "0123456789") == "" {
		return "<mn>" + segment + "</mn>"
	}
	if g := lang.GreekLetter(segment); g != "" {
		segment = g
	}
	if utf8.RuneCountInString(segment) == 1 {
		return "<mi>" + html.EscapeString(segment) + "</mi>"
	}
	return "<mi mathvariant=\"normal\">" + html.EscapeString(segment) + "</mi>"
}

func binary(b *lang.Binary) string {
	switch b.Op {
	case lang.OpDiv:
		return "<mfrac>" + bare(b.X) + bare(b.Y) + "</mfrac>"
	case lang.OpPow:
		return "<msup>" + row(expr(b.X)) + bare(b.Y) + "</msup>"
	case lang.OpMul:
		if startsWithNumber(b.Y) {
			return row(expr(b.X), op("·"), expr(b.Y))
		}
		return row(expr(b.X), "<mo lspace=\"0.17em\" rspace=\"0\">&#x2062;</mo>", expr(b.Y))
	}
	return row(expr(b.X), op(minus(string(b.Op))), expr(b.Y))
}

// bare writes an operand that its place keeps together, without parentheses.
func bare(x lang.Expr) string {
	if p, ok := x.(*lang.Paren); ok && p.Unit == nil && p.Spread == nil {
		return row(expr(p.X))
	}
	return row(expr(x))
}

// startsWithNumber reports an operand whose first sign is a digit.
func startsWithNumber(x lang.Expr) bool {
	switch x := x.(type) {
	case *lang.Literal:
		return true
	case *lang.Binary:
		return startsWithNumber(x.X)
	}
	return false
}

// call writes a function, or a form that binds a variable.
func call(c *lang.Call) string {
	switch {
	case c.Fn.Text == "sqrt" && len(c.Args) == 1:
		return "<msqrt>" + expr(c.Args[0]) + "</msqrt>"
	case c.Fn.Text == "abs" && len(c.Args) == 1:
		return row(op("|"), expr(c.Args[0]), op("|"))
	case c.Fn.Text == "integral" && len(c.Args) == 1:
		return integral(c)
	case c.Fn.Text == "sum" && len(c.Args) == 1 && len(c.For) == 1:
		return bound(op("∑"), c.For[0], c.Args[0])
	case c.Fn.Text == "derivative" && len(c.Args) == 1 && len(c.For) == 1:
		v := expr(c.For[0].Var)
		return row("<mfrac><mi mathvariant=\"normal\">d</mi>", row("<mi mathvariant=\"normal\">d</mi>", v), "</mfrac>", op("("), expr(c.Args[0]), op(")"), words(" at "), v, op("="), exprOr(c.For[0].At))
	}
	return plainCall(c)
}

func exprOr(x lang.Expr) string {
	if x == nil {
		return ""
	}
	return expr(x)
}

// integral writes ∫ with its bounds, or over its region.
func integral(c *lang.Call) string {
	if c.Over != nil {
		return row("<msub>", op("∫"), row(expr(c.Over)), "</msub>", expr(c.Args[0]), "<mi mathvariant=\"normal\">d</mi>", expr(c.Over))
	}
	var signs, elements []string
	for _, r := range c.For {
		signs = append([]string{"<msubsup>" + op("∫") + row(exprOr(r.From)) + row(exprOr(r.To)) + "</msubsup>"}, signs...)
		elements = append(elements, "<mspace width=\"0.17em\"/><mi mathvariant=\"normal\">d</mi>"+exprOr(r.Var))
	}
	return row(strings.Join(signs, ""), expr(c.Args[0]), strings.Join(elements, ""))
}

// bound writes a sign with its variable below and its end above.
func bound(sign string, r *lang.Range, body lang.Expr) string {
	return row("<munderover>", sign, row(exprOr(r.Var), op("="), exprOr(r.From)), row(exprOr(r.To)), "</munderover>", expr(body))
}

// plainCall writes f(a, b), with the clauses that bind variables in words.
func plainCall(c *lang.Call) string {
	parts := []string{}
	if c.Of != nil {
		parts = append(parts, expr(c.Of), op("."))
	}
	parts = append(parts, name(c.Fn.Text), op("("))
	for i, a := range c.Args {
		if i > 0 {
			parts = append(parts, op(","))
		}
		parts = append(parts, expr(a))
	}
	if c.Equal != nil {
		parts = append(parts, op("="), expr(c.Equal))
	}
	for _, r := range c.For {
		parts = append(parts, words(" for "), exprOr(r.Var))
		if r.From != nil {
			parts = append(parts, words(" from "), expr(r.From), words(" to "), exprOr(r.To))
		}
	}
	return row(append(parts, op(")"), units(c.Unit))...)
}
