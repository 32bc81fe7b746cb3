package lsp

import (
	"fmt"
	"strings"

	"go.lsp.dev/protocol"

	"inkjoule/lang"
)

// This file offers two further actions: to answer for a finding, and to give a
// medium the property that a formula writes out.

// waivers offer to silence a finding, for the name that it is about, with a
// reason that the author still has to write.
func (s *spot) waivers(within lang.Span) []protocol.CommandOrCodeAction {
	var out []protocol.CommandOrCodeAction
	rep := s.view.reporter(s.doc)
	for _, f := range s.found {
		rule := s.view.catalogue.Find(f.Rule)
		if rule == nil || f.Firm || f.IsWaived() || f.Rule == "unused-waiver" || !touches(f.Span, within) {
			continue
		}
		stmt := s.note.StmtAt(f.Span.Start)
		if stmt == nil {
			continue
		}
		about := ""
		if d := dependentsOf(s.note).at(stmt, f.Span.Start); d.sym != nil {
			about = " for " + qualifiedName(d.sym)
		}
		a := s.action("Waive "+f.Rule+about, protocol.CodeActionKindQuickFix, []lang.Edit{
			s.after(stmt, fmt.Sprintf("waive %s%s: \"REASON\"", f.Rule, about)),
		})
		a.Diagnostics = []protocol.Diagnostic{rep.diagnostic(f)}
		out = append(out, a)
	}
	return out
}

// after is the edit that adds a statement in a line of its own below another
// one, as deep as that and with the note's line end.
func (s *spot) after(stmt *lang.Stmt, text string) lang.Edit {
	src := s.note.Script.Source
	first := src.LineSpan(src.Line(stmt.At))
	last := src.LineSpan(src.Line(stmt.At + len(stmt.Text)))
	return lang.Edit{Span: lang.Span{Start: last.End, End: last.End}, New: s.lineEnd() + src.Text[first.Start:stmt.At] + text}
}

// lineEnd is the line end that the note begins with.
func (s *spot) lineEnd() string {
	text := s.note.Script.Source.Text
	if i := strings.IndexAny(text, "\r\n"); i >= 0 && strings.HasPrefix(text[i:], "\r") {
		if strings.HasPrefix(text[i:], "\r\n") {
			return "\r\n"
		}
		return "\r"
	}
	return "\n"
}

// extractions offer to make a literal of a definition bound to a medium a
// property of that medium: `D in mica = 6.9*eps_0*E` wants mica.eps_r.
func (s *spot) extractions(within lang.Span) []protocol.CommandOrCodeAction {
	stmt := s.note.StmtAt(within.Start)
	if stmt == nil {
		return nil
	}
	d, ok := stmt.Tree.(*lang.Definition)
	if !ok || d.In == nil {
		return nil
	}
	medium := s.note.Lookup(lang.CanonicalName(d.In.Text))
	if medium == nil || medium.Role != lang.RoleMedium || medium.Stmt == nil || medium.Path != "" || len(d.Members) == 0 {
		return nil
	}
	s.at = within.Start
	lit := s.factor(stmt, d.Members[0])
	if lit == nil {
		return nil
	}
	name := s.freeProperty(medium)
	span := stmt.Abs(lit)
	property := lang.Edit{New: fmt.Sprintf("%s%s%s = %s", s.lineEnd(), s.propertyIndent(medium), name, s.text(span))}
	end := medium.Stmt.At + len(medium.Stmt.Text)
	property.Span = lang.Span{Start: end, End: end}
	title := fmt.Sprintf("Make %s the property %s.%s", s.text(span), medium.Name, name)
	return []protocol.CommandOrCodeAction{s.action(title, protocol.CodeActionKindRefactorExtract, []lang.Edit{
		property, {Span: span, New: medium.Name + "." + name},
	})}
}

// factor is the literal at the spot where it is a part of a formula, not the
// whole of it.
func (s *spot) factor(stmt *lang.Stmt, formula lang.Expr) *lang.Literal {
	if _, whole := formula.(*lang.Literal); whole || !stmt.Abs(formula).Contains(s.at) {
		return nil
	}
	path := pathTo(formula, s.at-stmt.At)
	lit, _ := path[len(path)-1].(*lang.Literal)
	return lit
}

// freeProperty is a name that the medium does not have; the author renames it.
func (s *spot) freeProperty(medium *lang.Symbol) string {
	for n := 1; ; n++ {
		name := fmt.Sprintf("property_%d", n)
		if s.note.Lookup(medium.Key+"."+name) == nil {
			return name
		}
	}
}

// propertyIndent is how deep the medium's properties stand.
func (s *spot) propertyIndent(medium *lang.Symbol) string {
	src := s.note.Script.Source
	for _, m := range members(s.note, medium) {
		line := src.LineSpan(src.Line(m.Span.Start))
		return src.Text[line.Start:m.Span.Start]
	}
	line := src.LineSpan(src.Line(medium.Stmt.At))
	return src.Text[line.Start:medium.Stmt.At] + "    "
}
