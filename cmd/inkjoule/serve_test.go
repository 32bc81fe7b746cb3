package main

import (
	"bufio"
	"bytes"
	"context"
	"encoding/json"
	"fmt"
	"io"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"go.lsp.dev/uri"
)

// serving is a client of `inkjoule serve` in this process.
type serving struct {
	t      *testing.T
	to     io.WriteCloser
	from   *bufio.Reader
	status chan int
	log    *bytes.Buffer
}

func startServing(t *testing.T, args ...string) *serving {
	t.Helper()
	in, to := io.Pipe()
	from, out := io.Pipe()
	s := &serving{t: t, to: to, from: bufio.NewReader(from), status: make(chan int, 1), log: &bytes.Buffer{}}
	w := &world{in: in, out: out, err: s.log, getenv: func(string) string { return "" }}
	go func() {
		s.status <- execute(context.Background(), w, append([]string{"serve"}, args...))
		out.Close()
	}()
	return s
}

func (s *serving) send(message string) {
	fmt.Fprintf(s.to, "Content-Length: %d\r\n\r\n%s", len(message), message)
}

// next reads one frame, strictly.
func (s *serving) next() map[string]any {
	s.t.Helper()
	var n int
	if _, err := fmt.Fscanf(s.from, "Content-Length: %d\r\n\r\n", &n); err != nil {
		s.t.Fatalf("not a frame: %v", err)
	}
	body := make([]byte, n)
	if _, err := io.ReadFull(s.from, body); err != nil {
		s.t.Fatal(err)
	}
	var m map[string]any
	if err := json.Unmarshal(body, &m); err != nil {
		s.t.Fatalf("not JSON: %v: %s", err, body)
	}
	return m
}

// reply reads up to the answer to a request.
func (s *serving) reply(id float64) map[string]any {
	s.t.Helper()
	for {
		if m := s.next(); m["method"] == nil && m["id"] == id {
			return m
		}
	}
}

func TestServeEndsInOrder(t *testing.T) {
	s := startServing(t)
	s.send(`{"jsonrpc":"2.0","id":1,"method":"initialize","params":{"capabilities":{}}}`)
	if m := s.reply(1); m["error"] != nil {
		t.Fatal(m)
	}
	s.send(`{"jsonrpc":"2.0","id":2,"method":"shutdown"}`)
	s.reply(2)
	s.send(`{"jsonrpc":"2.0","method":"exit"}`)
	if got := <-s.status; got != 0 {
		t.Errorf("status %d, want 0\n%s", got, s.log)
	}
}

func TestServeWithoutShutdown(t *testing.T) {
	s := startServing(t)
	s.to.Close()
	if got := <-s.status; got != 1 {
		t.Errorf("status %d, want 1", got)
	}
}

func TestServeRefusesArguments(t *testing.T) {
	for _, args := range [][]string{{"x"}, {"--log", "loud"}, {"--no-such"}} {
		s := startServing(t, args...)
		if got := <-s.status; got != 2 {
			t.Errorf("%v: status %d, want 2", args, got)
		}
	}
}

// TestServeLogsAside holds that at every log level, and when frames and
// notifications are broken, nothing but frames is on standard output.
func TestServeLogsAside(t *testing.T) {
	for _, level := range []string{"debug", "info", "warn", "error"} {
		s := startServing(t, "--stdio", "--log", level)
		s.send(`{"jsonrpc":"2.0","id":1,"method":"initialize","params":{"capabilities":{}}}`)
		s.reply(1)
		s.send(`{"jsonrpc":"2.0","method":"textDocument/didOpen","params":7}`)
		s.send(`{broken`)
		s.send(`{"jsonrpc":"2.0","method":"textDocument/didChange","params":{"textDocument":{"uri":"file:///x","version":2},"contentChanges":[{"text":"a"}]}}`)
		s.send(`{"jsonrpc":"2.0","id":2,"method":"shutdown"}`)
		s.reply(2)
		s.send(`{"jsonrpc":"2.0","method":"exit"}`)
		if rest, err := io.ReadAll(s.from); err != nil || len(rest) > 0 {
			t.Errorf("%s: %q is left on the output (%v)", level, rest, err)
		}
		<-s.status
	}
}

