package lang

import "github.com/alecthomas/participle/v2/lexer"

// formCautions are the forms that parse, but that a reader may take otherwise.
func formCautions(tree Statement, toks []lexer.Token) []Fault {
	if _, ok := tree.(*Unread); ok {
		return nil
	}
	var out []Fault
	_, isTable := tree.(*Table)
	for i := range toks {
		if toks[i].Type != tokNumber {
			continue
		}
		c := &clue{toks: toks, at: i}
		if !isTable {
			out = appendFault(out, bareUncertainty(c))
		}
		out = appendFault(out, workshopFraction(c))
	}
	return out
}

func appendFault(out []Fault, f *Fault) []Fault {
	if f == nil {
		return out
	}
	f.Rule, f.Severity = ruleSyntax, Caution
	return append(out, *f)
}

// bareUncertainty cautions `3(2)`: without a point or a unit it looks like a
// product or a call.
func bareUncertainty(c *clue) *Fault {
	mantissa, inner, exponent := splitNumber(c.tok(0).Value)
	if inner == "" || exponent != "" || digits(mantissa) != len(mantissa) || c.tok(1).Type == tokUnit {
		return nil
	}
	return &Fault{Span: spanOf(c.tok(0)), Message: code(c.tok(0).Value) + " is read as " + mantissa + " with the standard uncertainty " + inner,
		Detail: "write " + code(mantissa+".0("+inner+"0)") + " to make that clear, or " + code(mantissa+"*"+inner) + " for a product"}
}

// workshopFraction cautions `1/4 in`, which is 1/(4 in) here.
func workshopFraction(c *clue) *Fault {
	top, solidus, bottom, unit := c.tok(0), c.tok(1), c.tok(2), c.tok(3)
	if !is(solidus, "/") || bottom.Type != tokNumber || unit.Type != tokUnit || is(c.tok(-1), "^") || is(c.tok(-1), "/") {
		return nil
	}
	if !isWorkshopUnit(unit.Value) || !isPowerOfTwo(bottom.Value) || digits(top.Value) != len(top.Value) {
		return nil
	}
	whole := spanOf(top).to(spanOf(unit))
	right := "(" + top.Value + "/" + bottom.Value + ") " + unit.Value
	return &Fault{Span: whole, Message: code(sourceText(c.toks[c.at:c.at+4])) + " divides by " + code(bottom.Value+" "+unit.Value) + ": a number and its unit bind first",
		Detail: "for the fraction write " + code(right),
		Fix:    &Fix{"Write " + code(right), []Edit{{whole, right}}}}
}

func isWorkshopUnit(u string) bool {
	switch u {
	case "in", "ft", "yd", "mi", "mile", "lb", "oz", "gal", "mm":
		return true
	}
	return false
}

// isPowerOfTwo reports 2, 4, 8, 16, 32, 64: the denominators of a rule.
func isPowerOfTwo(text string) bool {
	switch text {
	case "2", "4", "8", "16", "32", "64":
		return true
	}
	return false
}
