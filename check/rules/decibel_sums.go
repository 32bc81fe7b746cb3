package rules

import (
	"fmt"
	"math/big"

	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file looks at levels that were computed with logarithms, and at the way
// back: for rule decibel-basis.

// sumOfLevels finds 10·lg(P₁/P₀) + 10·lg(P₂/P₀), and their mean.
func (l leveller) sumOfLevels(c *claim) {
	form := c.note.Normal(c.sym, atoms)
	if form == nil || len(form.Terms) < 2 {
		return
	}
	var absolute []lang.Term
	for _, t := range form.Terms {
		if t.Coef.Sign() > 0 && absoluteLevel(t) {
			absolute = append(absolute, t)
		}
	}
	if len(absolute) < 2 || len(absolute) != len(form.Terms) {
		return
	}
	f := lang.Fault{
		Message: fmt.Sprintf("%s adds levels over a reference: that multiplies the powers", c.sym.Name),
		Detail:  "Add the powers and take the level of the sum: 10·lg Σ10^(L/10); or write the powers with their unit, `P_1 + P_2 = __ dBm`.",
	}
	sum := new(big.Rat)
	for _, t := range absolute {
		sum.Add(sum, t.Coef)
	}
	if sum.Cmp(big.NewRat(10, 1)) == 0 || sum.Cmp(big.NewRat(20, 1)) == 0 && absolute[0].Coef.Cmp(big.NewRat(10, 1)) != 0 {
		f.Severity = l.p.Lowered()
		f.Message = fmt.Sprintf("%s averages levels: that gives the geometric mean of the powers", c.sym.Name)
		f.Detail = "Take the level of the mean power, unless a standard asks for the mean of the levels."
	}
	c.report(l.p, f)
}

// absoluteLevel reports a multiple of the logarithm of a named quantity over a
// reference that is written out.
func absoluteLevel(t lang.Term) bool {
	if len(t.Factors) != 1 || t.Factors[0].Call != "log10" || t.Factors[0].Exp != unit.Whole(1) {
		return false
	}
	inside, single := t.Factors[0].Inside.Single()
	named, reference := false, false
	for _, f := range inside.Factors {
		w, known := orderOfQuantity(f.Facts)
		named = named || f.Symbol != nil && known && w > 0 && f.Exp.Sign() > 0
		reference = reference || f.Literal && f.Exp.Sign() < 0
	}
	return single && named && reference
}

// back finds a field times 10^(L/10), a power times 10^(L/20).
func (l leveller) back(c *claim) {
	class := c.sym.Facts.Kind.Info().Class
	order, known := orderOfQuantity(c.sym.Facts)
	if !known || order == 0 || class == kind.ClassOther {
		return
	}
	same := false
	divisor := 0.0
	var at lang.Expr
	above(c.x, func(x lang.Expr) {
		f, ok := c.note.FactsOf(c.sym.Stmt, x)
		same = same || ok && f.Known && f.Dim.Compatible(c.sym.Facts.Dim)
		if d := c.divisorOf(x); d != 0 {
			divisor, at = d, x
		}
	})
	var f lang.Fault
	switch {
	case !same:
		return
	case order == 1 && divisor == 10:
		f = lang.Fault{Message: fmt.Sprintf("%s is an amplitude, and 10^(L/10) is a ratio of powers", c.sym.Name), Detail: "Write 10^(L/20), or give the level its unit: `a, field ratio = 6 dB`."}
	case order == 2 && divisor == 20:
		f = lang.Fault{Message: fmt.Sprintf("%s is a power, and 10^(L/20) is a ratio of amplitudes", c.sym.Name), Detail: "Write 10^(L/10), or give the level its unit: `g, power gain = 3 dB`."}
	default:
		return
	}
	f.Span = c.sym.Stmt.Abs(at)
	c.report(l.p, f)
}

// divisorOf reads 10^(L/10) and 10^(L/20), also behind a name; 0 for others.
func (c *claim) divisorOf(x lang.Expr) float64 {
	if n, ok := unparenthesized(x).(*lang.Name); ok {
		s := c.note.Lookup(lang.CanonicalName(n.Text))
		if s == nil || s.Role != lang.RoleQuantity || s.Def == nil || len(s.Def.Members) == 0 {
			return 0
		}
		x = s.Def.Members[0]
	}
	b, ok := unparenthesized(x).(*lang.Binary)
	if !ok || b.Op != lang.OpPow {
		return 0
	}
	ten, ok := unparenthesized(b.X).(*lang.Literal)
	if !ok || ten.Unit != nil || ten.Num.Value != 10 {
		return 0
	}
	exponent := unparenthesized(b.Y)
	if u, ok := exponent.(*lang.Unary); ok {
		exponent = unparenthesized(u.X)
	}
	q, ok := exponent.(*lang.Binary)
	if !ok {
		return 0
	}
	if u, ok := unparenthesized(q.X).(*lang.Unary); ok && q.Op == lang.OpDiv {
		q = &lang.Binary{Node: q.Node, Op: q.Op, X: u.X, Y: q.Y}
	}
	if n, ok := constantOf(q.Y); ok && q.Op == lang.OpDiv && n.dim == (unit.Dim{}) {
		return n.value
	}
	for _, side := range []lang.Expr{q.X, q.Y} {
		if n, ok := constantOf(side); ok && q.Op == lang.OpMul && n.dim == (unit.Dim{}) && n.value != 0 {
			return 1 / n.value
		}
	}
	return 0
}
