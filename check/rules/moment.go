package rules

import (
	"math/big"
	"slices"

	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file recognises the energy of a dipole in a field, p·E and m·B, and tells
// whether the moment is there without the field.

// moment is a term that is the energy of a dipole in a field.
type moment struct {
	*product
	claim *claim
	of    lang.Factor // the moment, or the polarizability of α·E²
	field lang.Factor // E or B
	slope bool        // of is a polarizability, and the field stands squared
}

// momentsStay looks through auxiliary names, and not through moments.
func momentsStay(s *lang.Symbol) bool { return atoms(s) && !isMoment(s.Facts) }

func isMoment(f lang.Facts) bool {
	return isOf(f, kind.ElectricDipoleMoment) || isOf(f, kind.MagneticMoment)
}

// moments are the terms of a claim of energy; all is false where it has others.
func (c *claim) moments() (out []*moment, all bool) {
	ps := products(c.note.Apart(c.sym, momentsStay))
	for _, t := range ps {
		if m := c.momentIn(t); m != nil {
			out = append(out, m)
		}
	}
	return out, len(out) == len(ps)
}

func (c *claim) momentIn(t *product) *moment {
	if t.pi != 0 || t.crossed || len(t.calls) > 0 && !slices.Equal(t.calls, []string{"cos"}) {
		return nil
	}
	m := &moment{product: t, claim: c}
	for _, f := range t.all {
		switch {
		case isMoment(f.Facts) && f.Exp == unit.Whole(1) && m.of.Key == "":
			m.of = f
		case isOf(f.Facts, kind.Polarizability) && f.Exp == unit.Whole(1) && m.of.Key == "":
			m.of, m.slope = f, true
		case (isOf(f.Facts, kind.ElectricFieldStrength) || isOf(f.Facts, kind.MagneticFluxDensity)) && m.field.Key == "":
			m.field = f
		case f.Over == nil && roleOf(f.Facts) != roleNumber && roleOf(f.Facts) != roleGeometry:
			return nil
		}
	}
	if m.of.Key == "" || m.field.Key == "" || m.slope != (m.field.Exp == two) || !m.slope && m.field.Exp != unit.Whole(1) {
		return nil
	}
	if m.slope || isOf(m.of.Facts, kind.ElectricDipoleMoment) == isOf(m.field.Facts, kind.ElectricFieldStrength) {
		return m
	}
	return nil
}

// origin tells where a moment comes from.
type origin uint8

const (
	originUnknown   origin = iota // a datum
	originPermanent               // by declaration
	originInduced                 // by declaration, or computed from the field
	originMixed                   // a sum of which a part follows from the field
)

func (m *moment) origin() origin {
	k := m.of.Facts.Kind
	switch {
	case k.Is(kind.PermanentElectricDipoleMoment), k.Is(kind.PermanentMagneticMoment):
		return originPermanent
	case k.Is(kind.InducedElectricDipoleMoment), k.Is(kind.InducedMagneticMoment), m.slope:
		return originInduced
	case m.of.Symbol == nil || !restsOn(m.claim.note, m.of.Symbol, m.induces):
		return originUnknown
	}
	if form := m.claim.note.Normal(m.of.Symbol, lang.Through); form != nil && len(form.Terms) > 1 {
		return originMixed
	}
	return originInduced
}

// induces reports what makes a moment follow the field: the field itself, or a
// polarizability.
func (m *moment) induces(s *lang.Symbol) bool {
	return isOf(s.Facts, kind.Polarizability) || m.field.Symbol != nil && s.Key == m.field.Symbol.Key || isOf(s.Facts, kind.MagneticFieldStrength)
}

// right is the coefficient of an induced moment (table 1.4): 1/2 for one
// instant, 1/4 for the mean of peak values; nil where the statistics do not
// tell it.
func (m *moment) right() *big.Rat {
	to, from := m.claim.stat, statOf(m.claim.note, m.field)
	switch {
	case from == kind.Unqualified && to == kind.Unqualified:
		from, to = kind.Static, kind.Static
	case to == kind.Unqualified:
		to = from
	case from == kind.Unqualified:
		return nil
	}
	num, den, ok := kind.Coefficient(kind.StoredEnergy, from, to)
	if !ok {
		return nil
	}
	return big.NewRat(int64(num), int64(den))
}

// off tells whether the magnitude of the coefficient is that many times the
// right one, counts taken out.
func (m *moment) off(right, by *big.Rat) bool {
	return numbersOf(m.claim.note, m.claim.sym).off(new(big.Rat).Abs(m.coef), right, by) != nil
}

// isEnergyOfField reports a claim of energy (a density too) that a dipole or a
// charge in a field may have.
func (c *claim) isEnergyOfField() bool {
	form, ok := c.form()
	k := c.sym.Facts.Kind
	return ok && form == kind.StoredEnergy && !k.Is(kind.Coenergy) && !k.Is(kind.CoenergyDensity) && (c.declared() || !c.usedElsewhere())
}
