package lsp

import (
	"context"
	"errors"
	"io"
	"log/slog"
	"testing"
	"time"

	"go.lsp.dev/jsonrpc2"
	"go.uber.org/goleak"

	"inkjoule/check"
	"inkjoule/lang"
)

func TestMain(m *testing.M) {
	playRole()
	goleak.VerifyTestMain(m)
}

// pulling are the capabilities of a client that asks for diagnostics.
var pulling = object{
	"textDocument": object{"diagnostic": object{"relatedInformation": true}},
	"workspace":    object{"diagnostics": object{"refreshSupport": true}},
}

func wantCode(t *testing.T, err error, code int) {
	t.Helper()
	var f *failure
	if !errors.As(err, &f) || f.Code != code {
		t.Errorf("got %v, want the error %d", err, code)
	}
}

func TestPhases(t *testing.T) {
	e := launch(t, Options{Analyser: atOnce(letters)})
	wantCode(t, e.call("textDocument/hover", object{}, nil), -32002)
	wantCode(t, e.call("no/such", object{}, nil), -32002)
	e.open("file:///a.joule", "!") // before initialize: ignored
	e.start(object{})
	wantCode(t, e.call("initialize", object{"capabilities": object{}}, nil), -32600)
	wantCode(t, e.call("no/such", object{}, nil), -32601)
	wantCode(t, e.call("$/odd", object{}, nil), -32601)
	e.notify("$/odd", object{"x": 1})
	e.notify("no/such", nil)
	wantCode(t, e.call("textDocument/diagnostic", object{"textDocument": 7}, nil), -32602)
	e.must("shutdown", nil, nil)
	wantCode(t, e.call("textDocument/hover", object{}, nil), -32600)
	wantCode(t, e.call("shutdown", nil, nil), -32600)
	e.notify("exit", nil)
	<-e.ended
	if e.err != nil {
		t.Errorf("Serve: %v", e.err)
	}
	if p := e.all(isMethod("textDocument/publishDiagnostics")); len(p) != 0 {
		t.Errorf("diagnostics for a document opened before initialize: %v", p)
	}
}

func TestExitWithoutShutdown(t *testing.T) {
	e := launch(t, Options{Analyser: atOnce(letters)})
	e.start(object{})
	e.notify("exit", nil)
	<-e.ended
	if !errors.Is(e.err, ErrNoShutdown) {
		t.Errorf("Serve: %v, want ErrNoShutdown", e.err)
	}
}

// TestEndOfInput holds that the server leaves within a second when its input
// ends: between frames, within one, and while a note is being analysed by an
// analyser that does not stop.
func TestEndOfInput(t *testing.T) {
	stuck := make(chan struct{})
	defer close(stuck)
	deaf := func(ctx context.Context, in Input) (*lang.Note, []check.Finding, error) {
		<-stuck
		return nil, nil, nil
	}
	for _, c := range []struct {
		name, last string
		analyse    atOnce
	}{
		{"between frames", "", letters},
		{"in a header", "Content-Le", letters},
		{"in a body", "Content-Length: 100\r\n\r\n{", letters},
		{"while analysing", "", deaf},
	} {
		t.Run(c.name, func(t *testing.T) {
			e := launch(t, Options{Analyser: c.analyse})
			e.start(object{})
			e.open("file:///a.joule", "!")
			e.raw(c.last)
			begun := time.Now()
			e.to.Close()
			<-e.ended
			if took := time.Since(begun); took > time.Second {
				t.Errorf("the server left after %v", took)
			}
		})
	}
}

func TestPanicInHandler(t *testing.T) {
	broken := func(ctx context.Context, in Input) (*lang.Note, []check.Finding, error) {
		if in.Text == "bad" {
			panic("broken rule")
		}
		return letters(ctx, in)
	}
	e := launch(t, Options{Analyser: atOnce(broken)})
	e.start(pulling)
	e.open("file:///a.joule", "bad")
	var report struct{ Items []struct{ Code string } }
	e.must("textDocument/diagnostic", object{"textDocument": object{"uri": "file:///a.joule"}}, &report)
	if len(report.Items) != 1 || report.Items[0].Code != "not-checked" {
		t.Errorf("a note that can't be checked must say so, got %+v", report.Items)
	}
	e.edit("file:///a.joule", 2, "!")
	e.must("textDocument/diagnostic", object{"textDocument": object{"uri": "file:///a.joule"}}, &report)
	if len(report.Items) != 1 || report.Items[0].Code != "exclamation" {
		t.Errorf("the server does not go on after a panic, got %+v", report.Items)
	}
	e.quit()
}

// TestGuard holds that a panic becomes an internal error.
func TestGuard(t *testing.T) {
	s := &server{log: slog.New(slog.DiscardHandler)}
	_, err := s.guard("x/y", func() (any, error) { panic("in a handler") })
	var known *jsonrpc2.Error
	if !errors.As(err, &known) || known.Code != jsonrpc2.InternalError {
		t.Errorf("got %v, want an internal error", err)
	}
}

// TestClientThatDoesNotRead holds that a session ends in time although nobody
// reads what it writes.
func TestClientThatDoesNotRead(t *testing.T) {
	toServer, fromEditor := io.Pipe()
	_, fromServer := io.Pipe() // never read
	ended := make(chan error, 1)
	go func() { ended <- Serve(context.Background(), toServer, fromServer, Options{Analyser: atOnce(letters)}) }()
	e := &editor{t: t, to: fromEditor}
	e.begin("initialize", object{"capabilities": object{}})
	for i := range 1000 {
		e.begin("textDocument/hover", object{"n": i})
	}
	begun := time.Now()
	fromEditor.Close()
	<-ended
	if took := time.Since(begun); took > time.Second {
		t.Errorf("the server left after %v", took)
	}
	fromServer.Close()
}
