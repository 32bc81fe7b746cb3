package rules

import (
	"fmt"
	"math"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
)

// TensorConductionLoss finds Joule heat in an anisotropic conductor that takes
// one number for its conductivity.
func (Book) TensorConductionLoss() check.Rule {
	return check.Rule{
		Name:     "tensor-conduction-loss",
		Severity: lang.Error,
		Title:    "The Joule heat of an anisotropic conductor is computed with one number for its conductivity",
		Sees: "σ·E², J²/σ or ρ·J² in an anisotropic medium with one element, an eigenvalue or the mean of a conductivity tensor, or with the tensor beside the square of the field, " +
			"where the contraction with the field gives something else. A caution where the direction is not given, or the medium states one number only.",
		Silent:  "For E·J, E·(σE) and J·(ρJ); for a field along a principal axis with the matching value; for a tensor that is isotropic.",
		Formula: "p = E·σ·E = J·ρ·J with ρ = σ⁻¹ as a matrix: only the component of J along E dissipates; the antisymmetric (Hall) part does not.",
		Remedy:  "Contract the tensor: `p, power density = E·(m.sigma*E)`.",
		Source:  "Nye, Physical Properties of Crystals, chapter XI (from memory)",
		Wrong: check.Example{Note: `    medium sheet: linear, anisotropic, homogeneous, lossy
        sigma = diag(3e4, 1e2, 1e2) S/m
    E in sheet, static electric field strength = (0.5, 2, 0) V/m
    p, power density = trace(sheet.sigma)/3*E^2 = 42.8 kW/m^3
`},
		Right: check.Example{Note: `    medium sheet: linear, anisotropic, homogeneous, lossy
        sigma = diag(3e4, 1e2, 1e2) S/m
    E in sheet, static electric field strength = (0.5, 2, 0) V/m
    p, power density = E·(sheet.sigma*E) = 7.9 kW/m^3
`},
		Run: perClaim(tensorLoss),
	}
}

func tensorLoss(p *check.Pass, c *claim) {
	if form, ok := c.form(); !ok || form != kind.Dissipation {
		return
	}
	for _, t := range c.view.products(c.sym) {
		field, flux, ok := lossField(t)
		if !ok {
			continue
		}
		f, m, ok := c.fromTensor(t, func(f lang.Factor) bool {
			return isOf(f.Facts, kind.Conductivity) || isOf(f.Facts, kind.Resistivity)
		})
		if !ok {
			continue
		}
		if sev, why := c.lossVerdict(p, f, m, field, flux); why != "" {
			c.report(p, lang.Fault{
				Severity: sev,
				Message:  fmt.Sprintf("%s takes the conductivity of %s, which is anisotropic, as one number: %s", c.sym.Name, m.sym.Name, why),
				Detail:   fmt.Sprintf("Contract the tensor: `E·(%s.sigma*E)`, with E as a vector in the frame of the tensor.", m.sym.Name),
				Related:  []lang.Related{{Span: m.sym.Span, Path: m.sym.Path, Message: m.sym.Name + " is declared anisotropic"}},
			})
			return
		}
	}
}

// lossField is the field strength or current density whose square stands in a
// term; flux tells that it is a current density.
func lossField(t *product) (f lang.Factor, flux, ok bool) {
	for _, f := range t.all {
		if f.Exp != two {
			continue
		}
		if isOf(f.Facts, kind.ElectricFieldStrength) {
			return f, false, true
		}
		if isOf(f.Facts, kind.ElectricCurrentDensity) {
			return f, true, true
		}
	}
	return f, false, false
}

// lossVerdict tells why a scalar does not stand for the tensor; "" if it does.
func (c *claim) lossVerdict(p *check.Pass, f lang.Factor, m medium, field lang.Factor, flux bool) (lang.Severity, string) {
	resistivity := isOf(f.Facts, kind.Resistivity)
	name := "sigma"
	if resistivity {
		name = "rho"
	}
	t, known := m.tensor(c.note, name)
	switch {
	case known && isotropic(t):
		return 0, ""
	case f.Facts.Shape == eval.Tensor:
		return p.Rule.Severity, "the tensor multiplies the square of the field, and the two are not contracted"
	case !known:
		return p.Lowered(), "the medium states one number for it"
	}
	v, ok := direction(vectorBehind(c.note, field.Symbol))
	x, component := scalarOf(f, t)
	switch {
	case !ok:
		return p.Lowered(), "the direction of the field is not given"
	case !component:
		return p.Rule.Severity, "one number stands for the tensor"
	}
	k := seenBetween(t, v, flux != resistivity)
	if math.Abs(x/k-1) <= crystalTolerance {
		return 0, ""
	}
	off := x / k
	if flux && !resistivity {
		off = 1 / off
	}
	return p.Rule.Severity, fmt.Sprintf("in the direction of this field the tensor counts %.4g and not %.4g: the loss comes out %.3g times its value", k, x, off)
}
