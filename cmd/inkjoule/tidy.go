package main

import (
	"context"

	"github.com/spf13/cobra"

	"inkjoule/lang"
)

func tidyVerb(w *world) *cobra.Command {
	r := &rewriting{world: w, did: "tidied", edits: func(_ context.Context, _ origin, text string) ([]lang.Edit, []error) {
		return lang.Tidy(lang.Read(text, nil)), nil
	}}
	c := &cobra.Command{
		Use:   "tidy [PATH…]",
		Short: "Lay calculation out",
		Long: "Lays the calculation of notes out: statements start in the fifth column, properties four columns\n" +
			"deeper; one blank stands on either side of `=`; `=`, `for` and `per` on neighbouring lines stand\n" +
			"below one another. Nothing but blanks is changed, and none inside a formula; prose stays as it is,\n" +
			"and so does a statement with a fault of syntax. `-` reads a note and writes it tidy.",
		RunE:              func(c *cobra.Command, args []string) error { return r.run(c.Context(), args) },
		ValidArgsFunction: noteFiles,
	}
	r.flags.add(c)
	return c
}
