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

// PulseDutyPower finds pulse powers that heat, mean powers that break down, and
// duty ratios that cannot be.
func (Book) PulseDutyPower() check.Rule {
	return check.Rule{
		Name:     "pulse-duty-power",
		Severity: lang.Error,
		Title:    "The power during a pulse stands where its mean belongs, or the mean where the pulse counts",
		Sees: "A heat, a temperature rise, a heating rate, a specific absorption rate or an average that is made with a pulse power (kind peak envelope power, or `pulsed peak power`) without a duty ratio; " +
			"a peak field or voltage, or the energy of one pulse, that is made with the average power of pulses; a duty ratio above 1, or one that is not pulse duration times repetition frequency. " +
			"A caution where the power of the pulses says neither peak nor average, and where a time that may be the pulse duration stands beside it.",
		Silent: "For continuous waves; with a duty ratio or another number below 1, with pulse duration times repetition frequency, or with a pulse duration alone for the heat of one pulse; with a transient thermal impedance; for results that are declared as peak values; " +
			"for peak fields from pulse powers; for one pulse among several.",
		Formula: "P_mean = P_pulse·t_p·f_p = P_pulse·D; one pulse has the energy P_pulse·t_p; Ê = √(2·η·S_pulse).",
		Remedy:  "Give the two powers names of their own: `P_m, average power = P_p*t_p*f_p`.",
		Source:  "IEC 60050-702 and -713 (duty factor, peak envelope power; from memory); common practice",
		Wrong: check.Example{Note: `    P_p, pulse power = 25 kW
    R_th, thermal resistance = 0.8 K/W
    ΔT, temperature rise = R_th*P_p = 20.0 kK
`},
		Right: check.Example{Note: `    P_p, pulse power = 25 kW
    t_p, pulse duration = 1.5 us
    f_p, pulse repetition frequency = 400 Hz
    P_m, average power = P_p*t_p*f_p = 15.0 W
    R_th, thermal resistance = 0.8 K/W
    ΔT, temperature rise = R_th*P_m = 12.0 K
`},
		Run: func(p *check.Pass) error {
			dutyOfPulses(p)
			return perClaim(pulsePowers)(p)
		},
	}
}

// pulsed is the power of pulses in a term, and what else tells its share.
type pulsed struct {
	power  lang.Factor
	level  pulseLevel
	shared bool // a duty ratio, or times that make one, stand beside it
	pulse  bool // a pulse duration stands beside it
	time   bool // another time does
	steep  bool // a transient thermal impedance does
}

// pulseLevel tells what a power of pulses is.
type pulseLevel uint8

const (
	noPulse   pulseLevel = iota
	pulseTop             // during the pulse
	pulseMean            // over many pulses
	pulseOpen            // pulsed, and nobody says which
)

func pulsePowers(p *check.Pass, c *claim) {
	for _, t := range products(c.note.Normal(c.sym, lang.UpToDeclared)) {
		u, ok := pulsedIn(c.note, t)
		if !ok {
			continue
		}
		switch {
		case u.level == pulseMean:
			c.meanForPulse(p, u)
		case !u.shared && !u.steep && !c.hasShare():
			c.pulseForMean(p, u)
		}
		return
	}
}

// pulsedIn finds the only power of pulses in a term.
func pulsedIn(n *lang.Note, t *product) (u pulsed, ok bool) {
	var times, rates int
	for _, f := range t.all {
		level := levelOf(n, f, maxScalings)
		switch k := f.Facts.Kind; {
		case level != noPulse && ok:
			return u, false
		case level != noPulse:
			u.power, u.level, ok = f, level, true
		case k.Is(kind.DutyRatio):
			u.shared = true
		case k.Is(kind.TransientThermalImpedance) || f.Call != "" || f.Facts.Dim.IsOne() && k.Is(kind.Ratio):
			u.steep = true
		case k.Is(kind.PulseDuration):
			u.pulse = true
			times++
		case isOf(f.Facts, kind.Time) && f.Exp.Sign() > 0:
			u.time = true
			times++
		case isOf(f.Facts, kind.Frequency) && f.Exp.Sign() > 0, isOf(f.Facts, kind.Time):
			rates++
		}
	}
	u.shared = u.shared || times > 0 && rates > 0
	return u, ok
}

