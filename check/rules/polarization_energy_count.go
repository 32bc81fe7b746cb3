package rules

import (
	"fmt"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// PolarizationEnergyCount finds energies that leave the polarization of the
// medium out, or count it once more.
func (Book) PolarizationEnergyCount() check.Rule {
	return check.Rule{
		Name:     "polarization-energy-count",
		Severity: lang.Error,
		Title:    "The energy that is stored in the polarization is left out, or counted twice",
		Sees: "A stored energy with eps_0 (or mu_0) and the square of a field that is bound to a medium whose relative permittivity (permeability) is declared and exceeds 1.05; " +
			"a sum of ½·D·E and ½·P·E, or of ½·ε·E² and ½·ε₀·χ·E².",
		Silent:  "For a vacuum energy density (the energy of the field alone); for a field that is bound to no medium; with the medium's own permittivity or with D; for ½·ε₀·E² + ½·P·E, which is the whole.",
		Formula: "½D·E = ½ε₀E² + ½P·E in a linear medium: the work stored in the polarization is in ½D·E already.",
		Remedy:  "Use the medium's permittivity, or declare `w, vacuum energy density = …`.",
		Source:  "Jackson, Classical Electrodynamics, 3rd ed., 4.7, eq. 4.89 (from memory)",
		Wrong: check.Example{Note: `    medium film: linear, isotropic, homogeneous
        eps_r = 2.2
    E in film, static electric field strength = 250 V/um
    w, energy density = 1/2*eps_0*E^2 = 0.277 MJ/m^3
    k = film.eps_r = 2.2
`},
		Right: check.Example{Note: `    medium film: linear, isotropic, homogeneous
        eps_r = 2.2
    E in film, static electric field strength = 250 V/um
    w, energy density = 1/2*film.eps*E^2 = 0.609 MJ/m^3
    k = film.eps_r = 2.2
`},
		Run: perClaim(polarizationCount),
	}
}

// polarizes is the relative constant above which the medium matters.
const polarizes = 1.05

func polarizationCount(p *check.Pass, c *claim) {
	form, ok := c.form()
	if !ok || form != kind.StoredEnergy || c.sym.Facts.Kind.Is(kind.VacuumEnergyDensity) {
		return
	}
	ps := c.view.products(c.sym)
	for _, t := range ps {
		if m, ratio := c.vacuumConstant(t); m != nil && !c.withRemainder(ps) {
			c.report(p, lang.Fault{
				Message: fmt.Sprintf("%s leaves the polarization of %s out: it is 1/%.4g of the energy", c.sym.Name, m.Name, ratio),
				Detail:  fmt.Sprintf("Take the constant of %s. If the field alone is meant, write `%s, vacuum energy density = …`.", m.Name, c.sym.Name),
				Related: []lang.Related{{Span: m.Span, Path: m.Path, Message: m.Name}},
			})
			return
		}
	}
	if whole, part := c.displaced(ps), c.polarized(ps); whole && part {
		c.report(p, lang.Fault{
			Message: fmt.Sprintf("%s counts the energy of the polarization twice: ½·D·E holds it already", c.sym.Name),
			Detail:  "Take ½·D·E alone, or ½·ε₀·E² + ½·P·E.",
		})
	}
}

// vacuumConstant finds eps_0 or mu_0 beside the square of a field of a medium
// whose own constant is declared, and the ratio of the two.
func (c *claim) vacuumConstant(t *product) (*lang.Symbol, float64) {
	constant := map[string]string{}
	for _, f := range t.all {
		if f.Symbol != nil && f.Symbol.Role == lang.RoleConstant && (f.Key == "eps_0" || f.Key == "mu_0") {
			constant[f.Key] = f.Key
		} else if f.Facts.Kind.Is(kind.RelativePermittivity) || f.Facts.Kind.Is(kind.RelativePermeability) || f.Facts.Kind.Is(kind.ElectricSusceptibility) {
			return nil, 0
		}
	}
	for _, f := range append(t.byRole[roleElectric], t.byRole[roleMagnetic]...) {
		if f.Exp != two || f.Symbol == nil || f.Symbol.Def == nil || f.Symbol.Def.In == nil {
			continue
		}
		m, ok := mediumOf(c.note, lang.CanonicalName(f.Symbol.Def.In.Text))
		if !ok {
			continue
		}
		if x, ok := m.relativePermittivity(c.note); ok && x > polarizes && constant["eps_0"] != "" && isOf(f.Facts, kind.ElectricFieldStrength) {
			return m.sym, x
		}
		if x, ok := m.relativePermeability(c.note); ok && x > polarizes && constant["mu_0"] != "" && isOf(f.Facts, kind.MagneticFieldStrength) {
			return m.sym, x
		}
	}
	return nil, 0
}

// relativePermeability is the magnitude of a medium's scalar permeability.
func (m medium) relativePermeability(n *lang.Note) (float64, bool) {
	if s := n.Lookup(m.sym.Key + ".mu_r"); s != nil && s.Role != lang.RoleFunction {
		return magnitude(s)
	}
	return 0, false
}

// withRemainder reports the other part of a sum that is whole: ½P·E, ½ε₀χE².
func (c *claim) withRemainder(ps []*product) bool { return len(ps) > 1 && c.polarized(ps) }

// polarized reports a term with a polarization or a susceptibility.
func (c *claim) polarized(ps []*product) bool {
	for _, t := range ps {
		for _, f := range t.all {
			if f.Facts.Kind.Is(kind.ElectricPolarization) || f.Facts.Kind.Is(kind.ElectricSusceptibility) || f.Facts.Kind.Is(kind.MagneticSusceptibility) {
				return true
			}
		}
	}
	return false
}

// displaced reports a term that is the whole energy: ½·D·E, or a square with a
// property of a medium.
func (c *claim) displaced(ps []*product) bool {
	for _, t := range ps {
		if c.polarized([]*product{t}) || !t.is(1, 2) {
			continue
		}
		for _, f := range t.all {
			own := f.Symbol != nil && f.Symbol.Owner != nil && isPermittivity(f)
			if f.Facts.Kind.Is(kind.ElectricFluxDensity) || own {
				return true
			}
		}
	}
	return false
}
