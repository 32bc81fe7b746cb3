package main

import (
	"encoding/json"
	"fmt"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"inkjoule/check/project"
	"inkjoule/check/report"
)

func TestExitStatusIsTheSameForEveryFormat(t *testing.T) {
	dir := folder(t, map[string]string{"clean.joule": clean, "wrong.joule": wrong, "cautious.joule": cautious, "advised.joule": advised})
	cases := []struct {
		args string
		want int
	}{
		{"clean.joule", 0},
		{"wrong.joule", 1},
		{"cautious.joule", 1},
		{"advised.joule", 0},
		{"clean.joule wrong.joule", 1},
		{".", 1},
		{"--fail-level error cautious.joule", 0},
		{"--fail-level error wrong.joule", 1},
		{"--fail-level advice advised.joule", 1},
		{"--fail-level advice clean.joule", 0},
		{"lost.joule", 2},
		{"lost.joule wrong.joule", 2},
		{"lost.joule clean.joule", 2},
	}
	t.Chdir(dir)
	for _, format := range report.Formats() {
		for _, c := range cases {
			got := inside(t, "", append([]string{"review", "--format", format}, strings.Fields(c.args)...)...)
			if got.status != c.want {
				t.Errorf("%s %s: %d, want %d\n%s%s", format, c.args, got.status, c.want, got.out, got.err)
			}
		}
	}
}

func TestMistakesInTheCommandLine(t *testing.T) {
	dir := folder(t, map[string]string{"a.joule": clean, "empty/readme.txt": "x"})
	cases := []struct{ name, args, want string }{
		{"unknown flag", "review --colour", "unknown flag: --colour"},
		{"unknown verb", "reveiw a.joule", "did you mean `inkjoule review`?"},
		{"far from any verb", "zzzzzz", "there is no verb \"zzzzzz\""},
		{"forgotten verb", "a.joule", "the verb is missing; to review the notes write `inkjoule review a.joule`"},
		{"no verb", "", "Usage:"},
		{"unknown format", "review --format xml a.joule", "there is no format \"xml\"; the formats are text, json"},
		{"unknown level", "review --fail-level warning a.joule", "--fail-level takes error, caution or advice, not \"warning\""},
		{"level off", "review --fail-level off a.joule", "--fail-level takes error, caution or advice, not \"off\""},
		{"unknown colour", "review --color red a.joule", "--color takes auto, always or never, not \"red\""},
		{"negative jobs", "review --jobs -1 a.joule", "--jobs takes a number from 1"},
		{"jobs in words", "review --jobs many a.joule", "invalid argument \"many\""},
		{"name without standard input", "review --as b.joule a.joule", "write `-` as the path too"},
		{"missing file", "review lost.joule", "lost.joule does not exist"},
		{"folder without notes", "review empty", "there is no note (*.joule, *.joule.md) in empty"},
		{"missing folder of the output", "review -o no/such/file a.joule", "its folder does not exist"},
		{"folder as output", "review -o empty a.joule", "empty cannot be written: it is a folder"},
		{"unknown rule", "rules half-missing", "no rule is called \"half-missing\""},
		{"misspelt rule", "rules sintax", "did you mean syntax?"},
		{"argument of version", "version now", "inkjoule version takes no argument, but \"now\" was given"},
	}
	t.Chdir(dir)
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			got := inside(t, "", strings.Fields(c.args)...)
			if got.status != 2 || !strings.Contains(got.err, c.want) {
				t.Errorf("status %d, %q", got.status, got.err)
			}
			if n := strings.Count(got.err, c.want); n != 1 {
				t.Errorf("said %d times: %q", n, got.err)
			}
		})
	}
}

func TestUnreadableFilesCostNothingButThemselves(t *testing.T) {
	dir := folder(t, map[string]string{
		"a.joule":      wrong,
		"binary.joule": "\x7fELF\x00\x01\x02",
		"huge.joule":   "Huge\n\n" + strings.Repeat("    x = 1 + 1 = 2\n", project.MaxSize/18+1),
		"utf16.joule":  "\xff\xfeE\x00",
		"z.joule":      wrong,
	})
	got := (&call{args: []string{"review", "lost.joule", ".", "a.joule/x.joule"}}).run(t, dir)
	for _, want := range []string{
		"lost.joule does not exist", "binary.joule is a binary file", "huge.joule is larger than 8 MiB", "utf16.joule is in UTF-16", "a.joule/x.joule cannot be read: not a directory",
	} {
		if strings.Count(got.err, want) != 1 {
			t.Errorf("%q is not said once:\n%s", want, got.err)
		}
	}
	for _, want := range []string{"a.joule:3:", "z.joule:3:", "2 notes,"} {
		if !strings.Contains(got.out, want) {
			t.Errorf("%q is missing:\n%s", want, got.out)
		}
	}
	if got.status != 2 {
		t.Errorf("status %d", got.status)
	}
}

