package lang

import (
	"slices"

	"inkjoule/lang/eval"
	"inkjoule/lang/unit"
)

// This file builds the forms of what stands under a bound variable.

// Apart is Normal, of functions too, that also takes integrals over lengths and
// angles and sums apart: what they multiply stands as factors of its own, beside
// one factor for each variable ("d r", "each n"). It tells what an integrand is
// made of, not its value: ∫f·g dx and ∫f dx·∫g dx share no key, but ∫f dx and
// ∫f dx over other bounds do. Functions are looked through where expand says so.
func (n *Note) Apart(s *Symbol, expand Expand) *Form {
	return n.normal(s, way{expand: expand, apart: true}, 0)
}

// Within is Apart of a part of the symbol's definition, under the given bound
// variables.
func (n *Note) Within(s *Symbol, x Expr, expand Expand, variables ...string) *Form {
	c := n.state.cellOf(s)
	if c == nil {
		return nil
	}
	b := &former{n: n, c: c, expand: expand, apart: true}
	b.bindParams(s)
	for _, v := range variables {
		b.bound = append(b.bound, CanonicalName(v))
	}
	return b.form(x)
}

// bindParams makes the parameters of a function's definition atoms.
func (b *former) bindParams(s *Symbol) {
	if s.Def == nil {
		return
	}
	for _, p := range s.Def.Params {
		b.bound = append(b.bound, CanonicalName(p.Text))
	}
}

// binding is the former within something that binds names.
func (b *former) binding(names []string) *former {
	in := *b
	in.bound = slices.Concat(b.bound, names)
	return &in
}

// coordinatesOf are the names that an integrand over a region sees.
func coordinatesOf(r *Symbol) []string {
	if r.Stmt == nil {
		return nil
	}
	if t, ok := r.Stmt.Tree.(*Region); ok && t.Shape != nil {
		return append(regionCoordinates(t.Shape.Fn.Text), "n")
	}
	return nil
}

// boundName is the form of a parameter, a bound variable or a coordinate.
func (b *former) boundName(key string, x *Name) *Form {
	f := b.facts(x)
	if f.Known && f.Shape == eval.Vector && f.Dim.IsOne() {
		return nil // the normal of a surface
	}
	return atom(Factor{Key: "bound " + key, Facts: f})
}

// called is a function of the note that is not looked through.
func (b *former) called(c *Call, s *Symbol) *Form {
	key := s.Key + "("
	for i, a := range c.Args {
		if i > 0 {
			key += "; "
		}
		key += b.form(a).Key()
	}
	facts := b.facts(c)
	if !facts.Known {
		facts = s.Facts
	}
	return atom(Factor{Key: key + ")", Facts: facts, Symbol: s})
}

// overVariables pulls what an integral or a sum multiplies out of it; nil for
// an integral over anything but lengths and angles, whose integrand is no
// product of amplitudes at one time.
func (b *former) overVariables(c *Call) *Form {
	sum := CanonicalName(c.Fn.Text) == "sum"
	var names []string
	element := constant(ratOne)
	for _, r := range c.For {
		n, ok := r.Var.(*Name)
		if !ok {
			return nil
		}
		facts := b.facts(n)
		if !facts.Known || sum && !isCount(facts) || !sum && !b.spatial(r, facts) {
			return nil
		}
		key := "d " + CanonicalName(n.Text)
		if sum {
			key = "each " + CanonicalName(n.Text)
		}
		element = element.mul(atom(Factor{Key: key, Facts: Facts{Known: true, Dim: facts.Dim}}))
		names = append(names, CanonicalName(n.Text))
	}
	return b.binding(names).form(c.Args[0]).mul(element)
}

// isCount reports a plain number.
func isCount(f Facts) bool { return f.Dim == unit.Dim{} && f.Kind == 0 }

// spatial reports a variable of an integral that is a length or an angle, also
// an angle that runs to a multiple of π.
func (b *former) spatial(r *Range, f Facts) bool {
	base := f.Dim.Base()
	base[unit.Length] = unit.Rat{}
	switch {
	case base != unit.Dim{}:
		return false
	case !isCount(f):
		return true
	}
	to, ok := b.form(r.To).Single()
	return ok && to.Pi != 0
}

// overRows pulls what the sum of a list multiplies out of it.
func (b *former) overRows(c *Call) *Form {
	f := b.facts(c.Args[0])
	if !f.Known || f.Shape != eval.List {
		return nil
	}
	return b.form(c.Args[0]).mul(atom(Factor{Key: "each row", Facts: number()}))
}
