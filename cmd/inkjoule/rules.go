package main

import (
	"bufio"
	"fmt"
	"io"
	"strings"

	"github.com/spf13/cobra"

	"inkjoule/check"
	"inkjoule/check/rules"
)

func rulesVerb(w *world) *cobra.Command {
	return &cobra.Command{
		Use:   "rules [NAME…]",
		Short: "List the rules, or explain one: what fires, when it is silent, the physics and its source",
		RunE:  func(_ *cobra.Command, args []string) error { return showRules(w, args) },
		ValidArgsFunction: func(*cobra.Command, []string, string) ([]string, cobra.ShellCompDirective) {
			catalogue, _ := check.NewCatalogue(rules.All())
			return catalogue.Names(), cobra.ShellCompDirectiveNoFileComp
		},
	}
}

func showRules(w *world, names []string) error {
	catalogue, err := check.NewCatalogue(rules.All())
	if err != nil {
		return fmt.Errorf("internal error: %w", err)
	}
	for _, name := range names {
		if catalogue.Find(name) == nil {
			return unknownRule(catalogue, name)
		}
	}
	out := bufio.NewWriter(w.out)
	if len(names) == 0 {
		listRules(out, catalogue)
	}
	for i, name := range names {
		if i > 0 {
			_, _ = fmt.Fprintln(out)
		}
		explain(out, catalogue.Find(name))
	}
	return out.Flush()
}

func unknownRule(c *check.Catalogue, name string) error {
	if near := c.Nearest(name); near != "" {
		return usage("no rule is called %q; did you mean %s?", name, near)
	}
	return usage("no rule is called %q; `inkjoule rules` lists the names", name)
}

// listRules writes a line a rule: those of physics, then those of the language.
func listRules(out io.Writer, c *check.Catalogue) {
	for _, language := range []bool{false, true} {
		heading := "Physics"
		if language {
			heading = "Language, units, arithmetic"
			_, _ = fmt.Fprintln(out)
		}
		_, _ = fmt.Fprintln(out, heading)
		for _, r := range c.All() {
			if (r.Run == nil) == language {
				_, _ = fmt.Fprintf(out, "  %-30s %-8s %s\n", r.Name, severityWord(r), r.Title)
			}
		}
	}
}

func severityWord(r *check.Rule) string {
	if r.Off {
		return "off"
	}
	return r.Severity.String()
}

// explain writes everything about one rule.
func explain(out io.Writer, r *check.Rule) {
	severity := r.Severity.String()
	if r.Off {
		severity += ", off unless the configuration turns it on"
	}
	_, _ = fmt.Fprintf(out, "%s (%s)\n%s.\n", r.Name, severity, r.Title)
	for _, part := range []struct{ head, body string }{
		{"Fires", r.Sees}, {"Stays silent", r.Silent}, {"Physics", r.Formula}, {"Write instead", r.Remedy}, {"Source", r.Source},
	} {
		if part.body != "" {
			_, _ = fmt.Fprintf(out, "\n%s\n%s", part.head, indented(fold(part.body, 76)))
		}
	}
	_, _ = fmt.Fprintf(out, "\nWrong\n%s\nRight\n%s", indented(r.Wrong.Note), indented(r.Right.Note))
}

// indented sets every line four columns in.
func indented(s string) string {
	var b strings.Builder
	for _, line := range strings.Split(strings.Trim(s, "\n"), "\n") {
		b.WriteString(strings.TrimRight("    "+line, " ") + "\n")
	}
	return b.String()
}

// fold breaks a paragraph into lines of at most width characters.
func fold(s string, width int) string {
	var b strings.Builder
	column := 0
	for _, word := range strings.Fields(s) {
		n := len([]rune(word))
		if column > 0 && column+1+n > width {
			b.WriteString("\n")
			column = 0
		} else if column > 0 {
			b.WriteString(" ")
			column++
		}
		b.WriteString(word)
		column += n
	}
	return b.String()
}
