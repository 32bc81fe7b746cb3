package rules

import (
	"fmt"
	"slices"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// RMSPeakMix finds unlike statistics that meet without conversion.
func (Book) RMSPeakMix() check.Rule {
	return check.Rule{
		Name:     "rms-peak-mix",
		Severity: lang.Error,
		Title:    "Values of unlike statistics (peak, rms, peak-to-peak, static, average) meet without conversion",
		Sees: "A sum, difference, comparison or product of two quantities whose statistics are known and do not go together, a quotient of a peak and an rms value, " +
			"and a quantity declared with one statistic whose formula gives another with no √2 or 2 between them, whatever other numbers stand there (U/√3, 1.1·U, U/(r·ln(b/a))). " +
			"In a harmonic note a caution where a peak, an rms value or a swing is compared with, added to or subtracted from a quantity whose statistic is not stated.",
		Silent: "For a static value plus a peak; for √(U_dc² + U_rms²); for instantaneous against peak; for the quotient of a peak and an rms value of which one follows from the other " +
			"(a crest factor); where a √2, its digits, a crest factor, a ratio or the root of a duty ratio stands between the two; for a quantity that is declared square, triangular or of another waveform; " +
			"for a scaling such as E·U_m/U_n, for ripple ratios; for powers and energies of a cycle that are compared with crests; outside a harmonic note where either statistic is not known.",
		Formula: "One sinusoid: X_pp = 2 X̂ = 2√2 X_rms. A square made with the wrong one is off by 2 or 8, a margin by 1.41 or 2.83.",
		Remedy:  "Convert where the quantity is defined: `U_p, peak voltage = sqrt(2)*U`.",
		Source:  "IEC 60050-103:2009, 103-02-03 (rms value), 103-06-12 (peak value) (from memory)",
		Wrong: check.Example{Note: `    E, rms electric field strength = 3.0 kV/mm
    E_s, peak electric field strength = 3.6 kV/mm
    criterion E < E_s
`},
		Right: check.Example{Note: `    E, rms electric field strength = 2.0 kV/mm
    E_p, peak electric field strength = sqrt(2)*E = 2.83 kV/mm
    E_s, peak electric field strength = 3.6 kV/mm
    criterion E_p < E_s
`},
		Run: perSpot(rmsPeakMix),
	}
}

func rmsPeakMix(p *check.Pass, s *spot) {
	m := mixer{p: p, stmt: s.stmt}
	lang.Walk(s.stmt.Tree, m.node)
	for _, c := range s.claims {
		c.unlikeDeclared(p)
		c.unlikeFactors(p)
	}
}

// mixer looks for unlike statistics in one statement.
type mixer struct {
	p    *check.Pass
	stmt *lang.Stmt
}

// stat is the known statistic of an expression, with √2 counted.
func (m mixer) stat(x lang.Expr) kind.Qualifier {
	f, ok := m.p.Note.FactsOf(m.stmt, x)
	if !ok || !f.Known || f.Qualifier == kind.Unqualified {
		return kind.Unqualified
	}
	if form := m.p.Note.StatementForm(m.stmt, x, lang.UpToDeclared); form != nil {
		if t, single := form.Single(); single && slices.ContainsFunc(t.Factors, isRatio) {
			return kind.Unqualified // it may be a crest factor
		}
		return statOfForm(m.p.Note, form, f.Qualifier)
	}
	return f.Qualifier
}

// someKnown is a quick test before forms are built.
func (m mixer) someKnown(x, y lang.Expr) bool {
	for _, z := range []lang.Expr{x, y} {
		if f, ok := m.p.Note.FactsOf(m.stmt, z); ok && f.Qualifier != kind.Unqualified {
			return true
		}
	}
	return false
}

func (m mixer) node(t lang.Tree) bool {
	switch t := t.(type) {
	case *lang.Binary:
		m.binary(t)
	case *lang.Relation:
		for i := range t.Ops {
			x, y := t.Terms[i], t.Terms[i+1]
			if !m.someKnown(x, y) || !m.amplitudes(x, y) {
				continue
			}
			a, b := m.stat(x), m.stat(y)
			switch {
			case !known(a, b):
				m.unstated(t, x, y, "compared with")
			case !kind.Like(a, b):
				m.report(t, x, y, "compared with", a, b)
			}
		}
	}
	return true
}

func known(a, b kind.Qualifier) bool { return a != kind.Unqualified && b != kind.Unqualified }

func (m mixer) binary(b *lang.Binary) {
	if b.Op != lang.OpAdd && b.Op != lang.OpSub && b.Op != lang.OpDiv || !m.someKnown(b.X, b.Y) {
		return
	}
	x, y := m.stat(b.X), m.stat(b.Y)
	if b.Op == lang.OpDiv {
		if crest(x, y) && m.amplitudes(b.X, b.Y) && !m.related(b.X, b.Y) {
			m.report(b, b.X, b.Y, "divided by", x, y)
		}
		return
	}
	verb := "added to"
	if b.Op == lang.OpSub {
		verb = "subtracted from or less"
	}
	if !known(x, y) {
		if m.amplitudes(b.X, b.Y) {
			m.unstated(b, b.X, b.Y, verb)
		}
	} else if _, ok := kind.Add(x, y); !ok {
		m.report(b, b.X, b.Y, verb, x, y)
	}
}

// unstated cautions about a quantity of an alternating note whose statistic is
// not said where it meets a peak, an rms value or a swing.
func (m mixer) unstated(at lang.Tree, x, y lang.Expr, verb string) {
	if word, _ := m.p.Note.RegimeAt(m.stmt); word != "harmonic" {
		return
	}
	said, open := m.stat(x), m.open(y)
	if open == nil {
		said, open = m.stat(y), m.open(x)
	}
	if open == nil || said != kind.Peak && said != kind.RMS && said != kind.PeakToPeak {
		return
	}
	m.p.Report(lang.Fault{
		Span: m.stmt.Abs(at), Severity: m.p.Lowered(),
		Message: fmt.Sprintf("%s value is %s %s, whose statistic is not stated", article(said), verb, open.Name),
		Detail:  fmt.Sprintf("Say at its definition what it is: `%s, rms …` or `%s, peak …`. Between the two lies a factor of 1.41.", open.Name, open.Name),
		Related: []lang.Related{{Path: open.Path, Span: open.Span, Message: "its statistic is not stated here"}},
	})
}

// open gives the alternating quantity in an expression whose statistic is not
// stated: the only amplitude of a product of known make.
func (m mixer) open(x lang.Expr) *lang.Symbol {
	t, single := m.p.Note.StatementForm(m.stmt, x, lang.UpToDeclared).Single()
	if !single {
		return nil
	}
	var found *lang.Symbol
	for _, f := range t.Factors {
		switch {
		case f.Facts.Qualifier != kind.Unqualified || f.Facts.Complex || f.Call != "":
			return nil
		case !isAmplitude(f.Facts):
		case found != nil || f.Symbol == nil || f.Exp != unit.Whole(1) || f.Facts.KindBy != lang.Declared:
			return nil
		default:
			found = f.Symbol
		}
	}
	return found
}

// isAmplitude reports a quantity that has a peak and an rms value: a field, a
// voltage, a current, no ratio of such.
func isAmplitude(f lang.Facts) bool {
	return f.Kind.Info().Class == kind.ClassAmplitude && f.Dim != unit.Dim{}
}

// crest reports a peak and an rms value, in either order. Quotients of other
// statistics are ripple and form factors, and meant.
func crest(x, y kind.Qualifier) bool {
	return x == kind.Peak && y == kind.RMS || x == kind.RMS && y == kind.Peak
}

// amplitudes reports operands that are all amplitudes, not powers or squares.
func (m mixer) amplitudes(xs ...lang.Expr) bool {
	for _, x := range xs {
		f, _ := m.p.Note.FactsOf(m.stmt, x)
		if !isAmplitude(f) {
			return false
		}
	}
	return true
}

// related reports two names of which one follows from the other: their
// quotient is a crest factor and meant.
func (m mixer) related(x, y lang.Expr) bool {
	a, b := m.symbol(x), m.symbol(y)
	return a != nil && b != nil && (dependsOn(m.p.Note, a, b) || dependsOn(m.p.Note, b, a))
}

func (m mixer) symbol(x lang.Expr) *lang.Symbol {
	if n, ok := x.(*lang.Name); ok {
		return m.p.Note.Lookup(lang.CanonicalName(n.Text))
	}
	return nil
}

func (m mixer) report(at lang.Tree, x, y lang.Expr, verb string, a, b kind.Qualifier) {
	f := lang.Fault{
		Span:    m.stmt.Abs(at),
		Message: fmt.Sprintf("%s value is %s %s value", article(a), verb, article(b)),
		Detail:  "Convert one of them where it is defined." + conversionHint(a, b),
	}
	for _, z := range []lang.Expr{x, y} {
		if s := m.symbol(z); s != nil && s.Stmt != nil {
			f.Related = append(f.Related, lang.Related{Path: s.Path, Span: s.Span, Message: fmt.Sprintf("%s is %s value", s.Name, article(m.stat(z)))})
		}
	}
	m.p.Report(f)
}

// conversionHint gives the factor between two statistics of a sinusoid.
func conversionHint(a, b kind.Qualifier) string {
	num, den, ok := kind.Conversion(a, b)
	if !ok {
		return ""
	}
	from, to := a, b
	if num < den {
		from, to, num, den = b, a, den, num
	}
	return fmt.Sprintf(" For one sinusoid %s is sqrt(%d) times %s.", to, num/den, from)
}
