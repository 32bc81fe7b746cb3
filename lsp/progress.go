package lsp

import (
	"context"
	"fmt"
	"sync"
	"time"

	"go.lsp.dev/protocol"
)

// progressDelay is how long work may take before the user is told about it.
const progressDelay = time.Second

// progress tells the client how far long work has come, once it has taken more
// than a second and the client has agreed to be told.
type progress struct {
	s     *session
	title string
	token protocol.ProgressToken
	timer *time.Timer

	mu    sync.Mutex
	shown bool
	over  bool
	last  uint32
}

func (s *session) progress(title string) *progress {
	p := &progress{s: s, title: title}
	if s.now().client.can("window.workDoneProgress") {
		p.token = protocol.String(fmt.Sprintf("%s-%d", source, s.tokens.Add(1)))
		p.timer = time.AfterFunc(progressDelay, func() { s.behind(p.begin) })
	}
	return p
}

// begin asks the client for the token and waits for the answer: a report for a
// token that does not exist would be an error.
func (p *progress) begin() {
	ctx, cancel := context.WithTimeout(p.s.ctx, patience)
	defer cancel()
	err := p.s.peer.ask(ctx, protocol.MethodWindowWorkDoneProgressCreate, &protocol.WorkDoneProgressCreateParams{Token: p.token}, nil)
	p.mu.Lock()
	defer p.mu.Unlock()
	if err == nil && !p.over {
		p.shown = true
		p.send(&protocol.WorkDoneProgressBegin{Kind: "begin", Title: p.title, Percentage: ptr(p.last)})
	}
}

// at reports that done of all is done.
func (p *progress) at(done, all int) {
	p.mu.Lock()
	defer p.mu.Unlock()
	if percent := uint32(100 * done / max(1, all)); percent != p.last {
		p.last = percent
		if p.shown {
			p.send(&protocol.WorkDoneProgressReport{Kind: "report", Percentage: &percent})
		}
	}
}

func (p *progress) end() {
	if p.timer != nil {
		p.timer.Stop()
	}
	p.mu.Lock()
	defer p.mu.Unlock()
	p.over = true
	if p.shown {
		p.send(&protocol.WorkDoneProgressEnd{Kind: "end"})
	}
}

func (p *progress) send(value any) {
	raw, err := protocol.Marshal(value)
	if err == nil {
		p.s.peer.notify(protocol.MethodProgress, &protocol.ProgressParams{Token: p.token, Value: raw})
	}
}
