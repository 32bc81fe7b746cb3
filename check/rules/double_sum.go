package rules

import (
	"fmt"
	"math"
	"strings"

	"inkjoule/lang"
	"inkjoule/lang/unit"
)

// This file judges double sums over charges.

// doubleSum judges a sum in which another one runs over all charges again.
func (e *selfSeeker) doubleSum(outer *lang.Call) {
	i, ok := outer.For[0].Var.(*lang.Name)
	if !ok {
		return
	}
	lang.Walk(outer.Args[0], func(t lang.Tree) bool {
		inner, ok := t.(*lang.Call)
		if !ok || inner.Fn.Text != "sum" || len(inner.For) != 1 || len(inner.Args) != 1 {
			return true
		}
		k, ok := inner.For[0].Var.(*lang.Name)
		if ok && !e.uses(inner.For[0].From, i.Text) && !e.uses(inner.For[0].To, i.Text) {
			e.allPairs(inner, i.Text, k.Text)
		}
		return false
	})
}

// uses reports a name in an expression.
func (e *selfSeeker) uses(x lang.Expr, name string) (found bool) {
	if x == nil {
		return false
	}
	lang.Walk(x, func(t lang.Tree) bool {
		n, ok := t.(*lang.Name)
		found = found || ok && lang.CanonicalName(n.Text) == lang.CanonicalName(name)
		return !found
	})
	return found
}

// allPairs judges the summand of a double sum over all i and all k.
func (e *selfSeeker) allPairs(inner *lang.Call, i, k string) {
	what := ""
	lang.Walk(inner.Args[0], func(t lang.Tree) bool {
		x, ok := t.(lang.Expr)
		if ok && what == "" && e.uses(x, i) && e.uses(x, k) {
			what = e.distance(x, i, k)
		}
		return what == ""
	})
	if what == "" {
		return
	}
	e.report(inner, lang.Fault{
		Message: fmt.Sprintf("%s lets each charge meet itself: for %s = %s the distance is %s", e.sym.Name, k, i, what),
		Detail:  fmt.Sprintf("Take each pair once: `for %s from %s + 1 to …`. The sum over both orders counts every pair twice besides.", k, i),
	})
}

// distance tells what a magnitude becomes for i = k: "0", or the softening
// length that it hides; "" where it is no distance between i and k.
func (e *selfSeeker) distance(x lang.Expr, i, k string) string {
	switch x := x.(type) {
	case *lang.Bars:
		return e.gone(x.X, i, k)
	case *lang.Call:
		switch {
		case len(x.Args) != 1:
		case x.Fn.Text == "abs":
			return e.gone(x.Args[0], i, k)
		case x.Fn.Text == "sqrt":
			return e.softened(x.Args[0], i, k)
		}
	}
	return ""
}

// gone is "0" for a multiple of i − k.
func (e *selfSeeker) gone(x lang.Expr, i, k string) string {
	form := e.note.Within(e.sym, x, lang.Through, i, k)
	if form == nil || len(form.Terms) != 2 {
		return ""
	}
	a, b := form.Terms[0], form.Terms[1]
	if withoutBound(a, i) == withoutBound(b, k) && withoutBound(a, i) != "" || withoutBound(a, k) == withoutBound(b, i) && withoutBound(a, k) != "" {
		return "0"
	}
	return ""
}

// withoutBound is the key of a term that has the variable to the first power,
// without it, its coefficient's magnitude included; "" for another term.
func withoutBound(t lang.Term, variable string) string {
	found := false
	var key strings.Builder
	c, _ := t.Coef.Float64()
	fmt.Fprint(&key, math.Abs(c), "π", t.Pi)
	for _, f := range t.Factors {
		switch {
		case f.Key == "bound "+lang.CanonicalName(variable) && f.Exp == unit.Whole(1):
			found = true
		case isBound(f):
			return ""
		default:
			key.WriteString("·" + f.Key + "^" + f.Exp.String())
		}
	}
	if !found {
		return ""
	}
	return key.String()
}

// softened reads (i − k)²·a² + s²: "0" without the s, the length s where it is
// less than a tenth of a, and "" where it is the distance of two rows.
func (e *selfSeeker) softened(x lang.Expr, i, k string) string {
	form := e.note.Within(e.sym, x, lang.Through, i, k)
	if form == nil {
		return ""
	}
	var rest *lang.Term
	step, squares, product := 0.0, 0, false
	for n, t := range form.Terms {
		powers := map[string]int{}
		for _, f := range t.Factors {
			if isBound(f) {
				powers[f.Key], _ = f.Exp.Int()
			}
		}
		size, known := sizeOfTerm(e.note, t)
		switch a, b := powers["bound "+lang.CanonicalName(i)], powers["bound "+lang.CanonicalName(k)]; {
		case a == 2 && b == 0 || a == 0 && b == 2:
			if !known {
				return ""
			}
			step, squares = size, squares+1
		case a == 1 && b == 1:
			product = true
		case a == 0 && b == 0 && rest == nil && known:
			rest = &form.Terms[n]
		default:
			return ""
		}
	}
	if squares != 2 || !product {
		return ""
	}
	if rest == nil {
		return "0"
	}
	if size, _ := sizeOfTerm(e.note, *rest); size > step/100 {
		return ""
	}
	for _, f := range rest.Factors {
		if f.Symbol != nil {
			return "the softening length " + f.Symbol.Name
		}
	}
	return "a softening length"
}

// sizeOfTerm is the magnitude of a term in SI units, bound variables left out.
func sizeOfTerm(n *lang.Note, t lang.Term) (float64, bool) {
	c, _ := t.Coef.Float64()
	size := math.Abs(c) * math.Pow(math.Pi, float64(t.Pi))
	for _, f := range t.Factors {
		if isBound(f) {
			continue
		}
		x, ok := sizeOf(n, f)
		if !ok {
			return 0, false
		}
		size *= math.Pow(x, float64(f.Exp.Num())/float64(f.Exp.Den()))
	}
	return size, true
}
