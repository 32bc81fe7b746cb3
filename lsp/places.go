package lsp

import (
	"path/filepath"

	"go.lsp.dev/protocol"
	"go.lsp.dev/uri"

	"inkjoule/lang"
)

// place gives the location of a span of a note that s refers to; "" is s
// itself. It is false for a note that has no file, as those of the handbook.
func (v *view) place(s *snapshot, path string, span lang.Span) (protocol.Location, bool) {
	if path == "" || path == s.path {
		return protocol.Location{URI: s.uri, Range: s.mapper().SpanToRange(span)}, true
	}
	other, ok := v.sibling(s, path)
	if !ok {
		return protocol.Location{}, false
	}
	return protocol.Location{URI: other.uri, Range: other.mapper().SpanToRange(span)}, true
}

// sibling is the note at a path of s's folder, as the editor has it, else as
// the disk has it.
func (v *view) sibling(s *snapshot, path string) (*snapshot, bool) {
	root, _ := v.locate(s.uri)
	if root == "" {
		return nil, false
	}
	u := uri.File(filepath.Join(root, filepath.FromSlash(path)))
	if doc := v.docs[u]; doc != nil {
		return doc, true
	}
	text, err := v.disk.read(root, path)
	if err != nil {
		return nil, false
	}
	return v.snap(u, lang.NewSource(text)), true
}

// page is the address of a rule's documentation, "" if there is none.
func (v *view) page(rule string) uri.URI {
	if v.pages == "" {
		return ""
	}
	return uri.URI(v.pages + rule)
}
