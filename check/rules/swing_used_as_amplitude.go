package rules

import (
	"fmt"
	"math/big"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// SwingUsedAsAmplitude finds peak-to-peak values where an amplitude belongs.
func (Book) SwingUsedAsAmplitude() check.Rule {
	return check.Rule{
		Name:     "swing-used-as-amplitude",
		Severity: lang.Error,
		Title:    "A peak-to-peak value stands where the formula takes the amplitude, half of it",
		Sees: "A peak-to-peak value under a loss law, k·f^α·B^β, also through a function; in the law of induction with the number that belongs to the crest (4.44, 2π, 4); " +
			"in a power or an energy with the coefficient that belongs to peak or rms values; added to a static value; and a quantity that is declared as a peak or an rms value and is the swing itself. " +
			"A caution where a swing is compared with or divides a saturation value or a strength, and where a stored energy may swing from zero.",
		Silent: "Where the swing is halved (or divided by 2√2 or √12 for an rms value), or the coefficient is the swing's own (U_pp²/(8R), 2.22·f·N·ΔB·A); " +
			"for a law that is referred to a swing: `B_0, peak-to-peak magnetic flux density = 1 T` and `(ΔB/B_0)^β`; for ratios of swings, and for charges and times of ripple, which are linear in it.",
		Formula: "X̂ = ΔX/2: a loss ∝ B̂^β is 2^β times too large with ΔB, a square 4 times; with a bias the crest is X_dc + ΔX/2.",
		Remedy:  "Halve it where it is defined: `B_a, peak magnetic flux density = ΔB/2`.",
		Source:  "IEC 62044-3:2000 (power loss at the peak flux density; from memory); IEC 60050-103 (peak-to-valley value; from memory)",
		Wrong: check.Example{Note: `    f_s = 100 kHz
    P_v(f, b), power density = 1.9 W/m^3*(f/1 Hz)^1.46*(b/1 T)^2.75
    ΔB, peak-to-peak magnetic flux density = 106 mT
    p_c, average power density = P_v(f_s, ΔB) = 79.1 kW/m^3
`},
		Right: check.Example{Note: `    f_s = 100 kHz
    P_v(f, b), power density = 1.9 W/m^3*(f/1 Hz)^1.46*(b/1 T)^2.75
    ΔB, peak-to-peak magnetic flux density = 106 mT
    p_c, average power density = P_v(f_s, ΔB/2) = 11.8 kW/m^3
`},
		Run: perSpot(swingUsed),
	}
}

func swingUsed(p *check.Pass, s *spot) {
	m := mixer{p: p, stmt: s.stmt}
	lang.Walk(s.stmt.Tree, func(t lang.Tree) bool {
		switch t := t.(type) {
		case *lang.Binary:
			m.swingBeside(t)
		case *lang.Relation:
			for i := range t.Ops {
				m.swingAgainst(t, t.Terms[i], t.Terms[i+1])
			}
		}
		return true
	})
	for _, c := range s.claims {
		switch {
		case c.swingDeclared(p):
		case c.swingInLaw(p):
		case c.swingInduces(p):
		default:
			c.swingSquared(p)
		}
	}
}

// swingBeside finds a static value plus a swing, and a limit over a swing.
func (m mixer) swingBeside(b *lang.Binary) {
	switch b.Op {
	case lang.OpAdd, lang.OpSub:
		x, y := m.stat(b.X), m.stat(b.Y)
		swing, steady := b.X, b.Y
		if y == kind.PeakToPeak {
			swing, steady, x, y = b.Y, b.X, y, x
		}
		if x != kind.PeakToPeak || y != kind.Static || !m.amplitudes(swing, steady) {
			return
		}
		f := lang.Fault{
			Span:    m.stmt.Abs(b),
			Message: "a static value and a swing are joined: the crest is the static value and half of the swing",
			Detail:  "Write half of the peak-to-peak value here, or give the amplitude a name of its own.",
			Related: m.saidOf(swing, steady),
		}
		if n, ok := swing.(*lang.Name); ok {
			f.Fix = &lang.Fix{Title: "Halve the swing", Edits: []lang.Edit{{Span: m.stmt.Abs(n), New: n.Text + "/2"}}}
		}
		m.p.Report(f)
	case lang.OpDiv:
		m.swingAgainst(b, b.X, b.Y)
	}
}

// saidOf points at the definitions of named operands.
func (m mixer) saidOf(xs ...lang.Expr) []lang.Related {
	var out []lang.Related
	for _, x := range xs {
		if s := m.symbol(x); s != nil && s.Stmt != nil {
			out = append(out, lang.Related{Path: s.Path, Span: s.Span, Message: fmt.Sprintf("%s is %s value", s.Name, article(m.stat(x)))})
		}
	}
	return out
}

// swingAgainst cautions about a swing that is held against a limit of the
// amplitude whose statistic nobody states: a saturation value, a strength.
func (m mixer) swingAgainst(at lang.Tree, x, y lang.Expr) {
	if m.stat(y) == kind.PeakToPeak {
		x, y = y, x
	}
	if m.stat(x) != kind.PeakToPeak || known(m.stat(y), m.stat(y)) || !m.isLimit(y) {
		return
	}
	m.p.Report(lang.Fault{
		Span: m.stmt.Abs(at), Severity: m.p.Lowered(),
		Message: "a swing is held against a limit of the amplitude: without a bias the crest is half of the swing, with one it is the bias and half of it",
		Detail:  "Hold the crest against the limit, `X_dc + ΔX/2`. If the quantity swings from zero, its crest is the swing: write it as a peak value.",
		Related: m.saidOf(x),
	})
}

// limitKinds are the kinds of limits that an amplitude must not pass; read only.
var limitKinds = []kind.ID{
	kind.SaturationFluxDensity, kind.KneeFluxDensity, kind.SaturationCurrent, kind.DielectricStrength,
	kind.WithstandVoltage, kind.BreakdownVoltage, kind.InceptionVoltage, kind.InceptionFieldStrength, kind.RatedVoltage,
}

func (m mixer) isLimit(x lang.Expr) bool {
	f, _ := m.p.Note.FactsOf(m.stmt, x)
	for _, k := range limitKinds {
		if f.Kind.Is(k) {
			return true
		}
	}
	return false
}

// swingDeclared finds an amplitude that is declared as a peak or an rms value
// and is the swing itself.
func (c *claim) swingDeclared(p *check.Pass) bool {
	if c.stat != kind.Peak && c.stat != kind.RMS || !isAmplitude(c.sym.Facts) || shaped(c.sym.Facts.Waveform) || c.emfOf() != nil {
		return false
	}
	form := c.note.Normal(c.sym, unnamed)
	t, single := form.Single()
	if !single {
		return false
	}
	swing := c.unconverted(t)
	if s, _ := scaleOf(t); swing == nil || swing.Facts.Qualifier != kind.PeakToPeak || s.value == 0.5 {
		return false // half of a swing called an rms value is the crest: rms-peak-mix speaks
	}
	f := lang.Fault{
		Message: fmt.Sprintf("%s is declared as %s value and is the whole swing", c.sym.Name, article(c.stat)),
		Detail:  "The peak value is half of a symmetrical swing, the rms value of a sinusoid 1/(2*sqrt(2)) of it, that of a triangle 1/sqrt(12).",
		Related: c.because([]lang.Factor{*swing}, func(s *lang.Symbol) string { return s.Name + " is a peak-to-peak value" }),
	}
	if c.stat == kind.Peak && c.isProduct() {
		f.Fix = &lang.Fix{Title: "Halve the swing", Edits: []lang.Edit{insert(c.span().Start, "1/2*")}}
	}
	c.report(p, f)
	return true
}

// swingInduces finds a swing of the flux in the law of induction with the
// number that belongs to its crest.
func (c *claim) swingInduces(p *check.Pass) bool {
	e := c.emfOf()
	if e == nil || c.statisticOf(e.flux) != kind.PeakToPeak {
		return false
	}
	square, ok := c.squareWave(e)
	crest, told := emfNumber(c.statisticOf(e.voltage), kind.Peak, square)
	if !ok || !told || !e.is(crest) {
		return false
	}
	c.report(p, lang.Fault{
		Message: fmt.Sprintf("%s takes the swing of the flux for its crest: the law has the number %.3g for the crest and half of it for the swing", c.sym.Name, crest),
		Detail:  fmt.Sprintf("Halve the swing, or write %.3g.", crest/2),
		Related: c.because([]lang.Factor{e.voltage, e.flux}, func(s *lang.Symbol) string {
			return fmt.Sprintf("%s is %s value", s.Name, article(c.statisticOf(lang.Factor{Symbol: s, Facts: s.Facts})))
		}),
	})
	return true
}

// swingSquared finds a power or an energy of swings with the coefficient of
// peak or rms values.
func (c *claim) swingSquared(p *check.Pass) {
	form, ok := c.form()
	if !ok || form == kind.DrawnEnergy {
		return
	}
	squares, ok := c.squares(form)
	if !ok {
		return
	}
	for _, q := range squares {
		if !q.known || q.stat != kind.PeakToPeak || form == kind.FieldForce && !q.selfForce() || form != kind.StoredEnergy && form != kind.FieldForce && !c.isMean(q) {
			continue
		}
		if off := c.swingOff(q, form); off != nil {
			c.reportSwing(p, q, form, off, len(squares) == 1)
			return
		}
	}
}

// swingOff tells by which factor a square of swings is off, where it has the
// coefficient of peak or rms values.
func (c *claim) swingOff(q *square, form kind.Form) *big.Rat {
	found := numbersOf(c.note, c.sym)
	asPeak := *q
	asPeak.stat = kind.Peak
	var off *big.Rat
	for _, to := range c.targets() {
		right, ok := asPeak.coefficient(c.note, form, to)
		if !ok {
			continue
		}
		quarter := new(big.Rat).Mul(right, big.NewRat(1, 4))
		twelfth := new(big.Rat).Mul(right, big.NewRat(1, 6)) // of a triangle whose waveform is not said
		if q.mayBe(found, quarter) || q.mayBe(found, twelfth) {
			return nil
		}
		by := q.off(found, quarter, big.NewRat(4, 1), big.NewRat(8, 1))
		if by != nil && (off == nil || by.Cmp(off) < 0) {
			off = by
		}
	}
	return off
}

func (c *claim) reportSwing(p *check.Pass, q *square, form kind.Form, off *big.Rat, alone bool) {
	f := lang.Fault{
		Message: fmt.Sprintf("%s is %s times too large: its amplitude is half of the swing", c.sym.Name, times(off)),
		Detail:  "The square of a peak-to-peak value is four times that of the peak value and eight times the mean square of a sinusoid.",
		Related: c.because(q.amplitudes, func(s *lang.Symbol) string { return s.Name + " is a peak-to-peak value" }),
	}
	if form == kind.StoredEnergy && c.stat != kind.Average {
		f.Severity = p.Lowered()
		f.Detail += " If the quantity swings from zero, its crest is the swing: write it as a peak value."
	}
	if alone {
		factor := ratio(new(big.Rat).Inv(off))
		f.Fix = &lang.Fix{Title: "Multiply by " + factor, Edits: []lang.Edit{insert(c.span().Start, factor+" * ")}}
	}
	c.report(p, f)
}
