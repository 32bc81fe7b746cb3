package lang

import (
	"fmt"
	"path"
	"slices"
	"strings"

	"inkjoule/lang/eval"
	"inkjoule/lang/media"
)

// This file resolves references between notes. A referred note is analysed on
// its own; what it defines enters as cells that are done.

// imports enters the names of the referred notes.
func (a *analysis) imports() {
	for _, s := range a.script.Stmts {
		u, ok := s.Tree.(*Uses)
		if !ok {
			continue
		}
		n, f := a.referred(s, u)
		if f != nil {
			a.faults = append(a.faults, *f)
			a.pending = append(a.pending, pendingNames{s, u, nil})
			continue
		}
		a.pending = append(a.pending, pendingNames{s, u, n})
	}
	for _, p := range a.pending {
		a.enterNote(p)
	}
}

// pendingNames is a referred note whose names are to be entered; a nil note is
// one that could not be read, and its alias is unknown.
type pendingNames struct {
	stmt *Stmt
	uses *Uses
	note *Note
}

// referred reads and analyses the note that a statement refers to.
func (a *analysis) referred(s *Stmt, u *Uses) (*Note, *Fault) {
	fault := func(message, detail string) *Fault {
		return &Fault{Rule: "unknown-note", Severity: Error, Span: u.Path.Span.Shift(s.At), Message: message, Detail: detail}
	}
	name := u.Path.Text
	if chapter, ok := strings.CutPrefix(name, media.Prefix); ok {
		text, found := media.Handbook(chapter)
		if !found {
			return nil, fault(fmt.Sprintf("the handbook has no chapter %q", chapter), "it has "+list(media.Chapters()))
		}
		return a.nested(name, text, fault)
	}
	if a.opt.Files == nil {
		return nil, fault("other notes cannot be read here", "")
	}
	target := path.Join(path.Dir(a.opt.Path), name)
	if slices.Contains(a.opt.within, target) || target == a.opt.Path {
		return nil, fault(fmt.Sprintf("%q refers back to this note", name), "a note cannot use itself, directly or through others")
	}
	text, err := a.opt.Files.Read(a.ctx, target)
	if err != nil {
		return nil, fault(fmt.Sprintf("%q cannot be read: %v", name, err), "the path is relative to this note and stays inside the workspace")
	}
	return a.nested(target, text, fault)
}

// nested analyses a referred note, reusing what was known of it.
func (a *analysis) nested(target, text string, fault func(string, string) *Fault) (*Note, *Fault) {
	if n := a.imported[target]; n != nil {
		return n, nil
	}
	opt := Options{Path: target, Files: a.opt.Files, Budget: a.opt.Budget, within: append(slices.Clone(a.opt.within), a.opt.Path)}
	if a.previous != nil {
		opt.Previous = a.previous.imports[target]
	}
	if len(opt.within) > 32 {
		return nil, fault("references are nested more than 32 deep", "refer to the innermost note directly")
	}
	n, err := Analyze(a.ctx, text, opt)
	if err != nil {
		return nil, fault("the reference was not followed in time", "")
	}
	if a.imported == nil {
		a.imported = map[string]*Note{}
	}
	a.imported[target] = n
	return n, nil
}

// enterNote enters what a referred note defines: under its alias, or directly
// where this note has no such name itself.
func (a *analysis) enterNote(p pendingNames) {
	prefix := ""
	if p.uses.As != nil {
		c := newCell(p.stmt, RoleNote, p.uses, p.uses.As)
		a.enter(c)
		prefix = c.key + "."
	}
	if p.note == nil {
		a.incomplete = a.incomplete || prefix == ""
		return
	}
	opt := a.opt
	opt.Previous = nil // a view lives as long as the note: it must not keep the one before
	view := &analysis{opt: opt, ctx: a.ctx, cells: map[string]*cell{}, units: a.units}
	for key, old := range p.note.state.cells {
		c := foreign(old, key, "", view, p.note.Path)
		a.renumber(c, p.note)
		view.cells[key] = c
	}
	for key, old := range p.note.state.cells {
		if old.role == RoleConstant || old.path != "" {
			continue
		}
		own := a.cells[prefix+key]
		if own == nil {
			c := foreign(view.cells[key], prefix+key, prefix, view, p.note.Path)
			a.cells[prefix+key] = c
		} else if prefix == "" && own.stmt != nil && own.path == "" && own.owner == nil {
			a.faults = append(a.faults, Fault{
				Rule: "name-defined-twice", Severity: Advice, Span: own.place().Shift(own.stmt.At),
				Message: fmt.Sprintf("%s is also defined in %q; this note's own definition counts", own.title(), p.uses.Path.Text),
				Detail:  "refer to the note with `as NAME` to keep the two apart",
			})
		}
	}
	a.views = append(a.views, view)
}

