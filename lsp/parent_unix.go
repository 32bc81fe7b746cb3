//go:build unix

package lsp

import (
	"errors"
	"os"
	"syscall"
)

// alive reports whether the process exists; one of another user does.
func alive(pid int) bool {
	p, err := os.FindProcess(pid)
	if err != nil {
		return false
	}
	err = p.Signal(syscall.Signal(0))
	return err == nil || errors.Is(err, syscall.EPERM)
}
