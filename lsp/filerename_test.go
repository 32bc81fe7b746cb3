package lsp

import (
	"os"
	"path/filepath"
	"testing"

	"go.lsp.dev/uri"

	"inkjoule/lang"
)

// TestFileRenames holds that references lead to where they led before, for a
// note, for a moved note with references of its own, and for a folder.
func TestFileRenames(t *testing.T) {
	caps := object{"workspace": object{"fileOperations": object{"willRename": true}, "workspaceEdit": object{"documentChanges": true}}}
	for _, c := range []struct {
		name, from, to string
		want           map[string]string // note: the line with the reference
	}{
		{"a referred note", "parts.joule", "lib/new parts.joule", map[string]string{
			"sub/user.joule": `uses "../lib/new parts.joule" as p`, "flat.joule": `uses "lib/new parts.joule"`}},
		{"a referring note", "sub/user.joule", "user.joule", map[string]string{"sub/user.joule": `uses "parts.joule" as p`}},
		{"a folder", "sub", "deep/er", map[string]string{"sub/user.joule": `uses "../../parts.joule" as p`}},
		{"a stranger", "stranger.joule", "other.joule", nil},
		{"one that only begins alike", "part", "whole", nil},
	} {
		t.Run(c.name, func(t *testing.T) {
			dir := t.TempDir()
			if err := os.Mkdir(filepath.Join(dir, ".git"), 0o755); err != nil {
				t.Fatal(err)
			}
			texts := map[string]string{
				"sub/user.joule": "User\n\n    uses \"../parts.joule\" as p\n    uses \"handbook/gases\"\n    W = p.C*2\n",
				"flat.joule":     "Flat\n\n    uses \"parts.joule\"\n    Q = C*4 V\n", "stranger.joule": "S\n\n    C = 1\n", "parts.joule": "P\n\n    C = 2\n",
			}
			for name, text := range texts {
				writeNote(t, dir, name, text)
			}
			e := launch(t, realOptions(t))
			e.startIn(caps, dir)
			file := func(name string) string { return string(uri.File(filepath.Join(dir, filepath.FromSlash(name)))) }
			var w struct {
				DocumentChanges []struct {
					TextDocument struct{ URI string }
					Edits        []changed
				}
			}
			e.must("workspace/willRenameFiles", object{"files": []object{{"oldUri": file(c.from), "newUri": file(c.to)}}}, &w)
			got := map[string]string{}
			for _, doc := range w.DocumentChanges {
				rel, _ := filepath.Rel(dir, uri.URI(doc.TextDocument.URI).FsPath())
				name := filepath.ToSlash(rel)
				d := &desk{editor: e, text: texts[name]}
				src := lang.NewSource(d.applied(doc.Edits))
				span := src.LineSpan(2)
				got[name] = src.Text[span.Start+4 : span.End]
			}
			if show(got) != show(c.want) && len(got)+len(c.want) > 0 {
				t.Errorf("got %s, want %s", show(got), show(c.want))
			}
			e.quit()
		})
	}
}
