package rules

import (
	"slices"

	"inkjoule/check"
	"inkjoule/lang"
)

// This file finds the trees on which the language refuses to compute, for the
// rules that explain why.

// refusal is a finding of the language with the tree that it marks.
type refusal struct {
	note  *lang.Note
	fault lang.Fault
	stmt  *lang.Stmt
	path  []lang.Tree // from the statement down to what is marked
}

// refusals lists the findings of the language of one name.
func refusals(p *check.Pass, name string) []refusal {
	type key struct{}
	all := p.Once(key{}, func() any { return findRefusals(p.Note) }).(map[string][]refusal)
	return all[name]
}

// findRefusals finds the trees of the findings that rules explain.
func findRefusals(n *lang.Note) map[string][]refusal {
	out := map[string][]refusal{}
	for _, f := range n.Faults {
		switch f.Rule {
		case "dimension-mismatch", "dimensioned-argument", "shape-mix", "temperature-offset":
		default:
			continue
		}
		s := n.StmtAt(f.Span.Start)
		if s == nil {
			continue
		}
		if path := pathTo(s, f.Span); len(path) > 0 {
			out[f.Rule] = append(out[f.Rule], refusal{n, f, s, path})
		}
	}
	return out
}

// pathTo gives the trees from the statement's down to the one of exactly that
// span; nil where there is none.
func pathTo(s *lang.Stmt, at lang.Span) []lang.Tree {
	var path []lang.Tree
	lang.Walk(s.Tree, func(t lang.Tree) bool {
		span := s.Abs(t)
		if span.Start > at.Start || span.End < at.End {
			return false
		}
		path = append(path, t) // in pre-order, what holds the place is nested
		return true
	})
	for len(path) > 0 && s.Abs(path[len(path)-1]) != at {
		path = path[:len(path)-1]
	}
	return path
}

// marked is the tree that the finding marks.
func (r refusal) marked() lang.Tree { return r.path[len(r.path)-1] }

// above gives the tree n steps above the marked one, nil beyond the statement.
func (r refusal) above(n int) lang.Tree {
	if i := len(r.path) - 1 - n; i >= 0 {
		return r.path[i]
	}
	return nil
}

// facts of a tree of the statement; not Known where there are none.
func (r refusal) facts(t lang.Tree) lang.Facts {
	f, _ := r.note.FactsOf(r.stmt, t)
	return f
}

// text of a tree as it is written.
func (r refusal) text(t lang.Tree) string {
	s := r.stmt.Abs(t)
	return r.note.Script.Source.Text[s.Start:s.End]
}

// explained is the finding with another wording, at its own place.
func (r refusal) explained(message, detail string) lang.Fault {
	return lang.Fault{Span: r.fault.Span, Message: message, Detail: detail, Related: slices.Clone(r.fault.Related)}
}
