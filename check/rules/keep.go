package rules

import (
	"inkjoule/check"
	"inkjoule/lang"
)

// This file keeps what the looks at a statement have found, so that an edit
// costs only the looks at what it reaches.

// perClaim makes a rule of a look at one claim; see perSpot.
func perClaim(look func(*check.Pass, *claim)) func(*check.Pass) error {
	return perSpot(func(p *check.Pass, s *spot) {
		for _, c := range s.claims {
			look(p, c)
		}
	})
}

// perSymbol makes a rule of a look at one name that a formula defines: a
// quantity, a function, a property.
func perSymbol(look func(*check.Pass, *lang.Symbol)) func(*check.Pass) error {
	return perSpot(func(p *check.Pass, s *spot) {
		for _, sym := range s.symbols {
			look(p, sym)
		}
	})
}

// perSpot makes a rule of a look at one statement. What the look tells may
// depend on the statement, on whatever it is computed from, and on its
// circumstances; then an unchanged statement need not be looked at again.
func perSpot(look func(*check.Pass, *spot)) func(*check.Pass) error {
	return func(p *check.Pass) error {
		v := viewOf(p)
		for _, f := range v.kept[p.Rule.Name] {
			p.Report(f)
		}
		var now *spot
		tee := p.Tee(func(f lang.Fault) { now.found = append(now.found, f) })
		for _, now = range v.fresh {
			look(tee, now)
		}
		return nil
	}
}

// spot is a statement as the looks see it.
type spot struct {
	stmt    *lang.Stmt
	symbols []*lang.Symbol // that formulas in it define
	claims  []*claim
	found   []lang.Fault // by the looks of this run
}

// circumstances are the facts of the whole note on which a look may depend.
type circumstances struct {
	book   *check.Catalogue // which rules have looked
	hasRMS bool
	used   bool // another definition uses what this one defines
	names  int  // how many of the note's names it defines: none where they are defined twice
}

// memo is what all looks at a statement have found.
type memo struct {
	under circumstances
	found []loose
}

// loose is a finding whose places hold wherever statements stand.
type loose struct {
	fault lang.Fault // spans relative to the statement
	names []string   // of the symbols at whose definitions Related points; "" for a place in the statement
}

func (v *view) circumstances(s *spot) circumstances {
	out := circumstances{book: v.book, hasRMS: v.hasRMS, names: len(s.symbols)}
	for _, sym := range s.symbols {
		out.used = out.used || v.used[sym.Key]
	}
	return out
}

// sortOut divides the statements into those that were looked at before, whose
// findings are kept, and the fresh.
func (v *view) sortOut() {
	v.kept = map[string][]lang.Fault{}
	spots := map[*lang.Stmt]*spot{}
	at := func(stmt *lang.Stmt) *spot {
		if spots[stmt] == nil {
			spots[stmt] = &spot{stmt: stmt}
		}
		return spots[stmt]
	}
	for _, sym := range v.note.Symbols {
		if sym.Stmt != nil && sym.Def != nil && !sym.Input && len(sym.Def.Members) > 0 {
			s := at(sym.Stmt)
			s.symbols = append(s.symbols, sym)
		}
	}
	for _, c := range v.claims {
		s := at(c.sym.Stmt)
		s.claims = append(s.claims, c)
	}
	for _, stmt := range v.note.Script.Stmts {
		s := at(stmt)
		m, ok := v.note.Memo(stmt).(*memo)
		if !ok || m.under != v.circumstances(s) || !v.restore(stmt, m) {
			v.fresh = append(v.fresh, s)
		}
	}
}

// restore brings the findings of a memo to their places; false if one is lost.
func (v *view) restore(s *lang.Stmt, m *memo) bool {
	var out []lang.Fault
	for _, l := range m.found {
		f, ok := l.at(v.note, s)
		if !ok {
			return false
		}
		out = append(out, f)
	}
	for _, f := range out {
		v.kept[f.Rule] = append(v.kept[f.Rule], f)
	}
	return true
}

// Finish keeps what was found of every fresh statement.
func (v *view) Finish() {
	for _, s := range v.fresh {
		m := &memo{under: v.circumstances(s)}
		for _, f := range s.found {
			l, ok := loosen(v.note, s.stmt, f)
			if !ok {
				m = nil
				break
			}
			m.found = append(m.found, l)
		}
		if m != nil {
			v.note.SetMemo(s.stmt, m)
		}
	}
}

// loosen makes the places of a finding independent of where statements stand;
// false where it points at something that is neither in the statement nor a
// definition of the note.
func loosen(n *lang.Note, s *lang.Stmt, f lang.Fault) (loose, bool) {
	if !within(s, f.Span) {
		return loose{}, false
	}
	l := loose{names: make([]string, len(f.Related))}
	for i, r := range f.Related {
		if r.Path == "" && within(s, r.Span) {
			continue
		}
		u, ok := n.UseAt(r.Span.Start)
		if !ok || r.Path != "" || !u.Define || u.Span != r.Span || u.Symbol == nil {
			return loose{}, false
		}
		l.names[i] = u.Symbol.Key
	}
	if f.Fix != nil {
		for _, e := range f.Fix.Edits {
			if !within(s, e.Span) {
				return loose{}, false
			}
		}
	}
	l.fault = shifted(f, -s.At)
	return l, true
}

// at brings a finding to its place.
func (l loose) at(n *lang.Note, s *lang.Stmt) (lang.Fault, bool) {
	f := shifted(l.fault, s.At)
	for i, name := range l.names {
		if name == "" {
			continue
		}
		sym := n.Lookup(name)
		if sym == nil || sym.Path != "" {
			return f, false
		}
		f.Related[i].Span = sym.Span
	}
	return f, true
}

func within(s *lang.Stmt, at lang.Span) bool {
	return s.At <= at.Start && at.End <= s.At+len(s.Text)
}

// shifted is a copy of a finding with all its places moved.
func shifted(f lang.Fault, by int) lang.Fault {
	f.Span = f.Span.Shift(by)
	if f.Related != nil {
		related := make([]lang.Related, len(f.Related))
		for i, r := range f.Related {
			r.Span = r.Span.Shift(by)
			related[i] = r
		}
		f.Related = related
	}
	if f.Fix != nil {
		fix := &lang.Fix{Title: f.Fix.Title}
		for _, e := range f.Fix.Edits {
			fix.Edits = append(fix.Edits, lang.Edit{Span: e.Span.Shift(by), New: e.New})
		}
		f.Fix = fix
	}
	return f
}