func TestProblemsAreInTheJSONToo(t *testing.T) {
	t.Chdir(folder(t, map[string]string{"a.joule": clean}))
	got := inside(t, "", "review", "-f", "json", "a.joule", "lost.joule")
	var read struct{ Problems []string }
	if err := json.Unmarshal([]byte(got.out), &read); err != nil || len(read.Problems) != 1 || read.Problems[0] != "lost.joule does not exist" {
		t.Errorf("%v, %q", err, read.Problems)
	}
}

func TestBytesThatAreNoTextAreAFinding(t *testing.T) {
	t.Chdir(folder(t, map[string]string{"a.joule": "Field\n\n    E\xff = 12 kV / 3 mm = 4.0 kV/mm\n"}))
	got := inside(t, "", "review", "-f", "json", "a.joule")
	if got.status != 1 || !json.Valid([]byte(got.out)) {
		t.Errorf("status %d: %s", got.status, got.out)
	}
}

func TestStandardInput(t *testing.T) {
	dir := folder(t, map[string]string{
		"sub/inkjoule.toml": "fail-level = \"error\"\n",
		"inkjoule.toml":     "[severity]\nunasked-result = \"error\"\n",
	})
	t.Chdir(dir)
	cases := []struct {
		name, in, args string
		want           int
		place          string
	}{
		{"without a name", wrong, "-", 1, "standard-input.joule:3:"},
		{"named", wrong, "- --as a.joule", 1, "a.joule:3:"},
		{"configured by its name", cautious, "- --as sub/a.joule", 0, "sub/a.joule:4:"},
		{"configured by another name", cautious, "- --as a.joule", 1, "a.joule:4:"},
		{"severity from the file", advised, "- --as a.joule", 1, ": error: "},
		{"binary", "a\x00b", "-", 2, ""},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			got := inside(t, c.in, append([]string{"review"}, strings.Fields(c.args)...)...)
			if got.status != c.want || !strings.Contains(got.out, c.place) {
				t.Errorf("status %d:\n%s%s", got.status, got.out, got.err)
			}
		})
	}
}

func TestConfigurationIsFoundFromTheNote(t *testing.T) {
	dir := folder(t, map[string]string{
		"work/inkjoule.toml":      "exclude = [\"old/\"]\n[severity]\nassumption-fails = \"off\"\n",
		"work/a.joule":            cautious,
		"work/old/b.joule":        wrong,
		"elsewhere/c.joule":       clean,
		"elsewhere/inkjoule.toml": "[severity]\nassumption-fails = \"error\"\n",
	})
	for _, from := range []string{"", "work", "elsewhere", "work/old"} {
		target, err := filepath.Rel(filepath.Join(dir, from), filepath.Join(dir, "work"))
		if err != nil {
			t.Fatal(err)
		}
		got := (&call{args: []string{"review", target}}).run(t, filepath.Join(dir, from))
		if got.status != 0 || !strings.Contains(got.out, "1 note, 2 statements") {
			t.Errorf("from %q: status %d\n%s%s", from, got.status, got.out, got.err)
		}
	}
}

func TestFaultyConfigurationIsTrouble(t *testing.T) {
	dir := folder(t, map[string]string{"inkjoule.toml": "colour = 1\n", "a.joule": clean, "b.joule": clean})
	t.Chdir(dir)
	got := inside(t, "", "review")
	if got.status != 2 || strings.Count(got.err, "inkjoule.toml:1:1: unknown key \"colour\"") != 1 || !strings.Contains(got.out, "2 notes") {
		t.Errorf("status %d\n%s%s", got.status, got.out, got.err)
	}
}

func TestExcludedFilesInAHook(t *testing.T) {
	dir := folder(t, map[string]string{"inkjoule.toml": "exclude = [\"old/\"]\n", "old/a.joule": wrong, "b.joule": clean})
	t.Chdir(dir)
	if got := inside(t, "", "review", "old/a.joule"); got.status != 1 {
		t.Errorf("a file by name is reviewed: status %d", got.status)
	}
	if got := inside(t, "", "review", "--obey-exclude", "old/a.joule"); got.status != 0 || got.err != "" {
		t.Errorf("status %d, %q", got.status, got.err)
	}
}

