package lsp

import (
	"testing"

	"go.lsp.dev/protocol"

	"inkjoule/lang"
)

// TestFormatting holds that the editor lays a note out as tidy does, whole or
// in part, and sends nothing for a tidy one.
func TestFormatting(t *testing.T) {
	const untidy = "Μ😀\n\n    C=1 uF\n\n      U  =2 V\n"
	const tidy = "Μ😀\n\n    C = 1 uF\n\n    U  = 2 V\n"
	d := sit(t, able, untidy)
	defer d.quit()
	document := object{"textDocument": object{"uri": d.uri}, "options": object{"tabSize": 4, "insertSpaces": true}}
	format := func(method string, params object) string {
		var edits []edit
		var got []protocol.TextEdit
		d.must(method, params, &got)
		for _, e := range got {
			edits = append([]edit{{Range: &e.Range, Text: e.NewText}}, edits...)
		}
		return apply(lang.NewSource(d.text), d.enc, edits).Text
	}
	if got := format("textDocument/formatting", document); got != tidy {
		t.Errorf("whole: %q", got)
	}
	document["range"] = object{"start": at(4, 0), "end": at(4, 1)}
	if got := format("textDocument/rangeFormatting", document); got != "Μ😀\n\n    C=1 uF\n\n    U  = 2 V\n" {
		t.Errorf("one line: %q", got)
	}
}

func TestFormattingOfATidyNote(t *testing.T) {
	d := sit(t, able, "Tidy\n\n    C = 1 uF\n    U=(2 V\n")
	defer d.quit()
	var got []protocol.TextEdit
	d.must("textDocument/formatting", object{"textDocument": object{"uri": d.uri}, "options": object{"tabSize": 4, "insertSpaces": true}}, &got)
	if len(got) != 0 {
		t.Errorf("a faulty statement and a tidy one: %s", show(got))
	}
}
