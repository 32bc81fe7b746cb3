package kind

// This file says how qualifiers combine, as data. All of it holds for
// sinusoidal quantities in linear, nondispersive media (rules, table 1.4). An
// unqualified operand makes an unqualified result and never a conflict.

// pairing is the result of joining two qualifiers, in either order.
type pairing struct{ a, b, result Qualifier }

// products are the qualifiers of a product of two amplitudes. Where the result
// is Unqualified the coefficient decides: half of peak × peak is the peak of an
// energy and the average of a power (see Coefficient). A constant factor
// leaves the other's qualifier.
var products = []pairing{
	{Static, Static, Static},
	{Instantaneous, Instantaneous, Instantaneous},
	{RMS, RMS, Average},
	{Peak, Peak, Unqualified},
	{PeakToPeak, PeakToPeak, Unqualified},
	{Static, Instantaneous, Instantaneous},
	{Static, Peak, Peak},
	{Static, RMS, RMS},
	{Static, PeakToPeak, PeakToPeak},
	{Static, Average, Average},
	{Instantaneous, Peak, Unqualified},
	{Average, Average, Unqualified},
}

// added are the qualifiers of a sum. Static and rms add only as the root of the
// sum of squares, peak and rms not at all.
var added = []pairing{
	{Static, Static, Static},
	{Instantaneous, Instantaneous, Instantaneous},
	{Peak, Peak, Peak},
	{RMS, RMS, RMS},
	{Average, Average, Average},
	{PeakToPeak, PeakToPeak, PeakToPeak},
	{Static, Instantaneous, Instantaneous},
	{Static, Peak, Peak},
	{Static, Average, Average},
	{Instantaneous, Peak, Unqualified},
}

// compared are the unlike qualifiers that may be compared and equated:
// instantaneous with peak, a steady quantity with what it is at every instant.
var compared = []pairing{
	{Instantaneous, Peak, Unqualified},
	{Static, Instantaneous, Unqualified},
	{Static, Peak, Unqualified},
	{Static, Average, Unqualified},
}

func find(list []pairing, a, b Qualifier) (Qualifier, bool) {
	if a == Unqualified || b == Unqualified {
		return Unqualified, true
	}
	for _, p := range list {
		if p.a == a && p.b == b || p.a == b && p.b == a {
			return p.result, true
		}
	}
	return Unqualified, false
}

// Product returns the qualifier of a product of two amplitudes (D·E, U·I); ok
// is false for unlike qualifiers, rms × peak, which is a finding. An
// Unqualified result with ok is one that the coefficient decides.
func Product(a, b Qualifier) (result Qualifier, ok bool) { return find(products, a, b) }

// Add returns the qualifier of a sum or difference; ok is false where the two
// do not add.
func Add(a, b Qualifier) (result Qualifier, ok bool) { return find(added, a, b) }

// Like reports whether two qualifiers may be compared and equated.
func Like(a, b Qualifier) bool {
	_, ok := find(compared, a, b)
	return ok || a == b
}

// conversions hold the squares of the factors between statistics of a sinusoid.
var conversions = []struct {
	from, to Qualifier
	num, den int
}{
	{RMS, Peak, 2, 1},
	{Peak, PeakToPeak, 4, 1},
	{RMS, PeakToPeak, 8, 1},
}

// Conversion returns the square of the factor, num/den, that turns a sinusoidal
// amplitude of one qualifier into the other: 2 from rms to peak, 1/2 back. The
// square is exact where the factor √2 is not.
func Conversion(from, to Qualifier) (num, den int, ok bool) {
	for _, c := range conversions {
		switch {
		case c.from == from && c.to == to:
			return c.num, c.den, true
		case c.from == to && c.to == from:
			return c.den, c.num, true
		}
	}
	return 0, 0, false
}
