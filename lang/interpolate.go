package lang

import (
	"fmt"

	"inkjoule/lang/eval"
)

// This file infers readings of tables, `bh.B at H = 200 A/m`, and integrals
// along a column.

// lookup infers X at COLUMN = VALUE: interpolation in a table, or a property
// under a condition.
func (e *elab) lookup(l *Lookup) typed {
	m, ok := l.X.(*Member)
	if ok {
		if table := e.tableOf(m.X); table != nil {
			return e.reading(l, m, table)
		}
	}
	x := e.expr(l.X)
	e.expr(l.Value) // a property under a condition: rules compare it with the range
	e.use(CanonicalName(l.Column.Text), l.Column.Span)
	return x
}

// tableOf finds the table behind the name before the point, nil for others.
func (e *elab) tableOf(x Expr) *cell {
	var c *cell
	if n, ok := x.(*Name); ok && e.local(CanonicalName(n.Text)) == nil {
		c = e.a.cells[CanonicalName(n.Text)]
		if c != nil && c.role == RoleTable {
			e.use(c.key, n.Span)
		}
	} else if o, ok := e.ownerOf(x); ok {
		c = o
	}
	if c == nil || c.role != RoleTable {
		return nil
	}
	return c
}

// curves is a table with its columns compiled.
type curves struct {
	table   *eval.Table
	columns []typed
	names   []string
}

// curvesOf compiles the axis of a table, its first column, and the wanted
// columns for reading. Others are left out: they may depend on what is read.
func (e *elab) curvesOf(table *cell, at Tree, want map[string]bool) (curves, bool) {
	t, ok := table.tree.(*Table)
	if !ok || table.cyclic {
		return curves{}, false
	}
	var cs curves
	var columns []eval.Column
	for i, col := range t.Columns {
		key := CanonicalName(col.Name.Text)
		if i > 0 && !want[key] {
			continue
		}
		c := e.a.cells[table.key+"."+key]
		if c == nil || !c.sym.Facts.Known {
			return curves{}, false
		}
		x := e.cellValue(c, at)
		if x.blind || x.Complex {
			return curves{}, false
		}
		if c.sym.Input {
			x.code = eval.Const(c.sym.Value)
		}
		cs.columns, cs.names = append(cs.columns, x), append(cs.names, key)
		columns = append(columns, eval.Column{Name: col.Name.Text, Data: x.code})
	}
	table2, err := eval.NewTable(table.title(), t.Linear, columns)
	if err != nil {
		e.refused(at, err)
		return curves{}, false
	}
	cs.table = table2
	return cs, true
}

// column finds a column by its canonical name.
func (c curves) column(name string) int {
	for i, n := range c.names {
		if n == name {
			return i
		}
	}
	return -1
}

// reading infers t.y at x = VALUE.
func (e *elab) reading(l *Lookup, m *Member, table *cell) typed {
	v := e.expr(l.Value)
	keyY, keyX := CanonicalName(m.Field.Text), CanonicalName(l.Column.Text)
	for _, name := range []Ident{m.Field, l.Column} {
		if e.a.cells[table.key+"."+CanonicalName(name.Text)] == nil {
			e.report(Fault{
				Rule: "unknown-property", Severity: Error, Span: name.Span,
				Message: fmt.Sprintf("table %s has no column %s", table.title(), name.Text), Detail: e.a.owned(table), Related: e.relate(table, "the table"),
			})
			return unknown()
		}
	}
	cs, ok := e.curvesOf(table, l, map[string]bool{keyY: true, keyX: true})
	if !ok || !v.Known {
		return unknown()
	}
	y, x := cs.column(keyY), cs.column(keyX)
	e.use(table.key+"."+cs.names[y], m.Field.Span)
	e.use(table.key+"."+cs.names[x], l.Column.Span)
	if !v.Dim.Compatible(cs.columns[x].Dim) {
		e.fault("dimension-mismatch", l.Value, fmt.Sprintf("column %s is %s, and this is %s", l.Column.Text, describe(cs.columns[x].Facts), describe(v.Facts)), "")
		return unknown()
	}
	t := cs.columns[y]
	t.Shape, t.lit, t.plain, t.blind = v.Shape, nil, false, t.blind || v.blind
	return e.built(t, l)(cs.table.At(l.ID, y, x, v.code))
}

// along is a table whose columns are read at a bound variable.
type along struct {
	up    *along
	table *cell
	cs    curves
	x     int
	at    eval.Code
}

// alongTable infers integral(t.y for t.x from A to B): inside, every column of
// the table is its interpolant at the variable.
func (e *elab) alongTable(c *Call, m *Member) typed {
	if len(c.For) != 1 {
		return e.form(c, "integral(t.y for t.x from A to B)")
	}
	table := e.tableOf(m.X)
	if table == nil {
		e.fault("shape-mix", m, fmt.Sprintf("%s is no column of a table", sketch(m)), "integrate over a name, or along a column: for t.x from A to B")
		return unknown()
	}
	want := map[string]bool{CanonicalName(m.Field.Text): true}
	Walk(c.Args[0], func(t Tree) bool {
		if o, ok := t.(*Member); ok {
			want[CanonicalName(o.Field.Text)] = true
		}
		return true
	})
	cs, ok := e.curvesOf(table, m, want)
	b := e.bounds(c.For[0])
	from, to := e.again(c.For[0].From), e.again(c.For[0].To)
	if !ok || !b.Known {
		return unknown()
	}
	x := cs.column(CanonicalName(m.Field.Text))
	if x < 0 {
		return e.ownColumn(m, table, CanonicalName(m.Field.Text))
	}
	if !b.Dim.Compatible(cs.columns[x].Dim) {
		e.fault("dimension-mismatch", c.For[0], fmt.Sprintf("column %s is %s, and the range is %s", m.Field.Text, describe(cs.columns[x].Facts), describe(b.Facts)), "")
		return unknown()
	}
	e.use(table.key+"."+cs.names[x], m.Field.Span)
	slot := e.a.newSlot()
	e.along = &along{up: e.along, table: table, cs: cs, x: x, at: eval.Slot(slot, eval.Type{})}
	body := e.expr(c.Args[0])
	e.along = e.along.up
	if !body.Known {
		return unknown()
	}
	t := e.integrated(body, cs.columns[x].Dim, cs.columns[x])
	t.Shape, t.blind = body.Shape, body.blind || b.blind
	return e.built(t, c)(eval.Integral(c.ID, slot, from.code, to.code, body.code))
}

// interpolant is a column inside an integral along its table.
func (e *elab) interpolant(m *Member, table *cell, field string) (typed, bool) {
	for a := e.along; a != nil; a = a.up {
		if a.table != table {
			continue
		}
		y := a.cs.column(field)
		if y < 0 {
			return unknown(), false
		}
		e.use(table.key+"."+field, m.Span)
		t := a.cs.columns[y]
		t.Shape, t.lit, t.plain = eval.Scalar, nil, false
		return e.built(t, m)(a.cs.table.At(m.ID, y, a.x, a.at)), true
	}
	return unknown(), false
}
