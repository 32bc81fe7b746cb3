package lsp

import (
	"context"
	"encoding/json"
	"errors"
	"log/slog"
	"math/rand/v2"
	"strings"
	"testing"

	"go.lsp.dev/jsonrpc2"
	"go.lsp.dev/protocol"
	"go.lsp.dev/uri"

	"inkjoule/lang"
)

// everything asks all that can be asked about a place of a text, below the
// wire, and gives the errors that are none of the protocol's.
func everything(t testing.TB, srv *server, text string, offset int) []error {
	t.Helper()
	s := srv.session
	const u = uri.URI("file:///w/broken.joule")
	_ = s.replace(u, 1, func(*snapshot) (*lang.Source, error) { return lang.NewSource(text), nil })
	defer func() {
		_ = didClose(s, &protocol.DidCloseTextDocumentParams{TextDocument: protocol.TextDocumentIdentifier{URI: u}})
	}()
	m := s.now().docs[u].mapper()
	here := m.OffsetToPosition(offset)
	position := object{"line": here.Line, "character": here.Character}
	doc := object{"uri": u}
	whole := object{"start": at(0, 0), "end": at(1<<20, 0)}
	item := object{"uri": u, "selectionRange": object{"start": position, "end": position}}
	params := object{
		"textDocument": doc, "position": position, "range": whole, "newName": "new_name", "query": "a", "item": item,
		"positions": []any{position}, "context": object{"includeDeclaration": true, "only": []string{"quickfix", "source.fixAll", "refactor"}},
		"previousResultIds": []any{}, "files": []any{object{"oldUri": u, "newUri": u + "x"}},
	}
	raw, err := json.Marshal(params)
	if err != nil {
		t.Fatal(err)
	}
	var wrong []error
	for name, m := range srv.methods {
		_, err := srv.guard(name, func() (any, error) {
			run, err := m(s, raw)
			if err != nil {
				return nil, err
			}
			result, err := run(context.Background())
			if err == nil {
				_, err = codec{}.Marshal(result)
			}
			return result, err
		})
		var known *jsonrpc2.Error
		if err != nil && (!errors.As(err, &known) || known.Code == jsonrpc2.InternalError) {
			wrong = append(wrong, errors.Join(errors.New(name), err))
		}
	}
	return wrong
}

// inner is a server without a wire.
func inner(t testing.TB) *server {
	t.Helper()
	opt := realOptions(t)
	box := newOutbox(discard{})
	s := &server{opt: opt, log: slog.New(slog.DiscardHandler), methods: methods()}
	ctx, cancel := context.WithCancel(context.Background())
	s.ctx, s.end = ctx, cancel
	s.session = newSession(ctx, s)
	s.session.peer = mute{}
	h, err := readHello(jsonrpc2.RawMessage(`{"capabilities":{"textDocument":{"documentSymbol":{"hierarchicalDocumentSymbolSupport":true}}}}`))
	if err != nil {
		t.Fatal(err)
	}
	s.session.start(newClient(h), h)
	t.Cleanup(func() { cancel(); s.session.close(longest); box.drain(longest) })
	return s
}

type discard struct{}

func (discard) Write(p []byte) (int, error) { return len(p), nil }

// mute is a client to whom nothing is said.
type mute struct{}

func (mute) notify(string, any)                          {}
func (mute) ask(context.Context, string, any, any) error { return nil }

// TestBrokenNotes asks everything about every kind of unfinished note: the
// prefixes of the corpus and what is left when a word is taken out. Nothing may
// panic, and each must be answered.
func TestBrokenNotes(t *testing.T) {
	srv := inner(t)
	r := rand.New(rand.NewPCG(7, 7))
	cuts := 12
	if testing.Short() {
		cuts = 3
	}
	for path, text := range corpusNotes(t, "demo") {
		words := strings.Fields(text)
		for range cuts {
			cut := r.IntN(len(text))
			word := words[r.IntN(len(words))]
			less := strings.Replace(text, word, "", 1)
			for _, c := range []struct {
				text string
				at   int
			}{{text[:cut], cut}, {less, strings.Index(text, word)}, {text, cut}, {text[:cut] + "\x00\xff" + text[cut:], cut}} {
				for _, err := range everything(t, srv, c.text, min(c.at, len(c.text))) {
					t.Fatalf("%s: %v\nat %d of\n%q", path, err, c.at, c.text)
				}
			}
		}
	}
}

// FuzzRequests holds that no text and no place in it makes a request panic.
func FuzzRequests(f *testing.F) {
	for _, text := range corpusNotes(f, "demo") {
		f.Add(text, len(text)/2)
	}
	for _, text := range []string{capacitor, locals, "", "    ", "\r", "    a = ", "    medium", "    a, ", "    f(", "    x = a.b.c.d(", "    waive for : \"", "    table t: a [\n        1"} {
		f.Add(text, len(text))
	}
	srv := inner(f)
	f.Fuzz(func(t *testing.T, text string, at int) {
		if len(text) > 4000 {
			return
		}
		for _, err := range everything(t, srv, text, max(0, min(at, len(text)))) {
			t.Error(err)
		}
	})
}
