package rules

import (
	"fmt"
	"math/big"

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
			"and a quantity declared with one statistic whose formula gives another without √2 or 2 between them.",
		Silent: "For a static value plus a peak; for √(U_dc² + U_rms²); for instantaneous against peak; for the quotient of a peak and an rms value of which one follows from the other " +
			"(a crest factor); for a scaling such as E·U_m/U_n, for ripple ratios; for powers and energies of a cycle that are compared with crests; where either statistic is not known.",
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
		Run: rmsPeakMix,
	}
}

func rmsPeakMix(p *check.Pass) error {
	for _, s := range p.Note.Script.Stmts {
		m := mixer{p: p, stmt: s}
		lang.Walk(s.Tree, m.node)
	}
	for _, c := range viewOf(p).claims {
		c.unlikeDeclared(p)
		c.unlikeFactors(p)
	}
	return nil
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
		return statOfForm(m.p.Note, form, f.Qualifier)
	}
	return f.Qualifier
}

// bothKnown is a quick test before forms are built.
func (m mixer) bothKnown(x, y lang.Expr) bool {
	for _, z := range []lang.Expr{x, y} {
		if f, ok := m.p.Note.FactsOf(m.stmt, z); !ok || f.Qualifier == kind.Unqualified {
			return false
		}
	}
	return true
}

func (m mixer) node(t lang.Tree) bool {
	switch t := t.(type) {
	case *lang.Binary:
		m.binary(t)
	case *lang.Relation:
		for i := range t.Ops {
			if !m.bothKnown(t.Terms[i], t.Terms[i+1]) {
				continue
			}
			a, b := m.stat(t.Terms[i]), m.stat(t.Terms[i+1])
			if known(a, b) && !kind.Like(a, b) && m.amplitudes(t.Terms[i], t.Terms[i+1]) {
				m.report(t, t.Terms[i], t.Terms[i+1], "compared with", a, b)
			}
		}
	}
	return true
}

func known(a, b kind.Qualifier) bool { return a != kind.Unqualified && b != kind.Unqualified }

func (m mixer) binary(b *lang.Binary) {
	if b.Op != lang.OpAdd && b.Op != lang.OpSub && b.Op != lang.OpDiv || !m.bothKnown(b.X, b.Y) {
		return
	}
	x, y := m.stat(b.X), m.stat(b.Y)
	if !known(x, y) {
		return
	}
	switch b.Op {
	case lang.OpAdd:
		if _, ok := kind.Add(x, y); !ok {
			m.report(b, b.X, b.Y, "added to", x, y)
		}
	case lang.OpSub:
		if _, ok := kind.Add(x, y); !ok {
			m.report(b, b.X, b.Y, "subtracted from or less", x, y)
		}
	case lang.OpDiv:
		if crest(x, y) && m.amplitudes(b.X, b.Y) && !m.related(b.X, b.Y) {
			m.report(b, b.X, b.Y, "divided by", x, y)
		}
	}
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
		if f.Kind.Info().Class != kind.ClassAmplitude {
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

// unlikeFactors finds a product of two amplitudes of unlike statistics. A third
// amplitude below makes it a scaling, and a √2 a conversion.
func (c *claim) unlikeFactors(p *check.Pass) {
	for _, t := range products(c.note.Normal(c.sym, lang.NamesStay)) {
		var above []lang.Factor
		for _, f := range t.all {
			if f.Facts.Kind.Info().Class != kind.ClassAmplitude {
				continue
			}
			if f.Exp != unit.Whole(1) {
				above = nil
				break
			}
			above = append(above, f)
		}
		if len(above) != 2 || t.root2 != (unit.Rat{}) {
			continue
		}
		a, b := statOf(c.note, above[0]), statOf(c.note, above[1])
		if _, ok := kind.Product(a, b); ok || !known(a, b) {
			continue
		}
		c.report(p, lang.Fault{
			Message: fmt.Sprintf("%s multiplies %s value by %s value", c.sym.Name, article(a), article(b)),
			Detail:  "Convert one of them where it is defined." + conversionHint(a, b),
			Related: c.because(above, func(s *lang.Symbol) string {
				return fmt.Sprintf("%s is %s value", s.Name, article(statOf(c.note, lang.Factor{Symbol: s, Facts: s.Facts})))
			}),
		})
		return
	}
}

// unlikeDeclared finds a quantity declared with one statistic whose formula is
// an amplitude of another, with no number between them.
func (c *claim) unlikeDeclared(p *check.Pass) {
	if !c.stated || c.sym.Facts.Kind.Info().Class != kind.ClassAmplitude {
		return
	}
	t, single := c.note.Normal(c.sym, lang.UpToDeclared).Single()
	if !single || t.Coef.Cmp(big.NewRat(1, 1)) != 0 || t.Pi != 0 {
		return
	}
	var amplitude *lang.Factor
	for i, f := range t.Factors {
		switch {
		case f.Key == "#2" || f.Call != "" || f.Symbol == nil && !f.Literal && f.Over == nil || f.Facts.Dim == (unit.Dim{}) && f.Facts.Kind == 0:
			return // something may convert
		case f.Facts.Qualifier == kind.Unqualified:
		case amplitude != nil || f.Exp != unit.Whole(1):
			return
		default:
			amplitude = &t.Factors[i]
		}
	}
	if amplitude == nil || kind.Like(amplitude.Facts.Qualifier, c.stat) {
		return
	}
	from := amplitude.Facts.Qualifier
	c.report(p, lang.Fault{
		Message: fmt.Sprintf("%s is declared as %s value, and its formula gives %s value", c.sym.Name, article(c.stat), article(from)),
		Detail:  "Convert, or declare it as what it is." + conversionHint(from, c.stat),
		Related: c.because([]lang.Factor{*amplitude}, func(s *lang.Symbol) string { return fmt.Sprintf("%s is %s value", s.Name, article(from)) }),
	})
}
