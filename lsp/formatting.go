package lsp

import (
	"context"

	"go.lsp.dev/protocol"

	"inkjoule/lang"
)

// formatting lays calculation out as `inkjoule tidy` does, by the fewest edits.
func formatting() feature {
	return feature{
		offer: func(_ *client, to *protocol.ServerCapabilities) {
			to.DocumentFormattingProvider = protocol.Boolean(true)
			to.DocumentRangeFormattingProvider = protocol.Boolean(true)
		},
		methods: map[string]method{
			protocol.MethodTextDocumentFormatting:      request(format),
			protocol.MethodTextDocumentRangeFormatting: request(formatRange),
		},
	}
}

func format(ctx context.Context, v *view, p *protocol.DocumentFormattingParams) (any, error) {
	s, err := v.whole(ctx, p.TextDocument.URI)
	if err != nil {
		return nil, err
	}
	return s.tidied(lang.Span{End: len(s.note.Script.Source.Text)}), nil
}

func formatRange(ctx context.Context, v *view, p *protocol.DocumentRangeFormattingParams) (any, error) {
	s, err := v.whole(ctx, p.TextDocument.URI)
	if err != nil {
		return nil, err
	}
	return s.tidied(s.doc.mapper().RangeToSpan(p.Range)), nil
}

// tidied gives the edits that tidy the statements which the span touches.
func (s *spot) tidied(within lang.Span) []protocol.TextEdit {
	out := []protocol.TextEdit{}
	src := s.note.Script.Source
	lines := lang.Span{Start: src.LineSpan(src.Line(within.Start)).Start, End: src.LineSpan(src.Line(within.End)).End}
	at := s.doc.mapper().ascending()
	for _, e := range lang.Tidy(s.note.Script) {
		if lines.Contains(e.Span.Start) && lines.Contains(e.Span.End) {
			out = append(out, textEdit(at, e))
		}
	}
	return out
}
