package unit

import "math"

// Unit is a unit of measurement, read from a phrase by Parse. The zero Unit
// stands for "no unit written": it converts like dimension one, and IsZero
// tells it from a written "1" or "%".
type Unit struct {
	Symbol string  // the phrase as written
	Dim    Dim     // of the linear quantity, also for level units
	Factor Factor  // to the coherent SI unit of Dim
	Offset float64 // kelvins added after the factor: 273.15 for °C alone, else 0
	Level  *Level  // not nil: a level unit; Factor is then 1

	mul, div float64 // Factor = mul/div
}

// finish fills the cached floats; ok is false where the factor has left the
// range of float64.
func (u Unit) finish() (Unit, bool) {
	u.mul, u.div = u.Factor.split()
	q := u.mul / u.div
	return u, q > 0 && !math.IsInf(q, 0) && !math.IsInf(u.div, 0)
}

// IsZero reports that no unit was written.
func (u Unit) IsZero() bool { return u.Symbol == "" }

// Affine reports a unit with an offset: °C alone. Differences and tolerances
// in such a unit are taken with Difference.
func (u Unit) Affine() bool { return u.Offset != 0 }

// ByKind reports a level unit (dB, Np) for which the kind of the quantity
// decides between 10 and 20 lg; ToSI and FromSI give NaN for it, and the
// caller uses Level.ToLinear and Level.FromLinear.
func (u Unit) ByKind() bool { return u.Level != nil && u.Level.Field == ByKind }

// ToSI converts a number in u to the coherent SI unit of u.Dim; for a level
// unit, to the linear quantity that the level stands for.
func (u Unit) ToSI(x float64) float64 {
	switch {
	case u.Level != nil:
		return u.Level.toSI(x)
	case u.div == 0:
		return x
	case u.Offset != 0:
		return x*u.mul/u.div + u.Offset
	}
	return x * u.mul / u.div
}

// FromSI is the inverse of ToSI.
func (u Unit) FromSI(x float64) float64 {
	switch {
	case u.Level != nil:
		return u.Level.fromSI(x)
	case u.div == 0:
		return x
	}
	return (x - u.Offset) * u.div / u.mul
}

// Scale is the number of coherent SI units in one u, without the offset of °C.
func (u Unit) Scale() float64 {
	if u.div == 0 {
		return 1
	}
	return u.mul / u.div
}

// Difference returns u for differences, tolerances and compounds: °C becomes a
// kelvin that is still written °C; every other unit is returned as it is.
func (u Unit) Difference() Unit {
	u.Offset = 0
	return u
}

// Coherent reports whether u is a coherent SI unit: factor 1, no offset, no level.
func (u Unit) Coherent() bool {
	return u.Level == nil && u.Offset == 0 && u.Factor.isOne()
}

// String returns the phrase as written.
func (u Unit) String() string { return u.Symbol }
