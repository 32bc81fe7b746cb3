package unit

import "sync"

// readable are coherent units in the spelling that people expect, the
// preferred one of a dimension first. Coherent looks here before it searches.
var readable = [...]string{
	"1", "m", "kg", "s", "A", "K", "mol", "cd", "rad", "sr", "Hz", "N", "J/m^3", "J", "W", "C", "V", "F", "Ω", "S",
	"Wb", "T", "H", "lm", "lx",
	"m^2", "m^3", "m^-1", "m^-2", "m^-3", "s^-1", "s^-2", "m/s", "m/s^2", "rad/s", "rad/s^2", "rad/m",
	"kg/m^3", "kg/m", "kg/m^2", "kg/s", "kg/mol", "N/m", "N/m^3", "Pa·s", "N·s", "J·s",
	"C/m", "C/m^2", "C/m^3", "C·m", "C/kg", "A/m", "A/m^2", "A·m^2", "A/s", "A^2", "A^2·s", "V/m", "V/m^2", "V·m", "V^2", "V/s", "V/K",
	"F/m", "F/m^2", "F^-1", "H/m", "H^-1", "S/m", "Ω·m", "Ω/m", "Wb/m", "Wb·m", "T/m", "T^2", "m^2/(V·s)",
	"J/kg", "J/mol", "J/K", "J/(kg·K)", "J/(m^3·K)", "J/(mol·K)",
	"W/m", "W/m^2", "W/m^3", "W/kg", "W/K", "W/(m·K)", "W/(m^2·K)", "W/sr", "W/(m^2·sr)", "W/(m^2·K^4)",
	"K/W", "K/s", "K/m", "K^-1", "m/K", "m^2/s", "m^3/s", "m·K/W", "m^2·K/W",
	"V/Hz^(1/2)", "A/Hz^(1/2)", "W/Hz", "V^2/Hz", "s^(1/2)", "m^(1/2)",
}

// coherentUnits is readable by dimension, built at its first use.
var coherentUnits = sync.OnceValue(func() map[Dim]Unit {
	m := make(map[Dim]Unit, len(readable))
	for _, s := range readable {
		if u, err := Parse(s); err == nil && m[u.Dim].IsZero() {
			m[u.Dim] = u
		}
	}
	return m
})

// named are the derived units that the search of Coherent may use.
var named = [...]string{"V", "Ω", "T", "Wb", "H", "F", "S", "C", "W", "J", "N", "Pa"}

// Coherent returns the coherent SI unit of a dimension in its most readable
// spelling: J/m^3, V/m, W/(m^2·K), A/m, …, base units where nothing is shorter.
// Angle and cycle that no unit shows are left out: compare Bases, not Dims.
// The zero Unit stands for a dimension that overflowed.
func Coherent(d Dim) Unit {
	if !d.Valid() {
		return Unit{}
	}
	m := coherentUnits()
	if u, ok := m[d]; ok {
		return u
	}
	if u, ok := m[d.Base()]; ok {
		return u
	}
	u, _ := Unit{Symbol: search(d.Base()), Dim: d.Base()}.finish()
	return u
}

// search looks for the shortest phrase of d with at most one named unit, to a
// power of −2 to 2, beside base units.
func search(d Dim) string {
	best, cost := d.String(), length(d)
	for _, s := range named {
		r, _, _ := lookup(s)
		for _, n := range [...]int{1, -1, 2, -2} {
			rest := d.Div(r.dim.Pow(Whole(n)))
			c := length(rest) + 1 + abs(n)
			if n < 0 {
				c++ // S/m^2 reads better than 1/(Ω·m^2)
			}
			if c < cost {
				best, cost = phraseWith(s, n, rest), c
			}
		}
	}
	return best
}

// length measures how hard a product of base units is to read: one for each
// symbol, one for each unit of its exponents, two more for a fraction.
func length(d Dim) int {
	n := 0
	for _, r := range d {
		if r.IsZero() {
			continue
		}
		n += 1 + int((max(r.Num(), -r.Num())+r.Den()-1)/r.Den())
		if r.Den() != 1 {
			n += 2
		}
	}
	return n
}

// phraseWith prints symbol^n times the base units of rest.
func phraseWith(symbol string, n int, rest Dim) string {
	var p product
	p.add(symbol, Whole(n))
	for _, o := range printOrder {
		p.add(o.symbol, rest[o.at])
	}
	return p.String()
}
