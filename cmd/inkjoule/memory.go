package main

import "runtime/debug"

// A review is short: it collects garbage four times less often than a server
// would, which halves its time, until it holds so much memory that it matters.
const (
	reviewGCPercent   = 400
	reviewMemoryLimit = 512 << 20 // bytes
)

// hurry sets the collector for a short run, unless the user has set it.
func (w *world) hurry() {
	if w.getenv("GOGC") == "" && w.getenv("GOMEMLIMIT") == "" {
		debug.SetGCPercent(reviewGCPercent)
		debug.SetMemoryLimit(reviewMemoryLimit)
	}
}
