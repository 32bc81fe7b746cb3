package lang

import (
	"sync"

	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file infers kinds and qualifiers of operations. A kind is inferred
// where the dimension decides it, or where the kinds that went in do; where
// dimensions tie and the ingredients do not tell, it stays unknown.

// sumKind is the kind of a sum: that of both, or of the one that is known.
func sumKind(x, y typed) (kind.ID, Standing) {
	switch {
	case x.Kind == y.Kind:
		return x.Kind, min(x.KindBy, y.KindBy)
	case x.Kind == 0:
		return y.Kind, min(y.KindBy, Guessed)
	case y.Kind == 0:
		return x.Kind, min(x.KindBy, Guessed)
	}
	return 0, Unknown
}

// sumQualifier is the statistic of a sum. Static and peak add to a peak;
// static and rms do not add.
func sumQualifier(x, y typed) (kind.Qualifier, Standing) {
	by := min(x.QualBy, y.QualBy, Inferred)
	a, b := x.Qualifier, y.Qualifier
	switch {
	case a == b:
		return a, by
	case a == kind.Static && b == kind.Peak, a == kind.Peak && b == kind.Static:
		return kind.Peak, by
	case isZeroNumber(x):
		return b, y.QualBy
	case isZeroNumber(y):
		return a, x.QualBy
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
	k := named()
	if d.Base() == k.torqueDim {
		return k.torque, Inferred
	}
	if d.Base() == k.fluxDim {
		return k.powerFlux, Inferred
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
	return named().decide(d, in)
}

// names of kinds that inference itself speaks of.
type kindNames struct {
	energy, energyDensity, torque, powerFlux, power, force, pressure kind.ID
	fluxDensityD, permittivity, relPermittivity, fieldE, voltage     kind.ID
	current, fieldH, permeability, fluxDensityB                      kind.ID
	torqueDim, fluxDim, densityDim, powerDim, dDim, fieldHDim        unit.Dim
	parameters                                                       map[kind.ID]bool
	electromagnetic                                                  map[kind.ID]bool
}

// named looks the kinds up once; the value is never changed afterwards.
var named = sync.OnceValue(func() *kindNames {
	id := func(words string) kind.ID {
		_, k, _ := kind.Parse(words)
		return k
	}
	n := &kindNames{
		energy: id("energy"), energyDensity: id("energy density"), torque: id("torque"), powerFlux: id("power flux density"),
		power: id("power"), force: id("force"), pressure: id("pressure"), fluxDensityD: id("electric flux density"),
		permittivity: id("permittivity"), relPermittivity: id("relative permittivity"), fieldE: id("electric field strength"),
		voltage: id("voltage"), current: id("electric current"), fieldH: id("magnetic field strength"),
		permeability: id("permeability"), fluxDensityB: id("magnetic flux density"),
		parameters: map[kind.ID]bool{}, electromagnetic: map[kind.ID]bool{},
	}
	dim := func(k kind.ID) unit.Dim {
		if i := k.Info(); i != nil {
			return i.Dim.Base()
		}
		return unit.Dim{}
	}
	n.torqueDim, n.fluxDim, n.densityDim, n.powerDim = dim(n.torque), dim(n.powerFlux), dim(n.energyDensity), dim(n.power)
	n.dDim, n.fieldHDim = dim(n.fluxDensityD), dim(n.fieldH)
	for _, w := range []string{"capacitance", "lineic capacitance", "permittivity", "relative permittivity", "electric susceptibility",
		"permeability", "relative permeability", "inductance", "mutual inductance", "lineic inductance", "conductivity", "resistivity",
		"resistance", "reactance", "impedance", "conductance", "susceptance", "admittance", "surface resistance", "ratio", "efficiency", "duty ratio",
		"loss factor", "quality factor", "power factor", "coupling factor", "leakage factor", "number of turns", "frequency", "angular frequency",
		"period", "time", "time constant", "wavelength", "length", "thickness", "radius", "skin depth", "area", "volume", "angle", "solid angle",
		"phase speed", "attenuation coefficient", "phase coefficient", "propagation coefficient", "refractive index", "density", "mass",
		"temperature", "temperature rise", "thermal conductivity", "thermal resistance", "specific heat capacity", "reluctance", "safety factor", "utilisation"} {
		n.parameters[id(w)] = true
	}
	for _, w := range []string{"capacitance", "permittivity", "voltage", "electric potential", "electric charge", "electric field strength",
		"electric flux density", "electric polarization", "inductance", "electric current", "magnetic flux density", "magnetic field strength",
		"magnetic flux", "linked flux", "permeability", "power", "current density", "electric current density", "resistance", "conductivity"} {
		n.electromagnetic[id(w)] = true
	}
	delete(n.parameters, 0)
	delete(n.electromagnetic, 0)
	return n
})

// decide settles the ties of kinds.md where the ingredients do.
func (n *kindNames) decide(d unit.Dim, in []kind.ID) (kind.ID, Standing) {
	has := func(k kind.ID) bool {
		for _, i := range in {
			if i == k {
				return true
			}
		}
		return false
	}
	em := false
	for _, i := range in {
		em = em || n.electromagnetic[i]
	}
	switch d.Base() {
	case n.torqueDim:
		if em && !has(n.force) {
			return n.energy, Inferred
		}
	case n.densityDim:
		if em && !has(n.force) {
			return n.energyDensity, Inferred
		}
	case n.powerDim:
		if em {
			return n.power, Inferred
		}
	case n.dDim:
		if has(n.permittivity) && (has(n.fieldE) || has(n.voltage)) {
			return n.fluxDensityD, Inferred
		}
	case n.fieldHDim:
		if has(n.fluxDensityB) && has(n.permeability) {
			return n.fieldH, Inferred
		}
	}
	if has(n.permittivity) && d.Base() == n.permittivity.Info().Dim.Base() && (len(in) == 1 || len(in) == 2 && has(n.relPermittivity)) {
		return n.permittivity, Inferred
	}
	return 0, Unknown
}

// signal reports whether an unqualified expression may still oscillate: it
// carries a kind that is no parameter of the set-up.
func signal(t typed) bool {
	if t.plain || t.Dim.IsOne() && t.Kind == 0 {
		return false
	}
	n := named()
	if t.Kind != 0 {
		return !n.parameters[t.Kind]
	}
	for _, k := range t.kinds {
		if !n.parameters[k] {
			return true
		}
	}
	return len(t.kinds) == 0
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
	case a == kind.Static && b == kind.Static, a == kind.Instantaneous && b == kind.Instantaneous:
		return a, by
	case a == kind.RMS && b == kind.RMS && op != OpDiv:
		return kind.Average, by
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
