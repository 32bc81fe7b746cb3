package unit

import "math"

// Field tells how a level relates to its linear quantity.
type Field uint8

// How a level is taken.
const (
	ByKind    Field = iota // dB, Np: the kind of the quantity decides
	Power                  // 10 lg of a power ratio: dBm, dBW, dBi
	RootPower              // 20 lg of a root-power ratio: dBuV, dBuV/m
)

// Level is what a level unit stands for: L = 10 lg(q/Ref) for a power
// quantity, 20 lg(q/Ref) for a root-power quantity (ISO 80000-3:2006, 3-21 and
// 3-22; IEC 60027-3); in nepers L = ½ ln(q/Ref) and ln(q/Ref).
type Level struct {
	Field Field
	Ref   float64 // reference value in coherent SI units of the unit's Dim
	Neper bool
}

// perRootLg is the number of units that a factor of ten in a root-power
// quantity makes: 20 dB, or ln 10 nepers.
func (l *Level) perRootLg() float64 {
	if l.Neper {
		return math.Ln10
	}
	return 20
}

// ToLinear returns the linear quantity of the level x, in coherent SI units.
// rootPower is heeded only where Field is ByKind.
func (l *Level) ToLinear(x float64, rootPower bool) float64 {
	return l.Ref * math.Pow(10, x/l.step(rootPower))
}

// FromLinear returns the level of the linear quantity q (coherent SI units); a
// negative q has none (NaN), zero is −∞.
func (l *Level) FromLinear(q float64, rootPower bool) float64 {
	return l.step(rootPower) * math.Log10(q/l.Ref)
}

// step is the number of level units that a factor of ten makes.
func (l *Level) step(rootPower bool) float64 {
	if l.Field == RootPower || l.Field == ByKind && rootPower {
		return l.perRootLg()
	}
	return l.perRootLg() / 2
}

func (l *Level) toSI(x float64) float64 {
	if l.Field == ByKind {
		return math.NaN()
	}
	return l.ToLinear(x, l.Field == RootPower)
}

func (l *Level) fromSI(q float64) float64 {
	if l.Field == ByKind {
		return math.NaN()
	}
	return l.FromLinear(q, l.Field == RootPower)
}
