package lang

import (
	"maps"
	"math/big"
	"slices"
	"strconv"
	"strings"

	"inkjoule/lang/unit"
)

// This file is the normal form: a sum of products of powers with exact
// rational coefficients and symbolic π. Rules work on it, so that
// 0.5*eps*E^2, E*D/2 and eps*(U/d)^2/2 are the same thing however written.

// Form is a sum of terms in canonical order. A nil Form is unknown.
type Form struct{ Terms []Term }

// Term is Coef · π^Pi · Π Factors.
type Term struct {
	Coef    *big.Rat // shared by forms: never changed in place
	Pi      int
	Factors []Factor // sorted by key
	Cross   bool     // a vector product joined two of the factors
}

// Factor is an atom with its exponent. Marks tell how it was spelled; they do
// not enter the key, so E·E, |E|^2 and E·conj(E) have the same form.
type Factor struct {
	Key     string // the name's canonical key, or the canonical text of an opaque part
	Exp     unit.Rat
	Facts   Facts
	Symbol  *Symbol // the name, or the property that a derived one rests on; nil for an opaque part or a literal with a unit
	Part    string  // component of the name that was taken: "x", "zz"; else ""
	Applied bool    // a tensor that was multiplied on a vector
	Bars    bool    // it stood in |…|
	Conj    bool    // it stood in conj(…)
	Literal bool    // a literal with a unit
	Inside  *Form   // of an opaque function's first argument, e.g. of ln(b/a)
	Call    string  // name of the opaque function, e.g. "ln"
	Over    *Symbol // the region of an integral: an extensive factor
}

// mostTerms bounds the growth of a form; a larger one becomes opaque.
const mostTerms = 64

// Single returns the form's only term, if there is exactly one.
func (f *Form) Single() (Term, bool) {
	if f == nil || len(f.Terms) != 1 {
		return Term{}, false
	}
	return f.Terms[0], true
}

// Key is the canonical text of the form: equal keys mean equal forms.
func (f *Form) Key() string {
	if f == nil {
		return "?"
	}
	parts := make([]string, len(f.Terms))
	for i, t := range f.Terms {
		parts[i] = t.Coef.RatString() + "·" + t.key()
	}
	return strings.Join(parts, "+")
}

// key is the term without its coefficient.
func (t Term) key() string {
	var b strings.Builder
	if t.Pi != 0 {
		b.WriteString("π^" + strconv.Itoa(t.Pi))
	}
	for _, f := range t.Factors {
		b.WriteString("·" + f.Key + "^" + f.Exp.String())
	}
	return b.String()
}

// ratOne is the coefficient of most terms; never changed.
var ratOne = big.NewRat(1, 1)

// constant is the form of an exact number.
func constant(r *big.Rat) *Form {
	if r.Sign() == 0 {
		return &Form{}
	}
	return &Form{Terms: []Term{{Coef: r}}}
}

// atom is the form of one factor.
func atom(f Factor) *Form {
	if f.Exp.IsZero() {
		f.Exp = unit.Whole(1)
	}
	return &Form{Terms: []Term{{Coef: ratOne, Factors: []Factor{f}}}}
}

// add is f + k·g.
func (f *Form) add(g *Form, k int64) *Form {
	if f == nil || g == nil {
		return nil
	}
	by := map[string]int{}
	out := &Form{Terms: make([]Term, 0, len(f.Terms)+len(g.Terms))}
	put := func(t Term) {
		key := t.key()
		if i, ok := by[key]; ok {
			o := &out.Terms[i]
			o.Coef = new(big.Rat).Add(o.Coef, t.Coef)
			return
		}
		by[key] = len(out.Terms)
		out.Terms = append(out.Terms, t)
	}
	for _, t := range f.Terms {
		put(t)
	}
	for _, t := range g.Terms {
		if k != 1 {
			t.Coef = new(big.Rat).Mul(t.Coef, big.NewRat(k, 1))
		}
		put(t)
	}
	return out.tidy()
}

// neg is −f.
func (f *Form) neg() *Form {
	if f == nil {
		return nil
	}
	out := &Form{Terms: slices.Clone(f.Terms)}
	for i, t := range out.Terms {
		out.Terms[i].Coef = new(big.Rat).Neg(t.Coef)
	}
	return out
}

// tidy drops terms that cancelled and sorts the rest.
func (f *Form) tidy() *Form {
	f.Terms = slices.DeleteFunc(f.Terms, func(t Term) bool { return t.Coef.Sign() == 0 })
	if len(f.Terms) > 1 {
		keys := make(map[string]Term, len(f.Terms))
		for _, t := range f.Terms {
			keys[t.key()] = t
		}
		for i, k := range slices.Sorted(maps.Keys(keys)) {
			f.Terms[i] = keys[k]
		}
	}
	return f
}

