package eval

import "slices"

// Column is a named column of a table; Data is a list of real numbers.
type Column struct {
	Name string
	Data Code
}

// Table is measured or computed data in columns of equal length. Its first
// column is the axis of its curves where it is strictly monotone.
type Table struct {
	Name    string
	Linear  bool // straight between rows; else monotone cubic
	Columns []Column
}

// NewTable checks the columns that are constants (at least one row, finite,
// equal lengths). The error is a *ShapeError.
func NewTable(name string, linear bool, columns []Column) (*Table, error) {
	t := &Table{Name: name, Linear: linear, Columns: columns}
	if len(columns) == 0 {
		return nil, refuse("", "table %s has no columns", name)
	}
	rows := -1
	for _, c := range columns {
		if c.Data.Type != (Type{Shape: List}) {
			return nil, refuse("", "column %s of table %s is not a list of real numbers", c.Name, name)
		}
		v, ok := c.Data.Constant()
		if !ok {
			continue
		}
		if rows < 0 {
			rows = v.Len()
		}
		if v.Len() != rows || rows == 0 {
			return nil, refuse("every row needs a value in every column", "column %s of table %s has %d values, not %d", c.Name, name, v.Len(), rows)
		}
		if !v.Finite() {
			return nil, refuse("", "column %s of table %s holds a value that is not a finite number", c.Name, name)
		}
	}
	return t, nil
}

// At reads column y at the place where column x has the value at. Where x is
// the table's axis the curve y(axis) is read; where y is the axis, the curve
// x(axis) is inverted, so that both readings are of one curve; else the axis is
// found from x and y read there. A table whose axis is not monotone is read
// directly, y over x. Outside the rows it faults. Derivatives are exact, by the
// reading and by the cells.
func (t *Table) At(node, y, x int, at Code) (Code, error) {
	if y < 0 || x < 0 || max(x, y) >= len(t.Columns) {
		return Code{}, refuse("", "table %s has no such column", t.Name)
	}
	if at.Type.Shape != Scalar || at.Type.Complex {
		return Code{}, refuse("", "a table is read at a real number, not at %s", at.Type)
	}
	return t.reading(node, y, x, at, 0), nil
}

// reading is At, or its derivative of the given order by the place.
func (t *Table) reading(node, y, x int, at Code, order int) Code {
	args := []Code{at, t.Columns[0].Data, t.Columns[x].Data, t.Columns[y].Data}
	r := newReading(t, node, [2]int{y, x}, order)
	c := Code{Any: func(f *Frame) Value { return r.any(f, at.Any(f)) }}
	where := at.Real
	c.Real = func(f *Frame) float64 { return r.fast(f, where(f)) }
	c = build(c, args...)
	if at.slot >= 0 && c.konst == nil {
		c.info.breaks = joinBreaks(c.info.breaks, t.knots(x, at.slot))
	}
	return c.derive(func(d *differ) (Code, error) {
		for _, col := range args[1:] {
			if col.Reads(d.slot) {
				return Code{}, refuse("", "a table cannot be differentiated by what its cells are computed from")
			}
		}
		if order >= 3 {
			return nullOf(Type{}), nil
		}
		return d.linear(at, func(da Code) (Code, error) {
			return product(node, t.reading(node, y, x, at, order+1), da), nil
		})
	})
}

// knots are the rows, as breaks along the slot at which column x is read.
func (t *Table) knots(x, slot int) []breaks {
	v, ok := t.Columns[x].Data.Constant()
	if !ok {
		return nil
	}
	k := make([]float64, v.Len())
	for i := range k {
		k[i] = real(v.many.v[i])
	}
	slices.Sort(k)
	return []breaks{{slot: slot, knots: slices.Compact(k)}}
}
