package lang

import (
	"fmt"
	"math/big"
	"reflect"
	"slices"
	"strings"

	"inkjoule/lang/eval"
	"inkjoule/lang/unit"
)

// This file turns expressions into their normal form.

// Expand tells which names a form looks through, by what the symbol is and
// carries alone. A name that it does not look through stays an atom. Forms are
// kept by the function, so it must not be a closure over anything that varies.
type Expand func(*Symbol) bool

// UpToDeclared looks through names that have no declared kind of their own.
func UpToDeclared(s *Symbol) bool { return s.Facts.KindBy != Declared }

// NamesStay looks through nothing but names of plain numbers.
func NamesStay(*Symbol) bool { return false }

// Through looks through every name.
func Through(*Symbol) bool { return true }

// Form gives the normal form of an expression of the symbol's definition, nil
// where it is unknown or would grow too large.
func (n *Note) Form(s *Symbol, x Expr, expand Expand) *Form {
	c := n.state.cellOf(s)
	if c == nil {
		return nil
	}
	b := &former{n: n, c: c, expand: expand}
	b.bindParams(s)
	return b.form(x)
}

// Normal is the normal form of what the symbol's definition says first. It is
// built once for each way of looking through names, and kept as long as the
// definition and all that it needs stay the same.
func (n *Note) Normal(s *Symbol, expand Expand) *Form {
	if s.Def != nil && len(s.Def.Params) > 0 {
		return nil
	}
	return n.normal(s, way{expand: expand}, 0)
}

// way is how a form is built.
type way struct {
	expand Expand
	apart  bool // see Note.Apart
}

func (n *Note) normal(s *Symbol, w way, depth int) *Form {
	c := n.state.cellOf(s)
	if c == nil || s.Def == nil || len(s.Def.Members) == 0 {
		return nil
	}
	key := formKey{expand: reflect.ValueOf(w.expand).Pointer(), apart: w.apart}
	if f, ok := c.forms.get(n, key); ok {
		return f
	}
	b := &former{n: n, c: c, expand: w.expand, apart: w.apart, depth: depth}
	b.bindParams(s)
	f := b.form(s.Def.Members[0])
	c.forms.put(key, f)
	return f
}

// StatementForm gives the normal form of any expression of a statement, nil
// where it is unknown.
func (n *Note) StatementForm(s *Stmt, x Expr, expand Expand) *Form {
	cs := n.state.byStmt[s]
	for i := len(cs) - 1; i >= 0; i-- {
		if x.Index() >= cs[i].base {
			b := &former{n: n, c: cs[i], expand: expand}
			return b.form(x)
		}
	}
	return nil
}

// former builds one form.
type former struct {
	n      *Note
	c      *cell
	expand Expand
	local  map[string]*Form // parameters of a function that is looked through
	bound  []string         // parameters, bound variables and coordinates that stay atoms
	apart  bool             // see Note.Apart
	depth  int
}

// maxLookThrough bounds how many names a form looks through one inside another.
const maxLookThrough = 64

func (b *former) facts(x Expr) Facts {
	f, _ := b.c.factsOf(x)
	return f
}

// opaque is the form of an expression that cannot be taken apart.
func (b *former) opaque(x Expr) *Form {
	return atom(Factor{Key: "(" + PrintExpr(x) + ")", Facts: b.facts(x)})
}

// form builds the form of an expression.
func (b *former) form(x Expr) *Form {
	var f *Form
	switch x := x.(type) {
	case *Literal:
		f = b.literal(x)
	case *Name:
		f = b.name(x)
	case *Member:
		f = b.member(x)
	case *Unary:
		f = b.form(x.X)
		if x.Op == OpSub {
			f = f.neg()
		}
	case *Binary:
		f = b.binary(x)
	case *Paren:
		f = b.paren(x)
	case *Bars:
		f = b.bars(x.X, x)
	case *Triple:
		f = b.triple(x)
	case *Call:
		f = b.call(x)
	case *Broken, *Blank, nil:
		return nil
	}
	if f == nil {
		return b.opaque(x)
	}
	return f
}

