package lang

import (
	"fmt"

	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file infers what operations carry: dimension, shape, kind, qualifier.

// binary infers and compiles an operation on two operands.
func (e *elab) binary(b *Binary) typed {
	if b.Op == OpPow {
		return e.power(b)
	}
	x, y := e.expr(b.X), e.expr(b.Y)
	if !x.Known || !y.Known {
		return unknown()
	}
	switch b.Op {
	case OpAdd, OpSub:
		return e.sum(b, x, y)
	case OpCross:
		return e.cross(b, x, y)
	}
	return e.product(b, x, y)
}

// sum infers x + y and x − y: one dimension, one shape.
func (e *elab) sum(b *Binary, x, y typed) typed {
	if !x.Dim.Compatible(y.Dim) {
		return e.mismatch(b, x, y)
	}
	t := typed{Facts: Facts{Known: true, Dim: x.Dim, Shape: x.Shape, Complex: x.Complex || y.Complex}}
	shape, ok := sameShape(x.Shape, y.Shape)
	if !ok {
		return e.shapeFault(b, x, y, "a sum needs two of one shape")
	}
	t.Shape = shape
	if !e.sumOfTemperatures(b, x, y, &t) {
		return unknown()
	}
	if x.pi == y.pi {
		t.pi = x.pi
	}
	t.Media, t.kinds, t.plain, t.blind = x.Media, x.kinds, x.plain, x.blind
	t.join(y)
	t.Kind, t.KindBy = sumKind(b.Op, x, y)
	if b.Op == OpSub && isTemperature(x) && isTemperature(y) {
		t.Kind, t.KindBy = kind.TemperatureRise, Inferred
	}
	t.Qualifier, t.QualBy = sumQualifier(x, y)
	if b.Op == OpSub {
		return e.built(t, b)(eval.Sub(b.ID, x.code, y.code))
	}
	return e.built(t, b)(eval.Add(b.ID, x.code, y.code))
}

// sumOfTemperatures keeps absolute temperatures apart from differences: the
// sum of two absolute ones means nothing.
func (e *elab) sumOfTemperatures(b *Binary, x, y typed, t *typed) bool {
	if !x.Absolute && !y.Absolute {
		return true
	}
	if b.Op == OpSub && isTemperature(x) && isTemperature(y) {
		t.Absolute = false
		return true
	}
	switch {
	case x.Absolute && y.Absolute && b.Op == OpAdd:
		e.fault("temperature-offset", b, "the sum of two temperatures in °C has no meaning",
			"write the difference in kelvin: 25 °C + 5 K")
		return false
	default:
		t.Absolute = true
	}
	return true
}

// isTemperature reports an absolute temperature: one in °C, or one that is
// declared as a temperature in kelvin.
func isTemperature(t typed) bool {
	return t.Absolute || t.KindBy == Declared && t.Kind.Is(kind.Temperature)
}

// sameShape is the shape of a sum, where a scalar joins a list element-wise.
func sameShape(x, y eval.Shape) (eval.Shape, bool) {
	switch {
	case x == y:
		return x, true
	case x == eval.List && y == eval.Scalar, x == eval.Scalar && y == eval.List:
		return eval.List, true
	}
	return 0, false
}

// mismatch reports a sum of two dimensions.
func (e *elab) mismatch(b *Binary, x, y typed) typed {
	verb := "added to"
	if b.Op == OpSub {
		verb = "subtracted from"
	}
	left, right := describe(x.Facts), describe(y.Facts)
	if b.Op == OpSub {
		left, right = right, left
	}
	e.fault("dimension-mismatch", b, fmt.Sprintf("%s cannot be %s %s", right, verb, left), bracketing(b))
	return unknown()
}

// describe names what an expression is, for messages: "voltage (V)".
func describe(f Facts) string {
	u := unit.Coherent(f.Dim).Symbol
	if u == "1" || u == "" {
		u = "a plain number"
	}
	if f.Kind != 0 && f.KindBy >= Inferred {
		return fmt.Sprintf("%s (%s)", f.Kind, u)
	}
	return u
}

// product infers x * y, x / y and x · y.
func (e *elab) product(b *Binary, x, y typed) typed {
	shape, ok := productShape(b.Op, x.Shape, y.Shape)
	if !ok {
		return e.productFault(b, x, y)
	}
	t := typed{Facts: Facts{Known: true, Shape: shape, Complex: x.Complex || y.Complex}}
	if b.Op == OpDiv {
		t.Dim, t.pi = x.Dim.Div(y.Dim), x.pi-y.pi
	} else {
		t.Dim, t.pi = x.Dim.Mul(y.Dim), x.pi+y.pi
	}
	t.Dim, t.pi = cyclesToAngle(t.Dim, t.pi)
	t.Media, t.kinds, t.plain, t.blind = x.Media, x.kinds, x.plain, x.blind
	t.join(y)
	t.Kind, t.KindBy = productKind(b.Op, x, y, &t)
	t.Qualifier, t.QualBy = productQualifier(b.Op, x, y)
	switch b.Op {
	case OpDiv:
		return e.built(t, b)(eval.Div(b.ID, x.code, y.code))
	case OpDot:
		return e.built(t, b)(eval.Dot(b.ID, x.code, y.code))
	}
	return e.built(t, b)(eval.Mul(b.ID, x.code, y.code))
}

// productShape is the shape of a product or quotient; ok is false where the
// operator does not say which product is meant.
func productShape(op Op, x, y eval.Shape) (eval.Shape, bool) {
	switch {
	case x == eval.Scalar && (op != OpDiv || y == eval.Scalar || y == eval.List):
		return y, true
	case y == eval.Scalar:
		return x, true
	case x == eval.List && y == eval.List:
		return eval.List, op != OpDot
	case op == OpDot && x == eval.Vector && y == eval.Vector:
		return eval.Scalar, true
	case op != OpDiv && x == eval.Tensor && (y == eval.Vector || y == eval.Tensor):
		return y, true
	case op == OpDot && x == eval.Vector && y == eval.Tensor:
		return eval.Vector, true
	}
	return 0, false
}

// cyclesToAngle lets a factor 2π turn cycles into radians, so that 2*pi*f*L is
// made with an angular frequency, and radians back into cycles where the whole
// is a frequency or a period: omega/(2*pi) is in Hz, but the 2π below
// omega*mu_0/(2*pi) belongs to the geometry.
func cyclesToAngle(d unit.Dim, pi int) (unit.Dim, int) {
	one := unit.Whole(1)
	for pi > 0 && d[unit.Cycle].Sign() > 0 {
		d[unit.Cycle], d[unit.Angle], pi = d[unit.Cycle].Sub(one), d[unit.Angle].Add(one), pi-1
	}
	for pi < 0 && d[unit.Cycle].Sign() < 0 {
		d[unit.Cycle], d[unit.Angle], pi = d[unit.Cycle].Add(one), d[unit.Angle].Sub(one), pi+1
	}
	switch base := d.Base(); {
	case pi < 0 && base == perTime && d[unit.Angle] == one:
		d[unit.Angle], d[unit.Cycle], pi = unit.Rat{}, one, pi+1
	case pi > 0 && base == seconds && d[unit.Angle] == one.Neg():
		d[unit.Angle], d[unit.Cycle], pi = unit.Rat{}, one.Neg(), pi-1
	}
	return d, pi
}

// perTime and seconds are the dimensions 1/s and s.
var (
	perTime = unit.Dim{unit.Time: unit.Whole(-1)}
	seconds = unit.Dim{unit.Time: unit.Whole(1)}
)

// cross infers x × y.
func (e *elab) cross(b *Binary, x, y typed) typed {
	if x.Shape != eval.Vector || y.Shape != eval.Vector {
		return e.shapeFault(b, x, y, "× needs two vectors; write * for a plain product")
	}
	t := typed{Facts: Facts{Known: true, Shape: eval.Vector, Complex: x.Complex || y.Complex, Dim: x.Dim.Mul(y.Dim)}}
	t.Media, t.kinds, t.plain, t.blind = x.Media, x.kinds, x.plain, x.blind
	t.join(y)
	t.Kind, t.KindBy = crossKind(x, y, t.Dim)
	if t.Dim.Base() == kind.EnergyDensity.Dim().Base() {
		t.Kind, t.KindBy, t.kinds = 0, Unknown, []kind.ID{kind.Torque} // a torque per volume
	}
	t.Qualifier, t.QualBy = productQualifier(OpMul, x, y)
	return e.built(t, b)(eval.Cross(b.ID, x.code, y.code))
}

// unary infers a sign.
func (e *elab) unary(u *Unary) typed {
	t := e.expr(u.X)
	if !t.Known {
		return t
	}
	if u.Op == OpSub {
		if t.Absolute && t.lit == nil {
			t.Absolute = false
		}
		t.code = eval.Neg(u.ID, t.code)
	}
	t.lit = nil
	return t
}

// power infers x ^ y: a dimension wants an exact constant exponent.
func (e *elab) power(b *Binary) typed {
	x, y := e.expr(b.X), e.expr(b.Y)
	if !x.Known || !y.Known {
		return unknown()
	}
	if !y.Dim.IsOne() || y.Shape != eval.Scalar && y.Shape != eval.List {
		e.fault("dimensioned-argument", b.Y, fmt.Sprintf("an exponent is a plain number, not %s", describe(y.Facts)), "divide it by its unit or by a reference value")
		return unknown()
	}
	if x.Shape == eval.Vector || x.Shape == eval.Tensor {
		return e.vectorPower(b, x, y)
	}
	t := typed{Facts: Facts{Known: true, Shape: x.Shape, Complex: x.Complex || y.Complex}, plain: x.plain && y.plain, kinds: x.kinds, blind: x.blind || y.blind}
	t.Media = x.Media
	if shape, ok := sameShape(x.Shape, y.Shape); ok {
		t.Shape = shape
	}
	exp, exact := exactExponent(b.Y)
	switch {
	case exact:
		t.Dim = x.Dim.Pow(exp)
		if n, whole := exp.Int(); whole {
			t.pi = x.pi * n
		}
	case !x.Dim.IsOne():
		e.fault("dimensioned-argument", b.X, fmt.Sprintf("%s cannot have the exponent written here: its unit would not be defined", describe(x.Facts)),
			"divide the base by a reference value, or write the exponent as a fraction in parentheses")
		return unknown()
	}
	t.Kind, t.KindBy = powerKind(x, t.Dim, exp, exact)
	t.Qualifier, t.QualBy = powerQualifier(x, exp, exact)
	return e.built(t, b)(eval.Pow(b.ID, x.code, y.code))
}

// vectorPower allows E^2 for E·E and nothing else.
func (e *elab) vectorPower(b *Binary, x, y typed) typed {
	exp, ok := exactExponent(b.Y)
	if n, whole := exp.Int(); ok && whole && n == 2 && x.Shape == eval.Vector {
		t := e.product(&Binary{Node: b.Node, Op: OpDot, X: b.X, Y: b.X}, x, x)
		t.Qualifier, t.QualBy = powerQualifier(x, exp, true)
		return t
	}
	return e.shapeFault(b, x, y, "only the square of a vector is defined (as its dot product with itself); take |x| first")
}

// exactExponent reads a constant exponent: 2, -1, (1/2), 1.5.
func exactExponent(x Expr) (unit.Rat, bool) {
	r := constantRat(x)
	if r == nil || !r.Num().IsInt64() || !r.Denom().IsInt64() {
		return unit.Rat{}, false
	}
	q := unit.NewRat(r.Num().Int64(), r.Denom().Int64())
	return q, q.Valid()
}

// paren infers a parenthesis, with the unit that may follow a constant one.
func (e *elab) paren(p *Paren) typed {
	t := e.expr(p.X)
	if !t.Known {
		return t
	}
	if p.Unit != nil {
		t = e.withUnit(p, t, p.Unit)
	}
	if p.Spread != nil && t.Known {
		return e.spreadOver(p, t)
	}
	return t
}

// bars infers |x|: the magnitude of a number, vector or phasor.
func (e *elab) bars(b *Bars) typed {
	t := e.expr(b.X)
	if !t.Known {
		return t
	}
	if t.Shape == eval.Tensor {
		e.fault("shape-mix", b, "bars stand for the magnitude of a number or a vector, not of a tensor", "write det(…), trace(…) or a component")
		return unknown()
	}
	if t.Shape == eval.Vector {
		t.Shape = eval.Scalar
	}
	t.Complex, t.Absolute, t.lit = false, false, nil
	return e.built(t, b)(eval.Abs(b.ID, t.code))
}

// triple infers a vector.
func (e *elab) triple(v *Triple) typed {
	var xs [3]typed
	for i, x := range v.X {
		xs[i] = e.expr(x)
	}
	if !xs[0].Known || !xs[1].Known || !xs[2].Known {
		return unknown()
	}
	t := typed{Facts: Facts{Known: true, Shape: eval.Vector}, plain: true}
	for i, x := range xs {
		if x.Shape != eval.Scalar {
			e.fault("shape-mix", v.X[i], "a component of a vector is a number, not "+shapeName(x.Shape), "")
			return unknown()
		}
		if !e.componentUnit(v, xs, i, &t) {
			return unknown()
		}
		t.Complex = t.Complex || x.Complex
		t.join(x)
	}
	t = e.built(t, v)(eval.Triple(v.ID, xs[0].code, xs[1].code, xs[2].code))
	if v.Unit != nil && t.Known {
		return e.withUnit(v, t, v.Unit)
	}
	return t
}

// componentUnit gives the vector the dimension, kind and qualifier of its
// components; a literal 0 fits every dimension.
func (e *elab) componentUnit(v *Triple, xs [3]typed, i int, t *typed) bool {
	x := xs[i]
	if isZero(v.X[i]) {
		return true
	}
	first := true
	for j := 0; j < i; j++ {
		first = first && isZero(v.X[j])
	}
	if first {
		t.Dim, t.Kind, t.KindBy, t.Qualifier, t.QualBy = x.Dim, x.Kind, x.KindBy, x.Qualifier, x.QualBy
		return true
	}
	if !t.Dim.Compatible(x.Dim) {
		e.fault("dimension-mismatch", v.X[i], fmt.Sprintf("the components of a vector have one unit: %s stands beside %s", describe(x.Facts), describe(t.Facts)), "")
		return false
	}
	if x.Qualifier != t.Qualifier {
		t.Qualifier, t.QualBy = kind.Unqualified, Unknown
	}
	return true
}

// isZero reports a literal 0 without a unit.
func isZero(x Expr) bool {
	l, ok := x.(*Literal)
	return ok && l.Unit == nil && l.Num.Value == 0
}
