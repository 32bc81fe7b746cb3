package main

import (
	"context"
	"fmt"
	"runtime"
	"strings"

	"github.com/spf13/cobra"

	"inkjoule/check"
	"inkjoule/check/project"
	"inkjoule/check/report"
	"inkjoule/check/rules"
	"inkjoule/lang"
)

// reviewFlags are the flags of the verb as given.
type reviewFlags struct {
	format, output, as, fail, color string
	changed, against                string
	jobs                            int
	obey                            bool
}

func reviewVerb(w *world) *cobra.Command {
	var f reviewFlags
	c := &cobra.Command{
		Use:   "review [PATH…]",
		Short: "Evaluate and check notes",
		Long: "Evaluates and checks notes. A folder is searched for *.joule and *.joule.md, leaving out what\n" +
			".gitignore and the configuration's `exclude` leave out; `-` reads a note from standard input;\n" +
			"no path stands for the current folder.\n\n" +
			"The exit status is 0 if nothing was found at or above the fail level, 1 if something was,\n" +
			"2 if a file could not be read or the command line or a configuration is wrong.",
		RunE:              func(c *cobra.Command, args []string) error { return runReview(c.Context(), w, &f, args) },
		ValidArgsFunction: noteFiles,
	}
	flags := c.Flags()
	flags.StringVarP(&f.format, "format", "f", "text", "write the review as "+strings.Join(report.Formats(), ", "))
	flags.StringVarP(&f.output, "output", "o", "", "write to this `FILE`, whole or not at all, instead of standard output")
	flags.StringVar(&f.fail, "fail-level", "", "exit 1 from this `SEVERITY` on: error, caution or advice (default: the configuration's, else caution)")
	flags.StringVar(&f.as, "as", "", "the `NAME` under which standard input is reviewed; it decides what configuration holds")
	flags.StringVar(&f.changed, "changed", "", "review only notes that changed since this Git `REVISION`, and those that refer to them")
	flags.StringVar(&f.against, "against", "", "tell which results changed since this Git `REVISION`")
	flags.IntVarP(&f.jobs, "jobs", "j", 0, "review this many notes at a time (default: one a processor)")
	flags.StringVar(&f.color, "color", "auto", "use colour: auto, always or never")
	flags.BoolVar(&f.obey, "obey-exclude", false, "leave out excluded files even where they are named, as in a hook")
	for name, words := range map[string][]string{
		"format": report.Formats(), "fail-level": {"error", "caution", "advice"}, "color": {"auto", "always", "never"},
	} {
		_ = c.RegisterFlagCompletionFunc(name, cobra.FixedCompletions(words, cobra.ShellCompDirectiveNoFileComp))
	}
	return c
}

// noteFiles completes the paths of notes.
func noteFiles(*cobra.Command, []string, string) ([]string, cobra.ShellCompDirective) {
	return []string{"joule", "md"}, cobra.ShellCompDirectiveFilterFileExt
}

// review is one run of the verb.
type review struct {
	world   *world
	flags   *reviewFlags
	rules   []*check.Rule
	runners runners
	past    *past // of --against; nil without
	configs *project.Configs
	fail    lang.Severity // 0: what each note's configuration says
	writer  report.Writer
	file    *newFile // of --output
	found   bool     // something at or above the fail level
	trouble bool     // something could not be done
}

func runReview(ctx context.Context, w *world, f *reviewFlags, paths []string) error {
	w.hurry()
	r, err := newReview(w, f)
	if err != nil {
		return err
	}
	defer r.abandon()
	g := gathering{world: w, configs: r.configs, as: f.as, obey: f.obey}
	sources, faults, err := g.sources(ctx, paths)
	if err != nil {
		return err
	}
	for _, fault := range faults {
		if err := r.problem(fault); err != nil {
			return err
		}
	}
	if sources, err = r.since(ctx, sources); err != nil {
		return err
	}
	if err := r.write(ctx, sources); err != nil {
		return err
	}
	return r.status()
}

func newReview(w *world, f *reviewFlags) (*review, error) {
	if f.jobs < 0 {
		return nil, usage("--jobs takes a number from 1, not %d", f.jobs)
	}
	if f.jobs == 0 {
		f.jobs = runtime.GOMAXPROCS(0)
	}
	r := &review{world: w, flags: f, rules: rules.All()}
	catalogue, err := check.NewCatalogue(r.rules)
	if err != nil {
		return nil, fmt.Errorf("internal error: %w", err)
	}
	r.configs = project.NewConfigs(catalogue)
	if f.fail != "" {
		r.fail, err = project.ParseSeverity(f.fail)
		if err != nil || r.fail == 0 {
			return nil, usage("--fail-level takes error, caution or advice, not %q", f.fail)
		}
	}
	return r, r.openWriter(catalogue)
}

// status turns what was seen into the verb's result.
func (r *review) status() error {
	switch {
	case r.trouble:
		return errSaid
	case r.found:
		return errFound
	}
	return nil
}

// problem tells the user, and the review, what could not be done.
func (r *review) problem(err error) error {
	r.trouble = true
	r.world.say("%s", err)
	return r.writer.Problem(err.Error())
}
