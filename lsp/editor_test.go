package lsp

import (
	"bufio"
	"context"
	"encoding/json"
	"errors"
	"fmt"
	"io"
	"strconv"
	"strings"
	"sync"
	"testing"
	"time"

	"inkjoule/check"
	"inkjoule/lang"
)

// longest is how long a test waits for what must come.
const longest = 10 * time.Second

// editor is a client of the server under test. It checks every frame that it
// receives and keeps all messages.
type editor struct {
	t      testing.TB
	to     io.WriteCloser
	ended  chan struct{} // closed when Serve has returned
	err    error         // what Serve returned
	nextID int

	mu    sync.Mutex
	grown *sync.Cond
	got   []message
	wrong error // a frame that is none

	answer func(m message) any // answers the server's requests; nil: null
}

// message is any JSON-RPC message.
type message struct {
	came    time.Time
	Version string          `json:"jsonrpc"`
	ID      json.RawMessage `json:"id,omitempty"`
	Method  string          `json:"method,omitempty"`
	Params  json.RawMessage `json:"params,omitempty"`
	Result  json.RawMessage `json:"result,omitempty"`
	Error   *failure        `json:"error,omitempty"`
}

type failure struct {
	Code    int             `json:"code"`
	Message string          `json:"message"`
	Data    json.RawMessage `json:"data,omitempty"`
}

func (f *failure) Error() string { return fmt.Sprintf("%d %s", f.Code, f.Message) }

// launch starts a server and connects an editor to it. The session ends with
// the test.
func launch(t testing.TB, opt Options) *editor {
	t.Helper()
	toServer, fromEditor := io.Pipe()
	toEditor, fromServer := io.Pipe()
	e := &editor{t: t, to: fromEditor, ended: make(chan struct{})}
	e.grown = sync.NewCond(&e.mu)
	go e.receive(bufio.NewReader(toEditor))
	go func() {
		defer close(e.ended)
		e.err = Serve(context.Background(), toServer, fromServer, opt)
		fromServer.Close()
	}()
	t.Cleanup(e.hangUp)
	return e
}

// hangUp closes the input and waits for the end of the server.
func (e *editor) hangUp() {
	e.to.Close()
	select {
	case <-e.ended:
	case <-time.After(longest):
		e.t.Error("the server has not ended after its input did")
	}
	e.mu.Lock()
	defer e.mu.Unlock()
	if e.wrong != nil {
		e.t.Errorf("output that is no frame: %v", e.wrong)
	}
	for _, m := range e.got {
		if strings.HasPrefix(m.Method, "window/showMessage") {
			e.t.Errorf("a popup: %s", m.Params)
		}
	}
}

// receive reads frames until the output ends.
func (e *editor) receive(r *bufio.Reader) {
	for {
		body, err := readFrame(r)
		if err != nil {
			if !errors.Is(err, io.EOF) {
				e.keep(message{}, err)
			}
			return
		}
		var m message
		if err := json.Unmarshal(body, &m); err != nil || m.Version != "2.0" {
			e.keep(m, fmt.Errorf("not a message: %s", body))
			continue
		}
		e.keep(m, nil)
		if m.Method != "" && m.ID != nil {
			e.reply(m)
		}
	}
}

func (e *editor) keep(m message, err error) {
	e.mu.Lock()
	defer e.mu.Unlock()
	if err != nil && e.wrong == nil {
		e.wrong = err
	}
	if err == nil {
		m.came = time.Now()
		e.got = append(e.got, m)
	}
	e.grown.Broadcast()
}

// reply answers a request of the server.
func (e *editor) reply(m message) {
	var result any
	if e.answer != nil {
		result = e.answer(m)
	}
	go e.send(map[string]any{"jsonrpc": "2.0", "id": m.ID, "result": result})
}

// readFrame reads one frame strictly: one header, a blank line, the body.
func readFrame(r *bufio.Reader) ([]byte, error) {
	line, err := r.ReadString('\n')
	if err != nil {
		return nil, err
	}
	digits, ok := strings.CutPrefix(strings.TrimSuffix(line, "\r\n"), "Content-Length: ")
	n, err := strconv.Atoi(digits)
	if blank, _ := r.ReadString('\n'); !ok || err != nil || blank != "\r\n" {
		return nil, fmt.Errorf("header %q", line)
	}
	body := make([]byte, n)
	_, err = io.ReadFull(r, body)
	return body, err
}

// send writes one message.
func (e *editor) send(v any) {
	body, err := json.Marshal(v)
	if err != nil {
		e.t.Errorf("marshal: %v", err)
	}
	e.raw(fmt.Sprintf("Content-Length: %d\r\n\r\n%s", len(body), body))
}

// raw writes bytes as they are.
func (e *editor) raw(bytes string) { _, _ = io.WriteString(e.to, bytes) }

func (e *editor) notify(method string, params any) {
	e.send(map[string]any{"jsonrpc": "2.0", "method": method, "params": params})
}

// begin sends a request and returns its id.
func (e *editor) begin(method string, params any) string {
	e.mu.Lock()
	e.nextID++
	id := e.nextID
	e.mu.Unlock()
	e.send(map[string]any{"jsonrpc": "2.0", "id": id, "method": method, "params": params})
	return strconv.Itoa(id)
}

// call sends a request and decodes the result, or returns the error.
func (e *editor) call(method string, params, result any) error {
	e.t.Helper()
	id := e.begin(method, params)
	m := e.await("the answer to "+method, func(m message) bool { return m.Method == "" && string(m.ID) == id })
	if m.Error != nil {
		return m.Error
	}
	if result == nil {
		return nil
	}
	return json.Unmarshal(m.Result, result)
}

