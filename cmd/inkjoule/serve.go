package main

import (
	"errors"
	"fmt"
	"io"
	"log/slog"
	"os"

	"github.com/spf13/cobra"

	"inkjoule/check"
	"inkjoule/check/rules"
	"inkjoule/lsp"
)

func serveVerb(w *world) *cobra.Command {
	var log string
	c := &cobra.Command{
		Use:   "serve",
		Short: "Serve an editor: the language server on standard input and output",
		Long: "Serves an editor by the language server protocol (3.17) on standard input and output.\n" +
			"It ends when the editor asks for it, when its input ends, and when the editor's process is gone.\n\n" +
			"The exit status is 0 after an orderly shutdown, 1 after any other end.",
		Args: noArguments,
		RunE: func(c *cobra.Command, _ []string) error { return serve(c, w, log) },
	}
	flags := c.Flags()
	flags.StringVar(&log, "log", "warn", "log to standard error from this `LEVEL` on: debug, info, warn, error")
	flags.Bool("stdio", true, "use standard input and output; for editors that insist on saying so")
	_ = flags.MarkHidden("stdio")
	return c
}

func serve(c *cobra.Command, w *world, log string) error {
	var level slog.Level
	if err := level.UnmarshalText([]byte(log)); err != nil {
		return usage("--log takes debug, info, warn or error, not %q", log)
	}
	all := rules.All()
	catalogue, err := check.NewCatalogue(all)
	if err != nil {
		return fmt.Errorf("internal error: %w", err)
	}
	out := w.out
	if out == io.Writer(os.Stdout) {
		// From here on only the server writes to standard output: whatever a
		// library prints would end up between the frames.
		os.Stdout = os.Stderr
	}
	err = lsp.Serve(c.Context(), w.in, out, lsp.Options{
		Version:   versionOnly(),
		Analyser:  lsp.NewAnalyser(all, catalogue),
		Catalogue: catalogue,
		Log:       slog.New(slog.NewTextHandler(w.err, &slog.HandlerOptions{Level: level})),
	})
	if errors.Is(err, lsp.ErrNoShutdown) {
		return errFound // status 1, as the protocol has it
	}
	return err
}