// mul is f · g, nil where it would grow beyond the bound.
func (f *Form) mul(g *Form) *Form {
	if f == nil || g == nil || len(f.Terms)*len(g.Terms) > mostTerms {
		return nil
	}
	if len(f.Terms) == 1 && len(g.Terms) == 1 {
		return &Form{Terms: []Term{f.Terms[0].mul(g.Terms[0])}}
	}
	out := &Form{}
	for _, a := range f.Terms {
		for _, b := range g.Terms {
			out = out.add(&Form{Terms: []Term{a.mul(b)}}, 1)
		}
	}
	return out
}

// mul multiplies two terms, adding the exponents of equal factors.
func (t Term) mul(u Term) Term {
	out := Term{Coef: t.Coef, Pi: t.Pi + u.Pi, Cross: t.Cross || u.Cross}
	switch {
	case t.Coef == ratOne:
		out.Coef = u.Coef
	case u.Coef != ratOne:
		out.Coef = new(big.Rat).Mul(t.Coef, u.Coef)
	}
	out.Factors = make([]Factor, 0, len(t.Factors)+len(u.Factors))
	a, b := t.Factors, u.Factors // both sorted by key
	for len(a) > 0 && len(b) > 0 {
		switch {
		case a[0].Key < b[0].Key:
			out.Factors, a = append(out.Factors, a[0]), a[1:]
		case a[0].Key > b[0].Key:
			out.Factors, b = append(out.Factors, b[0]), b[1:]
		default:
			if f := a[0].joined(&b[0]); !f.Exp.IsZero() {
				out.Factors = append(out.Factors, f)
			}
			a, b = a[1:], b[1:]
		}
	}
	out.Factors = append(append(out.Factors, a...), b...)
	return out
}

// joined is the product of two powers of the same atom.
func (f Factor) joined(g *Factor) Factor {
	f.Exp = f.Exp.Add(g.Exp)
	f.Bars, f.Conj, f.Applied = f.Bars || g.Bars, f.Conj || g.Conj, f.Applied || g.Applied
	return f
}

// pow is f ^ n, nil where that is no sum of products.
func (f *Form) pow(n unit.Rat) *Form {
	t, single := f.Single()
	if single {
		if p, ok := t.pow(n); ok {
			return &Form{Terms: []Term{p}}
		}
		return nil
	}
	k, whole := n.Int()
	if f == nil || !whole || k < 0 || k > 4 {
		return nil
	}
	out := constant(ratOne)
	for range k {
		out = out.mul(f)
	}
	return out
}

// pow raises a term; a rational coefficient under a root stays exact as a
// factor "#r".
func (t Term) pow(n unit.Rat) (Term, bool) {
	out := Term{Coef: ratOne, Cross: t.Cross}
	pi := unit.Whole(t.Pi).Mul(n)
	p, whole := pi.Int()
	out.Factors = slices.Clone(t.Factors)
	for i := range out.Factors {
		out.Factors[i].Exp = out.Factors[i].Exp.Mul(n)
	}
	if out.Pi = p; !whole { // √π, as in 1/√(π·f·µ·σ)
		out.Pi = 0
		out = out.mul(Term{Coef: ratOne, Factors: []Factor{{Key: "#pi", Exp: pi, Facts: number()}}})
	}
	if t.Coef == ratOne {
		return out, true
	}
	if k, whole := n.Int(); whole {
		if k > 64 || k < -64 || t.Coef.Sign() == 0 {
			return out, false
		}
		out.Coef = ratPow(t.Coef, k)
		return out, true
	}
	if t.Coef.Sign() < 0 {
		return out, false
	}
	if root, ok := exactRoot(t.Coef, n); ok {
		out.Coef = root
		return out, true
	}
	root := Factor{Key: "#" + t.Coef.RatString(), Exp: n, Facts: number()}
	return out.mul(Term{Coef: ratOne, Factors: []Factor{root}}), true
}

func ratPow(r *big.Rat, k int) *big.Rat {
	out := big.NewRat(1, 1)
	base := new(big.Rat).Set(r)
	if k < 0 {
		base.Inv(base)
		k = -k
	}
	for range k {
		out.Mul(out, base)
	}
	return out
}

// exactRoot is r^n for a half-integer n where r is the square of a rational.
func exactRoot(r *big.Rat, n unit.Rat) (*big.Rat, bool) {
	if n.Den() != 2 {
		return nil, false
	}
	num, den := new(big.Int).Sqrt(r.Num()), new(big.Int).Sqrt(r.Denom())
	root := new(big.Rat).SetFrac(num, den)
	if new(big.Rat).Mul(root, root).Cmp(r) != 0 {
		return nil, false
	}
	return ratPow(root, int(n.Num())), true
}

// mark applies a spelling mark to every factor.
func (f *Form) mark(set func(*Factor)) *Form {
	if f == nil {
		return nil
	}
	out := &Form{Terms: make([]Term, len(f.Terms))}
	for i, t := range f.Terms {
		t.Factors = append([]Factor(nil), t.Factors...)
		for j := range t.Factors {
			set(&t.Factors[j])
		}
		out.Terms[i] = t
	}
	return out
}
