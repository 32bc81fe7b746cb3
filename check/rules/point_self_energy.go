package rules

import (
	"fmt"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// PointSelfEnergy finds energies that hold the infinite energy of a point or a
// line in its own field.
func (Book) PointSelfEnergy() check.Rule {
	return check.Rule{
		Name:     "point-self-energy",
		Severity: lang.Error,
		Title:    "An energy holds that of a point or a line in its own field, which has no finite value",
		Sees: "An energy that integrates the square of a field ∝ 1/r² (of a point; ∝ 1/r of a line; or of a dipole) from r = 0, over a variable or over a ball, a cylinder or a disc; " +
			"a double sum over charges in which both indices run over all of them, so that each charge meets itself, at the distance 0 or at a softening length. " +
			"A caution where the range begins at a length a thousand times smaller than its end that nothing shows to be the radius of a body.",
		Silent: "Where the range begins at a declared radius, at a length with a source, or at the inner radius of a shell or a tube; for a sum over i < k; for the double sum between two rows of charges; " +
			"for a difference of two such integrals, and for forces, from which the infinite part is gone; for a field that stays finite at r = 0.",
		Formula: "∫½ε₀E² dV = Q²/(8πε₀)·(1/a − 1/b) around a charge Q grows as 1/a without end; the sum over pairs Σ_{i<k} q_i·q_k/(4πε·r_ik) has no such part, so the two differ by an infinite constant.",
		Remedy:  "Sum over pairs, begin at the radius of the body (`a, radius = …`), or take the difference of two energies.",
		Source:  "Jackson, Classical Electrodynamics, 3rd ed., 1.11 (self-energies in eq. 1.54 and not in 1.51; from memory)",
		Wrong: check.Example{Note: `    q = 2 nC
    E(r), static electric field strength = q/(4*pi*eps_0*r^2)   for r from 0 m to 1 m
    W, energy = integral(1/2*eps_0*E(r)^2*4*pi*r^2 for r from 0 m to 1 m)
    check W > 0 J
`},
		Right: check.Example{Note: `    q = 2 nC
    a, radius = 0.4 mm
    E(r), static electric field strength = q/(4*pi*eps_0*r^2)   for r from a to 1 m
    W, energy = integral(1/2*eps_0*E(r)^2*4*pi*r^2 for r from a to 1 m) = 44.9 uJ
    check W > 0 J
`},
		Run: perSymbol(selfEnergy),
	}
}

func selfEnergy(p *check.Pass, s *lang.Symbol) {
	if form, ok := kind.FormOf(s.Facts.Kind); !ok || form != kind.StoredEnergy {
		return
	}
	e := &selfSeeker{p: p, note: p.Note, sym: s}
	if x := s.Def.Members[0]; !isDifference(x) {
		lang.Walk(x, e.look)
	}
}

// isDifference reports two parts of which one is subtracted: an infinite part
// that both have is gone.
func isDifference(x lang.Expr) bool {
	b, ok := unwrapped(x).(*lang.Binary)
	return ok && (b.Op == lang.OpSub || b.Op != lang.OpPow && (isDifference(b.X) || isDifference(b.Y)))
}

// selfSeeker looks through the definition of an energy.
type selfSeeker struct {
	p    *check.Pass
	note *lang.Note
	sym  *lang.Symbol
	done bool
}

// look judges one node; false ends the walk below it.
func (e *selfSeeker) look(t lang.Tree) bool {
	c, ok := t.(*lang.Call)
	switch {
	case e.done:
		return false
	case !ok || len(c.Args) != 1:
		return true
	case c.Fn.Text == "integral" && c.Over != nil:
		e.overRegion(c)
	case c.Fn.Text == "integral" && len(c.For) > 0:
		e.overRadius(c)
	case c.Fn.Text == "sum" && len(c.For) == 1:
		e.doubleSum(c)
	}
	return !e.done
}

// overRegion judges an integral over a region that holds r = 0.
func (e *selfSeeker) overRegion(c *lang.Call) {
	n, ok := c.Over.(*lang.Name)
	if !ok {
		return
	}
	r := e.note.Lookup(lang.CanonicalName(n.Text))
	element, ok := centred(r)
	if !ok || !e.grows(e.note.Within(e.sym, c, lang.Through), "r", element) {
		return
	}
	e.report(c, lang.Fault{
		Message: fmt.Sprintf("%s has no finite value: %s holds the point or line at r = 0, where the field has no end", e.sym.Name, r.Name),
		Detail:  "Integrate over a shell or a tube that begins at the radius of the body, `shell(a, b)`, or sum over pairs of charges.",
		Related: []lang.Related{{Span: r.Span, Message: r.Name}},
	})
}

// centred gives the power of r in the volume element of a region that begins at
// r = 0.
func centred(r *lang.Symbol) (element int, ok bool) {
	if r == nil || r.Stmt == nil || r.Path != "" {
		return 0, false
	}
	t, ok := r.Stmt.Tree.(*lang.Region)
	if !ok || t.Shape == nil {
		return 0, false
	}
	switch t.Shape.Fn.Text {
	case "ball":
		return 2, true
	case "cylinder", "disc":
		return 1, true
	}
	return 0, false
}

// overRadius judges an integral over lengths.
func (e *selfSeeker) overRadius(c *lang.Call) {
	form := e.note.Within(e.sym, c, lang.Through)
	for _, r := range c.For {
		v, ok := r.Var.(*lang.Name)
		if !ok || r.From == nil || !e.grows(form, v.Text, 0) {
			continue
		}
		from, known := valueOf(e.note, r.From)
		switch {
		case known && from == 0:
			e.report(c, lang.Fault{
				Message: fmt.Sprintf("%s has no finite value: the field of a point or a line has no end at %s = 0", e.sym.Name, v.Text),
				Detail:  "Begin at the radius of the body, `a, radius = …`, or sum over pairs of charges.",
			})
		case known && e.arbitrary(r, from):
			e.report(c, lang.Fault{
				Severity: e.p.Lowered(),
				Message:  fmt.Sprintf("%s hangs on where the range begins, at %s: the energy near a point or a line has no end", e.sym.Name, e.text(r.From)),
				Detail:   "If that is the radius of a body, declare it: `a, radius = …`. Else sum over pairs, or take the difference of two energies.",
			})
		}
		return
	}
}

func (e *selfSeeker) text(x lang.Expr) string {
	at := e.sym.Stmt.Abs(x)
	return e.note.Script.Source.Text[at.Start:at.End]
}

// decades is how much smaller than its end the beginning of a range must be to
// be taken for a cut-off.
const decades = 1000

// arbitrary reports a beginning that nothing shows to be the radius of a body.
func (e *selfSeeker) arbitrary(r *lang.Range, from float64) bool {
	to, known := valueOf(e.note, r.To)
	far := known && to >= decades*from
	n, named := unwrapped(r.From).(*lang.Name)
	if !named {
		return far || !known
	}
	s := e.note.Lookup(lang.CanonicalName(n.Text))
	return far && s != nil && s.Input && s.Per == "" && s.Facts.KindBy != lang.Declared
}

// grows reports an integrand of an energy of fields in which the variable stands
// with a power that has no finite integral at 0.
func (e *selfSeeker) grows(form *lang.Form, variable string, element int) bool {
	if form == nil || !e.ofFields() {
		return false
	}
	for _, t := range form.Terms {
		power, whole := element, true
		for _, f := range t.Factors {
			switch n, exact := f.Exp.Int(); {
			case f.Key == "bound "+lang.CanonicalName(variable):
				power, whole = power+n, whole && exact
			case opaqueFactor(f) && mentions(f.Key, variable):
				whole = false // sin(k·r)/r stays finite
			}
		}
		if whole && power <= -1 {
			return true
		}
	}
	return false
}

// ofFields reports an energy that is made of charges, currents or fields.
func (e *selfSeeker) ofFields() bool {
	for _, t := range products(e.note.Apart(e.sym, lang.Through)) {
		if len(t.byRole[roleElectric])+len(t.byRole[roleMagnetic]) > 0 {
			return true
		}
	}
	return false
}

func (e *selfSeeker) report(at lang.Expr, f lang.Fault) {
	e.done = true
	f.Span = e.sym.Stmt.Abs(at)
	e.p.Report(f)
}
