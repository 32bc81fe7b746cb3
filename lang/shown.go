package lang

import (
	"math"
	"math/cmplx"
	"strconv"
	"strings"

	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file writes values: with the digits that their uncertainty supports,
// else four, in a unit the author chose or one with a prefix that gives 1 to
// 999. What it writes is a stated result in the note's own syntax.

// shownDigits is the number of significant digits where nothing else decides.
const shownDigits = 4

// noise is how small a component is, beside the largest, that nothing but
// rounding has made.
const noise = 1e-15

// formatter writes values in one unit.
type formatter struct {
	unit   unit.Unit
	root   bool // a level unit counts a root-power quantity
	digits int  // significant digits of the largest component
}

// value writes a value with its unit.
func (f formatter) value(v eval.Value) string {
	u := f.unit.Symbol
	s := f.bare(v)
	if u == "" || u == "1" {
		return s
	}
	return s + " " + u
}

// bare writes a value without its unit.
func (f formatter) bare(v eval.Value) string {
	switch v.Shape() {
	case eval.Vector:
		return "(" + f.row(v, 0, 3) + ")"
	case eval.Tensor:
		return f.tensor(v)
	case eval.List:
		return f.list(v)
	}
	return f.scalar(v.C(), !v.IsReal())
}

// in converts a component to the unit.
func (f formatter) in(x float64) float64 {
	if f.unit.ByKind() {
		return f.unit.Level.FromLinear(x, f.root)
	}
	return f.unit.FromSI(x)
}

// scale is the place of the last digit that is written, from the largest
// component, as a power of ten.
func (f formatter) scale(largest float64) int {
	if largest == 0 || math.IsInf(largest, 0) || math.IsNaN(largest) {
		return 0
	}
	return int(math.Floor(math.Log10(largest))) - f.digits + 1
}

func (f formatter) scalar(c complex128, isComplex bool) string {
	re, im := f.in(real(c)), f.in(imag(c))
	if !isComplex {
		return decimal(re, f.scale(math.Abs(re)))
	}
	p := f.scale(max(math.Abs(re), math.Abs(im)))
	sign := "+"
	if im < 0 || math.Signbit(im) {
		sign, im = "-", -im
	}
	return "(" + decimal(re, p) + " " + sign + " " + decimal(im, p) + "*j)"
}

// row writes components from..to of a value, all to the same last digit; a
// component that is zero but for rounding is written 0.
func (f formatter) row(v eval.Value, from, to int) string {
	largest := 0.0
	for i := from; i < to; i++ {
		c := v.At(i).C()
		largest = max(largest, math.Abs(f.in(real(c))), math.Abs(f.in(imag(c))))
	}
	p := f.scale(largest)
	parts := make([]string, 0, to-from)
	for i := from; i < to; i++ {
		c := v.At(i)
		switch {
		case cmplx.Abs(c.C()) <= noise*norm(v):
			parts = append(parts, "0")
		case v.IsReal():
			parts = append(parts, decimal(f.in(c.Re()), p))
		default:
			parts = append(parts, strings.Trim(f.scalar(c.C(), true), "()"))
		}
	}
	return strings.Join(parts, ", ")
}

// tensor writes a diagonal tensor as diag(…), any other as tensor(…).
func (f formatter) tensor(v eval.Value) string {
	for i := range 9 {
		if i%4 != 0 && cmplx.Abs(v.At(i).C()) > noise*norm(v) {
			return "tensor(" + f.row(v, 0, 9) + ")"
		}
	}
	d := eval.CVec(v.At(0).C(), v.At(4).C(), v.At(8).C())
	if v.IsReal() {
		d = eval.Vec(v.At(0).Re(), v.At(4).Re(), v.At(8).Re())
	}
	return "diag(" + f.row(d, 0, 3) + ")"
}

// list writes the first components of a list and how many there are.
func (f formatter) list(v eval.Value) string {
	const most = 6
	n := v.Len()
	parts := make([]string, 0, most+1)
	for i := 0; i < min(n, most); i++ {
		parts = append(parts, f.scalar(v.At(i).C(), !v.IsReal()))
	}
	if n > most {
		parts = append(parts, "… "+strconv.Itoa(n)+" values")
	}
	return "[" + strings.Join(parts, ", ") + "]"
}

// decimal writes x to the digit 10^last, in plain form where that is short.
func decimal(x float64, last int) string {
	if x == 0 || math.IsNaN(x) || math.IsInf(x, 0) {
		return strings.Replace(strconv.FormatFloat(x, 'g', -1, 64), "+Inf", "inf", 1)
	}
	e := int(math.Floor(math.Log10(math.Abs(x))))
	if e < -4 || last > 0 || e > 14 {
		s := strconv.FormatFloat(x, 'e', max(0, e-last), 64)
		mant, exp, _ := strings.Cut(s, "e")
		n, err := strconv.Atoi(exp)
		if err == nil && n >= 0 && n <= 5 && last > 0 {
			return strconv.FormatFloat(x, 'f', 0, 64)
		}
		if err != nil {
			return s
		}
		return mant + "e" + strconv.Itoa(n)
	}
	return strconv.FormatFloat(x, 'f', max(0, -last), 64)
}

// number4 writes a plain number to four digits for a message.
func number4(x float64) string {
	return decimal(x, formatter{digits: shownDigits}.scale(math.Abs(x)))
}

// display decides the unit of the result and writes it.
func (e *elab) display(d *Definition) {
	r, f := &e.c.sym.Result, &e.c.sym.Facts
	if !f.Known || !r.Known {
		return
	}
	r.Unit = e.shownUnit(d)
	root, _ := kind.RootPower(f.Kind)
	fm := formatter{unit: r.Unit, root: root, digits: shownDigits}
	r.Shown = fm.value(r.Value)
	if r.Standard > 0 && f.Shape == eval.Scalar && !f.Complex {
		r.Shown = fm.withUncertainty(r.Value.Re(), r.Standard)
	}
}

// withUncertainty writes "616.3(57) J/m^3": two digits of the standard
// uncertainty and the value to the same last digit (JCGM 100:2008, 7.2.2, 7.2.6).
func (f formatter) withUncertainty(x, u float64) string {
	if f.unit.Level != nil {
		return f.value(eval.Real(x))
	}
	us := u / f.unit.Scale()
	v := f.unit.FromSI(x)
	last := int(math.Floor(math.Log10(us))) - 1
	if math.Abs(v) < us || math.Floor(math.Log10(math.Abs(v)))-float64(last) > 12 {
		return f.value(eval.Real(x))
	}
	s := decimal(v, last)
	mant, exp, has := strings.Cut(s, "e")
	step := math.Pow(10, float64(last))
	count := math.Round(us / step)
	if !has && last > 0 { // written out to the unit: so are the digits of u
		count *= step
	}
	digits := strconv.FormatFloat(count, 'f', 0, 64)
	out := mant + "(" + digits + ")"
	if has {
		out += "e" + exp
	}
	if f.unit.Symbol != "" && f.unit.Symbol != "1" {
		out += " " + f.unit.Symbol
	}
	return out
}

// shownUnit is the unit of the last member, of the input, or one chosen.
func (e *elab) shownUnit(d *Definition) unit.Unit {
	for i := len(d.Members) - 1; i >= 0; i-- {
		if p := unitOf(d.Members[i]); p != nil {
			if r := e.a.readUnit(p.Text); r.err == nil && r.unit.Dim.Compatible(e.c.sym.Facts.Dim) {
				return e.ofDifference(r.unit)
			}
		}
	}
	return chosenUnit(e.c.sym.Facts, e.c.sym.Value)
}

// chosenUnit is the SI unit of the kind with a prefix that gives 1 to 999.
func chosenUnit(f Facts, v eval.Value) unit.Unit {
	u := unit.Coherent(f.Dim)
	if f.Absolute {
		u, _ = unit.Parse("°C")
		return u
	}
	if f.Kind != 0 && f.Kind.Dim().Compatible(f.Dim) {
		u = f.Kind.Unit()
	}
	largest := 0.0
	for i := range v.Len() {
		largest = max(largest, cabs(v.At(i).C()))
	}
	if largest == 0 || f.Dim.IsOne() {
		return u
	}
	return unit.Choose(u, largest)
}

// significantDigits counts the digits that a stated result is written with.
func significantDigits(m Expr) int {
	n := 0
	Walk(m, func(t Tree) bool {
		if l, ok := t.(*Literal); ok {
			n = max(n, digitsOf(l.Num))
		}
		return true
	})
	return max(n, 1)
}

// digitsOf counts a numeral's significant digits.
func digitsOf(n Numeral) int {
	if n.Value == 0 {
		return 1
	}
	return max(1, int(math.Floor(math.Log10(math.Abs(n.Value))))-n.LastDigit+1)
}
