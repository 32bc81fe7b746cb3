package lsp

import (
	"context"
	"slices"

	"go.lsp.dev/protocol"

	"inkjoule/lang"
)

// selection grows a selection from a word over the formula and the statement to
// the note.
func selection() feature {
	return feature{
		offer: func(_ *client, to *protocol.ServerCapabilities) {
			to.SelectionRangeProvider = &protocol.SelectionRangeOptions{}
		},
		methods: map[string]method{protocol.MethodTextDocumentSelectionRange: request(selectRanges)},
	}
}

// selectRanges answers every position with one nest of ranges.
func selectRanges(ctx context.Context, v *view, p *protocol.SelectionRangeParams) (any, error) {
	s, err := v.whole(ctx, p.TextDocument.URI)
	if err != nil {
		return nil, err
	}
	m := s.doc.mapper()
	out := []protocol.SelectionRange{}
	for _, pos := range p.Positions {
		s.at = m.PositionToOffset(pos)
		var nest *protocol.SelectionRange
		for _, span := range s.nest() {
			nest = &protocol.SelectionRange{Range: m.SpanToRange(span), Parent: nest}
		}
		out = append(out, *nest)
	}
	return out, nil
}

// nest lists the spans around the spot, from the note inwards; each lies in
// the one before and is smaller.
func (s *spot) nest() []lang.Span {
	src := s.note.Script.Source
	line := src.LineSpan(src.Line(s.at))
	spans := []lang.Span{{Start: 0, End: len(src.Text)}, s.paragraph()}
	if stmt := s.stmt(); stmt != nil {
		spans = append(spans, lang.Span{Start: stmt.At, End: stmt.At + len(stmt.Text)}, line)
		for _, t := range s.path() {
			spans = append(spans, stmt.Abs(t))
		}
	} else {
		spans = append(spans, line)
	}
	spans = append(spans, s.word(), lang.Span{Start: s.at, End: s.at})
	// What does not lie in all that is around it would confuse the editor.
	out := spans[:1]
	for _, span := range spans[1:] {
		around := out[len(out)-1]
		if span != around && around.Start <= span.Start && span.End <= around.End && span.Contains(s.at) {
			out = append(out, span)
		}
	}
	return slices.Clip(out)
}

// paragraph is the run of lines around the spot that are not blank.
func (s *spot) paragraph() lang.Span {
	src := s.note.Script.Source
	first := src.Line(s.at)
	last := first
	for first > 0 && lastFilled(src, first) == first-1 {
		first--
	}
	for last+1 < src.Lines() && lastFilled(src, last+2) == last+1 {
		last++
	}
	return lang.Span{Start: src.LineSpan(first).Start, End: src.LineSpan(last).End}
}

// word is the name or word at the spot.
func (s *spot) word() lang.Span {
	text := s.note.Script.Source.Text
	start := wordStart(text[:s.at])
	end := s.at
	for _, r := range text[s.at:] {
		if !nameRune(r) {
			break
		}
		end += len(string(r))
	}
	return lang.Span{Start: start, End: end}
}
