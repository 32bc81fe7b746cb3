package lang

import "github.com/alecthomas/participle/v2/lexer"

// Expressions are read by precedence climbing:
//
//	expr    = unary { ("+" | "-" | "*" | "/" | "·" | "×") unary }
//	unary   = ("-" | "+") unary | power
//	power   = operand [ "^" exponent | superscript ]
//	operand = literal | name | call | "(" … ")" | "|" expr "|", with .field [cell] `at X = …`
//
// `* / · ×` are one level, left to right, except that `×` binds before a `·` to
// its left: a·b×c is the triple product.

// expr reads an expression and stops at what cannot go on with it.
func (r *reader) expr() Expr { return r.binary(1) }

// infix gives the operator that a token is and its level, 0 if it is none.
func infix(t *lexer.Token) (Op, int) {
	if t.Type != tokOp {
		return 0, 0
	}
	switch t.Value {
	case "+":
		return OpAdd, 1
	case "-", "−":
		return OpSub, 1
	case "*":
		return OpMul, 2
	case "/":
		return OpDiv, 2
	case "·", "⋅":
		return OpDot, 2
	case "×":
		return OpCross, 2
	}
	return 0, 0
}

// binary reads operands joined by operators of at least the given level.
func (r *reader) binary(level int) Expr {
	x := r.unary()
	for {
		op, own := infix(r.peek())
		if own < level || own == 0 {
			return x
		}
		t := r.next()
		var y Expr
		if own == 2 {
			y = r.unary()
		} else {
			y = r.binary(own + 1)
		}
		if op == OpDot {
			y = r.crosses(y)
		}
		x = r.join(op, spanOf(t), x, y)
	}
}

// crosses reads `× c` after the right side of a `·`.
func (r *reader) crosses(x Expr) Expr {
	for {
		op, _ := infix(r.peek())
		if op != OpCross {
			return x
		}
		t := r.next()
		x = r.join(OpCross, spanOf(t), x, r.unary())
	}
}

func (r *reader) join(op Op, at Span, x, y Expr) Expr {
	r.terms++
	if r.terms > maxTerms {
		r.failWith(&breakage{message: "more than 10000 operators in one expression",
			detail: "give parts of the expression names of their own, or put the numbers into a table"})
	}
	return &Binary{Node{Span: x.Place().to(y.Place())}, op, at, x, y}
}

func (r *reader) unary() Expr {
	t := r.peek()
	op, level := infix(t)
	if level != 1 {
		return r.power()
	}
	if r.signedNumber() {
		return r.power()
	}
	return r.sign(op, r.unary)
}

// sign reads a sign and what it belongs to.
func (r *reader) sign(op Op, operand func() Expr) Expr {
	t := r.next()
	if !r.enter() {
		return r.nothing()
	}
	defer r.leave()
	x := operand()
	return &Unary{Node{Span: spanOf(t).to(x.Place())}, op, x}
}

// nothing stands for an expression that is broken.
func (r *reader) nothing() Expr {
	at := r.toks[r.at].Pos.Offset
	return &Broken{Node{Span: Span{at, at}}}
}

// signTouchesNumber reports a sign that touches the number after it.
func (r *reader) signTouchesNumber() bool {
	t := r.peek()
	if _, level := infix(t); level != 1 {
		return false
	}
	n := r.ahead(1)
	return n.Type == tokNumber && touch(t, n)
}

// signedNumber reports a sign that belongs to the literal after it: it touches
// the number, and no power comes between (-3^2 is -(3^2)).
func (r *reader) signedNumber() bool {
	if !r.signTouchesNumber() {
		return false
	}
	after := r.ahead(2)
	return after.Type != tokPower && !is(after, "^")
}

func (r *reader) power() Expr {
	x := r.operand(true)
	t := r.peek()
	switch {
	case t.Type == tokPower:
		r.powerOf(x)
		r.next()
		x = r.join(OpPow, Span{t.Pos.Offset, t.Pos.Offset}, x, superscriptLiteral(t))
		if p := r.peek(); p.Type == tokPower || is(p, "^") {
			r.failWith(&breakage{message: "a power of a power can be read in two ways", detail: "set parentheses"})
		}
	case is(t, "^"):
		r.powerOf(x)
		r.next()
		x = r.join(OpPow, spanOf(t), x, r.exponent())
	}
	return x
}

