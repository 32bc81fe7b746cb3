package main

import (
	"context"
	"path/filepath"

	"inkjoule/check/project"
)

// source is a note and the way to its text.
type source struct {
	path string // shown
	abs  string // decides the configuration and what the note may refer to
	in   bool   // it is standard input
	read func() (string, error)
}

// gathering finds the notes that a command line names.
type gathering struct {
	world   *world
	configs *project.Configs
	as      string // --as
	obey    bool   // --obey-exclude
}

// sources resolves the paths of the command line; no path stands for the
// current folder. The faults tell what could not be found; the rest was.
func (g gathering) sources(ctx context.Context, paths []string) (out []source, faults []error, err error) {
	var files []string
	if len(paths) == 0 {
		files = []string{"."}
	}
	for _, p := range paths {
		if p != "-" {
			files = append(files, p)
			continue
		}
		s, err := g.standardInput()
		if err != nil {
			return nil, nil, err
		}
		out = append(out, s)
	}
	if g.as != "" && len(out) == 0 {
		return nil, nil, usage("--as names the note on standard input; write `-` as the path too")
	}
	finder := &project.Finder{Configs: g.configs, Obey: g.obey}
	found, faults := finder.Find(ctx, files)
	for _, f := range found {
		out = append(out, source{path: f.Path, abs: f.Abs, read: func() (string, error) { return project.ReadFile(f.Abs) }})
	}
	return out, faults, ctx.Err()
}

func (g gathering) standardInput() (source, error) {
	name := g.as
	if name == "" {
		name = "standard-input.joule"
	}
	abs, err := filepath.Abs(name)
	if err != nil {
		return source{}, err
	}
	return source{path: filepath.ToSlash(name), abs: abs, in: true, read: func() (string, error) { return project.Read(name, g.world.in) }}, nil
}
