package main

import (
	"context"
	"fmt"
	"path/filepath"
	"runtime"
	"slices"
	"strings"

	"github.com/spf13/cobra"

	"inkjoule/check"
	"inkjoule/check/project"
	"inkjoule/check/rules"
	"inkjoule/lang"
	"inkjoule/lang/eval"
)

// rewriting is a verb that changes notes: a few edits in each, everything else
// kept byte for byte.
type rewriting struct {
	world *world
	flags rewriteFlags
	did   string // "tidied", "filled"
	edits func(context.Context, origin, string) ([]lang.Edit, []error)
}

// origin is where a text comes from, and what holds there.
type origin struct {
	source
	budget eval.Budget
}

// rewriteFlags are the flags that all such verbs have.
type rewriteFlags struct {
	diff, obey bool
	as         string
}

func (f *rewriteFlags) add(c *cobra.Command) {
	flags := c.Flags()
	flags.BoolVar(&f.diff, "diff", false, "show what would change and write nothing; exit 1 if something would")
	flags.StringVar(&f.as, "as", "", "the `NAME` under which standard input is read")
	flags.BoolVar(&f.obey, "obey-exclude", false, "leave out excluded files even where they are named, as in a hook")
}

// rewritten is what came of one note.
type rewritten struct {
	source
	before, after string
	errs          []error
	unread        bool // there is nothing to write
}

// run changes the notes of the paths. A note that cannot be changed whole is
// told and left as it is; the others are changed all the same.
func (r *rewriting) run(ctx context.Context, paths []string) error {
	catalogue, err := check.NewCatalogue(rules.All())
	if err != nil {
		return fmt.Errorf("internal error: %w", err)
	}
	configs := project.NewConfigs(catalogue)
	g := gathering{world: r.world, configs: configs, as: r.flags.as, obey: r.flags.obey}
	sources, faults, err := g.sources(ctx, paths)
	if err != nil {
		return err
	}
	changed, trouble := false, false
	tell := func(errs []error) {
		for _, err := range errs {
			trouble = true
			r.world.say("%s", err)
		}
	}
	tell(faults)
	err = inOrder(ctx, runtime.GOMAXPROCS(0), sources,
		func(s source) rewritten {
			return r.one(ctx, origin{s, configs.For(filepath.Dir(s.abs)).Budget})
		},
		func(w rewritten) error {
			tell(w.errs)
			if w.unread {
				return ctx.Err()
			}
			changed = changed || w.before != w.after
			if err := r.hand(w); err != nil {
				tell([]error{err})
			}
			return ctx.Err()
		})
	tell(configs.Faults())
	switch {
	case err != nil:
		return err
	case trouble:
		return errSaid
	case changed && r.flags.diff:
		return errFound
	}
	return nil
}

// one finds the changes of one note.
func (r *rewriting) one(ctx context.Context, s origin) rewritten {
	text, err := s.read()
	if err != nil {
		return rewritten{source: s.source, errs: []error{err}, unread: true}
	}
	edits, errs := r.edits(ctx, s, text)
	return rewritten{source: s.source, before: text, after: edited(text, edits), errs: errs}
}

// hand shows or writes one note.
func (r *rewriting) hand(w rewritten) error {
	switch {
	case r.flags.diff:
		_, err := fmt.Fprint(r.world.out, diffLines(w.path, w.before, w.after))
		return err
	case w.in:
		_, err := fmt.Fprint(r.world.out, w.after)
		return err
	case w.before == w.after:
		return nil
	}
	now, err := w.read()
	if err != nil {
		return err
	}
	if now != w.before {
		return fmt.Errorf("%s was changed by somebody else meanwhile; it is left as it is", w.path)
	}
	file, err := createFile(w.abs)
	if err != nil {
		return err
	}
	if _, err := file.WriteString(w.after); err != nil {
		file.discard()
		return unwritable(w.path, err)
	}
	if err := file.commit(); err != nil {
		return err
	}
	_, err = fmt.Fprintf(r.world.out, "%s: %s\n", w.path, r.did)
	return err
}

// edited makes edits that do not overlap.
func edited(text string, edits []lang.Edit) string {
	slices.SortFunc(edits, func(a, b lang.Edit) int { return a.Span.Start - b.Span.Start })
	var b strings.Builder
	at := 0
	for _, e := range edits {
		b.WriteString(text[at:e.Span.Start] + e.New)
		at = e.Span.End
	}
	return b.String() + text[at:]
}
