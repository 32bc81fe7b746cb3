package lang

import (
	"strings"
	"unicode/utf8"
)

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
	Faults []Fault // of the division itself (unread-calculation, a text that is no note), note offsets
}

// maxStatements is the most statements that are read of one note.
const maxStatements = 200_000

// Read divides a note and parses its statements. A statement of previous whose
// text is unchanged is reused with its tree; previous may be nil. Any bytes are
// read: what is not UTF-8 is a fault at its place, and a file that is no text
// has no statements.
func Read(text string, previous *Script) *Script {
	src := NewSource(text)
	s := &Script{Source: src}
	if at := strings.IndexByte(text, 0); at >= 0 {
		s.Faults = append(s.Faults, notText(text, at))
		return s
	}
	parts := split(src)
	s.Prose, s.Faults = parts.prose, parts.faults
	if len(parts.blocks) > maxStatements {
		s.Faults = append(s.Faults, tooMany(parts.blocks[maxStatements]))
		parts.blocks = parts.blocks[:maxStatements]
	}
	s.Stmts = reuse(parts.blocks, previous)
	s.checkEncoding()
	return s
}

// notText refuses a file that holds a NUL byte: no text does.
func notText(text string, at int) Fault {
	f := Fault{Rule: ruleSyntax, Severity: Error, Span: Span{at, at + 1},
		Message: "this is not a text: it holds a NUL byte", Detail: "a note is plain text in UTF-8"}
	if strings.HasPrefix(text, "\xff\xfe") || strings.HasPrefix(text, "\xfe\xff") {
		f.Message, f.Detail = "this text is in UTF-16", "save the note as UTF-8"
	}
	return f
}

func tooMany(first block) Fault {
	return Fault{Rule: "over-budget", Severity: Error, Span: Span{first.at, first.at + len(first.text)},
		Message: "the note has more than 200000 statements; from here on nothing is read",
		Detail:  "divide the note; `uses \"…\"` takes the names of another"}
}

// reuse gives the statements of the blocks, from an earlier reading where the
// text is the same: an edit leaves all but a few at both ends unchanged.
func reuse(blocks []block, previous *Script) []*Stmt {
	var old []*Stmt
	if previous != nil {
		old = previous.Stmts
	}
	out := make([]*Stmt, len(blocks))
	first := 0
	for first < min(len(blocks), len(old)) && blocks[first].text == old[first].Text {
		out[first] = old[first].moved(blocks[first].at)
		first++
	}
	last, end := len(blocks), len(old)
	for last > first && end > first && blocks[last-1].text == old[end-1].Text {
		last, end = last-1, end-1
		out[last] = old[end].moved(blocks[last].at)
	}
	middle := make(map[string]*Stmt, end-first)
	for _, s := range old[first:end] {
		middle[s.Text] = s
	}
	var p statementParser
	for i := first; i < last; i++ {
		if s := middle[blocks[i].text]; s != nil {
			out[i] = s.moved(blocks[i].at)
			continue
		}
		out[i] = p.parse(blocks[i].text)
		out[i].At = blocks[i].at
	}
	return out
}

// moved is the statement at another offset, with the same tree.
func (s *Stmt) moved(at int) *Stmt {
	if s.At == at {
		return s
	}
	c := *s
	c.At = at
	return &c
}

// checkEncoding files the first bytes that are not UTF-8 where no statement
// says so.
func (s *Script) checkEncoding() {
	at := invalidUTF8(s.Source.Text)
	if at < 0 {
		return
	}
	for _, st := range s.Stmts {
		if st.At <= at && at < st.At+len(st.Text) {
			if len(st.Faults) > 0 {
				return
			}
			break
		}
	}
	s.Faults = append(s.Faults, Fault{Rule: ruleSyntax, Severity: Error, Span: Span{at, at + 1},
		Message: "a byte that is not UTF-8", Detail: "save the note as UTF-8"})
}

// invalidUTF8 is the offset of the first byte that is not UTF-8, or -1.
func invalidUTF8(text string) int {
	if utf8.ValidString(text) {
		return -1
	}
	for i, r := range text {
		if r == '\uFFFD' && !strings.HasPrefix(text[i:], "\uFFFD") {
			return i
		}
	}
	return -1
}
