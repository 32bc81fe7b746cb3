package lang

import "strings"

// This file finds the free names of each cell. A name is free where no
// parameter, bound variable or coordinate hides it; hiding is silent by design
// (language.md, "Definitions").

// need is a free name of a cell, with the place where it is first used. A soft
// need orders nothing: it is a name that a message would like to know about
// (the symbol of a unit phrase that is also a name of the note).
type need struct {
	key  string
	span Span
	soft bool
}

// collector gathers the needs of one cell.
type collector struct {
	a      *analysis
	owner  string // medium whose siblings are visible, "" if none
	regime string // name of the frequency of the harmonic regime in force
	hidden map[string]int
	seen   map[string]bool
	needs  []need
}

// needsOf lists the free names of a cell in order of first use.
func (a *analysis) needsOf(c *cell) []need {
	k := &collector{a: a, seen: map[string]bool{}}
	if c.regime != nil {
		k.regime = c.regime.key
	}
	if c.owner != nil {
		k.owner = c.owner.key
	}
	switch t := c.tree.(type) {
	case *Definition:
		k.definition(t)
	case *Region:
		k.in(t.In)
		if t.Shape != nil {
			k.all(t.Shape.Args)
		}
	case *Column:
		k.expr(t.Formula)
	case *Regime:
		k.expr(t.X)
	case *Assume:
		k.relation(t.Rel)
	case *Criterion:
		k.relation(t.Rel)
	case *Check:
		k.relation(t.Rel)
	case *Plot:
		k.bound([]*Range{t.For}, func() { k.all(t.X) })
	}
	return k.needs
}

func (k *collector) definition(d *Definition) {
	k.in(d.In)
	hide := make([]string, len(d.Params))
	for i, p := range d.Params {
		hide[i] = CanonicalName(p.Text)
	}
	k.hide(hide, 1)
	k.all(d.Members)
	for _, p := range d.Pieces {
		k.expr(p.X)
		k.limits(p.For)
	}
	for _, r := range d.For {
		k.limits(r)
	}
	k.hide(hide, -1)
}

// limits collects the bounds of a range; its variable orders nothing.
func (k *collector) limits(r *Range) {
	if r == nil {
		return
	}
	k.expr(r.From)
	k.expr(r.To)
	k.expr(r.At)
}

func (k *collector) relation(r *Relation) {
	if r != nil {
		k.all(r.Terms)
	}
}

func (k *collector) in(id *Ident) {
	if id != nil {
		k.add(CanonicalName(id.Text), id.Span)
	}
}

func (k *collector) all(xs []Expr) {
	for _, x := range xs {
		k.expr(x)
	}
}

// hide makes names local (delta 1) or visible again (delta -1).
func (k *collector) hide(names []string, delta int) {
	if k.hidden == nil {
		k.hidden = map[string]int{}
	}
	for _, n := range names {
		k.hidden[n] += delta
	}
}

func (k *collector) expr(x Expr) {
	switch x := x.(type) {
	case nil:
	case *Literal:
		k.unit(x.Unit)
	case *Name:
		k.add(CanonicalName(x.Text), x.Span)
	case *Member:
		k.member(x)
	case *Call:
		k.call(x)
	case *Lookup:
		k.expr(x.X)
		k.expr(x.Value)
		if m, ok := x.X.(*Member); ok {
			k.curve(m, CanonicalName(x.Column.Text))
		}
	default:
		for _, c := range Children(x) {
			if e, ok := c.(Expr); ok {
				k.expr(e)
			}
		}
	}
}

// unit notes the symbols that follow an operator in a unit phrase: where one
// is a name too, the reader may have meant a division by that name.
func (k *collector) unit(u *UnitPhrase) {
	if u == nil {
		return
	}
	for _, s := range phraseSymbols(u.Text) {
		key := CanonicalName(s)
		if key == "" || k.seen[key] {
			continue
		}
		k.seen["unit "+key] = true
		k.needs = append(k.needs, need{key, u.Span, true})
	}
}

// phraseSymbols splits a unit phrase into its symbols.
func phraseSymbols(text string) []string {
	return strings.FieldsFunc(text, func(r rune) bool {
		return strings.ContainsRune("·./()^-0123456789²³⁻¹", r)
	})
}

