package lsp

import (
	"fmt"

	"go.lsp.dev/jsonrpc2"
	"go.lsp.dev/protocol"
	"go.lsp.dev/uri"

	"inkjoule/lang"
)

// textSync keeps the open documents as the editor has them.
func textSync() feature {
	return feature{
		offer: func(_ *client, to *protocol.ServerCapabilities) {
			to.TextDocumentSync = &protocol.TextDocumentSyncOptions{
				OpenClose: ptr(true),
				Change:    ptr(protocol.TextDocumentSyncKindIncremental),
				// The text that comes with a save shows whether both sides still
				// have the same one.
				Save: &protocol.SaveOptions{IncludeText: ptr(true)},
			}
		},
		events: map[string]event{
			protocol.MethodTextDocumentDidOpen:   on(didOpen),
			protocol.MethodTextDocumentDidChange: on(didChange),
			protocol.MethodTextDocumentDidSave:   on(didSave),
			protocol.MethodTextDocumentDidClose:  on(didClose),
		},
	}
}

// on makes an event of a function.
func on[P any](f func(s *session, p *P) error) event {
	return func(s *session, raw jsonrpc2.RawMessage) error {
		p := new(P)
		if err := decode(raw, p); err != nil {
			return err
		}
		return f(s, p)
	}
}

func ptr[T any](v T) *T { return &v }

func didOpen(s *session, p *protocol.DidOpenTextDocumentParams) error {
	doc := p.TextDocument
	s.replace(doc.URI, doc.Version, func(*snapshot) (*lang.Source, error) { return lang.NewSource(doc.Text), nil })
	return nil
}

// edits is DidChangeTextDocumentParams. The protocol's own type would take a
// change with an unreadable range for the whole text.
type edits struct {
	TextDocument protocol.VersionedTextDocumentIdentifier `json:"textDocument"`
	Changes      []edit                                   `json:"contentChanges"`
}

type edit struct {
	Range *protocol.Range `json:"range"` // nil: Text is the whole text
	Text  string          `json:"text"`
}

func didChange(s *session, p *edits) error {
	doc := p.TextDocument
	return s.replace(doc.URI, doc.Version, func(old *snapshot) (*lang.Source, error) {
		if old == nil {
			return nil, fmt.Errorf("%s was changed but is not open", doc.URI)
		}
		return apply(old.src, old.enc, p.Changes), nil
	})
}

// apply makes the edits in order; each counts in the text that the one before
// has left.
func apply(src *lang.Source, enc encoding, edits []edit) *lang.Source {
	for _, e := range edits {
		if e.Range == nil {
			src = lang.NewSource(e.Text)
			continue
		}
		src = src.Replace(newMapper(src, enc).RangeToSpan(*e.Range), e.Text)
	}
	return src
}

// didSave compares the saved text with ours and takes it where they differ,
// which would mean that an edit was lost on one side.
func didSave(s *session, p *protocol.DidSaveTextDocumentParams) error {
	old := s.now().docs[p.TextDocument.URI]
	if old == nil || p.Text == nil || *p.Text == old.src.Text || bom+old.src.Text == *p.Text {
		return nil
	}
	s.log.Error("the saved text differs from the edited one; taking it", "uri", string(old.uri), "version", old.version)
	text := *p.Text
	return s.replace(old.uri, old.version, func(*snapshot) (*lang.Source, error) { return lang.NewSource(text), nil })
}

func didClose(s *session, p *protocol.DidCloseTextDocumentParams) error {
	u := p.TextDocument.URI
	var others []*snapshot
	s.change(func(v *view) {
		if old := v.docs[u]; old != nil {
			old.supersede(errStale)
		}
		delete(v.docs, u)
		others = v.renew(u)
	})
	s.closed(u)
	s.touched(others)
	return nil
}

// replace puts a new text in the place of a document's and has it diagnosed.
func (s *session) replace(u uri.URI, version int32, edit func(old *snapshot) (*lang.Source, error)) (err error) {
	var doc *snapshot
	var others []*snapshot
	s.change(func(v *view) {
		old := v.docs[u]
		var src *lang.Source
		if src, err = edit(old); err != nil {
			return
		}
		if old == nil {
			doc = v.snap(u, homeOf(u), src).opened(version)
		} else {
			doc = v.snap(u, old.home, src).opened(version).after(old)
			old.supersede(errStale)
		}
		v.docs[u] = doc
		others = v.renew(u)
	})
	if doc != nil {
		s.edited(doc)
	}
	s.touched(others)
	return err
}

// renew makes new snapshots of the documents that refer to a changed one, and
// returns them.
func (v *view) renew(changed uri.URI) []*snapshot {
	var out []*snapshot
	for u, old := range v.docs {
		if !old.uses(changed) {
			continue
		}
		out = append(out, v.again(u, old))
	}
	return out
}

// again makes a new snapshot of an open document whose text has not changed.
func (v *view) again(u uri.URI, old *snapshot) *snapshot {
	doc := v.snap(u, old.home, old.src).opened(old.version).after(old)
	old.supersede(errStale)
	v.docs[u] = doc
	return doc
}
