package rules

import (
	"fmt"
	"slices"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
)

// ShapeMix explains numbers, vectors and tensors that are mixed, and finds the
// mixes that have a value all the same.
func (Book) ShapeMix() check.Rule {
	return check.Rule{
		Name:     "shape-mix",
		Severity: lang.Error,
		Extends:  true,
		Title:    "A number, a vector and a tensor are mixed",
		Sees: "A vector beside a number in a sum, a comparison or a chain of equals; a product of two vectors that says neither · nor ×; the components of a field added instead of its magnitude; " +
			"an energy that a vector formula gives, a torque or a power flux density from a dot product; a vector before an unsymmetric tensor.",
		Silent: "After |…|, ·, × or a component; for the sum of magnitudes |E.x| + |E.y| + |E.z| as a bound; for E^2, which is E·E; for E·eps·E, in which the order changes nothing; " +
			"for a torque or a flux along a direction, T·n; for scalars, whatever their names say.",
		Formula: "|E| = √(E_x² + E_y² + E_z²); w = ½E·D is a number, T = r × F and S = E × H are vectors; (v·ε)_j = Σ v_i ε_ij = (εᵀ·v)_j.",
		Remedy:  "Take the magnitude `|E|`, the dot product `·`, the cross product `×` or a component `E.x`; write the tensor first.",
		Source:  "ISO 80000-2:2019, clause 18 (vectors and tensors) (from memory); Griffiths, Introduction to Electrodynamics, 4th ed., 4.1.3 and 8.1.2 (from memory)",
		Wrong: check.Example{Note: `    E, static electric field strength = (1, 2, 2) kV/m
    E_a, static electric field strength = E.x + E.y + E.z = 5 kV/m
`},
		Right: check.Example{Note: `    E, static electric field strength = (1, 2, 2) kV/m
    E_a, static electric field strength = |E| = 3 kV/m
`},
		Run: shapeMix,
	}
}

func shapeMix(p *check.Pass) error {
	for _, r := range refusals(p, "shape-mix") {
		if f, ok := explainShape(r); ok {
			p.Report(f)
		}
	}
	return perSpot(func(p *check.Pass, s *spot) {
		for _, c := range s.claims {
			vectorEnergy(p, c)
			numberTorque(p, c)
		}
		sumsOfComponents(p, s.stmt)
		unsymmetric(p, s.stmt)
	})(p)
}

