package rules

import (
	"fmt"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file finds offsets and temperature coefficients in expressions: for rule
// temperature-offset.

// thermometer looks at the expressions of one statement.
type thermometer struct {
	p    *check.Pass
	stmt *lang.Stmt
}

func (t thermometer) facts(x lang.Expr) lang.Facts {
	f, _ := t.p.Note.FactsOf(t.stmt, x)
	return f
}

func (t thermometer) text(x lang.Expr) string { return textAt(t.p.Note, t.stmt, x) }

// offset finds 273.15 K on a difference, or on what is in kelvin already.
func (t thermometer) offset(b *lang.Binary) {
	if b.Op != lang.OpAdd {
		return
	}
	x, zero := b.X, b.Y
	if !isIcePoint(zero) {
		x, zero = b.Y, b.X
	}
	if !isIcePoint(zero) {
		return
	}
	f := t.facts(x)
	switch {
	case isTemperature(f):
		t.p.Report(lang.Fault{
			Span:    t.stmt.Abs(b),
			Message: fmt.Sprintf("%s is added to %s, which counts from absolute zero already", t.text(zero), t.text(x)),
			Detail:  fmt.Sprintf("Leave it out: a temperature in °C is converted when it is read. To show it in kelvin, end with `= __ K`. Write `%s`.", t.text(x)),
			Fix:     &lang.Fix{Title: "Leave 273.15 K out", Edits: []lang.Edit{{Span: t.stmt.Abs(b), New: t.text(x)}}},
		})
	case isRise(f):
		out := lang.Fault{
			Span:    t.stmt.Abs(b),
			Message: fmt.Sprintf("%s is added to %s, which is a difference: a difference has no zero to shift", t.text(zero), t.text(x)),
			Detail:  "ΔT in K is Δt in °C: leave it out.",
		}
		if d, ok := t.stmt.Tree.(*lang.Definition); ok && len(d.Members) > 0 && unparenthesized(d.Members[0]) == lang.Expr(b) {
			if s := t.p.Note.Lookup(lang.CanonicalName(d.Name.Text)); s != nil && s.Facts.KindBy == lang.Declared && s.Facts.Kind.Is(kind.Temperature) {
				out.Severity = t.p.Lowered()
				out.Detail += fmt.Sprintf(" If %s is a temperature in °C, declare it so: `%s, temperature`.", t.text(x), t.text(x))
			}
		}
		t.p.Report(out)
	}
}

// fromIcePoint reports T − 273.15 K, the difference to 0 °C.
func fromIcePoint(x lang.Expr) bool {
	b, ok := unparenthesized(x).(*lang.Binary)
	return ok && b.Op == lang.OpSub && isIcePoint(b.Y)
}

// isIcePoint reports 273.15 K as written, also rounded.
func isIcePoint(x lang.Expr) bool {
	l, ok := unparenthesized(x).(*lang.Literal)
	return ok && l.Unit != nil && l.Unit.Text == "K" && (l.Num.Value == 273.15 || l.Num.Value == 273.2 || l.Num.Value == 273)
}

// compared finds a rise held against an absolute temperature.
func (t thermometer) compared(r *lang.Relation) {
	for i := range r.Ops {
		x, y := r.Terms[i], r.Terms[i+1]
		fx, fy := t.facts(x), t.facts(y)
		if isRise(fy) && isTemperature(fx) {
			x, y, fx, fy = y, x, fy, fx
		}
		if !isRise(fx) || !isTemperature(fy) {
			continue
		}
		f := lang.Fault{
			Span:    t.stmt.Abs(r),
			Message: fmt.Sprintf("%s is a rise and %s an absolute temperature: 273.15 K lie between their scales", t.text(x), t.text(y)),
			Detail:  "Compare a rise with a difference in kelvin, or add the temperature from which it rises.",
		}
		if l, ok := unparenthesized(y).(*lang.Literal); ok && l.Unit != nil {
			f.Detail = fmt.Sprintf("If the limit is one of the rise, write `%s K`.", l.Num.Text)
			if fy.Absolute {
				f.Fix = inKelvin(t.stmt, l)
			}
		}
		t.p.Report(f)
		return
	}
}

// coefficients finds a temperature coefficient times an absolute temperature;
// sum is the sum in which the product stands, nil for none.
func (t thermometer) coefficients(x lang.Tree, sum lang.Tree) {
	if b, ok := x.(*lang.Binary); ok {
		switch b.Op {
		case lang.OpAdd, lang.OpSub:
			if sum == nil {
				sum = b
			}
		case lang.OpMul, lang.OpDiv:
			if t.coefficient(b, sum) {
				return
			}
		}
	} else if _, call := x.(*lang.Call); call {
		sum = nil
	}
	for _, c := range lang.Children(x) {
		t.coefficients(c, sum)
	}
}

// coefficient judges one product; it reports whether it has spoken.
func (t thermometer) coefficient(b *lang.Binary, sum lang.Tree) bool {
	var coef, temp lang.Expr
	above(b, func(x lang.Expr) {
		f := t.facts(x)
		switch {
		case isTemperature(f) && !fromIcePoint(x):
			temp = x
		case f.Known && f.Dim.Base() == perKelvin():
			coef = x
		}
	})
	if coef == nil || temp == nil || t.inverse(coef) || t.completed(sum, b, coef) {
		return false
	}
	f := lang.Fault{
		Span:    t.stmt.Abs(b),
		Message: fmt.Sprintf("%s is a coefficient of a temperature difference, and %s is an absolute temperature", t.text(coef), t.text(temp)),
		Detail:  fmt.Sprintf("Write the difference to the temperature for which the value holds: `%s*(%s - 20 °C)`; if %s is a difference, declare it as a temperature rise.", t.text(coef), t.text(temp), t.text(temp)),
	}
	if n, ok := unparenthesized(temp).(*lang.Name); ok {
		if s := t.p.Note.Lookup(lang.CanonicalName(n.Text)); s != nil && s.Result.Known && s.Path == "" && s.Value.Len() == 1 {
			f.Message += fmt.Sprintf(" (%.4g K)", s.Value.At(0).Re())
			f.Related = []lang.Related{{Span: s.Span, Message: s.Name + " is an absolute temperature"}}
		}
	}
	if !t.facts(temp).Absolute {
		f.Severity = t.p.Lowered()
		f.Detail += " A law that was fitted over the absolute temperature is another matter: then say so in a waiver."
	}
	t.p.Report(f)
	return true
}

// perKelvin is the dimension of a temperature coefficient.
func perKelvin() unit.Dim { return unit.Dim{}.Div(kind.Temperature.Dim()).Base() }

// holds reports that the text of a tree holds that of another one.
func holds(b, o lang.Tree) bool {
	outer, inner := b.Place(), o.Place()
	return outer.Start <= inner.Start && inner.End <= outer.End
}

// inverse reports a coefficient that is made of a temperature: 1/T_0.
func (t thermometer) inverse(coef lang.Expr) bool {
	for _, term := range terms(t.p.Note.StatementForm(t.stmt, coef, lang.Through)) {
		for _, f := range term.Factors {
			if isTemperature(f.Facts) {
				return true
			}
		}
	}
	return false
}

// completed reports that the sum has another product with the same coefficient:
// α·T − α·T₀.
func (t thermometer) completed(sum lang.Tree, b *lang.Binary, coef lang.Expr) bool {
	if sum == nil {
		return false
	}
	found := false
	lang.Walk(sum, func(x lang.Tree) bool {
		o, ok := x.(*lang.Binary)
		if !ok || o == b || o.Op != lang.OpMul && o.Op != lang.OpDiv {
			return true
		}
		above(o, func(x lang.Expr) {
			found = found || lang.PrintExpr(x) == lang.PrintExpr(coef) && !holds(b, o)
		})
		return !found
	})
	return found
}