// hasShare reports a number below 1 that is written out or that a name stands
// for: it may be a duty ratio.
func (c *claim) hasShare() bool {
	found := false
	lang.Walk(c.x, func(t lang.Tree) bool {
		switch t := t.(type) {
		case *lang.Literal:
			found = found || t.Unit == nil && t.Num.Value < 0.9
		case *lang.Name:
			s := c.note.Lookup(lang.CanonicalName(t.Text))
			found = found || s != nil && s.Input && s.Facts.Dim.IsOne() && s.Facts.KindBy != lang.Declared && s.Value.Re() < 0.9
		}
		return !found
	})
	return found
}

// isPower reports a power, a power flux or a density of one.
func isPower(f lang.Facts) bool {
	class := f.Kind.Info().Class
	return (class == kind.ClassPower || class == kind.ClassPowerFlux) && !f.Dim.IsOne() && !f.Kind.Is(kind.Energy)
}

// levelOf tells what a factor is as a power of pulses, by its own words or as a
// multiple of a power that says it.
func levelOf(n *lang.Note, f lang.Factor, depth int) pulseLevel {
	if !isPower(f.Facts) || depth == 0 {
		return noPulse
	}
	average := f.Facts.Qualifier == kind.Average && f.Facts.QualBy == lang.Declared
	switch {
	case f.Facts.Kind.Is(kind.PeakEnvelopePower):
		return pulseTop
	case f.Facts.Waveform == kind.Pulsed && f.Facts.Qualifier == kind.Peak:
		return pulseTop
	case f.Facts.Waveform == kind.Pulsed && average:
		return pulseMean
	case f.Facts.Waveform == kind.Pulsed:
		return pulseOpen
	case f.Symbol == nil || f.Symbol.Def == nil || f.Symbol.Input:
		return noPulse
	}
	t, single := n.Normal(f.Symbol, lang.UpToDeclared).Single()
	if !single {
		return noPulse
	}
	level, shared := noPulse, false
	for _, g := range t.Factors {
		if l := levelOf(n, g, depth-1); l != noPulse {
			level = l
		}
		shared = shared || g.Facts.Kind.Is(kind.DutyRatio) || g.Facts.Kind.Is(kind.PulseRepetitionFrequency)
	}
	switch {
	case level == pulseTop && (shared || average):
		return pulseMean
	case level == pulseTop && f.Exp != unit.Whole(1) && f.Facts.Qualifier == kind.Average:
		return pulseMean
	}
	return level
}

// thermalKinds are the results that follow the mean power; read only.
var thermalKinds = []kind.ID{kind.Heat, kind.Temperature, kind.TemperatureRise, kind.HeatingRate, kind.SpecificAbsorptionRate, kind.HeatFlowRate}

// pulseForMean reports a thermal or average result made with a pulse power.
func (c *claim) pulseForMean(p *check.Pass, u pulsed) {
	k := c.sym.Facts.Kind
	thermal := false
	for _, t := range thermalKinds {
		thermal = thermal || k.Is(t)
	}
	average := c.stat == kind.Average && isPower(c.sym.Facts)
	if !thermal && !average || c.stat == kind.Peak || u.pulse || u.power.Exp != unit.Whole(1) {
		return
	}
	name := u.power.Symbol.Name
	f := lang.Fault{
		Message: fmt.Sprintf("%s is made with %s, the power during the pulse, and it follows the mean power", c.sym.Name, name),
		Detail:  fmt.Sprintf("Multiply by the duty ratio, or by pulse duration and repetition frequency: `P_m, average power = %s*t_p*f_p`.", name),
		Related: c.because([]lang.Factor{u.power}, func(s *lang.Symbol) string { return s.Name + " is the power during the pulse" }),
	}
	switch {
	case u.level == pulseOpen:
		f.Severity = p.Lowered()
		f.Message = fmt.Sprintf("%s follows the mean power, and %s does not say whether it is the power during the pulse", c.sym.Name, name)
		f.Detail = fmt.Sprintf("Write `%s, pulsed average power = …` or `%s, pulsed peak power = …`.", name, name)
	case u.time:
		f.Severity = p.Lowered()
		f.Detail += " If the time beside it is that of one pulse, say so: `t_p, pulse duration = …`."
	default:
		f.Detail += fmt.Sprintf(" If it is meant during the pulse, write `%s, peak …`.", c.sym.Name)
	}
	c.report(p, f)
}

