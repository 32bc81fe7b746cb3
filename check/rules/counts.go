package rules

import (
	"math/big"

	"inkjoule/lang"
)

// This file keeps numbers that count things (twelve capacitors in parallel)
// apart from numbers that belong to a formula (the half of an energy): the
// normal form multiplies both together.

// numbers is what the text of a definition shows about plain numbers.
type numbers struct {
	counts []*big.Rat // whole numbers from 2 on that a name stands for or that are written beside a half, and decimals that a name stands for
	half   bool       // a half, or a division by 2 or 4, is written
	raised bool       // a number stands under a power, where it counts otherwise
}

// numbersOf reads a definition and the auxiliary names that it goes through.
func numbersOf(n *lang.Note, s *lang.Symbol) numbers {
	r := &numberReader{note: n, seen: map[*lang.Symbol]bool{}}
	r.symbol(s)
	return r.found
}

type numberReader struct {
	note  *lang.Note
	seen  map[*lang.Symbol]bool
	found numbers
}

func (r *numberReader) symbol(s *lang.Symbol) {
	if s == nil || r.seen[s] || s.Def == nil || len(s.Def.Members) == 0 {
		return
	}
	r.seen[s] = true
	lang.Walk(s.Def.Members[0], func(t lang.Tree) bool { return r.node(s, t) })
}

// node looks at one node of the definition of s.
func (r *numberReader) node(s *lang.Symbol, t lang.Tree) bool {
	switch t := t.(type) {
	case *lang.Literal:
		r.literal(t)
	case *lang.Binary:
		if t.Op == lang.OpPow {
			before := len(r.found.counts)
			lang.Walk(t.X, func(u lang.Tree) bool { return r.node(s, u) })
			r.found.raised = r.found.raised || len(r.found.counts) > before
			return false // an exponent is no factor
		}
		if t.Op == lang.OpDiv {
			r.found.half = r.found.half || dividesByEven(t.Y)
			lang.Walk(t.X, func(u lang.Tree) bool { return r.node(s, u) })
			lang.Walk(t.Y, func(u lang.Tree) bool { return r.below(s, u) })
			return false
		}
	case *lang.Name:
		r.name(t)
	case *lang.Call:
		return t.Fn.Text != "sqrt" // what stands under a root counts nothing
	}
	return true
}

// below looks at a node of a divisor: a number that is written there does not
// count parts, a name may.
func (r *numberReader) below(s *lang.Symbol, t lang.Tree) bool {
	if l, ok := t.(*lang.Literal); ok && l.Unit == nil {
		return false
	}
	return r.node(s, t)
}

func (r *numberReader) name(t *lang.Name) {
	s := r.note.Lookup(lang.CanonicalName(t.Text))
	switch {
	case s == nil || s.Role != lang.RoleQuantity || !atoms(s):
	case s.Input:
		if l, ok := s.Def.Members[0].(*lang.Literal); ok && l.Unit == nil {
			r.named(s, l)
		}
	default:
		r.symbol(s)
	}
}

// named looks at a number that a name stands for: a count, or a datum such as
// the imaginary part of a relative permittivity.
func (r *numberReader) named(s *lang.Symbol, l *lang.Literal) {
	t, single := r.note.Normal(s, lang.NamesStay).Single()
	if !single || t.Coef.Sign() <= 0 || t.Coef.IsInt() || t.Coef.Denom().IsInt64() && t.Coef.Denom().Int64() <= 4 {
		r.literal(l)
		return
	}
	r.found.counts = append(r.found.counts, t.Coef)
}

func (r *numberReader) literal(l *lang.Literal) {
	if l.Unit != nil {
		return
	}
	v := new(big.Rat)
	if v.SetFloat64(l.Num.Value) == nil {
		return
	}
	switch {
	case v.Cmp(big.NewRat(1, 2)) == 0 || v.Cmp(big.NewRat(1, 4)) == 0:
		r.found.half = true
	case v.IsInt() && v.Cmp(big.NewRat(2, 1)) >= 0:
		r.found.counts = append(r.found.counts, v)
	}
}

// dividesByEven reports whether a divisor is 2 or 4, or has one as a factor.
func dividesByEven(x lang.Expr) bool {
	switch x := x.(type) {
	case *lang.Literal:
		return x.Unit == nil && (x.Num.Value == 2 || x.Num.Value == 4)
	case *lang.Paren:
		return dividesByEven(x.X)
	case *lang.Binary:
		return x.Op == lang.OpMul && (dividesByEven(x.X) || dividesByEven(x.Y))
	}
	return false
}

// mayBe reports whether the coefficient can be the right one times a count: it
// is right as it stands, or right once whole numbers that are written or named
// are taken out, provided that the half of the formula is written too.
func (w numbers) mayBe(coef, right *big.Rat) bool {
	over := new(big.Rat).Quo(coef, right)
	if over.Cmp(big.NewRat(1, 1)) == 0 {
		return true
	}
	return w.half && w.isCount(over)
}

// mostCounts bounds the products of counts that are tried.
const mostCounts = 6

// isCount reports a number that is a product of some of the counts.
func (w numbers) isCount(x *big.Rat) bool {
	counts := w.counts[:min(len(w.counts), mostCounts)]
	for pick := 1; pick < 1<<len(counts); pick++ {
		product := big.NewRat(1, 1)
		for i, c := range counts {
			if pick&(1<<i) != 0 {
				product.Mul(product, c)
			}
		}
		if x.Cmp(product) == 0 {
			return true
		}
	}
	return false
}

// off tells by which of the given factors the coefficient is off the right one,
// counts taken out; nil if by none of them.
func (w numbers) off(coef, right *big.Rat, by ...*big.Rat) *big.Rat {
	if w.mayBe(coef, right) {
		return nil
	}
	for _, factor := range by {
		rest := new(big.Rat).Quo(new(big.Rat).Quo(coef, right), factor)
		if rest.Cmp(big.NewRat(1, 1)) == 0 || !w.raised && w.isCount(rest) {
			return factor
		}
	}
	return nil
}
