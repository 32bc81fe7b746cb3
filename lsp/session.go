package lsp

import (
	"context"
	"fmt"
	"log/slog"
	"maps"
	"runtime"
	"runtime/debug"
	"sync"
	"sync/atomic"
	"time"

	"go.lsp.dev/uri"

	"inkjoule/check"
)

// session holds the state of a connection: the newest view, and the work that
// follows from it.
type session struct {
	ctx       context.Context
	stop      context.CancelFunc
	log       *slog.Logger
	analyser  Analyser
	peer      peer
	cpu       chan struct{} // one token for each analysis that may run
	gate      sync.Mutex    // guards the start of work against the end of the session
	work      sync.WaitGroup
	publish   sync.Mutex       // orders the diagnostics that are pushed
	catalogue *check.Catalogue // the rules, for their documentation
	pages     string           // address of the rules' documentation, which a rule name completes

	library *library
	shown   map[uri.URI]bool // closed notes with findings on show; guarded by publish
	surveys atomic.Int64     // surveys asked for and not begun, plus the running one
	tokens  atomic.Int64     // progress tokens handed out

	refreshing atomic.Bool // a refresh is on its way

	mu   sync.Mutex
	view *view
}

// peer is what the session says to the client.
type peer interface {
	notify(method string, params any)
	ask(ctx context.Context, method string, params, result any) error
}

// A view is the session at one moment. It never changes; a change makes a new
// one. Requests hold the view of the moment when they arrived.
type view struct {
	*session
	client   *client
	folders  []folder
	settings settings
	docs     map[uri.URI]*snapshot // the open documents
}

func newSession(ctx context.Context, s *server) *session {
	ctx, stop := context.WithCancel(ctx)
	out := &session{
		ctx: ctx, stop: stop, log: s.log, analyser: s.opt.Analyser, peer: s, catalogue: s.opt.Catalogue,
		pages:   s.opt.Pages,
		library: newLibrary(), shown: map[uri.URI]bool{},
		cpu: make(chan struct{}, max(1, runtime.GOMAXPROCS(0))),
	}
	out.view = &view{session: out, client: &client{}, settings: defaults(), docs: map[uri.URI]*snapshot{}}
	return out
}

// start takes over what initialize has settled.
func (s *session) start(c *client, h *hello) {
	s.change(func(v *view) {
		v.client = c
		v.folders = foldersOf(h)
		v.settings = defaults().with(h.Options)
	})
}

// now returns the newest view.
func (s *session) now() *view {
	s.mu.Lock()
	defer s.mu.Unlock()
	return s.view
}

// change replaces the view by an edited copy and returns it.
func (s *session) change(edit func(*view)) *view {
	s.mu.Lock()
	defer s.mu.Unlock()
	next := *s.view
	next.docs = maps.Clone(s.view.docs)
	edit(&next)
	s.view = &next
	return s.view
}

// behind runs f on a goroutine of the session, unless the session has ended.
func (s *session) behind(f func()) {
	s.gate.Lock()
	defer s.gate.Unlock()
	if s.ctx.Err() == nil {
		s.work.Go(func() {
			defer s.survive()
			f()
		})
	}
}

// survive keeps a panic in one piece of work from ending all of it.
func (s *session) survive() {
	if r := recover(); r != nil {
		s.log.Error("panic", "value", fmt.Sprint(r), "stack", string(debug.Stack()))
	}
}

// close stops the work and waits for it, at most for the given time.
func (s *session) close(most time.Duration) {
	s.gate.Lock()
	s.stop()
	s.gate.Unlock() // from here on nothing is added to the work
	done := make(chan struct{})
	go func() { s.work.Wait(); close(done) }()
	select {
	case <-done:
	case <-time.After(most):
	}
}
