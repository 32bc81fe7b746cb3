package rules

import (
	"fmt"
	"math/big"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// InducedDipoleHalf finds the energy of an induced dipole without its half.
func (Book) InducedDipoleHalf() check.Rule {
	return check.Rule{
		Name:     "induced-dipole-half",
		Severity: lang.Error,
		Title:    "The energy of an induced dipole in the field that induces it lacks its half",
		Sees: "An energy −p·E (or p·E) with the coefficient 1 of static or instantaneous values, where p is declared as an induced electric dipole moment or is computed as a polarizability times the field; " +
			"and α·E² with the coefficient 1.",
		Silent:  "With the half; for a permanent moment; for a torque p×E or a force; for a sum of a permanent and an induced moment; for averages of alternating fields.",
		Formula: "dW = −p·dE = −αE·dE, so W = −½αE² = −½p·E: the other half went into stretching the dipole. Its mean in a field of amplitude E is −¼αE².",
		Remedy:  "Put in the half.",
		Source:  "Jackson, Classical Electrodynamics, 3rd ed., 4.7 (linear response; from memory)",
		Wrong: check.Example{Note: `    α, polarizability = 1.1e-26 C·m^2/V
    E, static electric field strength = 100 kV/m
    p = α*E
    W, energy = -p*E = -1.1e-16 J
`},
		Right: check.Example{Note: `    α, polarizability = 1.1e-26 C·m^2/V
    E, static electric field strength = 100 kV/m
    p = α*E
    W, energy = -p*E/2 = -5.5e-17 J
`},
		Run: perClaim(inducedHalf),
	}
}

func inducedHalf(p *check.Pass, c *claim) {
	if !isOf(c.sym.Facts, kind.Energy) || c.sym.Facts.Kind.Is(kind.Torque) || c.stat == kind.Average {
		return
	}
	ps := c.view.products(c.sym)
	if len(ps) != 1 || ps[0].pi != 0 || ps[0].crossed || new(big.Rat).Abs(ps[0].coef).Cmp(pow2(0)) != 0 || !inducedInField(p, ps[0]) {
		return
	}
	c.report(p, lang.Fault{
		Message: fmt.Sprintf("%s is 2.00 times the energy: the moment is induced by the field, and builds up with it", c.sym.Name),
		Detail:  "Put in the half. For a moment that is there without the field, declare a permanent electric dipole moment.",
		Fix:     &lang.Fix{Title: "Put in the half", Edits: []lang.Edit{insert(c.span().Start, "1/2*("), insert(c.span().End, ")")}},
	})
}

// inducedInField reports the product of an induced moment and a field, or of a
// polarizability and the square of a field.
func inducedInField(p *check.Pass, t *product) bool {
	fields := t.byRole[roleElectric]
	if len(fields) != 1 || !fields[0].Facts.Kind.Is(kind.ElectricFieldStrength) && !isOf(fields[0].Facts, kind.ElectricFieldStrength) {
		return false
	}
	field := fields[0]
	for _, f := range t.all {
		switch {
		case f.Key == field.Key:
		case isOf(f.Facts, kind.Polarizability):
			return field.Exp == two
		case isOf(f.Facts, kind.ElectricDipoleMoment):
			if f.Facts.Kind.Is(kind.PermanentElectricDipoleMoment) || f.Exp != field.Exp {
				return false
			}
			return f.Facts.Kind.Is(kind.InducedElectricDipoleMoment) || f.Symbol != nil && originsOf(p).reaches(f.Symbol.Stmt, func(s *lang.Symbol) bool {
				return isOf(s.Facts, kind.Polarizability)
			})
		}
	}
	return false
}
