package rules

import (
	"fmt"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// LinePhaseVoltage finds line-to-line voltages that stand for line-to-earth ones.
func (Book) LinePhaseVoltage() check.Rule {
	return check.Rule{
		Name:     "line-phase-voltage",
		Severity: lang.Error,
		Title:    "A line-to-line voltage stands for a line-to-earth voltage, or its √3 or √2 is missing or counted twice",
		Sees: "A quantity declared as a line-to-earth voltage that is a line-to-line voltage without 1/√3 (and √2 for a crest), or the reverse; a line-to-earth voltage that is divided by √3 again, and a peak one that is multiplied by √2 again, " +
			"also in a field strength. A system voltage without a statistic is an rms value. A caution where a field strength, a charging current or a stored energy takes the line-to-line voltage itself: the part may stand between two lines.",
		Silent: "For line-to-earth voltages; with an earth fault factor (with an unearthed neutral the healthy lines reach the line-to-line voltage); with an overvoltage factor up to 1.3 beside the √3; " +
			"where the voltage across the part has a name that is declared as a plain voltage, `U_c, rms voltage = U`; for powers, which three phases have together as U_LL² or √3·U_LL·I; for numbers that are no usual factor.",
		Formula: "U_LE = U_LL/√3, Û_LE = √2·U_LL/√3 in a balanced system; k·U_LL/√3 with an earth fault factor k ≤ √3.",
		Remedy:  "Convert once, in a line of its own: `U_e, peak line-to-earth voltage = sqrt(2)*U/sqrt(3)`.",
		Source:  "IEC 60071-1 (phase-to-earth voltages and √2/√3; from memory); IEC 60050-601, 601-01-29 and 601-01-31 (from memory)",
		Wrong: check.Example{Note: `    U_m, rms line-to-line voltage = 36 kV
    U_e, peak line-to-earth voltage = sqrt(2)*U_m = 50.9 kV
    d = 20 mm
    E, peak electric field strength = U_e/d = 2.55 kV/mm
`},
		Right: check.Example{Note: `    U_m, rms line-to-line voltage = 36 kV
    U_e, peak line-to-earth voltage = sqrt(2)*U_m/sqrt(3) = 29.4 kV
    d = 20 mm
    E, peak electric field strength = U_e/d = 1.47 kV/mm
`},
		Run: perClaim(linePhase),
	}
}

// threePhase is a term with one three-phase voltage in it.
type threePhase struct {
	voltage    lang.Factor
	from, to   kind.Qualifier // of the voltage and of the claim
	number     trade          // what the plain number of the term is made of
	perPhase   bool           // the voltage is to earth
	square     bool           // it is squared
	chargesCap bool           // it drives a current through a capacitance
}

func linePhase(p *check.Pass, c *claim) {
	t, single := c.note.Normal(c.sym, lang.UpToDeclared).Single()
	if !single {
		return
	}
	v, ok := c.threePhaseOf(t)
	if !ok {
		return
	}
	k := c.sym.Facts.Kind
	switch {
	case k.Is(kind.LineToEarthVoltage) && !v.perPhase && !v.square:
		c.lineToEarth(p, v)
	case k.Is(kind.LineToLineVoltage) && v.perPhase && !v.square:
		c.earthToLine(p, v)
	case v.perPhase:
		c.countedTwice(p, v)
	case !k.Is(kind.Voltage):
		c.stress(p, v)
	}
}

// threePhaseOf finds the only three-phase voltage of a term; ok is false where
// another factor may convert it, or the number is no usual one.
func (c *claim) threePhaseOf(t lang.Term) (v threePhase, ok bool) {
	frequency, capacity := false, false
	for _, f := range t.Factors {
		line := f.Facts.Kind.Is(kind.LineToLineVoltage) || f.Facts.Kind.Is(kind.LineToEarthVoltage)
		switch r := roleOf(f.Facts); {
		case f.Facts.Kind.Is(kind.EarthFaultFactor):
			return v, false
		case line && ok || line && f.Exp != unit.Whole(1) && f.Exp != two:
			return v, false
		case line:
			v.voltage, v.square, ok = f, f.Exp == two, true
		case mayConvert(f):
			return v, false
		case r == roleFrequency:
			frequency = true
		case r == roleCapacity:
			capacity = true
		}
	}
	if !ok {
		return v, false
	}
	v.perPhase = v.voltage.Facts.Kind.Is(kind.LineToEarthVoltage)
	v.chargesCap = frequency && capacity
	v.to, v.from = c.stat, v.voltage.Facts.Qualifier
	if v.from == kind.Unqualified {
		v.from = kind.RMS // a system voltage is an rms value by definition
	}
	s, known := withoutCycles(t)
	if !known {
		return v, false
	}
	v.number, known = tradeOf(s.value)
	return v, known
}

// lineToEarth judges a line-to-earth voltage made of a line-to-line voltage.
func (c *claim) lineToEarth(p *check.Pass, v threePhase) {
	wrong := ""
	switch {
	case v.number.root3 == 0:
		wrong = "without the square root of 3 between them"
	case v.number.root3 > 0:
		wrong = "multiplied by the square root of 3 instead of divided by it"
	case v.from == kind.RMS && v.to == kind.Peak && v.number.root2 == 0 && v.voltage.Facts.Qualifier == kind.Unqualified:
		c.reportPhase(p, v, fmt.Sprintf("%s is declared as a peak value and is the rms value to earth: a system voltage is an rms value", c.sym.Name),
			"Multiply by sqrt(2): the crest to earth is sqrt(2)*U/sqrt(3).")
		return
	case v.from == kind.Peak && v.to == kind.Peak && v.number.root2 > 0:
		c.reportPhase(p, v, fmt.Sprintf("%s multiplies a peak value by sqrt(2): the crest is counted twice", c.sym.Name), "Leave the sqrt(2) out.")
		return
	default:
		return
	}
	c.reportPhase(p, v, fmt.Sprintf("%s is declared as a line-to-earth voltage and is the line-to-line voltage %s, %s", c.sym.Name, v.voltage.Symbol.Name, wrong),
		"Divide by sqrt(3). With an unearthed neutral and an earth fault the healthy lines reach the line-to-line voltage: put in that fact, `k, earth fault factor = sqrt(3)`, and write `k*U/sqrt(3)`.")
}

// earthToLine judges a line-to-line voltage made of a line-to-earth voltage.
func (c *claim) earthToLine(p *check.Pass, v threePhase) {
	if v.number.root3 > 0 {
		return
	}
	c.reportPhase(p, v, fmt.Sprintf("%s is declared as a line-to-line voltage and is the line-to-earth voltage %s without the square root of 3", c.sym.Name, v.voltage.Symbol.Name),
		"Multiply by sqrt(3).")
}

// countedTwice finds a line-to-earth voltage that is converted once more.
func (c *claim) countedTwice(p *check.Pass, v threePhase) {
	switch {
	case !isAmplitude(c.sym.Facts) || v.square:
	case v.number.root3 < 0:
		c.reportPhase(p, v, fmt.Sprintf("%s divides a line-to-earth voltage by the square root of 3: it is 0.58 times what it should be", c.sym.Name),
			"Leave the sqrt(3) out: it has been counted already.")
	case v.from == kind.Peak && v.to == kind.Peak && v.number.root2 > 0:
		c.reportPhase(p, v, fmt.Sprintf("%s multiplies a peak value by sqrt(2): the crest is counted twice", c.sym.Name), "Leave the sqrt(2) out.")
	}
}

// stress cautions about a stress or an energy that takes the voltage between
// two lines, which is right if the part stands between them.
func (c *claim) stress(p *check.Pass, v threePhase) {
	k := c.sym.Facts.Kind
	form, energy := c.form()
	switch {
	case v.number.root3 != 0:
		return
	case !v.square && (isOf(c.sym.Facts, kind.ElectricFieldStrength) || isOf(c.sym.Facts, kind.ElectricFluxDensity)):
	case !v.square && v.chargesCap && (isOf(c.sym.Facts, kind.ElectricCurrent) || k.Is(kind.LineicCurrent)):
	case v.square && energy && form == kind.StoredEnergy && !v.number.third:
	default:
		return
	}
	times := "1.73"
	if v.square {
		times = "3"
	}
	c.report(p, lang.Fault{
		Severity: p.Lowered(),
		Message:  fmt.Sprintf("%s takes the line-to-line voltage %s itself: to earth it would be %s times too large", c.sym.Name, v.voltage.Symbol.Name, times),
		Detail: fmt.Sprintf("To earth, `U_e, line-to-earth voltage = %s/sqrt(3)`. If the part stands between two lines, say so with the voltage across it: `U_c, rms voltage = %s`.",
			v.voltage.Symbol.Name, v.voltage.Symbol.Name),
		Related: c.because([]lang.Factor{v.voltage}, phaseWords),
	})
}

func phaseWords(s *lang.Symbol) string {
	return fmt.Sprintf("%s is a %s", s.Name, s.Facts.Kind)
}

func (c *claim) reportPhase(p *check.Pass, v threePhase, message, detail string) {
	f := lang.Fault{Message: message, Detail: detail, Related: c.because([]lang.Factor{v.voltage}, phaseWords)}
	if c.isProduct() {
		switch k := c.sym.Facts.Kind; {
		case k.Is(kind.LineToEarthVoltage) && !v.perPhase && v.number.root3 == 0:
			f.Fix = &lang.Fix{Title: "Divide by sqrt(3)", Edits: []lang.Edit{insert(c.span().End, "/sqrt(3)")}}
		case k.Is(kind.LineToLineVoltage) && v.number.root3 == 0:
			f.Fix = &lang.Fix{Title: "Multiply by sqrt(3)", Edits: []lang.Edit{insert(c.span().Start, "sqrt(3)*")}}
		case v.number.root3 < 0 && v.number.root2 == 0 && v.to == kind.Peak:
			f.Fix = &lang.Fix{Title: "Multiply by sqrt(2)", Edits: []lang.Edit{insert(c.span().Start, "sqrt(2)*")}}
		}
	}
	c.report(p, f)
}
