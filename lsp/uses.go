package lsp

import (
	"cmp"
	"slices"

	"inkjoule/lang"
)

// usesOf lists every place of a name of the note. The analysis tells those of
// the formulas that it has followed; where one is wrong, what stands behind the
// fault is looked up here, so that a renaming leaves nothing behind.
func usesOf(note *lang.Note) []lang.Use {
	c := &completion{note: note, seen: map[lang.Span]bool{}}
	c.all = slices.Clone(note.Uses)
	for _, u := range note.Uses {
		c.seen[u.Span] = true
	}
	for _, stmt := range note.Script.Stmts {
		if stmt.Tree != nil {
			c.statement(stmt)
		}
	}
	slices.SortStableFunc(c.all, func(a, b lang.Use) int { return cmp.Compare(a.Span.Start, b.Span.Start) })
	return c.all
}

// completion adds what the analysis has not told.
type completion struct {
	note *lang.Note
	all  []lang.Use
	seen map[lang.Span]bool
}

func (c *completion) statement(stmt *lang.Stmt) {
	b := &binder{}
	owner := ""
	b.free = func(key string, at lang.Span) { c.add(stmt, owner, key, at.Shift(stmt.At)) }
	switch t := stmt.Tree.(type) {
	case *lang.Medium:
		// A property sees its siblings by their own names.
		owner = lang.CanonicalName(t.Name.Text)
		for _, p := range t.Properties {
			b.tree(p)
		}
	case *lang.Table:
		owner = lang.CanonicalName(t.Name.Text)
		for _, col := range t.Columns {
			b.expr(col.Formula)
		}
	default:
		b.tree(t)
	}
}

func (c *completion) add(stmt *lang.Stmt, owner, key string, at lang.Span) {
	if c.seen[at] {
		return
	}
	var sym *lang.Symbol
	if owner != "" {
		sym = c.note.Lookup(owner + "." + key)
	}
	if sym == nil {
		sym = c.note.Lookup(key)
	}
	if sym == nil || sym.Role == lang.RoleParameter {
		return
	}
	c.seen[at] = true
	c.all = append(c.all, lang.Use{Symbol: sym, Stmt: stmt, Span: at})
}
