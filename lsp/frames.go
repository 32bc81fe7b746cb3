package lsp

import (
	"bufio"
	"bytes"
	"context"
	"errors"
	"fmt"
	"io"
	"strconv"

	"go.lsp.dev/jsonrpc2"
)

// Limits of one incoming message. A note of 50 MB, escaped as JSON, must pass.
const (
	maxBody       = 256 << 20
	maxHeaderLine = 4 << 10
	keepBody      = 1 << 20 // a larger buffer is not kept for the next message
)

// frames is the wire: messages framed by Content-Length. It implements
// jsonrpc2.Stream. What is not a message is answered with an error and skipped
// up to the next header, so that one broken frame does not end the session.
type frames struct {
	in    *bufio.Reader
	out   *outbox
	body  []byte
	lost  bool   // between a broken header and the next good one
	ended func() // called when the input has ended
}

func newFrames(in io.Reader, out *outbox, ended func()) *frames {
	return &frames{in: bufio.NewReaderSize(in, 64<<10), out: out, ended: ended}
}

// A refusal is a frame that can't be used although the stream goes on.
type refusal struct {
	code jsonrpc2.Code
	text string
}

func (r *refusal) Error() string { return r.text }

// Read returns the next message. It fails only when the input has ended or ctx
// is cancelled.
func (f *frames) Read(ctx context.Context) (jsonrpc2.Message, int64, error) {
	for ctx.Err() == nil {
		body, err := f.next()
		if err == nil {
			var msg jsonrpc2.Message
			if msg, err = jsonrpc2.DecodeMessage(body); err == nil {
				return msg, int64(len(body)), nil
			}
			err = &refusal{jsonrpc2.ParseError, "the message is not a JSON-RPC 2.0 request, notification or response"}
		}
		var r *refusal
		if !errors.As(err, &r) {
			f.ended()
			return nil, 0, err
		}
		f.refuse(ctx, r)
	}
	return nil, 0, ctx.Err()
}

// refuse answers a frame whose id could not be read.
func (f *frames) refuse(ctx context.Context, r *refusal) {
	_, _ = f.Write(ctx, jsonrpc2.NewResponse(jsonrpc2.ID{}, nil, jsonrpc2.NewError(r.code, r.text)))
}

// next returns the body of the next frame, which is valid until the next call.
func (f *frames) next() ([]byte, error) {
	n, err := f.header()
	if err != nil {
		return nil, err
	}
	if n > maxBody {
		if _, err := io.CopyN(io.Discard, f.in, n); err != nil {
			return nil, io.ErrUnexpectedEOF
		}
		return nil, &refusal{jsonrpc2.InvalidRequest, fmt.Sprintf("the message has %d bytes, more than the %d that are accepted", n, maxBody)}
	}
	return f.read(int(n))
}

// read fills the body buffer as the bytes arrive: a length is only a claim.
func (f *frames) read(n int) ([]byte, error) {
	if cap(f.body) > keepBody {
		f.body = nil
	}
	f.body = f.body[:0]
	for len(f.body) < n {
		have := len(f.body)
		step := min(n-have, max(have, keepBody))
		f.body = append(f.body, make([]byte, step)...)
		if _, err := io.ReadFull(f.in, f.body[have:]); err != nil {
			return nil, io.ErrUnexpectedEOF
		}
	}
	return f.body, nil
}

// header reads lines up to a blank one and returns the content length. A block
// without a usable length is refused, once until a good one comes.
func (f *frames) header() (int64, error) {
	length, some := int64(0), false
	for {
		line, err := f.line()
		if err != nil {
			return 0, err
		}
		if len(line) > 0 {
			some = true
			if n, found := contentLength(line); found {
				length = n
			}
			continue
		}
		if length > 0 {
			f.lost = false
			return length, nil
		}
		if some && !f.lost {
			f.lost = true
			return 0, &refusal{jsonrpc2.ParseError, "a message must begin with the header Content-Length: N and a blank line"}
		}
		some = false
	}
}

// line returns the next line without its end; of an overlong line only the
// last part, where a header may follow junk.
func (f *frames) line() ([]byte, error) {
	var kept []byte
	for {
		part, err := f.in.ReadSlice('\n')
		kept = append(kept, part...)
		if over := len(kept) - maxHeaderLine; over > 0 {
			kept = kept[:copy(kept, kept[over:])]
		}
		switch {
		case err == nil:
			return bytes.TrimRight(kept, "\r\n"), nil
		case errors.Is(err, bufio.ErrBufferFull):
		case errors.Is(err, io.EOF) && len(kept) > 0:
			return nil, io.ErrUnexpectedEOF
		default:
			return nil, err
		}
	}
}

// contentLength reads the length from a header line; an unusable one is 0. It
// looks for the header anywhere in the line, since after a body of the wrong
// length it follows junk.
func contentLength(line []byte) (n int64, found bool) {
	const name = "Content-Length:"
	at := len(line) - len(name)
	for at >= 0 && !asciiFold(line[at:at+len(name)], name) {
		at--
	}
	if at < 0 {
		return 0, false
	}
	n, err := strconv.ParseInt(string(bytes.TrimSpace(line[at+len(name):])), 10, 64)
	if err != nil {
		return 0, true
	}
	return max(n, 0), true
}

// asciiFold compares ASCII letters without regard to case, other bytes as they
// are: header names are ASCII, and a line may hold any bytes.
func asciiFold(text []byte, name string) bool {
	for i, c := range text {
		if 'A' <= c && c <= 'Z' {
			c += 'a' - 'A'
		}
		n := name[i]
		if 'A' <= n && n <= 'Z' {
			n += 'a' - 'A'
		}
		if c != n {
			return false
		}
	}
	return true
}

// Write frames a message and hands it to the outbox.
func (f *frames) Write(_ context.Context, msg jsonrpc2.Message) (int64, error) {
	body := jsonrpc2.AppendMessage(nil, msg)
	frame := make([]byte, 0, len(body)+32)
	frame = fmt.Appendf(frame, "Content-Length: %d\r\n\r\n", len(body))
	frame = append(frame, body...)
	return int64(len(frame)), f.out.put(frame)
}

// Close stops the output; what is queued is still written.
func (f *frames) Close() error { return f.out.close() }