// reviewed is a finding as both front ends tell it.
type reviewed struct {
	Rule, Severity, Message          string
	Line, Column, EndLine, EndColumn int
}

// TestEditorAndCommandLineAgree holds that `review` and `serve` find the same
// in the demo notes, from three working directories.
func TestEditorAndCommandLineAgree(t *testing.T) {
	demo, err := filepath.Abs(filepath.Join("..", "..", "corpus", "demo"))
	if err != nil {
		t.Fatal(err)
	}
	notes, err := filepath.Glob(filepath.Join(demo, "*.joule"))
	if err != nil || len(notes) == 0 {
		t.Fatalf("%d notes: %v", len(notes), err)
	}
	seen := 0
	for _, dir := range []string{demo, filepath.Join(demo, "..", ".."), t.TempDir()} {
		t.Chdir(dir)
		for _, note := range notes {
			line, editor := fromReview(t, note), fromServe(t, note)
			seen += len(line)
			if fmt.Sprint(line) != fmt.Sprint(editor) {
				t.Errorf("%s from %s:\nreview %+v\nserve  %+v", filepath.Base(note), dir, line, editor)
			}
		}
	}
	if seen < 20 {
		t.Errorf("only %d findings were compared", seen)
	}
}

func fromReview(t *testing.T, note string) []reviewed {
	t.Helper()
	var out, log bytes.Buffer
	w := &world{in: strings.NewReader(""), out: &out, err: &log, getenv: func(string) string { return "" }}
	if status := execute(context.Background(), w, []string{"review", "--format", "json", note}); status > 1 {
		t.Fatalf("review: status %d: %s", status, &log)
	}
	var doc struct {
		Notes []struct {
			Findings []struct {
				reviewed
				Detail string
				Waived any
			}
		}
	}
	if err := json.Unmarshal(out.Bytes(), &doc); err != nil {
		t.Fatal(err)
	}
	var all []reviewed
	for _, f := range doc.Notes[0].Findings {
		if f.Waived != nil && f.Waived != "" && f.Waived != false {
			continue
		}
		r := f.reviewed
		r.Message = strings.TrimSpace(fmt.Sprintf("%s [%s]\n%s", r.Message, r.Rule, f.Detail))
		all = append(all, r)
	}
	return all
}

func fromServe(t *testing.T, note string) []reviewed {
	t.Helper()
	raw, err := os.ReadFile(note)
	if err != nil {
		t.Fatal(err)
	}
	text, _ := json.Marshal(string(raw))
	u := uri.File(note)
	s := startServing(t)
	s.send(`{"jsonrpc":"2.0","id":1,"method":"initialize","params":{"capabilities":{"general":{"positionEncodings":["utf-32"]},
		"textDocument":{"diagnostic":{"relatedInformation":true}},"workspace":{"diagnostics":{"refreshSupport":true}}}}}`)
	s.reply(1)
	s.send(fmt.Sprintf(`{"jsonrpc":"2.0","method":"textDocument/didOpen","params":{"textDocument":{"uri":%q,"languageId":"joule","version":1,"text":%s}}}`, u, text))
	s.send(fmt.Sprintf(`{"jsonrpc":"2.0","id":2,"method":"textDocument/diagnostic","params":{"textDocument":{"uri":%q}}}`, u))
	reply, err := json.Marshal(s.reply(2))
	if err != nil {
		t.Fatal(err)
	}
	s.send(`{"jsonrpc":"2.0","id":3,"method":"shutdown"}`)
	s.reply(3)
	s.send(`{"jsonrpc":"2.0","method":"exit"}`)
	<-s.status
	var doc struct {
		Result struct {
			Items []struct {
				Code, Message string
				Severity      int
				Range         struct{ Start, End struct{ Line, Character int } }
			}
		}
	}
	if err := json.Unmarshal(reply, &doc); err != nil {
		t.Fatal(err)
	}
	var all []reviewed
	for _, d := range doc.Result.Items {
		all = append(all, reviewed{
			Rule: d.Code, Severity: []string{"", "error", "caution", "advice"}[d.Severity], Message: d.Message,
			Line: d.Range.Start.Line + 1, Column: d.Range.Start.Character + 1, EndLine: d.Range.End.Line + 1, EndColumn: d.Range.End.Character + 1,
		})
	}
	return all
}
