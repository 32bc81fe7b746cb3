package rules

import (
	"fmt"
	"math"
	"slices"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// EmfCrestTwice finds laws of induction whose number does not go with the
// statistics of the voltage and of the flux density.
func (Book) EmfCrestTwice() check.Rule {
	return check.Rule{
		Name:     "emf-crest-twice",
		Severity: lang.Error,
		Title:    "The number in U = 4.44·f·N·B·A does not go with the statistics of the voltage and of the flux density",
		Sees: "The law of induction of a winding, solved for any of its quantities, with 4.44 (√2·π) and a peak voltage, 2π and an rms voltage, 4 and a sinusoid, 4.44 and a square wave, or any of them with an rms flux density. " +
			"A caution where the statistic of the one is not stated and the usual one, the crest of the flux density, is taken; and where 4 would be right for a square wave.",
		Silent: "For the pairs 4.44, rms voltage, crest of B; 2π, peak voltage, crest of B; 4, square or average voltage, crest of B; for numbers that are none of these; with a form factor; for a swing of B, on which swing-used-as-amplitude speaks; " +
			"where neither statistic is stated.",
		Formula: "Û = 2π·f·N·B̂·A, U = √2·π·f·N·B̂·A = 4.44·f·N·B̂·A for a sinusoid; U = 4·f·N·B̂·A for a square voltage and for the rectified mean of any.",
		Remedy:  "Choose the pair: `B, peak magnetic flux density = U/(4.44*f*N*A)` with the rms voltage.",
		Source:  "Faraday's law; common practice in transformer design (4.44 is √2·π)",
		Wrong: check.Example{Note: `    U, rms voltage = 230 V
    f = 50 Hz
    N, number of turns = 120
    A, area = 72 cm^2
    B, peak magnetic flux density = sqrt(2)*U/(4.44*f*N*A) = 1.70 T
`},
		Right: check.Example{Note: `    U, rms voltage = 230 V
    f = 50 Hz
    N, number of turns = 120
    A, area = 72 cm^2
    B, peak magnetic flux density = U/(4.44*f*N*A) = 1.20 T
`},
		Run: perClaim(emfCrest),
	}
}

// emfNumbers are the numbers by which the law is known, and those times or over
// √2; read only.
var emfNumbers = []float64{math.Sqrt2 * math.Pi, 2 * math.Pi, 4, math.Pi, 2 * math.Sqrt2 * math.Pi, 4 * math.Sqrt2, 2 * math.Sqrt2}

func emfCrest(p *check.Pass, c *claim) {
	e := c.emfOf()
	if e == nil {
		return
	}
	square, ok := c.squareWave(e)
	u, b := c.statisticOf(e.voltage), c.statisticOf(e.flux)
	if !ok || !e.isKnown() || b == kind.PeakToPeak || !known(u, u) && !known(b, b) {
		return
	}
	if right, wrong := c.emfWrong(e, u, b, square); wrong {
		c.reportEmf(p, e, u, b, right)
	}
}

// isKnown reports one of the numbers by which the law is known.
func (e *emf) isKnown() bool {
	return slices.ContainsFunc(emfNumbers, func(k float64) bool { return near(e.number, k) })
}

// emfWrong gives the number that belongs there where the number of the law is
// another one for every statistic that may be meant.
func (c *claim) emfWrong(e *emf, u, b kind.Qualifier, square bool) (right float64, wrong bool) {
	voltages, fluxes := []kind.Qualifier{u}, []kind.Qualifier{b}
	if u == kind.Unqualified {
		voltages = []kind.Qualifier{kind.RMS, kind.Peak, kind.Average}
	}
	if b == kind.Unqualified {
		fluxes = []kind.Qualifier{kind.Peak, kind.PeakToPeak}
	}
	for _, x := range voltages {
		for _, y := range fluxes {
			k, told := emfNumber(x, y, square)
			if !told || e.is(k) {
				return 0, false
			}
			if right == 0 {
				right = k
			}
		}
	}
	return right, true
}

func (c *claim) reportEmf(p *check.Pass, e *emf, u, b kind.Qualifier, right float64) {
	factor := right / e.number
	if e.voltage.Symbol == c.sym {
		factor = 1 / factor
	}
	f := lang.Fault{
		Message: fmt.Sprintf("%s is %.2f times what it should be: the law has the number %.3g here, and with %s and %s it is %.3g",
			c.sym.Name, factor, e.number, statWords(u, "voltage"), statWords(b, "flux density"), right),
		Detail: "4.44 (√2·π) joins the rms voltage and the crest of the flux density, 2π the two crests, 4 a square voltage and the crest, all of U = K·f·N·B·A.",
		Related: c.because([]lang.Factor{e.voltage, e.flux}, func(s *lang.Symbol) string {
			return fmt.Sprintf("%s is %s", s.Name, statWords(c.statisticOf(lang.Factor{Symbol: s, Facts: s.Facts}), "quantity"))
		}),
	}
	if unless := c.emfUnless(e, u, b); unless != "" {
		f.Severity = p.Lowered()
		f.Detail += unless
	}
	if edit, ok := c.emfEdit(e, right); ok {
		f.Fix = &lang.Fix{Title: fmt.Sprintf("Write %s", edit.New), Edits: []lang.Edit{edit}}
	}
	c.report(p, f)
}

// statWords names a quantity by its statistic.
func statWords(q kind.Qualifier, what string) string {
	if q == kind.Unqualified {
		return "a " + what + " whose statistic is not stated"
	}
	return article(q) + " " + what
}

// emfUnless names the fact that would make the number right.
func (c *claim) emfUnless(e *emf, u, b kind.Qualifier) string {
	switch {
	case b == kind.Unqualified:
		return fmt.Sprintf(" The crest of %s is taken; if it is something else, say so at its definition.", e.flux.Symbol.Name)
	case u == kind.Unqualified && b == kind.Peak:
		return fmt.Sprintf(" Say at its definition what %s is.", e.voltage.Symbol.Name)
	}
	if k, _ := emfNumber(u, b, true); e.is(k) && !c.harmonic() && waveOf(c.note, e.voltage) == kind.AnyWave && waveOf(c.note, e.flux) == kind.AnyWave {
		return fmt.Sprintf(" If %s is a square wave, say so: `%s, square …`.", e.voltage.Symbol.Name, e.voltage.Symbol.Name)
	}
	return ""
}

// emfEdit writes the right number in the place of the only one that is written.
func (c *claim) emfEdit(e *emf, right float64) (lang.Edit, bool) {
	text := ""
	for _, k := range []struct {
		value float64
		text  string
	}{{2 * math.Pi, "(2*pi)"}, {math.Sqrt2 * math.Pi, "4.44"}, {4, "4"}} {
		if near(right, k.value) {
			text = k.text
		}
	}
	var at []*lang.Literal
	lang.Walk(c.x, func(t lang.Tree) bool {
		if l, ok := t.(*lang.Literal); ok && l.Unit == nil {
			at = append(at, l)
		}
		return true
	})
	if text == "" || len(at) != 1 || !near(at[0].Num.Value, e.number) {
		return lang.Edit{}, false
	}
	return lang.Edit{Span: c.sym.Stmt.Abs(at[0]), New: text}, true
}
