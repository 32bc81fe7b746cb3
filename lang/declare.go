package lang

import (
	"context"
	"fmt"
	"time"

	"inkjoule/lang/eval"
	"inkjoule/lang/unit"
)

// This file turns statements into cells and enters the names they define.

// analysis is the work on one note; it is dropped when the note is frozen.
type analysis struct {
	opt    Options
	script *Script
	cells  map[string]*cell // by canonical name; properties as "medium.property"
	all    []*cell          // in text order, properties after their medium
	units  map[string]unitReading
	old    map[Tree]*cell // finished cells of the previous analysis, by tree
	faults []Fault        // that belong to no cell, note offsets

	ctx        context.Context
	previous   *state
	machine    *machine
	spent      time.Duration // by all evaluations so far
	inputs     int           // uncertain inputs numbered so far
	spreads    map[int]eval.Spread
	foreignIn  map[foreignInput]int // inputs of referred notes, numbered here
	csvRead    map[*Table]*csvTable
	pending    []pendingNames
	imported   map[string]*Note
	views      []*analysis
	near       map[string]string // the nearest names found so far, for unknown ones
	spelled    []string          // all names, once one was looked for
	incomplete bool              // a referred note could not be read: names may come from it
}

// unitReading is a unit phrase read once for the whole note.
type unitReading struct {
	unit unit.Unit
	err  *unit.PhraseError
}

// declare makes the cells of every statement.
func (a *analysis) declare() {
	var regime *cell
	for _, s := range a.script.Stmts {
		for _, c := range a.cellsOf(s) {
			c.regime = regime
			a.enter(c)
			if c.role == RoleCondition || isRegime(c) {
				c.regime = nil
				regime = c
			}
		}
	}
}

func isRegime(c *cell) bool {
	_, ok := c.tree.(*Regime)
	return ok
}

// cellsOf makes the cells of one statement.
func (a *analysis) cellsOf(s *Stmt) []*cell {
	one := func(role Role, t Tree, name *Ident) []*cell {
		return []*cell{newCell(s, role, t, name)}
	}
	switch t := s.Tree.(type) {
	case *Definition:
		return one(definitionRole(t), t, &t.Name)
	case *Medium:
		return a.mediumCells(s, t)
	case *Region:
		return one(RoleRegion, t, &t.Name)
	case *Table:
		return a.tableCells(s, t)
	case *Regime:
		if t.Name != nil {
			return one(RoleCondition, t, t.Name)
		}
		return one(0, t, nil)
	case *Unread:
		if t.Name != nil {
			return one(RoleQuantity, t, t.Name)
		}
	case *Assume, *Criterion, *Check, *Plot, *Waive:
		return one(0, t, nil)
	}
	return nil
}

func definitionRole(d *Definition) Role {
	if len(d.Params) > 0 {
		return RoleFunction
	}
	return RoleQuantity
}

func newCell(s *Stmt, role Role, t Tree, name *Ident) *cell {
	c := &cell{role: role, stmt: s, tree: t, name: name, base: t.Index(), work: noWork}
	if name != nil {
		c.key = CanonicalName(name.Text)
	}
	return c
}

func (a *analysis) mediumCells(s *Stmt, m *Medium) []*cell {
	head := newCell(s, RoleMedium, m, &m.Name)
	out := []*cell{head}
	for _, p := range m.Properties {
		c := newCell(s, RoleProperty, p, &p.Name)
		c.owner = head
		c.key = head.key + "." + c.key
		out = append(out, c)
	}
	return out
}

// enter puts a cell into the note and its name, if it is new, into the table.
func (a *analysis) enter(c *cell) {
	a.all = append(a.all, c)
	if c.name == nil || c.key == "" {
		return
	}
	first := a.cells[c.key]
	switch {
	case first == nil:
		a.cells[c.key] = c
	case first.role == RoleConstant:
		a.faults = append(a.faults, Fault{
			Rule: "constant-redefined", Severity: Error, Span: c.name.Span.Shift(c.stmt.At),
			Message: fmt.Sprintf("%s is a built-in constant (%s)", c.name.Text, first.sym.Doc),
			Detail:  "give this quantity a name of its own",
		})
	default:
		a.faults = append(a.faults, twice(c, first))
	}
}

// twice is the finding for a name that has a definition already.
func twice(c, first *cell) Fault {
	f := Fault{
		Rule: "name-defined-twice", Severity: Error, Span: c.name.Span.Shift(c.stmt.At),
		Message: fmt.Sprintf("%s is defined already", c.name.Text),
		Detail:  "give one of the two another name",
		Related: []Related{{Span: first.name.Span.Shift(first.stmt.At), Message: "the first definition"}},
	}
	d, ok := c.tree.(*Definition)
	e, ok2 := first.tree.(*Definition)
	if ok && ok2 && d.In != nil && e.In != nil && d.In.Text != e.In.Text {
		f.Detail = fmt.Sprintf("two fields of one name: name them %s_%s and %s_%s", c.name.Text, e.In.Text, c.name.Text, d.In.Text)
	}
	return f
}
