package main

import (
	"context"
	"errors"
	"fmt"
	"io"
	"os"
	"strings"

	"github.com/spf13/cobra"
	"golang.org/x/term"

	"inkjoule/check"
	"inkjoule/check/project"
)

// The exit status of every verb.
const (
	statusClean   = 0
	statusFound   = 1 // findings at or above the fail level, or a file that would change
	statusTrouble = 2 // usage, configuration or internal error
)

// errFound says that the run worked and found something; it is not printed.
var errFound = errors.New("findings")

// errSaid says that a failure has been told already.
var errSaid = errors.New("told")

// world is what a run may touch.
type world struct {
	in     io.Reader
	out    io.Writer
	err    io.Writer
	getenv func(string) string
}

func standard() *world {
	return &world{in: os.Stdin, out: os.Stdout, err: os.Stderr, getenv: os.Getenv}
}

// isTerminal reports whether a stream is one on which a person looks.
func isTerminal(stream any) bool {
	f, ok := stream.(*os.File)
	return ok && term.IsTerminal(int(f.Fd()))
}

// say writes a message for the user to standard error.
func (w *world) say(format string, args ...any) {
	_, _ = fmt.Fprintf(w.err, "inkjoule: "+format+"\n", args...)
}

// execute runs a command line and gives its exit status.
func execute(ctx context.Context, w *world, args []string) int {
	root := newRoot(w)
	root.SetArgs(args)
	verb, err := root.ExecuteContextC(ctx)
	switch {
	case err == nil:
		return statusClean
	case errors.Is(err, errFound):
		return statusFound
	case errors.Is(err, errSaid):
	case ctx.Err() != nil:
		w.say("interrupted")
	default:
		w.say("%s", err)
		var u *usageError
		if errors.As(err, &u) {
			w.say("`%s --help` tells how it is used", verb.CommandPath())
		}
	}
	return statusTrouble
}

// usageError is a mistake in the command line.
type usageError struct{ error }

func usage(format string, args ...any) error { return &usageError{fmt.Errorf(format, args...)} }

func newRoot(w *world) *cobra.Command {
	root := &cobra.Command{
		Use:   "inkjoule",
		Short: "Review electromagnetic calculation notes",
		Long: "inkjoule reads calculation notes (NAME.joule, NAME.joule.md), evaluates them with units,\n" +
			"verifies the results they state, and tells where units, kinds, rms and peak, shapes or\n" +
			"assumptions about a medium do not hold.",
		SilenceErrors: true,
		SilenceUsage:  true,
		Args:          noVerb,
		RunE:          func(c *cobra.Command, _ []string) error { return help(w, c) },
	}
	root.SetIn(w.in)
	root.SetOut(w.out)
	root.SetErr(w.err)
	root.SetFlagErrorFunc(func(_ *cobra.Command, err error) error { return &usageError{err} })
	root.AddCommand(verbs(w)...)
	return root
}

// verbs of the program; each has its file.
func verbs(w *world) []*cobra.Command {
	return []*cobra.Command{reviewVerb(w), fillVerb(w), tidyVerb(w), sheetVerb(w), rulesVerb(w), handbookVerb(w), serveVerb(w), configVerb(w), manVerb(w), versionVerb(w)}
}

// help answers a call without a verb.
func help(w *world, c *cobra.Command) error {
	c.SetOut(w.err)
	_ = c.Help()
	return errSaid
}

// noVerb tells what a first word that is no verb should have been.
func noVerb(c *cobra.Command, args []string) error {
	if len(args) == 0 {
		return nil
	}
	if _, err := os.Stat(args[0]); err == nil || project.IsNote(args[0]) {
		return usage("the verb is missing; to review the notes write `inkjoule review %s`", strings.Join(args, " "))
	}
	var names []string
	for _, v := range c.Commands() {
		names = append(names, v.Name())
	}
	if near := check.Nearest(args[0], names); near != "" {
		return usage("there is no verb %q; did you mean `inkjoule %s`?", args[0], near)
	}
	return usage("there is no verb %q", args[0])
}
