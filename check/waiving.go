package check

import (
	"fmt"

	"inkjoule/lang"
)

// waive is one waiver while findings are matched against it.
type waive struct {
	tree   *lang.Waive
	stmt   *lang.Stmt
	span   lang.Span
	symbol *lang.Symbol // nil: the whole note
	broken bool         // it names an unknown rule or name, or one that cannot be waived
	firm   bool         // it speaks of a finding that cannot be waived
}

// waiving applies the waivers of a note.
type waiving struct {
	note      *lang.Note
	places    *places
	catalogue *Catalogue
	waives    []*waive
	said      []Finding // about the waivers themselves
	names     map[string]*lang.Symbol
}

func newWaiving(note *lang.Note, p *places, c *Catalogue) *waiving {
	w := &waiving{note: note, places: p, catalogue: c}
	for _, s := range note.Script.Stmts {
		if tree, ok := s.Tree.(*lang.Waive); ok {
			w.waives = append(w.waives, w.read(s, tree))
		}
	}
	return w
}

// read resolves a waiver; what is wrong with it is said once, here.
func (w *waiving) read(s *lang.Stmt, tree *lang.Waive) *waive {
	out := &waive{tree: tree, stmt: s, span: s.Abs(tree)}
	name := tree.Rule.Text
	rule := w.catalogue.Find(name)
	switch {
	case rule == nil:
		w.unknownRule(out)
	case rule.Firm:
		out.broken = true
		w.firmly(out)
	}
	if tree.For == nil {
		return out
	}
	if out.symbol = w.lookup(out); out.symbol == nil {
		out.broken = true
		w.unknownName(out)
	}
	return out
}

// firmly tells that an error cannot be waived.
func (w *waiving) firmly(v *waive) {
	w.say("unused-waiver", v.stmt.Abs(&v.tree.Rule),
		fmt.Sprintf("%s cannot be waived", v.tree.Rule.Text),
		"An error of syntax, dimension or arithmetic has to be put right; take the waiver out.")
}

func (w *waiving) unknownRule(v *waive) {
	v.broken = true
	name := v.tree.Rule.Text
	detail := "The command `inkjoule rules` lists the names."
	var fix *lang.Fix
	span := v.stmt.Abs(&v.tree.Rule)
	if near := w.catalogue.Nearest(name); near != "" {
		detail = fmt.Sprintf("Write %s if that is meant. %s", near, detail)
		fix = &lang.Fix{Title: "Write " + near, Edits: []lang.Edit{{Span: span, New: near}}}
	}
	w.say("unknown-rule", span, fmt.Sprintf("no rule is called %q", name), detail)
	w.said[len(w.said)-1].Fix = fix
}

// unknownName is said only where the language has not said it already.
func (w *waiving) unknownName(v *waive) {
	span := v.stmt.Abs(v.tree.For)
	for _, f := range w.note.Faults {
		if overlap(f.Span, span) {
			return
		}
	}
	w.say("unknown-name", span, fmt.Sprintf("nothing in this note is called %q", written(v.tree.For)),
		"A waiver speaks of a name that the note defines (w), of a medium's property (mica.eps_r), or, without `for`, of the whole note.")
}

func (w *waiving) say(rule string, span lang.Span, message, detail string) {
	f := lang.Fault{Rule: rule, Span: span, Message: message, Detail: detail, Severity: lang.Error}
	if r := w.catalogue.Find(rule); r != nil {
		f.Severity = r.Severity
	}
	w.said = append(w.said, Finding{Fault: f, Path: w.note.Path})
}

// lookup finds the symbol after `for`: among the uses of the waiver's own
// statement first, by its spelling otherwise.
func (w *waiving) lookup(v *waive) *lang.Symbol {
	span := v.stmt.Abs(v.tree.For)
	var found *lang.Symbol
	for _, u := range usesWithin(w.note, span) {
		if u.Span.End == span.End {
			found = u.Symbol
		}
	}
	if found == nil {
		found = w.spelled()[written(v.tree.For)]
	}
	return found
}

// spelled indexes the note's names by their spelling, once.
func (w *waiving) spelled() map[string]*lang.Symbol {
	if w.names == nil {
		w.names = make(map[string]*lang.Symbol, len(w.note.Symbols))
		for _, s := range w.note.Symbols {
			w.names[spelling(s)] = s
		}
	}
	return w.names
}

func spelling(s *lang.Symbol) string {
	if s.Owner != nil {
		return s.Owner.Name + "." + s.Name
	}
	return s.Name
}

// apply marks the findings that a waiver silences. A waiver for a name goes
// before one for the note, so that the nearer reason is shown.
func (w *waiving) apply(found []Finding) {
	for _, general := range []bool{false, true} {
		for _, v := range w.waives {
			if !v.broken && (v.symbol == nil) == general {
				w.applyOne(v, found)
			}
		}
	}
}

func (w *waiving) applyOne(v *waive, found []Finding) {
	for i := range found {
		f := &found[i]
		if f.Rule != v.tree.Rule.Text || f.IsWaived() || !w.speaksOf(v, f) {
			continue
		}
		if f.Firm {
			v.firm = true
		} else {
			f.Waived, f.WaivedBy = v.tree.Reason.Text, v.span
		}
	}
}

// speaksOf reports whether a finding is about the waiver's name: it stands in
// the definition of the name, marks a use of it and nothing else, or stands in
// a statement without a name of its own (a criterion, a check) that uses it.
func (w *waiving) speaksOf(v *waive, f *Finding) bool {
	if v.symbol == nil {
		return true
	}
	at, ok := w.places.at(f.Span.Start)
	if ok && defines(at, v.symbol) {
		return true
	}
	scope := f.Span
	if ok && nameless(at.stmt.Tree) {
		scope = lang.Span{Start: at.stmt.At, End: at.stmt.At + len(at.stmt.Text)}
	}
	for _, u := range usesWithin(w.note, scope) {
		if same(u.Symbol, v.symbol) && (scope != f.Span || u.Span == f.Span) {
			return true
		}
	}
	return false
}

// defines reports whether a place defines the symbol: a quantity its own
// definition, a medium, region or table its whole block.
func defines(at place, s *lang.Symbol) bool {
	if s.Def != nil {
		return at.def == s.Def
	}
	return s.Stmt != nil && at.stmt == s.Stmt
}

func same(a, b *lang.Symbol) bool {
	return a != nil && b != nil && (a == b || a.Key == b.Key && a.Role == b.Role)
}

// nameless reports whether a statement defines no name.
func nameless(t lang.Statement) bool {
	switch t.(type) {
	case *lang.Criterion, *lang.Check, *lang.Assume, *lang.Plot:
		return true
	}
	return false
}

// unused says which waivers silence nothing.
func (w *waiving) unused(found []Finding) {
	used := map[lang.Span]bool{}
	for i := range found {
		used[found[i].WaivedBy] = true
	}
	for _, v := range w.waives {
		switch {
		case v.broken || used[v.span]:
		case v.firm:
			w.firmly(v)
		default:
			w.say("unused-waiver", v.span, fmt.Sprintf("this waiver silences nothing: %s does not fire here", scopeOf(v)),
				"Take it out, so that it cannot hide a later mistake.")
		}
	}
}

func scopeOf(v *waive) string {
	if v.symbol == nil {
		return v.tree.Rule.Text
	}
	return fmt.Sprintf("%s for %s", v.tree.Rule.Text, written(v.tree.For))
}
