package lsp

import (
	"context"
	"os"
	"time"
)

// watchInterval is how often the client's process is looked for; a server
// whose client has gone leaves within 5 s.
const watchInterval = 2 * time.Second

// watchParent calls gone when the process that started the server is no more.
// An editor that is killed does not always close the server's input.
func watchParent(ctx context.Context, pid int, gone func()) {
	begun := os.Getppid()
	tick := time.NewTicker(watchInterval)
	defer tick.Stop()
	for {
		select {
		case <-ctx.Done():
			return
		case <-tick.C:
		}
		adopted := pid == begun && os.Getppid() != begun
		if adopted || !alive(pid) {
			gone()
			return
		}
	}
}
