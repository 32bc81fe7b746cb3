package lang

import (
	"strings"
)

// ruleUnread is the name of the caution about calculation that stands in prose.
const ruleUnread = "unread-calculation"

// fence is the code block that a line of prose opened.
type fence struct {
	mark string // the run that opened it, "" outside
	line int    // 0-based
}

// open notes a line that opens a code block: three or more ` or ~.
func (f *fence) open(text string, line int) bool {
	for _, mark := range [...]string{"`", "~"} {
		n := len(text) - len(strings.TrimLeft(text, mark))
		if n >= 3 && !(mark == "`" && strings.Contains(text[n:], "`")) {
			f.mark, f.line = text[:n], line
			return true
		}
	}
	return false
}

// fenced takes a line of a code block; a line of the mark alone, at least as
// long as the opening one, ends it.
func (s *splitter) fenced(n int, text string) {
	if text != "" {
		s.prose(n)
	}
	text = strings.TrimRight(text, " \t")
	if len(text) >= len(s.fence.mark) && strings.Trim(text, s.fence.mark[:1]) == "" {
		s.fence = fence{}
	}
}

// openFence cautions that a code block which is never closed hides calculation.
func (s *splitter) openFence() {
	if s.fence.mark == "" {
		return
	}
	for n := s.fence.line + 1; n < s.src.Lines(); n++ {
		span := s.src.LineSpan(n)
		if readsAsStatement(strings.TrimSpace(s.src.Text[span.Start:span.End])) {
			s.out.faults = append(s.out.faults, Fault{Rule: ruleUnread, Severity: Caution, Span: s.src.LineSpan(s.fence.line),
				Message: "this code block is never closed, so the calculation below it is not read",
				Detail:  "close it with a line of " + code(s.fence.mark)})
			return
		}
	}
}

// unread cautions about a line of prose that reads as a statement.
func (s *splitter) unread(content Span) {
	if !readsAsStatement(s.src.Text[content.Start:content.End]) {
		return
	}
	f := Fault{Rule: ruleUnread, Severity: Caution, Span: content,
		Message: "this line reads as a statement, but it is prose, so nothing checks it",
		Detail:  "indent it by four columns, below a blank line; in a sentence, let it not stand alone on a line"}
	if s.above != aboveProse {
		line := s.src.LineSpan(s.src.Line(content.Start))
		f.Fix = &Fix{"Indent it by four columns", []Edit{{Span{line.Start, content.Start}, "    "}}}
	}
	s.out.faults = append(s.out.faults, f)
}

// readsAsStatement reports a line that parses whole as a statement. Most prose
// is dismissed by its first words, without parsing.
func readsAsStatement(text string) bool {
	end := wordEnd(text, 0)
	if end == 0 || len(text) > maxProseLine {
		return false
	}
	word, rest := text[:end], strings.TrimLeft(text[end:], " \t")
	if rest == "" || !mayOpen(word, rest) {
		return false
	}
	tree, broken := parseTokens(scan(nil, text))
	if broken != nil {
		return false
	}
	m, isMedium := tree.(*Medium)
	return !isMedium || len(m.Adjectives) > 0 // "medium voltage" is a heading
}

// maxProseLine bounds the line that is tried; a longer one is no statement that
// a person wrote.
const maxProseLine = 2000

// mayOpen is a quick look at the first word and what follows it.
func mayOpen(word, rest string) bool {
	if isStatementWord(word) {
		return true
	}
	if !strings.Contains(rest, "=") || isReserved(word) {
		return false
	}
	switch rest[0] {
	case '=', ',', '(':
		return true
	}
	return strings.HasPrefix(rest, "in ")
}
