package main

import (
	"bufio"
	"context"
	"fmt"
	"io"
	"strings"

	"github.com/spf13/cobra"

	"inkjoule/lang"
	"inkjoule/lang/media"
)

func handbookVerb(w *world) *cobra.Command {
	return &cobra.Command{
		Use:   "handbook [NAME…]",
		Short: "List the built-in media, or show one with its properties, ranges and sources",
		RunE:  func(c *cobra.Command, args []string) error { return showHandbook(c.Context(), w, args) },
	}
}

// chapter is one note of the handbook, analysed.
type chapter struct {
	name string
	note *lang.Note
}

func chapters(ctx context.Context) ([]chapter, error) {
	var out []chapter
	for _, name := range media.Chapters() {
		text, _ := media.Handbook(name)
		n, err := lang.Analyze(ctx, text, lang.Options{Path: media.Prefix + name})
		if err != nil {
			return nil, err
		}
		out = append(out, chapter{name, n})
	}
	return out, nil
}

// media are the media of a chapter, in its order.
func (c chapter) media() []*lang.Symbol {
	var out []*lang.Symbol
	for _, s := range c.note.Symbols {
		if s.Role == lang.RoleMedium {
			out = append(out, s)
		}
	}
	return out
}

func showHandbook(ctx context.Context, w *world, names []string) error {
	all, err := chapters(ctx)
	if err != nil {
		return fmt.Errorf("internal error: %w", err)
	}
	out := bufio.NewWriter(w.out)
	if len(names) == 0 {
		listHandbook(out, all)
		return out.Flush()
	}
	for i, name := range names {
		c, s := findMedium(all, name)
		if s == nil {
			return unknownMedium(all, name)
		}
		if i > 0 {
			_, _ = fmt.Fprintln(out)
		}
		showMedium(out, c, s)
	}
	return out.Flush()
}

// listHandbook writes the media of each chapter.
func listHandbook(out io.Writer, all []chapter) {
	for i, c := range all {
		if i > 0 {
			_, _ = fmt.Fprintln(out)
		}
		_, _ = fmt.Fprintf(out, "%s%s\n", media.Prefix, c.name)
		for _, s := range c.media() {
			_, _ = fmt.Fprintf(out, "  %-24s %s\n", s.Name, strings.Join(c.propertyNames(s), " "))
		}
	}
}

func (c chapter) propertyNames(medium *lang.Symbol) []string {
	var out []string
	for _, s := range c.note.Symbols {
		if s.Owner == medium {
			out = append(out, s.Name)
		}
	}
	return out
}

func findMedium(all []chapter, name string) (chapter, *lang.Symbol) {
	key := lang.CanonicalName(name)
	for _, c := range all {
		if s := c.note.Lookup(key); s != nil && s.Role == lang.RoleMedium {
			return c, s
		}
	}
	return chapter{}, nil
}

func unknownMedium(all []chapter, name string) error {
	var have []string
	for _, c := range all {
		for _, s := range c.media() {
			have = append(have, s.Name)
		}
	}
	if near := lang.Nearest(name, have); near != "" {
		return usage("the handbook has no medium %q; did you mean %s?", name, near)
	}
	return usage("the handbook has no medium %q; `inkjoule handbook` lists them", name)
}

// showMedium writes a medium as its chapter states it: the statement is the
// record, with every range and source.
func showMedium(out io.Writer, c chapter, s *lang.Symbol) {
	_, _ = fmt.Fprintf(out, "%s, to be used with: uses \"%s%s\"\n\n", s.Name, media.Prefix, c.name)
	_, _ = fmt.Fprintf(out, "    %s\n", strings.TrimRight(s.Stmt.Text, "\n"))
}
