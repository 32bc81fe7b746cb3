package rules

import (
	"math"

	"inkjoule/lang"
	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
)

// This file looks at magnetic cores: which permeability a term is made with, to
// which core it belongs, how far that core is driven and how far it is good.

// core is a term that is quadratic in the magnetic field of a core.
type core struct {
	*product
	mu    lang.Factor // the permeability, zero where none is in the term
	hasMu bool
	m     medium // the core's medium
	bound bool   // the core has one
	b     float64
	known bool // the flux density is known
}

// throughStrengths looks through field strengths too, so that a permeability
// cannot hide in `H = B/core.mu`.
func throughStrengths(s *lang.Symbol) bool {
	return atoms(s) || !s.Input && s.Facts.Kind.Is(kind.MagneticFieldStrength) && !s.Facts.Kind.Is(kind.Coercivity)
}

// throughDensities looks through flux densities: `B = mu_0*mu_i*H`.
func throughDensities(s *lang.Symbol) bool {
	return atoms(s) || !s.Input && s.Facts.Kind.Is(kind.MagneticFluxDensity)
}

// magneticExpansions are the ways in which a permeability can be hidden; read only.
var magneticExpansions = []lang.Expand{atoms, throughStrengths, throughDensities}

// isPermeability reports a permeability of a medium, absolute or relative, and
// not the constant of empty space.
func isPermeability(f lang.Factor) bool {
	if f.Symbol != nil && f.Symbol.Role == lang.RoleConstant {
		return false
	}
	return isOf(f.Facts, kind.Permeability) || f.Facts.Kind.Is(kind.RelativePermeability)
}

// coreOf sees a term as the energy of a core, nil for others: a square of flux
// densities and field strengths with nothing but constants, and a permeability
// or a medium that tells the core from a gap.
func (c *claim) coreOf(t *product) *core {
	if t.degree[roleMagnetic] != two || !t.only(roleMagnetic, roleInduction, roleGeometry, roleNumber) || hidesNumbers(t) {
		return nil
	}
	k := &core{product: t}
	for _, f := range t.byRole[roleMagnetic] {
		if !isOf(f.Facts, kind.MagneticFluxDensity) && !isOf(f.Facts, kind.MagneticFieldStrength) || f.Exp.Sign() < 0 || f.Facts.Kind.Is(kind.Coercivity) {
			return nil
		}
	}
	for _, f := range t.byRole[roleInduction] {
		if isPermeability(f) {
			k.mu, k.hasMu = f, true
			k.m, k.bound = c.mediumOfFactor(f)
		}
	}
	if !k.hasMu && len(t.byRole[roleInduction]) > 0 {
		return nil // mu_0 alone: a gap
	}
	for _, f := range t.byRole[roleMagnetic] {
		if !k.bound {
			k.m, k.bound = c.mediumOfFactor(f)
		}
	}
	if !k.hasMu && !k.bound && !c.readOff(t) {
		return nil
	}
	k.b, k.known = c.fluxDensity(k)
	return k
}

// readOff reports an amplitude of a term that is read off a table.
func (c *claim) readOff(t *product) bool {
	for _, f := range t.byRole[roleMagnetic] {
		if f.Symbol == nil || f.Symbol.Def == nil || f.Symbol.Input || len(f.Symbol.Def.Members) == 0 {
			continue
		}
		switch unwrapped(f.Symbol.Def.Members[0]).(type) {
		case *lang.Lookup, *lang.Cell:
			return true
		}
	}
	return false
}

// unwrapped is an expression without the parentheses around it.
func unwrapped(x lang.Expr) lang.Expr {
	for {
		p, ok := x.(*lang.Paren)
		if !ok || p.Unit != nil || p.Spread != nil {
			return x
		}
		x = p.X
	}
}

// hidesNumbers reports functions among the factors that could hide a number.
func hidesNumbers(t *product) bool {
	for _, f := range t.all {
		if opaqueFactor(f) && f.Over == nil {
			return true
		}
	}
	return false
}

// mediumOfFactor is the medium of a property, or the first one of a field.
func (c *claim) mediumOfFactor(f lang.Factor) (medium, bool) {
	keys := f.Facts.Media
	if f.Symbol != nil && f.Symbol.Owner != nil && f.Symbol.Owner.Role == lang.RoleMedium {
		keys = append([]string{f.Symbol.Owner.Key}, keys...)
	}
	for _, key := range keys {
		if m, ok := mediumOf(c.note, key); ok {
			return m, true
		}
	}
	return medium{}, false
}

// fluxDensity is B of a core: written, or the field strength times what stands
// for the permeability.
func (c *claim) fluxDensity(k *core) (b float64, known bool) {
	h := 0.0
	for _, f := range k.byRole[roleMagnetic] {
		x, ok := sizeOf(c.note, f)
		switch {
		case ok && isOf(f.Facts, kind.MagneticFluxDensity):
			return x, true
		case ok:
			h = x
		}
	}
	mu, ok := c.permeability(k)
	return mu * h, ok && h > 0
}

