package rules

import (
	"fmt"
	"math"
	"math/big"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// DegreeRadian finds plain numbers that are degrees where an angle belongs, and
// angles that are converted once too often.
func (Book) DegreeRadian() check.Rule {
	return check.Rule{
		Name:     "degree-radian",
		Severity: lang.Error,
		Title:    "A plain number of degrees is taken for radians, or an angle is converted twice",
		Sees: "A plain number of more than 2π, also one behind names, in sin, cos, tan or exp(j·…), added to or compared with an angle, or declared as an angle " +
			"(an error for a whole number of degrees up to 360, a caution for others); 360·d/λ in such a function; an angle with its unit times π/180, and one times 180/π in such a function.",
		Silent: "For an angle in degrees or radians, which is tracked; for a number times π/180 and for multiples of π; for an angular frequency times a time, a length times a phase coefficient, a bound variable; " +
			"for numbers up to 2π; for 180/π times an angle that is shown.",
		Formula: "1° = π/180 rad; the series sin θ ≈ θ, e^{jθ}, the arc r·θ and the phase 2πd/λ need radians.",
		Remedy:  "Write the unit: `cos(30°)`; leave conversions to the units.",
		Source:  "BIPM, SI Brochure, 9th ed., table 8 (1° = (π/180) rad)",
		Wrong: check.Example{Note: `    k = cos(30) = 0.154
`},
		Right: check.Example{Note: `    k = cos(30°) = 0.866
`},
		Run: perSpot(degreeRadian),
	}
}

func degreeRadian(p *check.Pass, s *spot) {
	t := protractor{p, s.stmt}
	lang.Walk(s.stmt.Tree, func(x lang.Tree) bool {
		switch x := x.(type) {
		case *lang.Call:
			t.function(x)
		case *lang.Binary:
			if x.Op == lang.OpAdd || x.Op == lang.OpSub {
				t.beside(x, x.X, x.Y, "is added to")
			}
		case *lang.Relation:
			for i := range x.Ops {
				t.beside(x, x.Terms[i], x.Terms[i+1], "is compared with")
			}
		}
		return true
	})
	t.declared()
}

// protractor looks at the angles of one statement.
type protractor struct {
	p    *check.Pass
	stmt *lang.Stmt
}

func (t protractor) text(x lang.Expr) string { return textAt(t.p.Note, t.stmt, x) }

// form looks through names of numbers and angles that are no inputs with a unit.
func (t protractor) form(x lang.Expr) *lang.Form {
	return t.p.Note.StatementForm(t.stmt, x, anglesThrough)
}

func anglesThrough(s *lang.Symbol) bool {
	return s.Facts.Dim.IsOne() && s.Facts.KindBy != lang.Declared
}

// function looks at the argument of an angular function.
func (t protractor) function(c *lang.Call) {
	if c.Of != nil || len(c.Args) != 1 {
		return
	}
	wave := c.Fn.Text == "exp"
	if !wave && c.Fn.Text != "sin" && c.Fn.Text != "cos" && c.Fn.Text != "tan" {
		return
	}
	x := c.Args[0]
	form := t.form(x)
	if form == nil || wave && !imaginary(form) {
		return
	}
	if n, ok := degreesIn(form); ok {
		t.report(x, n, fmt.Sprintf("%s of %s: a plain number is in radians", c.Fn.Text, t.text(x)))
		return
	}
	if message, detail := t.converted(c.Fn.Text, form); message != "" {
		t.p.Report(lang.Fault{Span: t.stmt.Abs(x), Message: message, Detail: detail})
	}
}

// imaginary reports that every term has a factor j.
func imaginary(f *lang.Form) bool {
	for _, t := range f.Terms {
		has := false
		for _, x := range t.Factors {
			has = has || x.Key == "j"
		}
		if !has {
			return false
		}
	}
	return len(f.Terms) > 0
}

// degreesIn gives a term that is a plain number of more than 2π, without π.
func degreesIn(f *lang.Form) (float64, bool) {
	for _, t := range f.Terms {
		if len(t.Factors) > 1 || len(t.Factors) == 1 && t.Factors[0].Key != "j" || t.Pi != 0 {
			continue
		}
		if x, _ := t.Coef.Float64(); math.Abs(x) > 2*math.Pi {
			return math.Abs(x), true
		}
	}
	return 0, false
}

// converted explains an argument that is converted by hand; "" for others.
func (t protractor) converted(fn string, f *lang.Form) (message, detail string) {
	term, single := f.Single()
	if !single {
		return "", ""
	}
	angle := false
	for _, x := range term.Factors {
		angle = angle || x.Facts.Known && x.Facts.Dim.IsOne() && x.Facts.Dim[unit.Angle] == unit.Whole(1) && x.Exp == unit.Whole(1)
	}
	per180 := new(big.Rat).Mul(term.Coef, big.NewRat(180, 1))
	switch {
	case angle && term.Pi == 1 && per180.IsInt() && !term.Coef.IsInt():
		return fmt.Sprintf("%s takes an angle that has its unit, times π/180: it is converted twice and 57.3 times too small", fn),
			"Leave the π/180 out: the unit converts."
	case angle && term.Pi == -1 && new(big.Rat).Quo(term.Coef, big.NewRat(180, 1)).IsInt():
		return fmt.Sprintf("%s takes an angle times 180/π, a number of degrees: it is 57.3 times too large", fn),
			"Leave the 180/π out; to show the angle in degrees, end its own line with `= __ °`."
	case !angle && term.Pi == 0 && len(term.Factors) > 0 && new(big.Rat).Abs(term.Coef).Cmp(big.NewRat(360, 1)) == 0 && ofWaves(term):
		return fmt.Sprintf("%s takes 360 times a number of cycles, which are degrees: it is 57.3 times too large", fn),
			"Write 2*pi for 360, or `360°`."
	}
	return "", ""
}

// ofWaves reports a product of lengths or of frequencies and times.
func ofWaves(t lang.Term) bool {
	for _, x := range t.Factors {
		switch roleOf(x.Facts) {
		case roleGeometry, roleFrequency:
		default:
			if x.Key != "j" {
				return false
			}
		}
	}
	return true
}

// beside finds an angle beside a plain number of more than 2π.
func (t protractor) beside(at lang.Tree, x, y lang.Expr, verb string) {
	angle := func(x lang.Expr) bool {
		f, ok := t.p.Note.FactsOf(t.stmt, x)
		return ok && f.Known && f.Dim.IsOne() && f.Dim[unit.Angle] == unit.Whole(1)
	}
	if angle(y) {
		x, y = y, x
	}
	if !angle(x) || angle(y) {
		return
	}
	n, ok := degreesIn(t.form(y))
	if !ok {
		return
	}
	t.reportAt(t.stmt.Abs(at), y, n, fmt.Sprintf("%s, a plain number, %s the angle %s: it counts in radians", t.text(y), verb, t.text(x)))
}

// declared finds an angle that is given as a plain number.
func (t protractor) declared() {
	for _, d := range definitionsIn(t.stmt) {
		if len(d.Members) == 0 || d.Kind == nil || len(d.Params) > 0 {
			continue
		}
		_, k, bad := kind.Parse(d.Kind.Text)
		c, number := constantOf(d.Members[0])
		if bad != nil || !k.Is(kind.Angle) || !number || c.dim != (unit.Dim{}) || math.Abs(c.value) <= 2*math.Pi {
			continue
		}
		if n, ok := degreesIn(t.form(d.Members[0])); ok {
			t.report(d.Members[0], n, fmt.Sprintf("%s is %s of %s without a unit: it is in radians", d.Name.Text, withArticle(k.String()), t.text(d.Members[0])))
		}
	}
}

func (t protractor) report(x lang.Expr, n float64, message string) {
	t.reportAt(t.stmt.Abs(x), x, n, message)
}

// reportAt grades and files a finding on n that may be degrees, x as written.
func (t protractor) reportAt(at lang.Span, x lang.Expr, n float64, message string) {
	f := lang.Fault{Span: at, Message: message, Detail: fmt.Sprintf("If degrees are meant, write `%g°`.", n)}
	if l, ok := unparenthesized(x).(*lang.Literal); ok && l.Unit == nil && l.Spread == nil {
		end := t.stmt.Abs(l).End
		f.Fix = &lang.Fix{Title: "Write °", Edits: []lang.Edit{insert(end, "°")}}
	}
	if n > 360 || n != math.Trunc(n) {
		f.Severity = t.p.Lowered()
		f.Detail += " If radians are meant, write `rad`."
	}
	t.p.Report(f)
}
