package lsp

import (
	"context"
	"encoding/json"
	"fmt"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"go.lsp.dev/uri"

	"inkjoule/check"
	"inkjoule/lang"
)

// referring is an analyser that finds in a note the errors of `letters`, and a
// caution for each note that it refers to, with that note's text as message.
func referring(ctx context.Context, in Input) (*lang.Note, []check.Finding, error) {
	note, found, err := letters(ctx, in)
	for line := range strings.Lines(in.Text) {
		name, ok := strings.CutPrefix(strings.TrimSpace(line), "uses ")
		if !ok {
			continue
		}
		text, err := in.Files.Read(ctx, name)
		if err != nil {
			text = "unreadable: " + err.Error()
		}
		at := strings.Index(in.Text, line)
		found = append(found, check.Finding{Path: in.Path, Fault: lang.Fault{
			Rule: "refers", Severity: lang.Caution, Span: lang.Span{Start: at, End: at + 4}, Message: text,
			Related: []lang.Related{{Path: name, Span: lang.Span{Start: 0, End: 1}, Message: "the other note"}},
		}})
	}
	return note, found, err
}

// writeNote writes a file below dir and returns its URI.
func writeNote(t *testing.T, dir, name, text string) string {
	t.Helper()
	path := filepath.Join(dir, name)
	if err := os.MkdirAll(filepath.Dir(path), 0o755); err != nil {
		t.Fatal(err)
	}
	if err := os.WriteFile(path, []byte(text), 0o644); err != nil {
		t.Fatal(err)
	}
	return string(uri.File(path))
}

// startIn initializes a session with workspace folders.
func (e *editor) startIn(caps object, folders ...string) object {
	e.t.Helper()
	var list []object
	for _, f := range folders {
		list = append(list, object{"uri": string(uri.File(f)), "name": filepath.Base(f)})
	}
	var result object
	e.must("initialize", object{"processId": nil, "workspaceFolders": list, "capabilities": caps}, &result)
	e.notify("initialized", object{})
	return result
}

func TestDiagnosticShowsWhatTheClientCan(t *testing.T) {
	can := object{"relatedInformation": true, "codeDescriptionSupport": true, "tagSupport": object{"valueSet": []int{1, 2}}}
	for _, c := range []struct {
		name string
		caps object
		rich bool
	}{
		{"a client that can all", object{"textDocument": object{"publishDiagnostics": can}}, true},
		{"a client that can nothing", object{}, false},
	} {
		t.Run(c.name, func(t *testing.T) {
			e := launch(t, Options{Analyser: atOnce(letters), Pages: "https://example.org/rules/"})
			e.start(c.caps)
			e.open("file:///a.joule", "!\n ?")
			d := e.diagnosed("file:///a.joule", 1).Diagnostics
			if len(d) != 2 {
				t.Fatalf("%d diagnostics, want 2", len(d))
			}
			caution := d[1]
			if caution.Severity != 2 || caution.Code != "question" || !strings.Contains(caution.Message, "[question]") {
				t.Errorf("got %+v", caution)
			}
			if rich := len(caution.RelatedInformation) == 1; rich != c.rich {
				t.Errorf("related information %v", caution.RelatedInformation)
			}
			if told := strings.Contains(caution.Message, "line 1: after this one"); told == c.rich {
				t.Errorf("message %q", caution.Message)
			}
			if linked := caution.CodeDescription != nil && caution.CodeDescription.Href == "https://example.org/rules/question"; linked != c.rich {
				t.Errorf("code description %+v", caution.CodeDescription)
			}
			e.quit()
		})
	}
}

func TestTags(t *testing.T) {
	unused := func(ctx context.Context, in Input) (*lang.Note, []check.Finding, error) {
		f := lang.Fault{Rule: "unused-definition", Severity: lang.Advice, Message: "nothing uses a"}
		waived := check.Finding{Fault: lang.Fault{Rule: "x", Severity: lang.Error}, Waived: "agreed", WaivedBy: lang.Span{Start: 1, End: 3}}
		foreign := check.Finding{Fault: lang.Fault{Rule: "y", Severity: lang.Error}, Path: "other.joule"}
		return nil, []check.Finding{{Fault: f, Path: in.Path}, waived, foreign}, nil
	}
	e := launch(t, Options{Analyser: atOnce(unused)})
	e.start(object{"textDocument": object{"publishDiagnostics": object{"tagSupport": object{"valueSet": []int{1}}}}})
	e.open("file:///a.joule", "a = 1")
	d := e.diagnosed("file:///a.joule", 1).Diagnostics
	if len(d) != 1 || d[0].Severity != 3 || fmt.Sprint(d[0].Tags) != "[1]" {
		t.Errorf("got %+v, want one information with the tag 1", d)
	}
	e.quit()
}

