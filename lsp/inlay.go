package lsp

import (
	"context"

	"go.lsp.dev/protocol"

	"inkjoule/lang"
)

// inlayHints show the value of each definition that does not state it, and the
// value that a blank asks for. On a stated result there is nothing to show.
func inlayHints() feature {
	return feature{
		offer: func(_ *client, to *protocol.ServerCapabilities) {
			to.InlayHintProvider = &protocol.InlayHintOptions{}
		},
		methods: map[string]method{protocol.MethodTextDocumentInlayHint: request(inlay)},
	}
}

func inlay(ctx context.Context, v *view, p *protocol.InlayHintParams) (any, error) {
	s, err := v.whole(ctx, p.TextDocument.URI)
	if err != nil {
		return nil, err
	}
	within := s.doc.mapper().RangeToSpan(p.Range)
	at := s.doc.mapper().ascending()
	hints := []protocol.InlayHint{}
	for _, sym := range s.note.Symbols {
		h, ok := s.hint(sym)
		if ok && within.Contains(h.at) && v.settings.shows(h) {
			hints = append(hints, h.show(at))
		}
	}
	return hints, nil
}

// hint is a value that stands beside the text but not in it.
type hint struct {
	at    int       // note offset where it is shown
	value string    // as shown
	write lang.Edit // writes it into the note
	asked bool      // a blank asks for it
}

// hint gives the value that a name's definition leaves to be computed.
func (s *spot) hint(sym *lang.Symbol) (hint, bool) {
	if sym.Def == nil || sym.Stmt == nil || !sym.Known || sym.Stated || sym.Shown == "" {
		return hint{}, false
	}
	if sym.Asked != nil {
		blank := sym.Stmt.Abs(sym.Asked)
		return hint{at: blank.End, value: sym.Shown, write: lang.Edit{Span: blank, New: sym.Shown}, asked: true}, true
	}
	if sym.Input || len(sym.Def.Members) == 0 {
		return hint{}, false
	}
	// Shown after the whole statement, where it moves nothing that follows;
	// written after the formula, where a stated result belongs.
	chain := sym.Stmt.Abs(sym.Def.Members[len(sym.Def.Members)-1]).End
	return hint{
		at: sym.Stmt.Abs(sym.Def).End, value: "= " + sym.Shown,
		write: lang.Edit{Span: lang.Span{Start: chain, End: chain}, New: " = " + sym.Shown},
	}, true
}

func (h hint) show(at mapper) protocol.InlayHint {
	return protocol.InlayHint{
		Position:    at.OffsetToPosition(h.at),
		Label:       protocol.String(h.value),
		PaddingLeft: ptr(true),
		TextEdits:   []protocol.TextEdit{textEdit(at, h.write)},
	}
}

// textEdit is an edit as the protocol has it.
func textEdit(at mapper, e lang.Edit) protocol.TextEdit {
	return protocol.TextEdit{Range: at.SpanToRange(e.Span), NewText: e.New}
}
