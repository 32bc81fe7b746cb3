package main

import (
	"fmt"
	"runtime/debug"
	"time"

	"github.com/spf13/cobra"
)

func versionVerb(w *world) *cobra.Command {
	return &cobra.Command{
		Use:   "version",
		Short: "Tell the version and what it was built from",
		Args:  noArguments,
		RunE: func(*cobra.Command, []string) error {
			_, err := fmt.Fprintln(w.out, "inkjoule", versionLine())
			return err
		},
	}
}

// versionLine is the module's version with the revision and the compiler, as
// far as the build recorded them.
func versionLine() string {
	info, ok := debug.ReadBuildInfo()
	if !ok {
		return "(build not recorded)"
	}
	line := version(info)
	for _, s := range info.Settings {
		switch {
		case s.Key == "vcs.revision" && s.Value != "":
			line += ", revision " + s.Value
		case s.Key == "vcs.modified" && s.Value == "true":
			line += " with changes"
		}
	}
	return line + ", " + info.GoVersion
}

// version is the module's version, or "unreleased".
func version(info *debug.BuildInfo) string {
	if v := info.Main.Version; v != "" && v != "(devel)" {
		return v
	}
	return "unreleased"
}

// versionOnly is the version for outputs that name the program.
func versionOnly() string {
	if info, ok := debug.ReadBuildInfo(); ok {
		return version(info)
	}
	return "unreleased"
}

// builtAt is the time of the revision that the program was built from, so that
// what is written of it is the same for every build; the Unix epoch where that
// is not recorded.
func builtAt() time.Time {
	if info, ok := debug.ReadBuildInfo(); ok {
		for _, s := range info.Settings {
			if s.Key == "vcs.time" {
				if at, err := time.Parse(time.RFC3339, s.Value); err == nil {
					return at
				}
			}
		}
	}
	return time.Unix(0, 0).UTC()
}

// noArguments refuses arguments in the program's own words.
func noArguments(c *cobra.Command, args []string) error {
	if len(args) > 0 {
		return usage("%s takes no argument, but %q was given", c.CommandPath(), args[0])
	}
	return nil
}
