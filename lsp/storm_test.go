package lsp

import (
	"context"
	"encoding/json"
	"fmt"
	"os"
	"os/exec"
	"runtime"
	"strconv"
	"sync"
	"testing"
	"time"

	"go.uber.org/goleak"

	"inkjoule/check"
	"inkjoule/lang"
)

// slow is an analyser that takes a while and obeys its context.
func slow(d time.Duration) atOnce {
	return func(ctx context.Context, in Input) (*lang.Note, []check.Finding, error) {
		select {
		case <-time.After(d):
			return letters(ctx, in)
		case <-ctx.Done():
			return nil, nil, ctx.Err()
		}
	}
}

// TestCancelStorm holds that each of many requests, cancelled before, while or
// after it runs, is answered exactly once.
func TestCancelStorm(t *testing.T) {
	e := launch(t, Options{Analyser: atOnce(slow(20 * time.Millisecond))})
	e.start(pulling)
	const uri, n = "file:///a.joule", 500
	e.open(uri, "!")
	doc := object{"textDocument": object{"uri": uri}}
	for i := range n {
		id := e.begin("textDocument/diagnostic", doc)
		number, _ := strconv.Atoi(id)
		e.notify("$/cancelRequest", object{"id": number - i%3})
		if i%50 == 0 {
			e.edit(uri, i+2, "!")
		}
	}
	e.notify("$/cancelRequest", object{"id": "no such"})
	e.notify("$/cancelRequest", object{"id": []int{1}})
	e.notify("$/cancelRequest", 7)
	for id := range n + 1 {
		e.await("an answer to everything", func(m message) bool { return string(m.ID) == strconv.Itoa(id+1) })
	}
	e.quit()
	answers := map[string]int{}
	for _, m := range e.all(func(m message) bool { return m.Method == "" }) {
		answers[string(m.ID)]++
		if m.Error != nil && m.Error.Code != -32800 && m.Error.Code != -32802 {
			t.Errorf("answer %v", m.Error)
		}
	}
	for id := range n + 2 {
		if got := answers[strconv.Itoa(id+1)]; got != 1 {
			t.Errorf("request %d was answered %d times", id+1, got)
		}
	}
}

// TestCancelStringID holds that a request with a string id can be cancelled
// while it runs.
func TestCancelStringID(t *testing.T) {
	e := launch(t, Options{Analyser: atOnce(slow(time.Hour))})
	e.start(pulling)
	e.open("file:///a.joule", "!")
	e.send(object{"jsonrpc": "2.0", "id": "one", "method": "textDocument/diagnostic", "params": object{"textDocument": object{"uri": "file:///a.joule"}}})
	e.notify("$/cancelRequest", object{"id": "one"})
	m := e.await("the answer", func(m message) bool { return string(m.ID) == `"one"` })
	if m.Error == nil || m.Error.Code != -32800 {
		t.Errorf("answer %+v, want -32800", m)
	}
}

// TestDuplicateID holds that a request whose id is in use is refused and the
// first one served.
func TestDuplicateID(t *testing.T) {
	e := launch(t, Options{Analyser: atOnce(slow(100 * time.Millisecond))})
	e.start(pulling)
	e.open("file:///a.joule", "!")
	for range 2 {
		e.send(object{"jsonrpc": "2.0", "id": 77, "method": "textDocument/diagnostic", "params": object{"textDocument": object{"uri": "file:///a.joule"}}})
	}
	mine := func(m message) bool { return string(m.ID) == "77" }
	refused := e.await("the refusal", func(m message) bool { return mine(m) && m.Error != nil })
	if refused.Error.Code != -32600 {
		t.Errorf("refused with %v", refused.Error)
	}
	e.await("the answer", func(m message) bool { return mine(m) && m.Error == nil })
	e.quit()
}

// TestEditsCancelDiagnosis holds that a burst of edits costs few analyses and
// that versions are pushed in order, the newest last.
func TestEditsCancelDiagnosis(t *testing.T) {
	var mu sync.Mutex
	finished := 0
	e := launch(t, Options{Analyser: atOnce(func(ctx context.Context, in Input) (*lang.Note, []check.Finding, error) {
		n, f, err := slow(20*time.Millisecond)(ctx, in)
		if err == nil {
			mu.Lock()
			finished++
			mu.Unlock()
		}
		return n, f, err
	})})
	e.start(object{})
	const uri, n = "file:///a.joule", 300
	e.open(uri, "!")
	for i := range n {
		e.change(uri, i+2, object{"range": between(0, 0, 0, 0), "text": "!"})
	}
	if d := e.diagnosed(uri, n+1); len(d.Diagnostics) != n+1 {
		t.Errorf("%d diagnostics, want %d", len(d.Diagnostics), n+1)
	}
	last := 0
	for _, m := range e.all(isMethod("textDocument/publishDiagnostics")) {
		var p pushed
		if err := json.Unmarshal(m.Params, &p); err != nil {
			t.Fatal(err)
		}
		if *p.Version <= last {
			t.Errorf("version %d after %d", *p.Version, last)
		}
		last = *p.Version
	}
	e.quit()
	mu.Lock()
	defer mu.Unlock()
	if finished > n/4 {
		t.Errorf("%d analyses were finished for %d edits", finished, n)
	}
}

