package rules

import (
	"fmt"
	"slices"
	"strings"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file finds shapes that are computed without a fault and mean something
// else: for rule shape-mix.

// numbersByNature are kinds that have no direction; read only.
var numbersByNature = []kind.ID{
	kind.Energy, kind.Coenergy, kind.EnergyDensity, kind.CoenergyDensity, kind.LineicEnergy, kind.AreicEnergy,
	kind.Power, kind.PowerDensity, kind.SpecificAbsorptionRate, kind.Voltage, kind.ElectricPotential, kind.ElectricCharge, kind.MagneticFlux,
}

// vectorEnergy finds a number by nature that a formula makes a vector.
func vectorEnergy(p *check.Pass, c *claim) {
	if !c.declared() || c.sym.Facts.Shape != eval.Vector || !slices.ContainsFunc(numbersByNature, c.sym.Facts.Kind.Is) {
		return
	}
	if _, list := unparenthesized(c.x).(*lang.Triple); list {
		return // three values in one name
	}
	detail := "Take the dot product `·` where two vectors meet, or declare what the vector is."
	for _, t := range terms(c.note.Normal(c.sym, lang.UpToDeclared)) {
		if t.Cross {
			detail = "The cross product is a torque or a force; the energy is the dot product: write `·`."
		}
	}
	c.report(p, lang.Fault{
		Message: fmt.Sprintf("%s is declared as %s, which has no direction, and its formula gives a vector", c.sym.Name, withArticle(c.sym.Facts.Kind.String())),
		Detail:  detail,
	})
}

// numberTorque finds a torque or a power flux density made with a dot product of
// the two vectors whose cross product it is.
func numberTorque(p *check.Pass, c *claim) {
	k := c.sym.Facts.Kind
	if !c.declared() || c.sym.Facts.Shape != eval.Scalar || !k.Is(kind.Torque) && !k.Is(kind.PowerFluxDensity) {
		return
	}
	lang.Walk(c.x, func(t lang.Tree) bool {
		x, y, ok := dotted(t)
		if !ok || !c.twoVectors(x, y) {
			return true
		}
		right := "E×H"
		if k.Is(kind.Torque) {
			right = "r×F, p×E, m×B"
		}
		c.report(p, lang.Fault{
			Span:    c.sym.Stmt.Abs(t),
			Message: fmt.Sprintf("%s is made with a dot product: %s is the cross product of the two, a vector", c.sym.Name, withArticle(k.String())),
			Detail:  fmt.Sprintf("Write × (%s), and its magnitude or a component where a number is wanted. For parallel vectors it is zero, where the dot product is greatest.", right),
		})
		return false
	})
}

// dotted gives the operands of a dot product.
func dotted(t lang.Tree) (x, y lang.Expr, ok bool) {
	switch t := t.(type) {
	case *lang.Binary:
		return t.X, t.Y, t.Op == lang.OpDot
	case *lang.Call:
		if t.Fn.Text == "dot" && len(t.Args) == 2 {
			return t.Args[0], t.Args[1], true
		}
	}
	return nil, nil, false
}

// twoVectors reports two vectors that have dimensions, and unlike ones: no
// direction, no square.
func (c *claim) twoVectors(x, y lang.Expr) bool {
	fx, ok := c.note.FactsOf(c.sym.Stmt, x)
	fy, ok2 := c.note.FactsOf(c.sym.Stmt, y)
	vector := func(f lang.Facts) bool { return f.Known && f.Shape == eval.Vector && !f.Dim.IsOne() }
	return ok && ok2 && vector(fx) && vector(fy) && !fx.Dim.Compatible(fy.Dim)
}

// sumsOfComponents finds E.x + E.y + E.z, also through names.
func sumsOfComponents(p *check.Pass, s *lang.Stmt) {
	var product lang.Expr // the product in which a sum stands as a factor
	var look func(t lang.Tree, chained bool)
	look = func(t lang.Tree, chained bool) {
		b, ok := t.(*lang.Binary)
		if sum := ok && b.Op == lang.OpAdd; sum && !chained {
			if f, found := componentsAdded(p.Note, s, b, product); found {
				p.Report(f)
			}
			product = nil
		} else if ok && (b.Op == lang.OpMul || b.Op == lang.OpDiv) && product == nil {
			product = b
			defer func() { product = nil }()
		}
		for _, c := range lang.Children(t) {
			_, paren := t.(*lang.Paren)
			look(c, ok && b.Op == lang.OpAdd || paren && chained)
		}
	}
	look(s.Tree, false)
}

// componentsAdded judges one sum, which may stand in a product.
func componentsAdded(n *lang.Note, s *lang.Stmt, b *lang.Binary, product lang.Expr) (lang.Fault, bool) {
	c := componentsOf(n.StatementForm(s, b, scalarsThrough))
	if c == nil || product != nil && normalised(n.StatementForm(s, product, scalarsThrough)) {
		return lang.Fault{}, false
	}
	span := s.Abs(b)
	f := lang.Fault{
		Span:    span,
		Message: fmt.Sprintf("%s adds the components of one vector: that is no magnitude, and changes when the axes are turned", n.Script.Source.Text[span.Start:span.End]),
		Detail:  fmt.Sprintf("Write `|%s|`, or the root of the sum of the squares; for a bound, add the magnitudes `|…|`; for a direction, divide by its length.", c.whole),
	}
	if c.at != nil {
		f.Related = []lang.Related{*c.at}
	}
	return f, true
}

// normalised reports a product with √2 or √3, as a component along a diagonal has.
func normalised(f *lang.Form) bool {
	return f != nil && len(f.Terms) > 0 && slices.ContainsFunc(f.Terms[0].Factors, func(x lang.Factor) bool { return x.Key == "#2" || x.Key == "#3" || x.Key == "#1/2" || x.Key == "#1/3" })
}

// components are those of one vector that a sum adds.
type components struct {
	whole string        // the vector's name
	at    *lang.Related // where the vector is defined
}

// componentsOf takes a form as a sum of unlike components of one vector with one
// coefficient; nil where it is none.
func componentsOf(form *lang.Form) *components {
	if form == nil || len(form.Terms) < 2 || len(form.Terms) > 3 {
		return nil
	}
	var out *components
	set := map[string]bool{}
	for _, t := range form.Terms {
		if len(t.Factors) != 1 || t.Coef.Cmp(form.Terms[0].Coef) != 0 || t.Pi != 0 || t.Factors[0].Exp != unit.Whole(1) || t.Factors[0].Bars {
			return nil
		}
		c, part := partOf(t.Factors[0])
		if c == nil || out != nil && c.whole != out.whole {
			return nil
		}
		out = c
		set[part] = true
	}
	if len(set) != len(form.Terms) || !set["x"] && !set["y"] && !set["z"] {
		return nil
	}
	return out
}

// scalarsThrough looks through names of numbers, so that a component may hide
// in one.
func scalarsThrough(s *lang.Symbol) bool { return s.Facts.Shape == eval.Scalar }

// partOf tells of which vector a factor is which component; nil where it is none.
func partOf(f lang.Factor) (c *components, part string) {
	if f.Symbol == nil || f.Part == "" || f.Facts.Kind != 0 && f.Facts.Kind.Info().Class == kind.ClassOther {
		return nil, ""
	}
	c = &components{whole: f.Symbol.Name}
	if f.Symbol.Path == "" && f.Symbol.Stmt != nil {
		c.at = &lang.Related{Span: f.Symbol.Span, Message: f.Symbol.Name + " is a vector"}
	}
	return c, strings.ToLower(f.Part)
}
