package lsp

import (
	"encoding/json"
	"fmt"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"
	"time"

	"go.lsp.dev/uri"
)

// shows waits for the diagnostics of a note, open or not, to be so many.
func (e *editor) shows(u string, n int) {
	e.t.Helper()
	e.await(fmt.Sprintf("%d diagnostics of %s", n, filepath.Base(u)), func(m message) bool {
		var p pushed
		return m.Method == "textDocument/publishDiagnostics" && json.Unmarshal(m.Params, &p) == nil && p.URI == u && len(p.Diagnostics) == n
	})
	e.forget()
}

// changedFiles tells the server of changes on the disk: 1 created, 2 changed, 3
// deleted.
func (e *editor) changedFiles(kind int, uris ...string) {
	var list []object
	for _, u := range uris {
		list = append(list, object{"uri": u, "type": kind})
	}
	e.notify("workspace/didChangeWatchedFiles", object{"changes": list})
}

// watching are the capabilities of a client that watches files.
var watching = object{"workspace": object{"didChangeWatchedFiles": object{"dynamicRegistration": true}}}

// TestSurvey holds that findings of notes that are not open are shown, follow
// the disk, and go when the note goes, is moved, or is closed and clean.
func TestSurvey(t *testing.T) {
	dir := t.TempDir()
	a := writeNote(t, dir, "a.joule", "!!")
	b := writeNote(t, dir, "sub/b.joule.md", "!")
	writeNote(t, dir, "clean.joule", "fine")
	writeNote(t, dir, "no-note.txt", "!!!!!")
	e := launch(t, Options{Analyser: atOnce(referring)})
	e.startIn(watching, dir)
	e.shows(b, 1) // the later one in the order of paths
	writeNote(t, dir, "a.joule", "!!! later")
	e.changedFiles(2, a)
	e.shows(a, 3)
	c := writeNote(t, dir, "sub/c.joule", "!!!!!!")
	if err := os.Remove(uri.URI(b).FsPath()); err != nil {
		t.Fatal(err)
	}
	e.changedFiles(1, c)
	e.changedFiles(3, b)
	e.await("that the deleted note is cleared and the new one shown", func(m message) bool {
		return len(e.lastOf(b)) == 0 && len(e.lastOf(c)) == 6
	})
	e.forget()
	e.open(a, "!")
	e.shows(a, 1)
	e.notify("textDocument/didClose", object{"textDocument": object{"uri": a}})
	e.shows(a, 3) // the disk's again
	e.quit()
}

// lastOf is the newest list of diagnostics of a note, as raw items; nil if none
// has come. It is for use within await, which holds the lock.
func (e *editor) lastOf(u string) []json.RawMessage {
	var out []json.RawMessage
	for _, m := range e.got {
		var p struct {
			URI         string
			Diagnostics []json.RawMessage
		}
		if m.Method == "textDocument/publishDiagnostics" && json.Unmarshal(m.Params, &p) == nil && p.URI == u {
			out = p.Diagnostics
		}
	}
	return out
}

// TestSurveyCanBeSwitchedOff holds it for settings that come at the start and
// for those that come later.
func TestSurveyCanBeSwitchedOff(t *testing.T) {
	dir := t.TempDir()
	a := writeNote(t, dir, "a.joule", "!!")
	e := launch(t, Options{Analyser: atOnce(letters)})
	on := true
	e.answer = func(m message) any {
		if m.Method == "workspace/configuration" {
			return []any{object{"workspaceDiagnostics": on}}
		}
		return nil
	}
	e.startIn(object{"workspace": object{"configuration": true}}, dir)
	e.shows(a, 2)
	on = false
	e.notify("workspace/didChangeConfiguration", object{"settings": nil})
	e.shows(a, 0)
	e.quit()
}

