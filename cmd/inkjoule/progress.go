package main

import (
	"fmt"
	"time"
)

// progress tells on a terminal how far a long run is: after a second, and then
// ten times a second at most. It is used from one goroutine.
type progress struct {
	world *world
	total int
	done  int
	next  time.Time
	shown bool
}

// newProgress shows nothing where standard error is no terminal.
func newProgress(w *world, total int) *progress {
	p := &progress{world: w, total: total}
	if isTerminal(w.err) {
		p.next = time.Now().Add(time.Second)
	}
	return p
}

// step counts one piece of work. What stands on the line is cleared, since
// findings may follow.
func (p *progress) step() {
	p.done++
	p.clear()
	if p.next.IsZero() || p.done == p.total || time.Now().Before(p.next) {
		return
	}
	p.next = time.Now().Add(time.Second / 10)
	p.shown = true
	_, _ = fmt.Fprintf(p.world.err, "\rreviewed %d of %d notes", p.done, p.total)
}

func (p *progress) clear() {
	if p.shown {
		p.shown = false
		_, _ = fmt.Fprint(p.world.err, "\r\x1b[K")
	}
}
