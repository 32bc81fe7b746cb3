package report

import (
	"inkjoule/check"
	"inkjoule/lang"
)

// jsonPlace is a piece of a note: 1-based lines, 1-based columns in Unicode
// code points, the end exclusive.
type jsonPlace struct {
	Line      int `json:"line"`
	Column    int `json:"column"`
	EndLine   int `json:"endLine"`
	EndColumn int `json:"endColumn"`
}

type jsonFinding struct {
	Rule     string `json:"rule"`
	Severity string `json:"severity"`
	jsonPlace
	Message string        `json:"message"`
	Detail  string        `json:"detail"`
	Related []jsonRelated `json:"related"`
	Fix     string        `json:"fix,omitempty"`    // what the correction does
	Edits   []jsonEdit    `json:"edits,omitempty"`  // the correction itself
	Reason  string        `json:"reason,omitempty"` // of the waiver
}

// jsonRelated is a further place; line and column are 0 in another note.
type jsonRelated struct {
	Path    string `json:"path"`
	Line    int    `json:"line"`
	Column  int    `json:"column"`
	Message string `json:"message"`
}

type jsonEdit struct {
	jsonPlace
	Text string `json:"text"`
}

func placeOf(src *lang.Source, s lang.Span) jsonPlace {
	var p jsonPlace
	p.Line, p.Column = src.Position(s.Start)
	p.EndLine, p.EndColumn = src.Position(max(s.Start, s.End))
	return p
}

func findingOf(n *Note, f *check.Finding) jsonFinding {
	src := n.Script.Source
	out := jsonFinding{
		Rule: f.Rule, Severity: f.Severity.String(), jsonPlace: placeOf(src, f.Span),
		Message: f.Message, Detail: f.Detail, Related: []jsonRelated{}, Reason: f.Waived,
	}
	for _, r := range f.Related {
		out.Related = append(out.Related, jsonRelatedOf(n, r))
	}
	if f.Fix != nil {
		out.Fix = f.Fix.Title
		for _, e := range f.Fix.Edits {
			out.Edits = append(out.Edits, jsonEdit{placeOf(src, e.Span), e.New})
		}
	}
	return out
}

func jsonRelatedOf(n *Note, r lang.Related) jsonRelated {
	out := jsonRelated{Path: r.Path, Message: r.Message}
	if r.Path == "" || r.Path == n.Path {
		out.Path = n.Path
		out.Line, out.Column = n.Script.Source.Position(r.Span.Start)
	}
	return out
}
