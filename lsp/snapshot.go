package lsp

import (
	"context"
	"fmt"
	"runtime/debug"
	"strings"
	"sync"
	"sync/atomic"
	"time"

	"go.lsp.dev/jsonrpc2"
	"go.lsp.dev/uri"

	"inkjoule/check"
	"inkjoule/lang"
)

// A snapshot is one text of one note with its analysis, which is made once,
// when it is first asked for. Nothing in it changes otherwise.
type snapshot struct {
	uri     uri.URI
	version int32 // as the client counts; of no meaning for a text of the disk
	open    bool  // the text is the editor's
	home    home
	src     *lang.Source
	enc     encoding
	files   *files
	session *session

	ctx       context.Context // ends when a newer text supersedes this one
	supersede context.CancelCauseFunc
	once      sync.Once
	done      chan struct{}
	config    stamp                     // of the configuration, as it was for the analysis
	previous  atomic.Pointer[lang.Note] // for reuse; dropped once used
	pace      time.Duration             // what the analysis of the text before has taken
	result    analysis
	err       error
}

// analysis is all that is known about a text.
type analysis struct {
	note     *lang.Note
	findings []check.Finding
	cost     time.Duration
	whole    func() []lang.Use // all uses, found when first asked for
}

func (a *analysis) uses() []lang.Use { return a.whole() }

// snap makes a snapshot of a text in a view. It lasts as long as somebody holds
// it.
func (v *view) snap(u uri.URI, at home, src *lang.Source) *snapshot {
	return &snapshot{
		uri: u, home: at, src: src, enc: v.client.enc, session: v.session,
		files: &files{home: at, open: v.texts(), read: map[uri.URI]stamp{}},
		ctx:   v.ctx, supersede: func(error) {}, done: make(chan struct{}),
	}
}

// opened makes it the snapshot of an open document, which ends when it is
// superseded.
func (s *snapshot) opened(version int32) *snapshot {
	s.version, s.open = version, true
	s.ctx, s.supersede = context.WithCancelCause(s.ctx)
	return s
}

// texts are the open documents' texts.
func (v *view) texts() map[uri.URI]*lang.Source {
	out := make(map[uri.URI]*lang.Source, len(v.docs))
	for u, doc := range v.docs {
		out[u] = doc.src
	}
	return out
}

// after lets the analysis of an older text be used again.
func (s *snapshot) after(old *snapshot) *snapshot {
	s.previous.Store(old.previous.Load())
	s.pace = old.pace
	if old.finished() && old.err == nil {
		s.previous.Store(old.result.note)
		s.pace = old.result.cost
	}
	return s
}

func (s *snapshot) mapper() mapper { return newMapper(s.src, s.enc) }

// finished reports whether the analysis has been made or has failed.
func (s *snapshot) finished() bool {
	select {
	case <-s.done:
		return true
	default:
		return false
	}
}

// analysis returns the analysis, which is begun if it has not been. The error
// is errStale when a newer text has come in between, else the context's cause.
func (s *snapshot) analysis(ctx context.Context) (*analysis, error) {
	s.once.Do(func() { s.session.behind(s.run) })
	select {
	case <-s.done:
	case <-ctx.Done():
		return nil, context.Cause(ctx)
	case <-s.ctx.Done():
		if !s.finished() {
			return nil, context.Cause(s.ctx)
		}
	}
	if s.err != nil {
		return nil, s.err
	}
	return &s.result, nil
}

// run analyses the text, one of a few at a time.
func (s *snapshot) run() {
	defer close(s.done)
	select {
	case s.session.cpu <- struct{}{}:
		defer func() { <-s.session.cpu }()
		s.result, s.err = s.analyse()
	case <-s.ctx.Done():
		s.err = context.Cause(s.ctx)
	}
	s.files.release()
	if s.err == nil {
		s.previous.Store(nil)
	}
}

// analyse calls the analyser. A panic in it becomes an error: one note that
// can't be analysed must not end the session.
func (s *snapshot) analyse() (a analysis, err error) {
	defer func() {
		if r := recover(); r != nil {
			s.session.log.Error("panic", "note", s.home.path, "value", fmt.Sprint(r), "stack", string(debug.Stack()))
			err = jsonrpc2.Errorf(jsonrpc2.InternalError, "internal error while checking %s; the log has the details", s.home.path)
		}
		if cause := context.Cause(s.ctx); cause != nil {
			err = cause
		}
	}()
	begun := time.Now()
	s.config = configStamp(s.home)
	in := Input{Root: s.home.root, Path: s.home.path, Text: s.src.Text, Files: s.files, Previous: s.previous.Load()}
	a.note, a.findings, err = s.session.analyse(s.ctx, in)
	a.cost = time.Since(begun)
	a.whole = sync.OnceValue(func() []lang.Use { return usesOf(a.note) })
	return a, err
}

// uses reports whether the note's analysis has, or may have, read the other.
func (s *snapshot) uses(other uri.URI) bool {
	return s.uri != other && (s.files.reads(other) || !s.finished() && refersTo(s.src.Text))
}

// refersTo reports whether a text may refer to another file.
func refersTo(text string) bool {
	return strings.Contains(text, "uses") || strings.Contains(text, ` from "`)
}
