//go:build !unix

package main

import "io/fs"

// umask is nothing where the system has none.
func umask() fs.FileMode { return 0 }
