package rules

import (
	"math/big"
	"slices"
	"strings"
	"sync"

	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file takes the terms of a normal form apart into what a physicist sees
// in them: amplitudes of fields, voltages, currents; what links them (C, ε, L,
// µ, R, σ); geometry; frequencies; numbers.

// role is the part that a factor plays in a product.
type role uint8

const (
	roleOther     role = iota
	roleElectric       // E, U, D, Q, charge densities
	roleMagnetic       // B, H, I, Φ, A
	roleCurrent        // J: an amplitude of dissipation
	roleCapacity       // C, ε, ε_r and their inverses
	roleInduction      // L, µ, µ_r and their inverses
	roleResistive      // R, σ, ρ, G, Z
	roleLoss           // tan δ
	roleGeometry       // lengths, areas, volumes, angles, regions
	roleFrequency      // f, ω, times
	roleNumber         // plain numbers, counts
	roleCount          // how many roles there are
)

// dimRoles tells roles by dimension, angle and cycle left out.
var dimRoles = sync.OnceValue(func() map[unit.Dim]role {
	out := map[unit.Dim]role{}
	for _, r := range kindRoles {
		out[r.kind.Dim().Base()] = r.role
	}
	return out
})

// kindRoles tells roles by kinds that have the dimension; read only.
var kindRoles = []struct {
	kind kind.ID
	role role
}{
	{kind.Voltage, roleElectric}, {kind.ElectricFieldStrength, roleElectric}, {kind.ElectricFluxDensity, roleElectric},
	{kind.ElectricCharge, roleElectric}, {kind.LineicElectricCharge, roleElectric}, {kind.VolumicElectricCharge, roleElectric},
	{kind.MagneticFluxDensity, roleMagnetic}, {kind.MagneticFieldStrength, roleMagnetic}, {kind.ElectricCurrent, roleMagnetic},
	{kind.MagneticFlux, roleMagnetic}, {kind.MagneticVectorPotential, roleMagnetic},
	{kind.ElectricCurrentDensity, roleCurrent},
	{kind.Capacitance, roleCapacity}, {kind.Permittivity, roleCapacity},
	{kind.Inductance, roleInduction}, {kind.Permeability, roleInduction}, {kind.Reluctance, roleInduction},
	{kind.Resistance, roleResistive}, {kind.Conductance, roleResistive}, {kind.Resistivity, roleResistive}, {kind.Conductivity, roleResistive},
	{kind.Frequency, roleFrequency}, {kind.Time, roleFrequency},
}

// oneRoles tells roles of the kinds of dimension one; read only.
var oneRoles = []struct {
	kind kind.ID
	role role
}{
	{kind.RelativePermittivity, roleCapacity}, {kind.ElectricSusceptibility, roleCapacity},
	{kind.RelativePermeability, roleInduction}, {kind.MagneticSusceptibility, roleInduction},
	{kind.LossFactor, roleLoss}, {kind.LossIndex, roleLoss},
}

// roleOf tells the role of something by its dimension, and by its kind where
// it has dimension one.
func roleOf(f lang.Facts) role {
	if !f.Known {
		return roleOther
	}
	base := f.Dim.Base()
	if base == (unit.Dim{}) {
		return roleOfOne(f)
	}
	if r, ok := dimRoles()[base]; ok {
		return r
	}
	base[unit.Length] = unit.Rat{}
	if base == (unit.Dim{}) {
		return roleGeometry
	}
	return roleOther
}

func roleOfOne(f lang.Facts) role {
	for _, r := range oneRoles {
		if f.Kind.Is(r.kind) {
			return r.role
		}
	}
	if f.Dim[unit.Angle] != (unit.Rat{}) {
		return roleGeometry
	}
	return roleNumber
}

// atoms is the expansion that the rules use: it looks through auxiliary names
// (a square, a product, a half), and stops at whatever is a quantity by itself:
// a declared kind, an amplitude, an element, a measure.
func atoms(s *lang.Symbol) bool {
	if s.Facts.KindBy == lang.Declared {
		return false
	}
	r := roleOf(s.Facts)
	return r == roleOther || r == roleNumber
}

// product is one term of a normal form, sorted by roles.
type product struct {
	coef    *big.Rat // exact factor, with each 2π·f counted as one ω
	pi      int      // power of π that is left
	root2   unit.Rat // power of 2 under a root: 1/2 for √2
	all     []lang.Factor
	byRole  [roleCount][]lang.Factor
	degree  [roleCount]unit.Rat // sum of the exponents
	calls   []string            // functions in it that could hide a number
	region  bool                // it is integrated over a region
	crossed bool                // a vector product joins two factors
	folded  bool                // a frequency stands with its 2π
}

// products takes a form apart; nil where it is unknown or empty.
func products(f *lang.Form) []*product {
	if f == nil {
		return nil
	}
	out := make([]*product, len(f.Terms))
	for i, t := range f.Terms {
		out[i] = newProduct(withoutInverse(withoutIm(t)))
	}
	return out
}

// withoutIm looks through the imaginary part of a product of phasors, as the
// normal form does through the real part.
func withoutIm(t lang.Term) lang.Term {
	for i, f := range t.Factors {
		inner, single := f.Inside.Single()
		if f.Call != "Im" || f.Exp != unit.Whole(1) || !single || !slices.ContainsFunc(inner.Factors, func(g lang.Factor) bool { return isAmplitude(g.Facts) }) {
			continue
		}
		out := t
		out.Coef = new(big.Rat).Mul(t.Coef, inner.Coef)
		out.Pi += inner.Pi
		out.Factors = slices.Concat(t.Factors[:i], inner.Factors, t.Factors[i+1:])
		return out
	}
	return t
}

// withoutInverse looks through the inverse of a tensor: inv(ε) is ε to the
// power of minus one.
func withoutInverse(t lang.Term) lang.Term {
	for i, f := range t.Factors {
		inner, single := f.Inside.Single()
		if f.Call != "inv" || !single || len(inner.Factors) != 1 || inner.Coef.Cmp(big.NewRat(1, 1)) != 0 || inner.Pi != 0 {
			continue
		}
		g := inner.Factors[0]
		g.Exp, g.Applied = g.Exp.Mul(f.Exp).Neg(), f.Applied
		out := t
		out.Factors = slices.Concat(t.Factors[:i], []lang.Factor{g}, t.Factors[i+1:])
		return out
	}
	return t
}

func newProduct(t lang.Term) *product {
	p := &product{coef: new(big.Rat).Set(t.Coef), pi: t.Pi, crossed: t.Cross}
	for _, f := range t.Factors {
		p.add(f)
	}
	return p
}

func (p *product) add(f lang.Factor) {
	if r, is := rootOf(f); is {
		twos, odd := splitTwos(r)
		p.root2 = p.root2.Add(unit.Whole(twos).Mul(f.Exp))
		if odd.Cmp(big.NewRat(1, 1)) == 0 {
			return
		}
		f.Key = "#" + odd.RatString()
	}
	switch {
	case strings.HasPrefix(f.Key, "along "):
		return // a direction of length one
	case f.Over != nil:
		p.region = true
	}
	r := roleOf(f.Facts)
	if f.Over != nil {
		r = roleGeometry
	}
	if opaqueFactor(f) && r != roleGeometry {
		p.calls = append(p.calls, f.Call)
	}
	p.all = append(p.all, f)
	p.byRole[r] = append(p.byRole[r], f)
	p.degree[r] = p.degree[r].Add(f.Exp)
	if isCycles(f) {
		p.foldFrequency(f)
	}
}

// opaqueFactor reports a factor that could hide a number: a call, or text that
// the normal form could not take apart.
func opaqueFactor(f lang.Factor) bool {
	return f.Call != "" || f.Symbol == nil && !f.Literal && f.Over == nil && f.Key != "j" && !strings.HasPrefix(f.Key, "#") && !isBound(f) && !isElement(f)
}

// isBound reports a parameter, a bound variable or a coordinate.
func isBound(f lang.Factor) bool { return strings.HasPrefix(f.Key, "bound ") }

// isElement reports what stands for the variable of an integral or a sum that
// was taken apart.
func isElement(f lang.Factor) bool {
	return strings.HasPrefix(f.Key, "d ") || strings.HasPrefix(f.Key, "each ")
}

// isCycles reports a factor that counts cycles: a frequency in Hz.
func isCycles(f lang.Factor) bool {
	return f.Facts.Known && f.Facts.Dim[unit.Cycle] == unit.Whole(1) && f.Facts.Dim[unit.Time] == unit.Whole(-1)
}

// foldFrequency counts the 2π that belongs to a frequency, where it is there.
func (p *product) foldFrequency(f lang.Factor) {
	n, whole := f.Exp.Int()
	if !whole || p.pi == 0 || (p.pi > 0) != (n > 0) {
		return
	}
	p.pi -= n
	p.folded = true
	two := big.NewRat(2, 1)
	for ; n > 0; n-- {
		p.coef.Quo(p.coef, two)
	}
	for ; n < 0; n++ {
		p.coef.Mul(p.coef, two)
	}
}

// only reports whether the product has no factors but those of the roles.
func (p *product) only(roles ...role) bool {
	n := 0
	for _, r := range roles {
		n += len(p.byRole[r])
	}
	return n == len(p.all)
}

// is reports whether the exact coefficient is num/den.
func (p *product) is(num, den int64) bool { return p.coef.Cmp(big.NewRat(num, den)) == 0 }
