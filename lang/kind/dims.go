package kind

import "inkjoule/lang/unit"

// ByDim lists the kinds of a dimension in the order of the table. Angle and
// cycle decide where some kind has them so: Hz gives the frequency, rad/s the
// angular frequency, 1/s neither. Otherwise the bases are compared, since angle
// and cycle drop in products: rad/m gives the coefficients in m^-1. The caller
// must not change the list.
func ByDim(d unit.Dim) []ID {
	t := derived()
	if list := t.byDim[d]; list != nil || d.Base() == frequencyBase {
		return list
	}
	return t.byBase[d.Base()]
}

// frequencyBase is the dimension 1/s.
var frequencyBase = unit.Dim{unit.Time: unit.Whole(-1)}

// Default returns the kind to infer or show for a dimension where only one is
// plausible: V/m is an electric field strength; J/m^3 is not decided.
func Default(d unit.Dim) (ID, bool) {
	for _, k := range ByDim(d) {
		if table[k].Plain {
			return k, true
		}
	}
	return 0, false
}

// RootPower tells how a level of the kind is taken: root true is 20 lg (fields,
// voltages, currents), false 10 lg (energies, powers); known is false where the
// kind does not decide it.
func RootPower(k ID) (root, known bool) {
	switch k.Info().Class {
	case ClassAmplitude:
		return true, true
	case ClassEnergy, ClassPower, ClassPowerFlux, ClassSourceWork:
		return false, true
	}
	return false, false
}