// meanForPulse reports a peak field, or the energy of one pulse, made with the
// mean power.
func (c *claim) meanForPulse(p *check.Pass, u pulsed) {
	half := unit.NewRat(1, 2)
	field := u.power.Exp == half && isAmplitude(c.sym.Facts) && c.stat == kind.Peak && !u.shared
	one := u.power.Exp == unit.Whole(1) && u.pulse && !u.shared && c.sym.Facts.Dim.Base() == kind.Energy.Dim().Base()
	if !field && !one {
		return
	}
	name := u.power.Symbol.Name
	what := "the crest of the field follows the power during the pulse"
	if one {
		what = "the energy of one pulse is the power during the pulse times its duration"
	}
	c.report(p, lang.Fault{
		Message: fmt.Sprintf("%s is made with %s, the mean power of pulses: %s", c.sym.Name, name, what),
		Detail:  "Take the pulse power, or divide the mean power by the duty ratio.",
		Related: c.because([]lang.Factor{u.power}, func(s *lang.Symbol) string { return s.Name + " is the mean power" }),
	})
}

// dutyOfPulses judges the duty ratios of the note: below 1, and equal to pulse
// duration times repetition frequency where the note has one of each.
func dutyOfPulses(p *check.Pass) {
	ratio, ratios := onlyOf(p.Note, kind.DutyRatio)
	duration, durations := onlyOf(p.Note, kind.PulseDuration)
	rate, rates := onlyOf(p.Note, kind.PulseRepetitionFrequency)
	for _, s := range p.Note.Symbols {
		if s.Facts.Kind.Is(kind.DutyRatio) && s.Facts.KindBy == lang.Declared && s.Result.Known && s.Stmt != nil && !(s.Value.Re() <= 1) {
			p.Report(lang.Fault{
				Span:    s.Span,
				Message: fmt.Sprintf("the duty ratio %s is %.3g: it cannot be above 1", s.Name, s.Value.Re()),
				Detail:  "It is the duration of a pulse over the period; 5 is not 5 %.",
			})
			ratios = 0
		}
	}
	if ratios != 1 || durations != 1 || rates != 1 || ratio.Stmt == nil {
		return
	}
	want := duration.Value.Re() * rate.Value.Re()
	if have := ratio.Value.Re(); math.Abs(have/want-1) > 0.05 {
		severity, unless := p.Lowered(), " If it is the duty ratio of something else, waive this for it."
		if pulsesWith(p.Note, ratio) {
			severity, unless = p.Rule.Severity, ""
		}
		p.Report(lang.Fault{
			Span: ratio.Span, Severity: severity,
			Message: fmt.Sprintf("the duty ratio %s is %.3g, and %s times %s is %.3g", ratio.Name, have, duration.Name, rate.Name, want),
			Detail:  "Correct one of the three, or compute the duty ratio from the other two." + unless,
			Related: []lang.Related{
				{Path: duration.Path, Span: duration.Span, Message: "the pulse duration"}, {Path: rate.Path, Span: rate.Span, Message: "the repetition frequency"},
			},
		})
	}
}

// pulsesWith reports a definition in which the duty ratio stands beside the
// power of pulses: it is theirs.
func pulsesWith(n *lang.Note, ratio *lang.Symbol) bool {
	for _, s := range n.Symbols {
		if s.Role != lang.RoleQuantity || s.Input || !isPower(s.Facts) {
			continue
		}
		t, single := n.Normal(s, lang.NamesStay).Single()
		if !single {
			continue
		}
		duty := slices.ContainsFunc(t.Factors, func(f lang.Factor) bool { return f.Symbol == ratio })
		power := slices.ContainsFunc(t.Factors, func(f lang.Factor) bool { return levelOf(n, f, maxScalings) != noPulse })
		if duty && power {
			return true
		}
	}
	return false
}

// onlyOf gives the scalar of a declared kind, and how many the note has.
func onlyOf(n *lang.Note, k kind.ID) (only *lang.Symbol, count int) {
	for _, s := range n.Symbols {
		if s.Role == lang.RoleQuantity && s.Facts.Kind.Is(k) && s.Facts.KindBy == lang.Declared && s.Result.Known && s.Value.Len() == 1 {
			only, count = s, count+1
		}
	}
	return only, count
}
