package project

import (
	"bytes"
	"context"
	"errors"
	"fmt"
	"io/fs"
	"os/exec"
	"path/filepath"
	"strings"
)

// Revision is a commit of the Git repository in which notes live. It reads
// through the git program, and changes nothing.
type Revision struct {
	Name   string // as the user gave it
	root   string // absolute; links resolved
	commit string
}

// OpenRevision finds the commit of a name in the repository of a folder.
func OpenRevision(ctx context.Context, folder, name string) (*Revision, error) {
	r := &Revision{Name: name, root: folder}
	top, err := r.git(ctx, "rev-parse", "--show-toplevel")
	if err != nil {
		return nil, fmt.Errorf("%s lies in no Git repository, so there is no revision %s of it (%w)", folder, name, err)
	}
	r.root = resolved(filepath.FromSlash(strings.TrimRight(string(top), "\r\n")))
	commit, err := r.git(ctx, "rev-parse", "--verify", "--quiet", "--end-of-options", name+"^{commit}")
	if err != nil {
		return nil, fmt.Errorf("the repository has no revision %q", name)
	}
	r.commit = strings.TrimSpace(string(commit))
	return r, nil
}

// git runs one command of git in the repository.
func (r *Revision) git(ctx context.Context, args ...string) ([]byte, error) {
	cmd := exec.CommandContext(ctx, "git", append([]string{"-C", r.root}, args...)...)
	var out, fault bytes.Buffer
	cmd.Stdout, cmd.Stderr = &out, &fault
	err := cmd.Run()
	switch {
	case err == nil:
		return out.Bytes(), nil
	case errors.Is(err, exec.ErrNotFound):
		return nil, errors.New("the program git is not installed")
	case ctx.Err() != nil:
		return nil, ctx.Err()
	}
	said, _, _ := strings.Cut(strings.TrimSpace(fault.String()), "\n")
	return nil, fmt.Errorf("git: %s", strings.TrimPrefix(said, "fatal: "))
}

// Changed gives the files (absolute) that differ between the revision and the
// disk: changed, removed, and new ones that are not ignored.
func (r *Revision) Changed(ctx context.Context) (map[string]bool, error) {
	differing, err := r.git(ctx, "diff", "--name-only", "--no-renames", "-z", r.commit, "--")
	if err != nil {
		return nil, err
	}
	untracked, err := r.git(ctx, "ls-files", "--others", "--exclude-standard", "-z")
	if err != nil {
		return nil, err
	}
	out := map[string]bool{}
	for _, name := range strings.Split(string(differing)+string(untracked), "\x00") {
		if name != "" {
			out[filepath.Join(r.root, filepath.FromSlash(name))] = true
		}
	}
	return out, nil
}

// ReadFile gives the text that a file (absolute) had; the error is
// fs.ErrNotExist where there was none.
func (r *Revision) ReadFile(ctx context.Context, abs string) (string, error) {
	name, err := filepath.Rel(r.root, resolved(abs))
	if err != nil || !within(r.root, resolved(abs)) {
		return "", fmt.Errorf("%s lies outside the repository", abs)
	}
	object := r.commit + ":" + filepath.ToSlash(name)
	if _, err := r.git(ctx, "cat-file", "-e", object); err != nil {
		if ctx.Err() != nil {
			return "", ctx.Err()
		}
		return "", fs.ErrNotExist
	}
	text, err := r.git(ctx, "cat-file", "blob", object)
	return string(text), err
}

// Read gives the text of a note by its path, so that a revision serves as
// lang.Files.
func (r *Revision) Read(ctx context.Context, path string) (string, error) {
	abs, err := filepath.Abs(filepath.FromSlash(path))
	if err != nil {
		return "", plain(path, err)
	}
	return r.ReadFile(ctx, abs)
}
