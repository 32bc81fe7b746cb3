package rules

import (
	"fmt"
	"math/big"
	"slices"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// SarFieldStatistic finds specific absorption rates made with the wrong field,
// the wrong half, or without the mass.
func (Book) SarFieldStatistic() check.Rule {
	return check.Rule{
		Name:     "sar-field-statistic",
		Severity: lang.Error,
		Title:    "A specific absorption rate has the coefficient, the field, the conductivity or the mass of another formula",
		Sees: "σ·E²/ρ_m (also ωε″E²/ρ_m, J²/(σρ_m), p/ρ_m) of peak values with the coefficient 1, or of rms values with 1/2; with the incident field instead of the field in the body; " +
			"with a static conductivity; and a power per volume that is called a specific absorption rate. " +
			"A caution where the kind is not declared, where a peak value is declared, and, in a harmonic note, where the statistic of the field is not stated.",
		Silent:  "For σÊ²/(2ρ_m) and σE_rms²/ρ_m; for a measured value; for c·dT/dt and for a power density in the mean, divided by the density.",
		Formula: "SAR = σE_rms²/ρ_m = σÊ²/(2ρ_m) = c·∂T/∂t at t = 0.",
		Remedy:  "Take the rms value of the field in the tissue, and name it so: `E in tissue, rms electric field strength`.",
		Source:  "IEC 62209-1:2016 (SAR from the rms field in the tissue; from memory)",
		Wrong: check.Example{Note: `    sigma = 0.87 S/m
    rho = 1040 kg/m^3
    E, peak electric field strength = 60 V/m
    s, specific absorption rate = sigma*E^2/rho = 3.01 W/kg
`},
		Right: check.Example{Note: `    sigma = 0.87 S/m
    rho = 1040 kg/m^3
    E, peak electric field strength = 60 V/m
    s, specific absorption rate = sigma*E^2/(2*rho) = 1.51 W/kg
`},
		Run: perSpot(sarField),
	}
}

func sarField(p *check.Pass, s *spot) {
	for _, c := range s.claims {
		sarOf(p, c)
	}
	for _, m := range mismatches(p) {
		if m.sym.Stmt == s.stmt && m.kind.Is(kind.SpecificAbsorptionRate) && m.factor() == kind.Density.Dim().Base() {
			p.Report(massMissing(p.Note, m))
		}
	}
}

// massMissing explains a power per volume that is declared as a SAR.
func massMissing(n *lang.Note, m mismatch) lang.Fault {
	f := lang.Fault{
		Span:    m.span,
		Message: fmt.Sprintf("%s is declared as a specific absorption rate (W/kg), and its formula gives a power per volume (W/m^3): the mass density is missing", m.sym.Name),
		Detail:  "Divide by the mass density of the tissue. For water and soft tissue that is a factor of about 1000.",
	}
	for _, key := range m.found.Media {
		med, ok := mediumOf(n, key)
		if d := n.Lookup(key + ".density"); ok && d != nil && isOf(d.Facts, kind.Density) {
			name := med.sym.Name + ".density"
			f.Detail = fmt.Sprintf("Divide by the mass density, `%s`.", name)
			if b, sum := m.x.(*lang.Binary); !sum || b.Op != lang.OpAdd && b.Op != lang.OpSub {
				f.Fix = &lang.Fix{Title: "Divide by the mass density", Edits: []lang.Edit{insert(m.span.End, "/"+name)}}
			}
		}
	}
	return f
}

// sarOf looks at one claim.
func sarOf(p *check.Pass, c *claim) {
	guessed := !c.sym.Facts.Kind.Is(kind.SpecificAbsorptionRate)
	if guessed && (c.declared() || !isOf(c.sym.Facts, kind.SpecificAbsorptionRate)) || c.stat == kind.Instantaneous {
		return
	}
	ps := c.view.products(c.sym)
	for _, t := range ps {
		bare, ok := perMass(t)
		if !ok {
			continue
		}
		if f, found := c.crestPower(bare); found && !guessed {
			c.reportSar(p, fmt.Sprintf("%s is made with the crest of the power within a cycle: a specific absorption rate is a mean", c.sym.Name), "Take the average power density.", []lang.Factor{f}, p.Rule.Severity)
			return
		}
		q := squareOf(c.note, bare, kind.Dissipation)
		if q == nil || len(q.byRole[roleElectric]) == 0 && len(q.byRole[roleCurrent]) == 0 {
			continue
		}
		if c.judgeSar(p, q, guessed, len(ps) == 1) {
			return
		}
	}
}

// perMass takes the mass density out of a term that is divided by it.
func perMass(t *product) (*product, bool) {
	i := slices.IndexFunc(t.all, func(f lang.Factor) bool {
		return f.Exp == unit.Whole(-1) && isOf(f.Facts, kind.Density)
	})
	if i < 0 {
		return nil, false
	}
	bare := *t
	bare.all = slices.Delete(slices.Clone(t.all), i, i+1)
	return &bare, true
}

// crestPower gives a peak power density, which is no mean.
func (c *claim) crestPower(t *product) (lang.Factor, bool) {
	if len(t.all) != 1 {
		return lang.Factor{}, false
	}
	f := t.all[0]
	return f, isOf(f.Facts, kind.PowerDensity) && f.Facts.QualBy == lang.Declared && f.Facts.Qualifier == kind.Peak
}

// judgeSar reports what is wrong with σ·E²/ρ, worst first.
func (c *claim) judgeSar(p *check.Pass, q *square, guessed, alone bool) bool {
	severity := p.Rule.Severity
	if guessed || c.stat == kind.Peak {
		severity = p.Lowered()
	}
	for _, f := range q.amplitudes {
		if f.Facts.Kind.Is(kind.IncidentFieldStrength) {
			c.reportSar(p, fmt.Sprintf("%s is made with the incident field: the field in the tissue is another one, mostly much smaller", c.sym.Name),
				"Take the field in the tissue, from a solution of the whole problem or a measurement.", []lang.Factor{f}, severity)
			return true
		}
	}
	for _, f := range q.byRole[roleResistive] {
		if f.Facts.Qualifier == kind.Static && f.Facts.QualBy == lang.Declared {
			c.reportSar(p, fmt.Sprintf("%s is made with a static conductivity: at radio frequencies polarization adds to the loss", c.sym.Name),
				"Take the conductivity at the frequency of the field.", []lang.Factor{f}, severity)
			return true
		}
	}
	if !q.known {
		return c.sarUnstated(p, q)
	}
	right, ok := q.coefficient(c.note, kind.Dissipation, kind.Average)
	if !ok {
		return false
	}
	off := q.off(numbersOf(c.note, c.sym), right, big.NewRat(2, 1), big.NewRat(1, 2), big.NewRat(3, 1))
	if off == nil {
		return false
	}
	c.reportSarHalf(p, q, off, severity, alone)
	return true
}

// sarUnstated cautions in a harmonic note where nobody says what the field is.
func (c *claim) sarUnstated(p *check.Pass, q *square) bool {
	if q.mixed || !c.harmonic() || !q.is(1, 1) && !q.is(1, 2) {
		return false
	}
	for _, f := range q.amplitudes {
		if f.Symbol != nil && f.Facts.Qualifier == kind.Unqualified && !f.Bars {
			c.reportSar(p, fmt.Sprintf("%s rests on %s, of which the note does not say whether it is a peak or an rms value", c.sym.Name, f.Symbol.Name),
				fmt.Sprintf("Say so at its definition, `%s, rms …` or `%s, peak …`: between the two lies a factor of 2. Here %s stands, which is right for %s values.", f.Symbol.Name, f.Symbol.Name, ratio(q.coef), sarFits(q)),
				[]lang.Factor{f}, p.Lowered())
			return true
		}
	}
	return false
}

func sarFits(q *square) kind.Qualifier {
	if q.is(1, 2) {
		return kind.Peak
	}
	return kind.RMS
}

func (c *claim) reportSar(p *check.Pass, message, detail string, of []lang.Factor, severity lang.Severity) {
	c.report(p, lang.Fault{Severity: severity, Message: message, Detail: detail,
		Related: c.because(of, func(s *lang.Symbol) string { return s.Name + " is defined here" })})
}

func (c *claim) reportSarHalf(p *check.Pass, q *square, off *big.Rat, severity lang.Severity, alone bool) {
	factor := ratio(new(big.Rat).Inv(off))
	f := lang.Fault{
		Severity: severity,
		Message:  fmt.Sprintf("%s is %s times the specific absorption rate: the coefficient does not go with %s values of the field", c.sym.Name, times(off), q.stat),
		Detail:   "SAR = σE_rms²/ρ, or σÊ²/(2ρ) with the peak value.",
		Related:  c.because(q.amplitudes, func(s *lang.Symbol) string { return fmt.Sprintf("%s is %s value", s.Name, article(q.stat)) }),
	}
	if c.stat == kind.Peak {
		f.Detail += " If the crest of the loss within a cycle is meant, it is no specific absorption rate; the largest value in space is not what `peak` says here."
	}
	if !c.declared() {
		f.Detail += fmt.Sprintf(" That is so if it is a specific absorption rate: say `%s, specific absorption rate = …`, or what else it is.", c.sym.Name)
	}
	if alone {
		f.Fix = &lang.Fix{Title: "Multiply by " + factor, Edits: []lang.Edit{insert(c.span().Start, factor+" * ")}}
	}
	c.report(p, f)
}
