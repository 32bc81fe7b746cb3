package main

import (
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
)

// newFile is a file that appears whole or not at all: it is written beside its
// place and renamed. A file that stood there keeps its mode; a link stays a
// link and the file it leads to is replaced. A device, a pipe or a socket is
// written to where it stands: renaming would destroy it.
type newFile struct {
	*os.File
	name   string // as the user gave it
	path   string // where it goes, links resolved
	direct bool   // no regular file: nothing is renamed
}

func createFile(name string) (*newFile, error) {
	path, mode, err := target(name)
	if err != nil {
		return nil, err
	}
	if !mode.IsRegular() {
		f, err := os.OpenFile(path, os.O_WRONLY, 0)
		if err != nil {
			return nil, unwritable(name, err)
		}
		return &newFile{f, name, path, true}, nil
	}
	f, err := os.CreateTemp(filepath.Dir(path), "."+filepath.Base(path)+".*")
	if err != nil {
		return nil, unwritable(name, err)
	}
	out := &newFile{f, name, path, false}
	if err := f.Chmod(mode); err != nil {
		out.discard()
		return nil, unwritable(name, err)
	}
	return out, nil
}

// target resolves the place of a file and the mode that it shall have; the
// type bits tell what stands there.
func target(name string) (path string, mode fs.FileMode, err error) {
	path = name
	if real, err := filepath.EvalSymlinks(name); err == nil {
		path = real
	} else if link, err := os.Readlink(name); err == nil { // it leads to nothing yet
		if path = link; !filepath.IsAbs(link) {
			path = filepath.Join(filepath.Dir(name), link)
		}
	}
	info, err := os.Stat(path)
	switch {
	case errors.Is(err, fs.ErrNotExist):
		return path, 0o666 &^ umask(), nil
	case err != nil:
		return "", 0, unwritable(name, err)
	case info.IsDir():
		return "", 0, fmt.Errorf("%s cannot be written: it is a folder", name)
	}
	return path, info.Mode().Perm() | info.Mode().Type(), nil
}

// commit puts the file into its place.
func (f *newFile) commit() error {
	if f.direct {
		return f.Close()
	}
	err := errors.Join(f.Sync(), f.Close())
	if err == nil {
		err = os.Rename(f.File.Name(), f.path)
	}
	if err != nil {
		_ = os.Remove(f.File.Name())
		return unwritable(f.name, err)
	}
	return nil
}

// discard leaves everything as it was.
func (f *newFile) discard() {
	_ = f.Close()
	if !f.direct {
		_ = os.Remove(f.File.Name())
	}
}

func unwritable(name string, err error) error {
	var path *fs.PathError
	var link *os.LinkError
	switch {
	case errors.Is(err, fs.ErrPermission):
		return fmt.Errorf("%s cannot be written: permission denied", name)
	case errors.Is(err, fs.ErrNotExist):
		return fmt.Errorf("%s cannot be written: its folder does not exist", name)
	case errors.As(err, &path):
		err = path.Err
	case errors.As(err, &link):
		err = link.Err
	}
	return fmt.Errorf("%s cannot be written: %w", name, err)
}
