// Package corpus reads cases: notes with the findings that are expected of them.
//
// A case is a note, NAME.joule or NAME.joule.md, and beside it NAME.expect, so
// that nothing stands in the note that is not the author's. An expectation is
// one line a finding:
//
//	LINE RULE SEVERITY "EXCERPT"
//
// LINE is the 1-based line on which the marked text starts; EXCERPT is the
// marked text, runs of blanks and line ends written as one blank, quoted as in
// Go (so `…` serves where the text holds quotation marks). Empty lines and
// lines that begin with # are remarks. No file, or one without findings, says
// that the note is clean.
package corpus

import (
	"bufio"
	"fmt"
	"io/fs"
	"path"
	"sort"
	"strconv"
	"strings"

	"inkjoule/lang"
)

// Case is one note with what is expected of it.
type Case struct {
	Name   string // path without the ending, e.g. "demo/void-faulty"
	Path   string // path of the note
	Text   string
	Stated bool // an .expect file stands beside the note
	Expect []Expectation
}

// Expectation is one finding that must be reported.
type Expectation struct {
	Line     int // 1-based
	Rule     string
	Severity string // "advice", "caution", "error"
	Excerpt  string // the marked text, blanks collapsed
}

// String writes the expectation as its line in a file.
func (e Expectation) String() string {
	quoted := strconv.Quote(e.Excerpt)
	if strings.Contains(e.Excerpt, `"`) && strconv.CanBackquote(e.Excerpt) {
		quoted = "`" + e.Excerpt + "`"
	}
	return fmt.Sprintf("%d %s %s %s", e.Line, e.Rule, e.Severity, quoted)
}

// Read returns the cases of a folder and the folders below it, by path.
func Read(files fs.FS, folder string) ([]Case, error) {
	var cases []Case
	err := fs.WalkDir(files, folder, func(name string, d fs.DirEntry, err error) error {
		if err != nil || d.IsDir() {
			return err
		}
		bare, isNote := bareName(name)
		if !isNote {
			return nil
		}
		c, err := readCase(files, name, bare)
		cases = append(cases, c)
		return err
	})
	sort.Slice(cases, func(i, j int) bool { return cases[i].Path < cases[j].Path })
	return cases, err
}

// bareName is the note's path without its ending.
func bareName(name string) (bare string, isNote bool) {
	for _, ending := range []string{".joule.md", ".joule"} {
		if bare, ok := strings.CutSuffix(name, ending); ok && path.Base(bare) != "." {
			return bare, true
		}
	}
	return name, false
}

func readCase(files fs.FS, name, bare string) (Case, error) {
	text, err := fs.ReadFile(files, name)
	if err != nil {
		return Case{}, err
	}
	c := Case{Name: bare, Path: name, Text: string(text)}
	expect, err := fs.ReadFile(files, bare+".expect")
	if err != nil {
		return c, nil // clean by absence
	}
	c.Stated = true
	c.Expect, err = ParseExpect(string(expect))
	if err != nil {
		return c, fmt.Errorf("%s.expect: %w", bare, err)
	}
	return c, nil
}

// ParseExpect reads the text of an .expect file.
func ParseExpect(text string) ([]Expectation, error) {
	var out []Expectation
	lines := bufio.NewScanner(strings.NewReader(text))
	for n := 1; lines.Scan(); n++ {
		line := strings.TrimSpace(lines.Text())
		if line == "" || strings.HasPrefix(line, "#") {
			continue
		}
		e, err := parseLine(line)
		if err != nil {
			return nil, fmt.Errorf("line %d: %w", n, err)
		}
		out = append(out, e)
	}
	return out, lines.Err()
}

func parseLine(line string) (Expectation, error) {
	parts := strings.SplitN(line, " ", 4)
	if len(parts) < 4 {
		return Expectation{}, fmt.Errorf("want LINE RULE SEVERITY \"EXCERPT\", found %q", line)
	}
	at, err := strconv.Atoi(parts[0])
	if err != nil || at < 1 {
		return Expectation{}, fmt.Errorf("want a line number, found %q", parts[0])
	}
	switch parts[2] {
	case "advice", "caution", "error":
	default:
		return Expectation{}, fmt.Errorf("want advice, caution or error, found %q", parts[2])
	}
	excerpt, err := strconv.Unquote(strings.TrimSpace(parts[3]))
	if err != nil {
		return Expectation{}, fmt.Errorf("want a quoted excerpt, found %s", parts[3])
	}
	return Expectation{Line: at, Rule: parts[1], Severity: parts[2], Excerpt: collapse(excerpt)}, nil
}

// Seen writes faults as expectations, in the order given.
func Seen(src *lang.Source, faults []lang.Fault) []Expectation {
	out := make([]Expectation, 0, len(faults))
	for _, f := range faults {
		line, _ := src.Position(f.Span.Start)
		out = append(out, Expectation{line, f.Rule, f.Severity.String(), excerpt(src.Text, f.Span)})
	}
	return out
}

func excerpt(text string, s lang.Span) string {
	start := max(0, min(s.Start, len(text)))
	return collapse(text[start:max(start, min(s.End, len(text)))])
}

// collapse writes every run of blanks and line ends as one blank.
func collapse(s string) string { return strings.Join(strings.Fields(s), " ") }

// Compare reports how what was seen departs from what is expected: a finding
// that is missing, one that nobody expects, each as often as it differs.
func Compare(want, seen []Expectation) (missing, unexpected []Expectation) {
	left := map[Expectation]int{}
	for _, e := range want {
		left[e]++
	}
	for _, e := range seen {
		if left[e] == 0 {
			unexpected = append(unexpected, e)
			continue
		}
		left[e]--
	}
	for _, e := range want {
		if left[e] > 0 {
			left[e]--
			missing = append(missing, e)
		}
	}
	return missing, unexpected
}
