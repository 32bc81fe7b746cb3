package lang

import (
	"strings"
	"unicode"
	"unicode/utf8"
)

// This file lays calculation out. Nothing but blanks and tabs between the
// parts of a statement, before it and after it is ever changed.

// Tidy gives the edits that lay a note's calculation out: statements start in
// the fifth column, what belongs to a medium four columns deeper; one blank
// stands on either side of `=`; `=`, `for` and `per` of definitions on
// neighbouring lines stand below one another. Prose, numbers, names, the inside
// of formulas and of table rows, and every statement with a fault of syntax
// stay as they are. The edits are few and small, sorted by place, and replace
// blanks by blanks; where there are none the note is tidy.
func Tidy(s *Script) []Edit {
	text := s.Source.Text
	for _, step := range []func(*tidying){(*tidying).indent, (*tidying).equals, (*tidying).ranges, (*tidying).sources} {
		next := settle(text, step)
		if !sameStatements(s, Read(next, nil)) {
			return nil // would be read differently: better untidy than wrong
		}
		text = next
	}
	return blankEdits(s.Source.Text, text)
}

// settle repeats a step until it changes nothing: lines that came near enough
// to each other are aligned with each other next.
func settle(text string, step func(*tidying)) string {
	for range 8 {
		l := &tidying{script: Read(text, nil)}
		step(l)
		next := l.applied()
		if next == text {
			break
		}
		text = next
	}
	return text
}

// tidying collects the changes of one step.
type tidying struct {
	script *Script
	edits  []Edit
}

// applied is the text with the changes made.
func (l *tidying) applied() string {
	var b strings.Builder
	text, at := l.script.Source.Text, 0
	for _, e := range l.edits {
		b.WriteString(text[at:e.Span.Start])
		b.WriteString(e.New)
		at = e.Span.End
	}
	b.WriteString(text[at:])
	return b.String()
}

// gap makes the blanks at the span as wide as wanted.
func (l *tidying) gap(at Span, width int) {
	if l.script.Source.Text[at.Start:at.End] != strings.Repeat(" ", width) {
		l.edits = append(l.edits, Edit{Span: at, New: strings.Repeat(" ", width)})
	}
}

// stepIndent is how much deeper a statement stands than prose, and a property
// than its medium.
const stepIndent = 4

// indent moves statements to their column, and drops blanks at line ends.
// Where one between two paragraphs of prose is faulty, all of them stay: it
// might be read as the continuation of its neighbour.
func (l *tidying) indent() {
	s := l.script
	faulty := map[int]bool{}
	for _, st := range s.Stmts {
		if len(st.Faults) > 0 {
			faulty[l.passage(st)] = true
		}
	}
	for _, st := range s.Stmts {
		if !faulty[l.passage(st)] {
			l.indentStatement(st)
		}
	}
}

// passage numbers the stretches of calculation between prose.
func (l *tidying) passage(st *Stmt) int {
	line, n := l.script.Source.Line(st.At), 0
	for n < len(l.script.Prose) && l.script.Prose[n] < line {
		n++
	}
	return n
}

func (l *tidying) indentStatement(st *Stmt) {
	src := l.script.Source
	first, last := src.Line(st.At), src.Line(max(st.At, st.At+len(st.Text)-1))
	properties := map[int]bool{}
	if m, ok := st.Tree.(*Medium); ok {
		for _, p := range m.Properties {
			properties[src.Line(st.Abs(p).Start)] = true
		}
	}
	was, now := 0, stepIndent
	for n := first; n <= last; n++ {
		lead, width, content := l.line(n)
		switch {
		case content == "" || strings.HasPrefix(content, "#"):
			continue
		case n == first:
			was, now = width, stepIndent
		case properties[n]:
			was, now = width, 2*stepIndent
		}
		l.gap(lead, max(now, width-was+now))
		if end := src.LineSpan(n).End; n < last || st.At+len(st.Text) == end-trailing(src.Text[lead.End:end]) {
			l.gap(Span{end - trailing(src.Text[lead.End:end]), end}, 0)
		}
	}
}

// line gives the blanks before a line, their width in columns, and the rest.
func (l *tidying) line(n int) (lead Span, width int, content string) {
	span := l.script.Source.LineSpan(n)
	if n == 0 && strings.HasPrefix(l.script.Source.Text, bom) {
		span.Start = min(len(bom), span.End)
	}
	text := l.script.Source.Text[span.Start:span.End]
	k := leading(text)
	return Span{span.Start, span.Start + k}, columns(text[:k]), strings.TrimRight(text[k:], " \t")
}

// trailing is the number of blanks and tabs at the end.
func trailing(text string) int { return len(text) - len(strings.TrimRight(text, " \t")) }

// reach is how much farther right than another a part may be driven: a line
// with a longer head stands out of line instead of pushing all the others away.
const reach = 24

// aligned is a gap that ends before the part to be aligned.
type aligned struct {
	gap    Span
	line   int
	indent int
	need   int // column, from the start of the statement, at which the part could stand
	is     int // column at which it stands
}

// align brings the parts on neighbouring lines of the same depth below one
// another: to the rightmost column at which one of them stands or must stand.
func (l *tidying) align(parts []aligned) {
	for len(parts) > 0 {
		n := 1
		for n < len(parts) && parts[n].line == parts[n-1].line+1 && parts[n].indent == parts[0].indent {
			n++
		}
		l.alignBlock(parts[:n])
		parts = parts[n:]
	}
}

