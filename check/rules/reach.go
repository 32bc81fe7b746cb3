package rules

import (
	"inkjoule/check"
	"inkjoule/lang"
)

// This file follows values to where they come from, by statements and across
// members: a conductivity that is computed from a medium's loss factor, a
// criterion on a field that is compared with a strength.

// origins are the symbols that each statement uses.
type origins map[*lang.Stmt][]*lang.Symbol

// originsOf lists them once for all rules of a pass.
func originsOf(p *check.Pass) origins {
	type key struct{}
	return p.Once(key{}, func() any {
		out := origins{}
		for _, u := range p.Note.Uses {
			if u.Symbol != nil && !u.Define {
				out[u.Stmt] = append(out[u.Stmt], u.Symbol)
			}
		}
		return out
	}).(origins)
}

// reaches reports whether anything that a statement uses, directly or through
// definitions, is wanted. A medium is not looked through: its properties are
// symbols of their own.
func (o origins) reaches(s *lang.Stmt, wanted func(*lang.Symbol) bool) bool {
	seen := map[*lang.Stmt]bool{}
	var walk func(*lang.Stmt) bool
	walk = func(s *lang.Stmt) bool {
		if s == nil || seen[s] {
			return false
		}
		seen[s] = true
		for _, sym := range o[s] {
			if wanted(sym) || sym.Owner == nil && walk(sym.Stmt) {
				return true
			}
		}
		return false
	}
	return walk(s)
}

// madeFrom reports whether a symbol's value is computed from that of another.
func (o origins) madeFrom(s, from *lang.Symbol) bool {
	return s != nil && from != nil && s.Owner == nil && o.reaches(s.Stmt, func(x *lang.Symbol) bool { return x.Key == from.Key })
}
