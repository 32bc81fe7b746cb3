//go:build !unix

package lsp

import "os"

// alive reports whether the process exists. Where signals can't tell, finding
// it can.
func alive(pid int) bool {
	p, err := os.FindProcess(pid)
	if err != nil {
		return false
	}
	_ = p.Release()
	return true
}
