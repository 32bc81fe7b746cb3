package lang

import (
	"fmt"
	"strings"
	"unicode"

	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file infers literals and the uses of names.

// literal infers a number with its unit and spread.
func (e *elab) literal(l *Literal) typed {
	t := typed{Facts: number(), plain: l.Unit == nil, lit: l}
	x, u := l.Num.Value, unit.Unit{}
	if l.Unit != nil {
		var ok bool
		if u, ok = e.unit(l.Unit); !ok {
			return unknown()
		}
		if e.whole == Expr(l) {
			u = e.ofDifference(u)
		}
		t.Dim = u.Dim
		if x, ok = e.toSI(l, u); !ok {
			return unknown()
		}
		t.Absolute = u.Affine()
		if id, ok := kind.Default(t.Dim); ok {
			t.Kind, t.KindBy, t.kinds = id, Guessed, []kind.ID{id}
		}
	}
	if l.Spread != nil {
		t.code = e.uncertain(l, u, x)
	} else {
		t.code = eval.Const(eval.Real(x))
	}
	return t
}

// ofDifference is a unit as it counts in what is defined: a degree Celsius of a
// temperature rise is a kelvin.
func (e *elab) ofDifference(u unit.Unit) unit.Unit {
	if u.Affine() && e.want.Is(kind.TemperatureRise) {
		u.Offset = 0
	}
	return u
}

// toSI converts a literal, by the kind that is wanted where its unit is a level.
func (e *elab) toSI(l *Literal, u unit.Unit) (float64, bool) {
	if u.Level == nil {
		return u.ToSI(l.Num.Value), true
	}
	root, known := kind.RootPower(e.want)
	if u.ByKind() && !known {
		e.fault("unknown-kind", l, fmt.Sprintf("%s: whether %s counts a power or a field is not known", l.Num.Text+" "+l.Unit.Text, l.Unit.Text),
			"name the kind after a comma: `G, power gain = …` or `a, voltage ratio = …`")
		return 0, false
	}
	return u.Level.ToLinear(l.Num.Value, root), true
}

// unit reads a unit phrase and reports what is wrong with it.
func (e *elab) unit(p *UnitPhrase) (unit.Unit, bool) {
	r := e.a.readUnit(p.Text)
	if r.err == nil {
		e.hidesName(p, r.unit)
		return r.unit, true
	}
	f := Fault{
		Rule: r.err.Rule, Severity: Error, Message: r.err.Message, Detail: r.err.Detail,
		Span: Span{p.Span.Start + r.err.Start, p.Span.Start + r.err.End},
	}
	if name := e.nameFrom(f.Span.Start); r.err.Rule == "unknown-unit" && name != "" {
		f.Detail = fmt.Sprintf("%s is a name of this note: put a blank before the operator (`/ %s`), or write * between the number and the name", name, name)
	}
	e.report(f)
	return unit.Unit{}, false
}

// nameFrom is the name of the note that begins at a place in the statement, ""
// where there is none: `B0_20` in `1.4 T/B0_20`, of which a unit phrase sees `B`.
func (e *elab) nameFrom(at int) string {
	if e.c.stmt == nil || at >= len(e.c.stmt.Text) {
		return ""
	}
	name := e.c.stmt.Text[at:]
	if n := strings.IndexFunc(name, func(r rune) bool { return r != '_' && !unicode.IsLetter(r) && !unicode.IsDigit(r) }); n >= 0 {
		name = name[:n]
	}
	if e.a.cells[CanonicalName(name)] == nil {
		return ""
	}
	return name
}

// hidesName cautions where a symbol inside a unit phrase is also a name of the
// note and the unit reading is not the likely one.
func (e *elab) hidesName(p *UnitPhrase, u unit.Unit) {
	if !strings.ContainsAny(p.Text, "/·.") || strings.ContainsRune(p.Text, '(') {
		return // a product of names in parentheses would be written with *
	}
	for _, s := range phraseSymbols(p.Text)[1:] {
		c := e.a.cells[CanonicalName(s)]
		if c == nil || c.stmt == nil || c == e.c {
			continue
		}
		sym := e.a.readUnit(s)
		if len(kind.ByDim(u.Dim)) > 0 && !(sym.err == nil && c.sym.Facts.Known && c.sym.Facts.Dim.Compatible(sym.unit.Dim)) {
			continue
		}
		e.report(Fault{
			Rule: "unit-hides-name", Severity: Caution, Span: p.Span,
			Message: fmt.Sprintf("%s is read as a unit, and %s is also a name of this note", p.Text, s),
			Detail:  fmt.Sprintf("to divide by the quantity, put a blank before the operator: `/ %s`", s),
		})
		return
	}
}

// name infers the use of a name.
func (e *elab) name(n *Name) typed {
	key := CanonicalName(n.Text)
	if s := e.local(key); s != nil {
		return s.t
	}
	if key == "j" {
		return typed{Facts: Facts{Known: true, Complex: true}, plain: true, code: eval.Const(eval.Cplx(1i))}
	}
	if t, ok := e.sibling(key, n); ok {
		return t
	}
	c := e.a.cells[key]
	switch {
	case c == nil && key == "inf":
		return infinity()
	case c == nil:
		e.unknownName(n, n.Text, "unknown-name")
		return unknown()
	}
	e.use(c.key, n.Span)
	return e.cellValue(c, n)
}

// sibling infers the use of a property or column from inside the same medium
// or table.
func (e *elab) sibling(key string, n *Name) (typed, bool) {
	owner := e.c.owner
	switch {
	case owner == nil:
		return unknown(), false
	case owner.role == RoleMedium:
		return e.property(owner, key, n)
	}
	c := e.a.cells[owner.key+"."+key]
	if c == nil {
		return unknown(), false
	}
	e.use(c.key, n.Span)
	return e.cellValue(c, n), true
}

// use records where a name is used.
func (e *elab) use(key string, at Span) {
	if e.quiet == 0 {
		e.c.uses = append(e.c.uses, usage{key, at})
	}
}

// cellValue is the value of a cell as an operand.
func (e *elab) cellValue(c *cell, at Tree) typed {
	switch c.role {
	case RoleMedium, RoleRegion, RoleTable, RoleNote:
		e.fault("shape-mix", at, fmt.Sprintf("%s is a %s, not a quantity", c.title(), roleName(c.role)), roleHint(c))
		return unknown()
	case RoleFunction:
		e.fault("shape-mix", at, fmt.Sprintf("%s is a function: write its argument in parentheses", c.title()), "")
		return unknown()
	}
	if c.path != "" && (c.cyclic || !c.sym.Result.Known && c.role != RoleConstant && c.owner == nil) {
		e.faultElsewhere(c, at)
	}
	if c.cyclic || !c.sym.Facts.Known {
		return unknown()
	}
	t := typed{Facts: c.sym.Facts, pi: c.pi, kinds: c.kinds(), plain: c.plain, blind: !c.sym.Result.Known}
	if c.role == RoleConstant {
		t.code = eval.Const(c.sym.Value)
		return t
	}
	t.code = eval.Slot(c.slot, eval.Type{Shape: t.Shape, Complex: t.Complex})
	return t
}

// faultElsewhere tells at its use that a name of another note has no value: the
// cause is told there, and nobody may be reading it.
func (e *elab) faultElsewhere(c *cell, at Tree) {
	why := c.sym.Why
	if len(c.faults) > 0 {
		why = c.faults[0].Message
	}
	detail := "review " + c.path
	if why != "" {
		detail = "there: " + why
	}
	e.fault("unknown-name", at, fmt.Sprintf("%s has no value in %s", c.title(), c.path), detail)
}

// kinds are what a use of the cell contributes to the kinds of an expression.
func (c *cell) kinds() []kind.ID {
	if c.sym.Facts.Kind != 0 {
		return []kind.ID{c.sym.Facts.Kind}
	}
	return c.from
}

func roleName(r Role) string {
	switch r {
	case RoleMedium:
		return "medium"
	case RoleRegion:
		return "region"
	case RoleTable:
		return "table"
	case RoleNote:
		return "note"
	}
	return "quantity"
}

func roleHint(c *cell) string {
	switch c.role {
	case RoleMedium:
		return fmt.Sprintf("write a property of it: %s.eps, %s.sigma …", c.title(), c.title())
	case RoleRegion:
		return fmt.Sprintf("write %s.volume, %s.area or %s.length", c.title(), c.title(), c.title())
	case RoleTable:
		return fmt.Sprintf("write a column of it, or %s.COLUMN at OTHER = VALUE", c.title())
	}
	return ""
}

// member infers X.field.
func (e *elab) member(m *Member) typed {
	field := CanonicalName(m.Field.Text)
	n, ok := m.X.(*Name)
	c, through := e.ownerOf(m.X)
	if !ok && !through {
		return e.component(m, e.expr(m.X), field)
	}
	if ok {
		key := CanonicalName(n.Text)
		if s := e.local(key); s != nil {
			return e.component(m, s.t, field)
		}
		c = e.a.cells[key]
		if c == nil {
			if t, ok := e.sibling(key, n); ok {
				return e.component(m, t, field)
			}
			e.unknownName(n, n.Text, "unknown-name")
			return unknown()
		}
	}
	return e.memberOf(m, c, field)
}

// memberOf infers what stands after the point of a known owner.
func (e *elab) memberOf(m *Member, c *cell, field string) typed {
	at := m.X.Place()
	switch c.role {
	case RoleMedium:
		e.use(c.key, at)
		if t, ok := e.property(c, field, m); ok {
			return t
		}
		return e.unknownProperty(m, c)
	case RoleRegion:
		e.use(c.key, at)
		return e.measure(m, c, field)
	case RoleTable:
		e.use(c.key, at)
		return e.ownColumn(m, c, field)
	case RoleNote:
		return e.foreign(m, c, field)
	}
	return e.component(m, e.expr(m.X), field)
}

// component infers D.x, eps.xz.
func (e *elab) component(m *Member, t typed, field string) typed {
	if !t.Known {
		return t
	}
	i, j, n := axes(m.Field.Text)
	switch {
	case t.Shape == eval.Vector && n == 1:
		t.Shape, t.lit = eval.Scalar, nil
		return e.built(t, m)(eval.Component(m.ID, i, t.code))
	case t.Shape == eval.Tensor && n == 2:
		t.Shape, t.lit = eval.Scalar, nil
		return e.built(t, m)(eval.TensorComponent(m.ID, i, j, t.code))
	}
	e.fault("unknown-property", m, fmt.Sprintf("%s has no part .%s", sketch(m.X), m.Field.Text), partsHint(t.Shape))
	return unknown()
}

// axes reads "x" or "xz".
func axes(s string) (i, j, n int) {
	at := func(b byte) int { return strings.IndexByte("xyz", b) }
	switch {
	case len(s) == 1 && at(s[0]) >= 0:
		return at(s[0]), 0, 1
	case len(s) == 2 && at(s[0]) >= 0 && at(s[1]) >= 0:
		return at(s[0]), at(s[1]), 2
	}
	return 0, 0, 0
}

func partsHint(s eval.Shape) string {
	switch s {
	case eval.Vector:
		return "a vector has the components .x .y .z"
	case eval.Tensor:
		return "a tensor has the components .xx .xy … .zz"
	}
	return "a number has no components"
}
