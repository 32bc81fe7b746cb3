package rules

import (
	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file finds the places where a dimension does not hold, for the rules
// that explain why.

// mismatch is a definition whose value has another dimension than the kind that
// is declared, or than a unit in which its result is stated.
type mismatch struct {
	sym    *lang.Symbol
	x      lang.Expr  // the defining expression
	found  lang.Facts // what the expression carries
	kind   kind.ID    // what was claimed; 0 where a unit claims it
	unit   string     // the unit that claims it, or the kind's
	claims unit.Dim
	span   lang.Span // of what is wrong: the expression, or the unit
}

// factor is what was found over what is claimed.
func (m mismatch) factor() unit.Dim { return m.found.Dim.Div(m.claims).Base() }

// mismatches lists them, once for all rules of a pass.
func mismatches(p *check.Pass) []mismatch {
	type key struct{}
	return p.Once(key{}, func() any { return findMismatches(p.Note) }).([]mismatch)
}

func findMismatches(n *lang.Note) []mismatch {
	var out []mismatch
	for _, s := range n.Symbols {
		if s.Def == nil || s.Stmt == nil || len(s.Def.Members) == 0 || len(s.Def.Params) > 0 {
			continue
		}
		x := s.Def.Members[0]
		found, ok := n.FactsOf(s.Stmt, x)
		if !ok || !found.Known {
			continue
		}
		if m, bad := byKind(s, x, found); bad {
			out = append(out, m)
			continue
		}
		for _, stated := range s.Def.Members[1:] {
			if m, bad := byUnit(s, x, found, stated); bad {
				out = append(out, m)
				break
			}
		}
	}
	return out
}

// byKind compares with the declared kind.
func byKind(s *lang.Symbol, x lang.Expr, found lang.Facts) (mismatch, bool) {
	if s.Def.Kind == nil {
		return mismatch{}, false
	}
	_, k, bad := kind.Parse(s.Def.Kind.Text)
	if bad != nil || k == 0 || k.Dim().Compatible(found.Dim) {
		return mismatch{}, false
	}
	return mismatch{sym: s, x: x, found: found, kind: k, unit: k.Info().Unit, claims: k.Dim(), span: s.Stmt.Abs(x)}, true
}

// byUnit compares with the unit of a stated or asked result.
func byUnit(s *lang.Symbol, x lang.Expr, found lang.Facts, stated lang.Expr) (mismatch, bool) {
	phrase := lang.UnitOf(stated)
	if phrase == nil {
		return mismatch{}, false
	}
	u, err := unit.Parse(phrase.Text)
	if err != nil || u.Dim.Compatible(found.Dim) {
		return mismatch{}, false
	}
	return mismatch{sym: s, x: x, found: found, unit: phrase.Text, claims: u.Dim, span: phrase.Span.Shift(s.Stmt.At)}, true
}

// claim names what is claimed, with its article left out: "energy density (J/m^3)".
func (m mismatch) claim() string {
	if m.kind != 0 {
		return m.kind.String() + " (" + m.unit + ")"
	}
	return m.unit
}
