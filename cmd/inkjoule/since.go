package main

import (
	"context"
	"errors"
	"io/fs"
	"path/filepath"

	"inkjoule/check/project"
	"inkjoule/check/report"
	"inkjoule/lang"
	"inkjoule/lang/eval"
)

// past is an earlier revision of the notes under review, and what differs from it.
type past struct {
	*project.Revision
	touched map[string]bool // absolute paths that changed, or refer to what changed
}

// openPast finds what changed since a revision; standard input has no past.
func openPast(ctx context.Context, name string, sources []source) (*past, error) {
	folder := "."
	for _, s := range sources {
		if !s.in {
			folder = filepath.Dir(s.abs)
			break
		}
	}
	abs, err := filepath.Abs(folder)
	if err != nil {
		return nil, err
	}
	rev, err := project.OpenRevision(ctx, abs, name)
	if err != nil {
		return nil, err
	}
	changed, err := rev.Changed(ctx)
	if err != nil {
		return nil, err
	}
	p := &past{Revision: rev, touched: map[string]bool{}}
	reach := reaching{changed: changed, known: map[string]bool{}}
	for _, s := range sources {
		if reach.touches(s.abs) {
			p.touched[s.abs] = true
		}
	}
	return p, ctx.Err()
}

// reaching follows references to what changed.
type reaching struct {
	changed map[string]bool // by real path
	known   map[string]bool // what was found out, by absolute path
}

// touches reports whether a file changed or refers, directly or through
// others, to one that did.
func (r *reaching) touches(abs string) bool {
	if is, ok := r.known[abs]; ok {
		return is
	}
	real := abs
	if followed, err := filepath.EvalSymlinks(abs); err == nil {
		real = followed
	}
	r.known[abs] = r.changed[real] // also ends a circle
	if r.known[abs] || !project.IsNote(abs) {
		return r.known[abs]
	}
	text, err := project.ReadFile(abs)
	if err != nil {
		return false
	}
	for _, name := range lang.Read(text, nil).References() {
		if r.touches(filepath.Join(filepath.Dir(abs), filepath.FromSlash(name))) {
			r.known[abs] = true
			return true
		}
	}
	return false
}

// since opens the revisions that the flags name and, for --changed, leaves out
// what did not change.
func (r *review) since(ctx context.Context, sources []source) ([]source, error) {
	var err error
	if name := r.flags.against; name != "" {
		if r.past, err = openPast(ctx, name, sources); err != nil {
			return nil, err
		}
	}
	if r.flags.changed == "" {
		return sources, nil
	}
	p, err := openPast(ctx, r.flags.changed, sources)
	if err != nil {
		return nil, err
	}
	var out []source
	for _, s := range sources {
		if s.in || p.touched[s.abs] {
			out = append(out, s)
		}
	}
	return out, nil
}

// compare tells what became of a note's results since the revision; nil where
// nothing was asked for or nothing can have changed.
func (p *past) compare(ctx context.Context, s source, now *lang.Note, budget eval.Budget) (*report.Comparison, error) {
	if p == nil || s.in || !p.touched[s.abs] {
		return nil, nil
	}
	text, err := p.ReadFile(ctx, s.abs)
	if errors.Is(err, fs.ErrNotExist) {
		return &report.Comparison{Revision: p.Name, Added: true}, nil
	}
	if err != nil {
		return nil, err
	}
	old, err := lang.Analyze(ctx, text, lang.Options{Path: s.path, Files: p.Revision, Budget: budget})
	if err != nil {
		return nil, err
	}
	return report.Compare(p.Name, old, now), nil
}
