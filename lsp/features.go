package lsp

import (
	"go.lsp.dev/jsonrpc2"
	"go.lsp.dev/protocol"
)

// A feature is what one file adds to the server.
type feature struct {
	offer   func(c *client, to *protocol.ServerCapabilities) // nil: nothing to announce
	methods map[string]method
	events  map[string]event
}

// An event handles a notification, on the reading goroutine. Its error is
// logged; the protocol has no answer to a notification.
type event func(s *session, raw jsonrpc2.RawMessage) error

// features lists all that the server can do.
func features() []feature {
	return []feature{
		textSync(),
		surroundings(),
		pulledDiagnostics(),
		overview(),
		inlayHints(),
		hovers(),
		documentSymbols(),
		codeActions(),
		navigation(),
		workspaceSymbols(),
		fileRenames(),
		renaming(),
		completions(),
		signatures(),
		folding(),
		formatting(),
		selection(),
		links(),
		semanticTokens(),
		dependencies(),
	}
}

// methods maps the name of every request to its handler.
func methods() map[string]method {
	all := map[string]method{}
	for _, f := range features() {
		for name, m := range f.methods {
			all[name] = m
		}
	}
	return all
}

// events maps the name of every notification to its handler.
func events() map[string]event {
	all := map[string]event{}
	for _, f := range features() {
		for name, e := range f.events {
			all[name] = e
		}
	}
	return all
}

// offers announces what this client can use.
func offers(c *client) protocol.ServerCapabilities {
	caps := protocol.ServerCapabilities{PositionEncoding: c.encodingKind()}
	for _, f := range features() {
		if f.offer != nil {
			f.offer(c, &caps)
		}
	}
	return caps
}
