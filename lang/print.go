package lang

import "strings"

// Print writes a statement as text: one line, with the properties of a medium
// and the rows of a table on indented lines of their own. Names, numbers and
// units keep the author's spelling; remarks and the layout are not in the tree.
// Printing is a fixed point of parsing: the parsed text has the same tree, but
// for its spans. An Unread prints as nothing.
func Print(s Statement) string {
	var p printer
	p.statement(s)
	return p.b.String()
}

// PrintExpr writes an expression as text.
func PrintExpr(x Expr) string {
	var p printer
	p.expr(x, levelSum)
	return p.b.String()
}

type printer struct {
	b         strings.Builder
	afterUnit bool // the last thing written is a unit phrase, which would go on with `/` or `·`
}

func (p *printer) write(parts ...string) {
	for _, s := range parts {
		p.b.WriteString(s)
	}
	p.afterUnit = false
}

func (p *printer) statement(s Statement) {
	switch n := s.(type) {
	case *Definition:
		p.definition(n)
	case *Medium:
		p.medium(n)
	case *Region:
		p.write("region ", n.Name.Text)
		p.in(n.In)
		p.write(": ")
		p.expr(n.Shape, levelSum)
		p.per(n.Per)
	case *Table:
		p.table(n)
	case *Regime:
		p.regime(n)
	case *Uses:
		p.write("uses ")
		p.quote(&n.Path)
		if n.As != nil {
			p.write(" as ", n.As.Text)
		}
	default:
		p.claim(s)
	}
}

// claim writes the statements that state something about the note.
func (p *printer) claim(s Statement) {
	switch n := s.(type) {
	case *Assume:
		p.write("assume ")
		if n.Text != nil {
			p.quote(n.Text)
		}
		p.relation(n.Rel)
		p.per(n.Per)
	case *Criterion:
		p.write("criterion ")
		p.relation(n.Rel)
		p.per(n.Per)
	case *Check:
		p.write("check ")
		p.relation(n.Rel)
		p.per(n.Per)
	case *Safety:
		p.write("safety ")
		p.quote(&n.Text)
		p.per(n.Per)
	case *Waive:
		p.waive(n)
	case *Plot:
		p.write("plot ")
		p.list(n.X)
		p.bound(n.For)
		p.per(n.Per)
	}
}

func (p *printer) definition(d *Definition) {
	p.write(d.Name.Text)
	if len(d.Params) > 0 {
		for i := range d.Params {
			p.write([...]string{"(", ", "}[min(i, 1)], d.Params[i].Text)
		}
		p.write(")")
	}
	p.in(d.In)
	if d.Kind != nil {
		p.write(", ", d.Kind.Text)
	}
	for _, m := range d.Members {
		p.write(" = ")
		p.expr(m, levelSum)
	}
	for _, g := range d.For {
		p.bound(g)
	}
	p.per(d.Per)
	for _, piece := range d.Pieces {
		p.write(", ")
		p.expr(piece.X, levelSum)
		p.bound(piece.For)
		p.per(piece.Per)
	}
}

func (p *printer) medium(m *Medium) {
	p.write("medium ", m.Name.Text)
	for i, a := range m.Adjectives {
		p.write([...]string{": ", ", "}[min(i, 1)], a.Text)
	}
	p.per(m.Per)
	for _, d := range m.Properties {
		p.write("\n    ")
		p.definition(d)
	}
}

func (p *printer) table(t *Table) {
	p.write("table ", t.Name.Text)
	if t.Linear {
		p.write(", linear")
	}
	if t.File != nil {
		p.write(" from ")
		p.quote(t.File)
	}
	for i, c := range t.Columns {
		p.write([...]string{": ", ", "}[min(i, 1)], c.Name.Text)
		if c.Unit != nil {
			p.write(" [", c.Unit.Text, "]")
		}
		if c.Formula != nil {
			p.write(" = ")
			p.expr(c.Formula, levelSum)
		}
	}
	p.per(t.Per)
	for _, row := range t.Rows {
		p.write("\n   ")
		for _, cell := range row.Cells {
			p.write(" ")
			p.expr(cell, levelSum)
		}
	}
}

func (p *printer) regime(n *Regime) {
	p.write("regime: ", n.Word.Text)
	if n.Name != nil {
		p.write(" at ", n.Name.Text, " = ")
		p.expr(n.X, levelSum)
	}
	p.per(n.Per)
}

func (p *printer) waive(n *Waive) {
	p.write("waive ", n.Rule.Text)
	if n.For != nil {
		p.write(" for ")
		p.expr(n.For, levelSum)
	}
	p.write(": ")
	p.quote(&n.Reason)
}

func (p *printer) relation(r *Relation) {
	if r == nil {
		return
	}
	for i, t := range r.Terms {
		if i > 0 {
			p.write(" ", r.Ops[i-1], " ")
		}
		p.expr(t, levelSum)
	}
}

func (p *printer) quote(q *Quote) { p.write(`"`, q.Text, `"`) }

func (p *printer) per(q *Quote) {
	if q != nil {
		p.write(" per ")
		p.quote(q)
	}
}

func (p *printer) in(id *Ident) {
	if id != nil {
		p.write(" in ", id.Text)
	}
}

func (p *printer) unit(u *UnitPhrase) {
	if u != nil {
		p.write(" ", u.Text)
		p.afterUnit = true
	}
}

// bound writes ` for VAR from A to B`.
func (p *printer) bound(g *Range) {
	p.write(" for ")
	p.expr(g.Var, levelSum)
	if g.At != nil {
		p.write(" at ")
		p.expr(g.At, levelSum)
		return
	}
	p.write(" from ")
	p.expr(g.From, levelSum)
	p.write(" to ")
	p.expr(g.To, levelSum)
}

func (p *printer) list(xs []Expr) {
	for i, x := range xs {
		if i > 0 {
			p.write(", ")
		}
		p.expr(x, levelSum)
	}
}
