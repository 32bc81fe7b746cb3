package report

import (
	"bytes"
	"encoding/json"
	"io"

	"inkjoule/check"
	"inkjoule/lang"
)

// sarifWriter writes SARIF 2.1.0 (OASIS Standard, errata 01): one run, its
// results a line each.
type sarifWriter struct {
	w        io.Writer
	opt      Options
	index    map[string]int // of the rules
	begun    bool
	some     bool
	problems []string
	seen     map[string]int // fingerprints so far
}

func newSARIF(w io.Writer, opt Options) Writer {
	if opt.Catalogue == nil {
		opt.Catalogue = &check.Catalogue{} // nothing is explained
	}
	s := &sarifWriter{w: w, opt: opt, index: map[string]int{}, seen: map[string]int{}}
	for i, r := range opt.Catalogue.All() {
		s.index[r.Name] = i
	}
	return s
}

const (
	sarifSchema = "https://docs.oasis-open.org/sarif/sarif/v2.1.0/errata01/os/schemas/sarif-schema-2.1.0.json"
	sarifHead   = `{"$schema": "` + sarifSchema + `", "version": "2.1.0", "runs": [{"tool": `
)

func (s *sarifWriter) begin() error {
	if s.begun {
		return nil
	}
	s.begun = true
	if err := put(s.w, sarifHead, sarifTool{sarifDriver{
		Name: "inkjoule", Version: s.opt.Version, Rules: sarifRules(s.opt.Catalogue),
	}}); err != nil {
		return err
	}
	_, err := io.WriteString(s.w, ",\n\"columnKind\": \"unicodeCodePoints\",\n\"results\": [")
	return err
}

func (s *sarifWriter) Note(n *Note) error {
	if err := s.begin(); err != nil {
		return err
	}
	for i := range n.Findings {
		lead := ",\n"
		if !s.some {
			lead = "\n"
		}
		s.some = true
		if err := put(s.w, lead, s.result(n, &n.Findings[i])); err != nil {
			return err
		}
	}
	return nil
}

func (s *sarifWriter) Problem(message string) error {
	s.problems = append(s.problems, message)
	return nil
}

func (s *sarifWriter) Close() error {
	if err := s.begin(); err != nil {
		return err
	}
	run := sarifInvocation{Successful: len(s.problems) == 0, Notifications: []sarifNotification{}}
	for _, p := range s.problems {
		run.Notifications = append(run.Notifications, sarifNotification{Level: "error", Message: sarifText{p}})
	}
	if err := put(s.w, "\n],\n\"invocations\": ", []sarifInvocation{run}); err != nil {
		return err
	}
	_, err := io.WriteString(s.w, "}]}\n")
	return err
}

// put writes a lead and then a value as JSON without a line end.
func put(w io.Writer, lead string, value any) error {
	var b bytes.Buffer
	b.WriteString(lead)
	e := json.NewEncoder(&b)
	e.SetEscapeHTML(false)
	if err := e.Encode(value); err != nil {
		return err
	}
	b.Truncate(b.Len() - 1)
	_, err := w.Write(b.Bytes())
	return err
}

// result writes one finding; waived findings are suppressed in their source.
func (s *sarifWriter) result(n *Note, f *check.Finding) sarifResult {
	out := sarifResult{
		Rule: f.Rule, Index: -1, Level: sarifLevel(f.Severity), Message: sarifText{messageOf(f)},
		Locations:    []sarifLocation{s.location(n, f.Span)},
		Fingerprints: map[string]string{"statement/v1": s.fingerprint(n, f)},
		Suppressions: []sarifSuppression{},
	}
	if i, ok := s.index[f.Rule]; ok {
		out.Index = i
	}
	for i, r := range f.Related {
		out.Related = append(out.Related, relatedLocation(n, r, i+1))
	}
	if f.IsWaived() {
		at := s.location(n, f.WaivedBy)
		out.Suppressions = append(out.Suppressions, sarifSuppression{Kind: "inSource", Justification: f.Waived, Location: &at})
	}
	if f.Fix != nil {
		out.Fixes = []sarifFix{fixOf(n, f.Fix)}
	}
	return out
}

// messageOf joins the message and what to do.
func messageOf(f *check.Finding) string {
	m := sentence(f.Message)
	if d := oneLine(f.Detail); d != "" {
		m += " " + sentence(d)
	}
	return m
}

func sarifLevel(s lang.Severity) string {
	switch s {
	case lang.Error:
		return "error"
	case lang.Caution:
		return "warning"
	}
	return "note"
}

func (s *sarifWriter) location(n *Note, at lang.Span) sarifLocation {
	r := regionOf(n.Script.Source, at)
	r.Snippet = &sarifText{n.Script.Source.Text[at.Start:max(at.Start, at.End)]}
	return sarifLocation{Physical: sarifPhysical{sarifArtifact{uriOf(n.Path)}, &r}}
}

func regionOf(src *lang.Source, at lang.Span) sarifRegion {
	p := placeOf(src, at)
	return sarifRegion{StartLine: p.Line, StartColumn: p.Column, EndLine: p.EndLine, EndColumn: p.EndColumn}
}

// relatedLocation is a further place; in another note, the note alone.
func relatedLocation(n *Note, r lang.Related, id int) sarifLocation {
	out := sarifLocation{ID: id, Message: &sarifText{sentence(r.Message)}}
	if r.Path != "" && r.Path != n.Path {
		out.Physical = sarifPhysical{Artifact: sarifArtifact{uriOf(r.Path)}}
		return out
	}
	region := regionOf(n.Script.Source, r.Span)
	out.Physical = sarifPhysical{sarifArtifact{uriOf(n.Path)}, &region}
	return out
}

func fixOf(n *Note, f *lang.Fix) sarifFix {
	change := sarifChange{Artifact: sarifArtifact{uriOf(n.Path)}}
	for _, e := range f.Edits {
		change.Replacements = append(change.Replacements, sarifReplacement{regionOf(n.Script.Source, e.Span), sarifText{e.New}})
	}
	return sarifFix{sarifText{sentence(f.Title)}, []sarifChange{change}}
}
