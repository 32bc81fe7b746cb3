package rules

import "inkjoule/lang"

// dependsOn reports whether the value of a is computed from that of b.
func dependsOn(n *lang.Note, a, b *lang.Symbol) bool {
	d := &dependence{note: n, want: b.Key, seen: map[string]bool{}}
	return d.in(a)
}

type dependence struct {
	note *lang.Note
	want string
	seen map[string]bool
}

func (d *dependence) in(s *lang.Symbol) bool {
	if s == nil || s.Def == nil || d.seen[s.Key] {
		return false
	}
	d.seen[s.Key] = true
	found := false
	for i, m := range s.Def.Members {
		if i > 0 {
			break // what follows is verified, it defines nothing
		}
		lang.Walk(m, func(t lang.Tree) bool {
			if name, ok := t.(*lang.Name); ok && !found {
				key := lang.CanonicalName(name.Text)
				found = key == d.want || d.in(d.note.Lookup(key))
			}
			return !found
		})
	}
	return found
}
