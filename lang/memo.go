package lang

import (
	"slices"
	"sync/atomic"
)

// memo is what somebody above the language has found out about a statement. It
// belongs to the work of the statement's first cell, so the next analysis of an
// edited note finds it where nothing that the statement is computed from changed.
type memo struct{ kept atomic.Pointer[remark] }

type remark struct {
	of []*work // of all cells of the statement
	v  any
}

// Memo gives what SetMemo kept for a statement, in this note or in an earlier
// analysis of it in which the statement and everything that it is computed from
// were the same; nil if there is nothing. Places may have moved.
func (n *Note) Memo(s *Stmt) any {
	m, works := n.memoOf(s)
	if m == nil {
		return nil
	}
	if r := m.kept.Load(); r != nil && slices.Equal(r.of, works) {
		return r.v
	}
	return nil
}

// SetMemo keeps something for a statement; see Memo. What is kept must not be
// changed afterwards.
func (n *Note) SetMemo(s *Stmt, v any) {
	if m, works := n.memoOf(s); m != nil {
		m.kept.Store(&remark{works, v})
	}
}

// memoOf finds the memo of a statement and what tells whether it still holds;
// nil where a cell of it has no work of its own.
func (n *Note) memoOf(s *Stmt) (*memo, []*work) {
	cells := n.state.byStmt[s]
	if len(cells) == 0 {
		return nil, nil
	}
	works := make([]*work, len(cells))
	for i, c := range cells {
		if c.made == nil || c.memo == nil {
			return nil, nil
		}
		works[i] = c.made
	}
	return cells[0].memo, works
}