func (b *former) literal(l *Literal) *Form {
	r := numeralRat(l.Num)
	if l.Unit == nil {
		if r == nil {
			return nil
		}
		return constant(r)
	}
	u, err := unit.Parse(l.Unit.Text)
	if err != nil {
		return nil
	}
	if u.Dim == (unit.Dim{}) && u.Level == nil && u.Factor.Exact() && u.Factor.Pi() == 0 && r != nil {
		return constant(r.Mul(r, u.Factor.Rational()))
	}
	key := fmt.Sprintf("%.15g %s", u.ToSI(l.Num.Value), u.Dim)
	return atom(Factor{Key: key, Facts: b.facts(l), Literal: true})
}

func (b *former) paren(p *Paren) *Form {
	if p.Unit != nil {
		return atom(Factor{Key: PrintExpr(p), Facts: b.facts(p), Literal: true})
	}
	return b.form(p.X)
}

func (b *former) name(x *Name) *Form {
	key := CanonicalName(x.Text)
	if f, ok := b.local[key]; ok {
		return f
	}
	if slices.Contains(b.bound, key) {
		return b.boundName(key, x)
	}
	switch key {
	case "pi":
		return &Form{Terms: []Term{{Coef: ratOne, Pi: 1}}}
	case "j":
		return atom(Factor{Key: "j", Facts: Facts{Known: true, Complex: true}})
	}
	if b.c.owner != nil {
		if s := b.n.Lookup(b.c.owner.key + "." + key); s != nil {
			return atom(Factor{Key: s.Key, Facts: s.Facts, Symbol: s})
		}
	}
	s := b.n.Lookup(key)
	if s == nil {
		return nil
	}
	return b.symbol(s)
}

// symbol looks through a name or leaves it an atom. Names of plain numbers are
// always looked through, so that a factor 1/2 cannot hide in one.
func (b *former) symbol(s *Symbol) *Form {
	c := b.n.state.cellOf(s)
	plain := c != nil && c.plain && s.Facts.KindBy != Declared
	if (b.expand(s) || plain) && s.Role == RoleQuantity && s.Def != nil && len(s.Def.Members) > 0 && b.depth < maxLookThrough && !c.cyclic && (plain || !s.Input) {
		if f := b.n.normal(s, way{b.expand, b.apart}, b.depth+1); f != nil && len(f.Terms) <= mostTerms {
			return f
		}
	}
	return atom(Factor{Key: s.Key, Facts: s.Facts, Symbol: s})
}

func (b *former) member(m *Member) *Form {
	n, ok := m.X.(*Name)
	if !ok {
		return b.part(m, b.form(m.X))
	}
	key := CanonicalName(n.Text)
	field := CanonicalName(m.Field.Text)
	if f, ok := b.local[key]; ok {
		return b.part(m, f)
	}
	if b.c.owner != nil && b.n.Lookup(key) == nil {
		if s := b.n.Lookup(b.c.owner.key + "." + key); s != nil { // a component of a sibling property
			return b.part(m, atom(Factor{Key: s.Key, Facts: s.Facts, Symbol: s}))
		}
	}
	owner := b.n.Lookup(key)
	if owner == nil {
		return nil
	}
	switch owner.Role {
	case RoleMedium, RoleNote:
		full := key + "." + field
		return atom(Factor{Key: full, Facts: b.facts(m), Symbol: b.n.propertyBehind(key, field)})
	case RoleRegion, RoleTable:
		return atom(Factor{Key: key + "." + field, Facts: b.facts(m), Symbol: columnOrNil(b.n, owner, field), Over: regionOrNil(owner)})
	}
	return b.part(m, b.symbol(owner))
}

// propertyBehind is the symbol of a property, or of the one that a derived
// property rests on; nil for a property that the medium does not give.
func (n *Note) propertyBehind(medium, field string) *Symbol {
	if s := n.Lookup(medium + "." + field); s != nil {
		return s
	}
	for _, d := range derivations(field) {
		if s := n.Lookup(medium + "." + d.from); s != nil {
			return s
		}
	}
	return nil
}

