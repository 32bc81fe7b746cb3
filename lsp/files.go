package lsp

import (
	"context"
	"errors"
	"fmt"
	"maps"
	"os"
	"path"
	"path/filepath"
	"strings"
	"sync"
	"time"

	"go.lsp.dev/uri"

	"inkjoule/check/project"
	"inkjoule/lang"
)

// home is where a note stands: the folder of its work, which is the wall of
// what it may refer to, and its path in it.
type home struct {
	root string // absolute; "" for a text that is not a file of this machine
	path string // slash-separated
}

// homeOf finds the home of a note as the command line does, so that both find
// the same.
func homeOf(u uri.URI) home {
	if !u.IsFile() {
		return home{"", strings.TrimPrefix(u.Path(), "/")}
	}
	file := filepath.Clean(u.FsPath())
	root := project.Workspace(filepath.Dir(file))
	rel, err := filepath.Rel(root, file)
	if err != nil {
		return home{filepath.Dir(file), filepath.Base(file)}
	}
	return home{root, filepath.ToSlash(rel)}
}

// file is the absolute path of a note of the same work.
func (h home) file(path string) string { return filepath.Join(h.root, filepath.FromSlash(path)) }

// files gives a note's analysis the other notes of its work: as the editor has
// them, else as the disk has them.
type files struct {
	home home
	mu   sync.Mutex
	open map[uri.URI]*lang.Source // the editor's texts; nil once the analysis is made
	read map[uri.URI]stamp        // what was asked for, existing or not, as it was then
}

// A stamp tells a version of a text from another, without reading it.
type stamp struct {
	src  *lang.Source // the editor's text; nil for a file
	at   time.Time
	size int64
}

// stampOf is the stamp of a text as it is now; of a file that does not exist it
// is zero.
func (v *view) stampOf(u uri.URI) stamp {
	if doc := v.docs[u]; doc != nil {
		return stamp{src: doc.src}
	}
	return fileStamp(u.FsPath())
}

func fileStamp(file string) stamp {
	info, err := os.Stat(file)
	if file == "" || err != nil {
		return stamp{}
	}
	return stamp{at: info.ModTime().Round(0), size: info.Size()}
}

// Read implements lang.Files.
func (f *files) Read(ctx context.Context, name string) (string, error) {
	if f.home.root == "" {
		return "", errors.New("save the note to a folder first, so that it can refer to other notes")
	}
	name = path.Clean(name)
	if strings.HasPrefix(name, "../") || path.IsAbs(name) {
		return "", fmt.Errorf("%s lies outside the folder of this work", name)
	}
	file := f.home.file(name)
	if src := f.ask(uri.File(file)); src != nil {
		return src.Text, ctx.Err()
	}
	text, err := project.DiskFor(f.home.file(f.home.path)).Read(ctx, filepath.ToSlash(file))
	if err != nil {
		err = errors.New(strings.ReplaceAll(err.Error(), filepath.ToSlash(file), name))
	}
	return text, err
}

// ask notes that a text was wanted and returns the editor's, or nil.
func (f *files) ask(u uri.URI) *lang.Source {
	f.mu.Lock()
	defer f.mu.Unlock()
	src := f.open[u]
	if src != nil {
		f.read[u] = stamp{src: src}
	} else {
		f.read[u] = fileStamp(u.FsPath())
	}
	return src
}

// stamps are the texts that were asked for, as they were then.
func (f *files) stamps() map[uri.URI]stamp {
	f.mu.Lock()
	defer f.mu.Unlock()
	return maps.Clone(f.read)
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
	_, ok := f.read[u]
	return ok
}
