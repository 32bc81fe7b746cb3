//go:build unix

package main

import (
	"io/fs"
	"syscall"
)

// umask is the mask of a new file's mode. The system tells it only by setting
// it; it is asked once, before any other file is made.
func umask() fs.FileMode {
	mask := syscall.Umask(0)
	syscall.Umask(mask)
	return fs.FileMode(mask)
}