// TestSettingsOfAnyShape holds that whatever a client sends as settings, the
// server goes on with what it can read.
func TestSettingsOfAnyShape(t *testing.T) {
	for _, c := range []struct {
		name   string
		caps   object
		answer any
		sent   any
		hints  int
	}{
		{"null", object{"workspace": object{"configuration": true}}, []any{nil}, nil, 4},
		{"no list", object{"workspace": object{"configuration": true}}, "what", nil, 4},
		{"an empty list", object{"workspace": object{"configuration": true}}, []any{}, nil, 4},
		{"other types", object{"workspace": object{"configuration": true}}, []any{object{"inlayHints": 7, "workspaceDiagnostics": "yes"}}, nil, 4},
		{"hints off", object{"workspace": object{"configuration": true}}, []any{object{"inlayHints": object{"results": false}}}, nil, 1},
		{"sent, not asked for", object{}, nil, object{"inkjoule": object{"inlayHints": object{"results": false, "asked": false}}}, 0},
		{"sent for others", object{}, nil, object{"other": object{"inlayHints": object{"results": false}}}, 4},
		{"sent null", object{}, nil, nil, 4},
	} {
		t.Run(c.name, func(t *testing.T) {
			d := &desk{editor: launch(t, realOptions(t)), uri: "file:///w/a.joule", text: capacitor}
			d.answer = func(m message) any {
				if m.Method == "workspace/configuration" {
					return c.answer
				}
				return nil
			}
			d.start(c.caps)
			d.open(d.uri, d.text)
			d.notify("workspace/didChangeConfiguration", object{"settings": c.sent})
			deadline := time.Now().Add(longest)
			for len(d.hints()) != c.hints && time.Now().Before(deadline) {
				time.Sleep(5 * time.Millisecond)
			}
			if got := len(d.hints()); got != c.hints {
				t.Errorf("%d hints, want %d", got, c.hints)
			}
			d.quit()
		})
	}
}

func TestRegistration(t *testing.T) {
	for _, c := range []struct {
		caps object
		want []string
	}{
		{object{}, nil},
		{object{"workspace": object{"didChangeWatchedFiles": object{"dynamicRegistration": false}}}, nil},
		{watching, []string{"workspace/didChangeWatchedFiles"}},
		{object{"workspace": object{"didChangeConfiguration": object{"dynamicRegistration": true}}}, []string{"workspace/didChangeConfiguration"}},
	} {
		e := launch(t, Options{Analyser: atOnce(letters)})
		e.start(c.caps)
		if c.want != nil {
			e.await("the registration", isMethod("client/registerCapability"))
		}
		e.open("file:///a.joule", "!")
		e.diagnosed("file:///a.joule", 1)
		var got []string
		for _, m := range e.all(isMethod("client/registerCapability")) {
			var p struct{ Registrations []struct{ Method string } }
			if err := json.Unmarshal(m.Params, &p); err != nil {
				t.Fatal(err)
			}
			for _, r := range p.Registrations {
				got = append(got, r.Method)
			}
		}
		if fmt.Sprint(got) != fmt.Sprint(c.want) {
			t.Errorf("%v: registered %v, want %v", c.caps, got, c.want)
		}
		e.quit()
	}
}

// TestReferredFileChangesOnDisk holds that a note follows the disk: by events,
// and without any by looking.
func TestReferredFileChangesOnDisk(t *testing.T) {
	t.Parallel()
	for _, c := range []struct {
		name  string
		caps  object
		event bool
	}{{"events", watching, true}, {"no events", object{}, false}} {
		t.Run(c.name, func(t *testing.T) {
			t.Parallel()
			dir := t.TempDir()
			other := writeNote(t, dir, "b.joule", "first")
			note := writeNote(t, dir, "a.joule", "")
			e := launch(t, Options{Analyser: atOnce(referring)})
			e.startIn(c.caps, dir)
			e.open(note, "uses b.joule")
			says := func(text string) {
				t.Helper()
				e.await(text, func(m message) bool {
					return m.Method == "textDocument/publishDiagnostics" && strings.Contains(string(m.Params), text)
				})
			}
			says("first")
			writeNote(t, dir, "b.joule", "second text")
			if c.event {
				e.changedFiles(2, other)
			}
			says("second text")
			if err := os.Remove(uri.URI(other).FsPath()); err != nil {
				t.Fatal(err)
			}
			if c.event {
				e.changedFiles(3, other)
			}
			says("does not exist")
			e.quit()
		})
	}
}

