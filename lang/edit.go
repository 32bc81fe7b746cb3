package lang

import (
	"slices"
	"sort"
)

// Replace returns the source with the text at the span replaced. Only the
// lines that the edit touches are indexed again.
func (s *Source) Replace(at Span, text string) *Source {
	out := &Source{Text: s.Text[:at.Start] + text + s.Text[at.End:]}
	// The byte before the edit may be a CR whose line end the edit changes, and
	// so may the byte after it; lines that begin outside of those stay.
	kept := sort.Search(len(s.lines), func(i int) bool { return s.lines[i] >= at.Start })
	rest := sort.Search(len(s.lines), func(i int) bool { return s.lines[i] > at.End+1 })
	delta := len(text) - at.Len()
	from := max(0, at.Start-1)
	to := min(len(out.Text), at.End+delta+1)
	out.lines = slices.Grow(append([]int(nil), s.lines[:max(kept, 1)]...), len(s.lines)-rest)
	for i := from; i < to; i++ {
		if endsLine(out.Text, i) && i+1 > out.lines[len(out.lines)-1] {
			out.lines = append(out.lines, i+1)
		}
	}
	for _, line := range s.lines[rest:] {
		out.lines = append(out.lines, line+delta)
	}
	return out
}

// endsLine reports whether a line ends with the byte at i: LF, or CR that is
// not followed by LF.
func endsLine(text string, i int) bool {
	return text[i] == '\n' || text[i] == '\r' && (i+1 == len(text) || text[i+1] != '\n')
}
