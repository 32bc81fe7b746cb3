package lang

import (
	"strings"
	"unicode/utf8"

	"github.com/alecthomas/participle/v2/lexer"
)

// badToken explains a token that the scanner could not read.
func badToken(c *clue) *Fault {
	t := c.tok(0)
	if t.Type != tokBad {
		return nil
	}
	v := t.Value
	first, _ := utf8.DecodeRuneInString(v)
	switch {
	case !utf8.ValidString(v):
		return &Fault{Message: "bytes that are not UTF-8", Detail: "save the note as UTF-8"}
	case v == ",":
		return decimalComma(c)
	case isDigit(v[0]) || v[0] == '.' && len(v) > 1:
		return badNumber(c, v)
	case v[0] == '"':
		return &Fault{Span: Span{t.Pos.Offset, t.Pos.Offset + 1}, Message: "this quotation mark is never closed",
			Detail: "close the text with `\"`"}
	case isCurly(first):
		return curlyQuotes(c, v)
	}
	return badOperator(c, t)
}

// badOperator explains signs of other notations.
func badOperator(c *clue, t *lexer.Token) *Fault {
	right := map[string]string{"==": "=", ":=": "=", "=<": "<=", "=>": ">=", "**": "^", "÷": "/", "–": "-", "—": "-",
		"•": "·", "∙": "·", "✕": "×", "≅": "=", "≈": "="}[t.Value]
	switch {
	case right != "":
		return &Fault{Message: code(t.Value) + " is not an operator", Detail: "write " + code(right),
			Fix: &Fix{"Write " + code(right), c.edit(0, 0, right)}}
	case t.Value == "!=" || t.Value == "≠":
		return &Fault{Message: code(t.Value) + " is not an operator", Detail: "a relation is written with `<`, `<=`, `>`, `>=`, `<<` or `>>`"}
	case strings.HasPrefix(t.Value, "_"):
		return &Fault{Message: "a name begins with a letter, found " + code(t.Value),
			Detail: "the blank that asks for a result is `__`, with a blank before its unit"}
	case t.Value == "√" || t.Value == "∛":
		return &Fault{Message: code(t.Value) + " is not read", Detail: "write `sqrt(x)` or `cbrt(x)`"}
	case t.Value == "'":
		return &Fault{Message: "the apostrophe is not part of a name", Detail: "a prime is `′` (U+2032)"}
	}
	return &Fault{Message: "expected " + c.expected + ", found " + code(printable(t.Value))}
}

// printable shows a character that has no picture by its number.
func printable(s string) string {
	r, _ := utf8.DecodeRuneInString(s)
	if r < ' ' || r == 0x7f {
		return "control character"
	}
	return s
}

func curlyQuotes(c *clue, v string) *Fault {
	text := strings.TrimFunc(v, func(r rune) bool { return isCurly(r) || r == '"' })
	f := &Fault{Message: "texts stand in straight double quotation marks, found " + code(v)}
	if text != "" && !strings.Contains(text, `"`) {
		f.Detail = "write " + code(`"`+text+`"`)
		f.Fix = &Fix{"Write straight quotation marks", c.edit(0, 0, `"`+text+`"`)}
	}
	return f
}

// decimalComma asks what the comma between two numbers means.
func decimalComma(c *clue) *Fault {
	whole, part := c.tok(-1).Value, c.tok(1).Value
	f := &Fault{Span: spanOf(c.tok(-1)).to(spanOf(c.tok(1))), Message: code(whole+","+part) + " can be read in two ways: is it a decimal comma?",
		Detail: "write the decimal sign as a point, no sign between thousands, and a blank after a comma that separates"}
	if digits(part) != 3 {
		f.Detail = "write " + code(whole+"."+part) + ", or a blank after a comma that separates"
		f.Fix = &Fix{"Write a decimal point", c.edit(0, 0, ".")}
	}
	return f
}

// badNumber explains what runs into a number: `12kV`, `2pi`, `.5`, `1.2.3`.
func badNumber(c *clue, v string) *Fault {
	if v[0] == '.' {
		return &Fault{Message: "a number begins with a digit, found " + code(v), Detail: "write " + code("0"+v),
			Fix: &Fix{"Write " + code("0"+v), c.edit(0, 0, "0"+v)}}
	}
	end := numberEnd(v, 0)
	number, rest := v[:end], v[end:]
	switch {
	case strings.HasPrefix(rest, "."):
		return &Fault{Message: code(v) + " is not a number", Detail: "a number has one decimal point"}
	case rest == "j" || rest == "pi" || rest == "π":
		return times(c, number, rest)
	case isUnit(rest):
		return &Fault{Message: "a blank is missing between number and unit in " + code(v), Detail: "write " + code(number+" "+rest),
			Fix: &Fix{"Insert a blank", c.edit(0, 0, number+" "+rest)}}
	}
	return &Fault{Message: code(rest) + " touches the number before it",
		Detail: "a unit follows after a blank (" + code(number+" "+rest) + "), a factor after `*` (" + code(number+"*"+rest) + ")"}
}

// times says that a factor wants `*`.
func times(c *clue, number, factor string) *Fault {
	text := number + "*" + factor
	return &Fault{Message: "`*` is missing between " + code(number) + " and " + code(factor), Detail: "write " + code(text),
		Fix: &Fix{"Insert `*`", c.edit(0, 0, text)}}
}

// sourceText is the text of tokens, with one blank where there were any.
func sourceText(toks []lexer.Token) string {
	var b strings.Builder
	for i := range toks {
		if i > 0 && !touch(&toks[i-1], &toks[i]) {
			b.WriteByte(' ')
		}
		b.WriteString(toks[i].Value)
	}
	return b.String()
}
