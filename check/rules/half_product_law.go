package rules

import (
	"fmt"
	"math"
	"math/big"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file finds half products of two amplitudes of which the one follows from
// the other by a curve that is not straight, and the part of a curve that is.

// inStraightPart reports a product in which the property is stated as constant
// for a range that reaches from zero to the amplitude.
func (c *claim) inStraightPart(q *square) bool {
	if k := c.coreOf(q.product); k != nil && k.hasMu {
		covered, _ := c.permeabilityCovers(k)
		return covered
	}
	links := append(append([]lang.Factor{}, q.byRole[roleCapacity]...), q.byRole[roleInduction]...)
	for _, f := range q.amplitudes {
		if f.Symbol != nil && !f.Symbol.Input {
			for _, t := range products(c.note.Normal(f.Symbol, lang.NamesStay)) {
				links = append(append(links, t.byRole[roleCapacity]...), t.byRole[roleInduction]...)
			}
		}
	}
	for _, link := range links {
		if link.Symbol != nil && c.coversAmplitude(link.Symbol, q) {
			return true
		}
	}
	return false
}

// coversAmplitude reports a property whose range reaches from zero to an
// amplitude of the same kind.
func (c *claim) coversAmplitude(s *lang.Symbol, q *square) bool {
	for _, v := range s.Valid {
		for _, f := range q.amplitudes {
			if x, ok := sizeOf(c.note, f); ok && v.Unit.Dim.Base() == f.Facts.Dim.Base() && covers(v, x) {
				return true
			}
		}
	}
	return false
}

// halfOfLaw reports half of a product of a flux quantity and its field where
// the one is a bent function of the other.
func (c *claim) halfOfLaw(p *check.Pass) {
	squares, ok := c.squares(kind.StoredEnergy)
	if !ok {
		c.halfOfFunction(p)
		return
	}
	found := numbersOf(c.note, c.sym)
	for _, q := range squares {
		if c.demagnetized(q) || !found.mayBe(q.coef, big.NewRat(1, 2)) && !found.mayBe(q.coef, big.NewRat(1, 4)) {
			continue
		}
		flux, field, ok := pairOf(q)
		if !ok {
			continue
		}
		l := c.lawOf(flux, field)
		if !l.bent {
			l = c.lawOf(field, flux)
		}
		if l.bent {
			c.reportLaw(p, q, l)
			return
		}
	}
}

// halfOfFunction reports half of a field and a bent function of it, written as
// one product: 1/2*E*D(E).
func (c *claim) halfOfFunction(p *check.Pass) {
	if !numbersOf(c.note, c.sym).half {
		return
	}
	factors := productFactors(c.x)
	for _, x := range factors {
		call, ok := x.(*lang.Call)
		if !ok || len(call.Args) != 1 {
			continue
		}
		of, known := c.note.FactsOf(c.sym.Stmt, call)
		fn := calledFunction(c.note, call)
		at, ok := unwrapped(call.Args[0]).(*lang.Name)
		if !known || fn == nil || !ok || len(fn.Def.Params) != 1 || len(fn.Def.Pieces) > 0 {
			continue
		}
		field := c.note.Lookup(lang.CanonicalName(at.Text))
		if field == nil || !arePair(of, field.Facts) || !hasName(factors, field.Key) {
			continue
		}
		if shape := bendOf(c.note.Form(fn, fn.Def.Members[0], lang.NamesStay), fn.Def.Params[0].Text); shape == curveBent || shape == curveAmbiguous {
			c.reportLaw(p, &square{product: &product{}}, followed{of: fn, from: field, by: fn})
			return
		}
	}
}

// arePair reports a flux quantity and its field, in either order.
func arePair(a, b lang.Facts) bool {
	for _, k := range pairs {
		if isOf(a, k.flux) && isOf(b, k.field) || isOf(a, k.field) && isOf(b, k.flux) {
			return true
		}
	}
	return false
}

// hasName reports a name among factors.
func hasName(factors []lang.Expr, key string) bool {
	for _, x := range factors {
		if n, ok := x.(*lang.Name); ok && lang.CanonicalName(n.Text) == key {
			return true
		}
	}
	return false
}

// pairOf gives the two amplitudes of a product of a flux quantity and its field.
func pairOf(q *square) (flux, field *lang.Symbol, ok bool) {
	if len(q.amplitudes) != 2 {
		return nil, nil, false
	}
	a, b := q.amplitudes[0], q.amplitudes[1]
	if a.Symbol == nil || b.Symbol == nil || a.Part != "" || b.Part != "" || a.Exp != unit.Whole(1) || b.Exp != unit.Whole(1) {
		return nil, nil, false
	}
	for _, k := range pairs {
		switch {
		case isOf(a.Facts, k.flux) && isOf(b.Facts, k.field):
			return a.Symbol, b.Symbol, true
		case isOf(b.Facts, k.flux) && isOf(a.Facts, k.field):
			return b.Symbol, a.Symbol, true
		}
	}
	return nil, nil, false
}

// followed tells how one quantity follows from another.
type followed struct {
	bent  bool
	of    *lang.Symbol // what follows
	from  *lang.Symbol // from what
	by    *lang.Symbol // the table or function, nil for a formula
	ratio float64      // of the half product to the energy, 0 where it is not known
}

// lawOf looks at the definition of a for a bent function of b.
func (c *claim) lawOf(a, b *lang.Symbol) followed {
	l := followed{of: a, from: b}
	if a.Def == nil || a.Input || len(a.Def.Members) == 0 || len(a.Def.Params) > 0 {
		return l
	}
	switch x := unwrapped(a.Def.Members[0]).(type) {
	case *lang.Lookup:
		if m, ok := x.X.(*lang.Member); ok {
			c.readLaw(&l, m, lang.CanonicalName(x.Column.Text))
		}
	case *lang.Cell:
		if m, ok := x.X.(*lang.Member); ok {
			c.readLaw(&l, m, "")
		}
	case *lang.Call:
		c.calledLaw(&l, x)
	default:
		shape := bendOf(c.note.Form(a, x, lang.NamesStay), b.Name)
		l.bent = shape == curveBent || shape == curveAmbiguous
	}
	return l
}

// readLaw judges a reading of a table; column is the one that it is read at, ""
// for a cell.
func (c *claim) readLaw(l *followed, m *lang.Member, column string) {
	t, y := columnOwner(c.note, m)
	if t == nil {
		return
	}
	if column == "" {
		columns := c.columnsLike(t, l.from.Facts)
		if len(columns) != 1 {
			return
		}
		column = columns[0]
	}
	at := c.note.Lookup(t.Key + "." + column)
	k, ok := curveOf(c.note, t.Key, column, y)
	x, known := magnitude(l.from)
	top, known2 := magnitude(l.of)
	if at == nil || at.Facts.Dim.Base() != l.from.Facts.Dim.Base() || !ok || !known || !known2 || !k.reaches(0, x) || math.Abs(k.at(x)-top) > 0.05*top {
		return
	}
	l.bent, l.by = !k.proportional(x, straightTolerance), t
	area := k.area(0, x) // over the field it is the coenergy
	if isFlux(l.of.Facts) || isFluxQuantity(l.of.Facts) {
		area = x*top - area
	}
	if area > 0 {
		l.ratio = x * top / 2 / area
	}
}

// calledLaw judges a function of the note, and a charge that is the integral of
// a capacitance that varies.
func (c *claim) calledLaw(l *followed, x *lang.Call) {
	if fn := calledFunction(c.note, x); fn != nil {
		if len(fn.Def.Params) == 1 && len(fn.Def.Pieces) == 0 && len(x.Args) == 1 && mentions(lang.PrintExpr(x.Args[0]), l.from.Name) {
			shape := bendOf(c.note.Form(fn, fn.Def.Members[0], lang.NamesStay), fn.Def.Params[0].Text)
			l.bent, l.by = shape == curveBent || shape == curveAmbiguous, fn
		}
		return
	}
	a := alongOf(c.note, l.of, x)
	if a == nil || a.fn == nil || len(a.fn.Def.Params) != 1 || !isOf(a.y, kind.Capacitance) && !isOf(a.y, kind.Inductance) || !mentions(lang.PrintExpr(x.For[0].To), l.from.Name) {
		return
	}
	l.bent, l.by = bendOf(c.note.Form(a.fn, a.fn.Def.Members[0], lang.NamesStay), a.fn.Def.Params[0].Text) != curveUnknown, a.fn
}

func (c *claim) reportLaw(p *check.Pass, q *square, l followed) {
	how := "by its formula"
	if l.by != nil {
		how = "by " + l.by.Name
	}
	times := ""
	if l.ratio > 0 {
		times = fmt.Sprintf("; half the product is %.3g times the energy", l.ratio)
	}
	f := lang.Fault{
		Message: fmt.Sprintf("%s is half a product of final values, and %s is no multiple of %s (%s)%s", c.sym.Name, l.of.Name, l.from.Name, how, times),
		Detail:  "The energy is the area beside the curve: integrate the field over the flux density, current over flux, voltage over charge.",
		Related: c.because(q.amplitudes, func(s *lang.Symbol) string { return s.Name + " is a final value" }),
	}
	if !c.declared() {
		f.Severity = p.Lowered()
	}
	c.report(p, f)
}
