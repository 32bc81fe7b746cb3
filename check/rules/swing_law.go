package rules

import (
	"fmt"
	"math"
	"math/big"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file finds swings under a loss law, p = k·f^α·(B/1 T)^β.

// law is a swing under a power.
type law struct {
	swing *lang.Symbol
	exp   float64 // 0 where it is not known
}

// swingInLaw finds a swing in the loss law of a power.
func (c *claim) swingInLaw(p *check.Pass) bool {
	if c.sym.Facts.Kind.Info().Class != kind.ClassPower {
		return false
	}
	l, ok := c.lawInForm()
	if !ok {
		l, ok = c.lawInTree()
	}
	if !ok {
		return false
	}
	f := lang.Fault{
		Message: fmt.Sprintf("the loss law takes the amplitude, and %s is the swing, twice as much", l.swing.Name),
		Detail:  fmt.Sprintf("Put half of it in, or a name of its own: `B_a, peak … = %s/2`. If the law was fitted to swings, refer it to one: `B_0, peak-to-peak %s = 1 T` and `(%s/B_0)^β`.", l.swing.Name, l.swing.Facts.Kind, l.swing.Name),
		Related: c.because([]lang.Factor{{Symbol: l.swing}}, func(s *lang.Symbol) string { return s.Name + " is a peak-to-peak value" }),
	}
	if l.exp > 0 {
		f.Message = fmt.Sprintf("%s is %.3g times too large: the loss law takes the amplitude, and %s is the swing, twice as much", c.sym.Name, math.Exp2(l.exp), l.swing.Name)
	}
	if edit, ok := c.halve(l.swing); ok {
		f.Fix = &lang.Fix{Title: "Halve the swing", Edits: []lang.Edit{edit}}
	}
	c.report(p, f)
	return true
}

// halve puts half of a name in its place, where it stands once in the claim.
func (c *claim) halve(s *lang.Symbol) (lang.Edit, bool) {
	var at []*lang.Name
	lang.Walk(c.x, func(t lang.Tree) bool {
		if n, ok := t.(*lang.Name); ok && lang.CanonicalName(n.Text) == s.Key {
			at = append(at, n)
		}
		return true
	})
	if len(at) != 1 {
		return lang.Edit{}, false
	}
	return lang.Edit{Span: c.sym.Stmt.Abs(at[0]), New: "(" + at[0].Text + "/2)"}, true
}

// lawInForm finds a swing that a literal of its dimension refers to, with an
// exponent of which a law is made.
func (c *claim) lawInForm() (law, bool) {
	for _, p := range c.view.products(c.sym) {
		if p.root2 != (unit.Rat{}) {
			continue // (ΔB/2)^β
		}
		for _, f := range p.all {
			if _, whole := f.Exp.Int(); whole || f.Symbol == nil || !isAmplitude(f.Facts) || f.Exp.Float64() < 1 || statOf(c.note, f) != kind.PeakToPeak {
				continue // below a whole exponent a half could hide in the coefficient
			}
			for _, g := range p.all {
				if g.Literal && g.Exp == f.Exp.Neg() && g.Facts.Dim.Base() == f.Facts.Dim.Base() {
					return law{f.Symbol, f.Exp.Float64()}, true
				}
			}
		}
	}
	return law{}, false
}

// lawInTree finds a swing under an exponent that has a name, here or in a
// function that it is handed to.
func (c *claim) lawInTree() (found law, ok bool) {
	lang.Walk(c.x, func(t lang.Tree) bool {
		switch t := t.(type) {
		case *lang.Binary:
			if s := c.referred(t.X); t.Op == lang.OpPow && s != nil {
				found, ok = law{s, c.numberOf(t.Y)}, true
			}
		case *lang.Call:
			if s := c.handedOver(t); s != nil {
				found, ok = law{s, 0}, true
			}
		}
		return !ok
	})
	return found, ok
}

// referred gives the swing in a quotient of it and a literal.
func (c *claim) referred(x lang.Expr) *lang.Symbol {
	t, single := c.note.StatementForm(c.sym.Stmt, x, atoms).Single()
	if !single || t.Coef.Cmp(big.NewRat(1, 1)) != 0 {
		return nil
	}
	var swing *lang.Symbol
	literal := false
	for _, f := range t.Factors {
		if _, root := rootOf(f); root {
			return nil
		}
		if f.Literal && f.Exp == unit.Whole(-1) {
			literal = true
		} else if f.Symbol != nil && f.Exp == unit.Whole(1) && isAmplitude(f.Facts) && statOf(c.note, f) == kind.PeakToPeak {
			swing = f.Symbol
		}
	}
	if !literal {
		return nil
	}
	return swing
}

// numberOf is the value of a named or written number; 0 where it has none.
func (c *claim) numberOf(x lang.Expr) float64 {
	switch x := unparen(x).(type) {
	case *lang.Literal:
		return x.Num.Value
	case *lang.Name:
		if s := c.note.Lookup(lang.CanonicalName(x.Text)); s != nil && s.Result.Known {
			return s.Value.Re()
		}
	}
	return 0
}

// handedOver gives the swing that a call hands to a function of the note which
// raises it to a power.
func (c *claim) handedOver(call *lang.Call) *lang.Symbol {
	fn := c.note.Lookup(lang.CanonicalName(call.Fn.Text))
	if fn == nil || fn.Role != lang.RoleFunction || fn.Def == nil || len(fn.Def.Members) == 0 || len(fn.Def.Params) != len(call.Args) {
		return nil
	}
	for i, a := range call.Args {
		t, single := c.note.StatementForm(c.sym.Stmt, a, lang.NamesStay).Single()
		if !single || len(t.Factors) != 1 || t.Factors[0].Symbol == nil || t.Coef.Cmp(big.NewRat(1, 1)) != 0 {
			continue
		}
		f := t.Factors[0]
		if isAmplitude(f.Facts) && statOf(c.note, f) == kind.PeakToPeak && raises(fn.Def, fn.Def.Params[i].Text) {
			return f.Symbol
		}
	}
	return nil
}

// raises reports that a function raises a parameter to a power.
func raises(d *lang.Definition, param string) bool {
	found := false
	lang.Walk(d.Members[0], func(t lang.Tree) bool {
		if b, ok := t.(*lang.Binary); ok && b.Op == lang.OpPow {
			lang.Walk(b.X, func(u lang.Tree) bool {
				n, ok := u.(*lang.Name)
				found = found || ok && lang.CanonicalName(n.Text) == lang.CanonicalName(param)
				return !found
			})
		}
		return !found
	})
	return found
}
