package rules

import (
	"math"

	"inkjoule/lang"
	"inkjoule/lang/unit"
)

// This file computes the numbers that stand in a formula: literals, π, and
// products, quotients and powers of them.

// constantNumber is a value in SI units that stands in the text as a number.
type constantNumber struct {
	value    float64
	dim      unit.Dim
	relative float64 // half a last digit over the value, of the coarsest literal with a unit or of all
	digits   int     // of that literal
}

// constantOf computes an expression of literals and π; ok is false for others,
// for level units and for absolute temperatures.
func constantOf(x lang.Expr) (c constantNumber, ok bool) {
	switch x := unparenthesized(x).(type) {
	case *lang.Literal:
		return constantLiteral(x)
	case *lang.Name:
		return constantNumber{value: math.Pi, digits: exactDigits}, lang.CanonicalName(x.Text) == "pi"
	case *lang.Unary:
		c, ok = constantOf(x.X)
		if x.Op == lang.OpSub {
			c.value = -c.value
		}
		return c, ok
	case *lang.Binary:
		return constantBinary(x)
	}
	return c, false
}

func constantLiteral(l *lang.Literal) (constantNumber, bool) {
	c := constantNumber{value: l.Num.Value, digits: digitsWritten(l.Num)}
	if l.Num.Value != 0 {
		c.relative = 0.5 * math.Pow(10, float64(l.Num.LastDigit)) / math.Abs(l.Num.Value)
	}
	if exactNumeral(l) {
		c.relative, c.digits = 0, exactDigits
	}
	if l.Unit == nil {
		return c, true
	}
	u, err := unit.Parse(l.Unit.Text)
	if err != nil || u.Level != nil || u.Affine() {
		return c, false
	}
	c.value, c.dim = u.ToSI(l.Num.Value), u.Dim
	return c, true
}

func constantBinary(b *lang.Binary) (c constantNumber, ok bool) {
	x, okX := constantOf(b.X)
	y, okY := constantOf(b.Y)
	if !okX || !okY {
		return c, false
	}
	c = constantNumber{relative: math.Max(x.relative, y.relative), digits: min(x.digits, y.digits)}
	switch b.Op {
	case lang.OpMul:
		c.value, c.dim = x.value*y.value, x.dim.Mul(y.dim)
	case lang.OpDiv:
		c.value, c.dim = x.value/y.value, x.dim.Div(y.dim)
	case lang.OpPow:
		c.value = math.Pow(x.value, y.value)
		return c, x.dim.IsOne() && y.dim.IsOne() && !math.IsNaN(c.value)
	default:
		return c, false
	}
	return c, y.value != 0 || b.Op != lang.OpDiv
}

// digitsWritten counts the significant digits of a numeral.
func digitsWritten(n lang.Numeral) int {
	if n.Value == 0 {
		return 1
	}
	return max(1, int(math.Floor(math.Log10(math.Abs(n.Value))))-n.LastDigit+1)
}

// exactDigits are those of a number that is exact: 4, π, 1e-7.
const exactDigits = 99

// exactNumeral reports a small whole number without a unit, and a power of ten.
func exactNumeral(l *lang.Literal) bool {
	x := math.Abs(l.Num.Value)
	tens := math.Log10(x)
	return l.Unit == nil && x < 100 && x == math.Trunc(x) || x > 0 && math.Abs(tens-math.Round(tens)) < 1e-12
}

// constantsIn visits the largest expressions of literals and π in a tree, from
// the largest down to what visit has not answered for.
func constantsIn(t lang.Tree, visit func(lang.Expr, constantNumber) bool) {
	lang.Walk(t, func(t lang.Tree) bool {
		x, ok := t.(lang.Expr)
		if !ok {
			return true
		}
		c, ok := constantOf(x)
		return !ok || !visit(x, c)
	})
}
