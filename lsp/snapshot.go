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
	reading   stage[*reading]        // the note, read and evaluated
	checking  stage[[]check.Finding] // its findings, which take longer
	config    stamp                  // of the configuration, as it was for the analysis
	cost      time.Duration          // what the analysis has taken
	previous  atomic.Pointer[lang.Note]
	pace      time.Duration // what the analysis of the text before has taken
}

// reading is a note as most requests need it, without its findings.
type reading struct {
	note  *lang.Note
	whole func() []lang.Use // all uses, found when first asked for
}

func (r *reading) uses() []lang.Use { return r.whole() }

// stage is a result that many may wait for.
type stage[T any] struct {
	done  chan struct{}
	value T
	err   error
}

func newStage[T any]() stage[T] { return stage[T]{done: make(chan struct{})} }

// finished reports whether the result is there, or has failed.
func (g *stage[T]) finished() bool {
	select {
	case <-g.done:
		return true
	default:
		return false
	}
}

// wait returns the result. The error is the cause of whichever context ends
// before it is there.
func (g *stage[T]) wait(ctx, life context.Context) (value T, err error) {
	select {
	case <-g.done:
	case <-ctx.Done():
		return value, context.Cause(ctx)
	case <-life.Done():
		if !g.finished() {
			return value, context.Cause(life)
		}
	}
	return g.value, g.err
}

// snap makes a snapshot of a text in a view. It lasts as long as somebody holds
// it.
func (v *view) snap(u uri.URI, at home, src *lang.Source) *snapshot {
	return &snapshot{
		uri: u, home: at, src: src, enc: v.client.enc, session: v.session,
		files: &files{home: at, open: v.texts(), read: map[uri.URI]stamp{}},
		ctx:   v.ctx, supersede: func(error) {},
		reading: newStage[*reading](), checking: newStage[[]check.Finding](),
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
	if old.reading.finished() && old.reading.err == nil {
		s.previous.Store(old.reading.value.note)
	}
	if old.checking.finished() && old.checking.err == nil {
		s.pace = old.cost
	}
	return s
}

func (s *snapshot) mapper() mapper { return newMapper(s.src, s.enc) }

// read returns the note, which is analysed if it has not been. The error is
// errStale when a newer text has come in between.
func (s *snapshot) read(ctx context.Context) (*reading, error) {
	s.begin()
	return s.reading.wait(ctx, s.ctx)
}

// findings returns what has been found in the note; see read.
func (s *snapshot) findings(ctx context.Context) ([]check.Finding, error) {
	s.begin()
	return s.checking.wait(ctx, s.ctx)
}

func (s *snapshot) begin() { s.once.Do(func() { s.session.behind(s.run) }) }

// run analyses the text, one of a few at a time.
func (s *snapshot) run() {
	defer close(s.checking.done)
	defer s.files.release()
	begun := time.Now()
	s.readStage()
	if s.checking.err = s.reading.err; s.checking.err != nil {
		return
	}
	s.checking.err = s.guarded(func(in Input) (err error) {
		s.checking.value, err = s.session.analyser.Check(s.ctx, in, s.reading.value.note)
		return err
	})
	s.cost = time.Since(begun)
}

func (s *snapshot) readStage() {
	defer close(s.reading.done)
	s.config = configStamp(s.home)
	s.reading.err = s.guarded(func(in Input) error {
		note, err := s.session.analyser.Read(s.ctx, in)
		s.reading.value = &reading{note: note, whole: sync.OnceValue(func() []lang.Use { return usesOf(note) })}
		return err
	})
	if s.reading.err == nil {
		s.previous.Store(nil)
	}
}

// guarded does one part of the analysis, with others of a few at a time. A
// panic in it becomes an error: one note that can't be analysed must not end
// the session.
func (s *snapshot) guarded(part func(in Input) error) (err error) {
	select {
	case s.session.cpu <- struct{}{}:
		defer func() { <-s.session.cpu }()
	case <-s.ctx.Done():
		return context.Cause(s.ctx)
	}
	defer func() {
		if r := recover(); r != nil {
			s.session.log.Error("panic", "note", s.home.path, "value", fmt.Sprint(r), "stack", string(debug.Stack()))
			err = jsonrpc2.Errorf(jsonrpc2.InternalError, "internal error while checking %s; the log has the details", s.home.path)
		}
		if cause := context.Cause(s.ctx); cause != nil {
			err = cause
		}
	}()
	return part(Input{Root: s.home.root, Path: s.home.path, Text: s.src.Text, Files: s.files, Previous: s.previous.Load()})
}

// uses reports whether the note's analysis has, or may have, read the other.
func (s *snapshot) uses(other uri.URI) bool {
	return s.uri != other && (s.files.reads(other) || !s.reading.finished() && refersTo(s.src.Text))
}

// refersTo reports whether a text may refer to another file.
func refersTo(text string) bool {
	return strings.Contains(text, "uses") || strings.Contains(text, ` from "`)
}
