package lsp

import (
	"strings"

	"go.lsp.dev/jsonrpc2"
	"go.lsp.dev/protocol"
	"go.lsp.dev/uri"

	"inkjoule/check/project"
	"inkjoule/lang"
)

// place gives the location of a span of a note that s refers to; "" is s
// itself. It is false for a note that has no file, as those of the handbook.
func (v *view) place(s *snapshot, path string, span lang.Span) (protocol.Location, bool) {
	other := s
	if path != "" && path != s.home.path {
		var err error
		if other, err = v.sibling(s, path); err != nil {
			return protocol.Location{}, false
		}
	}
	return protocol.Location{URI: other.uri, Range: other.mapper().SpanToRange(span)}, true
}

// sibling is the note at a path of the same work, as the editor has it, else as
// the disk has it.
func (v *view) sibling(s *snapshot, path string) (*snapshot, error) {
	if s.home.root == "" {
		return nil, errNoFile
	}
	return v.note(uri.File(s.home.file(path)))
}

// note is an open document, or else a note of the disk as it is now.
func (v *view) note(u uri.URI) (*snapshot, error) {
	if doc := v.docs[u]; doc != nil {
		return doc, nil
	}
	at := homeOf(u)
	if at.root == "" {
		return nil, errNoFile
	}
	text, err := project.ReadFile(at.file(at.path))
	if err != nil {
		return nil, jsonrpc2.Errorf(jsonrpc2.InvalidParams, "%v", err)
	}
	// Editors do not count the byte order mark as a character.
	return v.snap(u, at, lang.NewSource(strings.TrimPrefix(text, bom))), nil
}

// bom is the UTF-8 byte order mark.
const bom = "\ufeff"

var errNoFile = jsonrpc2.NewError(jsonrpc2.InvalidParams, "the note is neither open nor a file of this machine")

// page is the address of a rule's documentation, "" if there is none.
func (v *view) page(rule string) uri.URI {
	if v.pages == "" {
		return ""
	}
	return uri.URI(v.pages + rule)
}
