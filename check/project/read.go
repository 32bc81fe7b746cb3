// Package project knows the folder in which notes live: which files are notes,
// what is left out, how a note is read, and the configuration that holds for it.
// Nothing here depends on the working directory except relative paths.
package project

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"io/fs"
	"os"
	"path/filepath"
	"strings"
)

// MaxSize is the size in bytes above which a file is not read as a note: some
// hundred times the longest note that a person wrote.
const MaxSize = 8 << 20

// IsNote reports whether a file name is that of a note.
func IsNote(name string) bool {
	base := filepath.Base(name)
	for _, ending := range []string{".joule", ".joule.md"} {
		if stem, ok := strings.CutSuffix(base, ending); ok && stem != "" {
			return true
		}
	}
	return false
}

// ReadFile reads a note. The error says in plain words why it cannot be read
// and what to do; it names the path.
func ReadFile(path string) (string, error) {
	f, err := os.Open(path)
	if err != nil {
		return "", plain(path, err)
	}
	defer f.Close()
	info, err := f.Stat()
	if err != nil {
		return "", plain(path, err)
	}
	if !info.Mode().IsRegular() {
		return "", fmt.Errorf("%s is not a file", path)
	}
	return Read(path, f)
}

// Read reads a note from a stream that is called name in messages.
func Read(name string, r io.Reader) (string, error) {
	data, err := io.ReadAll(io.LimitReader(r, MaxSize+1))
	if err != nil {
		return "", plain(name, err)
	}
	if len(data) > MaxSize {
		return "", fmt.Errorf("%s is larger than %d MiB, which is the most a note may have; split it, and join the parts by `uses`", name, MaxSize>>20)
	}
	return string(data), textual(name, data)
}

// textual refuses what is no UTF-8 text at all. Single bytes that are not UTF-8
// are left for the language to point at.
func textual(name string, data []byte) error {
	switch {
	case bytes.HasPrefix(data, []byte("\xff\xfe")), bytes.HasPrefix(data, []byte("\xfe\xff")):
		return fmt.Errorf("%s is in UTF-16; save it as UTF-8", name)
	case bytes.IndexByte(data, 0) >= 0:
		return fmt.Errorf("%s is a binary file, not a note", name)
	}
	return nil
}

// plain tells a failed access in the words of a user.
func plain(path string, err error) error {
	var why *fs.PathError
	switch {
	case errors.Is(err, fs.ErrNotExist):
		return fmt.Errorf("%s does not exist", path)
	case errors.Is(err, fs.ErrPermission):
		return fmt.Errorf("%s cannot be read: permission denied", path)
	case errors.As(err, &why):
		return fmt.Errorf("%s cannot be read: %w", path, why.Err)
	}
	return fmt.Errorf("%s cannot be read: %w", path, err)
}