// powerOf refuses a power of what ends with a unit or with the value of a
// lookup: `3 m ^2` reads as square metres to one and as a square to the other.
func (r *reader) powerOf(x Expr) {
	if !hasUnit(x) {
		return
	}
	text := PrintExpr(x)
	detail := "a unit phrase has no blanks, as in `m^2`; the power of the whole is " + code("("+text+")^2")
	if _, ok := x.(*Lookup); ok {
		detail = "set parentheses around the lookup or around its value"
	}
	r.failWith(&breakage{message: "a power after " + code(text) + " can be read in two ways", detail: detail})
}

func (r *reader) exponent() Expr {
	op, level := infix(r.peek())
	if level == 1 && !r.signedNumber() {
		return r.sign(op, r.exponent)
	}
	if !r.enter() {
		return r.nothing()
	}
	defer r.leave()
	return r.power()
}

// operand reads an operand with what follows it at once; lookups (`at X = …`)
// are left alone inside a lookup, whose value is one operand.
func (r *reader) operand(lookups bool) Expr {
	if !r.enter() {
		return r.nothing()
	}
	defer r.leave()
	x := r.primary()
	for {
		switch t := r.peek(); {
		case is(t, ".") && r.touchesNext():
			x = r.member(x)
		case is(t, "[") && r.touchesNext():
			x = r.cell(x)
		case lookups && is(t, "at") && isWordToken(r.ahead(1)) && is(r.ahead(2), "="):
			x = r.lookup(x)
		default:
			return x
		}
		r.terms++
		if r.terms > maxTerms {
			r.fail("fewer points and brackets in one expression")
		}
	}
}

func (r *reader) primary() Expr {
	t := r.peek()
	switch {
	case t.Type == tokNumber, r.signTouchesNumber():
		return r.literal()
	case t.Type == tokWord && (!isReserved(t.Value) || t.Value == "j" || t.Value == "pi" || t.Value == "π"):
		return r.name()
	case is(t, "("):
		return r.paren()
	case is(t, "|"):
		return r.bars()
	}
	r.fail("a number, a name or a parenthesis")
	return r.nothing()
}

func (r *reader) name() Expr {
	t := r.next()
	n := Name{Node{Span: spanOf(t)}, t.Value}
	if p := r.peek(); is(p, "(") && touch(t, p) && !isReserved(t.Value) {
		return r.call(&Call{Fn: n, Node: n.Node})
	}
	return &n
}

// member reads `.field`, or a call of a function that belongs to x.
func (r *reader) member(x Expr) Expr {
	r.next()
	if !r.touchesNext() {
		r.fail("a name directly after the point")
	}
	field := r.ident("a name after the point")
	node := Node{Span: x.Place().to(field.Span)}
	if p := r.peek(); is(p, "(") && touch(r.before(), p) {
		return r.call(&Call{Node: node, Of: x, Fn: Name(field)})
	}
	return &Member{node, x, field}
}

func (r *reader) cell(x Expr) Expr {
	outer := r.open()
	at := r.expr()
	r.closing("]", outer)
	return &Cell{Node{Span: r.spanFrom(x.Place().Start)}, x, at}
}

func (r *reader) lookup(x Expr) Expr {
	r.next()
	column := r.ident("the name of a column")
	r.expect("=")
	value := r.operand(false)
	return &Lookup{Node{Span: x.Place().to(value.Place())}, x, column, value}
}

func (r *reader) bars() Expr {
	start := r.peek().Pos.Offset
	outer := r.open()
	x := r.expr()
	r.closing("|", outer)
	return &Bars{Node{Span: r.spanFrom(start)}, x}
}

// paren reads a parenthesis or a vector, with the unit and the spread after it.
func (r *reader) paren() Expr {
	start := r.peek().Pos.Offset
	outer := r.open()
	parts := []Expr{r.expr()}
	for r.accept(",") {
		parts = append(parts, r.expr())
	}
	if len(parts) != 1 && len(parts) != 3 && is(r.peek(), ")") {
		r.componentCount(len(parts))
	}
	r.closing(")", outer)
	unit := r.unit()
	if len(parts) == 3 {
		return &Triple{Node{Span: r.spanFrom(start)}, [3]Expr(parts), unit}
	}
	p := &Paren{X: parts[0], Unit: unit}
	p.Spread = r.spread(false, unit)
	p.Span = r.spanFrom(start)
	return p
}