// TestOneChannel holds that a client that pulls is sent nothing, and that one
// that can't refresh is pushed to although it could pull.
func TestOneChannel(t *testing.T) {
	for _, c := range []struct {
		name  string
		caps  object
		pulls bool
	}{
		{"pull and refresh", pulling, true},
		{"pull alone", object{"textDocument": object{"diagnostic": object{}}}, false},
		{"neither", object{}, false},
	} {
		t.Run(c.name, func(t *testing.T) {
			e := launch(t, Options{Analyser: atOnce(letters)})
			caps := e.start(c.caps)["capabilities"].(object)
			if _, offered := caps["diagnosticProvider"]; offered != c.pulls {
				t.Errorf("diagnosticProvider offered: %v", offered)
			}
			e.open("file:///a.joule", "!")
			if !c.pulls {
				e.diagnosed("file:///a.joule", 1)
			} else {
				e.must("textDocument/diagnostic", object{"textDocument": object{"uri": "file:///a.joule"}}, nil)
				e.notify("textDocument/didClose", object{"textDocument": object{"uri": "file:///a.joule"}})
			}
			e.quit()
			if n := len(e.all(isMethod("textDocument/publishDiagnostics"))); c.pulls && n > 0 {
				t.Errorf("%d pushes to a client that pulls", n)
			}
		})
	}
}

func TestPullUnchanged(t *testing.T) {
	e := launch(t, Options{Analyser: atOnce(letters)})
	e.start(pulling)
	doc := object{"uri": "file:///a.joule"}
	e.open("file:///a.joule", "!")
	var first, second, third struct {
		Kind, ResultID string
		Items          []any
	}
	e.must("textDocument/diagnostic", object{"textDocument": doc}, &first)
	e.must("textDocument/diagnostic", object{"textDocument": doc, "previousResultId": first.ResultID}, &second)
	e.edit("file:///a.joule", 2, "!!")
	e.must("textDocument/diagnostic", object{"textDocument": doc, "previousResultId": first.ResultID}, &third)
	if first.Kind != "full" || second.Kind != "unchanged" || third.Kind != "full" || len(third.Items) != 2 {
		t.Errorf("got %+v, %+v, %+v", first, second, third)
	}
	e.quit()
}

// TestCloseClears holds that nothing stays on the screen of a closed document.
func TestCloseClears(t *testing.T) {
	e := launch(t, Options{Analyser: atOnce(letters)})
	e.start(object{})
	e.open("file:///a.joule", "!")
	e.diagnosed("file:///a.joule", 1)
	e.notify("textDocument/didClose", object{"textDocument": object{"uri": "file:///a.joule"}})
	e.await("the empty list", func(m message) bool {
		return m.Method == "textDocument/publishDiagnostics" && strings.Contains(string(m.Params), `"diagnostics":[]`)
	})
	e.quit()
}

// TestUnsavedTextOverridesTheDisk holds it for the referred note too, and that
// the referring one is diagnosed anew when the other changes, is closed or is
// opened.
func TestUnsavedTextOverridesTheDisk(t *testing.T) {
	dir := t.TempDir()
	other := writeNote(t, dir, "sub/b.joule", "on disk")
	note := writeNote(t, dir, "a.joule", "")
	e := launch(t, Options{Analyser: atOnce(referring)})
	e.startIn(object{}, dir)
	says := func(text string) {
		t.Helper()
		e.await("diagnostics of a.joule that say "+text, func(m message) bool {
			var p pushed
			return m.Method == "textDocument/publishDiagnostics" && json.Unmarshal(m.Params, &p) == nil &&
				p.URI == note && len(p.Diagnostics) == 1 && strings.Contains(p.Diagnostics[0].Message, text)
		})
		e.mu.Lock()
		e.got = nil
		e.mu.Unlock()
	}
	e.open(note, "uses sub/b.joule")
	says("on disk")
	e.open(other, "in the editor")
	says("in the editor")
	e.change(other, 2, object{"range": between(0, 0, 0, 2), "text": "edited in"})
	says("edited in the editor")
	e.notify("textDocument/didClose", object{"textDocument": object{"uri": other}})
	says("on disk")
	e.quit()
}

