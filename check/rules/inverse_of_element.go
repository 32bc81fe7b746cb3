package rules

import (
	"fmt"
	"math"
	"strings"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// InverseOfElement finds reciprocals of tensor elements that stand for the
// elements of the inverse tensor.
func (Book) InverseOfElement() check.Rule {
	return check.Rule{
		Name:     "inverse-of-element",
		Severity: lang.Error,
		Title:    "The reciprocal of a tensor element stands for an element of the inverse tensor",
		Sees: "A quantity that is the reciprocal of one element of a tensor (1/ε_zz, 1/σ_xx, 1/n_zz²) and is declared as an impermittivity or resistivity, or stands as an element of a tensor; " +
			"a component of a vector divided by an element, D.z/eps.zz; where the tensor has elements beside the diagonal in the row or column of that index, by value, so that the inverse differs by more than 0.1 %. " +
			"A caution where the kind of the reciprocal is not declared.",
		Silent: "For a tensor that is diagonal in the frame in which it is written; where the field has only the one component, by value, so that dividing by the element is right; " +
			"for reciprocals beside lengths, areas and frequencies (a capacitor whose electrodes fix the field); for elements in roots and quotients.",
		Formula: "(ε⁻¹)_zz = ε_xx/(ε_xx·ε_zz − ε_xz²) in two dimensions: larger than 1/ε_zz wherever ε_xz is not zero. Holding E_x at zero and holding D_x at zero are two experiments.",
		Remedy:  "Invert the tensor: `inv(m.eps).zz`, `E = inv(m.eps)*D`.",
		Source:  "Nye, Physical Properties of Crystals, ch. II and IV (from memory)",
		Wrong: check.Example{Note: `    medium crystal: linear, uniaxial, homogeneous
        eps_r = diag(44, 44, 28)
    eps_w = rotate(crystal.eps_r, (0, 1, 0), 35°)
    b, relative impermittivity = 1/eps_w.zz = 0.03006
`},
		Right: check.Example{Note: `    medium crystal: linear, uniaxial, homogeneous
        eps_r = diag(44, 44, 28)
    eps_w = rotate(crystal.eps_r, (0, 1, 0), 35°)
    b, relative impermittivity = inv(eps_w).zz = 0.03144
`},
		Run: perSymbol(inverseOfElement),
	}
}

// element is one element of a tensor of which the value is known; of an index
// that is squared it is one of n·n, the permittivity.
type element struct {
	f    lang.Factor
	t    [9]float64
	inv  [9]float64
	i, j int
	at   float64 // the element, or its square for an index
}

// throughScalars looks through every scalar name, so that an element cannot
// hide in one.
func throughScalars(s *lang.Symbol) bool { return s.Facts.Shape == eval.Scalar }

func inverseOfElement(p *check.Pass, s *lang.Symbol) {
	form := p.Note.Normal(s, throughScalars)
	if form == nil {
		return
	}
	for _, t := range form.Terms {
		if e, v, ok := dividedVector(t); ok {
			reportDivided(p, s, e, v)
			return
		}
	}
	if e, ok := reciprocal(form); ok {
		reportReciprocal(p, s, s.Def.Members[0], e)
		return
	}
	lang.Walk(s.Def.Members[0], func(t lang.Tree) bool {
		c, ok := t.(*lang.Call)
		if !ok || c.Fn.Text != "diag" && c.Fn.Text != "tensor" && c.Fn.Text != "uniaxial" {
			return true
		}
		for _, a := range c.Args {
			if e, ok := reciprocal(p.Note.Form(s, a, throughScalars)); ok {
				reportReciprocal(p, s, a, e)
			}
		}
		return true
	})
}

// elementOf reads a factor as a tensor's element.
func elementOf(f lang.Factor) (e element, ok bool) {
	if len(f.Part) != 2 || f.Symbol == nil || !f.Symbol.Result.Known || f.Symbol.Facts.Shape != eval.Tensor || f.Symbol.Facts.Complex {
		return e, false
	}
	e.f, e.i, e.j = f, axis(f.Part[0]), axis(f.Part[1])
	if e.i < 0 || e.j < 0 {
		return e, false
	}
	for k := range e.t {
		e.t[k] = f.Symbol.Value.At(k).Re()
	}
	e.at = e.t[3*e.i+e.j]
	if f.Exp == unit.Whole(-2) {
		e.at, e.t = e.at*e.at, squared(e.t)
	}
	e.inv, ok = inverse(e.t)
	return e, ok
}

// inverted is the element of the inverse tensor.
func (e element) inverted() float64 { return e.inv[3*e.i+e.j] }

// squared is T·T.
func squared(t [9]float64) (out [9]float64) {
	for i := range 3 {
		for j := range 3 {
			for k := range 3 {
				out[3*i+j] += t[3*i+k] * t[3*k+j]
			}
		}
	}
	return out
}

// reciprocal reports a form that is the reciprocal of one element and nothing
// else, constants apart, where the inverse tensor has another element there.
func reciprocal(form *lang.Form) (element, bool) {
	t, single := form.Single()
	if !single {
		return element{}, false
	}
	var found element
	count := 0
	for _, f := range t.Factors {
		if f.Symbol != nil && f.Symbol.Role == lang.RoleConstant {
			continue
		}
		e, ok := elementOf(f)
		if !ok || f.Exp != unit.Whole(-1) && !(f.Exp == unit.Whole(-2) && f.Facts.Kind.Is(kind.RefractiveIndex)) {
			return element{}, false
		}
		found, count = e, count+1
	}
	if count != 1 || found.at == 0 {
		return element{}, false
	}
	return found, math.Abs(found.inverted()*found.at-1) > crystalTolerance
}

// dividedVector finds a component of a vector divided by the element of that
// index, where the vector has other components that matter.
func dividedVector(t lang.Term) (e element, v lang.Factor, ok bool) {
	for _, f := range t.Factors {
		if f.Exp.Sign() < 0 {
			if x, is := elementOf(f); is && x.i == x.j && f.Exp == unit.Whole(-1) {
				e, ok = x, true
			}
		}
	}
	if !ok || e.at == 0 {
		return e, v, false
	}
	for _, f := range t.Factors {
		d, known := direction(f.Symbol)
		if len(f.Part) != 1 || axis(f.Part[0]) != e.i || f.Exp.Sign() <= 0 || !known || !isFlux(f.Facts) {
			continue
		}
		whole := 0.0
		for j := range 3 {
			whole += e.inv[3*e.i+j] * d[j]
		}
		if math.Abs(whole*e.at-d[e.i]) > crystalTolerance*math.Abs(d[e.i]) {
			return e, f, true
		}
	}
	return e, v, false
}

// isFlux reports what a permittivity, permeability or conductivity makes of a
// field: D, B, J.
func isFlux(f lang.Facts) bool {
	return isOf(f, kind.ElectricFluxDensity) || isOf(f, kind.MagneticFluxDensity) || isOf(f, kind.ElectricCurrentDensity)
}

// inverse of a tensor; ok is false where it has none.
func inverse(t [9]float64) (out [9]float64, ok bool) {
	minor := func(i, j int) float64 {
		a, b := (i+1)%3, (i+2)%3
		c, d := (j+1)%3, (j+2)%3
		return t[3*a+c]*t[3*b+d] - t[3*a+d]*t[3*b+c]
	}
	det, scale := 0.0, 0.0
	for j := range 3 {
		det += t[j] * minor(0, j)
	}
	for _, x := range t {
		scale = math.Max(scale, math.Abs(x))
	}
	if math.Abs(det) <= 1e-12*scale*scale*scale {
		return out, false
	}
	for i := range 3 {
		for j := range 3 {
			out[3*j+i] = minor(i, j) / det
		}
	}
	return out, true
}

func reportReciprocal(p *check.Pass, s *lang.Symbol, x lang.Expr, e element) {
	tensor := tensorName(e.f)
	f := lang.Fault{
		Span: s.Stmt.Abs(x),
		Message: fmt.Sprintf("the reciprocal of %s.%s is no element of the inverse tensor, since %s has elements beside the diagonal: inv(%s).%s is %.4g times that",
			tensor, e.f.Part, tensor, tensor, e.f.Part, e.inverted()*e.at),
		Detail:  fmt.Sprintf("Invert the tensor: `inv(%s).%s`.", tensor, e.f.Part),
		Related: pointTo(e.f.Symbol, "the tensor"),
	}
	if !declaredInverse(s, x) {
		f.Severity = p.Lowered()
		f.Detail += fmt.Sprintf(" Where the field is kept along %s and the flux density is not, divide the component of that flux density by the element instead.", e.f.Part[:1])
	}
	f.Fix = inverseFix(s, x, e)
	p.Report(f)
}

// declaredInverse reports an expression that is said to be an element of an inverse:
// by its declared kind, or by its place in a tensor.
func declaredInverse(s *lang.Symbol, x lang.Expr) bool {
	if x != s.Def.Members[0] {
		return true
	}
	if s.Facts.KindBy != lang.Declared {
		return false
	}
	for _, k := range []kind.ID{kind.Impermittivity, kind.RelativeImpermittivity, kind.Resistivity, kind.Permittivity, kind.RelativePermittivity, kind.Conductivity} {
		if s.Facts.Kind.Is(k) {
			return true
		}
	}
	return false
}

// tensorName is the tensor of an element as the note writes it.
func tensorName(f lang.Factor) string {
	if f.Symbol.Owner != nil {
		_, field, _ := strings.Cut(strings.TrimSuffix(f.Key, "."+f.Part), ".")
		return f.Symbol.Owner.Name + "." + field
	}
	return f.Symbol.Name
}

// inverseFix rewrites a plain 1/T.zz.
func inverseFix(s *lang.Symbol, x lang.Expr, e element) *lang.Fix {
	b, ok := unwrapped(x).(*lang.Binary)
	if !ok || b.Op != lang.OpDiv {
		return nil
	}
	l, ok := b.X.(*lang.Literal)
	m, ok2 := unwrapped(b.Y).(*lang.Member)
	if !ok || !ok2 || l.Unit != nil || l.Num.Value != 1 || e.f.Exp != unit.Whole(-1) {
		return nil
	}
	return &lang.Fix{Title: "Invert the tensor", Edits: []lang.Edit{{Span: s.Stmt.Abs(x), New: fmt.Sprintf("inv(%s).%s", lang.PrintExpr(m.X), m.Field.Text)}}}
}

func reportDivided(p *check.Pass, s *lang.Symbol, e element, v lang.Factor) {
	tensor := tensorName(e.f)
	p.Report(lang.Fault{
		Span: s.Stmt.Abs(s.Def.Members[0]),
		Message: fmt.Sprintf("%s.%s divided by %s.%s is no component of the field: %s has elements beside the diagonal, and %s has other components",
			v.Symbol.Name, v.Part, tensor, e.f.Part, tensor, v.Symbol.Name),
		Detail:  fmt.Sprintf("Invert the tensor: `(inv(%s)*%s).%s`.", tensor, v.Symbol.Name, v.Part),
		Related: append(pointTo(e.f.Symbol, "the tensor"), pointTo(v.Symbol, "the vector")...),
	})
}
