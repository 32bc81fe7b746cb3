package lsp

import (
	"context"

	"go.lsp.dev/protocol"
	"go.lsp.dev/uri"
)

// overview shows the findings of notes that are not open: pulled with the
// workspace's diagnostics, or pushed.
func overview() feature {
	return feature{
		methods: map[string]method{protocol.MethodWorkspaceDiagnostic: request(pullAll)},
	}
}

func pullAll(ctx context.Context, v *view, p *protocol.WorkspaceDiagnosticParams) (any, error) {
	report := &protocol.WorkspaceDiagnosticReport{Items: []protocol.WorkspaceDocumentDiagnosticReport{}}
	before := map[uri.URI]string{}
	for _, r := range p.PreviousResultIds {
		before[r.URI] = r.Value
	}
	if v.settings.workspace {
		for _, u := range v.everyNote(ctx) {
			if v.docs[u] != nil {
				continue // the client pulls it by itself
			}
			r, err := v.record(ctx, u)
			if ctx.Err() != nil {
				return nil, ctx.Err()
			}
			if err == nil {
				report.Items = append(report.Items, workspaceReport(u, r, before[u]))
				delete(before, u)
			}
		}
	}
	for u := range before { // gone since: deleted, or left out by now
		if v.docs[u] == nil {
			report.Items = append(report.Items, workspaceReport(u, &record{}, ""))
		}
	}
	return report, nil
}

func workspaceReport(u uri.URI, r *record, before string) protocol.WorkspaceDocumentDiagnosticReport {
	if r.id != "" && r.id == before {
		return &protocol.WorkspaceUnchangedDocumentDiagnosticReport{
			URI: u, UnchangedDocumentDiagnosticReport: protocol.UnchangedDocumentDiagnosticReport{Kind: "unchanged", ResultID: r.id},
		}
	}
	full := &protocol.WorkspaceFullDocumentDiagnosticReport{URI: u}
	full.Kind, full.Items = "full", r.items
	if full.Items == nil {
		full.Items = []protocol.Diagnostic{}
	}
	if r.id != "" {
		full.ResultID = &r.id
	}
	return full
}

// survey pushes the findings of all notes that are not open, and clears those
// of notes that are gone. One survey runs at a time; another that is asked for
// meanwhile follows it.
func (s *session) survey() {
	if s.now().client.pulls {
		s.refresh()
		return
	}
	if s.surveys.Add(1) > 1 {
		return
	}
	s.behind(func() {
		for {
			asked := s.surveys.Load()
			s.surveyOnce()
			if s.ctx.Err() != nil || s.surveys.CompareAndSwap(asked, 0) {
				return
			}
		}
	})
}

func (s *session) surveyOnce() {
	v := s.now()
	there := map[uri.URI]bool{}
	if v.settings.workspace {
		notes := v.everyNote(s.ctx)
		progress := s.progress("Reviewing the notes of the workspace")
		defer progress.end()
		for i, u := range notes {
			progress.at(i, len(notes))
			there[u] = true
			s.surveyNote(u)
			if s.ctx.Err() != nil {
				return
			}
		}
	}
	for _, u := range s.shownClosed() {
		if !there[u] {
			s.library.drop(u)
			s.sendClosed(u, nil)
		}
	}
}

// surveyNote pushes the findings of one note, unless it is open.
func (s *session) surveyNote(u uri.URI) {
	v := s.now()
	if v.docs[u] != nil {
		return
	}
	r, err := v.record(s.ctx, u)
	if err == nil {
		s.sendClosed(u, r.items)
	}
}

// sendClosed pushes the findings of a note that is not open. What has not been
// shown need not be cleared.
func (s *session) sendClosed(u uri.URI, items []protocol.Diagnostic) {
	s.publish.Lock()
	defer s.publish.Unlock()
	if s.now().docs[u] != nil || len(items) == 0 && !s.shown[u] {
		return
	}
	if items == nil {
		items = []protocol.Diagnostic{}
	}
	s.shown[u] = len(items) > 0
	if !s.shown[u] {
		delete(s.shown, u)
	}
	s.peer.notify(protocol.MethodTextDocumentPublishDiagnostics, &protocol.PublishDiagnosticsParams{URI: u, Diagnostics: items})
}

// shownClosed lists the notes that are not open and have findings on show.
func (s *session) shownClosed() []uri.URI {
	s.publish.Lock()
	defer s.publish.Unlock()
	var out []uri.URI
	for u := range s.shown {
		if s.now().docs[u] == nil {
			out = append(out, u)
		}
	}
	return out
}
