package lang

import (
	"strings"

	"github.com/alecthomas/participle/v2/lexer"
)

// The slips of this file stand in expressions.

// resultIn explains `W = C*U in mJ`.
func resultIn(c *clue) *Fault {
	n := 0 // place of `in`
	switch {
	case is(c.tok(0), "in") && endsOperand(c.tok(-1)):
	case c.tok(-1).Type == tokUnit && c.tok(-1).Value == "in" && c.tok(0).Type == tokWord:
		n = -1 // read as the inch
	default:
		return nil
	}
	unit, count := c.phraseAt(n + 1)
	if count == 0 {
		return nil
	}
	return &Fault{Span: spanOf(c.tok(n)).to(spanOf(c.tok(n + count))),
		Message: "`in` names a medium, before the `=`",
		Detail:  "to show the result in a unit, end with " + code("= __ "+unit),
		Fix:     &Fix{"Write " + code("= __ "+unit), c.edit(n, n+count, "= __ "+unit)}}
}

// bracketedUnit explains `E = U/d [kV/mm]`.
func bracketedUnit(c *clue) *Fault {
	if !is(c.tok(0), "[") || !endsOperand(c.tok(-1)) {
		return nil
	}
	unit, count := c.phraseAt(1)
	if count == 0 || !is(c.tok(count+1), "]") {
		return nil
	}
	f := &Fault{Span: spanOf(c.tok(0)).to(spanOf(c.tok(count + 1))), Message: "a unit in brackets is for the columns of a table"}
	if c.tok(-1).Type == tokNumber {
		f.Detail = "after a number the unit stands without brackets: " + code(c.tok(-1).Value+" "+unit)
		f.Fix = &Fix{"Remove the brackets", c.edit(0, count+1, unit)}
		return f
	}
	f.Detail = code("= __ "+unit) + " shows the result so"
	f.Fix = &Fix{"Write " + code("= __ "+unit), c.edit(0, count+1, "= __ "+unit)}
	return f
}

// isQualifier reports a word that says what a value of time is; trade
// abbreviations count.
func isQualifier(word string) bool {
	switch strings.ToLower(word) {
	case "rms", "peak", "average", "avg", "mean", "static", "instantaneous", "eff", "pk", "pp", "dc", "ac":
		return true
	}
	return false
}

// qualifierAfterUnit explains `3 V/m rms`.
func qualifierAfterUnit(c *clue) *Fault {
	t := c.tok(0)
	if t.Type != tokWord || !isQualifier(t.Value) || c.tok(-1).Type != tokUnit {
		return nil
	}
	f := qualifierFault(&c.toks[0], t.Value)
	f.Fix = qualifierFix(c.toks, t.Value, Edit{Span{spanOf(c.tok(-1)).End, spanOf(t).End}, ""})
	return f
}

// qualifierFix moves a qualifier into the head of a definition; nil where the
// head has one already or the word leaves open which.
func qualifierFix(toks []lexer.Token, word string, cut Edit) *Fix {
	name := qualifierNames[strings.ToLower(word)]
	if name == "" || isStatementWord(toks[0].Value) {
		return nil
	}
	for i := range toks {
		switch t := &toks[i]; {
		case is(t, ","):
			if isQualifier(toks[i+1].Value) {
				return nil
			}
			at := spanOf(t).End
			return &Fix{"Put " + code(name) + " before the kind", []Edit{{Span{at, at}, " " + name}, cut}}
		case is(t, "=") && i > 0:
			at := spanOf(&toks[i-1]).End
			return &Fix{"Put " + code(name) + " behind the name", []Edit{{Span{at, at}, ", " + name}, cut}}
		}
	}
	return nil
}

// qualifierNames are the qualifiers and the trade abbreviations that say which.
var qualifierNames = map[string]string{"rms": "rms", "eff": "rms", "peak": "peak", "pk": "peak", "pp": "peak-to-peak",
	"average": "average", "avg": "average", "mean": "average", "static": "static", "dc": "static", "instantaneous": "instantaneous"}

func qualifierFault(name *lexer.Token, qualifier string) *Fault {
	word := qualifierNames[strings.ToLower(qualifier)]
	if word == "" {
		word = "rms"
	}
	head := "E"
	if isWordToken(name) {
		head = name.Value
	}
	return &Fault{Message: "a qualifier is not part of a unit: " + code(qualifier),
		Detail: "it belongs to the quantity: " + code(head+", "+word+" … =")}
}

// qualifiedUnit is the qualifier that a unit symbol carries, as in `Vrms`, or "".
func qualifiedUnit(phrase string) string {
	for _, q := range [...]string{"rms", "RMS", "pp", "pk", "peak", "eff", "dc", "ac", "DC", "AC"} {
		if base, ok := strings.CutSuffix(phrase, q); ok && !isUnit(phrase) && base != "" &&
			isUnit(strings.TrimSuffix(base, "_")) {
			return q
		}
	}
	return ""
}

