package lsp

import (
	"context"
	"encoding/json"
	"errors"
	"fmt"
	"runtime/debug"
	"sync"

	"go.lsp.dev/jsonrpc2"
	"go.lsp.dev/protocol"
)

// A call is a request with its parameters and its view taken.
type call func(ctx context.Context) (any, error)

// A method binds a request to the session as it is now. It runs on the reading
// goroutine and must not block; the call that it returns runs beside it.
type method func(s *session, raw jsonrpc2.RawMessage) (call, error)

// Causes of a cancelled request, as they are answered.
var (
	errCancelled = jsonrpc2.NewError(protocol.CodeRequestCancelled, "cancelled")
	errStale     = jsonrpc2.NewError(protocol.CodeContentModified, "the text has changed")
)

// request makes a method of a function on the session's view.
func request[P any](f func(ctx context.Context, v *view, p *P) (any, error)) method {
	return func(s *session, raw jsonrpc2.RawMessage) (call, error) {
		p := new(P)
		if err := decode(raw, p); err != nil {
			return nil, err
		}
		v := s.now()
		return func(ctx context.Context) (any, error) { return f(ctx, v, p) }, nil
	}
}

// decode reads parameters. Absent ones leave p as it is.
func decode(raw jsonrpc2.RawMessage, p any) error {
	if len(raw) == 0 {
		return nil
	}
	if err := protocol.Unmarshal(raw, p); err != nil {
		return jsonrpc2.Errorf(jsonrpc2.InvalidParams, "the parameters can't be read: %v", err)
	}
	return nil
}

// handle serves every message, on the reading goroutine.
func (s *server) handle(ctx context.Context, req *jsonrpc2.Request) (result any, err error) {
	if !req.IsCall() {
		s.notified(req)
		return nil, nil // an error would end the connection
	}
	if err := s.admit(req.Method()); err != nil {
		return nil, err
	}
	switch req.Method() {
	case protocol.MethodInitialize:
		return s.guard("initialize", func() (any, error) { return s.initialize(req.Params()) })
	case protocol.MethodShutdown:
		return s.shutdown(ctx)
	}
	return s.beside(ctx, req)
}

// beside binds a request here and runs it beside the reading goroutine.
func (s *server) beside(ctx context.Context, req *jsonrpc2.Request) (any, error) {
	m, ok := s.methods[req.Method()]
	if !ok {
		return nil, jsonrpc2.Errorf(jsonrpc2.MethodNotFound, "the server does not know the method %q", req.Method())
	}
	var run call
	if _, err := s.guard(req.Method(), func() (_ any, err error) { run, err = m(s.session, req.Params()); return nil, err }); err != nil {
		return nil, err
	}
	work, done, err := s.calls.begin(jsonrpc2.DetachContext(ctx), req.ID())
	if err != nil {
		return nil, err
	}
	defer done()
	jsonrpc2.Async(ctx)
	result, err := s.guard(req.Method(), func() (any, error) { return run(work) })
	if err != nil && work.Err() != nil {
		return nil, errCancelled
	}
	return result, err
}

// notified handles a notification. What goes wrong is only logged.
func (s *server) notified(req *jsonrpc2.Request) {
	name := req.Method()
	switch p := s.now(); {
	case name == protocol.MethodExit:
		s.end()
	case p != running:
		s.log.Warn("notification outside of the session", "method", name)
	case name == protocol.MethodCancelRequest:
		s.calls.cancel(req.Params())
	default:
		s.dispatch(name, req.Params())
	}
}

// dispatch hands a notification to the feature that wants it. Others are
// ignored, as the protocol demands of those that begin with `$/`.
func (s *server) dispatch(name string, raw jsonrpc2.RawMessage) {
	e, ok := s.events[name]
	if !ok {
		return
	}
	if _, err := s.guard(name, func() (any, error) { return nil, e(s.session, raw) }); err != nil {
		s.log.Warn("notification not handled", "method", name, "error", err)
	}
}

// guard runs f and turns a panic into an error. The error of a cancelled
// context is never shown; that of a superseded snapshot is errStale.
func (s *server) guard(what string, f func() (any, error)) (result any, err error) {
	defer func() {
		if r := recover(); r != nil {
			s.log.Error("panic", "method", what, "value", fmt.Sprint(r), "stack", string(debug.Stack()))
			result, err = nil, jsonrpc2.Errorf(jsonrpc2.InternalError, "internal error while serving %s; the log has the details", what)
		}
		if errors.Is(err, context.Canceled) {
			err = errCancelled
		}
	}()
	return f()
}

// calls are the requests that are running, by id.
type calls struct {
	mu      sync.Mutex
	running map[jsonrpc2.ID]context.CancelCauseFunc
}

// begin registers a request. Its context ends with the client's cancellation
// or with the session; done must be called when it has been served.
func (c *calls) begin(ctx context.Context, id jsonrpc2.ID) (work context.Context, done func(), err error) {
	c.mu.Lock()
	defer c.mu.Unlock()
	if _, taken := c.running[id]; taken {
		return nil, nil, jsonrpc2.Errorf(jsonrpc2.InvalidRequest, "a request with the id %v is still running", id)
	}
	work, cancel := context.WithCancelCause(ctx)
	c.running[id] = cancel
	return work, func() { c.finish(id, cancel) }, nil
}

func (c *calls) finish(id jsonrpc2.ID, cancel context.CancelCauseFunc) {
	c.mu.Lock()
	defer c.mu.Unlock()
	delete(c.running, id)
	cancel(nil)
}

// cancel ends the context of a running request; of any other id nothing.
func (c *calls) cancel(raw jsonrpc2.RawMessage) {
	var p struct {
		ID json.RawMessage `json:"id"`
	}
	if json.Unmarshal(raw, &p) != nil {
		return
	}
	id, ok := readID(p.ID)
	if !ok {
		return
	}
	c.mu.Lock()
	defer c.mu.Unlock()
	if cancel := c.running[id]; cancel != nil {
		cancel(errCancelled)
	}
}

// readID reads a request's id: a string or an integer of any size.
func readID(raw json.RawMessage) (jsonrpc2.ID, bool) {
	var n int64
	if json.Unmarshal(raw, &n) == nil {
		return jsonrpc2.NewNumberID(n), true
	}
	var text string
	if json.Unmarshal(raw, &text) == nil {
		return jsonrpc2.NewStringID(text), true
	}
	return jsonrpc2.ID{}, false
}
