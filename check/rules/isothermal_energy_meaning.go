package rules

import (
	"fmt"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// IsothermalEnergyMeaning finds ½εE² called an internal energy where ε depends
// on temperature.
func (Book) IsothermalEnergyMeaning() check.Rule {
	return check.Rule{
		Name:     "isothermal-energy-meaning",
		Severity: lang.Advice,
		Title:    "½εE² at constant temperature is the free energy, and it is called an internal energy or a heat",
		Sees: "An internal energy or a heat, or their densities, that is ½·ε·E² (or ½·D·E) with the permittivity of a medium that states it as a function of temperature or for a range of temperatures, " +
			"without a derivative in what it is computed from.",
		Silent:  "For a stored or free energy, which it is; with the term T·∂ε/∂T; for a permittivity without a word on temperature.",
		Formula: "u = ½·(ε + T·∂ε/∂T)·E²: it follows from F = D²/2ε(T) and S = −∂F/∂T at constant D. For polar liquids T·∂ε/∂T ≈ −ε.",
		Remedy:  "Call it a stored energy, or add the term.",
		Source:  "Landau and Lifshitz, Electrodynamics of Continuous Media, 2nd ed., §10 (from memory)",
		Wrong: check.Example{Note: `    medium liquid: linear, isotropic, homogeneous
        eps_r(T) = 80*(293 K)/T for T from 280 K to 320 K
    E in liquid, static electric field strength = 2 kV/mm
    u, internal energy density = 1/2*eps_0*liquid.eps_r(300 K)*E^2 = 1384 J/m^3
`},
		Right: check.Example{Note: `    medium liquid: linear, isotropic, homogeneous
        eps_r(T) = 80*(293 K)/T for T from 280 K to 320 K
    E in liquid, static electric field strength = 2 kV/mm
    w, energy density = 1/2*eps_0*liquid.eps_r(300 K)*E^2 = 1384 J/m^3
`},
		Run: perClaim(isothermalMeaning),
	}
}

func isothermalMeaning(p *check.Pass, c *claim) {
	k := c.sym.Facts.Kind
	if !k.Is(kind.InternalEnergy) && !k.Is(kind.InternalEnergyDensity) && !k.Is(kind.Heat) || c.harmonic() || c.differentiates(p) {
		return
	}
	field := false
	for _, t := range c.view.products(c.sym) {
		field = field || len(t.byRole[roleElectric]) > 0 && t.is(1, 2)
	}
	if !field {
		return
	}
	for _, m := range c.mediaAround(p) {
		for _, name := range []string{"eps_r", "eps"} {
			if s := p.Note.Lookup(m.sym.Key + "." + name); s != nil && variesWithTemperature(s) {
				c.report(p, lang.Fault{
					Message: fmt.Sprintf("%s is the free energy at constant temperature; the internal energy has T·∂ε/∂T too", c.sym.Name),
					Detail:  fmt.Sprintf("Write `%s, energy density = …`, or add ½·T·∂ε/∂T·E².", c.sym.Name),
					Related: []lang.Related{{Span: s.Span, Path: s.Path, Message: ownedName(s) + " depends on temperature"}},
				})
				return
			}
		}
	}
}

// variesWithTemperature reports a function of a temperature, or a range of one.
func variesWithTemperature(s *lang.Symbol) bool {
	if _, ranged := rangeOver(s, kind.Temperature); ranged {
		return true
	}
	if s.Def == nil {
		return false
	}
	for _, param := range s.Def.Params {
		if param.Text == "T" || param.Text == "θ" {
			return true
		}
	}
	return false
}
