package rules

import (
	"fmt"
	"math"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// VacuumConstantSlip finds constants of the vacuum that are written by hand with
// a lost or wrong power of ten.
func (Book) VacuumConstantSlip() check.Rule {
	return check.Rule{
		Name:     "vacuum-constant-slip",
		Severity: lang.Error,
		Title:    "A constant of the vacuum is written with a wrong power of ten",
		Sees: "An input in F/m, H/m, m/s or J/K whose digits are those of ε₀ (8.85), µ₀ (1.26, 4π), c₀ (3.00, 2.998) or k_B (1.38) and whose power of ten is not: smaller than the constant, or larger by more than " +
			"any medium makes it. A caution where a medium could just have it.",
		Silent:  "For the constants themselves, also rounded (8.85e-12 F/m, 3e8 m/s, 4π·10⁻⁷ H/m, 377 Ω); for 8.854e-14 F/cm; for values that a relative permittivity of up to 500, or a relative permeability of up to 10⁵, explains; for speeds below 10⁷ m/s.",
		Formula: "c₀²·ε₀·µ₀ = 1 with ε₀ = 8.8542e-12 F/m, µ₀ = 1.25664e-6 H/m, c₀ = 299 792 458 m/s.",
		Remedy:  "Use the built-in constants `eps_0`, `mu_0`, `c_0`, `k_B`.",
		Source:  "CODATA 2022 recommended values (NIST)",
		Wrong: check.Example{Note: `    ε_v, permittivity = 8.854e-14 F/m
    C, lineic capacitance = 2*ε_v = 1.771e-13 F/m
`},
		Right: check.Example{Note: `    ε_v, permittivity = 8.854e-14 F/cm
    C, lineic capacitance = 2*ε_v = 17.71 pF/m
`},
		Run: perSpot(vacuumConstant),
	}
}

// digitsOf are constants with the least and the greatest power of ten that
// something other than a slip gives them.
var constantDigits = []struct {
	name      string
	kind      kind.ID
	from, to  int // powers of ten above the constant that are plausible
	tolerance float64
}{
	{"eps_0", kind.Permittivity, 0, 2, 1e-3},
	{"mu_0", kind.Permeability, 0, 5, 1e-3},
	{"c_0", kind.Speed, -100, 0, 1e-3},
}

func vacuumConstant(p *check.Pass, s *spot) {
	d, ok := s.stmt.Tree.(*lang.Definition)
	if !ok || len(d.Members) == 0 {
		return
	}
	sym := p.Note.Lookup(lang.CanonicalName(d.Name.Text))
	if sym == nil || sym.Stmt != s.stmt || !isConstantNumber(d.Members[0]) || !sym.Known || sym.Value.Len() != 1 || !sym.Value.IsReal() {
		return
	}
	x := math.Abs(sym.Value.Re())
	for _, k := range constantDigits {
		c := p.Note.Lookup(k.name)
		if c == nil || !isOf(sym.Facts, k.kind) || x == 0 {
			continue
		}
		n := int(math.Round(math.Log10(x / c.Value.Re())))
		if math.Abs(x/c.Value.Re()/math.Pow(10, float64(n))-1) > k.tolerance || n >= k.from && n <= k.to {
			continue
		}
		f := lang.Fault{
			Span:    s.stmt.Abs(d.Members[0]),
			Message: fmt.Sprintf("%s has the digits of %s and is 1e%d times it", sym.Name, k.name, n),
			Detail:  fmt.Sprintf("Write `%s`, or mind the unit: 8.854e-14 is in F/cm.", k.name),
		}
		if n == k.to+1 {
			f.Severity = p.Lowered()
			f.Detail += " If a medium has this value, state it as a relative one in the medium."
		}
		p.Report(f)
		return
	}
}

// isConstantNumber reports a literal, or a product of literals and pi.
func isConstantNumber(x lang.Expr) bool {
	switch x := x.(type) {
	case *lang.Literal:
		return true
	case *lang.Name:
		return lang.CanonicalName(x.Text) == "pi"
	case *lang.Paren:
		return isConstantNumber(x.X)
	case *lang.Binary:
		return isConstantNumber(x.X) && isConstantNumber(x.Y)
	case *lang.Unary:
		return isConstantNumber(x.X)
	}
	return false
}
