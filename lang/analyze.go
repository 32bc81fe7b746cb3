package lang

import (
	"cmp"
	"context"
	"maps"
	"slices"
	"strings"

	"inkjoule/lang/eval"
	"inkjoule/lang/unit"
)

// This file drives the analysis and freezes its result.

// state is what a frozen note keeps for lookups and for the next analysis.
type state struct {
	cells   map[string]*cell
	all     []*cell
	byStmt  map[*Stmt][]*cell
	symbols map[string]*Symbol
	imports map[string]*Note
	inputs  int
	budget  eval.Budget // what was over it is not known to be over another
	spreads map[int]eval.Spread

	foreignIn map[foreignInput]int
	csv       map[*Table]*csvTable
}

func (s *state) cellOf(sym *Symbol) *cell {
	if s == nil || sym == nil {
		return nil
	}
	return s.cells[sym.Key]
}

func analyze(ctx context.Context, text string, opt Options) (*Note, error) {
	a := &analysis{opt: opt, ctx: ctx, cells: make(map[string]*cell, 64), units: map[string]unitReading{}, spreads: map[int]eval.Spread{}}
	var previous *Script
	if p := opt.Previous; p != nil && p.state != nil && p.state.budget == opt.Budget {
		previous = p.Script
		a.takeOver(p.state)
	}
	a.script = Read(text, previous)
	a.constants()
	a.declare()
	a.imports()
	a.link()
	order := a.order()
	for i, c := range a.all {
		c.slot = i
	}
	a.machine = newMachine(ctx, len(a.all))
	a.placeForeign()
	for _, c := range order {
		if err := ctx.Err(); err != nil {
			return nil, err
		}
		a.finish(c)
	}
	return a.freeze(), ctx.Err()
}

// takeOver keeps the finished cells of the previous analysis for reuse.
func (a *analysis) takeOver(s *state) {
	a.old = make(map[Tree]*cell, len(s.all))
	for _, c := range s.all {
		a.old[c.tree] = c
	}
	a.previous, a.inputs, a.foreignIn = s, s.inputs, maps.Clone(s.foreignIn)
}

// finish analyses one cell, or takes over its earlier result where its tree
// and everything it needs are the same.
func (a *analysis) finish(c *cell) {
	if old := a.old[c.tree]; old != nil && old.same(c) {
		c.adopt(old)
		a.replaceInputs(c)
	} else {
		a.analyse(c)
		slices.SortStableFunc(c.uses, func(x, y usage) int { return x.span.Start - y.span.Start })
	}
	if c.role != 0 && c.sym.Result.Known {
		a.machine.frame.Set(c.slot, c.sym.Value)
	}
}

// same reports whether the result of an earlier cell still holds: every cell
// that it used is itself one that was taken over.
func (c *cell) same(now *cell) bool {
	if c.key != now.key || len(c.deps) != len(now.deps) || c.cyclic || now.cyclic || c.hinted || !sameCell(c.regime, now.regime) || !sameCell(c.owner, now.owner) {
		return false
	}
	for i, d := range c.deps {
		if !sameCell(d, now.deps[i]) {
			return false
		}
	}
	return true
}

// sameCell compares by the cell that did the work.
func sameCell(a, b *cell) bool {
	if a == nil || b == nil {
		return a == b
	}
	return a.made == b.made && a.made != nil
}

// adopt takes over what an earlier cell found.
func (c *cell) adopt(old *cell) { c.work, c.made, c.inputs = old.work, old.made, old.inputs }

// analyse works on a cell from scratch.
func (a *analysis) analyse(c *cell) {
	c.begin()
	if c.cyclic {
		return
	}
	switch t := c.tree.(type) {
	case *Definition:
		a.define(c, t)
	case *Regime:
		a.regime(c, t)
	case *Region:
		a.region(c, t)
	case *Table:
		a.table(c, t)
	case *Column:
		a.column(c, t)
	case *Assume, *Criterion, *Check:
		a.judge(c)
	case *Plot:
		a.plot(c, t)
	case *Waive:
		a.waive(c, t)
	case *Medium:
		a.adjectives(c, t)
	}
}

// readUnit reads a unit phrase once for the note.
func (a *analysis) readUnit(text string) unitReading {
	r, ok := a.units[text]
	if !ok {
		r.unit, r.err = unit.Parse(text)
		a.units[text] = r
	}
	return r
}

// freeze makes the note.
func (a *analysis) freeze() *Note {
	n := &Note{Path: a.opt.Path, Script: a.script}
	st := &state{cells: a.cells, all: a.all, byStmt: make(map[*Stmt][]*cell, len(a.script.Stmts)),
		symbols: make(map[string]*Symbol, len(a.cells)), inputs: a.inputs, budget: a.opt.Budget, spreads: a.spreads, foreignIn: a.foreignIn, csv: a.csvRead, imports: a.imported}
	n.state = st
	for _, c := range a.all {
		st.byStmt[c.stmt] = append(st.byStmt[c.stmt], c)
		if c.judged != nil {
			j := *c.judged
			j.Stmt = c.stmt
			n.Judged = append(n.Judged, j)
		}
	}
	a.freezeSymbols(n)
	a.freezeFaults(n)
	a.freezeUses(n)
	return n
}