// permeability is the absolute permeability that a term is made with.
func (c *claim) permeability(k *core) (mu float64, known bool) {
	mu = 1
	for _, f := range k.byRole[roleInduction] {
		x, ok := sizeOf(c.note, f)
		if !ok || x == 0 {
			return 0, false
		}
		mu *= math.Pow(x, math.Abs(f.Exp.Float64()))
	}
	return mu, k.hasMu
}

// sizeOfTerm is the magnitude of a term, false where something in it is not
// known.
func (c *claim) sizeOfTerm(t *product) (float64, bool) {
	x, _ := t.coef.Float64()
	x *= math.Pow(math.Pi, float64(t.pi)) * math.Pow(2, t.root2.Float64())
	for _, f := range t.all {
		s, ok := sizeOf(c.note, f)
		if !ok {
			return 0, false
		}
		x *= math.Pow(s, f.Exp.Float64())
	}
	return math.Abs(x), true
}

// minorShare is the part of a total below which an error in the core does not
// show: the gap holds nearly all of it.
const minorShare = 0.05

// isMinor reports a term that is small against the rest of the claim.
func (c *claim) isMinor(t *product, of []*product) bool {
	if len(of) < 2 || !c.sym.Result.Known || c.sym.Facts.Shape != eval.Scalar {
		return false
	}
	x, ok := c.sizeOfTerm(t)
	return ok && x < minorShare*math.Abs(c.sym.Value.Re())
}

// limit is the flux density up to which a core is good for a constant
// permeability.
type limit struct {
	b     float64
	of    *lang.Symbol // the knee or the saturation flux density
	knee  bool
	loose bool // nothing in the note ties it to the core
}

// kneeShare is the part of the saturation flux density up to which a curve is
// taken for straight where no knee is stated (common practice).
const kneeShare = 0.7

// limitOf finds the knee of a core: a property of its medium, or a quantity of
// the note that is bound to it; where neither the core nor the quantity has a
// medium, they may belong together.
func (c *claim) limitOf(k *core) (limit, bool) {
	for _, want := range []kind.ID{kind.KneeFluxDensity, kind.SaturationFluxDensity} {
		var found *lang.Symbol
		if k.bound {
			found = c.atCondition(k.m.saturations(c.note, want))
		}
		loose := false
		for _, s := range c.note.Symbols {
			if found != nil || s.Role != lang.RoleQuantity || !s.Facts.Kind.Is(want) || !s.Result.Known {
				continue
			}
			if tied := len(s.Facts.Media) > 0; tied == k.bound && (!tied || s.Facts.Media[0] == k.m.sym.Key) {
				found, loose = s, !tied
			}
		}
		if b, ok := magnitude(found); ok {
			l := limit{b: b, of: found, knee: want == kind.KneeFluxDensity, loose: loose}
			if !l.knee {
				l.b *= kneeShare
			}
			return l, true
		}
	}
	return limit{}, false
}

// saturations are the properties of a kind; the standard name B_sat counts as
// the saturation flux density whatever kind its line declares.
func (m medium) saturations(n *lang.Note, k kind.ID) []*lang.Symbol {
	var out []*lang.Symbol
	for _, d := range m.tree.Properties {
		name := lang.CanonicalName(d.Name.Text)
		s := n.Lookup(m.sym.Key + "." + name)
		if s == nil || !s.Result.Known || s.Facts.Shape != eval.Scalar {
			continue
		}
		if s.Facts.Kind.Is(k) || k == kind.SaturationFluxDensity && name == lang.CanonicalName("B_sat") {
			out = append(out, s)
		}
	}
	return out
}

// atCondition picks the value that is stated for the note's conditions, else
// the first.
func (c *claim) atCondition(list []*lang.Symbol) *lang.Symbol {
	for _, s := range list {
		for _, v := range s.Valid {
			at := c.note.Lookup(v.Key)
			if at == nil || !at.Result.Known || at.Facts.Shape != eval.Scalar {
				continue
			}
			if x := at.Value.Re(); x >= v.Low && x <= v.High {
				return s
			}
		}
	}
	if len(list) > 0 {
		return list[0]
	}
	return nil
}

// permeabilityCovers reports a permeability that is stated for a range of flux
// densities or field strengths which reaches from zero to the core's.
func (c *claim) permeabilityCovers(k *core) (covered, ranged bool) {
	if k.mu.Symbol == nil {
		return false, false
	}
	if v, ok := rangeOver(k.mu.Symbol, kind.MagneticFluxDensity); ok {
		return k.known && covers(v, k.b), true
	}
	if v, ok := rangeOver(k.mu.Symbol, kind.MagneticFieldStrength); ok {
		mu, known := c.permeability(k)
		return k.known && known && covers(v, k.b/mu), true
	}
	return false, false
}
