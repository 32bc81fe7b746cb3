package lang

import (
	"fmt"
	"math/big"

	"inkjoule/lang/eval"
)

// This file words the findings about shapes and reads constants exactly.

// shapeName names a shape in a message.
func shapeName(s eval.Shape) string {
	switch s {
	case eval.Vector:
		return "a vector"
	case eval.Tensor:
		return "a tensor"
	case eval.List:
		return "a list"
	}
	return "a number"
}

// shapeFault reports operands whose shapes do not go together, with the
// bracketing that was read.
func (e *elab) shapeFault(b *Binary, x, y typed, detail string) typed {
	e.fault("shape-mix", b, fmt.Sprintf("%s %c %s: %s stands beside %s", sketch(b.X), b.Op, sketch(b.Y), shapeName(x.Shape), shapeName(y.Shape)), detail)
	return unknown()
}

// productFault explains which product of two shapes was meant.
func (e *elab) productFault(b *Binary, x, y typed) typed {
	switch {
	case x.Shape == eval.Vector && y.Shape == eval.Vector && b.Op != OpDiv:
		return e.shapeFault(b, x, y, "write · for the dot product, or × for the cross product")
	case b.Op == OpDiv && y.Shape == eval.Vector:
		return e.shapeFault(b, x, y, "nothing can be divided by a vector; divide by its magnitude |…| or by a component")
	case b.Op == OpDiv && y.Shape == eval.Tensor:
		return e.shapeFault(b, x, y, "multiply by inv(…) of the tensor")
	case x.Shape == eval.Vector && y.Shape == eval.Tensor:
		return e.shapeFault(b, x, y, "write the tensor first: tensor*vector, or use ·")
	}
	return e.shapeFault(b, x, y, "")
}

// bracketing tells how an operation was read, for a reader who meant another.
func bracketing(b *Binary) string {
	return fmt.Sprintf("it was read as (%s) %c (%s)", sketch(b.X), b.Op, sketch(b.Y))
}

// sketch prints an expression, cut to a length that fits a message.
func sketch(x Expr) string {
	s := []rune(PrintExpr(x))
	if len(s) > 40 {
		return string(s[:38]) + "…"
	}
	return string(s)
}

// constantRat reads an expression of plain numbers exactly, or gives nil.
func constantRat(x Expr) *big.Rat {
	switch x := x.(type) {
	case *Literal:
		if x.Unit == nil && x.Spread == nil {
			return numeralRat(x.Num)
		}
	case *Paren:
		if x.Unit == nil && x.Spread == nil {
			return constantRat(x.X)
		}
	case *Unary:
		if r := constantRat(x.X); r != nil && x.Op == OpSub {
			return r.Neg(r)
		} else if r != nil {
			return r
		}
	case *Binary:
		return constantOperation(x)
	}
	return nil
}

// constantOperation reads + − * / of constants.
func constantOperation(b *Binary) *big.Rat {
	x, y := constantRat(b.X), constantRat(b.Y)
	if x == nil || y == nil {
		return nil
	}
	switch b.Op {
	case OpAdd:
		return x.Add(x, y)
	case OpSub:
		return x.Sub(x, y)
	case OpMul, OpDot:
		return x.Mul(x, y)
	case OpDiv:
		if y.Sign() != 0 {
			return x.Quo(x, y)
		}
	}
	return nil
}

// numeralRat is the numeral's exact value; nil for one whose exponent is so
// large that an exact value would be unwieldy.
func numeralRat(n Numeral) *big.Rat {
	if n.LastDigit > 400 || n.LastDigit < -400 {
		return nil
	}
	r, ok := new(big.Rat).SetString(asciiNumber(n.Text))
	if !ok {
		return nil
	}
	return r
}