// shapeWord names a shape with its article.
func shapeWord(s eval.Shape) string {
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

// explainShape words a finding of the language by what was probably meant.
func explainShape(r refusal) (lang.Fault, bool) {
	if _, ok := r.above(1).(*lang.Relation); ok {
		return unmeasured(r)
	}
	if b, ok := r.marked().(*lang.Binary); ok {
		x, y := r.facts(b.X), r.facts(b.Y)
		switch {
		case !x.Known || !y.Known:
		case b.Op == lang.OpMul && x.Shape == eval.Vector && y.Shape == eval.Vector:
			return whichProduct(r, b), true
		case (b.Op == lang.OpAdd || b.Op == lang.OpSub) && oneVector(x.Shape, y.Shape):
			return numberBesideVector(r, b, x), true
		}
		return lang.Fault{}, false
	}
	if d, ok := r.above(1).(*lang.Definition); ok {
		return statedShape(r, d)
	}
	return lang.Fault{}, false
}

func oneVector(x, y eval.Shape) bool {
	return x == eval.Vector && y == eval.Scalar || x == eval.Scalar && y == eval.Vector
}

// whichProduct explains `*` between two vectors; the declared kind tells which
// product is meant.
func whichProduct(r refusal, b *lang.Binary) lang.Fault {
	x, y := r.text(b.X), r.text(b.Y)
	f := r.explained(
		fmt.Sprintf("%s*%s: a product of two vectors is the number %s·%s or the vector %s×%s", x, y, x, y, x, y),
		"Write · for an energy, a work or a power, × for a torque, a force on a current or a power flux density.")
	op := ""
	switch k := r.declared(); {
	case k == 0:
	case isEnergyKind(k) || k.Is(kind.EnergyDensity) || k.Is(kind.CoenergyDensity) || k.Is(kind.Power) || k.Is(kind.PowerDensity):
		op = "·"
	case k.Is(kind.Torque) || k.Is(kind.PowerFluxDensity):
		op = "×"
	}
	if op != "" && b.OpSpan.Len() > 0 {
		f.Detail = fmt.Sprintf("%s is declared: write `%s%s%s`.", withArticle(r.declared().String()), x, op, y)
		f.Fix = &lang.Fix{Title: "Write " + op, Edits: []lang.Edit{{Span: b.OpSpan.Shift(r.stmt.At), New: op}}}
	}
	return f
}

// declared is the kind that the definition around the finding declares.
func (r refusal) declared() kind.ID {
	d, ok := r.path[0].(*lang.Definition)
	if !ok || d.Kind == nil {
		return 0
	}
	_, k, _ := kind.Parse(d.Kind.Text)
	return k
}

// numberBesideVector explains a sum of a vector and a number.
func numberBesideVector(r refusal, b *lang.Binary, x lang.Facts) lang.Fault {
	v, n := b.X, b.Y
	if x.Shape != eval.Vector {
		v, n = b.Y, b.X
	}
	return r.explained(
		fmt.Sprintf("%s is a vector and %s a number: they have no sum", r.text(v), r.text(n)),
		fmt.Sprintf("Take `|%s|` or a component of it, or give %s its direction: `%s*(1, 0, 0)`.", r.text(v), r.text(n), operand(r.text(n))))
}

// unmeasured explains a vector that is held against a limit.
func unmeasured(r refusal) (lang.Fault, bool) {
	facts, x := r.facts(r.marked()), r.text(r.marked())
	if !facts.Known || facts.Shape != eval.Vector && !(facts.Shape == eval.Scalar && facts.Complex) {
		return lang.Fault{}, false
	}
	what := shapeWord(facts.Shape)
	if facts.Complex {
		what = "a complex number"
		if facts.Shape == eval.Vector {
			what = "a complex vector"
		}
	}
	f := r.explained(fmt.Sprintf("%s is %s, and a limit is a number: only its magnitude can be compared", x, what), fmt.Sprintf("Write `|%s|`.", x))
	f.Fix = &lang.Fix{Title: "Take the magnitude", Edits: []lang.Edit{{Span: f.Span, New: "|" + x + "|"}}}
	return f, true
}

// statedShape explains a result that is stated in another shape.
func statedShape(r refusal, d *lang.Definition) (lang.Fault, bool) {
	if len(d.Members) < 2 || slices.Index(d.Members, asExpr(r.marked())) < 1 {
		return lang.Fault{}, false
	}
	stated, is := r.facts(r.marked()), r.facts(d.Members[0])
	if !stated.Known || !is.Known || !oneVector(stated.Shape, is.Shape) {
		return lang.Fault{}, false
	}
	detail := fmt.Sprintf("State its three components, `= (…, …, …) UNIT`, or define the magnitude: `|%s|`.", r.text(d.Members[0]))
	if stated.Shape == eval.Vector {
		detail = "State one number, or give the formula its direction: `(0, 0, 1)*…`."
	}
	return r.explained(fmt.Sprintf("%s is %s, and is stated as %s", d.Name.Text, shapeWord(is.Shape), shapeWord(stated.Shape)), detail), true
}

func asExpr(t lang.Tree) lang.Expr {
	x, _ := t.(lang.Expr)
	return x
}

// unsymmetric finds a vector before a tensor that is not symmetric, where the
// result is not closed by another vector: it is the transpose that acts.
func unsymmetric(p *check.Pass, s *lang.Stmt) {
	closed := map[lang.Tree]bool{}
	shape := func(x lang.Expr) eval.Shape {
		f, ok := p.Note.FactsOf(s, x)
		if !ok || !f.Known {
			return eval.List
		}
		return f.Shape
	}
	lang.Walk(s.Tree, func(t lang.Tree) bool {
		b, ok := t.(*lang.Binary)
		if !ok || b.Op != lang.OpDot && b.Op != lang.OpMul {
			return true
		}
		if shape(b) == eval.Scalar {
			closed[unparenthesized(b.X)], closed[unparenthesized(b.Y)] = true, true
		}
		if !closed[b] && shape(b.X) == eval.Vector && shape(b.Y) == eval.Tensor && differsFromTranspose(p.Note, s, b.Y) {
			order(p, s, b)
		}
		return true
	})
}

// order reports v·T where T·v is another vector.
func order(p *check.Pass, s *lang.Stmt, b *lang.Binary) {
	text := func(x lang.Expr) string {
		at := s.Abs(x)
		return p.Note.Script.Source.Text[at.Start:at.End]
	}
	p.Report(lang.Fault{
		Span:    s.Abs(b),
		Message: fmt.Sprintf("%s is not symmetric, and stands behind the vector: the transpose acts on %s", text(b.Y), text(b.X)),
		Detail:  fmt.Sprintf("Write the tensor first: `%s*%s`.", operand(text(b.Y)), operand(text(b.X))),
		Fix:     &lang.Fix{Title: "Write the tensor first", Edits: []lang.Edit{{Span: s.Abs(b), New: operand(text(b.Y)) + "*" + operand(text(b.X))}}},
	})
}

// differsFromTranspose reports a name or a property whose value is a tensor that
// is known and unsymmetric, and no rotation: v·R is the turn back.
func differsFromTranspose(n *lang.Note, s *lang.Stmt, x lang.Expr) bool {
	sym := tensorNamed(n, x)
	if sym == nil || !sym.Result.Known || sym.Value.Shape() != eval.Tensor || (framer{note: n}).isRotation(s, x) {
		return false
	}
	for i := range 3 {
		for j := range i {
			if sym.Value.At(3*i+j).C() != sym.Value.At(3*j+i).C() {
				return true
			}
		}
	}
	return false
}

// tensorNamed is the name or the property, or the one that a derived property
// rests on, which is as unsymmetric.
func tensorNamed(n *lang.Note, x lang.Expr) *lang.Symbol {
	switch x := unparenthesized(x).(type) {
	case *lang.Name:
		return n.Lookup(lang.CanonicalName(x.Text))
	case *lang.Member:
		o, ok := x.X.(*lang.Name)
		if !ok {
			return nil
		}
		owner, field := lang.CanonicalName(o.Text), lang.CanonicalName(x.Field.Text)
		if s := n.Lookup(owner + "." + field); s != nil {
			return s
		}
		return n.Lookup(owner + "." + twinProperties[field])
	}
	return nil
}
