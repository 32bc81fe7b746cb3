package main

import (
	"context"
	"io"

	"inkjoule/check"
	"inkjoule/check/report"
)

// write reviews the sources and writes them; with --output the file appears
// only when everything is written.
func (r *review) write(ctx context.Context, sources []source) error {
	p := newProgress(r.world, len(sources))
	defer p.clear()
	err := inOrder(ctx, r.flags.jobs, sources,
		func(s source) outcome { return r.one(ctx, s) },
		func(o outcome) error {
			p.step()
			return r.hand(ctx, o)
		})
	if err != nil {
		return err
	}
	p.clear()
	for _, fault := range r.configs.Faults() {
		if err := r.problem(fault); err != nil {
			return err
		}
	}
	return r.finish()
}

// hand writes one outcome.
func (r *review) hand(ctx context.Context, o outcome) error {
	if err := ctx.Err(); err != nil {
		return err
	}
	for _, err := range o.errs {
		if err := r.problem(err); err != nil {
			return err
		}
	}
	if o.note == nil {
		return nil
	}
	level := o.fail
	if r.fail != 0 {
		level = r.fail
	}
	if report.CountOf(o.note).AtLeast(level) > 0 {
		r.found = true
	}
	return r.writer.Note(o.note)
}

// openWriter prepares the writer of the format, on standard output or on a
// file that is put into place by finish.
func (r *review) openWriter(c *check.Catalogue) error {
	color, err := r.world.useColor(r.flags.color, r.flags.output)
	if err != nil {
		return err
	}
	var out io.Writer = r.world.out
	if r.flags.output != "" {
		if r.file, err = createFile(r.flags.output); err != nil {
			return err
		}
		out = r.file
	}
	r.writer, err = report.New(r.flags.format, out, report.Options{Color: color, Catalogue: c, Version: versionOnly()})
	if err != nil {
		r.abandon()
		return &usageError{err}
	}
	return nil
}

func (r *review) finish() error {
	if err := r.writer.Close(); err != nil {
		return err
	}
	if r.file == nil {
		return nil
	}
	file := r.file
	r.file = nil
	return file.commit()
}

// abandon drops an output file that was not finished.
func (r *review) abandon() {
	if r.file != nil {
		r.file.discard()
		r.file = nil
	}
}
