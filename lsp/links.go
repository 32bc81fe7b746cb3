package lsp

import (
	"context"
	"path"
	"strings"

	"go.lsp.dev/protocol"
	"go.lsp.dev/uri"

	"inkjoule/lang"
	"inkjoule/lang/media"
)

// links open the files that a note refers to. Only paths are links: names have
// their definition.
func links() feature {
	return feature{
		offer: func(_ *client, to *protocol.ServerCapabilities) {
			to.DocumentLinkProvider = &protocol.DocumentLinkOptions{}
		},
		methods: map[string]method{protocol.MethodTextDocumentDocumentLink: request(documentLinks)},
	}
}

func documentLinks(ctx context.Context, v *view, p *protocol.DocumentLinkParams) (any, error) {
	s, err := v.whole(ctx, p.TextDocument.URI)
	if err != nil {
		return nil, err
	}
	out := []protocol.DocumentLink{}
	if s.doc.home.root == "" {
		return out, nil
	}
	at := s.doc.mapper().ascending()
	for _, stmt := range s.note.Script.Stmts {
		q := pathIn(stmt.Tree)
		if q == nil || strings.HasPrefix(q.Text, media.Prefix) {
			continue
		}
		target := uri.File(s.doc.home.file(path.Join(path.Dir(s.doc.home.path), q.Text)))
		out = append(out, protocol.DocumentLink{Range: at.SpanToRange(inQuotes(stmt.Abs(q))), Target: &target, Tooltip: ptr("Open " + q.Text)})
	}
	return out, nil
}

// pathIn is the path that a statement names, or nil.
func pathIn(t lang.Statement) *lang.Quote {
	switch n := t.(type) {
	case *lang.Uses:
		return &n.Path
	case *lang.Table:
		return n.File
	}
	return nil
}

// inQuotes is a quotation without its quotes.
func inQuotes(s lang.Span) lang.Span {
	if s.Len() >= 2 {
		return lang.Span{Start: s.Start + 1, End: s.End - 1}
	}
	return s
}
