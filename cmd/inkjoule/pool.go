package main

import (
	"context"
	"fmt"
	"path/filepath"
	"runtime/debug"
	"sync"

	"inkjoule/check"
	"inkjoule/check/project"
	"inkjoule/check/report"
	"inkjoule/lang"
)

// outcome is what came of one source.
type outcome struct {
	note *report.Note // nil: it could not be read
	fail lang.Severity
	errs []error // what could not be done
}

// inOrder does the work for every item on a few goroutines and hands over the
// results in the order of the items. At most twice as many results as
// goroutines wait, so that memory does not grow with the number of items.
func inOrder[T, R any](ctx context.Context, jobs int, items []T, do func(T) R, hand func(R) error) error {
	ctx, cancel := context.WithCancel(ctx)
	defer cancel()
	queue := make(chan chan R, jobs)
	slots := make(chan struct{}, jobs)
	go func() {
		defer close(queue)
		for _, item := range items {
			result := make(chan R, 1)
			select {
			case slots <- struct{}{}:
			case <-ctx.Done():
				return
			}
			go func() {
				result <- do(item)
				<-slots
			}()
			select {
			case queue <- result:
			case <-ctx.Done():
				return
			}
		}
	}()
	for result := range queue {
		if err := hand(<-result); err != nil {
			return err
		}
	}
	return ctx.Err()
}

// runners keeps the runner of each configuration.
type runners struct {
	mu sync.Mutex
	by map[*project.Config]check.Runner
}

func (r *review) runner(c *project.Config) check.Runner {
	r.runners.mu.Lock()
	defer r.runners.mu.Unlock()
	runner, ok := r.runners.by[c]
	if !ok {
		// what is wrong with a rule was said at start
		runner, _ = check.NewRunner(check.Config{Rules: r.rules, Severity: c.Severity})
		if r.runners.by == nil {
			r.runners.by = map[*project.Config]check.Runner{}
		}
		r.runners.by[c] = runner
	}
	return runner
}

// one reviews one source. A panic is an error of the program that costs this
// note and no other.
func (r *review) one(ctx context.Context, s source) (out outcome) {
	defer func() {
		if p := recover(); p != nil {
			out = outcome{errs: []error{fmt.Errorf("internal error on %s: %v. Please report it with the note", s.path, p)}}
			if r.world.getenv("INKJOULE_DEBUG") != "" {
				out.errs = append(out.errs, fmt.Errorf("%s", debug.Stack()))
			}
		}
	}()
	text, err := s.read()
	if err != nil {
		return outcome{errs: []error{err}}
	}
	config := r.configs.For(filepath.Dir(s.abs))
	note, err := lang.Analyze(ctx, text, lang.Options{Path: s.path, Files: project.DiskFor(s.abs), Budget: config.Budget})
	if err != nil {
		return outcome{errs: []error{err}}
	}
	found, err := r.runner(config).Run(ctx, note)
	if ctx.Err() != nil {
		return outcome{errs: []error{ctx.Err()}}
	}
	out = outcome{note: &report.Note{Note: note, Findings: found}, fail: config.FailLevel}
	if err != nil {
		out.errs = []error{err}
	}
	if out.note.Against, err = r.past.compare(ctx, s, note, config.Budget); err != nil {
		out.errs = append(out.errs, err)
	}
	return out
}
