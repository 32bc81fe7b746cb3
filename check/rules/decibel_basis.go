package rules

import (
	"fmt"
	"math/big"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// DecibelBasis finds ten logarithms of a ratio of fields and twenty logarithms
// of a ratio of powers, there and back, and levels that are added or multiplied
// as what they are not.
func (Book) DecibelBasis() check.Rule {
	return check.Rule{
		Name:     "decibel-basis",
		Severity: lang.Error,
		Title:    "A level has 10·lg of a field quantity or 20·lg of a power, or is added as what it is not",
		Sees: "10·log10 of a ratio of field strengths, voltages, currents or flux densities, 20·log10 of a ratio of powers, energies, power fluxes or absorption rates, also through names; a field times 10^(L/10), a power times 10^(L/20); " +
			"a sum or difference of two ratios written in dB, which adds the ratios (a caution for the sum of two names: signal-to-noise ratios of several receivers do add), a number times a ratio written in dB; " +
			"two levels over references that are added (a caution where they are averaged).",
		Silent: "For 20·log10 of amplitudes and 10·log10 of powers; for a ratio of quantities of no known kind, of lengths or frequencies; for 10·log10 of squares of amplitudes, U²/R over a power; " +
			"for a level plus a gain; for dB/m times a length; for a sum of powers in dBm.",
		Formula: "L = 10·lg(P/P₀) = 20·lg(F/F₀) for equal impedances: twice the field is +6.02 dB, twice the power +3.01 dB; in a chain gains multiply and their levels add.",
		Remedy:  "Take the other factor, or write the level with its unit and kind: `a, field ratio = E_1/E_2 = … dB`; multiply what is written in dB.",
		Source:  "ISO 80000-15 and IEC 60027-3 (levels of root-power and power quantities; from memory)",
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
	l := leveller{p, s.stmt}
	l.products(s.stmt.Tree, false)
	lang.Walk(s.stmt.Tree, func(t lang.Tree) bool {
		if b, ok := t.(*lang.Binary); ok {
			l.ratios(b)
		}
		return true
	})
	for _, c := range s.claims {
		l.sumOfLevels(c)
		l.back(c)
	}
}

// leveller looks at the levels of one statement.
type leveller struct {
	p    *check.Pass
	stmt *lang.Stmt
}

func (l leveller) text(x lang.Expr) string { return textAt(l.p.Note, l.stmt, x) }

// products visits the products of the tree that stand in no other product.
func (l leveller) products(t lang.Tree, within bool) {
	b, ok := t.(*lang.Binary)
	product := ok && (b.Op == lang.OpMul || b.Op == lang.OpDiv)
	if product && !within {
		l.basis(b)
	}
	_, paren := t.(*lang.Paren)
	for _, c := range lang.Children(t) {
		l.products(c, product || paren && within)
	}
}

// basis judges 10·log10 and 20·log10.
func (l leveller) basis(b *lang.Binary) {
	t, single := l.p.Note.StatementForm(l.stmt, b, atoms).Single()
	if !single || len(t.Factors) != 1 || t.Factors[0].Call != "log10" || t.Factors[0].Exp != unit.Whole(1) || t.Pi != 0 {
		return
	}
	coef := new(big.Rat).Abs(t.Coef)
	ten, twenty := coef.Cmp(big.NewRat(10, 1)) == 0, coef.Cmp(big.NewRat(20, 1)) == 0
	order := orderOf(t.Factors[0].Inside)
	var f lang.Fault
	right := ""
	switch {
	case ten && order == 1:
		f, right = lang.Fault{Message: "10·lg of a ratio of amplitudes is half of the level in dB", Detail: "Take 20·log10: the power goes with the square."}, "20"
	case twenty && order == 2:
		f, right = lang.Fault{Message: "20·lg of a ratio of powers is twice the level in dB", Detail: "Take 10·log10."}, "10"
	default:
		return
	}
	f.Span = l.stmt.Abs(b)
	above(b, func(x lang.Expr) {
		if lit, ok := x.(*lang.Literal); ok && lit.Unit == nil && (lit.Num.Value == 10 || lit.Num.Value == 20) {
			f.Fix = &lang.Fix{Title: "Take " + right + "·log10", Edits: []lang.Edit{{Span: l.stmt.Abs(lit), New: right}}}
		}
	})
	l.p.Report(f)
}

// orderOf is 1 for a ratio of amplitudes, 2 for one of powers or of squares of
// amplitudes; 0 where that is not known.
func orderOf(f *lang.Form) int {
	t, single := f.Single()
	if !single {
		return 0
	}
	above, below := unit.Rat{}, unit.Rat{}
	for _, x := range t.Factors {
		w, ok := orderOfQuantity(x.Facts)
		if !ok {
			return 0
		}
		part := unit.Whole(w).Mul(x.Exp)
		if part.Sign() > 0 {
			above = above.Add(part)
		} else {
			below = below.Add(part.Neg())
		}
	}
	if below != above && below != (unit.Rat{}) {
		return 0
	}
	n, whole := above.Int()
	if !whole || n > 2 {
		return 0
	}
	return n
}

// orderOfQuantity is 1 for amplitudes, 2 for powers and energies, 0 for what
// links the two or has nothing to do with them; false for what is not known.
func orderOfQuantity(f lang.Facts) (int, bool) {
	if !f.Known {
		return 0, false
	}
	if f.Dim.IsOne() {
		switch {
		case f.Kind == 0 || f.KindBy != lang.Declared:
			return 0, f.Kind == 0 && f.KindBy == lang.Unknown && f.Dim[unit.Angle] != (unit.Rat{})
		case f.Kind.Info().Class == kind.ClassAmplitude:
			return 1, true
		case f.Kind.Info().Class == kind.ClassPower:
			return 2, true
		}
		return 0, false
	}
	for _, k := range []kind.ID{kind.ElectricFieldStrength, kind.Voltage, kind.ElectricCurrent, kind.MagneticFieldStrength, kind.MagneticFluxDensity} {
		if isOf(f, k) {
			return 1, true
		}
	}
	for _, k := range []kind.ID{kind.Power, kind.Energy, kind.EnergyDensity, kind.PowerFluxDensity, kind.SpecificAbsorptionRate, kind.PowerDensity} {
		if isOf(f, k) {
			return 2, true
		}
	}
	r := roleOf(f)
	return 0, r == roleResistive || r == roleGeometry || r == roleFrequency
}

// ratios judges sums and multiples of ratios that are written in dB.
func (l leveller) ratios(b *lang.Binary) {
	x, y := l.inDecibels(b.X), l.inDecibels(b.Y)
	switch {
	case (b.Op == lang.OpAdd || b.Op == lang.OpSub) && x != notLevel && y != notLevel:
		op, verb := "*", "added"
		if b.Op == lang.OpSub {
			op, verb = "/", "subtracted"
		}
		f := lang.Fault{
			Span:    l.stmt.Abs(b),
			Message: fmt.Sprintf("%s and %s are ratios written in dB, and the ratios are %s, not the levels", l.text(b.X), l.text(b.Y), verb),
			Detail:  fmt.Sprintf("In a chain write `%s%s%s`: the levels are then %s.", operandBelow(l.text(b.X)), op, operandBelow(l.text(b.Y)), verb),
		}
		if x == nameLevel && y == nameLevel && b.Op == lang.OpAdd {
			f.Severity = l.p.Lowered()
			f.Detail += " Ratios that do add are signal-to-noise ratios of several receivers, or shares of one power."
		}
		if b.OpSpan.Len() > 0 {
			f.Fix = &lang.Fix{Title: "Write " + op, Edits: []lang.Edit{{Span: b.OpSpan.Shift(l.stmt.At), New: op}}}
		}
		l.p.Report(f)
	case b.Op == lang.OpMul && (x == literalLevel && isPlainNumber(b.Y) || y == literalLevel && isPlainNumber(b.X)):
		n, level := b.X, b.Y
		if x == literalLevel {
			n, level = b.Y, b.X
		}
		l.p.Report(lang.Fault{
			Span:    l.stmt.Abs(b),
			Message: fmt.Sprintf("%s times %s multiplies the ratio, not the level", l.text(n), l.text(level)),
			Detail:  fmt.Sprintf("For that many in a chain write `(%s)^%s`.", l.text(level), l.text(n)),
		})
	}
}

func isPlainNumber(x lang.Expr) bool {
	c, ok := constantOf(x)
	return ok && c.dim == (unit.Dim{}) && c.digits > 0
}

// levelAs tells how a ratio in dB is written.
type levelAs uint8

const (
	notLevel levelAs = iota
	literalLevel
	nameLevel
)

// inDecibels tells whether an operand is a ratio that is written in dB.
func (l leveller) inDecibels(x lang.Expr) levelAs {
	ratio := func(phrase string) bool {
		u, err := unit.Parse(phrase)
		return err == nil && u.Level != nil && u.Dim.IsOne()
	}
	switch x := unparenthesized(x).(type) {
	case *lang.Literal:
		if x.Unit != nil && ratio(x.Unit.Text) {
			return literalLevel
		}
	case *lang.Name:
		if s := l.p.Note.Lookup(lang.CanonicalName(x.Text)); s != nil && s.Role == lang.RoleQuantity && s.Result.Known && s.Result.Unit.Level != nil && s.Result.Unit.Dim.IsOne() {
			return nameLevel
		}
	}
	return notLevel
}