func (l *tidying) alignBlock(block []aligned) {
	nearest := block[0].is
	for _, p := range block {
		nearest = min(nearest, max(p.is, p.need))
	}
	column := 0
	for _, p := range block {
		if p.need <= nearest+reach {
			column = max(column, p.need, min(p.is, nearest+reach))
		}
	}
	for _, p := range block {
		to := column
		if p.need > nearest+reach {
			to = p.need
		}
		l.gap(p.gap, to-p.is+width(l.script.Source.Text[p.gap.Start:p.gap.End]))
	}
}

// equals lays the signs of equality of definitions out.
func (l *tidying) equals() {
	var heads []aligned
	var rest []Span
	for _, d := range l.definitions() {
		at, ok := l.equal(d)
		if !ok {
			continue
		}
		start := d.st.Abs(d.def).Start
		from := width(l.script.Source.Text[start:at.Start])
		is := width(l.script.Source.Text[start:at.End])
		heads = append(heads, aligned{gap: at, line: d.line, indent: d.indent, need: from + 1, is: is})
		rest = append(rest, l.around(d, at.End)...)
	}
	l.align(heads)
	for _, gap := range rest {
		l.gap(gap, 1)
	}
	l.hold()
	sortEdits(l.edits)
}

// hold keeps the clauses of a line where they stand, as far as there is room,
// when what is before them moves.
func (l *tidying) hold() {
	moved := map[int]int{} // columns by line
	for _, e := range l.edits {
		moved[l.script.Source.Line(e.Span.Start)] += len(e.New) - width(l.script.Source.Text[e.Span.Start:e.Span.End])
	}
	for _, c := range l.clauses() {
		gap := c.ranged
		if gap.End == 0 {
			gap = c.source
		}
		if by := moved[c.line]; by != 0 {
			l.gap(gap, max(2, width(l.script.Source.Text[gap.Start:gap.End])-by))
		}
	}
}

// equal finds the blanks before the first `=` of a definition.
func (l *tidying) equal(d defined) (Span, bool) {
	text := l.script.Source.Text
	head := d.st.Abs(d.def).Start
	first := d.st.Abs(d.def.Members[0]).Start
	at := strings.LastIndexByte(text[head:first], '=') + head
	if at < head || strings.TrimLeft(text[at+1:first], " \t") != "" {
		return Span{}, false // something stands between: a line end, a parenthesis
	}
	gap := Span{at - trailing(text[head:at]), at}
	return gap, !strings.ContainsAny(text[head:at], "\n\r#")
}

// around gives the blanks beside the signs of equality, but for those before
// the first.
func (l *tidying) around(d defined, first int) []Span {
	text := l.script.Source.Text
	from := first + 1
	out := []Span{{from, from + leading(text[from:])}}
	for i := 1; i < len(d.def.Members); i++ {
		a, b := d.st.Abs(d.def.Members[i-1]).End, d.st.Abs(d.def.Members[i]).Start
		at := strings.IndexByte(text[a:b], '=') + a
		if at < a || strings.ContainsAny(text[a:b], "\n\r#") || strings.Trim(text[a:b], " \t=") != "" {
			continue
		}
		out = append(out, Span{a, at}, Span{at + 1, b})
	}
	return out
}

// ranges lays out the `for` clauses.
func (l *tidying) ranges() {
	var parts []aligned
	for _, c := range l.clauses() {
		if c.ranged.End > 0 {
			parts = append(parts, l.clause(c, c.ranged))
		}
	}
	l.align(parts)
}

// sources lays out the `per` clauses.
func (l *tidying) sources() {
	var parts []aligned
	for _, c := range l.clauses() {
		if c.source.End > 0 {
			parts = append(parts, l.clause(c, c.source))
		}
	}
	l.align(parts)
}

func (l *tidying) clause(c claused, gap Span) aligned {
	text := l.script.Source.Text
	return aligned{gap: gap, line: c.line, indent: c.indent, need: width(text[c.start:gap.Start]) + 2, is: width(text[c.start:gap.End])}
}

// width is the number of columns that a text takes: combining marks take none.
func width(text string) int {
	n := 0
	for _, r := range text {
		if r == '\t' {
			n += stepIndent - n%stepIndent
		} else if !unicode.In(r, unicode.Mn, unicode.Me) {
			n++
		}
	}
	return n
}

// sameStatements reports whether two readings say the same.
func sameStatements(a, b *Script) bool {
	if len(a.Stmts) != len(b.Stmts) || len(a.Prose) != len(b.Prose) {
		return false
	}
	for i, s := range a.Stmts {
		t := b.Stmts[i]
		if len(s.Faults) != len(t.Faults) || Print(s.Tree) != Print(t.Tree) {
			return false
		}
	}
	return true
}

// blankEdits turns one text into another that differs from it in blanks and
// tabs alone; nil where something else differs.
func blankEdits(from, to string) []Edit {
	var out []Edit
	i, j := 0, 0
	for i < len(from) || j < len(to) {
		m, n := leading(from[i:]), leading(to[j:])
		if from[i:i+m] != to[j:j+n] {
			out = append(out, Edit{Span: Span{i, i + m}, New: to[j : j+n]})
		}
		i, j = i+m, j+n
		if i == len(from) || j == len(to) {
			break
		}
		_, size := utf8.DecodeRuneInString(from[i:])
		if !strings.HasPrefix(to[j:], from[i:i+size]) {
			return nil
		}
		i, j = i+size, j+size
	}
	if i < len(from) || j < len(to) {
		return nil
	}
	return out
}
