package report

import (
	"strings"
	"unicode"
	"unicode/utf8"

	"inkjoule/lang"
)

// widest is the number of columns of a source line that is shown; a longer
// line is cut around the mark.
const widest = 160

// Excerpt gives the source line of a place, without its indentation, and a
// line of carets that marks the place under it in a font of fixed width. A
// place that goes over several lines is marked to the end of the first.
func Excerpt(src *lang.Source, at lang.Span) (code, marks string) {
	line := src.LineSpan(src.Line(min(max(at.Start, 0), len(src.Text))))
	start := min(max(at.Start, line.Start), line.End)
	end := min(max(at.End, start), line.End)
	r := &ruler{}
	r.write(strings.TrimPrefix(src.Text[line.Start:start], "\ufeff"))
	from := r.column
	r.write(src.Text[start:end])
	to := max(r.column, from+1)
	r.write(src.Text[end:line.End])
	return r.cut(from, to)
}

// ruler lays text out in columns.
type ruler struct {
	cells  []cell
	column int
}

// cell is a visible character with the column at which it begins.
type cell struct {
	column int
	text   string
}

// write lays out a text; a tab reaches the next multiple of four, as in the
// language.
func (r *ruler) write(s string) {
	for i := 0; i < len(s); {
		c, n := utf8.DecodeRuneInString(s[i:])
		i += n
		if c == '\t' {
			for ok := true; ok; ok = r.column%4 != 0 {
				r.put(' ', 1)
			}
			continue
		}
		c = visible(c)
		r.put(c, width(c))
	}
}

func (r *ruler) put(c rune, columns int) {
	r.cells = append(r.cells, cell{r.column, string(c)})
	r.column += columns
}

// cut drops the indentation and, of a long line, what is far from the mark.
func (r *ruler) cut(from, to int) (code, marks string) {
	first := 0
	for first < len(r.cells) && r.cells[first].text == " " && r.cells[first].column < from {
		first++
	}
	left := r.start(first)
	if from-left > widest*3/4 {
		left = from - widest/4
	}
	right := left + widest
	var b strings.Builder
	if left > r.start(first) {
		b.WriteString("…")
		left++
	}
	for _, c := range r.cells[first:] {
		if c.column >= right {
			b.WriteString("…")
			break
		}
		if c.column >= left {
			b.WriteString(c.text)
		}
	}
	pad := from - left
	if strings.HasPrefix(b.String(), "…") {
		pad++
	}
	return strings.TrimRight(b.String(), " "), strings.Repeat(" ", max(pad, 0)) + strings.Repeat("^", min(to, right)-from)
}

func (r *ruler) start(i int) int {
	if i < len(r.cells) {
		return r.cells[i].column
	}
	return r.column
}

// clean makes a text safe for a terminal: what could steer it is replaced.
func clean(s string) string {
	return strings.Map(func(c rune) rune {
		if c == '\t' {
			return ' '
		}
		return visible(c)
	}, s)
}

// visible replaces control characters, marks that turn the direction of
// writing, and bytes that are no text.
func visible(c rune) rune {
	switch {
	case unicode.IsControl(c), c >= 0x202a && c <= 0x202e, c >= 0x2066 && c <= 0x2069, c == 0x200e, c == 0x200f, c == 0x2028, c == 0x2029:
		return utf8.RuneError
	}
	return c
}

// wide are the blocks whose characters fill two columns (from Unicode Standard
// Annex 11, the common ones; from memory).
var wide = &unicode.RangeTable{
	R16: []unicode.Range16{
		{Lo: 0x1100, Hi: 0x115f, Stride: 1}, {Lo: 0x2e80, Hi: 0x303e, Stride: 1}, {Lo: 0x3041, Hi: 0x33ff, Stride: 1},
		{Lo: 0x3400, Hi: 0x4dbf, Stride: 1}, {Lo: 0x4e00, Hi: 0x9fff, Stride: 1}, {Lo: 0xa000, Hi: 0xa4cf, Stride: 1},
		{Lo: 0xac00, Hi: 0xd7a3, Stride: 1}, {Lo: 0xf900, Hi: 0xfaff, Stride: 1}, {Lo: 0xfe30, Hi: 0xfe6f, Stride: 1},
		{Lo: 0xff00, Hi: 0xff60, Stride: 1}, {Lo: 0xffe0, Hi: 0xffe6, Stride: 1},
	},
	R32: []unicode.Range32{{Lo: 0x1f300, Hi: 0x1f64f, Stride: 1}, {Lo: 0x1f900, Hi: 0x1f9ff, Stride: 1}, {Lo: 0x20000, Hi: 0x3fffd, Stride: 1}},
}

// width is the number of columns of a character.
func width(c rune) int {
	switch {
	case c < 0x300:
		return 1
	case unicode.In(c, unicode.Mn, unicode.Me, unicode.Cf):
		return 0
	case unicode.Is(wide, c):
		return 2
	}
	return 1
}