// TestConfigurationFile holds that the configuration that holds for a note is
// found from the note upward, in nested folders each its own, and followed.
func TestConfigurationFile(t *testing.T) {
	dir := t.TempDir()
	const text = "Note\n\n    b = 1 m\n    d = 3 m\n    c = b*2 = 2 m\n"
	writeNote(t, dir, "inkjoule.toml", "[severity]\nunused-definition = \"error\"\n")
	config := writeNote(t, dir, "inner/inkjoule.toml", "[severity]\nunused-definition = \"off\"\n")
	outer := writeNote(t, dir, "a.joule", text)
	inner := writeNote(t, dir, "inner/deep/a.joule", text)
	e := launch(t, realOptions(t))
	e.startIn(watching, dir)
	severities := func(u string, version int) []int {
		var out []int
		for _, d := range e.diagnosed(u, version).Diagnostics {
			if d.Code == "unused-definition" {
				out = append(out, d.Severity)
			}
		}
		return out
	}
	e.open(outer, text)
	e.open(inner, text)
	if got := severities(outer, 1); fmt.Sprint(got) != "[1]" {
		t.Errorf("outer: %v", got)
	}
	if got := severities(inner, 1); len(got) != 0 {
		t.Errorf("inner: %v", got)
	}
	e.forget()
	writeNote(t, dir, "inner/inkjoule.toml", "[severity]\nunused-definition = \"caution\"\n")
	e.changedFiles(2, config)
	if got := severities(inner, 1); fmt.Sprint(got) != "[2]" {
		t.Errorf("inner after the change: %v", got)
	}
	writeNote(t, dir, "inner/inkjoule.toml", "[severity]\nno-such = \"caution\"\n")
	e.forget()
	e.changedFiles(2, config)
	e.await("the fault of the configuration", func(m message) bool {
		return strings.Contains(string(m.Params), "no rule is called") && strings.Contains(string(m.Params), "inkjoule.toml")
	})
	e.quit()
}

// TestBudgetOfTheConfiguration holds that an editor evaluates within the budget
// of the configuration, and again where that is raised.
func TestBudgetOfTheConfiguration(t *testing.T) {
	dir := t.TempDir()
	const text = "Note\n\n    x = sum(n for n from 1 to 1e5) = __\n"
	config := writeNote(t, dir, "inkjoule.toml", "[budget]\nsteps = 1000\n")
	note := writeNote(t, dir, "a.joule", text)
	e := launch(t, realOptions(t))
	e.startIn(watching, dir)
	e.open(note, text)
	over := func() bool {
		for _, d := range e.diagnosed(note, 1).Diagnostics {
			if d.Code == "over-budget" {
				return true
			}
		}
		return false
	}
	if !over() {
		t.Error("1000 steps were enough")
	}
	e.forget()
	writeNote(t, dir, "inkjoule.toml", "")
	e.changedFiles(2, config)
	if over() {
		t.Error("the default was not enough")
	}
	e.quit()
}

func TestWorkspaceFolders(t *testing.T) {
	one, two := t.TempDir(), t.TempDir()
	a := writeNote(t, one, "a.joule", "!")
	b := writeNote(t, two, "b.joule", "!!")
	e := launch(t, Options{Analyser: atOnce(letters)})
	e.startIn(object{}, one)
	e.shows(a, 1)
	folder := func(dir string) []object { return []object{{"uri": string(uri.File(dir)), "name": "x"}} }
	e.notify("workspace/didChangeWorkspaceFolders", object{"event": object{"added": folder(two), "removed": []object{}}})
	e.shows(b, 2)
	e.notify("workspace/didChangeWorkspaceFolders", object{"event": object{"added": []object{}, "removed": folder(one)}})
	e.shows(a, 0)
	e.quit()
}

