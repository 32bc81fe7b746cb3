package check

import (
	"strings"
	"testing"

	"inkjoule/lang"
)

// sketch builds analysed notes by hand, so that these tests need neither the
// parser nor the evaluation.
type sketch struct {
	t    *testing.T
	note *lang.Note
}

func newSketch(t *testing.T, text string) *sketch {
	src := lang.NewSource(text)
	return &sketch{t, &lang.Note{Path: "a.joule", Script: &lang.Script{Source: src}}}
}

// span finds a text that occurs once in the note.
func (s *sketch) span(text string) lang.Span {
	s.t.Helper()
	whole := s.note.Script.Source.Text
	at := strings.Index(whole, text)
	if at < 0 || strings.Count(whole, text) != 1 {
		s.t.Fatalf("%q occurs %d times", text, strings.Count(whole, text))
	}
	return lang.Span{Start: at, End: at + len(text)}
}

// stmt adds the statement of that text.
func (s *sketch) stmt(text string, tree lang.Statement) *lang.Stmt {
	s.t.Helper()
	st := &lang.Stmt{At: s.span(text).Start, Text: text, Tree: tree}
	s.note.Script.Stmts = append(s.note.Script.Stmts, st)
	return st
}

// define adds a definition and its symbol.
func (s *sketch) define(text string) *lang.Symbol {
	s.t.Helper()
	name, _, _ := strings.Cut(text, " ")
	def := &lang.Definition{Node: lang.Node{Span: lang.Span{End: len(text)}}, Name: lang.Ident{Text: name}}
	st := s.stmt(text, def)
	sym := &lang.Symbol{Name: name, Key: name, Role: lang.RoleQuantity, Stmt: st, Def: def, Span: lang.Span{Start: st.At, End: st.At + len(name)}}
	s.note.Symbols = append(s.note.Symbols, sym)
	return sym
}

// use adds a use of a symbol at a text.
func (s *sketch) use(sym *lang.Symbol, at lang.Span) {
	s.note.Uses = append(s.note.Uses, lang.Use{Symbol: sym, Span: at})
}

// waive adds `waive RULE [for NAME]: "REASON"`.
func (s *sketch) waive(rule, name, reason string) {
	s.t.Helper()
	text := "waive " + rule
	w := &lang.Waive{Rule: lang.Words{Node: lang.Node{Span: lang.Span{Start: 6, End: len(text)}}, Text: rule}, Reason: lang.Quote{Text: reason}}
	if name != "" {
		text += " for " + name
		w.For = &lang.Name{Node: lang.Node{Span: lang.Span{Start: len(text) - len(name), End: len(text)}}, Text: name}
	}
	text += `: "` + reason + `"`
	w.Node.Span = lang.Span{End: len(text)}
	s.stmt(text, w)
}

// fault is a finding of the language at a text.
func (s *sketch) fault(rule, at string, severity lang.Severity) {
	s.t.Helper()
	s.note.Faults = append(s.note.Faults, lang.Fault{Rule: rule, Severity: severity, Span: s.span(at), Message: rule})
}

// at is a rule that fires at a text, complete enough for a run.
func (s *sketch) at(name, text string, severity lang.Severity) *Rule {
	s.t.Helper()
	f := lang.Fault{Span: s.span(text), Message: name}
	return whole(Rule{Name: name, Severity: severity, Run: func(p *Pass) error {
		p.Report(f)
		return nil
	}})
}

// whole fills in the documentation that a rule must have.
func whole(r Rule) *Rule {
	r.Title, r.Sees, r.Silent, r.Formula, r.Remedy, r.Source = "t", "s", "s", "f", "r", "common practice"
	r.Wrong, r.Right = Example{"    x = 1\n"}, Example{"    x = 2\n"}
	return &r
}

// seen writes findings as `rule severity [waived] text`.
func (s *sketch) seen(found []Finding) []string {
	out := []string{}
	for _, f := range found {
		line := f.Rule + " " + f.Severity.String()
		if f.IsWaived() {
			line += " waived"
		}
		out = append(out, line+" "+s.note.Script.Source.Text[f.Span.Start:f.Span.End])
	}
	return out
}
