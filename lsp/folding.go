package lsp

import (
	"context"
	"slices"
	"strings"

	"go.lsp.dev/protocol"

	"inkjoule/lang"
)

// folding closes statements of several lines and the sections of the prose.
func folding() feature {
	return feature{
		offer: func(_ *client, to *protocol.ServerCapabilities) {
			to.FoldingRangeProvider = &protocol.FoldingRangeOptions{}
		},
		methods: map[string]method{protocol.MethodTextDocumentFoldingRange: request(fold)},
	}
}

func fold(ctx context.Context, v *view, p *protocol.FoldingRangeParams) (any, error) {
	s, err := v.whole(ctx, p.TextDocument.URI)
	if err != nil {
		return nil, err
	}
	out := []protocol.FoldingRange{}
	add := func(from, to int) {
		if to > from {
			out = append(out, protocol.FoldingRange{StartLine: uint32(from), EndLine: uint32(to)})
		}
	}
	src := s.note.Script.Source
	for _, stmt := range s.note.Script.Stmts {
		add(src.Line(stmt.At), src.Line(stmt.At+len(stmt.Text)))
	}
	all := headings(s.note.Script)
	for i, h := range all {
		add(h.line, lastFilled(src, sectionEnd(all, i, src.Lines())))
	}
	slices.SortStableFunc(out, func(a, b protocol.FoldingRange) int { return int(a.StartLine) - int(b.StartLine) })
	if most, ok := v.client.find("textDocument.foldingRange.rangeLimit").(float64); ok && int(most) < len(out) && most >= 0 {
		out = out[:int(most)]
	}
	return out, nil
}

// heading is a line of prose that opens a section, as in Markdown.
type heading struct {
	line, level int
	text        string
}

// headings lists the headings of a note: `# …` to `###### …`, and lines above
// a line of `=` or `-`.
func headings(script *lang.Script) []heading {
	var out []heading
	src := script.Source
	text := func(line int) string {
		span := src.LineSpan(line)
		return src.Text[span.Start:span.End]
	}
	fenced := false
	for i, line := range script.Prose {
		t := text(line)
		if mark := strings.TrimSpace(t); strings.HasPrefix(mark, "```") || strings.HasPrefix(mark, "~~~") {
			fenced = !fenced
		}
		if fenced {
			continue
		}
		marks := len(t) - len(strings.TrimLeft(t, "#"))
		if 0 < marks && marks <= 6 && strings.HasPrefix(t[marks:], " ") {
			out = append(out, heading{line, marks, strings.TrimSpace(t[marks:])})
			continue
		}
		if i+1 < len(script.Prose) && script.Prose[i+1] == line+1 {
			if level := underline(text(line + 1)); level > 0 && underline(t) == 0 {
				out = append(out, heading{line, level, strings.TrimSpace(t)})
			}
		}
	}
	return out
}

// underline is the level of heading that a line under a title makes, 0 for a
// line of anything else.
func underline(line string) int {
	line = strings.TrimRight(line, " \t")
	switch {
	case len(line) >= 2 && strings.Trim(line, "=") == "":
		return 1
	case len(line) >= 2 && strings.Trim(line, "-") == "":
		return 2
	}
	return 0
}

// sectionEnd is the line at which the section of a heading ends, exclusive.
func sectionEnd(all []heading, i, lines int) int {
	for _, h := range all[i+1:] {
		if h.level <= all[i].level {
			return h.line
		}
	}
	return lines
}

// lastFilled is the last line before end that is not blank.
func lastFilled(src *lang.Source, end int) int {
	for end--; end > 0; end-- {
		span := src.LineSpan(end)
		if strings.TrimSpace(src.Text[span.Start:span.End]) != "" {
			break
		}
	}
	return end
}
