package rules

import (
	"fmt"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// PercentFraction finds per cent that are divided by a hundred once more, and
// fractions that are above what they can be.
func (Book) PercentFraction() check.Rule {
	return check.Rule{
		Name:     "percent-fraction",
		Severity: lang.Error,
		Title:    "A number of per cent stands for a fraction, or a fraction in per cent is divided by 100 again",
		Sees: "A value written in % (or a name of one) divided by 100 or multiplied by 0.01; an efficiency, a duty ratio, a coupling factor or the magnitude of a reflection coefficient above 1; " +
			"a loss factor above 1 of a medium that states a dielectric strength (a caution, as for 0.4 %, 40·10⁻⁴).",
		Silent:  "For values with their unit used as they are: % is 0.01; for a conversion into another unit (= … %); for the loss factor of a conducting medium.",
		Formula: "1 % = 0.01: the unit holds the hundredth. Loss factors are printed as 0.004, 0.4 %, 4·10⁻³ and 40 (in 10⁻⁴).",
		Remedy:  "Write the number with its unit: `tan_delta = 0.4 %`.",
		Source:  "ISO 80000-1:2022, 7.3.8 (per cent is the number 0.01; from memory)",
		Wrong: check.Example{Note: `    k = 5 %
    U, static voltage = 400 V
    ΔU, static voltage = U*k/100 = 0.2 V
`},
		Right: check.Example{Note: `    k = 5 %
    U, static voltage = 400 V
    ΔU, static voltage = U*k = 20 V
`},
		Run: perSpot(percentFraction),
	}
}

func percentFraction(p *check.Pass, s *spot) {
	lang.Walk(s.stmt.Tree, func(t lang.Tree) bool {
		if b, ok := t.(*lang.Binary); ok {
			hundredthTwice(p, s.stmt, b)
		}
		return true
	})
	for _, sym := range p.Note.Symbols {
		if sym.Stmt == s.stmt && sym.Def != nil {
			aboveOne(p, sym)
		}
	}
}

// hundredthTwice reports something in per cent over 100 or times 0.01.
func hundredthTwice(p *check.Pass, s *lang.Stmt, b *lang.Binary) {
	rest := b.X
	l, ok := unparenthesized(b.Y).(*lang.Literal)
	if !ok && b.Op == lang.OpMul {
		rest = b.Y
		l, ok = unparenthesized(b.X).(*lang.Literal)
	}
	hundredth := ok && l.Unit == nil && (b.Op == lang.OpDiv && l.Num.Value == 100 || b.Op == lang.OpMul && l.Num.Value == 0.01)
	if !hundredth {
		return
	}
	name := ""
	for _, x := range productFactors(rest) {
		if n := inPercent(p.Note, x); n != "" {
			name = n
		}
	}
	if name != "" {
		p.Report(lang.Fault{
			Span:    s.Abs(b),
			Message: fmt.Sprintf("%s is in %% already: this is 100 times too small", name),
			Detail:  "Leave the hundredth out: % is the unit 0.01.",
		})
	}
}

// inPercent names an operand that is written in per cent.
func inPercent(n *lang.Note, x lang.Expr) string {
	switch x := unparenthesized(x).(type) {
	case *lang.Literal:
		if x.Unit != nil && x.Unit.Text == "%" {
			return x.Num.Text + " %"
		}
	case *lang.Name:
		s := n.Lookup(lang.CanonicalName(x.Text))
		if s == nil || !s.Input || s.Def == nil || len(s.Def.Members) == 0 {
			return ""
		}
		if l, ok := s.Def.Members[0].(*lang.Literal); ok && l.Unit != nil && l.Unit.Text == "%" {
			return s.Name
		}
	}
	return ""
}

// aboveOne reports fractions above one.
func aboveOne(p *check.Pass, s *lang.Symbol) {
	x, ok := magnitude(s)
	if !ok || x <= 1+1e-9 || s.Facts.KindBy != lang.Declared && s.Owner == nil {
		return
	}
	k := s.Facts.Kind
	f := lang.Fault{Span: s.Stmt.Abs(s.Def.Members[0]), Message: fmt.Sprintf("%s is %s, and a fraction of this kind is at most 1", ownedName(s), s.Shown),
		Detail: "If it is in per cent, write the unit: `" + s.Name + " = … %`."}
	switch {
	case k.Is(kind.Efficiency), k.Is(kind.DutyRatio), k.Is(kind.CouplingFactor):
	case k.Is(kind.LossFactor) && insulates(p.Note, s):
		f.Severity = p.Lowered()
		f.Message = fmt.Sprintf("%s is %s, and this medium insulates", ownedName(s), s.Shown)
		f.Detail = "Loss factors are printed in per cent and in 10⁻⁴: write the unit, `tan_delta = 0.4 %`."
	default:
		return
	}
	p.Report(f)
}

// insulates reports a property of a medium with a dielectric strength.
func insulates(n *lang.Note, s *lang.Symbol) bool {
	m, ok := ownerMedium(n, s)
	return ok && m.propertyOf(n, kind.DielectricStrength) != nil
}
