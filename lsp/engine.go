package lsp

import (
	"context"
	"errors"
	"fmt"
	"path"
	"path/filepath"
	"strings"
	"sync"

	"inkjoule/check"
	"inkjoule/check/project"
	"inkjoule/lang"
	"inkjoule/lang/eval"
)

// NewAnalyser is the analysis that the command line makes too: the language,
// the rules, and the configuration that holds for the note's folder.
func NewAnalyser(rules []*check.Rule, catalogue *check.Catalogue) Analyser {
	return &engine{rules: rules, catalogue: catalogue, loaded: map[string]loaded{}}
}

type engine struct {
	rules     []*check.Rule
	catalogue *check.Catalogue
	mu        sync.Mutex
	loaded    map[string]loaded // by the path of the configuration file
}

// loaded is a configuration made ready, as its file was at that time.
type loaded struct {
	at     stamp
	runner check.Runner
	budget eval.Budget
	fault  error // what is wrong with the file
}

// Read implements Analyser. A text that is no note is read as an empty one.
func (e *engine) Read(ctx context.Context, in Input) (*lang.Note, error) {
	if readable(in) != nil {
		return &lang.Note{Path: in.Path, Script: &lang.Script{Source: lang.NewSource(in.Text)}}, nil
	}
	return lang.Analyze(ctx, in.Text, lang.Options{Path: in.Path, Files: in.Files, Previous: in.Previous, Budget: e.config(in).budget})
}

// Check implements Analyser.
func (e *engine) Check(ctx context.Context, in Input, note *lang.Note) ([]check.Finding, error) {
	if err := readable(in); err != nil {
		return []check.Finding{remark(in, err)}, nil
	}
	config := e.config(in)
	found, broken := config.runner.Run(ctx, note)
	if ctx.Err() != nil {
		return nil, ctx.Err()
	}
	for _, err := range []error{config.fault, broken} {
		if err != nil {
			found = append([]check.Finding{remark(in, err)}, found...)
		}
	}
	return found, nil
}

// readable says why a text is not read as a note.
func readable(in Input) error {
	if len(in.Text) <= project.MaxSize && strings.IndexByte(in.Text, 0) < 0 {
		return nil
	}
	_, err := project.Read(in.Path, strings.NewReader(in.Text))
	return err
}

// remark is a finding about the work itself, at the start of the note: a
// configuration or a rule that can't be used must not look like a clean review.
func remark(in Input, err error) check.Finding {
	f := check.Finding{Path: in.Path, Fault: lang.Fault{Rule: "configuration", Severity: lang.Error, Message: err.Error()}}
	var broken *check.Broken
	if errors.As(err, &broken) {
		f.Rule = "not-checked"
	}
	return f
}

// config is what holds for a note. The file is looked for at each analysis and
// read again when it has changed, so that no event is needed.
func (e *engine) config(in Input) loaded {
	file := ""
	if in.Root != "" {
		file = project.Find(filepath.Join(in.Root, filepath.FromSlash(path.Dir(in.Path))))
	}
	e.mu.Lock()
	defer e.mu.Unlock()
	now, ok := e.loaded[file]
	if at := fileStamp(file); !ok || now.at != at {
		now = e.load(file)
		now.at = at
		e.loaded[file] = now
	}
	return now
}

func (e *engine) load(file string) loaded {
	config, err := project.DefaultConfig(), error(nil)
	if file != "" {
		config, err = project.LoadConfig(file, e.catalogue)
	}
	runner, broken := check.NewRunner(check.Config{Rules: e.rules, Severity: config.Severity})
	if err == nil {
		err = broken
	}
	if err != nil {
		err = fmt.Errorf("the configuration can't be used as it is: %w", err)
	}
	return loaded{runner: runner, budget: config.Budget, fault: err}
}
