package rules

import (
	"fmt"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// TemperatureOffset explains sums of absolute temperatures, and finds absolute
// temperatures in the place of differences and the reverse.
func (Book) TemperatureOffset() check.Rule {
	return check.Rule{
		Name:     "temperature-offset",
		Severity: lang.Error,
		Extends:  true,
		Title:    "An absolute temperature stands for a difference, or a difference for an absolute temperature",
		Sees: "Two absolute temperatures that are added; 273.15 K on a difference, or on a temperature in °C, which is in kelvin already; a temperature coefficient times an absolute temperature, αT for α(T − T₀) " +
			"(a caution for one in kelvin); a rise that is held against an absolute temperature or defined by one, and the reverse; a rise beside k_B or σ_SB; a multiple of a temperature in °C.",
		Silent: "For differences T − T₀, of °C and K alike; for a rise with its kind, in °C or K; for the mean of temperatures; for T₂/T₁, k_B·T and 1/T, in which a temperature in °C counts in kelvin; " +
			"for coefficients that are not 1/K: a Seebeck coefficient times T.",
		Formula: "T/K = t/°C + 273.15 and ΔT/K = Δt/°C; R = R₀(1 + α(T − T₀)); exp(−E/(k_B·T)).",
		Remedy:  "Write differences in kelvin, `25 °C + 5 K`, or declare them: `dT, temperature rise = 15 °C`.",
		Source:  "NIST SP 811 (2008), 4.2.1.1 and 8.5; BIPM, SI Brochure, 9th ed., 2.3.1",
		Wrong: check.Example{Note: `    R_0, resistance = 14.8 ohm
    α = 3.93e-3 K^-1
    dT = 15 °C
    R, resistance = R_0*(1 + α*dT) = 31.6 ohm
`},
		Right: check.Example{Note: `    R_0, resistance = 14.8 ohm
    α = 3.93e-3 K^-1
    dT, temperature rise = 15 °C
    R, resistance = R_0*(1 + α*dT) = 15.67 ohm
`},
		Run: temperatureOffset,
	}
}

func temperatureOffset(p *check.Pass) error {
	for _, r := range refusals(p, "temperature-offset") {
		if b, ok := r.marked().(*lang.Binary); ok {
			p.Report(twoTemperatures(r, b))
		}
	}
	return perSpot(func(p *check.Pass, s *spot) {
		for _, c := range s.claims {
			temperatureClaim(p, c)
		}
		t := thermometer{p, s.stmt}
		lang.Walk(s.stmt.Tree, func(x lang.Tree) bool {
			switch x := x.(type) {
			case *lang.Binary:
				t.offset(x)
			case *lang.Relation:
				t.compared(x)
			}
			return true
		})
		t.coefficients(s.stmt.Tree, nil)
	})(p)
}

// isTemperature reports an absolute temperature, isRise a difference of two.
func isTemperature(f lang.Facts) bool {
	return f.Known && f.Dim.Base() == kind.Temperature.Dim().Base() && (f.Absolute || f.KindBy == lang.Declared && f.Kind.Is(kind.Temperature))
}

func isRise(f lang.Facts) bool {
	return f.Known && !f.Absolute && f.KindBy >= lang.Inferred && f.Kind.Is(kind.TemperatureRise)
}

// twoTemperatures explains a sum of two temperatures in °C.
func twoTemperatures(r refusal, b *lang.Binary) lang.Fault {
	x, y := r.text(b.X), r.text(b.Y)
	f := r.explained(
		fmt.Sprintf("%s and %s are absolute temperatures: their sum depends on where the scale has its zero", x, y),
		"Write the difference in kelvin (`25 °C + 5 K`), or declare its name as a temperature rise.")
	if whole := r.halved(); whole != nil {
		mean := fmt.Sprintf("mean(%s, %s)", x, y)
		f.Detail = fmt.Sprintf("The mean has a meaning: write `%s`.", mean)
		f.Fix = &lang.Fix{Title: "Write " + mean, Edits: []lang.Edit{{Span: r.stmt.Abs(whole), New: mean}}}
		return f
	}
	if l, ok := unparenthesized(b.Y).(*lang.Literal); ok {
		f.Fix = inKelvin(r.stmt, l)
	}
	return f
}

// halved is the half of the marked sum, nil where it is not halved.
func (r refusal) halved() lang.Tree {
	if _, ok := r.above(1).(*lang.Paren); !ok {
		return nil
	}
	b, ok := r.above(2).(*lang.Binary)
	if !ok {
		return nil
	}
	c, number := constantOf(b.Y)
	if b.Op == lang.OpMul && b.X != r.above(1) {
		c, number = constantOf(b.X)
	}
	if number && (b.Op == lang.OpDiv && c.value == 2 || b.Op == lang.OpMul && c.value == 0.5) {
		return b
	}
	return nil
}

// inKelvin is the correction of a literal in °C that is a difference.
func inKelvin(s *lang.Stmt, l *lang.Literal) *lang.Fix {
	if l.Unit == nil {
		return nil
	}
	return &lang.Fix{Title: "Write K", Edits: []lang.Edit{{Span: l.Unit.Span.Shift(s.At), New: "K"}}}
}

// temperatureClaim looks at what a temperature or a rise is defined by, and for
// rises in laws of absolute temperature.
func temperatureClaim(p *check.Pass, c *claim) {
	found, ok := c.note.FactsOf(c.sym.Stmt, c.x)
	if !ok || !found.Known {
		return
	}
	k := c.sym.Facts.Kind
	switch {
	case c.declared() && k.Is(kind.TemperatureRise) && isTemperature(found):
		c.report(p, lang.Fault{
			Message: fmt.Sprintf("%s is declared as a rise, and %s is an absolute temperature: 273.15 K are in it", c.sym.Name, c.text()),
			Detail:  fmt.Sprintf("Subtract the temperature from which it rises: `%s - …`.", c.text()),
		})
	case c.declared() && k.Is(kind.Temperature) && isRise(found):
		c.report(p, lang.Fault{
			Message: fmt.Sprintf("%s is declared as a temperature, and its formula gives a rise", c.sym.Name),
			Detail:  "Add the temperature from which it rises, or declare a temperature rise.",
		})
	case c.declared() && k.Is(kind.Temperature) && multiplied(c):
		c.report(p, lang.Fault{
			Message: fmt.Sprintf("%s multiplies a temperature in °C: it counts in kelvin from absolute zero", c.sym.Name),
			Detail:  "Multiply the rise above a reference, `T_0 + 2*(T - T_0)`; a multiple of an absolute temperature is written in kelvin.",
		})
	default:
		riseInLaw(p, c)
	}
}

// multiplied reports a temperature in °C times a plain number, not as a mean.
func multiplied(c *claim) bool {
	b, ok := unparenthesized(c.x).(*lang.Binary)
	if !ok || b.Op != lang.OpMul && b.Op != lang.OpDiv {
		return false
	}
	number := func(x lang.Expr) bool { n, ok := constantOf(x); return ok && n.dim.IsOne() }
	celsius := func(x lang.Expr) bool {
		f, ok := c.note.FactsOf(c.sym.Stmt, x)
		_, sum := unparenthesized(x).(*lang.Binary)
		return ok && f.Known && f.Absolute && !sum
	}
	return number(b.Y) && celsius(b.X) || b.Op == lang.OpMul && number(b.X) && celsius(b.Y)
}

// riseInLaw finds a rise in a product with k_B or σ_SB.
func riseInLaw(p *check.Pass, c *claim) {
	lang.Walk(c.x, func(t lang.Tree) bool {
		x, ok := t.(*lang.Binary)
		if !ok || x.Op != lang.OpMul && x.Op != lang.OpDiv {
			return true
		}
		form := c.note.StatementForm(c.sym.Stmt, x, lang.NamesStay)
		for _, term := range terms(form) {
			law, rise := "", lang.Factor{}
			for _, f := range term.Factors {
				switch {
				case f.Symbol != nil && (f.Symbol.Key == "k_b" || f.Symbol.Name == "k_B" || f.Symbol.Name == "sigma_SB"):
					law = f.Symbol.Name
				case isRise(f.Facts) && f.Facts.KindBy == lang.Declared:
					rise = f
				}
			}
			if law != "" && rise.Symbol != nil && len(form.Terms) == 1 {
				c.report(p, lang.Fault{
					Span:    c.sym.Stmt.Abs(x),
					Message: fmt.Sprintf("%s goes with an absolute temperature, and %s is a rise", law, rise.Symbol.Name),
					Detail:  "Put in the absolute temperature; what is in °C counts in kelvin.",
					Related: c.because([]lang.Factor{rise}, func(s *lang.Symbol) string { return s.Name + " is a temperature rise" }),
				})
				return false
			}
		}
		return true
	})
}
