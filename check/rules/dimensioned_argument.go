package rules

import (
	"fmt"
	"slices"
	"strings"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/unit"
)

// DimensionedArgument explains functions of numbers that are given a quantity.
func (Book) DimensionedArgument() check.Rule {
	return check.Rule{
		Name:     "dimensioned-argument",
		Severity: lang.Error,
		Firm:     true,
		Extends:  true,
		Title:    "A function of numbers is given a quantity with a dimension",
		Sees: "exp, ln, log10, a sine or a hyperbolic function of something that has a dimension after all is reduced; an exponent with a dimension; " +
			"a quantity with a dimension to the power of a quantity (an empirical law whose exponent is an input).",
		Silent: "For the ratio to a reference of the same dimension, in whatever unit either is written; for an angle; for a constant exponent, since the dimension of x^1.46 is defined " +
			"(a law whose coefficient does not carry it is hidden-unit-coefficient).",
		Formula: "exp x = 1 + x + x²/2 + …: the terms add only if x is a number. ln(b) − ln(a) means ln(b/a).",
		Remedy:  "Divide by a reference: `ln(b/a)`, `log10(P/(1 mW))`, `(f/(1 kHz))^alpha`.",
		Source:  "NIST SP 811 (2008), 7.1, on ln(p/MPa) (from memory); ISO 80000-1, 5",
		Wrong: check.Example{Note: `    a = 5 mm
    b = 50 mm
    l = 300 mm
    C, capacitance = 2*pi*eps_0*l/(ln(b) - ln(a)) = 7.25 pF
`},
		Right: check.Example{Note: `    a = 5 mm
    b = 50 mm
    l = 300 mm
    C, capacitance = 2*pi*eps_0*l/ln(b/a) = 7.25 pF
`},
		Run: dimensionedArgument,
	}
}

func dimensionedArgument(p *check.Pass) error {
	for _, r := range refusals(p, "dimensioned-argument") {
		switch parent := r.above(1).(type) {
		case *lang.Call:
			if slices.ContainsFunc(parent.Args, func(x lang.Expr) bool { return lang.Tree(x) == r.marked() }) {
				p.Report(argument(r, parent))
			}
		case *lang.Binary:
			if parent.Op == lang.OpPow {
				p.Report(power(r, parent))
			}
		}
	}
	return nil
}

// argument explains the argument of a function.
func argument(r refusal, c *lang.Call) lang.Fault {
	if isLogarithm(c) {
		if f, ok := r.twoLogarithms(c); ok {
			return f
		}
		return r.logarithm(c)
	}
	name, what := c.Fn.Text, r.what(r.marked())
	detail := fmt.Sprintf("Divide it by a reference value of the same dimension, so that the unit cancels: `%s/(…)`.", operand(r.text(r.marked())))
	if cause := missing(c, r.facts(r.marked()).Dim); cause != "" {
		detail = cause
	}
	return r.explained(fmt.Sprintf("%s takes a number, and %s is %s", name, r.text(r.marked()), what), detail)
}

// what says what a tree is: a name its kind and unit, a compound its unit alone.
func (r refusal) what(t lang.Tree) string {
	f := r.facts(t)
	if _, named := t.(*lang.Name); !named {
		f.Kind = 0
	}
	return describeDim(f)
}

// isLogarithm reports a call of a logarithm.
func isLogarithm(c *lang.Call) bool { return c.Fn.Text == "ln" || c.Fn.Text == "log10" }

// logarithm explains the logarithm of one quantity.
func (r refusal) logarithm(c *lang.Call) lang.Fault {
	facts, arg := r.facts(r.marked()), operand(r.text(r.marked()))
	ref := reference(facts)
	detail := fmt.Sprintf("Divide by a reference: `%s(%s/%s)`, or by the quantity that it is compared with.", c.Fn.Text, arg, ref)
	if k, ok := r.beforeCall(); ok && (k == "10" || k == "20") && c.Fn.Text == "log10" {
		detail = fmt.Sprintf("A level needs its reference: `%s*log10(%s/%s)`; or let the unit do it and end the quantity's own line with `= __ dB(%s)`, or with dBm or dBuV/m.", k, arg, ref, strings.Trim(ref, "(1 )"))
	}
	if r.besideNumber() {
		detail += " The bare number beside it belongs to one unit of the formula's source: divide by that unit."
	}
	return r.explained(fmt.Sprintf("%s takes a number, and %s is %s", c.Fn.Text, r.text(r.marked()), r.what(r.marked())), detail)
}

// reference is one unit of the quantity, as an operand.
func reference(f lang.Facts) string { return "(1 " + unit.Coherent(f.Dim).Symbol + ")" }

// operand puts a text in parentheses where a quotient would tear it apart.
func operand(text string) string {
	if strings.ContainsAny(text, "+- ") && !strings.HasPrefix(text, "(") {
		return "(" + text + ")"
	}
	return text
}

