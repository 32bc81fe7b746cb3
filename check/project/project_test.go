package project

import (
	"errors"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"
	"time"

	"inkjoule/check"
	"inkjoule/lang"
)

func catalogue(t *testing.T) *check.Catalogue {
	t.Helper()
	c, err := check.NewCatalogue(nil)
	if err != nil {
		t.Fatal(err)
	}
	return c
}

func TestIsNote(t *testing.T) {
	cases := map[string]bool{
		"a.joule": true, "a.joule.md": true, "sub/a.b.joule": true, "µ.joule": true,
		".joule": false, ".joule.md": false, "a.md": false, "ajoule": false, "a.joule.txt": false, "a.JOULE": false,
	}
	for name, want := range cases {
		if got := IsNote(name); got != want {
			t.Errorf("IsNote(%q) = %v", name, got)
		}
	}
}

func TestReadTellsInPlainWordsWhatIsWrong(t *testing.T) {
	cases := []struct{ name, text, want string }{
		{"text", "Ω = 1\r\n", ""},
		{"empty", "", ""},
		{"a byte that is no UTF-8", "a\xffb", ""}, // the language points at it
		{"byte order mark", "\ufeffa", ""},
		{"binary", "\x7fELF\x00\x01", "binary"},
		{"UTF-16", "\xff\xfea\x00", "UTF-16"},
		{"UTF-16, big end first", "\xfe\xff\x00a", "UTF-16"},
		{"as long as may be", strings.Repeat("a", MaxSize), ""},
		{"too long", strings.Repeat("a", MaxSize+1), "larger than 8 MiB"},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			got, err := Read("n.joule", strings.NewReader(c.text))
			switch {
			case c.want == "" && (err != nil || got != c.text):
				t.Errorf("%v", err)
			case c.want != "" && (err == nil || !strings.Contains(err.Error(), c.want) || !strings.Contains(err.Error(), "n.joule")):
				t.Errorf("the error is %v", err)
			}
		})
	}
}

func TestReadFileTellsInPlainWordsWhatIsWrong(t *testing.T) {
	dir := t.TempDir()
	if _, err := ReadFile(filepath.Join(dir, "no.joule")); err == nil || !strings.HasSuffix(err.Error(), "no.joule does not exist") {
		t.Errorf("missing: %v", err)
	}
	if _, err := ReadFile(dir); err == nil || !strings.HasSuffix(err.Error(), "is not a file") {
		t.Errorf("folder: %v", err)
	}
}

func TestFind(t *testing.T) {
	top := realTemp(t)
	for _, path := range []string{"b.joule", "a.joule.md", "z.txt", "sub/c.joule", "old/d.joule", "old/in/e.joule", ".git/x.joule", "empty/readme.md", "own/f.joule", "own/old/g.joule"} {
		write(t, filepath.Join(top, path), "")
	}
	write(t, filepath.Join(top, ConfigName), "exclude = [\"old/\", \"!sub\"]\n")
	write(t, filepath.Join(top, "own", ConfigName), "")
	for link, target := range map[string]string{"linked.joule": "b.joule", "loop": ".", "lost.joule": "nowhere"} {
		if err := os.Symlink(target, filepath.Join(top, link)); err != nil {
			t.Fatal(err)
		}
	}
	t.Chdir(top)
	cases := []struct {
		name   string
		paths  []string
		obey   bool
		want   []string
		faults []string
	}{
		{"folder", []string{"."}, false, []string{"a.joule.md", "b.joule", "linked.joule", "own/f.joule", "own/old/g.joule", "sub/c.joule"}, nil},
		{"each once", []string{"b.joule", ".", "./b.joule"}, false, []string{"b.joule", "a.joule.md", "linked.joule", "own/f.joule", "own/old/g.joule", "sub/c.joule"}, nil},
		{"any file by name", []string{"z.txt"}, false, []string{"z.txt"}, nil},
		{"excluded file by name", []string{"old/d.joule"}, false, []string{"old/d.joule"}, nil},
		{"excluded file by name, obeying", []string{"old/d.joule", "old/in/e.joule", "b.joule"}, true, []string{"b.joule"}, nil},
		{"nested configuration decides", []string{"own/old/g.joule"}, true, []string{"own/old/g.joule"}, nil},
		{"missing file costs only itself", []string{"no.joule", "b.joule"}, false, []string{"b.joule"}, []string{"no.joule does not exist"}},
		{"dangling link", []string{"lost.joule"}, false, nil, []string{"lost.joule does not exist"}},
		{"folder without notes", []string{"empty"}, false, nil, []string{"there is no note (*.joule, *.joule.md) in empty"}},
		{"folder all left out", []string{"old"}, false, nil, []string{"all notes in old are left out by .gitignore or inkjoule.toml; name a file to review it all the same"}},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			f := &Finder{Configs: NewConfigs(catalogue(t)), Obey: c.obey}
			files, faults := f.Find(t.Context(), c.paths)
			var got, said []string
			for _, file := range files {
				got = append(got, file.Path)
			}
			for _, err := range faults {
				said = append(said, err.Error())
			}
			if !slices.Equal(got, c.want) || !slices.Equal(said, c.faults) {
				t.Errorf("found %q, said %q", got, said)
			}
		})
	}
}

