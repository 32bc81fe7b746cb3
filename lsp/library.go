package lsp

import (
	"context"
	"sync"

	"go.lsp.dev/protocol"
	"go.lsp.dev/uri"
)

// library keeps what is shown of notes that are not open: their findings and
// names, not their analyses. A record is good as long as the note, all that it
// refers to and its configuration are as they were.
type library struct {
	mu      sync.Mutex
	records map[uri.URI]*record
}

// record is what is kept of a note. It never changes.
type record struct {
	stamps  map[uri.URI]stamp // of the note and of what it read
	home    home
	config  stamp // of the configuration
	items   []protocol.Diagnostic
	id      string // of the items
	symbols []protocol.WorkspaceSymbol
}

func newLibrary() *library { return &library{records: map[uri.URI]*record{}} }

// record returns the record of a note that is not open, made anew if it is not
// good any more.
func (v *view) record(ctx context.Context, u uri.URI) (*record, error) {
	if r := v.library.find(u); r != nil && v.good(r) {
		return r, nil
	}
	r, err := v.newRecord(ctx, u)
	if err == nil {
		v.library.keep(u, r)
	}
	return r, err
}

func (l *library) find(u uri.URI) *record {
	l.mu.Lock()
	defer l.mu.Unlock()
	return l.records[u]
}

func (l *library) keep(u uri.URI, r *record) {
	l.mu.Lock()
	defer l.mu.Unlock()
	l.records[u] = r
}

func (l *library) drop(u uri.URI) {
	l.mu.Lock()
	defer l.mu.Unlock()
	delete(l.records, u)
}

// good reports whether everything that a record rests on is as it was.
func (v *view) good(r *record) bool {
	for u, s := range r.stamps {
		if v.stampOf(u) != s {
			return false
		}
	}
	return r.config == configStamp(r.home)
}

func (v *view) newRecord(ctx context.Context, u uri.URI) (*record, error) {
	r := &record{}
	own := v.stampOf(u) // before it is read, so that a change in between shows
	doc, err := v.note(u)
	if err != nil {
		return nil, err
	}
	found, err := doc.findings(ctx)
	switch {
	case ctx.Err() != nil:
		return nil, ctx.Err()
	case err != nil:
		r.items = unchecked(err)
	default:
		r.items = v.diagnostics(doc, found)
	}
	if a, err := doc.read(ctx); err == nil {
		r.symbols = (&spot{view: v, doc: doc, note: a.note, all: a}).workspaceSymbols()
	}
	r.stamps = doc.files.stamps()
	r.stamps[u] = own
	r.home, r.config = doc.home, doc.config
	r.id, err = fingerprint(r.items)
	return r, err
}
