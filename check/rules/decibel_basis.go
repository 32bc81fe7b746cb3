package rules

import (
	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// DecibelBasis finds ten logarithms of a ratio of fields and twenty logarithms
// of a ratio of powers.
func (Book) DecibelBasis() check.Rule {
	return check.Rule{
		Name:     "decibel-basis",
		Severity: lang.Error,
		Title:    "A level has 10·lg of a field quantity, or 20·lg of a power",
		Sees:     "10·log10 of a quotient of two field strengths, voltages, currents or flux densities; 20·log10 of a quotient of two powers, energies, power fluxes or absorption rates.",
		Silent:   "For 20·log10 of amplitudes and 10·log10 of powers; for a quotient of plain numbers of no known kind; for 10·log10 of squares of amplitudes.",
		Formula:  "L = 10·lg(P/P₀) = 20·lg(F/F₀) for equal impedances: twice the field is +6.02 dB, twice the power +3.01 dB.",
		Remedy:   "Take the other factor, or write the level with its unit and kind: `a, field ratio = E_1/E_2 = … dB`.",
		Source:   "ISO 80000-15 and IEC 60027-3 (levels of root-power and power quantities; from memory)",
		Wrong: check.Example{Note: `    E_1, rms electric field strength = 250 V/m
    E_2, rms electric field strength = 50 V/m
    A_s = 10*log10(E_1/E_2) = 6.99
`},
		Right: check.Example{Note: `    E_1, rms electric field strength = 250 V/m
    E_2, rms electric field strength = 50 V/m
    A_s = 20*log10(E_1/E_2) = 13.98
`},
		Run: perSpot(decibelBasis),
	}
}

func decibelBasis(p *check.Pass, s *spot) {
	lang.Walk(s.stmt.Tree, func(t lang.Tree) bool {
		b, ok := t.(*lang.Binary)
		if !ok || b.Op != lang.OpMul {
			return true
		}
		factor, call := logarithm(b.X, b.Y)
		if call == nil {
			factor, call = logarithm(b.Y, b.X)
		}
		if call == nil {
			return true
		}
		amplitudes, known := quotientOf(p.Note, s.stmt, call.Args[0])
		if !known || amplitudes == (factor == 20) {
			return true
		}
		p.Report(basisFault(s.stmt.Abs(b), amplitudes))
		return true
	})
}

func basisFault(at lang.Span, amplitudes bool) lang.Fault {
	if amplitudes {
		return lang.Fault{Span: at, Message: "10·lg of a quotient of amplitudes is half of the level in dB", Detail: "Take 20·log10: the power goes with the square."}
	}
	return lang.Fault{Span: at, Message: "20·lg of a quotient of powers is twice the level in dB", Detail: "Take 10·log10."}
}

// logarithm reads `10*log10(…)` or `20*log10(…)`.
func logarithm(x, y lang.Expr) (float64, *lang.Call) {
	l, ok := unparenthesized(x).(*lang.Literal)
	if !ok || l.Unit != nil || l.Num.Value != 10 && l.Num.Value != 20 {
		return 0, nil
	}
	c, ok := unparenthesized(y).(*lang.Call)
	if !ok || c.Fn.Text != "log10" || len(c.Args) != 1 {
		return 0, nil
	}
	return l.Num.Value, c
}

// quotientOf tells whether both sides of a quotient are amplitudes, or both
// powers; known is false for anything else.
func quotientOf(n *lang.Note, s *lang.Stmt, x lang.Expr) (amplitudes, known bool) {
	if name, ok := unparenthesized(x).(*lang.Name); ok {
		sym := n.Lookup(lang.CanonicalName(name.Text))
		if sym == nil || sym.Def == nil || sym.Input || len(sym.Def.Members) == 0 {
			return false, false
		}
		s, x = sym.Stmt, sym.Def.Members[0]
	}
	b, ok := unparenthesized(x).(*lang.Binary)
	if !ok || b.Op != lang.OpDiv {
		return false, false
	}
	above, ok1 := n.FactsOf(s, b.X)
	below, ok2 := n.FactsOf(s, b.Y)
	if !ok1 || !ok2 || !above.Known || !above.Dim.Compatible(below.Dim) {
		return false, false
	}
	for _, k := range []kind.ID{kind.ElectricFieldStrength, kind.Voltage, kind.ElectricCurrent, kind.MagneticFieldStrength, kind.MagneticFluxDensity} {
		if isOf(above, k) {
			return true, true
		}
	}
	for _, k := range []kind.ID{kind.Power, kind.Energy, kind.PowerFluxDensity, kind.SpecificAbsorptionRate, kind.PowerDensity} {
		if isOf(above, k) {
			return false, true
		}
	}
	return false, false
}