// columnOrNil is the column of a table.
func columnOrNil(n *Note, owner *Symbol, field string) *Symbol {
	if owner.Role == RoleTable {
		return n.Lookup(owner.Key + "." + field)
	}
	return nil
}

func regionOrNil(s *Symbol) *Symbol {
	if s.Role == RoleRegion {
		return s
	}
	return nil
}

// part takes a component of an atom.
func (b *former) part(m *Member, f *Form) *Form {
	t, ok := f.Single()
	if !ok || len(t.Factors) == 0 {
		return nil
	}
	found := -1
	for i, x := range t.Factors {
		if x.Facts.Shape == eval.Vector || x.Facts.Shape == eval.Tensor {
			if found >= 0 {
				return nil
			}
			found = i
		}
	}
	if found < 0 {
		return nil
	}
	g := (&Form{Terms: []Term{t}}).mark(func(*Factor) {})
	x := &g.Terms[0].Factors[found]
	x.Part = m.Field.Text
	x.Key += "." + m.Field.Text
	x.Facts.Shape = eval.Scalar
	return g
}

func (b *former) binary(x *Binary) *Form {
	switch x.Op {
	case OpAdd:
		return b.form(x.X).add(b.form(x.Y), 1)
	case OpSub:
		return b.form(x.X).add(b.form(x.Y), -1)
	case OpDiv:
		return b.form(x.X).mul(b.form(x.Y).pow(unit.Whole(-1)))
	case OpPow:
		n, ok := exactExponent(x.Y)
		if !ok {
			return nil
		}
		return b.form(x.X).pow(n)
	case OpCross:
		f := b.form(x.X).mul(b.form(x.Y))
		if f != nil {
			for i := range f.Terms {
				f.Terms[i].Cross = true
			}
		}
		return f
	}
	return b.times(x)
}

// times multiplies; a tensor that acts on a vector is marked as applied.
func (b *former) times(x *Binary) *Form {
	f, g := b.form(x.X), b.form(x.Y)
	fx, fy := b.facts(x.X), b.facts(x.Y)
	if fx.Shape == eval.Tensor && fy.Shape == eval.Vector {
		f = applied(f)
	}
	if fx.Shape == eval.Vector && fy.Shape == eval.Tensor {
		g = applied(g)
	}
	return f.mul(g)
}

func applied(f *Form) *Form {
	return f.mark(func(x *Factor) {
		if x.Facts.Shape == eval.Tensor {
			x.Applied = true
		}
	})
}

// bars takes the magnitude: of one term, it is the term with its spelling
// marked and its coefficient positive.
func (b *former) bars(inner, whole Expr) *Form {
	f := b.form(inner)
	t, ok := f.Single()
	if !ok {
		return nil
	}
	g := (&Form{Terms: []Term{t}}).mark(func(x *Factor) { x.Bars = true })
	g.Terms[0].Coef = new(big.Rat).Abs(t.Coef)
	return g
}

// triple takes a vector with one component apart into that and its direction.
func (b *former) triple(v *Triple) *Form {
	if v.Unit != nil {
		return atom(Factor{Key: PrintExpr(v), Facts: b.facts(v), Literal: true})
	}
	axis, found := 0, 0
	for i, x := range v.X {
		if !isZero(x) {
			axis, found = i, found+1
		}
	}
	if found != 1 {
		return nil
	}
	dir := Factor{Key: "along " + string("xyz"[axis]), Facts: Facts{Known: true, Shape: eval.Vector}}
	return b.form(v.X[axis]).mul(atom(dir))
}

