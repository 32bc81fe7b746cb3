package lang

import "strings"

// The slips of this file stand in the head of a statement.

// statementAsName explains `check = 3`.
func statementAsName(c *clue) *Fault {
	t := &c.toks[0]
	if c.at != 1 || !isStatementWord(t.Value) || !is(c.tok(0), "=") {
		return nil
	}
	return &Fault{Span: spanOf(t), Message: code(t.Value) + " begins a statement and cannot be a name",
		Detail: "choose another name"}
}

// misspeltStatement explains a first word that resembles a statement word.
func misspeltStatement(c *clue) *Fault {
	t := &c.toks[0]
	if c.at != 1 || t.Type != tokWord || isReserved(t.Value) {
		return nil
	}
	word := nearestStatementWord(t.Value)
	if word == "" {
		return nil
	}
	return &Fault{Span: spanOf(t), Message: code(t.Value) + " begins no statement",
		Detail: "is " + code(word) + " meant?",
		Fix:    &Fix{"Write " + code(word), []Edit{{spanOf(t), word}}}}
}

// nearestStatementWord is the statement word that a word is or resembles: in
// small letters, or with few letters changed, left out or added. Else "".
func nearestStatementWord(word string) string {
	if isStatementWord(word) {
		return word
	}
	return Nearest(strings.ToLower(word), ReservedWords()[:statementWords])
}

// reservedName explains a reserved word where a name is defined or bound.
func reservedName(c *clue) *Fault {
	t := c.tok(0)
	if t.Type != tokWord || !isReserved(t.Value) || !strings.HasPrefix(c.expected, "a name") && !strings.HasPrefix(c.expected, "the name") {
		return nil
	}
	f := &Fault{Message: code(t.Value) + " is reserved and cannot be a name", Detail: "choose another name"}
	switch {
	case t.Value == "j":
		f.Message = "`j` is the imaginary unit and cannot be a name"
		f.Detail = "use another letter, such as `n` or `k`"
	case t.Value == "pi" || t.Value == "π":
		f.Message = code(t.Value) + " is the number pi and cannot be a name"
	}
	return f
}

// kindBeforeMedium explains `w, energy density in mica = …`.
func kindBeforeMedium(c *clue) *Fault {
	if c.expected != "`=`" || !is(c.tok(0), "in") || c.tok(1).Type != tokWord {
		return nil
	}
	name, medium := &c.toks[0], c.tok(1).Value
	for _, t := range c.toks[:c.at] {
		if is(&t, ",") {
			if c.seen("in") {
				return &Fault{Message: "a quantity has one medium, this head names two"}
			}
			cut := Span{spanOf(c.tok(-1)).End, spanOf(c.tok(1)).End}
			at := t.Pos.Offset
			return &Fault{Span: spanOf(c.tok(0)).to(spanOf(c.tok(1))),
				Message: code("in "+medium) + " stands behind the kind",
				Detail:  "the medium comes first: " + code(name.Value+" in "+medium+", … ="),
				Fix:     &Fix{"Put the medium before the kind", []Edit{{Span{at, at}, " in " + medium}, {cut, ""}}}}
		}
	}
	return nil
}

// missingEqual explains `U, peak voltage 12 kV`.
func missingEqual(c *clue) *Fault {
	if c.expected != "`=`" || c.tok(0).Type != tokNumber && c.tok(0).Type != tokBad {
		return nil
	}
	head := code(sourceText(c.toks[:c.at]) + " = " + c.tok(0).Value)
	return &Fault{Message: "`=` is missing before " + foundWords(c.tok(0)), Detail: "write " + head,
		Fix: &Fix{"Insert `=`", c.insert(0, "= ")}}
}

// deeperLine explains a statement that continues the one above against the
// author's will.
func deeperLine(c *clue) *Fault {
	t := c.tok(0)
	if t.Type != tokWord || t.Pos.Line == c.tok(-1).Pos.Line || c.tok(-1).Type == tokLine {
		return nil
	}
	if !isStatementWord(t.Value) && !opensDefinition(c.toks[c.at:]) {
		return nil
	}
	return &Fault{Message: deeperMessage(0), Detail: deeperDetail}
}

// sourceUnquoted explains `per drawing 12`, and a path or text without marks.
func sourceUnquoted(c *clue) *Fault {
	t := c.tok(0)
	if c.expected != plainWords["Quote"] || t.EOF() || t.Type == tokLine {
		return nil
	}
	last := 0
	for n := 1; c.tok(n).Pos.Line == t.Pos.Line && !c.tok(n).EOF() && c.tok(n).Type != tokQuote; n++ {
		last = n
	}
	whole := spanOf(t).to(spanOf(c.tok(last)))
	f := &Fault{Span: whole, Message: "expected a text in double quotation marks after " + code(c.tok(-1).Value),
		Detail: "write " + code(c.tok(-1).Value+` "…"`)}
	if n := c.tok(last + 1); n.EOF() || n.Pos.Line > t.Pos.Line {
		f.Fix = &Fix{"Put it in quotation marks", []Edit{{Span{whole.Start, whole.Start}, `"`}, {Span{whole.End, whole.End}, `"`}}}
	}
	return f
}

// chainAfterRange explains `… for x from a to b = 3`.
func chainAfterRange(c *clue) *Fault {
	if !is(c.tok(0), "=") || c.expected != expectedEnd {
		return nil
	}
	if !c.seen("for") {
		return nil
	}
	return &Fault{Message: "a chain of equals cannot follow `for`",
		Detail: "the stated result comes before the range: `= … = 3 for x from a to b`"}
}

// commaAfterValue explains a comma behind the first piece of a definition.
func commaAfterValue(c *clue) *Fault {
	if !is(c.tok(0), ",") || c.expected != expectedEnd || isStatementWord(c.toks[0].Value) {
		return nil
	}
	if c.tok(-1).Type == tokNumber && c.tok(1).Type == tokNumber && touch(c.tok(-1), c.tok(0)) && touch(c.tok(0), c.tok(1)) {
		return decimalComma(c)
	}
	return &Fault{Message: "a comma separates pieces, and each piece needs its range",
		Detail: "write `= A for x from a to b, B for x from b to c`"}
}