func TestOutputDoesNotDependOnTheNumberOfJobs(t *testing.T) {
	files := map[string]string{}
	for i := range 60 {
		files[fmt.Sprintf("n%02d.joule", i)] = fmt.Sprintf("Note\n\n    E = %d kV / 3 mm = 4.0 kV/mm\n", i) + strings.Repeat("\n    E_1 = E = 4 kV/mm\n", i%7)
	}
	t.Chdir(folder(t, files))
	for _, format := range report.Formats() {
		first := inside(t, "", "review", "-f", format, "-j", "1")
		for _, jobs := range []string{"2", "8", "0"} {
			if got := inside(t, "", "review", "-f", format, "-j", jobs); got.out != first.out || got.status != first.status {
				t.Errorf("%s with %s jobs differs", format, jobs)
			}
		}
	}
}

func TestColourRules(t *testing.T) {
	dir := folder(t, map[string]string{"a.joule": wrong})
	cases := []struct {
		name string
		call call
		want bool
	}{
		{"no terminal", call{args: []string{"review", "a.joule"}}, false},
		{"always", call{args: []string{"review", "--color", "always", "a.joule"}}, true},
		{"the flag goes before NO_COLOR", call{args: []string{"review", "--color=always", "a.joule"}, env: []string{"NO_COLOR=1"}}, true},
		{"never", call{args: []string{"review", "--color", "never", "a.joule"}}, false},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			if got := c.call.run(t, dir); strings.Contains(got.out, "\x1b[") != c.want || got.status != 1 {
				t.Errorf("status %d, %q", got.status, got.out)
			}
		})
	}
}

func TestOutputFile(t *testing.T) {
	dir := folder(t, map[string]string{"a.joule": clean, "kept.txt": "before", "target.txt": "before"})
	t.Chdir(dir)
	if err := os.Chmod("kept.txt", 0o640); err != nil {
		t.Fatal(err)
	}
	if err := os.Symlink("target.txt", "link.txt"); err != nil {
		t.Fatal(err)
	}
	want := inside(t, "", "review", "a.joule").out
	for _, name := range []string{"new.txt", "kept.txt", "link.txt"} {
		got := inside(t, "", "review", "-o", name, "a.joule")
		text, err := os.ReadFile(name)
		if err != nil || got.status != 0 || got.out != "" || string(text) != want {
			t.Errorf("%s: status %d, %v, %q", name, got.status, err, text)
		}
	}
	if info, err := os.Lstat("link.txt"); err != nil || info.Mode()&os.ModeSymlink == 0 {
		t.Errorf("the link is gone: %v", err)
	}
	if text, _ := os.ReadFile("target.txt"); string(text) != want {
		t.Errorf("the link's target is %q", text)
	}
	if info, err := os.Stat("kept.txt"); err != nil || info.Mode().Perm() != 0o640 {
		t.Errorf("the mode changed: %v", err)
	}
	noLeftovers(t, dir)
}

func TestOutputFileIsWholeOrNotThere(t *testing.T) {
	dir := folder(t, map[string]string{"a.joule": clean, "kept.txt": "before"})
	t.Chdir(dir)
	for _, args := range []string{"-f xml -o kept.txt a.joule", "--as x -o kept.txt a.joule", "--fail-level x -o kept.txt a.joule"} {
		if got := inside(t, "", append([]string{"review"}, strings.Fields(args)...)...); got.status != 2 {
			t.Errorf("%s: status %d", args, got.status)
		}
		if text, _ := os.ReadFile("kept.txt"); string(text) != "before" {
			t.Errorf("%s: the file is %q", args, text)
		}
	}
	noLeftovers(t, dir)
}

func noLeftovers(t *testing.T, dir string) {
	t.Helper()
	entries, err := os.ReadDir(dir)
	if err != nil {
		t.Fatal(err)
	}
	for _, e := range entries {
		if strings.HasPrefix(e.Name(), ".") {
			t.Errorf("%s was left behind", e.Name())
		}
	}
}

func TestSummaryNamesTheSafetyOfAReview(t *testing.T) {
	got := inside(t, clean, "review", "-")
	if !strings.Contains(got.out, "1 note, 1 statement read, 1 value computed, 1 line of prose: no errors, no cautions, no advice.") || !strings.Contains(got.out, report.Safety) {
		t.Errorf("%s", got.out)
	}
}

func TestTheBudgetOfTheConfigurationHolds(t *testing.T) {
	dir := folder(t, map[string]string{"inkjoule.toml": "[budget]\nsteps = 1000\n", "a.joule": "Sum\n\n    x = sum(n for n from 1 to 1e5) = __\n    y = 2*3 = 6\n"})
	if got := inside(t, "", "review", dir); !strings.Contains(got.out, "[over-budget]") || strings.Count(got.out, "error") != 2 {
		t.Errorf("status %d\n%s", got.status, got.out)
	}
}