// TestPullAll holds it for a client that pulls.
func TestPullAll(t *testing.T) {
	dir := t.TempDir()
	a := writeNote(t, dir, "a.joule", "!")
	b := writeNote(t, dir, "b.joule", "!!")
	e := launch(t, Options{Analyser: atOnce(letters)})
	e.startIn(pulling, dir)
	e.open(a, "!!!")
	type report struct {
		Items []struct {
			URI, Kind, ResultID string
			Items               []any
		}
	}
	var first, second, third report
	e.must("workspace/diagnostic", object{"previousResultIds": []any{}}, &first)
	if len(first.Items) != 1 || first.Items[0].URI != b || len(first.Items[0].Items) != 2 {
		t.Fatalf("first %s", show(first))
	}
	before := []object{{"uri": b, "value": first.Items[0].ResultID}}
	e.must("workspace/diagnostic", object{"previousResultIds": before}, &second)
	if len(second.Items) != 1 || second.Items[0].Kind != "unchanged" {
		t.Errorf("second %s", show(second))
	}
	if err := os.Remove(uri.URI(b).FsPath()); err != nil {
		t.Fatal(err)
	}
	e.must("workspace/diagnostic", object{"previousResultIds": before}, &third)
	if len(third.Items) != 1 || third.Items[0].Kind != "full" || len(third.Items[0].Items) != 0 {
		t.Errorf("third %s", show(third))
	}
	e.quit()
	if n := len(e.all(isMethod("textDocument/publishDiagnostics"))); n > 0 {
		t.Errorf("%d pushes", n)
	}
}

func TestWorkspaceSymbols(t *testing.T) {
	d, dir := workshop(t)
	for i := range 2 * maxSymbols {
		writeNote(t, dir, fmt.Sprintf("many/%03d.joule", i), "Many\n\n    Cmax = 1 F\n")
	}
	query := func(q string) []string {
		var got []struct {
			Name, ContainerName string
			Location            struct{ URI string }
		}
		d.must("workspace/symbol", object{"query": q}, &got)
		var out []string
		for _, s := range got {
			out = append(out, s.Name+" in "+s.ContainerName)
		}
		return out
	}
	all := query("C")
	if len(all) != maxSymbols || !slices.Contains(all[:2], "C in parts.joule") || !slices.Contains(all[:2], "C in stranger.joule") {
		t.Errorf("%d symbols, the first %v", len(all), all[:min(4, len(all))])
	}
	if got := query("gl"); len(got) != 1 || got[0] != "glass in parts.joule" {
		t.Errorf("got %v", got)
	}
	if got := query("own"); len(got) != 1 || got[0] != "own in glass in parts.joule" {
		t.Errorf("got %v", got)
	}
	if got := query("no such name"); len(got) != 0 {
		t.Errorf("got %v", got)
	}
	d.quit()
}

// TestProgress holds that long work is told of after a second and not before,
// and only to a client that wants it.
func TestProgress(t *testing.T) {
	t.Parallel()
	for _, c := range []struct {
		name string
		caps object
		each time.Duration
		told bool
	}{
		{"long", object{"window": object{"workDoneProgress": true}}, 130 * time.Millisecond, true},
		{"short", object{"window": object{"workDoneProgress": true}}, time.Millisecond, false},
		{"not wanted", object{}, 130 * time.Millisecond, false},
	} {
		t.Run(c.name, func(t *testing.T) {
			t.Parallel()
			dir := t.TempDir()
			var last string
			for i := range 6 {
				last = writeNote(t, dir, fmt.Sprintf("%d.joule", i), "!")
			}
			e := launch(t, Options{Analyser: atOnce(slow(c.each))})
			e.startIn(c.caps, dir)
			e.await("the last note", func(m message) bool { return strings.Contains(string(m.Params), last) })
			if c.told {
				e.await("the end of the progress", func(m message) bool {
					return m.Method == "$/progress" && strings.Contains(string(m.Params), `"kind":"end"`)
				})
			}
			e.quit()
			created := e.all(isMethod("window/workDoneProgress/create"))
			reports := e.all(isMethod("$/progress"))
			if told := len(created) == 1 && len(reports) >= 2; told != c.told {
				t.Errorf("%d tokens, %d reports", len(created), len(reports))
			}
		})
	}
}
