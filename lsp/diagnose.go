package lsp

import (
	"fmt"
	"slices"
	"strings"

	"go.lsp.dev/protocol"

	"inkjoule/check"
	"inkjoule/lang"
)

// source is how diagnostics name their origin.
const source = "inkjoule"

// diagnostics turns the findings of a note into what the client shows. Where
// the client can't show a part, the text says it.
func (v *view) diagnostics(s *snapshot, findings []check.Finding) []protocol.Diagnostic {
	w := v.reporter(s)
	out := []protocol.Diagnostic{}
	for _, f := range findings {
		if !f.IsWaived() && (f.Path == "" || f.Path == s.home.path) {
			out = append(out, w.diagnostic(f))
		}
	}
	return out
}

// reporter makes the diagnostics of one snapshot.
type reporter struct {
	view *view
	snap *snapshot
	at   mapper
	caps string // the path of the client's capabilities for diagnostics
}

func (v *view) reporter(s *snapshot) reporter {
	w := reporter{view: v, snap: s, at: s.mapper().ascending(), caps: "textDocument.publishDiagnostics"}
	if v.client.pulls {
		w.caps = "textDocument.diagnostic"
	}
	return w
}

func (w reporter) diagnostic(f check.Finding) protocol.Diagnostic {
	d := protocol.Diagnostic{
		Range:    w.at.SpanToRange(f.Span),
		Severity: severity(f.Severity),
		Code:     protocol.String(f.Rule),
		Source:   protocol.NewOptional(source),
	}
	text := []string{fmt.Sprintf("%s [%s]", strings.TrimSpace(f.Message), f.Rule)}
	if f.Detail != "" {
		text = append(text, f.Detail)
	}
	if w.view.client.can(w.caps + ".relatedInformation") {
		d.RelatedInformation = w.related(f.Related)
	} else {
		text = append(text, w.listed(f.Related)...)
	}
	if page := w.view.page(f.Rule); page != "" && w.view.client.can(w.caps+".codeDescriptionSupport") {
		d.CodeDescription.Href = page
	}
	if tag, ok := tags[f.Rule]; ok && w.view.client.knows(w.caps+".tagSupport.valueSet", int(tag)) {
		d.Tags = protocol.NewDiagnosticTags(tag)
	}
	d.Message = protocol.String(strings.Join(text, "\n"))
	return d
}

// severity of the protocol. Advice is information: editors hide hints.
func severity(s lang.Severity) protocol.DiagnosticSeverity {
	switch s {
	case lang.Error:
		return protocol.DiagnosticSeverityError
	case lang.Caution:
		return protocol.DiagnosticSeverityWarning
	}
	return protocol.DiagnosticSeverityInformation
}

// tags by rule, for editors that show them (unused text is faded).
var tags = map[string]protocol.DiagnosticTag{
	"unused-definition": protocol.DiagnosticTagUnnecessary,
	"unused-waiver":     protocol.DiagnosticTagUnnecessary,
}

// related gives the places that contributed. Clients refuse an empty message.
func (w reporter) related(all []lang.Related) []protocol.DiagnosticRelatedInformation {
	var out []protocol.DiagnosticRelatedInformation
	for _, r := range all {
		loc, ok := w.view.place(w.snap, r.Path, r.Span)
		if !ok {
			continue
		}
		message := strings.TrimSpace(r.Message)
		if message == "" {
			message = "contributes here"
		}
		out = append(out, protocol.DiagnosticRelatedInformation{Location: loc, Message: message})
	}
	return out
}

// listed gives the same places as lines of text.
func (w reporter) listed(all []lang.Related) []string {
	var out []string
	for _, r := range all {
		loc, ok := w.view.place(w.snap, r.Path, r.Span)
		if !ok {
			continue
		}
		where := fmt.Sprintf("line %d", loc.Range.Start.Line+1)
		if r.Path != "" && r.Path != w.snap.home.path {
			where = r.Path + ", " + where
		}
		out = append(out, where+": "+strings.TrimSpace(r.Message))
	}
	return slices.Compact(out)
}
