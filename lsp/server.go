package lsp

import (
	"context"
	"errors"
	"io"
	"log/slog"
	"sync"
	"time"

	"go.lsp.dev/jsonrpc2"

	"inkjoule/check"
	"inkjoule/lang"
)

// farewell is how long the server waits, once the session has ended, for
// handlers to stop and replies to be written.
const farewell = 400 * time.Millisecond

// patience is how long the client may take to answer a request.
const patience = 10 * time.Second

// ErrNoShutdown says that the session ended without the client's shutdown
// request; the process must then exit with status 1.
var ErrNoShutdown = errors.New("the client left without a shutdown request")

// Analyser reads and checks notes. It obeys ctx and may be called from several
// goroutines. The two steps are apart because most requests need only the
// first.
type Analyser interface {
	// Read reads, resolves and evaluates a note.
	Read(ctx context.Context, in Input) (*lang.Note, error)
	// Check gives the findings of a note that Read has returned.
	Check(ctx context.Context, in Input, note *lang.Note) ([]check.Finding, error)
}

// Input is what an Analyser gets.
type Input struct {
	Root     string     // the folder of the work, absolute; "" if the text is no file
	Path     string     // slash-separated, relative to Root
	Text     string     // the newest text, of the editor or of the disk
	Files    lang.Files // the other notes of the work
	Previous *lang.Note // an earlier analysis of the same note, or nil
}

// Options of a server.
type Options struct {
	Version   string           // shown to the client
	Analyser  Analyser         // required
	Catalogue *check.Catalogue // the rules, for hover and completion; nil: none
	Pages     string           // address of the rules' documentation, which a rule name completes; "" if none
	Log       *slog.Logger     // nil: nothing is logged
}

// Serve speaks the language server protocol on in and out until the client
// leaves, the input ends, the client's process is gone or ctx is cancelled. It
// returns nil after an orderly shutdown, else ErrNoShutdown.
func Serve(ctx context.Context, in io.Reader, out io.Writer, opt Options) error {
	if opt.Log == nil {
		opt.Log = slog.New(slog.DiscardHandler)
	}
	if opt.Catalogue == nil {
		opt.Catalogue = &check.Catalogue{}
	}
	ctx, cancel := context.WithCancel(ctx)
	defer cancel()
	box := newOutbox(out)
	s := &server{opt: opt, log: opt.Log, ctx: ctx, end: cancel, calls: calls{running: map[jsonrpc2.ID]context.CancelCauseFunc{}}}
	s.conn = jsonrpc2.NewConn(newFrames(in, box, cancel), jsonrpc2.WithCodec(codec{}))
	s.session = newSession(ctx, s)
	s.methods, s.events = methods(), events()
	s.conn.Go(ctx, s.handle)
	<-ctx.Done()
	s.leave(in, box)
	if !s.orderly() {
		return ErrNoShutdown
	}
	return nil
}

// server is one session's connection: its phase, its methods and the requests
// that are running.
type server struct {
	opt     Options
	log     *slog.Logger
	conn    jsonrpc2.Conn
	ctx     context.Context // ends with the session
	end     context.CancelFunc
	methods map[string]method
	events  map[string]event
	session *session
	calls   calls

	mu    sync.Mutex
	phase phase
}

// leave gives handlers and replies a moment to finish. Whatever does not is
// abandoned: the process is about to exit.
func (s *server) leave(in io.Reader, box *outbox) {
	deadline := time.Now().Add(farewell)
	s.session.close(farewell)
	box.drain(time.Until(deadline))
	if c, ok := in.(io.Closer); ok {
		go c.Close() // ends a read that is still waiting
	}
	select {
	case <-s.conn.Done():
	case <-time.After(time.Until(deadline)):
		s.log.Warn("requests were still running when the session ended")
	}
}

// notify sends a notification. One that can't be sent is of no use to anybody.
func (s *server) notify(method string, params any) {
	if err := s.conn.Notify(s.ctx, method, params); err != nil && s.ctx.Err() == nil {
		s.log.Warn("notification not sent", "method", method, "error", err)
	}
}

// ask calls the client, which has a limited time to answer. It must not be
// called on the reading goroutine, which delivers the answer.
func (s *server) ask(ctx context.Context, method string, params, result any) error {
	ctx, cancel := context.WithTimeout(ctx, patience)
	defer cancel()
	_, err := s.conn.Call(ctx, method, params, result)
	return err
}
