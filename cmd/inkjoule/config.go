package main

import (
	"bufio"
	"fmt"
	"io"
	"os"
	"path/filepath"
	"slices"
	"strings"

	"github.com/spf13/cobra"

	"inkjoule/check"
	"inkjoule/check/project"
	"inkjoule/check/rules"
)

// configVerb tells what holds for a note, and where that is said.
func configVerb(w *world) *cobra.Command {
	return &cobra.Command{
		Use:   "config [PATH…]",
		Short: "Tell what configuration holds for a note or a folder, and which file says it",
		Long: "The configuration of a note is the nearest inkjoule.toml, from the note's folder upward; without one\n" +
			"the defaults hold. No path stands for the current folder. The exit status is 2 if a file is faulty.",
		RunE: func(_ *cobra.Command, args []string) error { return showConfigs(w, args) },
	}
}

func showConfigs(w *world, paths []string) error {
	catalogue, err := check.NewCatalogue(rules.All())
	if err != nil {
		return fmt.Errorf("internal error: %w", err)
	}
	configs := project.NewConfigs(catalogue)
	if len(paths) == 0 {
		paths = []string{"."}
	}
	out := bufio.NewWriter(w.out)
	for i, path := range paths {
		folder, err := folderOf(path)
		if err != nil {
			return err
		}
		if i > 0 {
			_, _ = fmt.Fprintln(out)
		}
		showConfig(out, filepath.ToSlash(path), configs.For(folder))
	}
	if err := out.Flush(); err != nil {
		return err
	}
	faults := configs.Faults()
	for _, fault := range faults {
		w.say("%s", fault)
	}
	if len(faults) > 0 {
		return errSaid
	}
	return nil
}

// folderOf is the folder (absolute) whose configuration holds for a path.
func folderOf(path string) (string, error) {
	info, err := os.Stat(path)
	if err != nil {
		return "", fmt.Errorf("%s cannot be read: it does not exist", path)
	}
	abs, err := filepath.Abs(path)
	if err == nil && !info.IsDir() {
		abs = filepath.Dir(abs)
	}
	return abs, err
}

func showConfig(out io.Writer, path string, c *project.Config) {
	from := "(no inkjoule.toml here or above: defaults)"
	if c.Path != "" {
		from = filepath.ToSlash(c.Path)
	}
	line := func(key, value string, set bool) {
		by := "default"
		if set {
			by = "file"
		}
		_, _ = fmt.Fprintf(out, "  %-28s %-24s %s\n", key, value, by)
	}
	_, _ = fmt.Fprintf(out, "%s: %s\n", path, from)
	line("fail-level", c.FailLevel.String(), c.FailLevelSet)
	names := make([]string, 0, len(c.Severity))
	for name := range c.Severity {
		names = append(names, name)
	}
	slices.Sort(names)
	for _, name := range names {
		level := "off"
		if s := c.Severity[name]; s != 0 {
			level = s.String()
		}
		line("severity."+name, level, true)
	}
	line("exclude", strings.Join(c.Exclude, " "), len(c.Exclude) > 0)
	b := c.Budget.Filled()
	line("budget.steps", fmt.Sprint(b.Steps), c.Budget.Steps > 0)
	line("budget.seconds", fmt.Sprintf("%g", b.Time.Seconds()), c.Budget.Time > 0)
	line("budget.memory-mib", fmt.Sprint(b.Memory>>20), c.Budget.Memory > 0)
}
