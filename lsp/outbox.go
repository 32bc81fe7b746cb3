package lsp

import (
	"io"
	"sync"
	"time"
)

// outboxLimit bounds what waits for a client that does not read, in bytes.
const outboxLimit = 32 << 20

// outbox writes frames in the order in which they were put, on a goroutine of
// its own, so that a client that reads slowly does not hold up the handlers.
// Once the limit is reached, put waits.
type outbox struct {
	w       io.Writer
	mu      sync.Mutex
	changed sync.Cond
	waiting []byte
	closed  bool
	err     error
	done    chan struct{}
}

func newOutbox(w io.Writer) *outbox {
	o := &outbox{w: w, done: make(chan struct{})}
	o.changed.L = &o.mu
	go o.run()
	return o
}

// put queues a frame. It fails after close and after a failed write.
func (o *outbox) put(frame []byte) error {
	o.mu.Lock()
	defer o.mu.Unlock()
	for len(o.waiting) > 0 && len(o.waiting)+len(frame) > outboxLimit && !o.closed && o.err == nil {
		o.changed.Wait()
	}
	switch {
	case o.err != nil:
		return o.err
	case o.closed:
		return io.ErrClosedPipe
	}
	o.waiting = append(o.waiting, frame...)
	o.changed.Broadcast()
	return nil
}

// run writes until the outbox is closed and empty, or a write fails.
func (o *outbox) run() {
	defer close(o.done)
	var batch []byte
	for {
		if batch = o.take(batch); batch == nil {
			return
		}
		_, err := o.w.Write(batch)
		o.wrote(err)
		if err != nil {
			return
		}
	}
}

// take waits for frames and swaps them for the written batch, whose memory is
// used again. It returns nil when there will be none.
func (o *outbox) take(written []byte) []byte {
	o.mu.Lock()
	defer o.mu.Unlock()
	for len(o.waiting) == 0 && !o.closed {
		o.changed.Wait()
	}
	if len(o.waiting) == 0 {
		return nil
	}
	if cap(written) > keepBody {
		written = nil
	}
	batch := o.waiting
	o.waiting = written[:0]
	o.changed.Broadcast()
	return batch
}

func (o *outbox) wrote(err error) {
	o.mu.Lock()
	defer o.mu.Unlock()
	o.err = err
	o.changed.Broadcast()
}

// close refuses further frames; those queued are still written.
func (o *outbox) close() error {
	o.mu.Lock()
	defer o.mu.Unlock()
	o.closed = true
	o.changed.Broadcast()
	return nil
}

// drain closes the outbox and waits until everything is written, for at most
// the given time. It reports whether that was so.
func (o *outbox) drain(most time.Duration) bool {
	_ = o.close()
	select {
	case <-o.done:
		return true
	case <-time.After(most):
		return false
	}
}
