package rules

import "inkjoule/lang"

// dependsOn reports whether the value of a is computed from that of b.
func dependsOn(n *lang.Note, a, b *lang.Symbol) bool {
	return restsOn(n, a, func(s *lang.Symbol) bool { return s.Key == b.Key })
}

// restsOn reports whether the value of a is computed from one that is wanted.
func restsOn(n *lang.Note, a *lang.Symbol, wanted func(*lang.Symbol) bool) bool {
	d := &dependence{note: n, wanted: wanted, seen: map[string]bool{}}
	return d.in(a)
}

type dependence struct {
	note   *lang.Note
	wanted func(*lang.Symbol) bool
	seen   map[string]bool
}

func (d *dependence) in(s *lang.Symbol) bool {
	if s == nil || d.seen[s.Key] {
		return false
	}
	d.seen[s.Key] = true
	found := false
	for _, x := range definedBy(s) {
		lang.Walk(x, func(t lang.Tree) bool {
			for _, key := range d.names(s, t) {
				of := statedProperty(d.note, key)
				found = found || of != nil && (d.wanted(of) || d.in(of))
			}
			return !found
		})
	}
	return found
}

// names are the keys that a node of the definition of s may stand for.
func (d *dependence) names(s *lang.Symbol, t lang.Tree) []string {
	switch t := t.(type) {
	case *lang.Name:
		key := lang.CanonicalName(t.Text)
		if s.Owner != nil && d.note.Lookup(s.Owner.Key+"."+key) != nil {
			key = s.Owner.Key + "." + key // siblings come first
		}
		return []string{key}
	case *lang.Member:
		if o, ok := t.X.(*lang.Name); ok {
			return []string{lang.CanonicalName(o.Text) + "." + lang.CanonicalName(t.Field.Text)}
		}
	}
	return nil
}

// definedBy are the expressions that give a name its value: the first member of
// each piece, since what follows is verified and defines nothing, or the formula
// of a column.
func definedBy(s *lang.Symbol) []lang.Expr {
	if s.Def != nil && len(s.Def.Members) > 0 {
		out := []lang.Expr{s.Def.Members[0]}
		for _, piece := range s.Def.Pieces {
			out = append(out, piece.X)
		}
		return out
	}
	if s.Role != lang.RoleColumn || s.Stmt == nil {
		return nil
	}
	table, ok := s.Stmt.Tree.(*lang.Table)
	if !ok {
		return nil
	}
	for _, c := range table.Columns {
		if c.Formula != nil && s.Owner != nil && s.Key == s.Owner.Key+"."+lang.CanonicalName(c.Name.Text) {
			return []lang.Expr{c.Formula}
		}
	}
	return nil
}
