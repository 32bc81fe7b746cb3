package rules

import (
	"fmt"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// HertzRadianSlip finds frequencies where angular frequencies belong, and the
// reverse.
func (Book) HertzRadianSlip() check.Rule {
	return check.Rule{
		Name:     "hertz-radian-slip",
		Severity: lang.Error,
		Title:    "A frequency stands for an angular frequency, or the reverse",
		Sees: "A value in Hz declared as an angular frequency or one in rad/s as a frequency, also by the unit of a stated result; 1/√(LC), 1/(RC) or R/L called a frequency; " +
			"a reactance, susceptance, phase coefficient, skin depth or loss made with f where ω belongs, or with 2π twice; a sine of cycles; a sum or comparison of Hz with rad/s.",
		Silent: "With 2*pi between the two; for decay rates, activities and other quantities in 1/s; for the energy of one cycle times f, a switching power C·U²·f, " +
			"a charge times f.",
		Formula: "ω = 2πf: X = ωL = 2πfL, f₀ = 1/(2π√(LC)), δ = √(2/(ωµσ)), p = ωε″E². One cycle is 2π rad; in SI both have the unit 1/s.",
		Remedy:  "Write 2*pi*f where ω belongs, and divide by 2*pi to give a frequency in Hz.",
		Source:  "ISO 80000-3:2019, items 3-17.1 (frequency) and 3-18 (angular frequency) (from memory); BIPM, SI Brochure, 9th ed., 2.3.4",
		Wrong: check.Example{Note: `    L = 10 uH
    C = 100 nF
    f_0, frequency = 1/sqrt(L*C) = 1.00 MHz
`},
		Right: check.Example{Note: `    L = 10 uH
    C = 100 nF
    f_0, frequency = 1/(2*pi*sqrt(L*C)) = 159 kHz
`},
		Run: hertzRadian,
	}
}

func hertzRadian(p *check.Pass) error {
	for _, c := range viewOf(p).claims {
		if f, ok := c.cycleSlip(); ok {
			c.report(p, f)
		}
	}
	for _, s := range p.Note.Script.Stmts {
		cycleOperands(p, s)
	}
	return nil
}

// perCycle is what a value in cycles is short of in radians.
const perCycle = "6.28"

// counts tells whether a dimension is one over time that counts cycles or
// radians.
func countsOf(d unit.Dim) (cycles, radians bool) {
	if d.Base() != kind.Frequency.Dim().Base() {
		return false, false
	}
	one := unit.Whole(1)
	return d[unit.Cycle] == one, d[unit.Angle] == one
}

// cycleSlip finds what is wrong with a claim's cycles.
func (c *claim) cycleSlip() (lang.Fault, bool) {
	found, ok := c.note.FactsOf(c.sym.Stmt, c.x)
	if !ok || !found.Known {
		return lang.Fault{}, false
	}
	cycles, radians := countsOf(found.Dim)
	k := c.sym.Facts.Kind
	switch {
	case c.declared() && k.Is(kind.AngularFrequency) && cycles:
		return lang.Fault{
			Message: fmt.Sprintf("%s is a frequency in Hz declared as an angular frequency: it is %s times too small", c.sym.Name, perCycle),
			Detail:  fmt.Sprintf("Write `2*pi*%s`.", c.text()),
			Fix:     &lang.Fix{Title: "Multiply by 2*pi", Edits: []lang.Edit{insert(c.span().Start, "2*pi*")}},
		}, true
	case c.declared() && k.Is(kind.Frequency) && radians:
		return lang.Fault{
			Message: fmt.Sprintf("%s is an angular frequency declared as a frequency: it is %s times too large", c.sym.Name, perCycle),
			Detail:  "Divide by 2*pi, or declare it as an angular frequency.",
		}, true
	}
	if f, ok := c.corner(); ok {
		return f, true
	}
	if f, ok := c.statedIn(found); ok {
		return f, true
	}
	if e := c.emfOf(); e != nil && e.isKnown() {
		return lang.Fault{}, false // 4·f·N·B·A and 4.44·f·N·B·A take the frequency
	}
	return c.slot(found)
}

// corner finds 1/√(LC), 1/(RC), R/L called a frequency, or called an angular
// frequency with 2π below it.
func (c *claim) corner() (lang.Fault, bool) {
	k := c.sym.Facts.Kind
	isF, isW := k.Is(kind.Frequency), k.Is(kind.AngularFrequency)
	t, single := c.note.Normal(c.sym, lang.UpToDeclared).Single()
	if !c.declared() || !isF && !isW || !single || !isCorner(t) {
		return lang.Fault{}, false
	}
	switch {
	case isF && t.Pi == 0:
		return lang.Fault{
			Message: fmt.Sprintf("%s is %s times the frequency: this is the angular frequency", c.sym.Name, perCycle),
			Detail:  fmt.Sprintf("Divide by 2*pi, or write `%s, angular frequency = …`.", c.sym.Name),
		}, true
	case isW && t.Pi == -1:
		return lang.Fault{
			Message: fmt.Sprintf("%s is divided by 2π: this is the frequency in Hz, %s times less than the angular frequency", c.sym.Name, perCycle),
			Detail:  fmt.Sprintf("Leave the 2*pi out, or write `%s, frequency = …`.", c.sym.Name),
		}, true
	}
	return lang.Fault{}, false
}

// isCorner reports a product of circuit elements only.
func isCorner(t lang.Term) bool {
	elements := 0
	for _, f := range t.Factors {
		b := f.Facts.Dim.Base()
		switch b {
		case kind.Inductance.Dim().Base(), kind.Capacitance.Dim().Base(), kind.Resistance.Dim().Base(), kind.Conductance.Dim().Base():
			elements++
		case unit.Dim{}:
		default:
			return false
		}
		if f.Call != "" {
			return false
		}
	}
	return elements >= 2
}

// statedIn finds a result in rad/s stated in Hz, or the reverse.
func (c *claim) statedIn(found lang.Facts) (lang.Fault, bool) {
	cycles, radians := countsOf(found.Dim)
	if !cycles && !radians {
		return lang.Fault{}, false
	}
	for _, m := range c.sym.Def.Members[1:] {
		phrase := lang.UnitOf(m)
		if phrase == nil {
			continue
		}
		u, err := unit.Parse(phrase.Text)
		if err != nil {
			continue
		}
		uc, ur := countsOf(u.Dim)
		if uc && radians || ur && cycles {
			return lang.Fault{
				Span:    phrase.Span.Shift(c.sym.Stmt.At),
				Message: fmt.Sprintf("%s is %s, and is stated in %s: the two differ by 2π", c.sym.Name, countsWord(radians), phrase.Text),
				Detail:  "Convert with 2*pi, or state it in its own unit.",
			}, true
		}
	}
	return lang.Fault{}, false
}

func countsWord(radians bool) string {
	if radians {
		return "an angular frequency (rad/s)"
	}
	return "a frequency (Hz)"
}

// slot finds a frequency in Hz where a formula takes ω, or 2π taken twice.
func (c *claim) slot(found lang.Facts) (lang.Fault, bool) {
	if !c.takesOmega() {
		return lang.Fault{}, false
	}
	if !found.Dim[unit.Cycle].IsZero() && found.Dim.Base() != kind.Frequency.Dim().Base() && !usesPi(c.note, c.sym, map[*lang.Symbol]bool{}) {
		return lang.Fault{
			Message: fmt.Sprintf("%s takes a frequency in Hz where the angular frequency belongs", c.sym.Name),
			Detail:  fmt.Sprintf("Write 2*pi times the frequency. Each f in the place of ω is a factor of %s.", perCycle),
			Related: c.cyclic(),
		}, true
	}
	t, single := c.note.Normal(c.sym, lang.UpToDeclared).Single()
	if !single {
		return lang.Fault{}, false
	}
	for _, f := range t.Factors {
		if _, radians := countsOf(f.Facts.Dim); radians && f.Symbol != nil && (f.Exp == unit.Whole(1) && t.Pi == 1 || f.Exp == unit.Whole(-1) && t.Pi == -1) {
			return lang.Fault{
				Message: fmt.Sprintf("%s multiplies an angular frequency by 2π again", c.sym.Name),
				Detail:  "Leave one 2*pi out.",
				Related: c.because([]lang.Factor{f}, func(s *lang.Symbol) string { return s.Name + " is an angular frequency" }),
			}, true
		}
	}
	return lang.Fault{}, false
}

// usesPi reports a π in the definition of a name or in the auxiliary names that
// it goes through: the 2π of ω may then have been cancelled by one of geometry,
// as in ω·µ₀/(2π)·ln(s/r).
func usesPi(n *lang.Note, s *lang.Symbol, seen map[*lang.Symbol]bool) bool {
	if s == nil || s.Def == nil || seen[s] || len(s.Def.Members) == 0 {
		return false
	}
	seen[s] = true
	found := false
	lang.Walk(s.Def.Members[0], func(t lang.Tree) bool {
		if name, ok := t.(*lang.Name); ok && !found {
			key := lang.CanonicalName(name.Text)
			inner := n.Lookup(key)
			found = key == "pi" || inner != nil && inner.Facts.KindBy != lang.Declared && usesPi(n, inner, seen)
		}
		return !found
	})
	return found
}

// takesOmega reports claims whose formulas contain the angular frequency: by
// their kind, or losses by a loss factor, or alternating quantities by their
// statistic.
func (c *claim) takesOmega() bool {
	k := c.sym.Facts.Kind
	for _, id := range []kind.ID{
		kind.Reactance, kind.Impedance, kind.Susceptance, kind.Admittance, kind.ReactivePower, kind.LineicReactivePower,
		kind.PhaseCoefficient, kind.AttenuationCoefficient, kind.PropagationCoefficient, kind.SkinDepth, kind.SurfaceResistance, kind.Conductivity,
	} {
		if k.Is(id) {
			return true
		}
	}
	if k.Is(kind.Power) || k.Is(kind.PowerDensity) || k.Is(kind.LineicPower) {
		return c.hasLossFactor()
	}
	q := c.sym.Facts.Qualifier
	alternating := q == kind.Peak || q == kind.RMS
	return alternating && (k.Is(kind.ElectricCurrent) || k.Is(kind.Voltage) || k.Is(kind.LineicCurrent) || k.Is(kind.ElectricFieldStrength))
}

// hasLossFactor reports a loss factor or an imaginary permittivity among the
// factors of the claim.
func (c *claim) hasLossFactor() bool {
	for _, t := range terms(c.note.Normal(c.sym, lang.UpToDeclared)) {
		for _, f := range t.Factors {
			if f.Facts.Kind.Is(kind.LossFactor) {
				return true
			}
		}
	}
	return false
}

// cyclic points at the frequencies in the claim.
func (c *claim) cyclic() []lang.Related {
	var fs []lang.Factor
	for _, t := range terms(c.note.Normal(c.sym, lang.UpToDeclared)) {
		for _, f := range t.Factors {
			if cycles, _ := countsOf(f.Facts.Dim); cycles {
				fs = append(fs, f)
			}
		}
	}
	return c.because(fs, func(s *lang.Symbol) string { return s.Name + " is a frequency in Hz" })
}

// cycleOperands finds sums, comparisons and sines of cycles in a statement.
func cycleOperands(p *check.Pass, s *lang.Stmt) {
	facts := func(x lang.Expr) unit.Dim {
		f, ok := p.Note.FactsOf(s, x)
		if !ok || !f.Known {
			return unit.Dim{}
		}
		return f.Dim
	}
	differ := func(x, y lang.Expr) bool {
		cx, rx := countsOf(facts(x))
		cy, ry := countsOf(facts(y))
		return cx && ry || rx && cy
	}
	lang.Walk(s.Tree, func(t lang.Tree) bool {
		switch t := t.(type) {
		case *lang.Binary:
			if (t.Op == lang.OpAdd || t.Op == lang.OpSub) && differ(t.X, t.Y) {
				p.Report(lang.Fault{Span: s.Abs(t), Message: "a frequency in Hz and an angular frequency in rad/s are added", Detail: "Multiply the one in Hz by 2*pi."})
			}
		case *lang.Relation:
			for i := range t.Ops {
				if differ(t.Terms[i], t.Terms[i+1]) {
					p.Report(lang.Fault{Span: s.Abs(t), Message: "a frequency in Hz is compared with an angular frequency in rad/s", Detail: "Multiply the one in Hz by 2*pi."})
				}
			}
		case *lang.Call:
			sineOfCycles(p, s, t, facts)
		}
		return true
	})
}

// sineOfCycles finds sin(f*t).
func sineOfCycles(p *check.Pass, s *lang.Stmt, t *lang.Call, facts func(lang.Expr) unit.Dim) {
	switch t.Fn.Text {
	case "sin", "cos", "tan":
	default:
		return
	}
	if len(t.Args) == 1 && facts(t.Args[0])[unit.Cycle] == unit.Whole(1) {
		p.Report(lang.Fault{
			Span:    s.Abs(t.Args[0]),
			Message: fmt.Sprintf("%s takes an angle, and this counts cycles", t.Fn.Text),
			Detail:  "Multiply by 2*pi.",
		})
	}
}
