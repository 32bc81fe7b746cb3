package lsp

import (
	"errors"
	"slices"
	"time"

	"go.lsp.dev/jsonrpc2"
	"go.lsp.dev/protocol"
	"go.lsp.dev/uri"
)

// pauseLimit bounds the pause before a diagnosis, which otherwise is a quarter
// of what the one before has taken: a burst of edits costs little, a single
// one is not held up.
const pauseLimit = 50 * time.Millisecond

// edited has a document diagnosed. A pulling client asks by itself.
func (s *session) edited(doc *snapshot) {
	if !s.now().client.pulls {
		s.behind(func() { s.diagnose(doc) })
	}
}

// touched has documents diagnosed that have not changed themselves, but
// something that they refer to.
func (s *session) touched(docs []*snapshot) {
	if len(docs) == 0 {
		return
	}
	s.refresh()
	if s.now().client.pulls {
		return
	}
	for _, doc := range docs {
		s.edited(doc)
	}
}

// diagnose analyses a document and sends its diagnostics, unless a newer text
// comes in between.
func (s *session) diagnose(doc *snapshot) {
	select {
	case <-time.After(min(doc.pace/4, pauseLimit)):
	case <-doc.ctx.Done():
		return
	}
	found, err := doc.findings(doc.ctx)
	v := s.now()
	switch {
	case doc.ctx.Err() != nil:
	case err != nil:
		s.send(doc, unchecked(err))
	default:
		s.send(doc, v.diagnostics(doc, found))
	}
}

// unchecked says that a note could not be analysed: silence would look like a
// clean review.
func unchecked(err error) []protocol.Diagnostic {
	var known *jsonrpc2.Error
	text := "this note could not be checked; the server's log has the details"
	if errors.As(err, &known) {
		text = known.Message
	}
	return []protocol.Diagnostic{{
		Severity: protocol.DiagnosticSeverityError,
		Code:     protocol.String("not-checked"),
		Source:   protocol.NewOptional(source),
		Message:  protocol.String(text + " [not-checked]"),
	}}
}

// send pushes diagnostics if their text is still the newest one. One at a time,
// so that versions never run backwards.
func (s *session) send(doc *snapshot, all []protocol.Diagnostic) {
	s.publish.Lock()
	defer s.publish.Unlock()
	if s.now().docs[doc.uri] != doc {
		return
	}
	s.peer.notify(protocol.MethodTextDocumentPublishDiagnostics, &protocol.PublishDiagnosticsParams{
		URI: doc.uri, Version: protocol.NewOptional(doc.version), Diagnostics: all,
	})
}

// closed takes a closed document's diagnostics off the screen, or shows those
// of its file where the notes of the workspace are shown.
func (s *session) closed(u uri.URI) {
	if s.now().client.pulls {
		return
	}
	s.behind(func() {
		s.publish.Lock()
		s.shown[u] = true
		s.publish.Unlock()
		if v := s.now(); v.settings.workspace && v.inFolders(u) {
			if r, err := v.record(s.ctx, u); err == nil {
				s.sendClosed(u, r.items)
				return
			}
		}
		s.sendClosed(u, nil)
	})
}

// inFolders reports whether a note lies in a workspace folder.
func (v *view) inFolders(u uri.URI) bool {
	return u.IsFile() && slices.ContainsFunc(v.folders, func(f folder) bool { return f.contains(u.FsPath()) })
}
