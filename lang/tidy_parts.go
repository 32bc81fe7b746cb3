package lang

import (
	"slices"
	"strings"
)

// This file finds the parts of statements that are laid out.

// defined is a definition on its line: a statement, or a property of a medium.
type defined struct {
	st           *Stmt
	def          *Definition
	line, indent int
}

// definitions lists the definitions without a fault of syntax, by place.
func (l *tidying) definitions() []defined {
	var out []defined
	add := func(st *Stmt, d *Definition) {
		if len(d.Members) == 0 {
			return
		}
		line := l.script.Source.Line(st.Abs(d).Start)
		_, indent, _ := l.line(line)
		out = append(out, defined{st, d, line, indent})
	}
	for _, st := range l.script.Stmts {
		if len(st.Faults) > 0 {
			continue
		}
		switch t := st.Tree.(type) {
		case *Definition:
			add(st, t)
		case *Medium:
			for _, p := range t.Properties {
				add(st, p)
			}
		}
	}
	return out
}

// claused is a statement with the blanks before its `for` and its `per`; a zero
// span where it has none on its first line.
type claused struct {
	start, line, indent int
	ranged, source      Span
}

// clauses lists the statements that end in `for …` or `per "…"`, by place.
func (l *tidying) clauses() []claused {
	var out []claused
	add := func(st *Stmt, node Tree, ranges []*Range, per *Quote) {
		c := claused{start: st.Abs(node).Start}
		c.line = l.script.Source.Line(c.start)
		_, c.indent, _ = l.line(c.line)
		if len(ranges) > 0 {
			c.ranged = l.before(c.start, st.Abs(ranges[0]).Start)
		}
		if per != nil {
			text := l.script.Source.Text
			word := st.Abs(per).Start - trailing(text[c.start:st.Abs(per).Start]) - len("per")
			if word > c.start && strings.HasPrefix(text[word:], "per") {
				c.source = l.before(c.start, word)
			}
		}
		if c.ranged.End > 0 || c.source.End > 0 {
			out = append(out, c)
		}
	}
	for _, st := range l.script.Stmts {
		if len(st.Faults) == 0 {
			eachClaused(st, add)
		}
	}
	return out
}

// before is the run of blanks before a place; zero where there is none or where
// the line is another than that of the start.
func (l *tidying) before(start, at int) Span {
	text := l.script.Source.Text[start:at]
	if n := trailing(text); n > 0 && !strings.ContainsAny(text, "\n\r#") {
		return Span{at - n, at}
	}
	return Span{}
}

// eachClaused visits the parts of a statement that may end in clauses. A
// piecewise definition goes on after them and is left as it is.
func eachClaused(st *Stmt, add func(*Stmt, Tree, []*Range, *Quote)) {
	definition := func(d *Definition) {
		if len(d.Pieces) == 0 {
			add(st, d, d.For, d.Per)
		}
	}
	switch t := st.Tree.(type) {
	case *Definition:
		definition(t)
	case *Medium:
		for _, p := range t.Properties {
			definition(p)
		}
	case *Region:
		add(st, t, nil, t.Per)
	case *Regime:
		add(st, t, nil, t.Per)
	case *Assume:
		add(st, t, nil, t.Per)
	case *Criterion:
		add(st, t, nil, t.Per)
	case *Check:
		add(st, t, nil, t.Per)
	}
}

func sortEdits(edits []Edit) {
	slices.SortFunc(edits, func(a, b Edit) int { return a.Span.Start - b.Span.Start })
}
