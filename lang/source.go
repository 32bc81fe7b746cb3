package lang

import (
	"sort"
	"unicode/utf8"
)

// Source is a note's text with its line index. Offsets are bytes.
type Source struct {
	Text  string
	lines []int // offset of each line's first byte
}

// NewSource indexes the text. A line ends with LF, CRLF or CR.
func NewSource(text string) *Source {
	s := &Source{Text: text, lines: []int{0}}
	for i := 0; i < len(text); i++ {
		switch {
		case text[i] == '\n':
			s.lines = append(s.lines, i+1)
		case text[i] == '\r' && (i+1 == len(text) || text[i+1] != '\n'):
			s.lines = append(s.lines, i+1)
		}
	}
	return s
}

// Lines is the number of lines; the last may be empty.
func (s *Source) Lines() int { return len(s.lines) }

// Line returns the 0-based line that holds the offset.
func (s *Source) Line(offset int) int {
	return sort.Search(len(s.lines), func(i int) bool { return s.lines[i] > offset }) - 1
}

// LineSpan is the span of a 0-based line without its line end.
func (s *Source) LineSpan(line int) Span {
	start, end := s.lines[line], len(s.Text)
	if line+1 < len(s.lines) {
		end = s.lines[line+1]
	}
	for end > start && (s.Text[end-1] == '\n' || s.Text[end-1] == '\r') {
		end--
	}
	return Span{start, end}
}

// Position returns the 1-based line and the 1-based column, in Unicode code
// points, of an offset. An invalid byte counts as one code point; a byte order
// mark at the start of the text is not counted.
func (s *Source) Position(offset int) (line, column int) {
	offset = max(0, min(offset, len(s.Text)))
	n := s.Line(offset)
	start := s.lines[n]
	if n == 0 && len(s.Text) >= len(bom) && s.Text[:len(bom)] == bom {
		start = min(len(bom), offset)
	}
	return n + 1, utf8.RuneCountInString(s.Text[start:offset]) + 1
}

// bom is the UTF-8 byte order mark, which is accepted and kept.
const bom = "\ufeff"