// member handles `owner.field`: a property needs its own cell, or the one that
// it is derived from, beside the medium.
func (k *collector) member(m *Member) {
	n, ok := m.X.(*Name)
	if !ok {
		k.expr(m.X)
		k.through(m)
		return
	}
	base := CanonicalName(n.Text)
	if k.hidden[base] > 0 {
		return
	}
	k.add(base, n.Span)
	if m.Field.Text == "eps_c" && k.regime != "" {
		k.add(k.regime, n.Span)
	}
	for _, f := range k.a.propertyCells(base, CanonicalName(m.Field.Text)) {
		k.add(f, m.Span)
	}
}

// curve adds what a reading of a table needs beside the column that is read: the
// column that it is read at, and the table's axis.
func (k *collector) curve(m *Member, column string) {
	n, ok := m.X.(*Name)
	if !ok {
		return
	}
	base := CanonicalName(n.Text)
	c := k.a.cells[base]
	if c == nil || c.role != RoleTable || k.hidden[base] > 0 {
		return
	}
	t, ok := c.tree.(*Table)
	if !ok || len(t.Columns) == 0 {
		return
	}
	for _, name := range []string{column, CanonicalName(t.Columns[0].Name.Text)} {
		if k.a.cells[base+"."+name] != nil {
			k.add(base+"."+name, m.Span)
		}
	}
}

// through handles `ref.mica.eps`: a property of a referred note's medium.
func (k *collector) through(m *Member) {
	o, ok := m.X.(*Member)
	if !ok {
		return
	}
	if n, ok := o.X.(*Name); ok {
		owner := CanonicalName(n.Text) + "." + CanonicalName(o.Field.Text)
		for _, f := range k.a.propertyCells(owner, CanonicalName(m.Field.Text)) {
			k.add(f, m.Span)
		}
	}
}

func (k *collector) call(c *Call) {
	if n, ok := c.Of.(*Name); ok {
		k.member(&Member{Node: c.Node, X: n, Field: Ident(c.Fn)})
	} else {
		k.function(CanonicalName(c.Fn.Text), c.Fn.Span)
	}
	k.unit(c.Unit)
	k.bound(c.For, func() {
		coords := k.over(c.Over)
		k.hide(coords, 1)
		k.all(c.Args)
		k.expr(c.Equal)
		k.hide(coords, -1)
	})
}

// function adds the function that is called: of the note or of the same medium.
// There may be none now, and one after the next edit.
func (k *collector) function(name string, at Span) { k.add(name, at) }

// bound collects the limits of the ranges, then runs body with their
// variables hidden.
func (k *collector) bound(ranges []*Range, body func()) {
	var vars []string
	for _, r := range ranges {
		if r == nil {
			continue
		}
		k.limits(r)
		if n, ok := r.Var.(*Name); ok {
			vars = append(vars, CanonicalName(n.Text))
		} else {
			k.expr(r.Var)
			if m, ok := r.Var.(*Member); ok {
				k.curve(m, CanonicalName(m.Field.Text))
			}
		}
	}
	k.hide(vars, 1)
	body()
	k.hide(vars, -1)
}

// over adds the region of an integral and returns the coordinates it binds.
func (k *collector) over(x Expr) []string {
	if m, ok := x.(*Member); ok {
		x = m.X
	}
	n, ok := x.(*Name)
	if !ok {
		return nil
	}
	key := CanonicalName(n.Text)
	k.add(key, n.Span)
	c := k.a.cells[key]
	if c == nil {
		return nil
	}
	if r, ok := c.tree.(*Region); ok && r.Shape != nil {
		return append(regionCoordinates(r.Shape.Fn.Text), "n")
	}
	return nil
}

// regionCoordinates are the names that an integrand over a region of the
// given shape sees.
func regionCoordinates(shape string) []string {
	switch shape {
	case "box", "rectangle", "segment":
		return []string{"x", "y", "z"}
	case "ball", "shell", "sphere":
		return []string{"r", "theta", "phi"}
	case "cylinder", "tube", "disc", "wall", "ring":
		return []string{"r", "phi", "z"}
	}
	return nil
}

// add notes a free name once.
func (k *collector) add(key string, span Span) {
	if k.hidden[key] > 0 {
		return
	}
	if k.owner != "" && !strings.Contains(key, ".") {
		if own := k.a.propertyCells(k.owner, key); len(own) > 0 {
			for _, f := range own {
				k.put(f, span)
			}
			return
		}
	}
	k.put(key, span)
}

func (k *collector) put(key string, span Span) {
	if !k.seen[key] {
		k.seen[key] = true
		k.needs = append(k.needs, need{key, span, false})
	}
}
