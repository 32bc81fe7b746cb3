package lang

import (
	"unicode/utf8"
)

// The levels of an expression, from loosest to tightest.
const (
	levelSum = iota + 1
	levelProduct
	levelUnary
	levelPower
	levelOperand
)

// levelOf is the level on which the text of an expression stands by itself.
func levelOf(x Expr) int {
	switch n := x.(type) {
	case *Binary:
		switch n.Op {
		case OpAdd, OpSub:
			return levelSum
		case OpPow:
			return levelPower
		}
		return levelProduct
	case *Unary:
		return levelUnary
	}
	return levelOperand
}

// expr writes an expression, in parentheses where it is looser than the level.
// Trees from the parser have their parentheses and never need one.
func (p *printer) expr(x Expr, level int) {
	if levelOf(x) < level {
		p.inParens(x)
		return
	}
	switch n := x.(type) {
	case *Binary:
		p.binary(n)
	case *Unary:
		p.unary(n)
	case *Literal:
		p.literal(n)
	case *Name:
		p.write(n.Text)
	case *Call:
		p.call(n)
	default:
		p.bracketed(x)
	}
}

// bracketed writes what carries brackets, points or blanks of its own.
func (p *printer) bracketed(x Expr) {
	switch n := x.(type) {
	case *Paren:
		p.write("(")
		p.expr(n.X, levelSum)
		p.write(")")
		p.unit(n.Unit)
		p.spread(n.Spread)
	case *Triple:
		p.write("(")
		p.list(n.X[:])
		p.write(")")
		p.unit(n.Unit)
	case *Bars:
		p.write("|")
		p.expr(n.X, levelSum)
		p.write("|")
	case *Member:
		p.owner(n.X)
		p.write(".", n.Field.Text)
	case *Cell:
		p.owner(n.X)
		p.write("[")
		p.expr(n.At, levelSum)
		p.write("]")
	case *Lookup:
		p.expr(n.X, levelOperand)
		p.write(" at ", n.Column.Text, " = ")
		p.owner(n.Value)
	case *Blank:
		p.write("__")
		p.unit(n.Unit)
	}
}

func (p *printer) inParens(x Expr) {
	p.write("(")
	p.expr(x, levelSum)
	p.write(")")
}

// owner writes an operand after which a point, a bracket or another lookup
// would be read as part of it.
func (p *printer) owner(x Expr) {
	if _, ok := x.(*Lookup); ok {
		p.inParens(x)
		return
	}
	p.expr(x, levelOperand)
}

func (p *printer) binary(n *Binary) {
	switch n.Op {
	case OpAdd, OpSub:
		p.expr(n.X, levelSum)
		p.write(" ", string(n.Op), " ")
		p.expr(n.Y, levelProduct)
	case OpPow:
		p.power(n)
	default:
		p.product(n)
	}
}

// product writes `* / · ×`; after a unit phrase with blanks, since `/` and `·`
// would carry it on.
func (p *printer) product(n *Binary) {
	if n.Op == OpCross && isOp(n.X, OpDot) {
		p.inParens(n.X) // a·b×c is a·(b×c)
	} else {
		p.expr(n.X, levelProduct)
	}
	op := string(n.Op)
	if p.afterUnit {
		op = " " + op + " "
	}
	p.write(op)
	if n.Op == OpDot && isOp(n.Y, OpCross) {
		p.crosses(n.Y.(*Binary))
		return
	}
	p.expr(n.Y, levelUnary)
}

// crosses writes `b×c×d` to the right of a dot product.
func (p *printer) crosses(n *Binary) {
	if x, ok := n.X.(*Binary); ok && x.Op == OpCross {
		p.crosses(x)
	} else {
		p.expr(n.X, levelUnary)
	}
	p.write(string(OpCross))
	p.expr(n.Y, levelUnary)
}

func isOp(x Expr, op Op) bool {
	b, ok := x.(*Binary)
	return ok && b.Op == op
}

func (p *printer) power(n *Binary) {
	if hasUnit(n.X) || isSigned(n.X) {
		p.inParens(n.X)
	} else {
		p.expr(n.X, levelOperand)
	}
	if isSuperscripted(n.Y) {
		p.write(n.Y.(*Literal).Num.Text)
		return
	}
	p.write("^")
	if hasUnit(n.Y) {
		p.inParens(n.Y)
		return
	}
	p.expr(n.Y, levelUnary)
}

// isSuperscripted reports an exponent that is written in superscripts.
func isSuperscripted(x Expr) bool {
	l, ok := x.(*Literal)
	r, _ := utf8.DecodeRuneInString(literalText(l, ok))
	return ok && isSuperscript(r)
}

func literalText(l *Literal, ok bool) string {
	if !ok {
		return ""
	}
	return l.Num.Text
}

// isSigned reports a literal with a sign.
func isSigned(x Expr) bool {
	l, ok := x.(*Literal)
	return ok && signLength(l.Num.Text) > 0
}

// hasUnit reports text that ends with a unit phrase or an uncertainty.
func hasUnit(x Expr) bool {
	switch n := x.(type) {
	case *Literal:
		return n.Unit != nil || n.Spread != nil && !n.Spread.Standard
	case *Paren:
		return n.Unit != nil || n.Spread != nil
	case *Triple:
		return n.Unit != nil
	case *Call:
		return n.Unit != nil
	case *Lookup:
		return true // the power would go to its value
	}
	return false
}

// unary writes a sign. A blank keeps it apart from a number, which would take
// it in.
func (p *printer) unary(n *Unary) {
	p.write(string(n.Op))
	at := p.b.Len()
	var inner printer
	inner.expr(n.X, levelUnary)
	text := inner.b.String()
	if text != "" && isDigit(text[0]) && !isOp(n.X, OpPow) {
		p.write(" ")
	}
	p.write(text)
	p.afterUnit = inner.afterUnit && p.b.Len() > at
}

func (p *printer) literal(l *Literal) {
	if l.Spread == nil || !l.Spread.Standard {
		p.write(l.Num.Text)
	} else {
		mantissa, _, exponent := splitNumber(l.Num.Text)
		p.write(mantissa, "(", l.Spread.Num.Text, ")", exponent)
	}
	p.unit(l.Unit)
	p.spread(l.Spread)
}

// spread writes ` ± 0.05 mm`; a standard uncertainty stands in its number.
func (p *printer) spread(s *Spread) {
	if s == nil || s.Standard {
		return
	}
	p.write(" ± ", s.Num.Text)
	p.unit(s.Unit)
}

func (p *printer) call(c *Call) {
	if c.Of != nil {
		p.owner(c.Of)
		p.write(".")
	}
	p.write(c.Fn.Text, "(")
	p.list(c.Args)
	if c.Equal != nil {
		p.write(" = ")
		p.expr(c.Equal, levelSum)
	}
	for _, g := range c.For {
		p.bound(g)
	}
	if c.Over != nil {
		p.write(" over ")
		p.owner(c.Over)
	}
	p.write(")")
	p.unit(c.Unit)
}