func TestConfig(t *testing.T) {
	cases := []struct {
		name, text string
		faults     []string // after the path
		level      lang.Severity
		severity   map[string]lang.Severity
	}{
		{"empty", "", nil, lang.Caution, nil},
		{"all", "fail-level = \"error\"\nexclude = [\"old/\"]\n[severity]\nunused-definition = \"off\"\ninput-without-source = \"caution\"\n",
			nil, lang.Error, map[string]lang.Severity{"unused-definition": 0, "input-without-source": lang.Caution}},
		{"unknown key", "fail-levle = \"error\"\n", []string{`:1:1: unknown key "fail-levle"; did you mean fail-level?`}, lang.Caution, nil},
		{"far from any key", "# a\ncolour = 1\n", []string{`:2:1: unknown key "colour"; the keys are fail-level, exclude, severity`}, lang.Caution, nil},
		{"unknown level", "fail-level = \"warning\"\n", []string{`:1:14: "warning" is none of error, caution, advice`}, lang.Caution, nil},
		{"no level", "fail-level = \"off\"\n", []string{`:1:14: "off" is none of error, caution, advice`}, lang.Caution, nil},
		{"unknown severity", "severity.unused-definition = \"mild\"\n", []string{`:1:30: "mild" is none of error, caution, advice, off`}, lang.Caution, nil},
		{"not TOML", "fail-level = \n", []string{`:1:14: `}, lang.Caution, nil},
		{"wrong type", "exclude = 3\n", []string{`:1:11: `}, lang.Caution, nil},
		{"unknown rule", "[severity]\nunused-defintion = \"off\"\nzzz = \"off\"\n",
			[]string{`:2:1: no rule is called "unused-defintion"; did you mean unused-definition?`, ":3:1: no rule is called \"zzz\"; `inkjoule rules` lists the names"}, lang.Caution, nil},
		{"firm rule", "[severity]\n  dimension-mismatch = \"advice\"\n", []string{`:2:3: dimension-mismatch is an error of syntax, dimension or arithmetic, and stays one`}, lang.Caution, nil},
		{"dotted key", "severity.syntax = \"off\"\n", []string{`:1:10: syntax is`}, lang.Caution, nil},
		{"what is right still holds", "fail-level = \"error\"\nx = 1\n", []string{`:2:1: unknown key "x"`}, lang.Error, nil},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			path := filepath.Join(t.TempDir(), ConfigName)
			write(t, path, c.text)
			got, err := LoadConfig(path, catalogue(t))
			lines := strings.Split(strings.TrimSpace(text(err)), "\n")
			if len(c.faults) == 0 && err != nil || len(c.faults) > 0 && len(lines) != len(c.faults) {
				t.Fatalf("the error is %v", err)
			}
			for i, want := range c.faults {
				if !strings.HasPrefix(lines[i], path+want) {
					t.Errorf("%q does not begin with %q", lines[i], want)
				}
			}
			if got.FailLevel != c.level {
				t.Errorf("the fail level is %v", got.FailLevel)
			}
			for name, want := range c.severity {
				if s, set := got.Severity[name]; !set || s != want {
					t.Errorf("%s is %v", name, s)
				}
			}
		})
	}
}

