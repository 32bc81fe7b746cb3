package project

import (
	"bytes"
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"time"

	"github.com/pelletier/go-toml/v2"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/eval"
)

// ConfigName is the file that configures the notes of its folder and below.
const ConfigName = "inkjoule.toml"

// Config is what holds for the notes of a folder.
type Config struct {
	Path         string // absolute; "" where no file was found and the defaults hold
	FailLevel    lang.Severity
	FailLevelSet bool                     // the file says it
	Severity     map[string]lang.Severity // by rule name; 0 switches the rule off
	Exclude      []string                 // as written
	Budget       eval.Budget              // of one evaluation; zero fields take the defaults
	exclude      Patterns
}

// DefaultConfig is what holds where no file says otherwise.
func DefaultConfig() *Config { return &Config{FailLevel: lang.Caution} }

// Excludes reports whether the configuration leaves a path (absolute) out,
// itself or by a folder in which it lies.
func (c *Config) Excludes(path string, folder bool) bool {
	path = filepath.ToSlash(path)
	for i := len(c.exclude.base) + 1; i < len(path); i++ {
		if path[i] == '/' && c.exclude.verdict(path[:i], true) > 0 {
			return true
		}
	}
	return c.exclude.verdict(path, folder) > 0
}

// file is the shape of the configuration file.
type file struct {
	FailLevel failLevel        `toml:"fail-level"`
	Exclude   []string         `toml:"exclude"`
	Severity  map[string]level `toml:"severity"`
	Budget    budget           `toml:"budget"`
}

// budget is what one evaluation may take, as the file writes it.
type budget struct {
	Steps   *int64   `toml:"steps"`
	Seconds *float64 `toml:"seconds"`
	Memory  *int64   `toml:"memory-mib"`
}

// read gives the budget; refuse is called with a key whose value is none.
func (b budget) read(refuse func(key string)) (out eval.Budget) {
	if b.Steps != nil {
		if out.Steps = *b.Steps; out.Steps <= 0 {
			refuse("steps")
		}
	}
	if b.Seconds != nil {
		if out.Time = time.Duration(*b.Seconds * float64(time.Second)); out.Time <= 0 {
			refuse("seconds")
		}
	}
	if b.Memory != nil {
		if out.Memory = *b.Memory << 20; out.Memory <= 0 || *b.Memory > 1<<20 {
			refuse("memory-mib")
		}
	}
	return out
}

// level is a severity as the file writes it.
type level lang.Severity

// UnmarshalText reads error, caution, advice or off.
func (l *level) UnmarshalText(text []byte) error {
	s, err := ParseSeverity(string(text))
	if err == nil {
		*l = level(s)
	}
	return err
}

// failLevel is a severity that is not off.
type failLevel lang.Severity

// UnmarshalText reads error, caution or advice.
func (l *failLevel) UnmarshalText(text []byte) error {
	s, err := ParseSeverity(string(text))
	if err != nil || s == 0 {
		return fmt.Errorf("%q is none of error, caution, advice", text)
	}
	*l = failLevel(s)
	return nil
}

// ParseSeverity reads error, caution or advice, and off as 0.
func ParseSeverity(word string) (lang.Severity, error) {
	for _, s := range []lang.Severity{lang.Error, lang.Caution, lang.Advice} {
		if word == s.String() {
			return s, nil
		}
	}
	if word == "off" {
		return 0, nil
	}
	return 0, fmt.Errorf("%q is none of error, caution, advice, off", word)
}

// LoadConfig reads one configuration file. The error tells every fault with
// its position; the config then holds what could be read.
func LoadConfig(path string, known *check.Catalogue) (*Config, error) {
	data, err := os.ReadFile(path)
	if err != nil {
		return DefaultConfig(), plain(path, err)
	}
	return parseConfig(path, data, known)
}

func parseConfig(path string, data []byte, known *check.Catalogue) (*Config, error) {
	c := DefaultConfig()
	c.Path = path
	var f file
	faults := decode(path, data, &f)
	if f.FailLevel != 0 {
		c.FailLevel, c.FailLevelSet = lang.Severity(f.FailLevel), true
	}
	c.Severity = map[string]lang.Severity{}
	at := newPositions(data)
	for name, l := range f.Severity {
		if why := refused(name, lang.Severity(l), known); why != "" {
			faults = append(faults, fault{path, at.of("severity", name), why})
			continue
		}
		c.Severity[name] = lang.Severity(l)
	}
	c.Budget = f.Budget.read(func(key string) {
		faults = append(faults, fault{path, at.of("budget", key), key + " is a number above zero"})
	})
	c.Exclude = f.Exclude
	c.exclude = ParsePatterns(filepath.ToSlash(filepath.Dir(path)), strings.Join(f.Exclude, "\n"))
	slices.SortFunc(faults, fault.compare)
	return c, join(faults)
}

// refused tells why the file may not set a rule's severity.
func refused(name string, to lang.Severity, known *check.Catalogue) string {
	rule := known.Find(name)
	switch {
	case rule == nil && known.Nearest(name) != "":
		return fmt.Sprintf("no rule is called %q; did you mean %s?", name, known.Nearest(name))
	case rule == nil:
		return fmt.Sprintf("no rule is called %q; `inkjoule rules` lists the names", name)
	case rule.Firm && to != rule.Severity:
		return fmt.Sprintf("%s is an error of syntax, dimension or arithmetic, and stays one", name)
	}
	return ""
}

// decode reads the file strictly and gives its faults with their positions.
func decode(path string, data []byte, f *file) []fault {
	err := toml.NewDecoder(bytes.NewReader(data)).DisallowUnknownFields().Decode(f)
	var strict *toml.StrictMissingError
	var one *toml.DecodeError
	switch {
	case err == nil:
		return nil
	case errors.As(err, &strict):
		var faults []fault
		for i := range strict.Errors {
			faults = append(faults, unknownKey(path, &strict.Errors[i]))
		}
		return faults
	case errors.As(err, &one):
		row, column := one.Position()
		return []fault{{path, position{row, column}, strings.TrimPrefix(one.Error(), "toml: ")}}
	}
	return []fault{{path, position{1, 1}, err.Error()}}
}

// keys of the file; read only.
var keys = []string{"fail-level", "exclude", "severity", "budget.steps", "budget.seconds", "budget.memory-mib"}

func unknownKey(path string, e *toml.DecodeError) fault {
	row, column := e.Position()
	key := strings.Join(e.Key(), ".")
	text := fmt.Sprintf("unknown key %q; the keys are %s", key, strings.Join(keys, ", "))
	if near := check.Nearest(key, keys); near != "" {
		text = fmt.Sprintf("unknown key %q; did you mean %s?", key, near)
	}
	return fault{path, position{row, column}, text}
}

// Find gives the path of the configuration that holds for a folder: that of
// the nearest folder upward. "" where there is none.
func Find(folder string) string {
	for {
		path := filepath.Join(folder, ConfigName)
		if info, err := os.Stat(path); err == nil && !info.IsDir() {
			return path
		} else if err != nil && !errors.Is(err, fs.ErrNotExist) && !errors.Is(err, fs.ErrPermission) {
			return ""
		}
		parent := filepath.Dir(folder)
		if parent == folder {
			return ""
		}
		folder = parent
	}
}
