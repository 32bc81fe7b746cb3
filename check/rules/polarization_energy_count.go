package rules

import (
	"fmt"
	"slices"

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
		Sees: "A stored energy with eps_0 (mu_0) and the square of E or D (H or B) in a medium whose relative permittivity (permeability) is declared and exceeds 1.05: the field is bound to the medium, or is integrated over a region in it; " +
			"with the relative permittivity twice, beside the absolute one or beside D·E; a sum of ½·D·E and ½·P·E (½·B·H and ½µ₀·M·H), or of ½·ε·E² and ½·ε₀·χ·E².",
		Silent: "For a vacuum energy or vacuum energy density (the energy of the field alone, and the total over all charges with the bound ones); for a field that is bound to no medium; " +
			"with the medium's own permittivity or with D·E; for ½·ε₀·E² + ½·P·E, which is the whole; for relative constants below 1.05.",
		Formula: "½D·E = ½ε₀E² + ½P·E in a linear medium: the work stored in the polarization is in ½D·E already.",
		Remedy:  "Use the medium's permittivity once, or declare `w, vacuum energy density = …`.",
		Source:  "Jackson, Classical Electrodynamics, 3rd ed., 4.7, eq. 4.89, and 5.16, eq. 5.148 (from memory)",
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
		Run: polarizationCounts,
	}
}

// polarizationCounts looks at every claim anew: what a medium says of itself
// counts although the claim does not use it.
func polarizationCounts(p *check.Pass) error {
	for _, c := range viewOf(p).claims {
		polarizationCount(p, c)
	}
	return nil
}

// polarizes is the relative constant above which the medium matters.
const polarizes = 1.05

func polarizationCount(p *check.Pass, c *claim) {
	form, ok := c.form()
	k := c.sym.Facts.Kind
	if !ok || form != kind.StoredEnergy || k.Is(kind.VacuumEnergyDensity) || k.Is(kind.VacuumEnergy) || !c.declared() && c.usedElsewhere() {
		return
	}
	ps := products(c.note.Apart(c.sym, throughConstants))
	for _, t := range ps {
		for _, side := range []filling{dielectric, magnetic} {
			if c.countFilling(p, side, t, ps) {
				return
			}
		}
	}
	if c.displaced(ps) && c.polarized(ps) {
		c.reportCount(p, lang.Fault{
			Message: fmt.Sprintf("%s counts the energy of the polarization twice: ½·D·E (½·B·H) holds it already", c.sym.Name),
			Detail:  "Take ½·D·E alone, or ½·ε₀·E² + ½·P·E.",
		})
	}
}

func (c *claim) reportCount(p *check.Pass, f lang.Fault) {
	if !c.declared() {
		f.Severity = p.Lowered()
	}
	c.report(p, f)
}

// countFilling judges how often a medium's relative constant stands in a term.
func (c *claim) countFilling(p *check.Pass, side filling, t *product, all []*product) bool {
	found, right, ok := side.count(c.note, t)
	if !ok {
		return false
	}
	if found.times > right && found.of != nil {
		c.reportCount(p, lang.Fault{
			Message: fmt.Sprintf("%s has %s %d times too often", c.sym.Name, found.name, found.times-right),
			Detail:  fmt.Sprintf("%s holds the vacuum's constant and the relative one; beside it, and beside %s, there is no further factor.", side.absolute, side.product),
			Related: c.because([]lang.Factor{{Symbol: found.of}}, func(s *lang.Symbol) string { return s.Name }),
		})
		return true
	}
	m, ratio := c.filledBy(side, t)
	if m == nil || found.times != 0 || right == 0 || !found.vacuum || len(all) > 1 && c.polarized(all) {
		return false
	}
	how := fmt.Sprintf("leaves the polarization of %s out: it is 1/%.4g of the energy", m.Name, ratio)
	if right < 0 {
		how = fmt.Sprintf("takes %s of %s as if it were in vacuum: it is %.4g times the energy", side.flux, m.Name, ratio)
	}
	c.reportCount(p, lang.Fault{
		Message: c.sym.Name + " " + how,
		Detail:  fmt.Sprintf("Take the constant of %s. If the field alone is meant, write `%s, %s = …`.", m.Name, c.sym.Name, vacuumKind(c.sym.Facts.Kind)),
		Related: []lang.Related{{Span: m.Span, Path: m.Path, Message: m.Name}},
	})
	return true
}

// vacuumKind is the kind of the field's energy alone.
func vacuumKind(k kind.ID) kind.ID {
	if k.Is(kind.EnergyDensity) {
		return kind.VacuumEnergyDensity
	}
	return kind.VacuumEnergy
}

// polarized reports a term with a polarization or a susceptibility.
func (c *claim) polarized(ps []*product) bool {
	return slices.ContainsFunc(ps, func(t *product) bool { return slices.ContainsFunc(t.all, isPolarization) })
}

// isPolarization reports P, M, J or a susceptibility.
func isPolarization(f lang.Factor) bool {
	for _, k := range []kind.ID{kind.ElectricPolarization, kind.ElectricSusceptibility, kind.MagneticSusceptibility, kind.Magnetization, kind.MagneticPolarization} {
		if f.Facts.Kind.Is(k) {
			return true
		}
	}
	return false
}

// displaced reports a term that is the whole energy: ½·D·E, ½·B·H, or a square
// with a property of a medium.
func (c *claim) displaced(ps []*product) bool {
	return slices.ContainsFunc(ps, func(t *product) bool {
		return t.is(1, 2) && !slices.ContainsFunc(t.all, isPolarization) && slices.ContainsFunc(t.all, func(f lang.Factor) bool {
			own := f.Symbol != nil && f.Symbol.Owner != nil && (isPermittivity(f) || isOf(f.Facts, kind.Permeability))
			return own || f.Facts.Kind.Is(kind.ElectricFluxDensity) || f.Facts.Kind.Is(kind.MagneticFluxDensity) && len(t.byRole[roleMagnetic]) == 2
		})
	})
}