// beforeCall is the number that multiplies the marked argument's function.
func (r refusal) beforeCall() (string, bool) {
	b, ok := r.above(2).(*lang.Binary)
	if !ok || b.Op != lang.OpMul || b.Y != r.above(1) {
		return "", false
	}
	l, ok := unparenthesized(b.X).(*lang.Literal)
	if !ok || l.Unit != nil {
		return "", false
	}
	return l.Num.Text, true
}

// besideNumber reports a sum of the function with a plain number: 32.45 +
// 20*log10(d) + 20*log10(f).
func (r refusal) besideNumber() bool {
	for i := len(r.path) - 1; i >= 0; i-- {
		b, ok := r.path[i].(*lang.Binary)
		if !ok || b.Op != lang.OpAdd && b.Op != lang.OpSub {
			continue
		}
		for _, x := range []lang.Expr{b.X, b.Y} {
			if l, ok := unparenthesized(x).(*lang.Literal); ok && l.Unit == nil {
				return true
			}
		}
	}
	return false
}

// twoLogarithms explains ln(b) − ln(a), which means ln(b/a).
func (r refusal) twoLogarithms(c *lang.Call) (lang.Fault, bool) {
	for i := len(r.path) - 3; i >= 0; i-- {
		b, ok := r.path[i].(*lang.Binary)
		if !ok || b.Op != lang.OpSub {
			continue
		}
		x, y := scaledLog(b.X), scaledLog(b.Y)
		if x.call == nil || y.call == nil || x.call != c && y.call != c || x.times != y.times || x.call.Fn.Text != y.call.Fn.Text {
			continue
		}
		dx, dy := r.facts(x.call.Args[0]), r.facts(y.call.Args[0])
		if !dx.Known || !dy.Known || !dx.Dim.Compatible(dy.Dim) {
			continue
		}
		return r.joined(b, x, y), true
	}
	return lang.Fault{}, false
}

// joined is the finding on a difference of logarithms as a whole.
func (r refusal) joined(b *lang.Binary, x, y aLog) lang.Fault {
	fn := x.call.Fn.Text
	right := fmt.Sprintf("%s(%s/%s)", fn, operand(r.text(x.call.Args[0])), operandBelow(r.text(y.call.Args[0])))
	if x.times != "" {
		right = x.times + "*" + right
	}
	span := r.stmt.Abs(b)
	return lang.Fault{
		Span:    span,
		Message: fmt.Sprintf("each %s here is of %s: only the two together mean something", fn, r.what(x.call.Args[0])),
		Detail:  fmt.Sprintf("Write `%s`.", right),
		Fix:     &lang.Fix{Title: "Write " + right, Edits: []lang.Edit{{Span: span, New: right}}},
	}
}

// operandBelow puts a text in parentheses where it stands below a line.
func operandBelow(text string) string {
	if strings.ContainsAny(text, "+-*/· ") && !strings.HasPrefix(text, "(") {
		return "(" + text + ")"
	}
	return text
}

// aLog is a logarithm with the literal number before it, "" where there is none.
type aLog struct {
	times string
	call  *lang.Call
}

func scaledLog(x lang.Expr) aLog {
	x = unparenthesized(x)
	if b, ok := x.(*lang.Binary); ok && b.Op == lang.OpMul {
		l, number := unparenthesized(b.X).(*lang.Literal)
		c, call := unparenthesized(b.Y).(*lang.Call)
		if number && call && l.Unit == nil && isLogarithm(c) && len(c.Args) == 1 {
			return aLog{l.Num.Text, c}
		}
		return aLog{}
	}
	if c, ok := x.(*lang.Call); ok && isLogarithm(c) && len(c.Args) == 1 {
		return aLog{"", c}
	}
	return aLog{}
}

// power explains an exponent with a dimension, and a base with one under an
// exponent that is no constant.
func power(r refusal, b *lang.Binary) lang.Fault {
	if r.marked() == lang.Tree(b.Y) {
		return r.explained(fmt.Sprintf("an exponent is a number, and %s is %s", r.text(b.Y), r.what(b.Y)),
			fmt.Sprintf("Divide it by the unit in which the law was fitted: `(%s/%s)`.", operand(r.text(b.Y)), reference(r.facts(b.Y))))
	}
	return r.explained(
		fmt.Sprintf("%s is %s, and the exponent %s is a quantity: the power has no unit that could be told", r.text(b.X), r.what(b.X), r.text(b.Y)),
		fmt.Sprintf("Divide the base by the unit in which the law was fitted: `(%s/%s)^%s`; the coefficient is then the value at that unit.", operand(r.text(b.X)), reference(r.facts(b.X)), r.text(b.Y)))
}