// freezeSymbols makes the symbols, owners before what they own.
func (a *analysis) freezeSymbols(n *Note) {
	st := n.state
	for _, c := range a.all {
		if c.name == nil || a.cells[c.key] != c {
			continue
		}
		s := a.symbol(c, st)
		n.Symbols = append(n.Symbols, s)
		st.symbols[c.key] = s
	}
	for _, owned := range []bool{false, true} { // owners before what they own
		for key, c := range a.cells {
			switch {
			case owned != (c.owner != nil):
			case c.path != "":
				st.symbols[key] = a.symbol(c, st)
			case c.stmt == nil:
				s := c.sym
				s.Key, s.Role = key, c.role
				st.symbols[key] = &s
			}
		}
	}
}

// symbol is the cell's symbol in the note that is being frozen: that of the
// previous analysis where nothing about it has changed, not even its place.
func (a *analysis) symbol(c *cell, st *state) *Symbol {
	var owner *Symbol
	if at := strings.LastIndexByte(c.key, '.'); c.owner != nil && at > 0 {
		owner = st.symbols[c.key[:at]] // not that of c.owner, which another note may call otherwise
	}
	if p := a.previous; p != nil {
		old := p.symbols[c.key]
		if was := p.cells[c.key]; old != nil && was != nil && was.work == c.work && old.Stmt == c.stmt && old.Owner == owner && old.Path == c.path {
			return old
		}
	}
	s := c.sym
	s.Name, s.Key, s.Role, s.Stmt, s.Path, s.Owner = c.name.Text, c.key, c.role, c.stmt, c.path, owner
	s.Span = c.name.Span.Shift(c.stmt.At)
	if d, ok := c.tree.(*Definition); ok {
		s.Def = d
		s.Per = d.Per.text()
	}
	return &s
}

// freezeFaults collects the findings of the division, the syntax and the
// cells, in note offsets and total order.
func (a *analysis) freezeFaults(n *Note) {
	n.Faults = append(n.Faults, a.script.Faults...)
	n.Faults = append(n.Faults, a.faults...)
	for _, s := range a.script.Stmts {
		for _, f := range s.Faults {
			n.Faults = append(n.Faults, f.shift(s.At))
		}
	}
	for _, c := range a.all {
		for _, f := range c.faults {
			n.Faults = append(n.Faults, a.placed(f.shift(c.stmt.At)))
		}
	}
	a.unused(n)
	n.Faults = onceAName(n.Faults)
	slices.SortStableFunc(n.Faults, func(x, y Fault) int {
		return cmp.Or(x.Span.Start-y.Span.Start, x.Span.End-y.Span.End, strings.Compare(x.Rule, y.Rule))
	})
}

// onceAName keeps the first unit-hides-name caution for each name: the detail
// names it.
func onceAName(fs []Fault) []Fault {
	seen := map[string]bool{}
	return slices.DeleteFunc(fs, func(f Fault) bool {
		again := f.Rule == "unit-hides-name" && seen[f.Detail]
		seen[f.Detail] = seen[f.Detail] || f.Rule == "unit-hides-name"
		return again
	})
}

// shift moves a fault from statement to note offsets.
func (f Fault) shift(by int) Fault {
	f.Span = f.Span.Shift(by)
	if f.Related != nil {
		rel := make([]Related, len(f.Related))
		for i, r := range f.Related {
			if r.Name == "" {
				r.Span = r.Span.Shift(by)
			}
			rel[i] = r
		}
		f.Related = rel
	}
	if f.Fix != nil {
		fix := &Fix{Title: f.Fix.Title, Edits: make([]Edit, len(f.Fix.Edits))}
		for i, e := range f.Fix.Edits {
			fix.Edits[i] = Edit{e.Span.Shift(by), e.New}
		}
		f.Fix = fix
	}
	return f
}

// placed fills in the places of names that a fault points at.
func (a *analysis) placed(f Fault) Fault {
	for i, r := range f.Related {
		if c := a.cells[r.Name]; r.Name != "" && c != nil && c.stmt != nil && c.name != nil {
			f.Related[i].Span = c.name.Span.Shift(c.stmt.At)
		}
	}
	return f
}

// freezeUses lists the uses of names by place.
func (a *analysis) freezeUses(n *Note) {
	count := 0
	for _, c := range a.all {
		count += len(c.uses) + 1
	}
	n.Uses = make([]Use, 0, count)
	for _, c := range a.all {
		if c.name != nil {
			if s := n.state.symbols[c.key]; s != nil && s.Stmt == c.stmt {
				n.Uses = append(n.Uses, Use{Symbol: s, Stmt: c.stmt, Span: s.Span, Define: true})
			}
		}
		for _, u := range c.uses {
			if s := n.state.symbols[u.key]; s != nil {
				n.Uses = append(n.Uses, Use{Symbol: s, Stmt: c.stmt, Span: u.span.Shift(c.stmt.At)})
			}
		}
	}
	byPlace := func(x, y Use) int { return x.Span.Start - y.Span.Start }
	if !slices.IsSortedFunc(n.Uses, byPlace) {
		slices.SortStableFunc(n.Uses, byPlace)
	}
	// A bound of a piece is elaborated with the domain and with the piece.
	n.Uses = slices.CompactFunc(n.Uses, func(x, y Use) bool { return x.Symbol == y.Symbol && x.Span == y.Span })
}
