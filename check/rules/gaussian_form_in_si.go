package rules

import (
	"fmt"
	"math/big"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// GaussianFormInSI explains formulas of the Gaussian system in a note whose
// quantities are those of the SI.
func (Book) GaussianFormInSI() check.Rule {
	return check.Rule{
		Name:     "gaussian-form-in-si",
		Severity: lang.Error,
		Title:    "A formula of the Gaussian system stands in a note in SI quantities",
		Sees: "E²/(8π), B²/(8π) or D·E/(8π) for an energy density, q₁q₂/r² for a force or q₁q₂/r for an energy without 4πε, E + 4πP and H + 4πM: " +
			"formulas whose dimension does not hold in the SI and whose factor is that of the Gaussian one.",
		Silent:  "For 1/(4πε₀) of Coulomb's law, 4π of a solid angle or of a sphere, and for quantities that are converted as units (1 G = 1e-4 T): a converted quantity is an SI quantity.",
		Formula: "(E² + B²)/8π ↔ ½ε₀E² + B²/2µ₀; D = E + 4πP ↔ ε₀E + P; B = H + 4πM ↔ µ₀(H + M); F = qq′/r² ↔ qq′/(4πε₀r²): the quantities differ, not the units alone.",
		Remedy:  "Write the SI form; convert a susceptibility by 4π, a magnetization in emu/cm³ by 10³.",
		Source:  "Jackson, Classical Electrodynamics, 3rd ed., appendix, tables 2 to 4 (from memory)",
		Wrong: check.Example{Note: `    E, static electric field strength = 3 MV/m
    w, energy density = E^2/(8*pi)
`},
		Right: check.Example{Note: `    E, static electric field strength = 3 MV/m
    w, energy density = 1/2*eps_0*E^2 = 39.8 J/m^3
`},
		Run: gaussianForm,
	}
}

func gaussianForm(p *check.Pass) error {
	for _, m := range mismatches(p) {
		if why := gaussianProduct(p.Note, m); why != "" {
			p.Report(lang.Fault{
				Span:    m.span,
				Message: fmt.Sprintf("%s is the Gaussian form: %s", m.sym.Name, why),
				Detail:  "In SI quantities ½ε₀E², B²/(2µ₀), q₁q₂/(4πε₀r²).",
			})
		}
	}
	for _, s := range p.Note.Script.Stmts {
		lang.Walk(s.Tree, func(t lang.Tree) bool {
			if b, ok := t.(*lang.Binary); ok && (b.Op == lang.OpAdd || b.Op == lang.OpSub) {
				gaussianSum(p, s, b)
			}
			return true
		})
	}
	return nil
}

// gaussianProduct recognises a single product by what its dimension lacks and
// its factor; "" where it is no Gaussian form.
func gaussianProduct(n *lang.Note, m mismatch) string {
	t, single := n.Form(m.sym, m.x, lang.UpToDeclared).Single()
	if !single {
		return ""
	}
	electric, magnetic, charges := 0, 0, 0
	for _, f := range t.Factors {
		switch k, _ := f.Exp.Int(); {
		case isOf(f.Facts, kind.ElectricFieldStrength), isOf(f.Facts, kind.ElectricFluxDensity):
			electric += k
		case isOf(f.Facts, kind.MagneticFluxDensity), isOf(f.Facts, kind.MagneticFieldStrength):
			magnetic += k
		case isOf(f.Facts, kind.ElectricCharge):
			charges += k
		}
	}
	eighth := t.Pi == -1 && t.Coef.Cmp(big.NewRat(1, 8)) == 0
	switch {
	case eighth && electric == 2 && magnetic == 0 && m.claims.Base() == kind.EnergyDensity.Dim().Base():
		return "E²/(8π) is an energy density in Gaussian quantities"
	case eighth && magnetic == 2 && electric == 0 && m.claims.Base() == kind.EnergyDensity.Dim().Base():
		return "B²/(8π) is an energy density in Gaussian quantities"
	case charges == 2 && t.Pi == 0 && m.claims.Base() == kind.Force.Dim().Base():
		return "q₁·q₂/r² is a force in Gaussian quantities"
	case charges == 2 && t.Pi == 0 && m.claims.Base() == kind.Energy.Dim().Base():
		return "q₁·q₂/r is an energy in Gaussian quantities"
	}
	return ""
}

// gaussianSum reports E + 4πP and H + 4πM.
func gaussianSum(p *check.Pass, s *lang.Stmt, b *lang.Binary) {
	x, ok1 := p.Note.FactsOf(s, b.X)
	y, ok2 := p.Note.FactsOf(s, b.Y)
	if !ok1 || !ok2 || !x.Known || !y.Known {
		return
	}
	for _, side := range []struct {
		of    lang.Expr
		is    lang.Facts
		other lang.Facts
	}{{b.Y, y, x}, {b.X, x, y}} {
		polarized := isOf(side.is, kind.ElectricPolarization) && isOf(side.other, kind.ElectricFieldStrength)
		magnetized := isOf(side.is, kind.Magnetization) && (isOf(side.other, kind.MagneticFieldStrength) || isOf(side.other, kind.MagneticFluxDensity))
		t, single := p.Note.StatementForm(s, side.of, lang.NamesStay).Single()
		if !polarized && !magnetized || !single || t.Pi != 1 || t.Coef.Cmp(big.NewRat(4, 1)) != 0 {
			continue
		}
		f := lang.Fault{Span: s.Abs(b), Message: "4π before a magnetization is of the Gaussian system", Detail: "In SI quantities B = µ₀·(H + M)."}
		if polarized {
			f.Message, f.Detail = "4π before a polarization is of the Gaussian system", "In SI quantities D = ε₀·E + P."
		}
		p.Report(f)
		return
	}
}
