package unit

import (
	"strconv"
	"strings"
	"sync"

	units "github.com/bcicen/go-units"
)

// supplied gives the factors that come from go-units, by symbol. Only units
// whose factors pass the audit against NIST SP 811 stand here (audit_test.go);
// they are taken by their exact names, never found by a user's text. The map
// is built when the first of them is read, about 0.1 ms, and is not changed.
var supplied = sync.OnceValue(func() map[string]Factor {
	return map[string]Factor{
		"in":  fromGoUnits(units.Inch, units.Meter, 0),
		"ft":  fromGoUnits(units.Foot, units.Meter, 0),
		"yd":  fromGoUnits(units.Yard, units.Meter, 0),
		"mi":  fromGoUnits(units.Mile, units.Meter, 0),
		"oz":  fromGoUnits(units.Ounce, units.Gram, -3),
		"lb":  fromGoUnits(units.Pound, units.Gram, -3),
		"Å":   fromGoUnits(units.Angstrom, units.Meter, 0),
		"cal": fromGoUnits(units.Calorie, units.Joule, 0),
	}
})

// fromGoUnits returns the factor from one unit to another as the decimal that
// go-units' float64 stands for, times 10^exp. These units convert in a single
// step, so that the float is the nearest to the decimal in its source.
func fromGoUnits(from, to units.Unit, exp int) Factor {
	v, err := units.ConvertFloat(1, from, to)
	if err != nil {
		return Factor{}
	}
	digits, e, _ := strings.Cut(strconv.FormatFloat(v.Float(), 'e', -1, 64), "e")
	whole, frac, _ := strings.Cut(digits, ".")
	num, _ := strconv.ParseInt(whole+frac, 10, 64)
	shift, _ := strconv.Atoi(e)
	return ratio(num, 1, exp+shift-len(frac))
}