// call takes the functions apart that are products or linear.
func (b *former) call(c *Call) *Form {
	name := CanonicalName(c.Fn.Text)
	if f := b.propertyCall(c, name); f != nil {
		return f
	}
	if s := b.n.Lookup(name); s != nil && s.Role == RoleFunction && c.Of == nil {
		return b.inline(c, s)
	}
	args := c.Args
	switch {
	case name == "integral" && c.Over != nil && len(args) == 1:
		return b.overRegion(c)
	case b.apart && len(c.For) > 0 && (name == "integral" || name == "sum") && len(args) == 1:
		return b.overVariables(c)
	case b.apart && name == "sum" && len(c.For) == 0 && len(args) == 1:
		if f := b.overRows(c); f != nil {
			return f
		}
	case name == "dot" && len(args) == 2:
		return b.times(&Binary{Node: c.Node, Op: OpDot, X: args[0], Y: args[1]})
	case name == "abs" && len(args) == 1:
		return b.bars(args[0], c)
	case name == "sqrt" && len(args) == 1:
		return b.form(args[0]).pow(unit.NewRat(1, 2))
	case name == "conj" && len(args) == 1:
		return b.form(args[0]).mark(func(x *Factor) { x.Conj = true })
	case name == "re" && len(args) == 1 || c.Fn.Text == "Re" && len(args) == 1:
		return b.form(args[0])
	}
	return b.function(c)
}

// propertyCall leaves a property that is a function an atom: a property at one
// condition. It is nil for every other call.
func (b *former) propertyCall(c *Call, name string) *Form {
	medium := ""
	switch of := c.Of.(type) {
	case *Name:
		medium = CanonicalName(of.Text)
	case nil:
		if b.c.owner == nil || b.n.Lookup(b.c.owner.key+"."+name) == nil {
			return nil
		}
		medium = b.c.owner.key
	}
	s := b.n.propertyBehind(medium, name)
	if s == nil || s.Role != RoleProperty {
		return nil
	}
	keys := make([]string, len(c.Args))
	for i, a := range c.Args {
		keys[i] = b.form(a).Key()
	}
	return atom(Factor{Key: medium + "." + name + "(" + strings.Join(keys, "; ") + ")", Facts: b.facts(c), Symbol: s})
}

// function leaves a call opaque, keyed by the forms of its arguments.
func (b *former) function(c *Call) *Form {
	if len(c.For) > 0 || c.Over != nil || c.Equal != nil {
		return nil
	}
	keys := make([]string, len(c.Args))
	f := Factor{Call: c.Fn.Text, Facts: b.facts(c)}
	for i, a := range c.Args {
		g := b.form(a)
		keys[i] = g.Key()
		if i == 0 {
			f.Inside = g
		}
	}
	f.Key = c.Fn.Text + "(" + strings.Join(keys, "; ") + ")"
	return atom(f)
}

// inline looks through a function of the note.
func (b *former) inline(c *Call, s *Symbol) *Form {
	d := s.Def
	if d == nil || len(d.Params) != len(c.Args) || len(d.Pieces) > 0 || b.depth >= maxLookThrough || len(d.Members) == 0 {
		return nil
	}
	if b.apart && !b.expand(s) {
		return b.called(c, s)
	}
	inner := &former{n: b.n, c: b.n.state.cellOf(s), expand: b.expand, apart: b.apart, depth: b.depth + 1, local: map[string]*Form{}}
	for i, p := range d.Params {
		inner.local[CanonicalName(p.Text)] = b.form(c.Args[i])
	}
	return inner.form(d.Members[0])
}

// overRegion pulls constants out of an integral over a region: the region is
// an extensive factor like a volume.
func (b *former) overRegion(c *Call) *Form {
	n, ok := c.Over.(*Name)
	if !ok {
		return nil
	}
	r := b.n.Lookup(CanonicalName(n.Text))
	if r == nil {
		return nil
	}
	f := b.binding(coordinatesOf(r)).form(c.Args[0])
	if f == nil {
		return nil
	}
	facts := b.facts(c)
	inner := b.facts(c.Args[0])
	element := Factor{Key: "over " + r.Key, Over: r, Facts: Facts{Known: facts.Known, Dim: facts.Dim.Div(inner.Dim)}}
	return f.mul(atom(element))
}
