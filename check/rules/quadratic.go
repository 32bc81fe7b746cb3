package rules

import (
	"math"
	"math/big"
	"slices"

	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file recognises products of two amplitudes: stored energies, their
// densities and forces (C·U², ε·E², E·D, Q·U, L·I², B·H, …) and dissipated
// powers and power fluxes (U·I, R·I², σ·E², E·J, E²/Z, …).

// square is a product of two amplitudes.
type square struct {
	*product
	form       kind.Form
	amplitudes []lang.Factor // one with exponent 2, or two with 1
	stat       kind.Qualifier
	known      bool     // the statistic of both amplitudes is known and the same
	inside     *big.Rat // the coefficient with the numbers that stand in names of elements; nil if there are none
	mixed      bool     // they are known and differ
}

// two is the exponent of a square.
var two = unit.Whole(2)

// squareOf recognises a term as a square of the form, or gives nil.
func squareOf(n *lang.Note, p *product, form kind.Form) *square {
	for _, s := range shapes(form) {
		if s.fits(p) {
			own := *p
			own.coef = new(big.Rat).Abs(p.coef)
			q := &square{product: &own, form: form}
			for _, r := range s.amplitudes {
				q.amplitudes = append(q.amplitudes, p.byRole[r]...)
			}
			q.statistics(n)
			q.roundRoots()
			q.lookInside(n)
			return q
		}
	}
	return nil
}

// shape says what a square is made of.
type shape struct {
	amplitudes []role // of which the exponents sum to 2
	links      []role // what may stand beside them
	calls      []string
	frequency  bool // ω may stand beside them
}

var energyShapes = []shape{
	{amplitudes: []role{roleElectric}, links: []role{roleCapacity}, calls: []string{"trace"}},
	{amplitudes: []role{roleMagnetic}, links: []role{roleInduction}},
}

var powerShapes = []shape{
	{amplitudes: []role{roleElectric, roleMagnetic, roleCurrent}, links: []role{roleResistive}, calls: []string{"cos", "sin"}},
	{amplitudes: []role{roleElectric}, links: []role{roleCapacity, roleLoss}, calls: []string{"Im"}, frequency: true},
	{amplitudes: []role{roleMagnetic}, links: []role{roleInduction, roleResistive}, frequency: true},
}

func shapes(form kind.Form) []shape {
	switch form {
	case kind.Dissipation, kind.Flux:
		return powerShapes
	}
	return energyShapes
}

// fits reports whether the product has this shape and nothing else in it.
func (s shape) fits(p *product) bool {
	allowed := slices.Concat(s.amplitudes, s.links, []role{roleGeometry, roleNumber})
	if s.frequency {
		allowed = append(allowed, roleFrequency)
	}
	if !p.only(allowed...) || slices.ContainsFunc(p.calls, func(c string) bool { return !slices.Contains(s.calls, c) }) {
		return false
	}
	degree := unit.Rat{}
	for _, r := range s.amplitudes {
		for _, f := range p.byRole[r] {
			if f.Exp.Sign() < 0 {
				return false
			}
		}
		degree = degree.Add(p.degree[r])
	}
	return degree == two
}

// statistics finds the common qualifier of the amplitudes.
func (q *square) statistics(n *lang.Note) {
	q.known = true
	for i, f := range q.amplitudes {
		stat := statOf(n, f)
		switch {
		case stat == kind.Unqualified:
			q.known = false
		case i > 0 && q.stat != kind.Unqualified && q.stat != stat:
			q.mixed, q.known = true, false
		default:
			q.stat = stat
		}
	}
	if !q.known {
		q.stat = kind.Unqualified
		return
	}
	q.convert()
}

// convert counts a √2 that turns the amplitudes from one statistic into the
// other: (√2·U)² with U rms is the square of a peak value.
func (q *square) convert() {
	if k, whole := q.root2.Int(); whole && k != 0 {
		q.coef.Mul(q.coef, pow2(k))
		q.root2 = unit.Rat{}
	}
}

// roundRoots takes (1.414·U)² for 2·U²: within the digits of 1.414 and 0.707 a
// coefficient is the power of two that it was meant to be.
func (q *square) roundRoots() {
	x, _ := q.coef.Float64()
	if !q.known || x <= 0 || q.coef.Denom().IsInt64() && q.coef.Denom().Int64() < 1000 {
		return
	}
	n := math.Round(math.Log2(x))
	if math.Abs(x/math.Exp2(n)-1) < 5e-4 {
		q.coef = pow2(int(n))
	}
}

// lookInside multiplies the numbers of elements that no kind is declared for
// into a second coefficient: k = L/2 may be half of an inductance, or the half
// of an energy.
func (q *square) lookInside(n *lang.Note) {
	for _, f := range q.all {
		e, whole := f.Exp.Int()
		if f.Symbol == nil || !whole || f.Symbol.Input || f.Facts.KindBy == lang.Declared || isAmplitude(f.Facts) {
			continue
		}
		t, single := n.Normal(f.Symbol, lang.NamesStay).Single()
		if !single || t.Coef.Cmp(big.NewRat(1, 1)) == 0 || t.Coef.Sign() == 0 {
			continue
		}
		if q.inside == nil {
			q.inside = new(big.Rat).Set(q.coef)
		}
		for range e {
			q.inside.Mul(q.inside, t.Coef)
		}
		for range -e {
			q.inside.Quo(q.inside, t.Coef)
		}
	}
}

// off tells by which of the factors the coefficient is off the right one; nil
// if by none of them, or if either reading of the numbers is right.
func (q *square) off(w numbers, right *big.Rat, by ...*big.Rat) *big.Rat {
	if q.inside == nil {
		return w.off(q.coef, right, by...)
	}
	if w.mayBe(q.coef, right) || w.mayBe(q.inside, right) {
		return nil
	}
	if off := w.off(q.inside, right, by...); off != nil {
		return off
	}
	return w.off(q.coef, right, by...)
}

// mayBe reports whether the coefficient can be the right one times a count, in
// either reading.
func (q *square) mayBe(w numbers, right *big.Rat) bool {
	return w.mayBe(q.coef, right) || q.inside != nil && w.mayBe(q.inside, right)
}

// statOf is the statistic of a factor: the declared one, else what follows
// from the definition, with √2 counted between rms and peak.
func statOf(n *lang.Note, f lang.Factor) kind.Qualifier {
	if f.Symbol == nil || f.Facts.QualBy == lang.Declared || f.Facts.Qualifier == kind.Unqualified {
		return f.Facts.Qualifier
	}
	return statOfForm(n, n.Normal(f.Symbol, lang.UpToDeclared), f.Facts.Qualifier)
}

// statOfForm is the statistic of a single product with one amplitude.
func statOfForm(n *lang.Note, form *lang.Form, inferred kind.Qualifier) kind.Qualifier {
	t, single := form.Single()
	if !single {
		return inferred
	}
	p := newProduct(t)
	stat := inferred
	for _, f := range p.all {
		if f.Facts.Kind.Is(kind.CrestFactor) {
			return kind.Unqualified
		}
		if f.Symbol != nil && f.Facts.QualBy == lang.Declared && f.Facts.Qualifier != kind.Unqualified && f.Exp == unit.Whole(1) {
			stat = f.Facts.Qualifier
		}
	}
	half := unit.NewRat(1, 2)
	switch {
	case p.root2 == half && stat == kind.RMS:
		return kind.Peak
	case p.root2 == half.Neg() && stat == kind.Peak:
		return kind.RMS
	case p.root2 != unit.Rat{}:
		return kind.Unqualified
	}
	return statInDigits(t, stat)
}

// statInDigits counts a √2 that is written as 1.414; where a number may be a
// conversion or a scaling, the statistic is not known.
func statInDigits(t lang.Term, stat kind.Qualifier) kind.Qualifier {
	other := kind.Peak
	if stat == kind.Peak {
		other = kind.RMS
	}
	s, ok := scaleOf(t)
	switch {
	case !ok:
		return kind.Unqualified
	case s.value == 1 || !crest(stat, other) && stat != kind.PeakToPeak:
		return stat
	case stat == kind.Peak && s.fits(stat, kind.PeakToPeak), stat != kind.PeakToPeak && s.fits(stat, other):
		return kind.Unqualified
	case stat == kind.PeakToPeak && (s.fits(stat, kind.Peak) || s.fits(stat, kind.RMS)):
		return kind.Unqualified
	}
	return stat
}
