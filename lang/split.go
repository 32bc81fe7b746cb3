package lang

import "strings"

// block is the text of one statement and where it stands.
type block struct {
	at   int // note offset
	text string
}

// divided is a note's text, divided.
type divided struct {
	blocks []block
	prose  []int   // 0-based lines that are not blank
	faults []Fault // note offsets
}

// splitter divides a note line by line, in one pass.
type splitter struct {
	src     *Source
	out     divided
	fence   fence
	above   lineKind
	indent  int // column of the open statement
	start   int // offset of the open statement, -1 if none is
	end     int
	anchor  int       // offset of the statement whose column counts: the open one, or one above it
	defines bool      // the open statement is a definition
	tail    lineState // of the open statement, up to its end
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
	s.openFence()
	return s.out
}

func (s *splitter) line(n int, span Span) {
	text := s.src.Text[span.Start:span.End]
	lead := leading(text)
	switch {
	case s.fence.mark != "":
		s.fenced(n, text[lead:])
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
	content := Span{span.Start + lead, span.Start + len(strings.TrimRight(text, " \t"))}
	switch {
	case indent < 4 && s.fence.open(text[lead:], n):
		s.prose(n)
	case indent < 4, s.above == aboveProse, s.isMarked(text[lead:], indent):
		s.unread(content)
		s.prose(n)
	default:
		s.calculation(n, indent, content)
	}
}

// isMarked reports a list, quote or table mark, which makes a line prose. A
// deeper line right under a calculation line continues it whatever it begins
// with: `- b` below `W = a` must not be lost in silence.
func (s *splitter) isMarked(text string, indent int) bool {
	if s.above == aboveCalculation && s.start >= 0 && indent > s.indent {
		return false
	}
	return strings.HasPrefix(text, "- ") || strings.HasPrefix(text, "* ") ||
		strings.HasPrefix(text, "> ") || strings.HasPrefix(text, "|")
}

func (s *splitter) prose(n int) {
	s.close()
	s.above = aboveProse
	s.out.prose = append(s.out.prose, n)
}

// calculation adds a line to the open statement or begins one.
func (s *splitter) calculation(n, indent int, content Span) {
	s.above = aboveCalculation
	text := s.src.Text[content.Start:content.End]
	if strings.HasPrefix(text, "#") {
		return // a remark belongs to no statement
	}
	if s.start >= 0 && indent > s.indent {
		if !s.deeperDefinition(n, content, text) {
			s.tail.read(s.src.Text[s.end:content.End])
			s.end = content.End
			return
		}
		s.close()
		s.start, s.end = content.Start, content.End
	} else {
		s.close()
		s.start, s.end, s.anchor, s.indent = content.Start, content.End, content.Start, indent
	}
	s.defines = !isStatementWord(text[:wordEnd(text, 0)])
	s.tail = lineState{}
	s.tail.read(text)
}

// deeperDefinition reports a definition that would continue the one above, and
// files the fault. It is read as a statement of its own all the same, so that
// its name is known.
func (s *splitter) deeperDefinition(n int, content Span, text string) bool {
	if !s.defines || s.tail.goesOn() || !strings.Contains(text, "=") || !opensDefinition(scan(nil, text)) {
		return false
	}
	above := s.src.Line(s.anchor)
	lead := s.src.Text[s.src.LineSpan(above).Start:s.anchor]
	f := Fault{Rule: ruleSyntax, Severity: Error, Span: content, Message: deeperMessage(above + 1), Detail: deeperDetail}
	name := s.src.Text[content.Start : content.Start+wordEnd(text, 0)]
	f.Span.End = content.Start + len(name)
	if leading(lead) == len(lead) {
		f.Fix = &Fix{"Align it with line " + itoa(above+1), []Edit{{Span{s.src.LineSpan(n).Start, content.Start}, lead}}}
	}
	s.out.faults = append(s.out.faults, f)
	return true
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
