package rules

import (
	"math"
	"slices"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// This file tells which stresses a note compares with a strength or a limit.

// comparisons are what the relations of a note reach.
type comparisons struct {
	p   *check.Pass
	all []comparison
}

// comparison is one relation that says more or less, with what it is made of.
type comparison struct {
	word  string // assume, criterion, check
	rel   *lang.Relation
	reach map[*lang.Symbol]bool
}

func comparisonsOf(p *check.Pass) *comparisons {
	out := &comparisons{p: p}
	from := originsOf(p)
	for _, g := range p.Note.Judged {
		rel := relationOf(g.Stmt)
		if rel == nil || slices.Contains(rel.Ops, "=") {
			continue
		}
		c := comparison{g.Word, rel, map[*lang.Symbol]bool{}}
		from.reaches(g.Stmt, func(x *lang.Symbol) bool { c.reach[x] = true; return false })
		out.all = append(out.all, c)
	}
	return out
}

// judge reports the highest stress of a medium that the note does not compare
// with its strength.
func (c *comparisons) judge(stresses []*stress) {
	answered := map[*stress]bool{}
	free := false // a relation compares the strength in another way
	highest := 0.0
	for _, r := range c.all {
		direct := false
		for _, x := range stresses {
			if r.answers(x, stresses) {
				direct, answered[x], highest = true, true, math.Max(highest, x.crest)
			}
		}
		free = free || !direct && r.reachesStrength(stresses[0])
	}
	var worst *stress
	var factor *lang.Symbol
	for _, x := range stresses {
		compared := answered[x] || free || x.crest <= highest
		required := c.required(x)
		if (required != nil || !compared && x.written > needsCheck) && (worst == nil || x.written > worst.written) {
			worst, factor = x, required
		}
	}
	if worst != nil {
		worst.report(c.p, factor)
	}
}

func (r comparison) reachesStrength(x *stress) bool {
	return slices.ContainsFunc(x.strengths, func(s *lang.Symbol) bool { return r.reach[s] })
}

// answers reports a relation that holds a stress against its strength, or
// against another limit: a criterion that bounds it, a check of it alone.
func (r comparison) answers(x *stress, all []*stress) bool {
	switch {
	case !r.reach[x.of]:
		return false
	case r.reachesStrength(x):
		return true
	case r.word == "criterion":
		return !r.boundsBelow(x.of)
	}
	others := slices.ContainsFunc(all, func(y *stress) bool { return y != x && r.reach[y.of] })
	return !others && slices.ContainsFunc(r.rel.Terms, func(t lang.Expr) bool { return isAlone(t, x.of) })
}

// boundsBelow reports a relation that has the quantity alone on its greater side.
func (r comparison) boundsBelow(s *lang.Symbol) bool {
	for i, op := range r.rel.Ops {
		greater := r.rel.Terms[i]
		if op[0] == '<' {
			greater = r.rel.Terms[i+1]
		}
		if isAlone(greater, s) {
			return true
		}
	}
	return false
}

// isAlone reports an expression that is the name, or its magnitude.
func isAlone(x lang.Expr, s *lang.Symbol) bool {
	switch x := unparenthesized(x).(type) {
	case *lang.Bars:
		return isAlone(x.X, s)
	case *lang.Name:
		return lang.CanonicalName(x.Text) == s.Key
	}
	return false
}

// required is the safety factor that the medium or the note asks for, where a
// stress leaves less and no relation holds it against it; else nil.
func (c *comparisons) required(x *stress) *lang.Symbol {
	s := x.medium.propertyOf(c.p.Note, kind.RequiredSafetyFactor)
	if s == nil {
		only, count := onlyOf(c.p.Note, kind.RequiredSafetyFactor)
		if count != 1 {
			return nil
		}
		s = only
	}
	if x.written*s.Value.Re() <= 1 || slices.ContainsFunc(c.all, func(r comparison) bool { return r.reach[s] && r.reach[x.of] }) {
		return nil
	}
	return s
}
