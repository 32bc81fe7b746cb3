package lsp

import (
	"strings"
	"unicode"
	"unicode/utf8"

	"inkjoule/lang"
)

// A cursor is a place in a text that is being typed, read without a tree: the
// statement around it is broken more often than not.
type cursor struct {
	note *lang.Note
	at   int    // note offset
	line string // the statement's text up to the cursor, from its first line on
	word string // the name being typed, up to the cursor
}

// cursor reads the text before the spot. It is false in prose, where nothing
// is offered.
func (s *spot) cursor() (cursor, bool) {
	src := s.note.Script.Source
	n := src.Line(s.at)
	for _, prose := range s.note.Script.Prose {
		if prose == n {
			return cursor{}, false
		}
	}
	start := src.LineSpan(n).Start
	stmt := s.near()
	if stmt != nil {
		start = stmt.At
	}
	line := src.Text[start:s.at]
	if strings.TrimLeft(line, " \t") == line && stmt == nil {
		return cursor{}, false // flush left is prose
	}
	line = strings.TrimLeft(line, " \t")
	return cursor{note: s.note, at: s.at, line: line, word: line[wordStart(line):]}, !inRemark(line)
}

// near is the statement at the spot, or the one that ends before it with
// nothing but blanks between.
func (s *spot) near() *lang.Stmt {
	src := s.note.Script.Source
	text := strings.TrimRight(src.Text[src.LineSpan(src.Line(s.at)).Start:s.at], " \t")
	return s.note.StmtAt(src.LineSpan(src.Line(s.at)).Start + len(text))
}

// wordStart is where the name at the end of a text begins.
func wordStart(text string) int {
	at := len(text)
	for at > 0 {
		r, size := utf8.DecodeLastRuneInString(text[:at])
		if !nameRune(r) {
			break
		}
		at -= size
	}
	return at
}

// nameRune reports whether a name may hold the rune.
func nameRune(r rune) bool {
	return unicode.IsLetter(r) || unicode.IsDigit(r) || r == '_' || r == '′' || '₀' <= r && r <= '₉'
}

// inRemark reports whether the text ends in a remark.
func inRemark(text string) bool {
	last := text[strings.LastIndexByte(text, '\n')+1:]
	quoted := false
	for _, r := range last {
		switch {
		case r == '"':
			quoted = !quoted
		case r == '#' && !quoted:
			return true
		}
	}
	return false
}

// quote is the text of the quotation that the cursor stands in.
func (c cursor) quote() (inside string, ok bool) {
	last := c.line[strings.LastIndexByte(c.line, '\n')+1:]
	if strings.Count(last, `"`)%2 == 0 {
		return "", false
	}
	return last[strings.LastIndexByte(last, '"')+1:], true
}

// before is the text before the word, without the blanks at its end.
func (c cursor) before() string { return strings.TrimRight(c.line[:len(c.line)-len(c.word)], " \t") }

// spaced reports whether a blank stands before the word.
func (c cursor) spaced() bool {
	head := c.line[:len(c.line)-len(c.word)]
	return strings.HasSuffix(head, " ") || strings.HasSuffix(head, "\t")
}

// opens reports whether the statement begins with the word.
func (c cursor) opens(word string) bool {
	rest, ok := strings.CutPrefix(c.line, word)
	return ok && rest != "" && (rest[0] == ' ' || rest[0] == ':')
}

// inHead reports whether the cursor stands before the first `=` of a
// definition.
func (c cursor) inHead() bool { return !strings.Contains(c.lastLine(), "=") }

// lastLine is the line of the cursor: in a medium each property is a line.
func (c cursor) lastLine() string {
	return strings.TrimLeft(c.line[strings.LastIndexByte(c.line, '\n')+1:], " \t")
}

// kindWords are the words after the comma of a definition's head, if the cursor
// stands in them.
func (c cursor) kindWords() (words string, ok bool) {
	if !c.inHead() {
		return "", false
	}
	line := c.lastLine()
	depth, comma := 0, -1
	for i, r := range line {
		switch r {
		case '(':
			depth++
		case ')':
			depth--
		case ',':
			if depth == 0 {
				comma = i
			}
		}
	}
	if comma <= 0 || wordStart(line[:comma]) == comma {
		return "", false
	}
	return strings.TrimLeft(line[comma+1:], " \t"), true
}

// owner is the chain of names before the point that the word follows:
// `ref.mica` of `ref.mica.eps`.
func (c cursor) owner() (chain string, ok bool) {
	head := c.line[:len(c.line)-len(c.word)]
	if !strings.HasSuffix(head, ".") {
		return "", false
	}
	head = head[:len(head)-1]
	start := len(head)
	for {
		next := wordStart(head[:start])
		if next == start {
			return "", false
		}
		start = next
		if start == 0 || head[start-1] != '.' {
			break
		}
		start--
	}
	chain = head[start:]
	first, _ := utf8.DecodeRuneInString(chain)
	return chain, unicode.IsLetter(first)
}

// phrase is the unit phrase being typed: what follows a number and a blank, or
// a bracket in a table's head, up to the cursor.
func (c cursor) phrase() (text string, ok bool) {
	line := c.lastLine()
	start := len(line)
	for start > 0 {
		r, size := utf8.DecodeLastRuneInString(line[:start])
		if !unicode.IsLetter(r) && !strings.ContainsRune("0123456789./·^()²³⁻¹-%°Ω_", r) {
			break
		}
		start -= size
	}
	text = line[start:]
	head := line[:start]
	switch {
	case strings.HasSuffix(head, "["):
		return text, c.opens("table")
	case !strings.HasSuffix(head, " ") && !strings.HasSuffix(head, "\t"):
		return "", false
	}
	return text, endsNumber(strings.TrimRight(head, " \t")) && !startsDigit(text)
}

func startsDigit(text string) bool { return text != "" && (text[0] >= '0' && text[0] <= '9') }

// endsNumber reports whether a text ends with a number or the blank that asks
// for a result.
func endsNumber(text string) bool {
	if strings.HasSuffix(text, "__") {
		return true
	}
	if strings.HasSuffix(text, ")") {
		return constantParenthesis(text)
	}
	start := wordStart(text)
	if start > 0 && text[start-1] == '.' {
		start = wordStart(text[:start-1])
	}
	return startsDigit(text[start:])
}

// constantParenthesis reports whether a text ends with a parenthesis of numbers:
// `(0, 0, 4)`, `12.0(1)`, `diag(1, 2, 3)`.
func constantParenthesis(text string) bool {
	open := strings.LastIndexByte(text, '(')
	if open < 0 {
		return false
	}
	inside := text[open+1 : len(text)-1]
	return inside != "" && strings.Trim(inside, "0123456789.,+-±*jeE ") == ""
}

// bound are the names that the statement binds, as far as it has been written:
// the parameters of its head and the variables of its ranges.
func (c cursor) bound() []string {
	var out []string
	head, _, found := strings.Cut(c.lastLine(), "=")
	if open := strings.IndexByte(head, '('); found && open > 0 {
		inside, _, _ := strings.Cut(head[open+1:], ")")
		out = strings.FieldsFunc(inside, func(r rune) bool { return r == ',' || r == ' ' })
	}
	words := strings.FieldsFunc(c.line, func(r rune) bool { return !nameRune(r) })
	for i, w := range words {
		if w == "for" && i+2 < len(words) && words[i+2] == "from" {
			out = append(out, words[i+1])
		}
	}
	return out
}
