package lang

import "strconv"

// call reads the arguments of a call, and the forms that bind a variable, from
// the opening parenthesis on.
func (r *reader) call(c *Call) Expr {
	outer := r.open()
	if !is(r.peek(), ")") {
		c.Args = append(c.Args, r.expr())
		for r.accept(",") {
			c.Args = append(c.Args, r.expr())
		}
		r.form(c)
	}
	r.closing(")", outer)
	c.Unit = r.unit()
	c.Span = r.spanFrom(c.Span.Start)
	return c
}

// form reads `for VAR from A to B`, `over REGION` and the equation of solve,
// each where the function takes it.
func (r *reader) form(c *Call) {
	fn := c.Fn.Text
	if c.Of != nil {
		fn = ""
	}
	if fn == "solve" {
		r.expect("=")
		c.Equal = r.expr()
	}
	switch fn {
	case "integral":
		if r.accept("over") {
			c.Over = r.operand(false)
			return
		}
		r.ranges(c)
		if len(c.For) == 0 {
			r.fail("`for VARIABLE from A to B` or `over REGION`")
		}
	case "derivative":
		c.For = append(c.For, r.boundRange(true))
		if r.broken == nil && c.For[0].At == nil {
			r.fail("`for VARIABLE at A`, where the derivative is taken")
		}
	case "solve":
		c.For = append(c.For, r.boundRange(false))
	case "sum":
		r.ranges(c)
	}
}

func (r *reader) ranges(c *Call) {
	for is(r.peek(), "for") {
		c.For = append(c.For, r.boundRange(false))
	}
}

// componentCount says that a parenthesis has two or more than three parts.
func (r *reader) componentCount(n int) {
	r.failWith(&breakage{message: "a vector has three components, this parenthesis has " + strconv.Itoa(n),
		detail: "is a comma meant as the decimal sign? Write a point, as in `1.5`"})
}