func text(err error) string {
	if err == nil {
		return ""
	}
	return err.Error()
}

func TestConfigIsFoundFromTheNoteUpward(t *testing.T) {
	top := realTemp(t)
	write(t, filepath.Join(top, ConfigName), "")
	write(t, filepath.Join(top, "a/b/"+ConfigName), "")
	write(t, filepath.Join(top, "a/c/x.joule"), "")
	for folder, want := range map[string]string{"": "", "a": "", "a/b": "a/b", "a/b/no/such": "a/b", "a/c": ""} {
		if got := Find(filepath.Join(top, folder)); got != filepath.Join(top, want, ConfigName) {
			t.Errorf("for %q: %q", folder, got)
		}
	}
}

func TestConfigsTellEachFaultOnce(t *testing.T) {
	top := realTemp(t)
	write(t, filepath.Join(top, ConfigName), "x = 1\n")
	c := NewConfigs(catalogue(t))
	for _, folder := range []string{"", "a", "b"} {
		c.For(filepath.Join(top, folder))
	}
	if faults := c.Faults(); len(faults) != 1 {
		t.Errorf("%v", faults)
	}
}

func TestDiskStaysWithinTheWork(t *testing.T) {
	top := realTemp(t)
	write(t, filepath.Join(top, "out.joule"), "outside")
	write(t, filepath.Join(top, "work", ConfigName), "")
	write(t, filepath.Join(top, "work/sub/in.joule"), "inside")
	write(t, filepath.Join(top, "work/other.joule"), "other")
	if err := os.Symlink("../out.joule", filepath.Join(top, "work/link.joule")); err != nil {
		t.Fatal(err)
	}
	disk := DiskFor(filepath.Join(top, "work/sub/note.joule"))
	for path, want := range map[string]string{
		"work/sub/in.joule": "inside", "work/sub/../other.joule": "other", "work/sub/../../out.joule": "", "out.joule": "", "work/link.joule": "", "work/no.joule": "",
	} {
		got, err := disk.Read(t.Context(), filepath.ToSlash(filepath.Join(top, "x"))+"/../"+path)
		if want == "" && err == nil || got != want {
			t.Errorf("%s: %q, %v", path, got, err)
		}
	}
	if _, err := disk.Read(t.Context(), filepath.Join(top, "work/no.joule")); err == nil || errors.Is(err, os.ErrNotExist) && !strings.Contains(err.Error(), "does not exist") {
		t.Errorf("%v", err)
	}
}

func TestBudgetOfAConfiguration(t *testing.T) {
	path := filepath.Join(t.TempDir(), ConfigName)
	cases := []struct {
		text, fault string
		steps       int64
	}{
		{"[budget]\nsteps = 5_000\nseconds = 0.5\nmemory-mib = 16\n", "", 5000},
		{"", "", 0},
		{"[budget]\nsteps = 0\n", ":2:1: steps is a number above zero", 0},
		{"[budget]\nseconds = -1.0\n", ":2:1: seconds is a number above zero", 0},
		{"[budget]\nstep = 3\n", ":2:1: unknown key \"budget.step\"; did you mean budget.steps?", 0},
	}
	for _, c := range cases {
		if err := os.WriteFile(path, []byte(c.text), 0o644); err != nil {
			t.Fatal(err)
		}
		got, err := LoadConfig(path, catalogue(t))
		if c.fault == "" && err != nil || c.fault != "" && (err == nil || !strings.Contains(err.Error(), c.fault)) {
			t.Errorf("%q: %v", c.text, err)
		}
		if got.Budget.Steps != c.steps {
			t.Errorf("%q: %+v", c.text, got.Budget)
		}
	}
	if err := os.WriteFile(path, []byte("[budget]\nseconds = 0.5\nmemory-mib = 16\n"), 0o644); err != nil {
		t.Fatal(err)
	}
	if got, _ := LoadConfig(path, catalogue(t)); got.Budget.Time != 500*time.Millisecond || got.Budget.Memory != 16<<20 {
		t.Errorf("%+v", got.Budget)
	}
}