// TestRefreshForDependents holds that a pulling client is told when the change
// of one note may change the findings of another.
func TestRefreshForDependents(t *testing.T) {
	dir := t.TempDir()
	other := writeNote(t, dir, "b.joule", "on disk")
	note := writeNote(t, dir, "a.joule", "")
	e := launch(t, Options{Analyser: atOnce(referring)})
	e.startIn(pulling, dir)
	e.open(note, "uses b.joule")
	e.must("textDocument/diagnostic", object{"textDocument": object{"uri": note}}, nil)
	e.open(other, "in the editor")
	e.await("a refresh", isMethod("workspace/diagnostic/refresh"))
	var report struct{ Items []struct{ Message string } }
	e.must("textDocument/diagnostic", object{"textDocument": object{"uri": note}}, &report)
	if len(report.Items) != 1 || !strings.Contains(report.Items[0].Message, "in the editor") {
		t.Errorf("got %+v", report)
	}
	e.quit()
}

// TestTheFolderIsAWall holds that a note reads nothing outside of its folder,
// neither by a path nor by a link.
func TestTheFolderIsAWall(t *testing.T) {
	top := t.TempDir()
	dir := filepath.Join(top, "w")
	writeNote(t, dir, "inkjoule.toml", "")
	writeNote(t, top, "secret.joule", "the secret")
	note := writeNote(t, dir, "sub/a.joule", "")
	if err := os.Symlink(filepath.Join(top, "secret.joule"), filepath.Join(dir, "link.joule")); err != nil {
		t.Skip("no symbolic links here")
	}
	e := launch(t, Options{Analyser: atOnce(referring)})
	e.startIn(object{}, dir)
	for i, path := range []string{"../secret.joule", "../../w/../secret.joule", "/etc/passwd", "link.joule", filepath.Join(top, "secret.joule")} {
		if i == 0 {
			e.open(note, "uses "+path)
		} else {
			e.edit(note, i+1, "uses "+path)
		}
		d := e.diagnosed(note, i+1).Diagnostics
		if len(d) != 1 || !strings.Contains(d[0].Message, "unreadable") || strings.Contains(d[0].Message, "the secret") {
			t.Errorf("%s: %+v", path, d)
		}
	}
	e.quit()
}

func TestHome(t *testing.T) {
	dir := t.TempDir()
	writeNote(t, dir, "w/inkjoule.toml", "")
	for _, c := range []struct{ name, root, path string }{
		{"w/a.joule", "w", "a.joule"},
		{"w/inner/b/a.joule", "w", "inner/b/a.joule"},
		{"lone/ü x#1.joule", "lone", "ü x#1.joule"},
	} {
		u := uri.URI(writeNote(t, dir, c.name, ""))
		if got, want := homeOf(u), (home{filepath.Join(dir, c.root), c.path}); got != want {
			t.Errorf("%s: %+v, want %+v", c.name, got, want)
		}
	}
	if got := homeOf("untitled:Untitled-1"); got != (home{"", "Untitled-1"}) {
		t.Errorf("untitled: %+v", got)
	}
}

// TestOneKey holds that every spelling of an address is one document.
func TestOneKey(t *testing.T) {
	for _, same := range [][]string{
		{"file:///c%3A/x/a.joule", "file:///C:/x/a.joule", "file:///c:/x/a.joule", "file:///C%3a/x/a.joule"},
		{"file:///w/%C3%BC.joule", "file:///w/%c3%bc.joule", "file:///w/ü.joule"},
		{"file:///w/a%20b.joule", "file:///w/a b.joule"},
		{"file://server/share/a.joule", "file://SERVER/share/a.joule"},
		{"untitled:Untitled-1"},
	} {
		t.Run(same[0], func(t *testing.T) {
			e := launch(t, Options{Analyser: atOnce(letters)})
			e.start(pulling)
			e.open(same[0], "!")
			for i, spelling := range same {
				e.change(spelling, i+2, object{"range": between(0, 0, 0, 0), "text": "!"})
				var report struct{ Items []any }
				e.must("textDocument/diagnostic", object{"textDocument": object{"uri": spelling}}, &report)
				if len(report.Items) != i+2 {
					t.Errorf("%s: %d items, want %d", spelling, len(report.Items), i+2)
				}
			}
			e.quit()
		})
	}
}
