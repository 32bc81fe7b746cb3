package rules

import (
	"fmt"
	"slices"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// GaussianFormInSI finds formulas of the Gaussian system with quantities of the
// SI in them.
func (Book) GaussianFormInSI() check.Rule {
	return check.Rule{
		Name:     "gaussian-form-in-si",
		Severity: lang.Error,
		Title:    "A formula of the Gaussian system stands in a note in SI quantities",
		Sees: "E²/8π, B²/8π, E·D/8π and B·H/8π as energy densities, c/4π·E×H as a power flux; D = E + 4πP, B = H + 4πM, ε_r or µ_r = 1 + 4πχ; Coulomb's law q₁q₂/r² and the potential q/r without 1/(4πε₀), " +
			"the capacitance A/4πd; 1/c in the Lorentz force, the induced field or the magnetic moment; H = 4πNI/l and 0.4πNI/l; a field strength or magnetization given in gauss, a flux density in oersted.",
		Silent: "For 4π in a solid angle, in 1/(4πε₀), in µ₀/4π and in 4π·10⁻⁷ H/m; for a value in a Gaussian unit of the right dimension, which is converted; " +
			"for 1 + 4πχ where χ is not declared as a susceptibility: a number from a table in cgs units is converted in this way.",
		Formula: "Not the units differ but the quantities: χ_SI = 4πχ_cgs, (E² + B²)/8π becomes ½ε₀E² + B²/2µ₀, D = E + 4πP becomes D = ε₀E + P, B = H + 4πM becomes B = µ₀(H + M), F = qv×B/c becomes F = qv×B.",
		Remedy:  "Convert the equation, not the numbers.",
		Source:  "Jackson, Classical Electrodynamics, 3rd ed., appendix on units and dimensions, table 3 (from memory)",
		Wrong: check.Example{Note: `    E, static electric field strength = 3 MV/m
    w, energy density = E^2/(8*pi) = 39.8 J/m^3
`},
		Right: check.Example{Note: `    E, static electric field strength = 3 MV/m
    w, energy density = 1/2*eps_0*E^2 = 39.8 J/m^3
`},
		Run: gaussianForm,
	}
}

func gaussianForm(p *check.Pass) error {
	for _, m := range mismatches(p) {
		if detail := gaussianMismatch(p.Note, m); detail != "" {
			p.Report(lang.Fault{
				Span:    m.span,
				Message: fmt.Sprintf("%s is made as in the Gaussian system: with quantities of the SI that is no %s", m.sym.Name, m.claim()),
				Detail:  detail,
			})
		}
	}
	for _, r := range refusals(p, "dimension-mismatch") {
		if b, ok := r.marked().(*lang.Binary); ok {
			if detail := gaussianSum(r, b); detail != "" {
				p.Report(r.explained(fmt.Sprintf("%s is a sum of the Gaussian system: in the SI its terms have unlike dimensions", r.text(b)), detail))
			}
		}
	}
	return perSpot(func(p *check.Pass, s *spot) {
		for _, c := range s.claims {
			gaussianClaim(p, c)
		}
	})(p)
}

// gaussianMismatch explains a dimension that does not hold as a formula of the
// Gaussian system; "" where it is none.
func gaussianMismatch(n *lang.Note, m mismatch) string {
	if detail := gaussianInput(m); detail != "" || m.sym.Input {
		return detail
	}
	ps := products(n.Normal(m.sym, atoms))
	if len(ps) == 0 {
		return ""
	}
	for _, g := range []func(mismatch, []*product) string{gaussianEnergy, withoutCoulomb, withLightSpeed, gaussianFlux} {
		if detail := g(m, ps); detail != "" {
			return detail
		}
	}
	return ""
}

// gaussianInput explains a literal in gauss or oersted of the wrong quantity.
func gaussianInput(m mismatch) string {
	l, ok := unparenthesized(m.x).(*lang.Literal)
	if !ok || l.Unit == nil || !hasSymbol(l.Unit.Text, "G") && !hasSymbol(l.Unit.Text, "Oe") {
		return ""
	}
	value := l.Num.Text + " " + l.Unit.Text
	switch {
	case m.kind.Is(kind.Magnetization) && m.factor() == kind.Permeability.Dim().Base():
		return fmt.Sprintf("In gauss it is 4πM that is given, which is µ₀M in tesla: write `%s / mu_0`, or declare a magnetic polarization.", value)
	case m.factor() == kind.Permeability.Dim().Base():
		return fmt.Sprintf("Gauss is a unit of the flux density; the numbers of B in gauss and of H in oersted agree in vacuum, the quantities do not: write `%s / mu_0`.", value)
	case m.factor() == unit.Dim{}.Div(kind.Permeability.Dim()).Base():
		return fmt.Sprintf("Oersted is a unit of the field strength: write `mu_0*(%s)`, with the relative permeability in a medium.", value)
	}
	return ""
}

// eachIs reports that every product has that power of π and a coefficient of one
// of the halvings 1/2ⁿ of it.
func eachIs(ps []*product, pi int, coefs ...[2]int64) bool {
	return !slices.ContainsFunc(ps, func(p *product) bool {
		return p.pi != pi || !slices.ContainsFunc(coefs, func(c [2]int64) bool { return p.is(c[0], c[1]) || p.is(-c[0], c[1]) })
	})
}

// gaussianEnergy explains E²/8π and B²/8π, times a volume or averaged.
func gaussianEnergy(m mismatch, ps []*product) string {
	if !eachIs(ps, -1, [2]int64{1, 4}, [2]int64{1, 8}, [2]int64{1, 16}) || !isEnergyDim(m.claims) {
		return ""
	}
	for _, p := range ps {
		if !p.only(roleElectric, roleMagnetic, roleCapacity, roleInduction, roleGeometry) {
			return ""
		}
	}
	switch m.factor() {
	case unit.Dim{}.Div(kind.Permittivity.Dim()).Base():
		return "The energy density of the field is `1/2*eps_0*E^2`, in a linear medium `1/2*E·D`."
	case kind.Permeability.Dim().Base():
		return "The energy density of the field is `B^2/(2*mu_0)`, in a linear medium `1/2*B·H`."
	}
	return ""
}

// withoutCoulomb explains q₁q₂/r², q/r², q/r, and the capacitance A/4πd.
func withoutCoulomb(m mismatch, ps []*product) string {
	switch m.factor() {
	case kind.Permittivity.Dim().Base():
		for _, p := range ps {
			if p.pi != 0 || len(p.byRole[roleCapacity]) > 0 || !p.only(roleElectric, roleGeometry) || p.degree[roleElectric].Sign() <= 0 || !allCharges(p) {
				return ""
			}
		}
		return "Coulomb's law has `1/(4*pi*eps_0)` before it in the SI, with eps_r in a medium."
	case unit.Dim{}.Div(kind.Permittivity.Dim()).Base():
		if m.claims.Base() == kind.Capacitance.Dim().Base() && eachIs(ps, -1, [2]int64{1, 4}) {
			return "The 1/4π of the Gaussian plate capacitor is eps_0 in the SI: write `eps_0*A/d`, with eps_r in a medium."
		}
	}
	return ""
}

// allCharges reports that what is electric in the product is charge.
func allCharges(p *product) bool {
	return !slices.ContainsFunc(p.byRole[roleElectric], func(f lang.Factor) bool {
		b := f.Facts.Dim.Base()
		return b != kind.ElectricCharge.Dim().Base() && b != kind.LineicElectricCharge.Dim().Base()
	})
}

// withLightSpeed explains 1/c and 1/c² before magnetic quantities.
func withLightSpeed(m mismatch, ps []*product) string {
	n := unit.Rat{}
	for _, p := range ps {
		e := lightSpeed(p)
		if e.Sign() >= 0 || n != (unit.Rat{}) && n != e {
			return ""
		}
		n = e
	}
	without := m.found.Dim.Div(kind.Speed.Dim().Pow(n)).Base()
	switch {
	case without == m.claims.Base():
		return "The 1/c belongs to the Gaussian system, where B has the dimension of E: leave c_0 out."
	case without.Div(m.claims.Base()) == unit.Dim{}.Div(kind.Permeability.Dim()).Base():
		return "The 1/c² of the Gaussian system is mu_0/(4*pi) in the SI."
	}
	return ""
}

// lightSpeed is the exponent of the speed of light in a product.
func lightSpeed(p *product) unit.Rat {
	for _, f := range p.all {
		if f.Symbol != nil && f.Symbol.Key == "c_0" {
			return f.Exp
		}
	}
	return unit.Rat{}
}

// gaussianFlux explains c/4π·E×H.
func gaussianFlux(m mismatch, ps []*product) string {
	if m.factor() != kind.Speed.Dim().Base() || m.claims.Base() != kind.PowerFluxDensity.Dim().Base() || !eachIs(ps, -1, [2]int64{1, 4}, [2]int64{1, 8}) {
		return ""
	}
	return "The power flux density is `E×H` in the SI, without c_0/(4*pi)."
}

// gaussianSum explains D = E + 4πP, B = H + 4πM, (E² + B²)/8π and E + v×B/c.
func gaussianSum(r refusal, b *lang.Binary) string {
	if b.Op != lang.OpAdd && b.Op != lang.OpSub {
		return ""
	}
	x, okX := products(r.note.StatementForm(r.stmt, b.X, atoms)), r.facts(b.X)
	y, okY := products(r.note.StatementForm(r.stmt, b.Y, atoms)), r.facts(b.Y)
	if len(x) == 0 || len(y) == 0 || !okX.Known || !okY.Known {
		return ""
	}
	last := y[len(y)-1]
	field := x[len(x)-1]
	between := okY.Dim.Div(okX.Dim).Base()
	four := last.pi == 1 && (last.is(4, 1) || last.is(-4, 1))
	switch {
	case four && between == kind.Permittivity.Dim().Base():
		return "In the SI D = eps_0*E + P: no 4π, and ε₀ before E."
	case four && between == unit.Dim{}.Div(kind.Permeability.Dim()).Base():
		return "In the SI H = B/mu_0 - M: no 4π, and µ₀ below B."
	case four && between == kind.Permeability.Dim().Base():
		return "In the SI B = mu_0*H + J with the polarization J, or mu_0*(H + M): no 4π, and µ₀ before H."
	case lightSpeed(last).Sign() < 0 && between.Mul(kind.Speed.Dim()).Base() == unit.Dim{}:
		return "The 1/c belongs to the Gaussian system: in the SI the force on a charge is q·(E + v×B)."
	case isSquare(field) && isSquare(last) && belowEightPi(r):
		return "In the SI the energy density is `1/2*eps_0*E^2 + B^2/(2*mu_0)`."
	}
	return ""
}

// isSquare reports a field squared and nothing else.
func isSquare(p *product) bool {
	return len(p.all) == 1 && p.all[0].Exp == two && isAmplitude(p.all[0].Facts)
}

// belowEightPi reports that the sum stands over a multiple of π.
func belowEightPi(r refusal) bool {
	for i := len(r.path) - 2; i >= 0; i-- {
		if b, ok := r.path[i].(*lang.Binary); ok && (b.Op == lang.OpDiv || b.Op == lang.OpMul) {
			for _, x := range []lang.Expr{b.X, b.Y} {
				f := r.note.StatementForm(r.stmt, x, lang.NamesStay)
				if t, single := f.Single(); single && t.Pi != 0 && len(t.Factors) == 0 {
					return true
				}
			}
		}
	}
	return false
}
