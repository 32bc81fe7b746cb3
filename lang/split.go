package lang

import "strings"

// block is the text of one statement and where it stands.
type block struct {
	at   int
	text string
}

// divided is a note's text, divided.
type divided struct {
	blocks []block
	prose  []int // 0-based lines that are not blank
	fenced map[int]bool
}

// splitter divides a note line by line.
type splitter struct {
	src    *Source
	out    divided
	fence  string // the run that opened the code block, "" outside
	above  lineKind
	indent int // of the statement that is open
	start  int // offset of the open statement, -1 if none is
	end    int
}

// lineKind is what the line above was.
type lineKind uint8

const (
	aboveBlank lineKind = iota // or the start of the note
	aboveProse
	aboveCalculation
)

// split divides a note into statements and prose.
func split(src *Source) divided {
	s := &splitter{src: src, start: -1}
	for n := 0; n < src.Lines(); n++ {
		span := src.LineSpan(n)
		if n == 0 && strings.HasPrefix(src.Text, bom) {
			span.Start = min(len(bom), span.End)
		}
		s.line(n, span)
	}
	s.close()
	return s.out
}

func (s *splitter) line(n int, span Span) {
	text := s.src.Text[span.Start:span.End]
	lead := leading(text)
	switch {
	case s.fence != "":
		s.prose(n, lead == len(text))
		s.closeFence(text[lead:])
	case lead == len(text):
		s.above = aboveBlank
	default:
		s.filled(n, span, lead)
	}
}

// filled takes a line that is not blank, outside a code block.
func (s *splitter) filled(n int, span Span, lead int) {
	text := s.src.Text[span.Start:span.End]
	indent := columns(text[:lead])
	deeper := s.start >= 0 && indent > s.indent
	switch {
	case indent < 4:
		s.openFence(text[lead:])
		s.prose(n, false)
	case s.above == aboveProse:
		s.prose(n, false)
	case opensProse(text[lead:]) && !(deeper && s.above == aboveCalculation):
		s.prose(n, false)
	default:
		s.calculation(indent, Span{span.Start + lead, span.Start + len(strings.TrimRight(text, " \t"))})
	}
}

func (s *splitter) prose(n int, blank bool) {
	s.close()
	s.above = aboveProse
	if !blank {
		s.out.prose = append(s.out.prose, n)
	}
}

// calculation adds a line to the open statement or begins one.
func (s *splitter) calculation(indent int, content Span) {
	s.above = aboveCalculation
	if s.start >= 0 && indent > s.indent {
		s.end = content.End
		return
	}
	s.close()
	s.start, s.end, s.indent = content.Start, content.End, indent
}

// close ends the open statement.
func (s *splitter) close() {
	if s.start >= 0 {
		s.out.blocks = append(s.out.blocks, block{s.start, s.src.Text[s.start:s.end]})
	}
	s.start = -1
}

// leading is the length of the blanks that a line begins with.
func leading(text string) int {
	n := 0
	for n < len(text) {
		size := blank(text[n:])
		if size == 0 {
			break
		}
		n += size
	}
	return n
}

// opensProse reports a list, quote or table mark.
func opensProse(text string) bool {
	return strings.HasPrefix(text, "- ") || strings.HasPrefix(text, "* ") ||
		strings.HasPrefix(text, "> ") || strings.HasPrefix(text, "|")
}

// openFence notes a line that opens a code block.
func (s *splitter) openFence(text string) {
	for _, mark := range [...]string{"`", "~"} {
		n := len(text) - len(strings.TrimLeft(text, mark))
		if n >= 3 && !(mark == "`" && strings.Contains(text[n:], "`")) {
			s.fence = text[:n]
		}
	}
}

// closeFence ends the code block at a line of its mark alone, at least as long.
func (s *splitter) closeFence(text string) {
	text = strings.TrimRight(text, " \t")
	if len(text) >= len(s.fence) && strings.Trim(text, s.fence[:1]) == "" {
		s.fence = ""
	}
}
