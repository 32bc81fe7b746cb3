package lang

// Stmt is one statement of a note: its text, its tree and where it stands.
type Stmt struct {
	At     int // note offset of the first byte of Text
	Text   string
	Tree   Statement
	Nodes  int     // number of nodes in Tree; Node.ID is below it
	Faults []Fault // of syntax, with statement-relative spans
}

// Abs turns a node's statement-relative place into note offsets.
func (s *Stmt) Abs(t Tree) Span { return t.Place().Shift(s.At) }

// Script is a note divided into statements and prose, every statement parsed.
type Script struct {
	Source *Source
	Stmts  []*Stmt // in text order
	Prose  []int   // 0-based lines of prose that are not blank
	Faults []Fault // of the division itself (unread-calculation), note offsets
}
