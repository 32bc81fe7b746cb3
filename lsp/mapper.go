package lsp

import (
	"unicode/utf16"
	"unicode/utf8"

	"go.lsp.dev/protocol"

	"inkjoule/lang"
)

// encoding is the unit in which the client counts columns.
type encoding uint8

const (
	utf16Units encoding = iota // the protocol's default
	utf8Bytes
	utf32Points
)

// mapper converts between byte offsets and the client's positions. It is the
// only place where columns are counted.
type mapper struct {
	src  *lang.Source
	enc  encoding
	last *mark // the latest offset converted; nil where conversions are not in order
}

// mark remembers how far a line has been counted, so that a run of ascending
// offsets on one long line costs its length once.
type mark struct{ start, offset, column int }

func newMapper(src *lang.Source, enc encoding) mapper { return mapper{src: src, enc: enc} }

// ascending returns a mapper for a run of mostly ascending offsets. It must
// not be shared between goroutines.
func (m mapper) ascending() mapper {
	m.last = &mark{start: -1}
	return m
}

// OffsetToPosition gives the position of an offset, which is clamped to the
// text. An offset inside a line end or a code point is moved to its start.
func (m mapper) OffsetToPosition(offset int) protocol.Position {
	offset = max(0, min(offset, len(m.src.Text)))
	line := m.src.Line(offset)
	span := m.src.LineSpan(line)
	return protocol.Position{
		Line:      uint32(line),
		Character: uint32(m.column(span.Start, min(offset, span.End))),
	}
}

// SpanToRange gives the range of a span.
func (m mapper) SpanToRange(s lang.Span) protocol.Range {
	return protocol.Range{Start: m.OffsetToPosition(s.Start), End: m.OffsetToPosition(max(s.Start, s.End))}
}

// PositionToOffset gives the offset of a position. A column beyond the end of
// its line means the end of the line, a line beyond the last the end of the
// text; a column inside a code point means the start of that.
func (m mapper) PositionToOffset(p protocol.Position) int {
	if int64(p.Line) >= int64(m.src.Lines()) {
		return len(m.src.Text)
	}
	span := m.src.LineSpan(int(p.Line))
	text := m.src.Text[span.Start:span.End]
	if m.enc == utf8Bytes {
		at := int(min(int64(p.Character), int64(len(text))))
		return span.Start + wholeRune(text, at)
	}
	want := int64(p.Character)
	for i, r := range text {
		if want -= int64(m.width(r)); want < 0 {
			return span.Start + i
		}
	}
	return span.End
}

// RangeToSpan gives the span of a range; one that runs backwards is turned.
func (m mapper) RangeToSpan(r protocol.Range) lang.Span {
	a, b := m.PositionToOffset(r.Start), m.PositionToOffset(r.End)
	return lang.Span{Start: min(a, b), End: max(a, b)}
}

// column counts the units from the start of a line to an offset in it.
func (m mapper) column(start, offset int) int {
	if m.enc == utf8Bytes {
		return wholeRune(m.src.Text[start:], offset-start)
	}
	from, n := start, 0
	if m.last != nil && m.last.start == start && m.last.offset <= offset {
		from, n = m.last.offset, m.last.column
	}
	for from < offset {
		r, size := utf8.DecodeRuneInString(m.src.Text[from:])
		if from+size > offset {
			break
		}
		from, n = from+size, n+m.width(r)
	}
	if m.last != nil {
		*m.last = mark{start, from, n}
	}
	return n
}

// width is the number of units of a code point; an invalid byte is one unit,
// as the replacement character that stands for it.
func (m mapper) width(r rune) int {
	if m.enc == utf32Points {
		return 1
	}
	return max(1, utf16.RuneLen(r))
}

// wholeRune moves an offset in text back to the start of its code point.
func wholeRune(text string, at int) int {
	for i := at; i > 0 && i > at-utf8.UTFMax && i < len(text); i-- {
		if utf8.RuneStart(text[i]) {
			if _, size := utf8.DecodeRuneInString(text[i:]); i+size > at {
				return i
			}
			return at
		}
	}
	return at
}
