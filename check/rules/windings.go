package rules

import (
	"math/big"
	"slices"

	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file reads the energy of coupled windings term by term.

// winding is a term ½·L·I² of an energy.
type winding struct {
	l, i lang.Factor
	coef *big.Rat
}

// crossTerm is a term with the product of two currents.
type crossTerm struct {
	t    *product
	a, b string // keys of the currents
}

// windings are the terms of an energy with one inductance or two currents; ok is
// false where it has others.
func (c *claim) windings() (self []winding, cross []crossTerm, ok bool) {
	for _, t := range products(c.note.Normal(c.sym, throughStores)) {
		is := t.byRole[roleMagnetic]
		if slices.ContainsFunc(is, func(f lang.Factor) bool { return !isOf(f.Facts, kind.ElectricCurrent) || f.Symbol == nil }) ||
			t.pi != 0 || !t.only(roleMagnetic, roleInduction, roleNumber) || t.degree[roleInduction] != unit.Whole(1) {
			return nil, nil, false
		}
		switch {
		case len(is) == 1 && is[0].Exp == two && len(t.byRole[roleInduction]) == 1:
			self = append(self, winding{t.byRole[roleInduction][0], is[0], t.coef})
		case len(is) == 2 && is[0].Exp == unit.Whole(1) && is[1].Exp == unit.Whole(1):
			cross = append(cross, crossTerm{t, is[0].Key, is[1].Key})
		default:
			return nil, nil, false
		}
	}
	return self, cross, true
}

// between is the cross term of two windings.
func between(cross []crossTerm, a, b winding) *crossTerm {
	for i, x := range cross {
		if inOrder(x.a, x.b) == inOrder(a.i.Key, b.i.Key) {
			return &cross[i]
		}
	}
	return nil
}

// inSum reports a cross term that the square of a sum of currents gave: its
// inductance stands on both diagonals.
func (x *crossTerm) inSum(self []winding) bool {
	n := 0
	for _, w := range self {
		if len(x.t.all) == 3 && w.l.Key == x.t.byRole[roleInduction][0].Key && (w.i.Key == x.a || w.i.Key == x.b) {
			n++
		}
	}
	return n == 2
}

// links are the mutual inductances and coupling factors of a note that are not
// zero, with the quantities that each is seen with.
type links struct {
	note *lang.Note
	all  []*lang.Symbol
}

func linksOf(n *lang.Note) links {
	l := links{note: n}
	for _, s := range n.Symbols {
		if s.Role != lang.RoleQuantity || !s.Facts.Kind.Is(kind.MutualInductance) && !s.Facts.Kind.Is(kind.CouplingFactor) {
			continue
		}
		if x, known := magnitude(s); !known || x != 0 {
			l.all = append(l.all, s)
		}
	}
	return l
}

// zero reports a coupling that the note states as zero.
func zeroCoupling(n *lang.Note) bool {
	return slices.ContainsFunc(n.Symbols, func(s *lang.Symbol) bool {
		x, known := magnitude(s)
		return (s.Facts.Kind.Is(kind.MutualInductance) || s.Facts.Kind.Is(kind.CouplingFactor)) && known && x == 0
	})
}

// couples finds what couples two windings: a mutual inductance or coupling
// factor that is tied to both inductances or currents by a formula, or the only
// one of a note; nil for none.
func (l links) couples(a, b winding, alone bool) *lang.Symbol {
	mutual := 0
	for _, m := range l.all {
		if l.tied(m, a.l, b.l) || l.fluxOf(m, a, b) != 0 {
			return m
		}
		if m.Facts.Kind.Is(kind.MutualInductance) {
			mutual++
		}
	}
	if alone && len(l.all) > 0 && mutual <= 1 && (mutual == 1 || len(l.all) == 1) && !l.elsewhere() {
		return l.all[slices.IndexFunc(l.all, func(m *lang.Symbol) bool { return mutual == 0 || m.Facts.Kind.Is(kind.MutualInductance) })]
	}
	return nil
}

// tied reports a coupling that is computed from both inductances, or one from
// which, with both, a coupling factor is computed.
func (l links) tied(m *lang.Symbol, a, b lang.Factor) bool {
	both := func(s *lang.Symbol) bool {
		return a.Symbol != nil && b.Symbol != nil && dependsOn(l.note, s, a.Symbol) && dependsOn(l.note, s, b.Symbol)
	}
	if both(m) {
		return true
	}
	return slices.ContainsFunc(l.all, func(k *lang.Symbol) bool { return dependsOn(l.note, k, m) && both(k) })
}

// elsewhere reports a coupling that a formula ties to inductances: then the
// only one of the note need not be that of other windings.
func (l links) elsewhere() bool {
	return slices.ContainsFunc(l.all, func(k *lang.Symbol) bool {
		return restsOn(l.note, k, func(s *lang.Symbol) bool {
			return isOf(s.Facts, kind.Inductance) && !s.Facts.Kind.Is(kind.MutualInductance)
		})
	})
}

// fluxOf looks for the flux L·I ± M·I′ of the one winding in which the other
// one's current stands; it gives the sign of the mutual term, 0 where there is
// no such flux.
func (l links) fluxOf(m *lang.Symbol, a, b winding) int {
	for _, s := range l.note.Symbols {
		if !isOf(s.Facts, kind.LinkedFlux) || s.Role != lang.RoleQuantity || s.Input {
			continue
		}
		own, sign := 0, 0
		for _, t := range products(l.note.Normal(s, atoms)) {
			is := t.byRole[roleMagnetic]
			if len(is) != 1 || is[0].Exp != unit.Whole(1) {
				continue
			}
			holds := func(key string) bool {
				return slices.ContainsFunc(t.byRole[roleInduction], func(f lang.Factor) bool { return f.Key == key })
			}
			for _, w := range [][2]winding{{a, b}, {b, a}} {
				if is[0].Key == w[0].i.Key && holds(w[0].l.Key) {
					own = t.coef.Sign()
				}
			}
			if holds(m.Key) && (is[0].Key == a.i.Key || is[0].Key == b.i.Key) {
				sign = t.coef.Sign()
			}
		}
		if own != 0 && sign != 0 {
			return own * sign
		}
	}
	return 0
}
