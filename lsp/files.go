package lsp

import (
	"context"
	"errors"
	"fmt"
	"io"
	"io/fs"
	"os"
	"path"
	"path/filepath"
	"strings"
	"sync"
	"time"

	"go.lsp.dev/uri"

	"inkjoule/lang"
)

// maxNote is the largest note that is read from the disk, in bytes.
const maxNote = 64 << 20

// bom is the UTF-8 byte order mark. Editors do not count it as a character, so
// it is taken off a text of the disk.
const bom = "\ufeff"

// files gives a note's analysis the other notes of its folder: as the editor
// has them, else as the disk has them. The folder is a wall.
type files struct {
	root string // absolute folder; "" for a text that has none
	disk *disk
	mu   sync.Mutex
	open map[uri.URI]*lang.Source // the editor's texts; nil once the analysis is made
	read map[uri.URI]bool         // what was asked for, existing or not
}

// Read implements lang.Files.
func (f *files) Read(ctx context.Context, name string) (string, error) {
	if err := ctx.Err(); err != nil {
		return "", err
	}
	name = path.Clean(name)
	if f.root == "" {
		return "", errors.New("save the note to a folder first, so that it can refer to other notes")
	}
	if !fs.ValidPath(name) {
		return "", fmt.Errorf("%s lies outside the workspace folder", name)
	}
	u := uri.File(filepath.Join(f.root, filepath.FromSlash(name)))
	if src := f.ask(u); src != nil {
		return src.Text, nil
	}
	return f.disk.read(f.root, name)
}

// ask notes that a text was wanted and returns the editor's, or nil.
func (f *files) ask(u uri.URI) *lang.Source {
	f.mu.Lock()
	defer f.mu.Unlock()
	f.read[u] = true
	return f.open[u]
}

// release lets go of the texts, which would otherwise live as long as the
// analysis that has read them.
func (f *files) release() {
	f.mu.Lock()
	defer f.mu.Unlock()
	f.open = nil
}

// reads reports whether the note has been asked for.
func (f *files) reads(u uri.URI) bool {
	f.mu.Lock()
	defer f.mu.Unlock()
	return f.read[u]
}

// disk remembers the texts of notes until their file changes. Whether it has
// is asked at each use, so that no event is needed to be up to date.
type disk struct {
	mu    sync.Mutex
	texts map[string]stored
}

type stored struct {
	at   time.Time
	size int64
	text string
}

func newDisk() *disk { return &disk{texts: map[string]stored{}} }

// read returns the text of a note below root. A path or link that leads
// outside root is refused.
func (d *disk) read(root, name string) (string, error) {
	dir, err := os.OpenRoot(root)
	if err != nil {
		return "", err
	}
	defer dir.Close()
	file, err := dir.Open(filepath.FromSlash(name))
	if err != nil {
		return "", err
	}
	defer file.Close()
	info, err := file.Stat()
	switch {
	case err != nil:
		return "", err
	case !info.Mode().IsRegular():
		return "", fmt.Errorf("%s is not a file", name)
	case info.Size() > maxNote:
		return "", fmt.Errorf("%s has %d bytes, more than the %d that are read", name, info.Size(), maxNote)
	}
	return d.text(filepath.Join(root, filepath.FromSlash(name)), info, file)
}

// text returns the remembered text, or reads it.
func (d *disk) text(key string, info fs.FileInfo, file io.Reader) (string, error) {
	d.mu.Lock()
	defer d.mu.Unlock()
	if s, ok := d.texts[key]; ok && s.at.Equal(info.ModTime()) && s.size == info.Size() {
		return s.text, nil
	}
	data, err := io.ReadAll(io.LimitReader(file, maxNote))
	if err != nil {
		return "", err
	}
	text := strings.TrimPrefix(string(data), bom)
	d.texts[key] = stored{info.ModTime(), info.Size(), text}
	return text, nil
}
