package rules

import (
	"fmt"
	"math/big"
	"slices"
	"strings"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// MeanPowerHalf finds mean powers whose half does not belong to the statistic
// of their amplitudes.
func (Book) MeanPowerHalf() check.Rule {
	return check.Rule{
		Name:     "mean-power-half",
		Severity: lang.Error,
		Title:    "The half of a mean power is missing for peak values, or stands beside rms values",
		Sees: "A mean power, power density or power flux (U·I, R·I², U²/R, σ·E², E·J, E²/Z, E×H, ω·C·U²·tan δ) of peak amplitudes with the coefficient 1, " +
			"or of rms amplitudes with 1/2; apparent, reactive and active power are means by definition. " +
			"A caution where the note says only `power` and the crest may be meant. A quantity that is declared square or triangular is judged by its own mean square.",
		Silent: "For a peak, instantaneous or peak envelope power, for static values, for amplitudes of unlike or unstated statistics, for a switching power C·U²·f, " +
			"with a duty ratio (the amplitude may be the level of a pulse), for waveforms other than sinusoidal, square and triangular.",
		Formula: "P = ½ Re(Û·Î*) = Re(U·I*) for rms phasors; ⟨p⟩ = ½σÊ² = σE_rms²; ⟨S⟩ = ½ Re(Ê×Ĥ*).",
		Remedy:  "Keep one statistic in a note, and take the half with peak values only.",
		Source:  "Jackson, Classical Electrodynamics, 3rd ed., 6.9; IEC 60050-131:2002, 131-11-42 (active power) (from memory)",
		Wrong: check.Example{Note: `    U, peak voltage = 170 V
    I, peak electric current = 3 A
    phi = 25°
    P, average power = U*I*cos(phi) = 462 W
`},
		Right: check.Example{Note: `    U, peak voltage = 170 V
    I, peak electric current = 3 A
    phi = 25°
    P, average power = 1/2*U*I*cos(phi) = 231 W
`},
		Run: perClaim(meanPower),
	}
}

func meanPower(p *check.Pass, c *claim) {
	form, ok := c.form()
	if !ok || form != kind.Dissipation && form != kind.Flux || c.stat == kind.Peak || c.stat == kind.Instantaneous || c.sym.Facts.Kind.Is(kind.PeakEnvelopePower) {
		return
	}
	if squares, ok := c.squares(form); ok {
		c.meanHalf(p, form, squares)
	}
}

// meanHalf reports the first term whose half is missing or too much.
func (c *claim) meanHalf(p *check.Pass, form kind.Form, squares []*square) {
	for _, q := range squares {
		if !q.known || !c.isMean(q) {
			continue
		}
		peak := *q
		if q.stat == kind.PeakToPeak {
			peak.stat = kind.Peak
		}
		right, ok := peak.coefficient(c.note, form, kind.Average)
		if !ok {
			continue
		}
		var off *big.Rat
		switch found := numbersOf(c.note, c.sym); q.stat {
		case kind.Peak:
			off = q.off(found, right, new(big.Rat).Inv(right))
		case kind.PeakToPeak: // (U_pp/2)²/R; other factors are for swing-used-as-amplitude
			off = q.off(found, right.Mul(right, big.NewRat(1, 4)), big.NewRat(2, 1))
		case kind.RMS:
			off = q.off(found, right, big.NewRat(1, 2))
		}
		if off != nil {
			c.reportMean(p, q, off, len(squares) == 1)
			return
		}
	}
}

// isMean reports a term that is a power in the mean: products of amplitudes
// with what dissipates, ω·C·U² with a loss factor, an imaginary part, or as an
// average or a reactive power. The switching power C·U²·f is none, and with a
// duty ratio the amplitude may be the level of a pulse.
func (c *claim) isMean(q *square) bool {
	if slices.ContainsFunc(q.all, func(f lang.Factor) bool { return f.Facts.Kind.Is(kind.DutyRatio) }) {
		return false
	}
	if len(q.byRole[roleFrequency]) == 0 {
		return true
	}
	for _, f := range q.byRole[roleFrequency] {
		if isCycles(f) && q.pi == 0 && !q.folded {
			return false // hertz-radian-slip speaks
		}
		if f.Exp != unit.Whole(1) {
			return false
		}
	}
	return len(q.byRole[roleLoss]) > 0 || len(q.calls) > 0 || c.stat == kind.Average || c.sym.Facts.Kind.Is(kind.ReactivePower)
}

// meanByDefinition reports kinds that have no crest.
func (c *claim) meanByDefinition() bool {
	k := c.sym.Facts.Kind
	return c.stated || strings.Contains(c.words(), "active power") ||
		k.Is(kind.ApparentPower) || k.Is(kind.ReactivePower) || k.Is(kind.ComplexPower)
}

func (c *claim) reportMean(p *check.Pass, q *square, off *big.Rat, alone bool) {
	f := lang.Fault{Related: c.because(q.amplitudes, func(s *lang.Symbol) string { return fmt.Sprintf("%s is %s value", s.Name, article(q.stat)) })}
	if q.stat != kind.RMS {
		f.Message = fmt.Sprintf("%s is %s times the mean power: %s", c.sym.Name, times(off), c.missingShare(q, off))
		f.Detail = fmt.Sprintf("Write `1/2 * %s`. If the crest is meant, write `%s, peak power = …`.", c.text(), c.sym.Name)
		if wave, _ := q.waves(c.note); shaped(wave) {
			f.Detail = fmt.Sprintf("Write `%s * %s`.", ratio(new(big.Rat).Inv(off)), c.text())
		}
		if !c.meanByDefinition() {
			f.Severity = p.Lowered()
		}
	} else {
		f.Message = fmt.Sprintf("%s is %s times the mean power: the half belongs to peak values, and these are rms values", c.sym.Name, times(off))
		f.Detail = "Take the half out: the mean of a product of rms values is the product itself."
	}
	if alone {
		factor := ratio(new(big.Rat).Inv(off))
		f.Fix = &lang.Fix{Title: "Multiply by " + factor, Edits: []lang.Edit{insert(c.span().Start, factor+" * ")}}
	}
	c.report(p, f)
}

// missingShare names what is missing beside peak values: the half, or the share
// of another waveform.
func (c *claim) missingShare(q *square, off *big.Rat) string {
	if wave, _ := q.waves(c.note); shaped(wave) {
		return fmt.Sprintf("the mean square of %s values is %s of the square of the crest", wave, ratio(new(big.Rat).Inv(off)))
	}
	return "the half is missing beside peak values"
}