// powerOfTen explains `8.85*10^-12 F/m`: the exponent takes no unit.
func powerOfTen(c *clue) *Fault {
	n := -1
	exponent := c.tok(n).Value
	if c.tok(n).Type != tokNumber || c.tok(0).Type != tokWord {
		return nil
	}
	if is(c.tok(n-1), "-") || is(c.tok(n-1), "+") {
		n--
		exponent = c.tok(n).Value + exponent
	}
	if !is(c.tok(n-1), "^") {
		return nil
	}
	if c.tok(n-2).Value != "10" {
		return &Fault{Message: "an exponent takes no unit", Detail: "write the unit behind a parenthesis: `(a^2) V`"}
	}
	n -= 2
	number := "1"
	if op := c.tok(n - 1); c.tok(n-2).Type == tokNumber && (is(op, "*") || is(op, "×") || is(op, "·")) {
		n -= 2
		number = c.tok(n).Value
	}
	number += "e" + strings.TrimPrefix(strings.ReplaceAll(exponent, "−", "-"), "+")
	return &Fault{Span: spanOf(c.tok(n)).to(spanOf(c.tok(-1))), Message: "a power of ten takes no unit",
		Detail: "write " + code(number+" "+c.tok(0).Value),
		Fix:    &Fix{"Write " + code(number), c.edit(n, -1, number)}}
}

// missingTimes explains `2 pi`, `3 j`, `2|a|`, `a (1 + x)`, `2 sin(x)`.
func missingTimes(c *clue) *Fault {
	before, t := c.tok(-1), c.tok(0)
	if !endsOperand(before) {
		return nil
	}
	switch {
	case t.Value == "pi" || t.Value == "π" || t.Value == "j":
		return between(c, before, t)
	case is(t, "|") || is(t, "("):
	default:
		return nil
	}
	if unit, rest, ok := strings.Cut(before.Value, "/"); ok && before.Type == tokUnit && isUnit(unit) && !isUnit(before.Value) { // 132 kV/sqrt(3)
		at := before.Pos.Offset + len(unit)
		return &Fault{Span: spanOf(before), Message: code(before.Value) + " is read as a unit: no blank stands before `/`",
			Detail: "write " + code(c.tok(-2).Value+" "+unit+" / "+rest+t.Value),
			Fix:    &Fix{"Put blanks around `/`", []Edit{{Span{at, at + 1}, " / "}}}}
	}
	if before.Type == tokUnit && c.tok(-2).Type == tokNumber && !isUnit(before.Value) { // 2 sin(x): read as a unit
		return &Fault{Span: spanOf(c.tok(-2)).to(spanOf(before)), Message: "`*` is missing between " + code(c.tok(-2).Value) + " and " + code(before.Value),
			Detail: "write " + code(c.tok(-2).Value+"*"+before.Value+t.Value),
			Fix:    &Fix{"Insert `*`", []Edit{{Span{spanOf(c.tok(-2)).End, before.Pos.Offset}, "*"}}}}
	}
	if before.Type == tokWord && is(t, "(") {
		return blankBeforeCall(c, before, t)
	}
	return between(c, before, t)
}

// between says that `*` is missing between two tokens.
func between(c *clue, before, t *lexer.Token) *Fault {
	gap := Span{spanOf(before).End, t.Pos.Offset}
	return &Fault{Message: "`*` is missing between " + code(before.Value) + " and " + code(t.Value),
		Detail: "write " + code(before.Value+"*"+t.Value),
		Fix:    &Fix{"Insert `*`", []Edit{{gap, "*"}}}}
}

// blankBeforeCall tells a call with a blank from a product.
func blankBeforeCall(c *clue, name, t *lexer.Token) *Fault {
	gap := Span{spanOf(name).End, t.Pos.Offset}
	if isFunction(name.Value) {
		return &Fault{Span: spanOf(name).to(spanOf(t)), Message: "a call has no blank before its parenthesis",
			Detail: "write " + code(name.Value+"("), Fix: &Fix{"Remove the blank", []Edit{{gap, ""}}}}
	}
	return &Fault{Message: "missing `*` between " + code(name.Value) + " and the parenthesis",
		Detail: "write " + code(name.Value+"*(…)") + "; for a call of a function, " + code(name.Value+"(…)") + " without a blank"}
}

// isFunction reports a function of the language.
func isFunction(name string) bool {
	switch name {
	case "sqrt", "cbrt", "exp", "ln", "log10", "sin", "cos", "tan", "asin", "acos", "atan", "atan2", "sinh", "cosh", "tanh",
		"abs", "min", "max", "sum", "mean", "dot", "cross", "Re", "Im", "conj", "arg", "diag", "tensor", "uniaxial", "rotate",
		"inv", "trace", "det", "ellipK", "ellipE", "besselJ", "besselY", "erf", "awg", "lower", "upper",
		"integral", "loop", "derivative", "solve", "assembly_energy", "potential":
		return true
	}
	return false
}