// foreign copies a cell of another note under a key of this one.
func foreign(old *cell, key, prefix string, view *analysis, path string) *cell {
	c := *old
	c.key, c.path, c.view = key, path, view
	if prefix != "" && len(c.sym.Facts.Media) > 0 {
		w := *c.work
		c.work = &w
		c.sym.Facts.Media = slices.Clone(c.sym.Facts.Media)
		for i, m := range c.sym.Facts.Media {
			c.sym.Facts.Media[i] = prefix + m
		}
	}
	return &c
}

// foreignInput names an uncertain input of a referred note.
type foreignInput struct {
	path string
	id   int
}

// renumber gives the inputs of a referred note numbers of this one, the same
// ones in every analysis.
func (a *analysis) renumber(c *cell, n *Note) {
	number := func(id int) int {
		key := foreignInput{n.Path, id}
		own, ok := a.foreignIn[key]
		if !ok {
			if a.foreignIn == nil {
				a.foreignIn = map[foreignInput]int{}
			}
			own = a.inputs
			a.inputs++
			a.foreignIn[key] = own
		}
		a.spreads[own] = n.state.spreads[id]
		return own
	}
	if len(c.grad) > 0 {
		w := *c.work
		c.work = &w
		c.grad = slices.Clone(c.grad)
		for i := range c.grad {
			c.grad[i].Input = number(c.grad[i].Input)
		}
		slices.SortFunc(c.grad, func(x, y eval.Partial) int { return x.Input - y.Input })
	}
	c.inputs = slices.Clone(c.inputs)
	for i := range c.inputs {
		c.inputs[i].id = number(c.inputs[i].id)
	}
}

// home is the note in which the cell's own names are looked up.
func (c *cell) home(a *analysis) *analysis {
	if c.view != nil {
		return c.view
	}
	return a
}

// place gives the foreign cells slots of this note's frame, with their values.
func (a *analysis) placeForeign() {
	for _, v := range a.views {
		v.machine = a.machine
		for _, c := range v.cells {
			a.slotFor(c)
		}
	}
	for _, c := range a.cells {
		if c.path != "" {
			a.slotFor(c)
		}
	}
}

func (a *analysis) slotFor(c *cell) {
	c.slot = a.newSlot()
	a.replaceInputs(c)
	if c.sym.Result.Known {
		a.machine.frame.Set(c.slot, c.sym.Value)
	}
}

// foreign infers `ref.name` and `ref.name(…)` of a referred note.
func (e *elab) foreign(m *Member, note *cell, field string) typed {
	e.use(note.key, m.X.Place())
	c := e.a.cells[note.key+"."+field]
	if c == nil {
		if e.a.unread(note) {
			return unknown()
		}
		e.report(Fault{
			Rule: "unknown-name", Severity: Error, Span: m.Field.Span,
			Message: fmt.Sprintf("%s defines no %s", note.title(), m.Field.Text), Detail: "names of a referred note are those that it defines itself",
		})
		return unknown()
	}
	e.use(c.key, m.Span)
	return e.cellValue(c, m)
}

// unread reports a referred note that could not be read: nothing is known of
// its names, and that was reported once.
func (a *analysis) unread(note *cell) bool {
	for _, p := range a.pending {
		if p.uses == note.tree {
			return p.note == nil
		}
	}
	return false
}

// foreignCall infers `ref.f(x)`.
func (e *elab) foreignCall(c *Call, note *cell) typed {
	e.use(note.key, c.Of.Place())
	f := e.a.cells[note.key+"."+CanonicalName(c.Fn.Text)]
	switch {
	case f != nil && f.role == RoleFunction:
		e.use(f.key, c.Fn.Span)
		return e.applied(c, f)
	case e.a.unread(note):
		return unknown()
	}
	e.fault("unknown-function", &c.Fn, fmt.Sprintf("%s defines no function %s", note.title(), c.Fn.Text), "")
	return unknown()
}

// owner finds the medium, region or table before the last point: `mica`, or
// `ref.mica`.
func (e *elab) ownerOf(x Expr) (*cell, bool) {
	m, ok := x.(*Member)
	if !ok {
		return nil, false
	}
	n, ok := m.X.(*Name)
	if !ok || e.local(CanonicalName(n.Text)) != nil {
		return nil, false
	}
	note := e.a.cells[CanonicalName(n.Text)]
	if note == nil || note.role != RoleNote {
		return nil, false
	}
	c := e.a.cells[note.key+"."+CanonicalName(m.Field.Text)]
	if c == nil {
		return nil, false
	}
	e.use(note.key, n.Span)
	return c, true
}
