package rules

import (
	"fmt"
	"math"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/unit"
)

// DegreeRadian finds plain numbers that are degrees in the argument of an
// angular function.
func (Book) DegreeRadian() check.Rule {
	return check.Rule{
		Name:     "degree-radian",
		Severity: lang.Error,
		Title:    "A plain number of degrees is taken for radians",
		Sees: "A plain number of more than 2π, written in the argument of sin, cos or tan or behind a name that is one (an error for a whole number of degrees up to 360, a caution for others): " +
			"angles carry their unit in a note.",
		Silent:  "For an angle in degrees or radians, which is tracked; for 2π times something, an angular frequency times a time, a length times a phase coefficient; for numbers up to 2π.",
		Formula: "1° = π/180 rad; the series sin θ ≈ θ, e^{jθ} and the arc r·θ need radians.",
		Remedy:  "Write the unit: `cos(30°)`.",
		Source:  "BIPM, SI Brochure, 9th ed., table 8 (1° = (π/180) rad)",
		Wrong: check.Example{Note: `    k = cos(30) = 0.154
`},
		Right: check.Example{Note: `    k = cos(30°) = 0.866
`},
		Run: perSpot(degreeRadian),
	}
}

func degreeRadian(p *check.Pass, s *spot) {
	lang.Walk(s.stmt.Tree, func(t lang.Tree) bool {
		c, ok := t.(*lang.Call)
		if !ok || c.Of != nil || len(c.Args) != 1 {
			return true
		}
		switch c.Fn.Text {
		case "sin", "cos", "tan":
			plainAngle(p, s.stmt, c)
		}
		return true
	})
}

// plainAngle reports an argument that is a plain number, or the name of one.
func plainAngle(p *check.Pass, s *lang.Stmt, c *lang.Call) {
	l, ok := unparenthesized(c.Args[0]).(*lang.Literal)
	if name, is := unparenthesized(c.Args[0]).(*lang.Name); is {
		sym := p.Note.Lookup(lang.CanonicalName(name.Text))
		if sym == nil || sym.Def == nil || !sym.Input || len(sym.Def.Members) == 0 {
			return
		}
		l, ok = sym.Def.Members[0].(*lang.Literal)
	}
	if !ok || l.Unit != nil || math.Abs(l.Num.Value) <= 2*math.Pi {
		return
	}
	if f, known := p.Note.FactsOf(s, c.Args[0]); !known || f.Dim != (unit.Dim{}) {
		return
	}
	f := lang.Fault{
		Span:    s.Abs(c.Args[0]),
		Message: fmt.Sprintf("%s of %s radians: a plain number is in radians", c.Fn.Text, l.Num.Text),
		Detail:  fmt.Sprintf("If degrees are meant, write `%s°`.", l.Num.Text),
	}
	if x := math.Abs(l.Num.Value); x > 360 || x != math.Trunc(x) {
		f.Severity = p.Lowered()
		f.Detail += " If radians are meant, write `rad`."
	}
	p.Report(f)
}