// unitBehindName explains `E = U/d kV/mm`, and two names in a row.
func unitBehindName(c *clue) *Fault {
	before, t := c.tok(-1), c.tok(0)
	if t.Type != tokWord && t.Value != "%" && t.Value != "°" || isReserved(t.Value) || !c.inExpression() ||
		!endsOperand(before) || before.Type == tokNumber {
		return nil
	}
	phrase, count := c.phraseAt(0)
	span := spanOf(t).to(spanOf(c.tok(count - 1)))
	if isUnit(phrase) && before.Type != tokUnit {
		return &Fault{Span: span, Message: "a unit follows a number or a parenthesis, " + code(phrase) + " follows " + code(before.Value),
			Detail: code("= __ "+phrase) + " shows the result so",
			Fix:    &Fix{"Write " + code("= __ "+phrase), c.insert(0, "= __ ")}}
	}
	return &Fault{Message: "an operator is missing between " + code(before.Value) + " and " + code(t.Value)}
}

// numbersInRow explains `12 500`.
func numbersInRow(c *clue) *Fault {
	before, t := c.tok(-1), c.tok(0)
	if before.Type != tokNumber || t.Type != tokNumber {
		return nil
	}
	whole, joined, n := spanOf(before), before.Value, 0
	for ; c.tok(n).Type == tokNumber && digits(c.tok(n).Value) == 3 && numberEnd(c.tok(n).Value, 0) >= 3; n++ {
		joined += c.tok(n).Value
	}
	if n == 0 || digits(before.Value) != len(before.Value) {
		return &Fault{Span: whole.to(spanOf(t)), Message: "an operator is missing between " + code(before.Value) + " and " + code(t.Value)}
	}
	return &Fault{Span: whole.to(spanOf(c.tok(n - 1))), Message: "a number has no blanks", Detail: "write " + code(joined),
		Fix: &Fix{"Write " + code(joined), c.edit(-1, n-1, joined)}}
}

// attosecond explains `3 as` and other reserved words where a unit was meant.
func attosecond(c *clue) *Fault {
	if c.tok(-1).Type != tokNumber || !is(c.tok(0), "as") {
		return nil
	}
	n := c.tok(-1).Value
	return &Fault{Message: "`as` is reserved, so it is not read as the attosecond", Detail: "write " + code(n+"e-18 s")}
}

// blankAlone explains `__` inside an expression.
func blankAlone(c *clue) *Fault {
	if c.tok(0).Type != tokAsk {
		return nil
	}
	if is(c.tok(-1), "=") {
		return &Fault{Message: "`__` asks for a result, but nothing stands before it to compute",
			Detail: "write the formula first: `= FORMULA = __`"}
	}
	return &Fault{Message: "`__` stands alone after `=`", Detail: "end the statement with `= __`, and a unit where you want one"}
}

// equalInClaim explains `criterion a = b`.
func equalInClaim(c *clue) *Fault {
	word := c.toks[0].Value
	if !is(c.tok(0), "=") || word != "criterion" && word != "assume" {
		return nil
	}
	return &Fault{Message: code(word) + " takes `<`, `<=`, `>`, `>=`, `<<` or `>>`, not `=`",
		Detail: "`check a = b` compares by the digits written"}
}

// formOfCall explains `for`, `over` and `=` inside a call that takes none.
func formOfCall(c *clue) *Fault {
	if c.expected != "`)`" {
		return nil
	}
	switch t := c.tok(0); {
	case is(t, "for"):
		return &Fault{Message: "`for` stands inside `integral`, `sum`, `solve` and `derivative` alone",
			Detail: "the range of a function's parameter stands behind its definition: `f(x) = … for x from a to b`"}
	case is(t, "over"):
		return &Fault{Message: "`over` stands inside `integral` alone", Detail: "write `integral(w over disc)`"}
	case is(t, "=") && hasClosing(c.toks[c.at:]):
		return &Fault{Message: "`=` inside a parenthesis", Detail: "an equation stands inside `solve(LEFT = RIGHT for x from A to B)` alone"}
	}
	return nil
}

// hasClosing reports a closing parenthesis before the statement or line ends.
func hasClosing(toks []lexer.Token) bool {
	for i := range toks {
		if is(&toks[i], ")") {
			return true
		}
		if toks[i].Type == tokLine {
			return false
		}
	}
	return false
}

// spreadOfName explains `x ± 3`.
func spreadOfName(c *clue) *Fault {
	if !is(c.tok(0), "±") {
		return nil
	}
	return &Fault{Message: "`±` follows a number or a constant parenthesis only",
		Detail: "give the number a name where it is entered, with its limits"}
}

// strayAt explains an `at` that opens no lookup.
func strayAt(c *clue) *Fault {
	if !is(c.tok(0), "at") || !endsOperand(c.tok(-1)) || strings.Contains(c.expected, "from") {
		return nil
	}
	return &Fault{Message: "`at` is followed by a column and its value", Detail: "write `table.B at H = 200 A/m`"}
}
