package rules

import (
	"fmt"
	"math/cmplx"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// ConjugateMissing finds energies, powers and forces that multiply phasors
// without a conjugate.
func (Book) ConjugateMissing() check.Rule {
	return check.Rule{
		Name:     "conjugate-missing",
		Severity: lang.Error,
		Title:    "An energy, a power or a force multiplies two phasors, and neither is conjugated",
		Sees: "A product of two complex amplitudes (E·E, E^2, U·I, E×H, J·E, U^2/Z, Re(E)^2, Re(U·I), |E·E|) in an energy, a power, a power flux, a force or their densities, " +
			"where neither amplitude is conjugated and neither stands in bars. A caution where the kind of the result is not declared.",
		Silent: "With conj(…) on one of the two, also in a name of its own; with |E|^2; for an instantaneous result or instantaneous amplitudes; for a reaction; for amplitudes whose values are real; " +
			"for the active power of a real and a complex amplitude, which the conjugate does not change; for Re(U)·Re(I) + Im(U)·Im(I); for products that are no energy or power, such as n^2.",
		Formula: "u·i = ½ Re(U·I*) + ½ Re(U·I·e^{j2ωt}): the mean is ½ Re(U·I*). For circular polarization E·E = 0 while E·E* = |E|².",
		Remedy:  "Conjugate one of the two: `S, complex power = U*conj(I)`, `E·conj(E)`, or write `|E|^2`.",
		Source:  "Jackson, Classical Electrodynamics, 3rd ed., 6.9 (from memory)",
		Wrong: check.Example{Note: `    E, peak electric field strength = (1, 1*j, 0) kV/m
    S, average power flux density = E·E/(2*Z_0) = 0.00 kW/m^2
`},
		Right: check.Example{Note: `    E, peak electric field strength = (1, 1*j, 0) kV/m
    S, average power flux density = E·conj(E)/(2*Z_0) = 2.65 kW/m^2
`},
		Run: perClaim(conjugateMissing),
	}
}

func conjugateMissing(p *check.Pass, c *claim) {
	form, ok := c.form()
	if !ok || c.stat == kind.Instantaneous {
		return
	}
	ps := c.view.products(c.sym)
	if partsByHand(ps) {
		return
	}
	for _, t := range ps {
		q := squareOf(c.note, t, form)
		if q == nil || !c.unconjugated(q) {
			continue
		}
		c.reportConjugate(p, q)
		return
	}
}

// partsByHand reports products of real and imaginary parts: the conjugate is
// multiplied out.
func partsByHand(ps []*product) bool {
	for _, p := range ps {
		for _, f := range p.all {
			if f.Call == "Im" && f.Inside != nil {
				if t, single := f.Inside.Single(); single && len(t.Factors) == 1 && isAmplitude(t.Factors[0].Facts) {
					return true
				}
			}
		}
	}
	return false
}

// hasCall reports a function in the claim's own expression.
func (c *claim) hasCall(name string) bool {
	found := false
	lang.Walk(c.x, func(t lang.Tree) bool {
		call, ok := t.(*lang.Call)
		found = found || ok && call.Fn.Text == name
		return !found
	})
	return found
}

// unconjugated reports a square of phasors with no conjugate in it.
func (c *claim) unconjugated(q *square) bool {
	conjugates, varying := 0, 0
	for _, f := range q.amplitudes {
		conj, sure := conjugated(c.note, f, maxScalings)
		switch {
		case f.Facts.Qualifier == kind.Instantaneous || f.Bars && !c.barsAround(q) || !sure:
			return false
		case conj:
			conjugates++
		}
		if isPhasor(f) {
			varying++
		}
	}
	if len(q.amplitudes) == 1 {
		return varying == 1 && !q.amplitudes[0].Conj
	}
	switch varying {
	case 2:
		return conjugates != 1
	case 1: // the conjugate of a real factor is itself: the real part is right
		return conjugates == 0 && c.sym.Facts.Kind.Is(kind.ComplexPower) && !c.hasCall("Re")
	}
	return false
}

// isPhasor reports a complex amplitude whose value is not real.
func isPhasor(f lang.Factor) bool {
	if !f.Facts.Complex {
		return false
	}
	if f.Symbol == nil || !f.Symbol.Result.Known || f.Part != "" {
		return true
	}
	v := f.Symbol.Value
	for i := range v.Len() {
		if v.At(i).Im() != 0 {
			return true
		}
	}
	return false
}

// conjugated follows a factor to where its amplitude is conjugated or not; sure
// is false where that cannot be told.
func conjugated(n *lang.Note, f lang.Factor, depth int) (conj, sure bool) {
	s := f.Symbol
	if s == nil || s.Def == nil || s.Input || depth == 0 || f.Exp != unit.Whole(1) {
		return f.Conj, depth > 0
	}
	form := n.Normal(s, lang.NamesStay)
	if form == nil || len(form.Terms) == 0 {
		return f.Conj, true
	}
	first := true
	for _, t := range form.Terms {
		for _, g := range t.Factors {
			if !isAmplitude(g.Facts) || !g.Facts.Complex {
				continue
			}
			below, ok := conjugated(n, g, depth-1)
			if !ok || !first && below != conj {
				return false, false
			}
			conj, first = below, false
		}
	}
	return conj != f.Conj, true
}

// barsAround reports bars around a dot product of complex vectors, |E·E|, which
// are no substitute for the conjugate.
func (c *claim) barsAround(q *square) bool {
	found := false
	lang.Walk(c.x, func(t lang.Tree) bool {
		if b, ok := t.(*lang.Bars); ok {
			dot, ok := unparen(b.X).(*lang.Binary)
			found = found || ok && dot.Op == lang.OpDot && c.isComplexVector(dot.X) && c.isComplexVector(dot.Y)
		}
		return !found
	})
	return found
}

func (c *claim) isComplexVector(x lang.Expr) bool {
	f, _ := c.note.FactsOf(c.sym.Stmt, x)
	return f.Complex && f.Shape == eval.Vector
}

// unparen takes parentheses off.
func unparen(x lang.Expr) lang.Expr {
	for {
		p, ok := x.(*lang.Paren)
		if !ok || p.Unit != nil {
			return x
		}
		x = p.X
	}
}

func (c *claim) reportConjugate(p *check.Pass, q *square) {
	f := lang.Fault{
		Message: fmt.Sprintf("%s multiplies two phasors without a conjugate: that is the part at twice the frequency, not the mean", c.sym.Name),
		Detail: "Conjugate one of the two, `E·conj(E)`, `U*conj(I)`, or write `|E|^2`." + c.conjugateEffect(q) +
			fmt.Sprintf(" If a product at one instant is meant, write `%s, instantaneous …`; if a reaction, write `%s, reaction = …`.", c.sym.Name, c.sym.Name),
		Related: c.because(q.amplitudes, func(s *lang.Symbol) string { return s.Name + " is a phasor" }),
	}
	if !c.declared() {
		f.Severity = p.Lowered()
	}
	if edit, ok := c.conjugateEdit(q); ok {
		f.Fix = &lang.Fix{Title: "Conjugate one of the two", Edits: []lang.Edit{edit}}
	}
	c.report(p, f)
}

// conjugateEffect tells how many times the right value this one is, "" where
// that is not known.
func (c *claim) conjugateEffect(q *square) string {
	a := q.amplitudes[0]
	b := q.amplitudes[len(q.amplitudes)-1]
	if q.crossed || a.Symbol == nil || b.Symbol == nil || !a.Symbol.Result.Known || !b.Symbol.Result.Known || a.Part != "" || b.Part != "" {
		return ""
	}
	x, y := a.Symbol.Value, b.Symbol.Value
	if x.Len() != y.Len() {
		return ""
	}
	var plain, right complex128
	for i := range x.Len() {
		plain += x.At(i).C() * y.At(i).C()
		right += x.At(i).C() * cmplx.Conj(y.At(i).C())
	}
	if real(right) == 0 {
		return ""
	}
	return fmt.Sprintf(" Here the real part is %.2f times what it should be.", real(plain)/real(right))
}

// conjugateEdit conjugates the current or magnetic amplitude, else the last,
// where it stands once in the claim's own expression, or makes E^2 |E|^2.
func (c *claim) conjugateEdit(q *square) (lang.Edit, bool) {
	a := q.amplitudes[len(q.amplitudes)-1]
	for _, f := range q.byRole[roleMagnetic] {
		a = f
	}
	if a.Symbol == nil || c.hasCall("conj") || c.hasCall("Im") {
		return lang.Edit{}, false
	}
	var at []*lang.Name
	var square *lang.Binary
	lang.Walk(c.x, func(t lang.Tree) bool {
		switch t := t.(type) {
		case *lang.Binary:
			if n, ok := t.X.(*lang.Name); ok && t.Op == lang.OpPow && lang.CanonicalName(n.Text) == a.Key {
				square = t
			}
		case *lang.Bars:
			return false
		case *lang.Name:
			if lang.CanonicalName(t.Text) == a.Key {
				at = append(at, t)
			}
		}
		return true
	})
	switch {
	case square != nil && len(at) == 1 && !c.hasCall("Re"):
		name := at[0].Text
		return lang.Edit{Span: c.sym.Stmt.Abs(square.X), New: "|" + name + "|"}, true
	case square == nil && len(at) == 2 && len(q.amplitudes) == 1, square == nil && len(at) == 1 && len(q.amplitudes) == 2:
		last := at[len(at)-1]
		return lang.Edit{Span: c.sym.Stmt.Abs(last), New: "conj(" + last.Text + ")"}, true
	}
	return lang.Edit{}, false
}
