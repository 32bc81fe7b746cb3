package rules

import (
	"fmt"
	"math"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// PropertyOutOfRange finds values used outside the conditions for which their
// source states them.
func (Book) PropertyOutOfRange() check.Rule {
	return check.Rule{
		Name:     "property-out-of-range",
		Severity: lang.Error,
		Title:    "A value is used outside the range for which it is stated",
		Sees: "The use of a property, or of another value with a range (`for T from … to …`), where the condition given with the use (`at T = …`), else the note's quantity of that name, lies outside. " +
			"A caution where it lies outside by less than a tenth of the range's width, or of a decade where the range spans more than one; " +
			"and where a conductivity, resistivity, permeability or saturation flux density is used and the condition is not stated at all.",
		Silent: "Inside the range; where the condition is a parameter or bound variable of the formula; where no condition is stated for a property that depends weakly on it.",
		Formula: "A value is known for the conditions of its measurement. Insulators change σ by decades per 50 K; power ferrites lose a fifth to a third of B_sat by 100 °C; " +
			"tissue σ doubles or triples from 100 MHz to 3 GHz (orders, from memory).",
		Remedy: "Fetch the value for the condition from its source, or widen the range if the source covers it.",
		Source: "ASTM D149, section 5 (dielectric strength and its conditions); common practice of design review",
		Wrong: check.Example{Note: `    medium oil: linear, isotropic, homogeneous, lossy
        sigma = 0.1 pS/m for T from 15 °C to 30 °C per "data sheet T-9"
    T, temperature = 90 °C
    E, static electric field strength = 2 kV/mm
    J, electric current density = oil.sigma*E = 0.2 uA/m^2
`},
		Right: check.Example{Note: `    medium oil: linear, isotropic, homogeneous, lossy
        sigma = 8 pS/m for T from 80 °C to 100 °C per "data sheet T-9"
    T, temperature = 90 °C
    E, static electric field strength = 2 kV/mm
    J, electric current density = oil.sigma*E = 16 uA/m^2
`},
		Run: outOfRange,
	}
}

func outOfRange(p *check.Pass) error {
	type seenKey struct {
		sym  *lang.Symbol
		stmt *lang.Stmt
		name string
	}
	seen := map[seenKey]bool{}
	for _, u := range p.Note.Uses {
		s := u.Symbol
		if u.Define || s == nil || len(s.Valid) == 0 || s.Owner != nil && s.Owner.Stmt == u.Stmt || !computes(u.Stmt) {
			continue
		}
		for _, v := range s.Valid {
			k := seenKey{s, u.Stmt, v.Key}
			if !seen[k] {
				seen[k] = true
				condition{p: p, use: u, sym: s, v: v}.check()
			}
		}
	}
	return nil
}

// computes reports a statement that uses values, rather than naming them.
func computes(s *lang.Stmt) bool {
	switch s.Tree.(type) {
	case *lang.Waive, *lang.Uses:
		return false
	}
	return true
}

// condition is one use of a value under one of its conditions.
type condition struct {
	p   *check.Pass
	use lang.Use
	sym *lang.Symbol
	v   lang.Validity
}

func (c condition) check() {
	if c.isLocal() {
		return
	}
	x, where, ok := c.operating()
	if !ok {
		c.unstated()
		return
	}
	off := c.outside(x)
	if off <= 0 {
		return
	}
	f := lang.Fault{
		Span: c.use.Span,
		Message: fmt.Sprintf("%s is stated for %s from %s to %s, and is used at %s", c.name(), c.v.Name,
			c.text(c.v.Low), c.text(c.v.High), c.text(x)),
		Detail: fmt.Sprintf("Find the value for this %s, or widen the range if its source covers it.", c.v.Name),
	}
	if off < 0.1 {
		f.Severity = c.p.Lowered()
		f.Detail += " It is less than a tenth of the range beyond its edge."
	}
	if c.sym.Stmt != nil {
		f.Related = append(f.Related, lang.Related{Path: c.sym.Path, Span: c.sym.Span, Message: c.name() + " with its range"})
	}
	if where != nil && where.Stmt != nil {
		f.Related = append(f.Related, lang.Related{Path: where.Path, Span: where.Span, Message: fmt.Sprintf("%s = %s", where.Name, where.Shown)})
	}
	c.p.Report(f)
}

// name is the value's name as a reader knows it.
func (c condition) name() string {
	if c.sym.Owner != nil {
		return c.sym.Owner.Name + "." + c.sym.Name
	}
	return c.sym.Name
}

// text writes a value of the condition in the unit of the range.
func (c condition) text(si float64) string {
	return fmt.Sprintf("%.4g %s", c.v.Unit.FromSI(si), c.v.Unit.Symbol)
}

// isLocal reports a condition that varies in the formula itself.
func (c condition) isLocal() bool {
	local := false
	named := func(text string) bool { return lang.CanonicalName(text) == c.v.Key }
	lang.Walk(c.use.Stmt.Tree, func(t lang.Tree) bool {
		switch t := t.(type) {
		case *lang.Definition:
			for _, p := range t.Params {
				local = local || named(p.Text)
			}
		case *lang.Call:
			for _, r := range t.For {
				if n, ok := r.Var.(*lang.Name); ok {
					local = local || named(n.Text)
				}
			}
		}
		return !local
	})
	return local
}

// operating is the condition's value: what the use says, else the note's
// quantity of that name.
func (c condition) operating() (x float64, where *lang.Symbol, ok bool) {
	if s, v, found := c.atUse(); found {
		return v, s, true
	}
	s := c.p.Note.Lookup(c.v.Key)
	if s == nil || !s.Result.Known || s.Facts.Complex || s.Value.Len() == 0 || !s.Facts.Dim.Compatible(c.dim()) {
		return 0, nil, false
	}
	if s.Value.Len() == 1 {
		return s.Value.Re(), s, true
	}
	sum := 0.0
	for i := range s.Value.Len() {
		sum += s.Value.At(i).Re() * s.Value.At(i).Re()
	}
	return math.Sqrt(sum), s, s.Value.Len() == 3
}

func (c condition) dim() unit.Dim { return c.v.Unit.Dim }

// atUse reads `PROPERTY at T = T_hot` around the use.
func (c condition) atUse() (s *lang.Symbol, x float64, ok bool) {
	lang.Walk(c.use.Stmt.Tree, func(t lang.Tree) bool {
		l, is := t.(*lang.Lookup)
		if !is || ok || lang.CanonicalName(l.Column.Text) != c.v.Key || !contains(c.use.Stmt.Abs(l.X), c.use.Span) {
			return true
		}
		switch v := l.Value.(type) {
		case *lang.Literal:
			x, ok = literalSI(v)
		case *lang.Name:
			if s = c.p.Note.Lookup(lang.CanonicalName(v.Text)); s != nil && s.Result.Known && s.Value.Len() == 1 {
				x, ok = s.Value.Re(), true
			}
		}
		return true
	})
	return s, x, ok
}

func contains(outer, inner lang.Span) bool {
	return outer.Start <= inner.Start && inner.End <= outer.End
}

// literalSI is a literal's value in SI units.
func literalSI(l *lang.Literal) (float64, bool) {
	if l.Unit == nil {
		return l.Num.Value, true
	}
	u, err := unit.Parse(l.Unit.Text)
	if err != nil || u.ByKind() {
		return 0, false
	}
	return u.ToSI(l.Num.Value), true
}

// outside tells how far a value lies outside the range, in widths of the
// range, or in decades where it spans more than one; 0 and below: inside.
func (c condition) outside(x float64) float64 {
	lo, hi := c.v.Low, c.v.High
	slack := 1e-9 * math.Max(math.Abs(lo), math.Abs(hi))
	if x >= lo-slack && x <= hi+slack {
		return 0
	}
	if lo > 0 && x > 0 && hi/lo > 10 {
		return math.Max(math.Log10(lo/x), math.Log10(x/hi))
	}
	width := hi - lo
	if width <= 0 {
		return math.Inf(1)
	}
	return math.Max(lo-x, x-hi) / width
}

// unstated cautions where a condition that matters much is nowhere stated.
func (c condition) unstated() {
	if !dependsStrongly(c.sym) {
		return
	}
	f := lang.Fault{
		Severity: c.p.Lowered(),
		Span:     c.use.Span,
		Message:  fmt.Sprintf("%s is stated for %s from %s to %s, and the note does not state its %s", c.name(), c.v.Name, c.text(c.v.Low), c.text(c.v.High), c.v.Name),
		Detail:   fmt.Sprintf("State the condition: `%s = …`, or `… at %s = …` with the use.", c.v.Name, c.v.Name),
	}
	if c.sym.Stmt != nil {
		f.Related = []lang.Related{{Path: c.sym.Path, Span: c.sym.Span, Message: c.name() + " with its range"}}
	}
	c.p.Report(f)
}

// dependsStrongly reports properties that change by much with their conditions.
func dependsStrongly(s *lang.Symbol) bool {
	if s.Owner == nil {
		return false
	}
	for _, k := range []kind.ID{kind.Conductivity, kind.Resistivity, kind.MagneticFluxDensity, kind.RelativePermeability, kind.Permeability} {
		if s.Facts.Kind.Is(k) {
			return true
		}
	}
	return false
}
