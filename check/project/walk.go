package project

import (
	"context"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
	"slices"
	"strings"
)

// File is a note to review.
type File struct {
	Path string // as named by the user, or below a folder so named; with slashes
	Abs  string
}

// Finder collects the notes that paths stand for.
type Finder struct {
	Configs *Configs
	Obey    bool // a file named outright obeys `exclude` too, as in a hook
}

// find is one search.
type find struct {
	*Finder
	ctx    context.Context
	files  []File
	seen   map[string]bool
	faults []error
	left   int // notes left out below the folder at hand
}

// Find gives the notes of the paths in their order, those below a folder
// sorted, each once. The errors tell, one each, which paths cannot be read or
// hold no note; everything else is found all the same.
func (f *Finder) Find(ctx context.Context, paths []string) ([]File, []error) {
	s := &find{Finder: f, ctx: ctx, seen: map[string]bool{}}
	for _, path := range paths {
		s.path(path)
	}
	return s.files, s.faults
}

func (s *find) path(path string) {
	info, err := os.Stat(path)
	if err != nil {
		s.faults = append(s.faults, plain(path, err))
		return
	}
	abs, err := filepath.Abs(path)
	if err != nil {
		s.faults = append(s.faults, plain(path, err))
		return
	}
	switch {
	case info.IsDir():
		s.root(path, abs)
	case s.Obey && s.Configs.Excludes(abs, false):
	default:
		s.add(path, abs)
	}
}

func (s *find) add(path, abs string) {
	if !s.seen[abs] {
		s.seen[abs] = true
		s.files = append(s.files, File{filepath.ToSlash(path), abs})
	}
}

// root searches a folder that the user named.
func (s *find) root(path, abs string) {
	before := len(s.seen)
	s.left = 0
	found := s.folder(path, abs, ignoresAbove(abs))
	switch {
	case found > 0 || len(s.seen) > before || s.ctx.Err() != nil:
	case s.left > 0:
		s.faults = append(s.faults, fmt.Errorf("all notes in %s are left out by .gitignore or %s; name a file to review it all the same", path, ConfigName))
	default:
		s.faults = append(s.faults, fmt.Errorf("there is no note (*.joule, *.joule.md) in %s", path))
	}
}

// folder searches one folder and those below it; it gives the number of notes.
func (s *find) folder(path, abs string, ignore Ignore) int {
	entries, err := os.ReadDir(abs)
	if err != nil {
		s.faults = append(s.faults, plain(path, err))
	}
	if holdsGit(entries) {
		ignore = ownList(abs) // a repository within another one has its own rules
	}
	ignore = ignore.With(abs)
	found := 0
	for _, e := range entries {
		if s.ctx.Err() != nil {
			return found
		}
		found += s.entry(filepath.Join(path, e.Name()), filepath.Join(abs, e.Name()), e, ignore)
	}
	return found
}

func (s *find) entry(path, abs string, e fs.DirEntry, ignore Ignore) int {
	folder := e.IsDir()
	if folder && slices.Contains(versionControl, e.Name()) || !folder && !isNoteFile(abs, e) {
		return 0
	}
	if ignore.Skips(abs, folder) || s.Configs.Excludes(abs, folder) {
		if !folder || s.holdsNote(abs) {
			s.left++
		}
		return 0
	}
	if folder {
		return s.folder(path, abs, ignore)
	}
	s.add(path, abs)
	return 1
}

// versionControl names the folders in which nothing is a user's file; read only.
var versionControl = []string{".git", ".hg", ".svn", ".jj"}

// isNoteFile accepts files, and links to files, with a note's name. Links to
// folders are not followed, so that a search ends.
func isNoteFile(abs string, e fs.DirEntry) bool {
	if !IsNote(e.Name()) {
		return false
	}
	if e.Type()&fs.ModeSymlink == 0 {
		return e.Type().IsRegular()
	}
	info, err := os.Stat(abs)
	return err == nil && info.Mode().IsRegular()
}

// holdsNote looks into a folder that is left out, only for the message.
func (s *find) holdsNote(abs string) bool {
	if s.left > 0 || len(s.files) > 0 {
		return false // the message is not needed or has its reason already
	}
	found := false
	_ = filepath.WalkDir(abs, func(path string, e fs.DirEntry, err error) error {
		if err == nil && !e.IsDir() && IsNote(path) {
			found = true
			return fs.SkipAll
		}
		return s.ctx.Err()
	})
	return found
}

func holdsGit(entries []fs.DirEntry) bool {
	return slices.ContainsFunc(entries, func(e fs.DirEntry) bool { return e.Name() == ".git" })
}

// ignoresAbove collects the ignore files that hold for a folder: of every
// folder from the top of its repository down to its parent, and the
// repository's own list. Outside a repository only what lies below counts.
func ignoresAbove(abs string) Ignore {
	top := repository(abs)
	if top == "" {
		return nil
	}
	g := ownList(top)
	rest, err := filepath.Rel(top, abs)
	if err != nil || rest == "." {
		return g
	}
	folder := top
	for _, part := range strings.Split(rest, string(filepath.Separator)) {
		g = g.With(folder)
		folder = filepath.Join(folder, part)
	}
	return g
}

// ownList is what the repository of a folder leaves out by its own list.
func ownList(top string) Ignore {
	data, err := os.ReadFile(filepath.Join(top, ".git", "info", "exclude"))
	if err != nil {
		return nil
	}
	return Ignore{ParsePatterns(filepath.ToSlash(top), string(data))}
}

// repository gives the nearest folder upward that holds `.git`, or "".
func repository(folder string) string {
	for {
		if _, err := os.Lstat(filepath.Join(folder, ".git")); err == nil {
			return folder
		}
		parent := filepath.Dir(folder)
		if parent == folder {
			return ""
		}
		folder = parent
	}
}
