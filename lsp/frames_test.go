package lsp

import (
	"bufio"
	"bytes"
	"context"
	"encoding/json"
	"errors"
	"fmt"
	"io"
	"strings"
	"testing"

	"go.lsp.dev/jsonrpc2"
)

func framed(body string) string { return fmt.Sprintf("Content-Length: %d\r\n\r\n%s", len(body), body) }

// ping is a well-formed notification that tests look for.
const ping = `{"jsonrpc":"2.0","method":"ping"}`

// readAll reads the wire to its end and returns the methods of the messages
// and the codes of the errors that were written.
func readAll(wire io.Reader) (methods []string, codes []int) {
	var out bytes.Buffer
	box := newOutbox(&out)
	f := newFrames(wire, box, func() {})
	for {
		msg, _, err := f.Read(context.Background())
		if err != nil {
			break
		}
		if r, ok := msg.(jsonrpc2.RequestMessage); ok {
			methods = append(methods, strings.Clone(r.Method()))
		}
	}
	box.drain(longest)
	r := bufio.NewReader(&out)
	for {
		body, err := readFrame(r)
		if err != nil {
			return methods, codes
		}
		var m message
		if json.Unmarshal(body, &m) == nil && m.Error != nil {
			codes = append(codes, m.Error.Code)
		}
	}
}

// TestFramesGoOn holds that whatever is wrong with one frame, the next is read.
func TestFramesGoOn(t *testing.T) {
	for _, c := range []struct {
		name, wire string
		codes      string // of the errors that are answered
	}{
		{"good", "", "[]"},
		{"no JSON", framed("{nonsense"), "[-32700]"},
		{"an array", framed("[1,2]"), "[-32700]"},
		{"a number", framed("7"), "[-32700]"},
		{"no version", framed(`{"method":"x"}`), "[-32700]"},
		{"fractional id", framed(`{"jsonrpc":"2.0","id":1.5,"method":"x"}`), "[-32700]"},
		{"bad UTF-8", framed("{\"jsonrpc\":\"2.0\",\"method\":\"\xff\xfe\"}"), "[]"},
		{"length 0", "Content-Length: 0\r\n\r\n", "[-32700]"},
		{"negative length", "Content-Length: -5\r\n\r\n", "[-32700]"},
		{"length is no number", "Content-Length: many\r\n\r\n", "[-32700]"},
		{"length beyond 64 bits", "Content-Length: 99999999999999999999999\r\n\r\n", "[-32700]"},
		{"no length", "Content-Type: x\r\n\r\n", "[-32700]"},
		{"junk lines", "hello\r\n\r\nthere\r\n\r\n", "[-32700]"},
		{"blank lines", "\r\n\r\n\n\n", "[]"},
		{"an endless header line", strings.Repeat("x", 1<<20) + "\r\n\r\n", "[-32700]"},
		{"body shorter than said", "Content-Length: 3\r\n\r\n" + `{"jsonrpc":"2.0","method":"x"}`, "[-32700]"},
		{"binary", "\x00\x01\x02\xff\r\n\r\n", "[-32700]"},
		{"deep", framed(strings.Repeat("[", 1<<20)), "[-32700]"},
		{"more headers", "content-length: 33\r\nContent-Type: application/vscode-jsonrpc; charset=utf-8\r\n\r\n" + ping, "[]"},
		{"LF only", "Content-Length: 33\n\n" + ping, "[]"},
	} {
		t.Run(c.name, func(t *testing.T) {
			methods, codes := readAll(strings.NewReader(c.wire + framed(ping)))
			if len(methods) == 0 || methods[len(methods)-1] != "ping" {
				t.Errorf("the next frame was not read; got %q", methods)
			}
			if got := fmt.Sprint(codes); got != c.codes {
				t.Errorf("answered %s, want %s", got, c.codes)
			}
		})
	}
}

// zeros is an endless input.
type zeros struct{}

func (zeros) Read(p []byte) (int, error) { clear(p); return len(p), nil }

// TestOversizedFrame holds that a frame that is too large is skipped without
// being kept.
func TestOversizedFrame(t *testing.T) {
	const n = maxBody + 1
	head := fmt.Sprintf("Content-Length: %d\r\n\r\n", n)
	wire := io.MultiReader(strings.NewReader(head), io.LimitReader(zeros{}, n), strings.NewReader(framed(ping)))
	methods, codes := readAll(wire)
	if fmt.Sprint(methods) != "[ping]" || fmt.Sprint(codes) != "[-32600]" {
		t.Errorf("methods %v, errors %v", methods, codes)
	}
}

// TestClaimedLength holds that memory follows what arrives, not what a header
// claims.
func TestClaimedLength(t *testing.T) {
	box := newOutbox(io.Discard)
	defer box.drain(longest)
	f := newFrames(strings.NewReader(fmt.Sprintf("Content-Length: %d\r\n\r\nabc", maxBody)), box, func() {})
	if _, _, err := f.Read(context.Background()); !errors.Is(err, io.ErrUnexpectedEOF) {
		t.Errorf("error %v", err)
	}
	if cap(f.body) > 4*keepBody {
		t.Errorf("%d bytes were reserved for 3", cap(f.body))
	}
}

// oneByOne gives its bytes one at a time.
type oneByOne struct{ r io.Reader }

func (o oneByOne) Read(p []byte) (int, error) { return o.r.Read(p[:min(1, len(p))]) }

// FuzzFrames holds that no bytes stop the reader from finding the good frame
// that follows a blank line, and that how they are split does not matter.
func FuzzFrames(f *testing.F) {
	for _, seed := range []string{
		"", ping, framed(ping), framed(ping) + framed("{"), "Content-Length: -1\r\n\r\n", "Content-Length: 5\r\n\r\nab",
		"Content-Length: 33\r\n\r\n" + ping + "Content-Length: 1", "\xff\xfe\r\n", framed(`{"jsonrpc":"2.0","id":1,"method":"a","params":[[[[`),
		"Content-Length: 999999999999\r\n\r\n", "Content-Length:33\r\nContent-Length: 2\r\n\r\n{}",
	} {
		f.Add(seed)
	}
	f.Fuzz(func(t *testing.T, wire string) {
		whole, codes := readAll(strings.NewReader(wire))
		split, splitCodes := readAll(oneByOne{strings.NewReader(wire)})
		if fmt.Sprint(whole, codes) != fmt.Sprint(split, splitCodes) {
			t.Fatalf("whole %q %v, split %q %v", whole, codes, split, splitCodes)
		}
	})
}
