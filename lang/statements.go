package lang

import (
	"fmt"

	"inkjoule/lang/kind"
)

// This file analyses the statements that define no formula of their own.

// regime analyses `regime: harmonic at f = EXPR`.
func (a *analysis) regime(c *cell, r *Regime) {
	e := &elab{a: a, c: c}
	switch r.Word.Text {
	case "static", "harmonic", "transient":
	default:
		e.fault("syntax", &r.Word, fmt.Sprintf("%s is no regime", r.Word.Text), "write static, harmonic at f = …, or transient")
	}
	if r.X == nil || r.Name == nil {
		return
	}
	d := &Definition{Node: r.Node, Name: *r.Name, Members: []Expr{r.X}}
	c.sym.Input = isLiteral(r.X)
	t := e.expr(r.X)
	if !t.Known {
		return
	}
	e.settle(d, t)
	e.evaluate(d, t)
	e.display(d)
}

// adjectives checks a medium's adjectives: known words, one of each group.
func (a *analysis) adjectives(c *cell, m *Medium) {
	e := &elab{a: a, c: c}
	group := map[int]string{}
	for _, w := range m.Adjectives {
		g := adjectiveGroup(w.Text)
		if g < 0 {
			detail := ""
			if n := nearest(w.Text, Adjectives()); n != "" {
				detail = fmt.Sprintf("did you mean %s?", n)
			}
			e.fault("unknown-property", w, fmt.Sprintf("%s is no adjective of a medium", w.Text), detail)
			continue
		}
		if first, ok := group[g]; ok && first != w.Text {
			e.fault("syntax", w, fmt.Sprintf("%s and %s exclude each other", first, w.Text), "keep the one that holds")
		}
		group[g] = w.Text
	}
	c.sym.Facts = Facts{}
}

// adjectiveGroups are the adjectives of language.md; those of one row exclude
// each other.
var adjectiveGroups = [][]string{
	{"linear", "nonlinear", "hysteretic"},
	{"isotropic", "uniaxial", "biaxial", "anisotropic"},
	{"homogeneous", "inhomogeneous"},
	{"lossless", "lossy", "active"},
	{"nondispersive", "dispersive"},
	{"piezoelectric"},
}

func adjectiveGroup(word string) int {
	for i, g := range adjectiveGroups {
		for _, w := range g {
			if w == word {
				return i
			}
		}
	}
	return -1
}

// Adjectives are the words that may follow `medium NAME:`.
func Adjectives() []string {
	var out []string
	for _, g := range adjectiveGroups {
		out = append(out, g...)
	}
	return out
}

// Adjective reports what a medium says about the group that the word belongs
// to: yes, it says this word; stated, it says something of the group.
func (n *Note) Adjective(medium, word string) (yes, stated bool) {
	s := n.Lookup(medium)
	if s == nil || s.Stmt == nil {
		return false, false
	}
	m, ok := s.Stmt.Tree.(*Medium)
	if !ok {
		return false, false
	}
	g := adjectiveGroup(word)
	for _, w := range m.Adjectives {
		yes = yes || w.Text == word
		stated = stated || adjectiveGroup(w.Text) == g && g >= 0
	}
	return yes, stated
}

// waive checks the name after `for`; the rule is the business of package check.
func (a *analysis) waive(c *cell, w *Waive) {
	if w.For == nil {
		return
	}
	e := &elab{a: a, c: c}
	switch x := w.For.(type) {
	case *Name:
		e.known(x)
	case *Member:
		if n, ok := x.X.(*Name); ok && e.known(n) {
			e.use(CanonicalName(n.Text)+"."+CanonicalName(x.Field.Text), x.Field.Span)
		}
	}
}

// known checks that a name is defined, without using its value.
func (e *elab) known(n *Name) bool {
	key := CanonicalName(n.Text)
	if e.a.cells[key] == nil {
		e.unknownName(n, n.Text, "unknown-name")
		return false
	}
	e.use(key, n.Span)
	return true
}

// plot elaborates what is plotted; drawing is the business of the sheet.
func (a *analysis) plot(c *cell, p *Plot) {
	e := &elab{a: a, c: c}
	if p.For == nil {
		return
	}
	if v, ok := p.For.Var.(*Name); ok {
		e.bind(CanonicalName(v.Text), e.bounds(p.For))
	}
	for _, x := range p.X {
		e.expr(x)
	}
}

// constantKind is the kind of a built-in constant.
func constantKind(name string) (kind.ID, Standing) {
	words := map[string]string{"eps_0": "permittivity", "mu_0": "permeability", "c_0": "phase speed", "Z_0": "impedance", "q_e": "electric charge",
		"m_e": "mass", "m_p": "mass"}[name]
	if words == "" {
		return 0, Unknown
	}
	_, id, _ := kind.Parse(words)
	return id, Declared
}

// unused adds the advice about definitions that nothing uses: neither another
// statement nor the reader, who would read a stated or asked result.
func (a *analysis) unused(n *Note) {
	if a.isLibrary() {
		return
	}
	for _, c := range a.all {
		if _, waives := c.tree.(*Waive); waives {
			continue // it speaks of a name and uses nothing
		}
		for _, u := range c.uses {
			if d := a.cells[u.key]; d != nil && d.role != RoleConstant {
				d.used = true
				if d.owner != nil {
					d.owner.used = true
				}
			}
		}
	}
	for _, c := range a.all {
		if c.name == nil || a.cells[c.key] != c || c.used || c.role == RoleProperty || c.role == RoleCondition {
			continue
		}
		if f, ok := c.neglected(); ok {
			n.Faults = append(n.Faults, f)
		}
	}
}

// isLibrary reports a note that computes nothing itself: it is there for other
// notes to use.
func (a *analysis) isLibrary() bool {
	for _, c := range a.all {
		if c.judged != nil || c.role == RoleQuantity && !c.sym.Input || c.role == 0 {
			return false
		}
	}
	return true
}

// neglected is the advice about a name that nothing uses.
func (c *cell) neglected() (Fault, bool) {
	f := Fault{Severity: Advice, Span: c.name.Span.Shift(c.stmt.At)}
	switch {
	case c.role == RoleQuantity && !c.sym.Input && !c.sym.Stated && c.sym.Asked == nil && c.sym.Result.Known:
		f.Rule = "unasked-result"
		f.Message = fmt.Sprintf("nobody states or uses %s (%s)", c.title(), c.sym.Shown)
		f.Detail = "end it with `= __` to show the result, or remove it"
	case c.role == RoleQuantity && c.sym.Input && c.sym.Facts.Known && c.sym.Asked == nil, c.role != RoleQuantity && c.role != RoleColumn:
		f.Rule = "unused-definition"
		f.Message = fmt.Sprintf("nothing uses %s", c.title())
		f.Detail = "remove it if it is left over"
	default:
		return f, false
	}
	return f, true
}