// must is call for what can't fail.
func (e *editor) must(method string, params, result any) {
	e.t.Helper()
	if err := e.call(method, params, result); err != nil {
		e.t.Fatalf("%s: %v", method, err)
	}
}

// await returns the first message, already received or still to come, that
// fits.
func (e *editor) await(what string, fits func(message) bool) message {
	e.t.Helper()
	timeout := time.AfterFunc(longest, func() { e.keep(message{}, fmt.Errorf("%s has not come", what)) })
	defer timeout.Stop()
	e.mu.Lock()
	defer e.mu.Unlock()
	for next := 0; ; {
		for ; next < len(e.got); next++ {
			if fits(e.got[next]) {
				return e.got[next]
			}
		}
		if e.wrong != nil {
			e.t.Fatalf("waiting for %s: %v", what, e.wrong)
		}
		e.grown.Wait()
	}
}

// all returns the messages received so far that fit.
func (e *editor) all(fits func(message) bool) []message {
	e.mu.Lock()
	defer e.mu.Unlock()
	var out []message
	for _, m := range e.got {
		if fits(m) {
			out = append(out, m)
		}
	}
	return out
}

func isMethod(name string) func(message) bool {
	return func(m message) bool { return m.Method == name }
}

// object is a JSON object in a test.
type object = map[string]any

// start initializes the session with the given capabilities.
func (e *editor) start(caps object) object {
	e.t.Helper()
	var result object
	e.must("initialize", object{"processId": nil, "rootUri": nil, "capabilities": caps}, &result)
	e.notify("initialized", object{})
	return result
}

// quit ends the session in order.
func (e *editor) quit() {
	e.t.Helper()
	e.must("shutdown", nil, nil)
	e.notify("exit", nil)
	select {
	case <-e.ended:
	case <-time.After(longest):
		e.t.Fatal("the server has not ended after exit")
	}
	if e.err != nil {
		e.t.Fatalf("Serve after an orderly end: %v", e.err)
	}
}

func (e *editor) open(uri, text string) {
	e.notify("textDocument/didOpen", object{"textDocument": object{"uri": uri, "languageId": "joule", "version": 1, "text": text}})
}

// edit replaces the whole text.
func (e *editor) edit(uri string, version int, text string) {
	e.change(uri, version, object{"text": text})
}

func (e *editor) change(uri string, version int, changes ...object) {
	e.notify("textDocument/didChange", object{"textDocument": object{"uri": uri, "version": version}, "contentChanges": changes})
}

func at(line, character int) object { return object{"line": line, "character": character} }

func between(l0, c0, l1, c1 int) object { return object{"start": at(l0, c0), "end": at(l1, c1)} }

// pushed is a publishDiagnostics notification.
type pushed struct {
	URI         string `json:"uri"`
	Version     *int   `json:"version"`
	Diagnostics []struct {
		Range struct {
			Start, End struct{ Line, Character int }
		} `json:"range"`
		Severity           int                      `json:"severity"`
		Code               string                   `json:"code"`
		CodeDescription    *struct{ Href string }   `json:"codeDescription"`
		Message            string                   `json:"message"`
		Tags               []int                    `json:"tags"`
		RelatedInformation []map[string]interface{} `json:"relatedInformation"`
	} `json:"diagnostics"`
}

// diagnosed waits for the diagnostics of a version.
func (e *editor) diagnosed(uri string, version int) pushed {
	e.t.Helper()
	var p pushed
	e.await(fmt.Sprintf("diagnostics of version %d", version), func(m message) bool {
		if m.Method != "textDocument/publishDiagnostics" {
			return false
		}
		p = pushed{}
		return json.Unmarshal(m.Params, &p) == nil && p.URI == uri && p.Version != nil && *p.Version == version
	})
	return p
}

// letters is an analyser for tests: each `!` of the text is an error, each `?` a
// caution that is related to the first `!`.
func letters(ctx context.Context, in Input) (*lang.Note, []check.Finding, error) {
	note := &lang.Note{Path: in.Path, Script: &lang.Script{Source: lang.NewSource(in.Text)}}
	var found []check.Finding
	for i, r := range in.Text {
		f := lang.Fault{Rule: "exclamation", Severity: lang.Error, Span: lang.Span{Start: i, End: i + 1}, Message: "an exclamation mark"}
		switch first := strings.IndexByte(in.Text, '!'); {
		case r == '?':
			f.Rule, f.Severity, f.Message = "question", lang.Caution, "a question mark"
			if first >= 0 {
				f.Related = []lang.Related{{Span: lang.Span{Start: first, End: first + 1}, Message: "after this one"}}
			}
		case r != '!':
			continue
		}
		found = append(found, check.Finding{Fault: f, Path: in.Path})
	}
	return note, found, ctx.Err()
}

// atOnce is an analyser made of one function, which serves both steps. Tests are
// written so.
type atOnce func(ctx context.Context, in Input) (*lang.Note, []check.Finding, error)

func (f atOnce) Read(ctx context.Context, in Input) (*lang.Note, error) {
	note, _, err := f(ctx, in)
	if note == nil {
		note = &lang.Note{Path: in.Path, Script: &lang.Script{Source: lang.NewSource(in.Text)}}
	}
	return note, err
}

func (f atOnce) Check(ctx context.Context, in Input, _ *lang.Note) ([]check.Finding, error) {
	_, found, err := f(ctx, in)
	return found, err
}
