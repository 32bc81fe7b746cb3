package unit

import "strings"

// Dim is a dimension: exact rational exponents of the seven SI base
// quantities, with plane angle and cycle tracked beside them. Dims compare
// with ==; whether two quantities may be added is Compatible, which leaves
// angle and cycle out (they never make a dimension error).
type Dim [9]Rat

// Indices of a Dim.
const (
	Length = iota
	Mass
	Time
	Current
	Temperature
	Amount
	Luminosity
	Angle // rad 1, ° 1, sr 2
	Cycle // Hz 1, rpm 1; Bq and 1/s have none
)

// Mul returns the dimension of a product.
func (d Dim) Mul(e Dim) Dim {
	for i, r := range e {
		if r.num|r.den1 != 0 {
			d[i] = d[i].Add(r)
		}
	}
	return d
}

// Div returns the dimension of a quotient.
func (d Dim) Div(e Dim) Dim {
	for i, r := range e {
		if r.num|r.den1 != 0 {
			d[i] = d[i].Sub(r)
		}
	}
	return d
}

// Pow returns the dimension of a power.
func (d Dim) Pow(p Rat) Dim {
	for i, r := range d {
		if r.num|r.den1 != 0 {
			d[i] = r.Mul(p)
		}
	}
	return d
}

// Base returns d without angle and cycle.
func (d Dim) Base() Dim {
	d[Angle], d[Cycle] = Rat{}, Rat{}
	return d
}

// Compatible reports whether quantities of the two dimensions may be added,
// compared and converted: the Bases are equal and no exponent overflowed.
func (d Dim) Compatible(e Dim) bool { return d.Base() == e.Base() && d.Valid() && e.Valid() }

// IsOne reports whether d is dimension one, angle and cycle left out.
func (d Dim) IsOne() bool { return d.Base() == Dim{} }

// Valid reports whether no exponent overflowed.
func (d Dim) Valid() bool {
	for _, r := range d {
		if !r.Valid() {
			return false
		}
	}
	return true
}

// printOrder is the order of symbols in String: kg·m^2/(s^3·A).
var printOrder = [9]struct {
	at     int
	symbol string
}{
	{Mass, "kg"}, {Length, "m"}, {Time, "s"}, {Current, "A"}, {Temperature, "K"},
	{Amount, "mol"}, {Luminosity, "cd"}, {Angle, "rad"}, {Cycle, "cycle"},
}

// String prints d in base units, `kg·m^2/(s^3·A)`, for messages; dimension one
// is "1". Angle and cycle are printed as `rad` and `cycle`.
func (d Dim) String() string {
	var p product
	for _, o := range printOrder {
		p.add(o.symbol, d[o.at])
	}
	return p.String()
}

// product collects symbols with exponents and prints them as a unit phrase.
type product struct{ above, below []string }

// add appends symbol^e to the numerator or, for e < 0, to the denominator.
func (p *product) add(symbol string, e Rat) {
	switch e.Sign() {
	case 1:
		p.above = append(p.above, power(symbol, e))
	case -1:
		p.below = append(p.below, power(symbol, e.Neg()))
	}
}

// power prints symbol^e.
func power(symbol string, e Rat) string {
	if n, ok := e.Int(); ok && n == 1 {
		return symbol
	} else if ok {
		return symbol + "^" + e.String()
	}
	return symbol + "^(" + e.String() + ")"
}

// String prints the phrase. Without a numerator a single symbol gets a
// negative exponent, `m^-1`; several stand under `1/`.
func (p *product) String() string {
	above := strings.Join(p.above, "·")
	switch {
	case len(p.below) == 0 && above == "":
		return "1"
	case len(p.below) == 0:
		return above
	case above == "" && len(p.below) == 1:
		return inverse(p.below[0])
	case above == "":
		above = "1"
	}
	if len(p.below) == 1 {
		return above + "/" + p.below[0]
	}
	return above + "/(" + strings.Join(p.below, "·") + ")"
}

// inverse turns `m` into `m^-1`, `m^2` into `m^-2` and `s^(1/2)` into `s^(-1/2)`.
func inverse(s string) string {
	switch base, e, ok := strings.Cut(s, "^"); {
	case !ok:
		return s + "^-1"
	case strings.HasPrefix(e, "("):
		return base + "^(-" + e[1:]
	default:
		return base + "^-" + e
	}
}
