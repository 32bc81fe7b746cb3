package rules

import (
	"math/big"
	"slices"
	"strings"

	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file recognises squares of amplitudes under an integral over a length,
// under a sum and in functions, where the normal form stops.

// squaresWithin is squares of what stands under integrals and sums too.
func (c *claim) squaresWithin(form kind.Form) ([]*square, bool) {
	var out []*square
	for _, p := range c.view.apart(c.sym) {
		p, ok := withoutShell(p)
		if !ok {
			return nil, false
		}
		q := squareOf(c.note, p, form)
		if q == nil || q.pi != 0 || integrated(p) && !slices.ContainsFunc(q.amplitudes, isFieldVector) {
			return nil, false
		}
		out = append(out, q)
	}
	return out, len(out) > 0
}

// isFieldVector reports E, D, B or H: under an integral over space a product of
// charges and potentials may be a work that builds something up.
func isFieldVector(f lang.Factor) bool {
	return isOf(f.Facts, kind.ElectricFieldStrength) || isOf(f.Facts, kind.ElectricFluxDensity) ||
		isOf(f.Facts, kind.MagneticFluxDensity) || isOf(f.Facts, kind.MagneticFieldStrength)
}

// integrated reports a term with an integral over a length or an angle.
func integrated(p *product) bool {
	return slices.ContainsFunc(p.all, func(f lang.Factor) bool { return strings.HasPrefix(f.Key, "d ") })
}

// withoutShell takes the 2π of the area of a cylinder, 2π·r·l, and the 4π of that
// of a sphere, 4π·r², out of the coefficient of an integral over r; ok is false
// where π stands in it otherwise.
func withoutShell(p *product) (out *product, ok bool) {
	if p.pi == 0 {
		return p, true
	}
	for _, f := range p.all {
		name, is := strings.CutPrefix(f.Key, "d ")
		if !is || p.pi != 1 {
			continue
		}
		for _, g := range p.all {
			n, whole := g.Exp.Int()
			if g.Key != "bound "+name || !whole || n != 1 && n != 2 || g.Facts.Dim.Base() != (unit.Dim{unit.Length: unit.Whole(1)}) {
				continue
			}
			own := *p
			own.coef, own.pi = new(big.Rat).Mul(p.coef, pow2(-n)), 0
			return &own, true
		}
	}
	return nil, false
}
