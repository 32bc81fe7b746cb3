package lang

import (
	"fmt"

	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file analyses tables. A column is a cell of its own, so that an edit of
// a computed column leaves the others alone; its value is a list.

// tableCells makes the cells of a table and its columns.
func (a *analysis) tableCells(s *Stmt, t *Table) []*cell {
	t = a.filled(s, t)
	head := newCell(s, RoleTable, t, &t.Name)
	out := []*cell{head}
	for _, col := range t.Columns {
		c := newCell(s, RoleColumn, col, &col.Name)
		c.owner = head
		c.key = head.key + "." + c.key
		out = append(out, c)
	}
	return out
}

// table checks the rows of a table.
func (a *analysis) table(c *cell, t *Table) {
	e := &elab{a: a, c: c}
	want := len(dataColumns(t))
	for _, r := range t.Rows {
		if len(r.Cells) != want {
			e.fault("syntax", r, fmt.Sprintf("this row has %d %s, and the table has %d %s of data", len(r.Cells), plural("cell", len(r.Cells)), want, plural("column", want)),
				"cells stand apart by blanks; was a decimal comma written?")
		}
	}
	if len(t.Rows) == 0 && (want > 0 || len(t.Columns) == 0) && t.File == nil {
		e.fault("syntax", &t.Name, fmt.Sprintf("table %s has no rows", t.Name.Text), "write the rows below it, indented deeper")
	}
}

// dataColumns are the columns that the rows fill.
func dataColumns(t *Table) []*Column {
	var out []*Column
	for _, c := range t.Columns {
		if c.Formula == nil {
			out = append(out, c)
		}
	}
	return out
}

// column analyses a column: the numbers of the rows, or a formula for each row.
func (a *analysis) column(c *cell, col *Column) {
	e := &elab{a: a, c: c}
	u, ok := unit.Unit{}, true
	if col.Unit != nil && col.Unit.Text != "1" {
		u, ok = e.unit(col.Unit)
	}
	if !ok {
		return
	}
	if col.Formula != nil {
		e.computed(col, u)
		return
	}
	t, ok := c.owner.tree.(*Table)
	if !ok {
		return
	}
	if col.Unit == nil {
		e.fault("syntax", col, fmt.Sprintf("column %s has no unit", col.Name.Text), fmt.Sprintf("write %s [UNIT], with [1] for a plain number", col.Name.Text))
		return
	}
	e.data(t, col, u)
}

// data reads a column from the rows.
func (e *elab) data(t *Table, col *Column, u unit.Unit) {
	at := 0
	for _, d := range dataColumns(t) {
		if d == col {
			break
		}
		at++
	}
	xs := make([]float64, 0, len(t.Rows))
	for _, r := range t.Rows {
		if at >= len(r.Cells) {
			return // reported with the row
		}
		xs = append(xs, u.ToSI(r.Cells[at].Num.Value))
	}
	s := &e.c.sym
	s.Input = true
	s.Facts = Facts{Known: true, Dim: u.Dim, Shape: eval.List, Absolute: u.Affine()}
	if id, ok := kind.Default(u.Dim); ok {
		s.Facts.Kind, s.Facts.KindBy = id, Guessed
	}
	e.show(eval.ListOf(xs...), u)
}

// show keeps a value that was not computed by code.
func (e *elab) show(v eval.Value, u unit.Unit) {
	r := &e.c.sym.Result
	r.Known, r.Value, r.Unit = true, v, u
	if u.IsZero() {
		r.Unit = chosenUnit(e.c.sym.Facts, v)
	}
	r.Shown = formatter{unit: r.Unit, digits: shownDigits}.value(v)
}

// computed evaluates a column's formula for every row at once: lists compute
// element by element.
func (e *elab) computed(col *Column, u unit.Unit) {
	t := e.expr(col.Formula)
	if !t.Known {
		return
	}
	if !u.IsZero() && !u.Dim.Compatible(t.Dim) || col.Unit != nil && u.IsZero() && !t.Dim.IsOne() {
		e.fault("dimension-mismatch", col.Formula, fmt.Sprintf("column %s is given in %s, and this is %s", col.Name.Text, col.Unit.Text, describe(t.Facts)), "")
		return
	}
	if t.Shape == eval.Scalar {
		if t = e.everyRow(col, t); !t.Known {
			return
		}
	}
	e.c.sym.Facts = t.Facts
	if t.blind {
		return
	}
	o := e.a.run(e.c, col.Formula.Index(), t.code)
	if o.fault != nil {
		e.evalFault(o.fault, col.Formula)
		return
	}
	e.show(o.value, u)
}

// everyRow repeats a value that is the same in each row.
func (e *elab) everyRow(col *Column, t typed) typed {
	table, ok := e.c.owner.tree.(*Table)
	if !ok {
		return unknown()
	}
	ones := make([]float64, len(table.Rows))
	for i := range ones {
		ones[i] = 1
	}
	t.Shape = eval.List
	return e.built(t, col)(eval.Mul(col.ID, t.code, eval.Const(eval.ListOf(ones...))))
}

// ownColumn infers the use of a column, `bh.H`.
func (e *elab) ownColumn(m *Member, table *cell, field string) typed {
	if t, ok := e.interpolant(m, table, field); ok {
		return t
	}
	c := e.a.cells[table.key+"."+field]
	if c == nil {
		e.report(Fault{
			Rule: "unknown-property", Severity: Error, Span: m.Field.Span,
			Message: fmt.Sprintf("table %s has no column %s", table.title(), m.Field.Text), Detail: e.a.owned(table),
			Related: e.relate(table, "the table"),
		})
		return unknown()
	}
	e.use(c.key, m.Span)
	return e.cellValue(c, m)
}

// owned lists what a medium or table has.
func (a *analysis) owned(owner *cell) string {
	var have []string
	for _, o := range a.all {
		if o.owner == owner {
			have = append(have, o.name.Text)
		}
	}
	if len(have) == 0 {
		return "it has none yet"
	}
	return "it has " + list(have)
}

// cell infers `t.q[2]`, counted from 1.
func (e *elab) cell(x *Cell) typed {
	t := e.expr(x.X)
	if !t.Known {
		return t
	}
	n := constantRat(x.At)
	if n == nil || !n.IsInt() || !n.Num().IsInt64() {
		e.fault("syntax", x.At, "the number of a cell is a whole number, from 1", "")
		return unknown()
	}
	if t.Shape != eval.List {
		e.fault("shape-mix", x, fmt.Sprintf("%s is %s; only a column has numbered cells", sketch(x.X), shapeName(t.Shape)), "")
		return unknown()
	}
	t.Shape, t.lit = eval.Scalar, nil
	return e.built(t, x)(eval.Cell(x.ID, int(n.Num().Int64())-1, t.code))
}
