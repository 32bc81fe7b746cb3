package lang

import (
	"slices"

	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file infers kinds and qualifiers of operations. A kind is inferred
// where the dimension decides it, or where the kinds that went in do; where
// dimensions tie and the ingredients do not tell, it stays unknown.

// sumKind is the kind of a sum or difference; a kind that only one of them has
// is a guess.
func sumKind(op Op, x, y typed) (kind.ID, Standing) {
	join := kind.Sum
	if op == OpSub {
		join = kind.Difference
	}
	k, ok := join(x.Kind, y.Kind)
	switch {
	case !ok || k == 0:
		return 0, Unknown
	case x.Kind == 0 || y.Kind == 0:
		return k, min(max(x.KindBy, y.KindBy), Guessed)
	}
	return k, min(x.KindBy, y.KindBy)
}

// sumQualifier is the statistic of a sum. Static and peak add to a peak;
// static and rms do not add.
func sumQualifier(x, y typed) (kind.Qualifier, Standing) {
	by := min(x.QualBy, y.QualBy, Inferred)
	switch {
	case isZeroNumber(x):
		return y.Qualifier, y.QualBy
	case isZeroNumber(y):
		return x.Qualifier, x.QualBy
	}
	if q, ok := kind.Add(x.Qualifier, y.Qualifier); ok && q != kind.Unqualified {
		return q, by
	}
	return kind.Unqualified, Unknown
}

func isZeroNumber(t typed) bool { return t.lit != nil && t.lit.Num.Value == 0 }

// productKind is the kind of x * y or x / y.
func productKind(op Op, x, y typed, t *typed) (kind.ID, Standing) {
	switch {
	case y.plain && y.Dim.IsOne():
		return scaled(x, t)
	case x.plain && x.Dim.IsOne() && op != OpDiv:
		return scaled(y, t)
	}
	return ingredientKind(t.Dim, t.kinds)
}

// scaled keeps the kind of a quantity that was multiplied by a plain number,
// except where the number turned cycles into radians.
func scaled(x typed, t *typed) (kind.ID, Standing) {
	if x.Dim != t.Dim {
		return ingredientKind(t.Dim, t.kinds)
	}
	return x.Kind, min(x.KindBy, Inferred)
}

// crossKind tells a torque from an energy: r × F, m × B, p × E are torques.
func crossKind(x, y typed, d unit.Dim) (kind.ID, Standing) {
	switch d.Base() {
	case kind.Torque.Dim().Base():
		return kind.Torque, Inferred
	case kind.PowerFluxDensity.Dim().Base():
		return kind.PowerFluxDensity, Inferred
	}
	return ingredientKind(d, mergeKinds(x.kinds, y.kinds))
}

// powerKind is the kind of x ^ n.
func powerKind(x typed, d unit.Dim, n unit.Rat, exact bool) (kind.ID, Standing) {
	if exact && n == unit.Whole(1) {
		return x.Kind, x.KindBy
	}
	return ingredientKind(d, x.kinds)
}

// ingredientKind decides a kind by the dimension and, where kinds tie, by what
// went in.
func ingredientKind(d unit.Dim, in []kind.ID) (kind.ID, Standing) {
	if d.IsOne() {
		return 0, Unknown
	}
	if id, ok := kind.Default(d); ok {
		return id, Inferred
	}
	return decide(d, in)
}

// decide settles the ties of kinds.md where the ingredients do.
func decide(d unit.Dim, in []kind.ID) (kind.ID, Standing) {
	has := func(k kind.ID) bool { return slices.Contains(in, k) }
	fields := slices.ContainsFunc(in, electromagnetic)
	switch d.Base() {
	case kind.Torque.Dim().Base():
		stored := slices.ContainsFunc(in, func(k kind.ID) bool { return k.Is(kind.Energy) || k.Is(kind.Coenergy) })
		switch angle := d[unit.Angle].Sign(); {
		case angle < 0 && stored, has(kind.Torque) && angle == 0: // ∂W/∂θ, (D×E)·V
			return kind.Torque, Inferred
		case angle < 0: // P/ω is a torque or, times a quality factor, an energy
			return 0, Unknown
		case fields && !has(kind.Force), has(kind.Torque):
			return kind.Energy, Inferred
		}
	case kind.EnergyDensity.Dim().Base():
		if fields && !has(kind.Force) {
			return kind.EnergyDensity, Inferred
		}
	case kind.Power.Dim().Base():
		if fields {
			return kind.Power, Inferred
		}
	case kind.ElectricFluxDensity.Dim().Base():
		if has(kind.Permittivity) && (has(kind.ElectricFieldStrength) || has(kind.Voltage)) {
			return kind.ElectricFluxDensity, Inferred
		}
	case kind.TemperatureRise.Dim().Base():
		if has(kind.ThermalResistance) || has(kind.HeatingRate) {
			return kind.TemperatureRise, Inferred
		}
	case kind.MagneticFieldStrength.Dim().Base():
		if has(kind.MagneticFluxDensity) && has(kind.Permeability) {
			return kind.MagneticFieldStrength, Inferred
		}
	case kind.Permittivity.Dim().Base():
		if has(kind.Permittivity) && (len(in) == 1 || len(in) == 2 && has(kind.RelativePermittivity)) {
			return kind.Permittivity, Inferred
		}
	}
	return 0, Unknown
}

// electromagnetic reports the kinds whose products with each other make
// electromagnetic energies and powers.
func electromagnetic(k kind.ID) bool {
	switch k.Info().Class {
	case kind.ClassAmplitude, kind.ClassEnergy, kind.ClassPower, kind.ClassPowerFlux, kind.ClassSourceWork:
		return true
	}
	for _, c := range []kind.ID{kind.Capacitance, kind.Permittivity, kind.Inductance, kind.Permeability, kind.Resistance, kind.Conductivity} {
		if k.Is(c) {
			return true
		}
	}
	return false
}

// oscillates reports a kind whose quantity may vary in time: fields, voltages,
// currents, energies, powers, forces.
func oscillates(k kind.ID) bool { return k.Info().Class != kind.ClassOther }

// signal reports whether an unqualified expression may still oscillate: it
// carries a kind that is no parameter of the set-up.
func signal(t typed) bool {
	if t.plain || t.Dim.IsOne() && t.Kind == 0 {
		return false
	}
	if t.Kind != 0 {
		return oscillates(t.Kind)
	}
	return len(t.kinds) == 0 || slices.ContainsFunc(t.kinds, oscillates)
}

// productQualifier is the statistic of a product. A factor that does not
// oscillate keeps that of the other; rms times rms gives an average; the half
// of peak times peak depends on the target and is left to the rules.
func productQualifier(op Op, x, y typed) (kind.Qualifier, Standing) {
	by := min(x.QualBy, y.QualBy, Inferred)
	a, b := x.Qualifier, y.Qualifier
	switch {
	case a != kind.Unqualified && b == kind.Unqualified && !signal(y):
		return a, min(x.QualBy, Inferred)
	case b != kind.Unqualified && a == kind.Unqualified && !signal(x) && op != OpDiv:
		return b, min(y.QualBy, Inferred)
	case op == OpDiv && a == b && (a == kind.Static || a == kind.Instantaneous):
		return a, by
	case op == OpDiv:
		return kind.Unqualified, Unknown
	}
	if q, ok := kind.Product(a, b); ok && q != kind.Unqualified {
		return q, by
	}
	return kind.Unqualified, Unknown
}

// powerQualifier is the statistic of x ^ n.
func powerQualifier(x typed, n unit.Rat, exact bool) (kind.Qualifier, Standing) {
	by := min(x.QualBy, Inferred)
	switch {
	case exact && n == unit.Whole(1):
		return x.Qualifier, x.QualBy
	case x.Qualifier == kind.Static, x.Qualifier == kind.Instantaneous:
		return x.Qualifier, by
	case exact && n == unit.Whole(2) && x.Qualifier == kind.RMS:
		return kind.Average, by
	case exact && n == unit.NewRat(1, 2) && x.Qualifier == kind.Average:
		return kind.RMS, by
	}
	return kind.Unqualified, Unknown
}
