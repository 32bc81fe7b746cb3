package rules

import (
	"fmt"
	"math"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// VacuumConstantSlip finds constants of the vacuum that are written by hand with
// a lost or wrong power of ten, without their unit, or in each other's place.
func (Book) VacuumConstantSlip() check.Rule {
	return check.Rule{
		Name:     "vacuum-constant-slip",
		Severity: lang.Error,
		Title:    "A constant of nature is written with a wrong power of ten, without its unit, or in the place of another",
		Sees: "A number in F/m, H/m, m/s, J/K or C, alone or in a formula, whose digits are those of ε₀ (8.85), µ₀ (1.26, 4π), c₀ (3.00, 2.998), k_B (1.38) or q_e (1.602) and whose power of ten is not: smaller than the constant, or larger by more than " +
			"any medium makes it (a caution where a medium could just have it, and for ten or a hundred times the constant inside a formula); a permittivity below that of the vacuum, a speed above that of light; the digits of a constant without its unit where just its dimension is missing; ε₀ and µ₀ exchanged.",
		Silent: "For the constants themselves, also rounded (8.85e-12 F/m, 3e8 m/s, 4π·10⁻⁷ H/m, 377 Ω, 120π Ω); for 8.854e-14 F/cm; for values that a relative permittivity of up to 500, or a relative permeability of up to 10⁵, explains, and for a larger permittivity that a medium states; " +
			"for speeds below 10⁷ m/s; for a phase speed, and for a permittivity in a harmonic note or a dispersive medium; for fewer than three digits.",
		Formula: "c₀²·ε₀·µ₀ = 1 with ε₀ = 8.8542e-12 F/m, µ₀ = 1.25664e-6 H/m, c₀ = 299 792 458 m/s; Z₀ = √(µ₀/ε₀) = 376.73 Ω.",
		Remedy:  "Use the built-in constants `eps_0`, `mu_0`, `c_0`, `k_B`, `q_e`.",
		Source:  "CODATA 2022 recommended values (NIST)",
		Wrong: check.Example{Note: `    ε_v, permittivity = 8.854e-14 F/m
    C, lineic capacitance = 2*ε_v = 1.771e-13 F/m
`},
		Right: check.Example{Note: `    ε_v, permittivity = 8.854e-14 F/cm
    C, lineic capacitance = 2*ε_v = 17.71 pF/m
`},
		Run: vacuumConstants,
	}
}

func vacuumConstants(p *check.Pass) error {
	for _, m := range mismatches(p) {
		if f, ok := exchanged(p.Note, m); ok {
			p.Report(f)
		} else if f, ok := unitless(p.Note, m); ok {
			p.Report(f)
		}
	}
	return perSpot(func(p *check.Pass, s *spot) {
		constantsIn(s.stmt.Tree, func(x lang.Expr, c constantNumber) bool {
			f, ok := powerSlip(p, s.stmt, x, c)
			if !ok {
				f, ok = beyondVacuum(p, s.stmt, x, c)
			}
			if ok {
				f.Span = s.stmt.Abs(x)
				p.Report(f)
			}
			return ok || theConstant(c) != nil
		})
		scattered(p, s.stmt)
	})(p)
}

// theConstant is the constant that a number is, in its unit and within the digits
// that are written.
func theConstant(c constantNumber) *vacuumValue {
	for i := range vacuumValues {
		v := &vacuumValues[i]
		if v.hasUnit(c.dim) && v.power(c) == 0 && v.digitsOf(c) {
			return v
		}
	}
	return nil
}

// powerSlip finds the digits of a constant with an impossible power of ten.
func powerSlip(p *check.Pass, s *lang.Stmt, x lang.Expr, c constantNumber) (lang.Fault, bool) {
	for i := range vacuumValues {
		v := &vacuumValues[i]
		if !v.hasUnit(c.dim) || !v.digitsOf(c) || c.digits < v.least {
			continue
		}
		n := v.power(c)
		above := n - v.to
		inFormula := n > 0 && above <= 0 && v.medium && wholeInput(p.Note, s, x) == nil
		if n >= v.from && above <= 0 && !inFormula || n < v.lowest || above > 0 && ofMedium(s, x) {
			continue
		}
		f := lang.Fault{
			Message: fmt.Sprintf("%s has the digits of %s and is %g times it", textAt(p.Note, s, x), v.name, math.Pow10(n)),
			Detail:  fmt.Sprintf("Write `%s`.", v.name),
			Fix:     &lang.Fix{Title: "Write " + v.name, Edits: []lang.Edit{{Span: s.Abs(x), New: v.name}}},
		}
		if v.name == "eps_0" && n == -2 {
			f.Detail += " 8.854e-14 is its value in F/cm."
		}
		if above == 1 && v.name != "k_B" || inFormula || v.name == "q_e" && n > 0 {
			f.Severity, f.Fix = p.Lowered(), nil
			f.Detail += " If it is another quantity that has this value (a medium's, a multiple), state it as the constant times a number."
		}
		return f, true
	}
	return lang.Fault{}, false
}

// scattered finds 4π·10⁷ H/m whose factors stand apart in a product: N^2*4*pi*A*1e7 H/m.
func scattered(p *check.Pass, s *lang.Stmt) {
	lang.Walk(s.Tree, func(t lang.Tree) bool {
		b, ok := t.(*lang.Binary)
		if !ok || b.Op != lang.OpMul && b.Op != lang.OpDiv {
			return true
		}
		four, pi, unit := false, false, (*lang.Literal)(nil)
		above(b, func(x lang.Expr) {
			switch x := x.(type) {
			case *lang.Name:
				pi = pi || lang.CanonicalName(x.Text) == "pi"
			case *lang.Literal:
				four = four || x.Unit == nil && x.Num.Value == 4
				if x.Unit != nil {
					unit = x
				}
			}
		})
		if _, whole := constantOf(b); whole || !four || !pi || unit == nil {
			return false
		}
		c, ok := constantLiteral(unit)
		mu := &vacuumValues[1]
		c.value *= 4 * math.Pi
		if n := mu.power(c); ok && mu.hasUnit(c.dim) && mu.digitsOf(c) && n != 0 && !adjacent(b) {
			p.Report(lang.Fault{
				Span:    s.Abs(unit),
				Message: fmt.Sprintf("4π times %s is %g times mu_0", textAt(p.Note, s, unit), math.Pow10(n)),
				Detail:  "Write `mu_0` for the three factors; they are 4*pi*1e-7 H/m.",
			})
		}
		return false
	})
}

// above visits the factors above the line of a product.
func above(x lang.Expr, visit func(lang.Expr)) {
	x = unparenthesized(x)
	b, ok := x.(*lang.Binary)
	switch {
	case ok && b.Op == lang.OpMul:
		above(b.X, visit)
		above(b.Y, visit)
	case ok && b.Op == lang.OpDiv:
		above(b.X, visit)
	default:
		visit(x)
	}
}

// adjacent reports that the constant factors stand together, so that they are
// judged as one number.
func adjacent(b *lang.Binary) bool {
	found := false
	constantsIn(b, func(_ lang.Expr, c constantNumber) bool {
		found = found || c.dim.Base() == kind.Permeability.Dim().Base() && vacuumValues[1].digitsOf(c)
		return found
	})
	return found
}

// ofMedium reports that the number is a property's whole value: the medium
// answers for it.
func ofMedium(s *lang.Stmt, x lang.Expr) bool {
	m, ok := s.Tree.(*lang.Medium)
	if !ok {
		return false
	}
	for _, d := range m.Properties {
		if len(d.Members) > 0 && d.Members[0] == x {
			return true
		}
	}
	return false
}

// beyondVacuum finds a permittivity below that of the vacuum, and a speed above
// that of light.
func beyondVacuum(p *check.Pass, s *lang.Stmt, x lang.Expr, c constantNumber) (lang.Fault, bool) {
	sym := wholeInput(p.Note, s, x)
	if sym == nil || c.value <= 0 || c.digits < 3 {
		return lang.Fault{}, false
	}
	switch {
	case c.dim.Base() == kind.Permittivity.Dim().Base() && !sym.Facts.Kind.Is(kind.LineicCapacitance) && sym.Facts.KindBy == lang.Declared &&
		c.value*(1+c.relative) < 0.999*vacuumValues[0].value && c.value > 0.1*vacuumValues[0].value && !mayDisperse(p.Note, sym):
		return lang.Fault{
			Message: fmt.Sprintf("%s is below the permittivity of the vacuum, %.4g times it", textAt(p.Note, s, x), c.value/vacuumValues[0].value),
			Detail:  "No static permittivity is: look for transposed digits, or write `eps_0`.",
		}, true
	case c.dim.Base() == kind.Speed.Dim().Base() && !sym.Facts.Kind.Is(kind.PhaseSpeed) && c.value*(1-c.relative) > 1.001*vacuumValues[2].value:
		return lang.Fault{
			Message: fmt.Sprintf("%s is above the speed of light, %.4g times it", textAt(p.Note, s, x), c.value/vacuumValues[2].value),
			Detail:  "Look for a prefix or a unit (km/s); a phase speed may be above it: declare it as one.",
		}, true
	}
	return lang.Fault{}, false
}

// wholeInput is the name of which the number is the value, nil where it is a part
// of a formula.
func wholeInput(n *lang.Note, s *lang.Stmt, x lang.Expr) *lang.Symbol {
	for _, d := range definitionsIn(s) {
		if len(d.Members) == 0 || d.Members[0] != x {
			continue
		}
		key := lang.CanonicalName(d.Name.Text)
		if m, ok := s.Tree.(*lang.Medium); ok {
			key = lang.CanonicalName(m.Name.Text) + "." + key
		}
		if sym := n.Lookup(key); sym != nil && sym.Stmt == s {
			return sym
		}
	}
	return nil
}

// definitionsIn are the definition that a statement is, or a medium's properties.
func definitionsIn(s *lang.Stmt) []*lang.Definition {
	switch t := s.Tree.(type) {
	case *lang.Definition:
		return []*lang.Definition{t}
	case *lang.Medium:
		return t.Properties
	}
	return nil
}

// mayDisperse reports a permittivity that may be below that of the vacuum.
func mayDisperse(n *lang.Note, s *lang.Symbol) bool {
	if word, _ := n.Regime(s); word == "harmonic" || word == "transient" {
		return true
	}
	m, ok := ownerMedium(n, s)
	return ok && m.says("dispersive")
}

// textAt is an expression of a statement as written.
func textAt(n *lang.Note, s *lang.Stmt, x lang.Expr) string {
	at := s.Abs(x)
	return n.Script.Source.Text[at.Start:at.End]
}

// unitless explains a dimension that lacks just one constant, whose digits stand
// in the formula without a unit.
func unitless(n *lang.Note, m mismatch) (lang.Fault, bool) {
	var f lang.Fault
	found := false
	look := func(s *lang.Symbol) {
		constantsIn(s.Def.Members[0], func(x lang.Expr, c constantNumber) bool {
			for i := range vacuumValues {
				v := &vacuumValues[i]
				if found || !c.dim.IsOne() || c.digits < v.least || !v.digitsOf(c) || isSmallNumber(x) || !v.lacks(m) {
					continue
				}
				found = true
				f = lang.Fault{
					Span:    m.span,
					Message: fmt.Sprintf("%s lacks just the dimension of %s, and %s has the digits of that constant without its unit", m.sym.Name, v.name, textAt(n, s.Stmt, x)),
					Detail:  fmt.Sprintf("Write `%s` in its place: with units no conversion factor is needed either.", v.name),
				}
				if s != m.sym && s.Path == "" {
					f.Related = []lang.Related{{Span: s.Span, Message: s.Name + " is a plain number"}}
				}
			}
			return found
		})
	}
	look(m.sym)
	for _, s := range plainNamesIn(n, m.sym) {
		look(s)
	}
	return f, found
}

// isSmallNumber reports a number such as 3, which has the digits of c_0 by chance.
func isSmallNumber(x lang.Expr) bool {
	l, ok := unparenthesized(x).(*lang.Literal)
	return ok && exactNumeral(l)
}

// plainNamesIn are the names of plain numbers in a definition.
func plainNamesIn(n *lang.Note, s *lang.Symbol) []*lang.Symbol {
	var out []*lang.Symbol
	lang.Walk(s.Def.Members[0], func(t lang.Tree) bool {
		if name, ok := t.(*lang.Name); ok {
			if sym := n.Lookup(lang.CanonicalName(name.Text)); sym != nil && sym.Input && sym.Stmt != nil && sym.Def != nil && len(sym.Def.Members) > 0 && sym.Facts.Dim == (unit.Dim{}) {
				out = append(out, sym)
			}
		}
		return true
	})
	return out
}

// exchanged explains ε in the place of µ, or the reverse.
func exchanged(n *lang.Note, m mismatch) (lang.Fault, bool) {
	ohm := kind.Impedance.Dim().Base()
	swap := false
	for _, k := range []int{-4, -2, -1, 1, 2, 4} {
		swap = swap || m.factor() == ohm.Pow(unit.Whole(k)).Base()
	}
	form := n.Form(m.sym, m.x, atoms)
	if !swap || form == nil || m.sym.Input {
		return lang.Fault{}, false
	}
	for _, t := range form.Terms {
		for _, f := range t.Factors {
			eps, mu := f.Facts.Kind.Is(kind.Permittivity), f.Facts.Kind.Is(kind.Permeability)
			if !eps && !mu {
				continue
			}
			is, other := "permittivity", "permeability"
			if mu {
				is, other = other, is
			}
			return lang.Fault{
				Span:    m.span,
				Message: fmt.Sprintf("%s is off by a power of the ohm: %s is the %s, and the formula may want the %s in its place", m.sym.Name, spelled(f), is, other),
				Detail:  "Electric energies go with ε, magnetic ones with µ; c = 1/√(εµ) and Z = √(µ/ε). The alternative: E stands for H, or the reverse.",
			}, true
		}
	}
	return lang.Fault{}, false
}
