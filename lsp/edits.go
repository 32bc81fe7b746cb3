package lsp

import (
	"cmp"
	"slices"

	"go.lsp.dev/protocol"
	"go.lsp.dev/uri"

	"inkjoule/lang"
)

// workspaceEdit edits several notes. Where the client can, each edit names the
// version that it was made for, so that it is not applied to another text.
func (v *view) workspaceEdit(all map[*snapshot][]lang.Edit) *protocol.WorkspaceEdit {
	docs := make([]*snapshot, 0, len(all))
	for doc := range all {
		docs = append(docs, doc)
	}
	slices.SortFunc(docs, func(a, b *snapshot) int { return cmp.Compare(a.uri, b.uri) })
	out := &protocol.WorkspaceEdit{}
	if !v.client.can("workspace.workspaceEdit.documentChanges") {
		out.Changes = map[uri.URI][]protocol.TextEdit{}
		for _, doc := range docs {
			out.Changes[doc.uri] = textEdits(doc, all[doc])
		}
		return out
	}
	for _, doc := range docs {
		out.DocumentChanges = append(out.DocumentChanges, versioned(doc, all[doc]))
	}
	return out
}

// versioned gives the edits of one note with its version; a note of the disk
// has none.
func versioned(doc *snapshot, edits []lang.Edit) *protocol.TextDocumentEdit {
	out := &protocol.TextDocumentEdit{}
	out.TextDocument.URI = doc.uri
	if doc.open {
		out.TextDocument.Version = ptr(doc.version)
	}
	for _, e := range textEdits(doc, edits) {
		out.Edits = append(out.Edits, &e)
	}
	return out
}

// textEdits converts edits in the order of the text.
func textEdits(doc *snapshot, edits []lang.Edit) []protocol.TextEdit {
	edits = slices.Clone(edits)
	slices.SortFunc(edits, func(a, b lang.Edit) int { return cmp.Compare(a.Span.Start, b.Span.Start) })
	at := doc.mapper().ascending()
	out := make([]protocol.TextEdit, len(edits))
	for i, e := range edits {
		out[i] = textEdit(at, e)
	}
	return out
}