// TestOpenAndClose holds that goroutines and memory stay flat over many
// documents, and that each close clears what was shown.
func TestOpenAndClose(t *testing.T) {
	before := goleak.IgnoreCurrent()
	e := launch(t, Options{Analyser: atOnce(letters)})
	e.start(object{})
	text := string(make([]byte, 10_000)) + "!"
	cycle := func(from, n int) uint64 {
		for i := range n {
			uri := fmt.Sprintf("file:///w/%d.joule", from+i)
			e.open(uri, text)
			if i%100 == 0 {
				e.diagnosed(uri, 1)
			}
			e.notify("textDocument/didClose", object{"textDocument": object{"uri": uri}})
		}
		e.call("no/such", nil, nil) // all is handled once this is answered
		e.mu.Lock()
		e.got = nil
		e.mu.Unlock()
		runtime.GC()
		var m runtime.MemStats
		runtime.ReadMemStats(&m)
		return m.HeapAlloc
	}
	base := cycle(0, 500)
	if grown := cycle(500, 2000); grown > base+base/10+1<<20 {
		t.Errorf("the heap grew from %d to %d bytes", base, grown)
	}
	e.quit()
	e.hangUp()
	goleak.VerifyNone(t, before)
}

// TestTenThousandEdits holds that memory stays flat while two notes, of which
// one refers to the other, are edited in turn.
func TestTenThousandEdits(t *testing.T) {
	dir := t.TempDir()
	other := writeNote(t, dir, "other.joule", "")
	note := writeNote(t, dir, "note.joule", "")
	e := launch(t, realOptions(t))
	e.startIn(object{}, dir)
	e.open(other, "Other\n\n    a = 1 m\n")
	e.open(note, "Note\n\n    uses \"other.joule\"\n    b = 2*a = 2 m\n")
	version := 1
	edits := func(n int) uint64 {
		for range n {
			version++
			e.change(other, version, object{"range": between(2, 8, 2, 9), "text": fmt.Sprint(version % 10)})
			e.change(note, version, object{"range": between(3, 8, 3, 9), "text": fmt.Sprint(version % 10)})
			if version%500 == 0 {
				e.diagnosed(note, version)
				e.forget()
			}
		}
		e.diagnosed(other, version)
		e.forget()
		runtime.GC()
		var m runtime.MemStats
		runtime.ReadMemStats(&m)
		return m.HeapAlloc
	}
	base := edits(1000)
	if grown := edits(5000); grown > base+base/10+1<<20 {
		t.Errorf("the heap grew from %d to %d bytes", base, grown)
	}
	e.quit()
}

// role names the environment variable that makes a process of this test play
// another part.
const role = "INKJOULE_TEST_ROLE"

func playRole() {
	switch os.Getenv(role) {
	case "server":
		if err := Serve(context.Background(), os.Stdin, os.Stdout, Options{Analyser: atOnce(letters)}); err != nil {
			os.Exit(1)
		}
		os.Exit(0)
	case "sleeper":
		time.Sleep(time.Minute)
		os.Exit(0)
	}
}

func play(t *testing.T, name string) *exec.Cmd {
	t.Helper()
	cmd := exec.Command(os.Args[0])
	cmd.Env = append(os.Environ(), role+"="+name)
	return cmd
}

// TestParentKilled holds that the server leaves within 5 s of the death of the
// process that it was told to watch, although its input stays open.
func TestParentKilled(t *testing.T) {
	t.Parallel()
	parent := play(t, "sleeper")
	if err := parent.Start(); err != nil {
		t.Fatal(err)
	}
	server := play(t, "server")
	in, err := server.StdinPipe()
	if err != nil {
		t.Fatal(err)
	}
	defer in.Close()
	if err := server.Start(); err != nil {
		t.Fatal(err)
	}
	hello := fmt.Sprintf(`{"jsonrpc":"2.0","id":1,"method":"initialize","params":{"processId":%d,"capabilities":{}}}`, parent.Process.Pid)
	fmt.Fprint(in, framed(hello))
	time.Sleep(200 * time.Millisecond)
	_ = parent.Process.Kill()
	_ = parent.Wait()
	begun := time.Now()
	left := make(chan error, 1)
	go func() { left <- server.Wait() }()
	select {
	case err := <-left:
		t.Logf("left after %v", time.Since(begun))
		if server.ProcessState.ExitCode() != 1 {
			t.Errorf("exit status %d (%v), want 1", server.ProcessState.ExitCode(), err)
		}
	case <-time.After(5 * time.Second):
		t.Error("the server is still there after 5 s")
		_ = server.Process.Kill()
		<-left
	}
}
