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

// Read divides a note and parses its statements. A statement of previous whose
// text is unchanged is reused with its tree; previous may be nil.
func Read(text string, previous *Script) *Script {
	src := NewSource(text)
	parts := split(src)
	s := &Script{Source: src, Prose: parts.prose, Stmts: make([]*Stmt, 0, len(parts.blocks))}
	old := oldStatements(previous)
	for _, b := range parts.blocks {
		s.Stmts = append(s.Stmts, place(b, old[b.text]))
	}
	return s
}

func oldStatements(previous *Script) map[string]*Stmt {
	if previous == nil {
		return nil
	}
	old := make(map[string]*Stmt, len(previous.Stmts))
	for _, s := range previous.Stmts {
		old[s.Text] = s
	}
	return old
}

// place gives the statement of a block, from an earlier one of the same text.
func place(b block, old *Stmt) *Stmt {
	switch {
	case old == nil:
		s := ParseStatement(b.text)
		s.At = b.at
		return s
	case old.At == b.at:
		return old
	}
	moved := *old
	moved.At = b.at
	return &moved
}
