package rules

import (
	"fmt"
	"math/big"
	"slices"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// QuarterHalfAverage finds energies and field forces of alternating fields
// whose coefficient does not belong to their statistic.
func (Book) QuarterHalfAverage() check.Rule {
	return check.Rule{
		Name:     "quarter-half-average",
		Severity: lang.Error,
		Title:    "The coefficient of an alternating energy does not belong to its statistic",
		Sees: "An energy, an energy density or a field force of peak or rms amplitudes whose coefficient is not that of the result that is declared: " +
			"an average from peak values with 1/2 instead of 1/4, from rms values with 1 or 1/4 instead of 1/2; a peak from rms values with 1/2 instead of 1; " +
			"and, where no statistic of the result is declared, a coefficient that is right for none.",
		Silent: "For static and instantaneous amplitudes; for amplitudes of unlike or unstated statistics; for the electric and magnetic energy together " +
			"(kind volumic electromagnetic energy) with twice the coefficient; in a nonlinear or dispersive medium; " +
			"for waveforms other than sinusoidal, square and triangular, of which the last two are judged by their own mean squares; for a crest of peak values without its half, which half-missing-stored-energy reports.",
		Formula: "⟨cos²⟩ = 1/2: ⟨½εE²⟩ = ¼εÊ² = ½εE_rms²; at the crest ½εÊ² = εE_rms².",
		Remedy:  "Take the coefficient of the statistic, and say with the result whether it is a peak or an average.",
		Source:  "Jackson, Classical Electrodynamics, 3rd ed., 6.9 (time averages of harmonic fields; from memory)",
		Wrong: check.Example{Note: `    eps, permittivity = 18.6 pF/m
    E, peak electric field strength = 12 kV/m
    w, average energy density = 1/2*eps*E^2 = 1.34 mJ/m^3
`},
		Right: check.Example{Note: `    eps, permittivity = 18.6 pF/m
    E, peak electric field strength = 12 kV/m
    w, average energy density = 1/4*eps*E^2 = 0.670 mJ/m^3
`},
		Run: perClaim(quarterHalf),
	}
}

func quarterHalf(p *check.Pass, c *claim) {
	form, ok := c.form()
	if !ok || form != kind.StoredEnergy && form != kind.FieldForce || c.curvedOrDispersive() {
		return
	}
	if squares, ok := c.squares(form); ok {
		c.quarter(p, form, squares)
	}
}

// curvedOrDispersive reports a medium for which table 1.4 does not hold.
func (c *claim) curvedOrDispersive() bool {
	return slices.ContainsFunc(c.mediaOf(), func(m medium) bool { return m.nonlinear() || m.says("dispersive") })
}

// quarter reports the first term whose coefficient is off.
func (c *claim) quarter(p *check.Pass, form kind.Form, squares []*square) {
	for _, q := range squares {
		if !q.known || q.stat != kind.Peak && q.stat != kind.RMS || form == kind.FieldForce && !q.selfForce() {
			continue
		}
		right, off := c.averageOff(q, form)
		if off != nil {
			c.reportQuarter(p, q, right, off, len(squares) == 1)
			return
		}
	}
}

// selfForce reports a force of a field on its own sources, which is a square;
// a charge in a field or a current in one is not.
func (q *square) selfForce() bool {
	return len(q.amplitudes) == 1 || len(q.byRole[roleCapacity])+len(q.byRole[roleInduction]) > 0
}

// averageOff gives the right coefficient and the factor by which a term is off
// it, nil where it is right or where the table has no answer.
func (c *claim) averageOff(q *square, form kind.Form) (right, off *big.Rat) {
	found := numbersOf(c.note, c.sym)
	var rights []*big.Rat
	for _, to := range c.targets() {
		for _, f := range c.formsOf(form) {
			if right, ok := q.coefficient(c.note, f, to); ok {
				rights = append(rights, right)
			}
		}
	}
	for _, r := range rights {
		if q.mayBe(found, r) {
			return nil, nil
		}
	}
	for _, r := range rights {
		off := q.off(found, r, big.NewRat(2, 1), big.NewRat(1, 2), big.NewRat(4, 1), big.NewRat(1, 4))
		if off != nil && !c.halfRuleSpeaks(q, off) {
			return r, off
		}
	}
	return nil, nil
}

// targets are the statistics that the result may have.
func (c *claim) targets() []kind.Qualifier {
	if c.stated {
		return []kind.Qualifier{c.stat}
	}
	return []kind.Qualifier{kind.Average, kind.Peak}
}

// formsOf is the form, and the total of electric and magnetic energy where the
// words mean that.
func (c *claim) formsOf(form kind.Form) []kind.Form {
	if form == kind.StoredEnergy && c.isTotal() {
		return []kind.Form{kind.TotalEnergy, kind.StoredEnergy}
	}
	return []kind.Form{form}
}

// halfRuleSpeaks: the whole square of peak values is a missing half, unless an
// average is declared.
func (c *claim) halfRuleSpeaks(q *square, off *big.Rat) bool {
	return q.form == kind.StoredEnergy && q.stat == kind.Peak && c.stat != kind.Average && q.is(1, 1) || c.stat == kind.Peak && q.stat == kind.Peak && off.Cmp(big.NewRat(2, 1)) == 0
}

func (c *claim) reportQuarter(p *check.Pass, q *square, right, off *big.Rat, alone bool) {
	what := "its average"
	switch {
	case !c.stated:
		what = "an average"
	case c.stat == kind.Peak:
		what = "its peak"
	}
	f := lang.Fault{
		Message: fmt.Sprintf("%s is %s times %s: the coefficient is %s for %s values", c.sym.Name, times(off), what, ratio(right), q.stat),
		Detail:  c.tableOf(q) + fmt.Sprintf(" Here %s stands.", ratio(q.coef)) + c.totalUnless(q, off),
		Related: c.because(q.amplitudes, func(s *lang.Symbol) string { return fmt.Sprintf("%s is %s value", s.Name, article(q.stat)) }),
	}
	if factor := new(big.Rat).Inv(off); alone {
		f.Fix = &lang.Fix{
			Title: fmt.Sprintf("Multiply by %s", ratio(factor)),
			Edits: []lang.Edit{insert(c.span().Start, ratio(factor)+" * ")},
		}
	}
	c.report(p, f)
}

// tableOf tells the coefficients in words.
func (c *claim) tableOf(q *square) string {
	wave, _ := q.waves(c.note)
	if crest, told := wave.Crest(); told && shaped(wave) {
		return fmt.Sprintf("The crest factor of a %s quantity is the square root of %d: from peak values the average has 1/%d, from rms values the peak has %s.",
			wave, crest, 2*crest, ratio(big.NewRat(int64(crest), 2)))
	}
	return "From peak values the average has 1/4 and the peak 1/2; from rms values the average has 1/2 and the peak 1."
}

// totalUnless names the fact that would make twice the coefficient right.
func (c *claim) totalUnless(q *square, off *big.Rat) string {
	if q.form != kind.StoredEnergy || off.Cmp(big.NewRat(2, 1)) != 0 {
		return ""
	}
	name := "volumic electromagnetic energy"
	if isOf(c.sym.Facts, kind.Energy) {
		name = "electromagnetic energy"
	}
	return fmt.Sprintf(" If the electric and the magnetic energy of a travelling wave or a resonator are meant together, write `%s`.", name)
}

// article writes a statistic with its article.
func article(q kind.Qualifier) string {
	switch q {
	case kind.RMS:
		return "an rms"
	case kind.Average, kind.Instantaneous:
		return "an " + q.String()
	}
	return "a " + q.String()
}
