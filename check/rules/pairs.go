package rules

import (
	"fmt"
	"math"
	"math/big"
	"slices"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file finds pairs of point charges that are written out: q_i·q_j/(4πε·r).

// pairTerm is a term that is the energy of two different charges at a distance.
type pairTerm struct {
	a, b     lang.Factor // the charges, by key
	distance lang.Factor
	weight   *big.Rat // times q·q/(4πε·r)
}

// pairsOf are the pairs that the claim sums.
func (c *claim) pairsOf() []pairTerm {
	var out []pairTerm
	for _, t := range products(c.note.Normal(c.sym, chargesStay)) {
		if one, ok := pairIn(t); ok {
			out = append(out, one)
		}
	}
	return out
}

// chargesStay looks through names, but not through charges, distances and
// properties.
func chargesStay(s *lang.Symbol) bool {
	return !isOf(s.Facts, kind.ElectricCharge) && roleOf(s.Facts) != roleGeometry && roleOf(s.Facts) != roleCapacity
}

func pairIn(t *product) (pairTerm, bool) {
	one := pairTerm{weight: new(big.Rat).Mul(t.coef, big.NewRat(4, 1))}
	charges := t.byRole[roleElectric]
	if t.pi != -1 || len(charges) != 2 || len(t.byRole[roleGeometry]) != 1 || t.degree[roleCapacity] != unit.Whole(-1) && len(t.byRole[roleCapacity]) != 2 {
		return one, false
	}
	one.a, one.b, one.distance = charges[0], charges[1], t.byRole[roleGeometry][0]
	for _, q := range charges {
		if !isOf(q.Facts, kind.ElectricCharge) || q.Exp != unit.Whole(1) {
			return one, false
		}
	}
	return one, one.distance.Exp == unit.Whole(-1) && t.only(roleElectric, roleGeometry, roleCapacity)
}

// pairsTwice reports a pair that stands twice at one distance, with both
// charges in both orders or with the coefficient 2.
func (c *claim) pairsTwice(p *check.Pass) bool {
	ps := c.pairsOf()
	if numbersOf(c.note, c.sym).countsTwo() {
		return false // two equal pairs, as the author wrote them
	}
	for i, a := range ps {
		sum := new(big.Rat).Set(a.weight)
		for _, b := range ps[i+1:] {
			if a.a.Key == b.a.Key && a.b.Key == b.b.Key && c.sameDistance(a.distance, b.distance) {
				sum.Add(sum, b.weight)
			}
		}
		if sum.Cmp(big.NewRat(2, 1)) == 0 {
			f := lang.Fault{
				Message: fmt.Sprintf("%s counts the pair of %s and %s twice", c.sym.Name, factorName(a.a), factorName(a.b)),
				Detail:  "Take each pair once, i < j, or half of the sum over both orders.",
				Related: c.because([]lang.Factor{a.a, a.b}, func(s *lang.Symbol) string { return s.Name }),
			}
			if !c.declared() {
				f.Severity = p.Lowered()
			}
			c.report(p, f)
			return true
		}
	}
	return false
}

// countsTwo reports that a two is written or named that may count equal parts.
func (w numbers) countsTwo() bool {
	return slices.ContainsFunc(w.counts, func(r *big.Rat) bool { return r.Cmp(big.NewRat(2, 1)) == 0 })
}

// sameDistance reports one name, two names of one value, or |a − b| and |b − a|.
func (c *claim) sameDistance(a, b lang.Factor) bool {
	if a.Key == b.Key {
		return true
	}
	x, ok := sizeOf(c.note, a)
	y, ok2 := sizeOf(c.note, b)
	if ok && ok2 {
		return math.Abs(x-y) <= 1e-9*math.Abs(x)
	}
	return a.Symbol == nil && b.Symbol == nil && anagram(a.Key, b.Key)
}

// anagram reports the same characters in another order.
func anagram(a, b string) bool {
	x, y := []rune(a), []rune(b)
	slices.Sort(x)
	slices.Sort(y)
	return slices.Equal(x, y)
}
