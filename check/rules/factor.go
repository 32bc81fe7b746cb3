package rules

import (
	"math"
	"strconv"
	"strings"

	"inkjoule/lang"
	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// isOf reports a factor of the dimension of a kind, angle and cycle left out.
func isOf(f lang.Facts, k kind.ID) bool { return f.Known && f.Dim.Base() == k.Dim().Base() }

// sizeOf is the magnitude of a factor's quantity in SI units, exponent left
// out: of a name or a property with a value, or of a literal.
func sizeOf(n *lang.Note, f lang.Factor) (float64, bool) {
	switch {
	case f.Symbol != nil && f.Part == "":
		x, ok := magnitude(f.Symbol)
		return x * derivedBy(n, f), ok
	case f.Literal:
		number, _, _ := strings.Cut(f.Key, " ")
		x, err := strconv.ParseFloat(number, 64)
		return math.Abs(x), err == nil
	}
	return 0, false
}

// derivedBy is the constant between a property and the one that it rests on:
// eps_0 or mu_0 between an absolute and a relative constant, else 1.
func derivedBy(n *lang.Note, f lang.Factor) float64 {
	ratio := f.Facts.Dim.Div(f.Symbol.Facts.Dim).Base()
	for _, name := range []string{"eps_0", "mu_0"} {
		s := n.Lookup(name)
		if s == nil {
			continue
		}
		switch d := s.Facts.Dim.Base(); ratio {
		case d:
			return s.Value.Re()
		case unit.Dim{}.Div(d):
			return 1 / s.Value.Re()
		}
	}
	return 1
}

// magnitude is the magnitude of a known number or real vector.
func magnitude(s *lang.Symbol) (float64, bool) {
	if s == nil || !s.Result.Known {
		return 0, false
	}
	switch s.Facts.Shape {
	case eval.Scalar:
		return math.Hypot(s.Value.Re(), s.Value.Im()), true
	case eval.Vector:
		v, ok := direction(s)
		return math.Sqrt(v[0]*v[0] + v[1]*v[1] + v[2]*v[2]), ok
	}
	return 0, false
}

// valueOf is the value of an expression that is a name or a literal.
func valueOf(n *lang.Note, x lang.Expr) (float64, bool) {
	switch x := x.(type) {
	case *lang.Literal:
		return literalSI(x)
	case *lang.Paren:
		if x.Unit == nil {
			return valueOf(n, x.X)
		}
	case *lang.Name:
		if s := n.Lookup(lang.CanonicalName(x.Text)); s != nil && s.Result.Known && s.Facts.Shape == eval.Scalar && !s.Facts.Complex {
			return s.Value.Re(), true
		}
	}
	return 0, false
}

// rangeOver is the first range of a symbol's statement over a quantity of the
// dimension of a kind: `for U from 390 V to 410 V`.
func rangeOver(s *lang.Symbol, k kind.ID) (lang.Validity, bool) {
	for _, v := range s.Valid {
		if v.Unit.Dim.Base() == k.Dim().Base() {
			return v, true
		}
	}
	return lang.Validity{}, false
}

// covers reports a range that reaches from zero to x.
func covers(v lang.Validity, x float64) bool {
	return v.Low <= 1e-9*math.Abs(v.High) && x <= v.High*(1+1e-9)
}

// propertyOf finds a property of a medium by its kind.
func (m medium) propertyOf(n *lang.Note, k kind.ID) *lang.Symbol {
	for _, d := range m.tree.Properties {
		s := n.Lookup(m.sym.Key + "." + lang.CanonicalName(d.Name.Text))
		if s != nil && s.Facts.Kind.Is(k) && s.Result.Known {
			return s
		}
	}
	return nil
}

// magnitudeOf is the magnitude of a complex number.
func magnitudeOf(x complex128) float64 { return math.Hypot(real(x), imag(x)) }
