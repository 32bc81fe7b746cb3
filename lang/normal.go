package lang

import (
	"math/big"
	"sort"
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
	Coef    *big.Rat
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
	return &Form{Terms: []Term{{Coef: big.NewRat(1, 1), Factors: []Factor{f}}}}
}

// add is f + k·g.
func (f *Form) add(g *Form, k int64) *Form {
	if f == nil || g == nil {
		return nil
	}
	by := map[string]int{}
	out := &Form{}
	put := func(t Term) {
		if i, ok := by[t.key()]; ok {
			o := &out.Terms[i]
			o.Coef = new(big.Rat).Add(o.Coef, t.Coef)
			return
		}
		by[t.key()] = len(out.Terms)
		out.Terms = append(out.Terms, t)
	}
	for _, t := range f.Terms {
		put(t)
	}
	for _, t := range g.Terms {
		t.Coef = new(big.Rat).Mul(t.Coef, big.NewRat(k, 1))
		put(t)
	}
	return out.tidy()
}

// tidy drops terms that cancelled and sorts the rest.
func (f *Form) tidy() *Form {
	kept := f.Terms[:0]
	for _, t := range f.Terms {
		if t.Coef.Sign() != 0 {
			kept = append(kept, t)
		}
	}
	f.Terms = kept
	sort.SliceStable(kept, func(i, j int) bool { return kept[i].key() < kept[j].key() })
	return f
}

// mul is f · g, nil where it would grow beyond the bound.
func (f *Form) mul(g *Form) *Form {
	if f == nil || g == nil || len(f.Terms)*len(g.Terms) > mostTerms {
		return nil
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
	out := Term{Coef: new(big.Rat).Mul(t.Coef, u.Coef), Pi: t.Pi + u.Pi, Cross: t.Cross || u.Cross}
	out.Factors = append(out.Factors, t.Factors...)
	for _, f := range u.Factors {
		out.put(f)
	}
	sort.SliceStable(out.Factors, func(i, j int) bool { return out.Factors[i].Key < out.Factors[j].Key })
	return out
}

// put multiplies a factor in.
func (t *Term) put(f Factor) {
	for i := range t.Factors {
		o := &t.Factors[i]
		if o.Key != f.Key {
			continue
		}
		o.Exp = o.Exp.Add(f.Exp)
		o.Bars, o.Conj, o.Applied = o.Bars || f.Bars, o.Conj || f.Conj, o.Applied || f.Applied
		if o.Exp.IsZero() {
			t.Factors = append(t.Factors[:i], t.Factors[i+1:]...)
		}
		return
	}
	t.Factors = append(t.Factors, f)
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
	out := constant(big.NewRat(1, 1))
	for range k {
		out = out.mul(f)
	}
	return out
}

// pow raises a term; a rational coefficient under a root stays exact as a
// factor "#r".
func (t Term) pow(n unit.Rat) (Term, bool) {
	out := Term{Coef: big.NewRat(1, 1), Cross: t.Cross}
	pi := unit.Whole(t.Pi).Mul(n)
	p, whole := pi.Int()
	if !whole {
		return out, false
	}
	out.Pi = p
	for _, f := range t.Factors {
		f.Exp = f.Exp.Mul(n)
		out.Factors = append(out.Factors, f)
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
	out.put(Factor{Key: "#" + t.Coef.RatString(), Exp: n, Facts: number()})
	sort.SliceStable(out.Factors, func(i, j int) bool { return out.Factors[i].Key < out.Factors[j].Key })
	return out, true
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
