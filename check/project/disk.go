package project

import (
	"context"
	"fmt"
	"path/filepath"
	"strings"
)

// Disk gives the notes that a note refers to, from the disk and from within
// one workspace only. It is a lang.Files.
type Disk struct {
	Root string // absolute; links resolved
}

// DiskFor gives the disk for a note (absolute): its workspace is the nearest
// folder upward that holds a repository or a configuration, else its own
// folder.
func DiskFor(abs string) Disk { return Disk{Root: resolved(Workspace(filepath.Dir(abs)))} }

// Workspace gives the outermost folder that belongs to the same work.
func Workspace(folder string) string {
	if top := repository(folder); top != "" {
		return top
	}
	if path := Find(folder); path != "" {
		return filepath.Dir(path)
	}
	return folder
}

// Read gives the text of a note, by its slash-separated path.
func (d Disk) Read(ctx context.Context, path string) (string, error) {
	if err := ctx.Err(); err != nil {
		return "", err
	}
	abs, err := filepath.Abs(filepath.FromSlash(path))
	if err != nil {
		return "", plain(path, err)
	}
	if !within(d.Root, resolved(abs)) {
		return "", fmt.Errorf("%s lies outside the folder of this work", path)
	}
	return ReadFile(filepath.Clean(path))
}

// resolved follows links as far as the path exists.
func resolved(abs string) string {
	if real, err := filepath.EvalSymlinks(abs); err == nil {
		return real
	}
	parent := filepath.Dir(abs)
	if parent == abs {
		return abs
	}
	return filepath.Join(resolved(parent), filepath.Base(abs))
}

func within(root, path string) bool {
	rest, err := filepath.Rel(root, path)
	return err == nil && rest != ".." && !strings.HasPrefix(rest, ".."+string(filepath.Separator))
}
