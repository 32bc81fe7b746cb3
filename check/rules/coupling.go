package rules

import (
	"math/big"
	"slices"

	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file recognises products of a source and what acts on it: a charge and a
// potential (q·φ, ρ·φ), a current and a linked flux (λ·I), a current density and
// a vector potential (J·A); and tells whose the potential is.

// coupling is one term of a claim.
type coupling struct {
	*product
	claim  *claim
	source lang.Factor // the charge or current
	field  lang.Factor // the potential or flux in which it stands
	many   bool        // it is summed over a list or integrated over space
}

// couplings are the terms of the claim that are products of a source and a
// field, and of geometry and numbers.
func (c *claim) couplings() []*coupling {
	var out []*coupling
	for _, t := range c.view.apart(c.sym) {
		if t.pi != 0 {
			var ok bool
			if t, ok = withoutShell(t); !ok {
				continue
			}
		}
		if g := c.couplingOf(t); g != nil {
			out = append(out, g)
		}
	}
	return out
}

func (c *claim) couplingOf(t *product) *coupling {
	if !t.only(roleElectric, roleMagnetic, roleCurrent, roleOther, roleGeometry, roleNumber) {
		return nil
	}
	for _, call := range t.calls {
		if call != "potential" {
			return nil
		}
	}
	g := &coupling{product: t, claim: c}
	n := 0
	for _, f := range t.all {
		switch {
		case f.Over != nil || roleOf(f.Facts) == roleGeometry || roleOf(f.Facts) == roleNumber:
			g.many = g.many || f.Over != nil || f.Key == "each row" || integrated(t)
			continue
		case f.Exp != unit.Whole(1):
			return nil
		case isSource(f):
			g.source = f
		case isActing(f):
			g.field = f
		default:
			return nil
		}
		n++
	}
	if n != 2 || !matching(g.source, g.field) {
		return nil
	}
	return g
}

// isSource reports a charge, a density of charge, a current or its density.
func isSource(f lang.Factor) bool {
	return isCharge(f) || f.Facts.Kind.Is(kind.AreicElectricCharge) || isOf(f.Facts, kind.ElectricCurrent) || isOf(f.Facts, kind.ElectricCurrentDensity)
}

// isActing reports a potential, a flux or a vector potential.
func isActing(f lang.Factor) bool {
	return isOf(f.Facts, kind.Voltage) || isOf(f.Facts, kind.MagneticFlux) || isOf(f.Facts, kind.MagneticVectorPotential)
}

// matching reports a charge with a potential, a current with a flux, or a
// current density with a vector potential.
func matching(source, field lang.Factor) bool {
	switch {
	case isOf(field.Facts, kind.MagneticFlux):
		return isOf(source.Facts, kind.ElectricCurrent)
	case isOf(field.Facts, kind.MagneticVectorPotential):
		return isOf(source.Facts, kind.ElectricCurrentDensity)
	}
	return isOf(field.Facts, kind.Voltage) && (isCharge(source) || source.Facts.Kind.Is(kind.AreicElectricCharge))
}

// isExternal reports a potential that the note says others make.
func (g *coupling) isExternal() bool { return g.field.Facts.Kind.Is(kind.ExternalPotential) }

// linked reports two quantities of which one is computed from the other.
func linked(n *lang.Note, a, b lang.Factor) bool {
	return makes(n, a, b) || makes(n, b, a)
}

// makes reports whether a is computed from b.
func makes(n *lang.Note, a, b lang.Factor) bool {
	if b.Symbol == nil {
		return false
	}
	if a.Symbol != nil {
		return dependsOn(n, a.Symbol, b.Symbol)
	}
	if a.Call != "potential" || a.Inside == nil {
		return false
	}
	for _, t := range a.Inside.Terms {
		if slices.ContainsFunc(t.Factors, func(f lang.Factor) bool {
			return f.Symbol != nil && (f.Symbol.Key == b.Symbol.Key || dependsOn(n, f.Symbol, b.Symbol))
		}) {
			return true
		}
	}
	return false
}

// self reports that the potential is made by the source itself, or the source
// follows from the potential.
func (g *coupling) self() bool { return linked(g.claim.note, g.field, g.source) }

// shared reports a source and a potential that are computed from one charge (or
// current): a density that is a charge over a volume, and the potential of this
// charge.
func (g *coupling) shared() bool {
	n, field := g.claim.note, g.field.Symbol
	return g.source.Symbol != nil && field != nil && restsOn(n, g.source.Symbol, func(s *lang.Symbol) bool {
		return isSource(lang.Factor{Facts: s.Facts}) && dependsOn(n, field, s)
	})
}

// mutual reports two terms each of which stands in the field of the other.
func (g *coupling) mutual(h *coupling) bool {
	n := g.claim.note
	return g != h && g.source.Key != h.source.Key && g.field.Key != h.field.Key && linked(n, g.field, h.source) && linked(n, h.field, g.source)
}

// ofOthers reports a potential that is made by charges (currents) which are not
// those of the term.
func (g *coupling) ofOthers() bool {
	if g.field.Call == "potential" {
		return !g.self()
	}
	made := func(s *lang.Symbol) bool {
		f := lang.Factor{Facts: s.Facts}
		return isSource(f) && s.Facts.Kind != 0
	}
	return g.field.Symbol != nil && !g.self() && !g.shared() && restsOn(g.claim.note, g.field.Symbol, made)
}

// offHalf tells whether the term is twice the half that a pair takes, counts
// taken out.
func (g *coupling) offHalf() bool {
	k := new(big.Rat).Abs(g.coef)
	return numbersOf(g.claim.note, g.claim.sym).off(k, big.NewRat(1, 2), big.NewRat(2, 1)) != nil
}

// unsuited reports amplitudes whose statistic asks for another coefficient.
func (g *coupling) unsuited() bool {
	for _, f := range []lang.Factor{g.source, g.field} {
		switch statOf(g.claim.note, f) {
		case kind.RMS, kind.Average, kind.PeakToPeak:
			return true
		}
	}
	return false
}
