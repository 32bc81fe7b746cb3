package lang

import (
	"fmt"
	"strings"
)

// link resolves every cell's needs to cells.
func (a *analysis) link() {
	for _, c := range a.all {
		if old := a.old[c.tree]; old != nil && old.owner == nil && a.needsHold(old) {
			c.needs = old.needs
		} else {
			c.needs = a.needsOf(c)
		}
		c.deps = make([]*cell, len(c.needs))
		for i, n := range c.needs {
			c.deps[i] = a.cells[n.key]
		}
	}
}

// needsHold reports whether the needs of an earlier cell are still what its tree
// gives: which properties and columns stand behind a medium's or a table's hangs
// on that medium or table.
func (a *analysis) needsHold(old *cell) bool {
	for _, n := range old.needs {
		d := a.cells[n.key]
		if d != nil && (d.role == RoleMedium || d.role == RoleTable) && d.path == "" && a.old[d.tree] == nil {
			return false
		}
	}
	return true
}

// Colours of the depth-first walk.
const (
	white = uint8(iota)
	grey
	black
)

// order returns the cells so that each follows what it needs; the members of a
// cycle are reported once and left unknown.
func (a *analysis) order() []*cell {
	w := &walk{a: a, out: make([]*cell, 0, len(a.all))}
	for _, c := range a.all {
		w.visit(c)
	}
	return w.out
}

// walk is a depth-first walk over needs.
type walk struct {
	a    *analysis
	path []*cell
	out  []*cell
}

func (w *walk) visit(c *cell) {
	switch c.colour {
	case black:
		return
	case grey:
		w.cycle(c)
		return
	}
	c.colour = grey
	w.path = append(w.path, c)
	for i, d := range c.deps {
		if d != nil && !c.needs[i].soft && d.stmt != nil && d.path == "" {
			w.visit(d)
		}
	}
	w.path = w.path[:len(w.path)-1]
	c.colour = black
	w.out = append(w.out, c)
}

// cycle reports the cells on the path from c back to c.
func (w *walk) cycle(c *cell) {
	i := len(w.path) - 1
	for w.path[i] != c {
		i--
	}
	members := w.path[i:]
	first := 0
	names := make([]string, 0, len(members)+1)
	for j, m := range members {
		if m.cyclic {
			return
		}
		if m.stmt.At < members[first].stmt.At {
			first = j
		}
	}
	var rel []Related
	for j := range members {
		m := members[(first+j)%len(members)]
		m.cyclic = true
		names = append(names, m.title())
		if j > 0 {
			rel = append(rel, Related{Span: m.place().Shift(m.stmt.At), Message: m.title() + " is part of the circle"})
		}
	}
	m := members[first]
	names = append(names, m.title())
	message := "these definitions need each other: " + strings.Join(names, " → ")
	if len(members) == 1 {
		message = m.title() + " needs itself"
	}
	w.a.faults = append(w.a.faults, Fault{
		Rule: "cyclic-definition", Severity: Error, Span: m.place().Shift(m.stmt.At),
		Message: message,
		Detail:  fmt.Sprintf("give one of them as a number, or use solve(… for %s from … to …)", m.title()),
		Related: rel,
	})
}

// title is the name of the cell as its author wrote it.
func (c *cell) title() string {
	if c.name == nil {
		return "this statement"
	}
	if c.owner != nil {
		return c.owner.name.Text + "." + c.name.Text
	}
	return c.name.Text
}

// place is the narrowest span that stands for the cell, statement-relative.
func (c *cell) place() Span {
	if c.name != nil {
		return c.name.Span
	}
	return c.tree.Place()
}
