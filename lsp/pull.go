package lsp

import (
	"context"
	"errors"
	"fmt"
	"hash/fnv"
	"time"

	"go.lsp.dev/jsonrpc2"
	"go.lsp.dev/protocol"
)

// refreshPause gathers the reasons for a refresh into one.
const refreshPause = 100 * time.Millisecond

const codeServerCancelled jsonrpc2.Code = -32802

// pulledDiagnostics answers clients that ask for diagnostics.
func pulledDiagnostics() feature {
	return feature{
		offer: func(c *client, to *protocol.ServerCapabilities) {
			if c.pulls {
				to.DiagnosticProvider = &protocol.DiagnosticOptions{
					Identifier: ptr(source), InterFileDependencies: true, WorkspaceDiagnostics: true,
				}
			}
		},
		methods: map[string]method{protocol.MethodTextDocumentDiagnostic: request(pull)},
	}
}

func pull(ctx context.Context, v *view, p *protocol.DocumentDiagnosticParams) (any, error) {
	doc, err := v.note(p.TextDocument.URI)
	if err != nil {
		return nil, err
	}
	var items []protocol.Diagnostic
	switch found, err := doc.findings(ctx); {
	case errors.Is(err, errStale):
		return nil, &jsonrpc2.Error{Code: codeServerCancelled, Message: errStale.Message, Data: jsonrpc2.RawMessage(`{"retriggerRequest":true}`)}
	case errors.Is(err, context.Canceled) || errors.Is(err, errCancelled):
		return nil, err
	case err != nil:
		items = unchecked(err)
	default:
		items = v.diagnostics(doc, found)
	}
	id, err := fingerprint(items)
	if err != nil {
		return nil, err
	}
	if p.PreviousResultID != nil && *p.PreviousResultID == id {
		return &protocol.RelatedUnchangedDocumentDiagnosticReport{
			UnchangedDocumentDiagnosticReport: protocol.UnchangedDocumentDiagnosticReport{Kind: "unchanged", ResultID: id},
		}, nil
	}
	return &protocol.RelatedFullDocumentDiagnosticReport{
		FullDocumentDiagnosticReport: protocol.FullDocumentDiagnosticReport{Kind: "full", ResultID: &id, Items: items},
	}, nil
}

// fingerprint identifies a list of diagnostics by its content.
func fingerprint(items []protocol.Diagnostic) (string, error) {
	h := fnv.New64a()
	for i := range items {
		raw, err := protocol.Marshal(&items[i])
		if err != nil {
			return "", err
		}
		h.Write(raw)
	}
	return fmt.Sprintf("%x", h.Sum64()), nil
}

// refresh asks the client to ask again for what it shows, once for all that
// changes within a moment: diagnostics where it pulls them, and the hints.
func (s *session) refresh() {
	if !s.refreshing.CompareAndSwap(false, true) {
		return
	}
	s.behind(func() {
		select {
		case <-time.After(refreshPause):
		case <-s.ctx.Done():
			return
		}
		s.refreshing.Store(false)
		c := s.now().client
		if c.pulls {
			s.say(protocol.MethodWorkspaceDiagnosticRefresh, nil, nil)
		}
		if c.can("workspace.inlayHint.refreshSupport") {
			s.say(protocol.MethodWorkspaceInlayHintRefresh, nil, nil)
		}
	})
}
