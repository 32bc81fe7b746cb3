package lsp

import (
	"context"

	"go.lsp.dev/jsonrpc2"
	"go.lsp.dev/protocol"
)

// phase is where a session stands in its life.
type phase uint8

const (
	fresh phase = iota // initialize has not come
	running
	shutDown // only exit may follow
)

const codeNotInitialized jsonrpc2.Code = -32002

// now returns the phase.
func (s *server) now() phase {
	s.mu.Lock()
	defer s.mu.Unlock()
	return s.phase
}

// orderly reports whether the client has asked for the shutdown.
func (s *server) orderly() bool { return s.now() == shutDown }

func (s *server) enter(p phase) {
	s.mu.Lock()
	defer s.mu.Unlock()
	s.phase = p
}

// admit says why a request can't be served in the present phase, or nil.
func (s *server) admit(method string) error {
	switch p := s.now(); {
	case p == fresh && method != protocol.MethodInitialize:
		return jsonrpc2.NewError(codeNotInitialized, "the server has not been initialized; send initialize first")
	case p == running && method == protocol.MethodInitialize:
		return jsonrpc2.NewError(jsonrpc2.InvalidRequest, "the server has been initialized already")
	case p == shutDown:
		return jsonrpc2.NewError(jsonrpc2.InvalidRequest, "the server has been shut down; only exit may follow")
	}
	return nil
}

// initialize settles what both sides can do.
func (s *server) initialize(raw jsonrpc2.RawMessage) (any, error) {
	h, err := readHello(raw)
	if err != nil {
		return nil, err
	}
	c := newClient(h)
	s.session.start(c, h)
	if h.ProcessID != nil {
		go watchParent(s.ctx, *h.ProcessID, s.end)
	}
	s.enter(running)
	result := &protocol.InitializeResult{
		Capabilities: offers(c),
		ServerInfo:   protocol.ServerInfo{Name: "inkjoule"},
	}
	if s.opt.Version != "" {
		result.ServerInfo.Version = protocol.NewOptional(s.opt.Version)
	}
	s.log.Info("initialized", "client", c.name, "encoding", c.encodingKind(), "pull", c.pulls)
	return result, nil
}

// shutdown answers and stops the work; the process leaves at exit.
func (s *server) shutdown(context.Context) (any, error) {
	s.enter(shutDown)
	s.session.stop()
	return nil, nil
}
