package lang

import "sort"

// Lookup finds a name by its canonical key ("mica", "mica.eps_r"), nil if the
// note does not know it. Constants are found too.
func (n *Note) Lookup(key string) *Symbol {
	if n.state == nil {
		return nil
	}
	return n.state.symbols[key]
}

// FactsOf tells what an expression of a statement carries; ok is false where
// nothing was recorded for it.
func (n *Note) FactsOf(s *Stmt, t Tree) (Facts, bool) {
	if n.state == nil {
		return Facts{}, false
	}
	cs := n.state.byStmt[s]
	for i := len(cs) - 1; i >= 0; i-- {
		if t.Index() >= cs[i].base {
			return cs[i].factsOf(t)
		}
	}
	return Facts{}, false
}

// UseAt finds the use or definition of a name at a note offset.
func (n *Note) UseAt(offset int) (Use, bool) {
	i := sort.Search(len(n.Uses), func(i int) bool { return n.Uses[i].Span.End >= offset })
	best, found := Use{}, false
	for ; i < len(n.Uses) && n.Uses[i].Span.Start <= offset; i++ {
		if u := n.Uses[i]; u.Span.Contains(offset) && (!found || u.Span.Len() <= best.Span.Len()) {
			best, found = u, true
		}
	}
	return best, found
}

// StmtAt finds the statement at a note offset, nil in prose.
func (n *Note) StmtAt(offset int) *Stmt {
	ss := n.Script.Stmts
	i := sort.Search(len(ss), func(i int) bool { return ss[i].At+len(ss[i].Text) >= offset })
	if i < len(ss) && ss[i].At <= offset {
		return ss[i]
	}
	return nil
}

// Regime tells which regime is in force for a symbol's statement: "static",
// "harmonic", "transient", or "" where none is stated above it. The symbol is
// the frequency of a harmonic regime, if it has a name.
func (n *Note) Regime(s *Symbol) (word string, at *Symbol) {
	return n.regimeOf(n.state.cellOf(s))
}

// RegimeAt is Regime for any statement, one that defines no name included.
func (n *Note) RegimeAt(s *Stmt) (word string, at *Symbol) {
	if cs := n.state.byStmt[s]; len(cs) > 0 {
		return n.regimeOf(cs[0])
	}
	return "", nil
}

func (n *Note) regimeOf(c *cell) (word string, at *Symbol) {
	if c == nil || c.regime == nil {
		return "", nil
	}
	r, ok := c.regime.tree.(*Regime)
	if !ok {
		return "", nil
	}
	return r.Word.Text, n.Lookup(c.regime.key)
}
