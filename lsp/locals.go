package lsp

import (
	"slices"

	"inkjoule/lang"
)

// A local is a name that a statement binds for itself: a parameter, a bound
// variable. Spans are statement-relative.
type local struct {
	key    string
	binder lang.Span
	uses   []lang.Span
}

// all lists the places of the name in the order of the text.
func (l *local) all() []lang.Span {
	out := append([]lang.Span{l.binder}, l.uses...)
	slices.SortFunc(out, func(a, b lang.Span) int { return a.Start - b.Start })
	return out
}

// localsOf finds what a statement binds. The scopes are those of the language:
// a parameter is seen in its definition, a bound variable in the call's body
// but not in its limits; an inner name hides an outer one.
func localsOf(t lang.Tree) []*local {
	b := &binder{free: func(string, lang.Span) {}}
	b.tree(t)
	return b.found
}

// binder walks a statement with the names that are in scope. It hands every
// name that nothing binds to free, by its dotted key.
type binder struct {
	found []*local
	scope []*local // innermost last
	free  func(key string, at lang.Span)
}

func (b *binder) tree(t lang.Tree) {
	switch n := t.(type) {
	case *lang.Definition:
		b.definition(n)
	case *lang.Call:
		b.call(n)
	case *lang.Plot:
		b.bound([]*lang.Range{n.For}, func() { b.each(n.X) })
	case *lang.Name:
		b.use(n.Text, n.Span)
	case *lang.Member:
		b.tree(n.X) // the field is no name of this scope
		b.dotted(n)
	case *lang.Lookup:
		b.tree(n.X)
		b.tree(n.Value)
		b.column(n)
	case *lang.Region:
		b.ident(n.In)
		b.expr(n.Shape)
	case *lang.Range:
		b.domain(n)
	default:
		for _, c := range lang.Children(t) {
			b.tree(c)
		}
	}
}

func (b *binder) each(list []lang.Expr) {
	for _, x := range list {
		b.expr(x)
	}
}

func (b *binder) expr(x lang.Expr) {
	if x != nil && x != lang.Expr((*lang.Call)(nil)) {
		b.tree(x)
	}
}

func (b *binder) bind(text string, at lang.Span) *local {
	l := &local{key: lang.CanonicalName(text), binder: at}
	b.found = append(b.found, l)
	return l
}

func (b *binder) use(text string, at lang.Span) {
	key := lang.CanonicalName(text)
	for i := len(b.scope) - 1; i >= 0; i-- {
		if b.scope[i].key == key {
			b.scope[i].uses = append(b.scope[i].uses, at)
			return
		}
	}
	b.free(key, at)
}

func (b *binder) ident(id *lang.Ident) {
	if id != nil {
		b.free(lang.CanonicalName(id.Text), id.Span)
	}
}

// dotted hands on `mica.eps`, unless its first name is a local one.
func (b *binder) dotted(m *lang.Member) {
	if key := b.key(m); key != "" {
		b.free(key, m.Span)
	}
}

// column hands on the column H of `bh.B at H = …`.
func (b *binder) column(l *lang.Lookup) {
	if m, ok := l.X.(*lang.Member); ok {
		if owner := b.key(m.X); owner != "" {
			b.free(owner+"."+lang.CanonicalName(l.Column.Text), l.Column.Span)
		}
	}
}

// key is the dotted key of a chain of names that begins with a free one, or "".
func (b *binder) key(x lang.Expr) string {
	switch n := x.(type) {
	case *lang.Name:
		key := lang.CanonicalName(n.Text)
		if slices.ContainsFunc(b.scope, func(l *local) bool { return l.key == key }) {
			return ""
		}
		return key
	case *lang.Member:
		if owner := b.key(n.X); owner != "" {
			return owner + "." + lang.CanonicalName(n.Field.Text)
		}
	}
	return ""
}

func (b *binder) within(more []*local, body func()) {
	depth := len(b.scope)
	b.scope = append(b.scope, more...)
	body()
	b.scope = b.scope[:depth]
}

func (b *binder) definition(d *lang.Definition) {
	var params []*local
	for _, p := range d.Params {
		params = append(params, b.bind(p.Text, p.Span))
	}
	b.ident(d.In)
	b.within(params, func() {
		b.each(d.Members)
		for _, p := range d.Pieces {
			b.expr(p.X)
			b.domain(p.For)
		}
		for _, r := range d.For {
			b.domain(r)
		}
	})
}

// domain is a range of a definition; its variable is a parameter or a name of
// the note, and binds nothing.
func (b *binder) domain(r *lang.Range) {
	if r == nil {
		return
	}
	for _, x := range []lang.Expr{r.Var, r.From, r.To, r.At} {
		b.expr(x)
	}
}

func (b *binder) call(c *lang.Call) {
	b.function(c)
	b.expr(c.Over)
	b.bound(c.For, func() {
		b.each(c.Args)
		b.expr(c.Equal)
	})
}

func (b *binder) bound(ranges []*lang.Range, body func()) {
	var vars []*local
	for _, r := range ranges {
		if r == nil {
			continue
		}
		for _, x := range []lang.Expr{r.From, r.To, r.At} {
			b.expr(x)
		}
		if n, ok := r.Var.(*lang.Name); ok {
			vars = append(vars, b.bind(n.Text, n.Span))
		} else {
			b.expr(r.Var)
		}
	}
	b.within(vars, body)
}

// function hands on the name of a called function, `f(x)` or `ref.f(x)`.
func (b *binder) function(c *lang.Call) {
	if c.Of == nil {
		b.use(c.Fn.Text, c.Fn.Span)
		return
	}
	b.tree(c.Of)
	if owner := b.key(c.Of); owner != "" {
		b.free(owner+"."+lang.CanonicalName(c.Fn.Text), c.Fn.Span)
	}
}
