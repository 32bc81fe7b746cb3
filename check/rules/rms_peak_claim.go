package rules

import (
	"fmt"
	"math"
	"slices"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file finds unlike statistics within one definition: between what is
// declared and what the formula gives, and between two factors.

// unlikeFactors finds a product of two amplitudes of unlike statistics. A third
// amplitude below makes it a scaling, and a √2 a conversion.
func (c *claim) unlikeFactors(p *check.Pass) {
	for _, t := range products(c.note.Normal(c.sym, lang.NamesStay)) {
		var above []lang.Factor
		for _, f := range t.all {
			if !isAmplitude(f.Facts) {
				continue
			}
			if f.Exp != unit.Whole(1) {
				above = nil
				break
			}
			above = append(above, f)
		}
		if len(above) != 2 || t.root2 != (unit.Rat{}) {
			continue
		}
		a, b := statOf(c.note, above[0]), statOf(c.note, above[1])
		if _, ok := kind.Product(a, b); ok || !known(a, b) {
			continue
		}
		c.report(p, lang.Fault{
			Message: fmt.Sprintf("%s multiplies %s value by %s value", c.sym.Name, article(a), article(b)),
			Detail:  "Convert one of them where it is defined." + conversionHint(a, b),
			Related: c.because(above, func(s *lang.Symbol) string {
				return fmt.Sprintf("%s is %s value", s.Name, article(statOf(c.note, lang.Factor{Symbol: s, Facts: s.Facts})))
			}),
		})
		return
	}
}

// unlikeDeclared finds a quantity declared with one statistic whose formula is
// an amplitude of another, with no number that could convert it.
func (c *claim) unlikeDeclared(p *check.Pass) {
	if !c.stated || !isAmplitude(c.sym.Facts) || c.emfOf() != nil {
		return // the law of induction has a number of its own: emf-crest-twice speaks
	}
	form := c.note.Normal(c.sym, unnamed)
	if form == nil || len(form.Terms) == 0 || shaped(c.sym.Facts.Waveform) {
		return
	}
	var first *lang.Factor
	for _, t := range form.Terms {
		a := c.unconverted(t)
		if a == nil || first != nil && a.Facts.Qualifier != first.Facts.Qualifier {
			return
		}
		if first == nil {
			first = a
		}
	}
	from := first.Facts.Qualifier
	severity, unless := c.ifShaped(p, form, from)
	f := lang.Fault{
		Severity: severity,
		Message:  fmt.Sprintf("%s is declared as %s value, and its formula gives %s value", c.sym.Name, article(c.stat), article(from)),
		Detail:   "Convert, or declare it as what it is." + conversionHint(from, c.stat) + unless,
		Related:  c.because([]lang.Factor{*first}, func(s *lang.Symbol) string { return fmt.Sprintf("%s is %s value", s.Name, article(from)) }),
	}
	if crest(from, c.stat) && c.isProduct() {
		f.Fix = &lang.Fix{Title: "Multiply by sqrt(2)", Edits: []lang.Edit{insert(c.span().Start, "sqrt(2)*")}}
		if c.stat == kind.RMS {
			f.Fix = &lang.Fix{Title: "Divide by sqrt(2)", Edits: []lang.Edit{insert(c.span().Start, "1/sqrt(2)*")}}
		}
	}
	c.report(p, f)
}

// ifShaped names the waveform for which a formula without √2 would be right
// after all: peak and rms value are equal for a square wave, and the one is √3
// times the other for a triangle and twice for a half-wave rectified sinusoid.
// The latter two are formulas that people mean.
func (c *claim) ifShaped(p *check.Pass, form *lang.Form, from kind.Qualifier) (lang.Severity, string) {
	t, single := form.Single()
	if !single || c.harmonic() {
		return p.Rule.Severity, ""
	}
	s, _ := scaleOf(t)
	if from == kind.PeakToPeak && c.stat == kind.RMS && s.value == 0.5 {
		return p.Lowered(), fmt.Sprintf(" If it is a square wave, whose rms value is half of the swing, write `%s, square %s …`.", c.sym.Name, c.stat)
	}
	if !crest(from, c.stat) {
		return p.Rule.Severity, ""
	}
	if c.stat == kind.RMS {
		s.value = 1 / s.value
	}
	switch {
	case s.value == 1:
		return p.Rule.Severity, fmt.Sprintf(" If it is a square wave, write `%s, square %s …`.", c.sym.Name, c.stat)
	case s.value == 2:
		return p.Lowered(), fmt.Sprintf(" If it is a half-wave rectified sinusoid, whose peak is twice its rms value, write `%s, distorted %s …`.", c.sym.Name, c.stat)
	case math.Abs(s.value/math.Sqrt(3)-1) < 2e-3:
		return p.Lowered(), fmt.Sprintf(" If it is a triangular wave, for which the square root of 3 stands between the two, write `%s, triangular %s …`.", c.sym.Name, c.stat)
	}
	return p.Rule.Severity, ""
}

// unnamed looks through names that declare neither a kind nor a statistic.
func unnamed(s *lang.Symbol) bool {
	return s.Facts.KindBy != lang.Declared && s.Facts.QualBy != lang.Declared
}

// unconverted gives the only amplitude of a term where it is of another
// statistic than the result, and nothing in the term may convert it.
func (c *claim) unconverted(t lang.Term) *lang.Factor {
	to := c.stat
	var amplitude *lang.Factor
	for i, f := range t.Factors {
		switch {
		case mayConvert(f):
			return nil
		case !isAmplitude(f.Facts) && f.Facts.Qualifier == kind.Unqualified:
		case amplitude != nil || f.Exp != unit.Whole(1) || f.Facts.Qualifier == kind.Unqualified:
			return nil
		default:
			amplitude = &t.Factors[i]
		}
	}
	if amplitude == nil || kind.Like(amplitude.Facts.Qualifier, to) || shaped(waveOf(c.note, *amplitude)) {
		return nil
	}
	if overTime(t) && !crest(amplitude.Facts.Qualifier, to) {
		return nil // the slope of a swing, or the swing that a steady voltage makes
	}
	if amplitude.Facts.Qualifier == kind.Static && to == kind.RMS {
		return nil // the rms value of a steady quantity is its value
	}
	if s, ok := withoutCycles(t); !ok || s.fits(amplitude.Facts.Qualifier, to) {
		return nil
	}
	return amplitude
}

// overTime reports a term with a time or a frequency in it.
func overTime(t lang.Term) bool {
	return slices.ContainsFunc(t.Factors, func(f lang.Factor) bool { return roleOf(f.Facts) == roleFrequency })
}

// mayConvert reports a factor that could hold the √2: text that cannot be taken
// apart, a cosine, a root (of a duty ratio, of t_on/T), a ratio that may be a
// crest factor. The logarithm of a geometry does not.
func mayConvert(f lang.Factor) bool {
	if _, root := rootOf(f); root || f.Literal || f.Over != nil {
		return false
	}
	switch f.Call {
	case "":
	case "ln", "log10", "exp", "sinh", "cosh", "tanh":
		return false
	default:
		return true
	}
	k := f.Facts.Kind
	_, whole := f.Exp.Int()
	return f.Symbol == nil || !whole || f.Facts.Dim == (unit.Dim{}) && (k == 0 || k.Is(kind.DutyRatio)) || isRatio(f)
}

// isRatio reports a ratio that may be a crest factor.
func isRatio(f lang.Factor) bool {
	k := f.Facts.Kind
	return f.Symbol != nil && (k == kind.Ratio || k == kind.AmplitudeRatio || k.Is(kind.CrestFactor))
}

// isProduct reports an expression before which a factor may be put.
func (c *claim) isProduct() bool {
	b, ok := c.x.(*lang.Binary)
	return !ok || b.Op != lang.OpAdd && b.Op != lang.OpSub
}
