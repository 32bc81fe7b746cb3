package project

import (
	"bytes"
	"os"
	"os/exec"
	"path/filepath"
	"slices"
	"strings"
	"testing"
)

// ignoreCase is a tree with ignore files; git itself says what is left out.
type ignoreCase struct {
	name  string
	files map[string]string // ignore files by path
	paths []string
}

func ignoreCases() []ignoreCase {
	tree := []string{
		"a.joule", "b.joule", "draft.joule", "sub/a.joule", "sub/draft.joule", "sub/deep/a.joule", "sub/deep/x-1.joule",
		"out/a.joule", "out/keep.joule", "out/sub/a.joule", "sub/out/a.joule", "a b.joule", "a[1].joule", "#a.joule", "!a.joule",
		"x-1.joule", "x-12.joule", "x-a.joule", "x-].joule", "x--.joule", `x-\.joule`, "trail .joule", "é.joule", "sub/deep/deep/a.joule",
		"doc/frotz/a.joule", "doc/a/frotz/b.joule", "a/b/c.joule", "a/x/b/c.joule", "a/x/y/b/c.joule", ".hidden.joule", "sub/.hidden/a.joule",
	}
	one := func(name, text string) ignoreCase {
		return ignoreCase{name, map[string]string{".gitignore": text}, tree}
	}
	return []ignoreCase{
		one("empty", ""),
		one("name", "draft.joule\n"),
		one("remark and escaped", "# draft.joule\n\\#a.joule\n\\!a.joule\n"),
		one("star", "*.joule\n"),
		one("negation", "*.joule\n!a.joule\n"),
		one("negation inside a folder left out", "out/\n!out/keep.joule\n"),
		one("negation inside a folder's content", "out/*\n!out/keep.joule\n"),
		one("anchored", "/a.joule\n"),
		one("middle slash anchors", "sub/a.joule\nout/sub\n"),
		one("folder only", "a.joule/\nout/\n"),
		one("question mark", "x-?.joule\n"),
		one("class", "x-[0-9].joule\n"),
		one("negated class", "x-[!0-9].joule\n"),
		one("caret class", "x-[^0-9].joule\n"),
		one("bracket first", "x-[]-].joule\n"),
		one("named class", "x-[[:digit:]][[:digit:]].joule\n"),
		one("escape in class", "x-[\\\\].joule\n"),
		one("literal bracket", "a\\[1\\].joule\n"),
		one("unclosed bracket", "a[1.joule\n"),
		one("trailing backslash", "a\\\n"),
		one("trailing blank", "draft.joule   \n"),
		one("kept trailing blank", "trail\\ .joule\n"),
		one("leading stars", "**/draft.joule\n"),
		one("leading stars with folder", "**/deep/a.joule\n"),
		one("trailing stars", "sub/**\n"),
		one("stars between", "a/**/c.joule\n"),
		one("stars between two", "a/**/b/c.joule\n"),
		one("stars in a word", "x**1.joule\n"),
		one("three stars", "a/***/c.joule\n"),
		one("stars alone", "**\n"),
		one("slash alone", "/\n"),
		one("negated everything", "*\n!*/\n!a.joule\n"),
		one("not ASCII", "é.joule\n"),
		one("CRLF", "draft.joule\r\nout/\r\n"),
		one("hidden", ".*\n"),
		one("last one decides", "!draft.joule\ndraft.joule\n!sub/draft.joule\n"),
		{"file below", map[string]string{".gitignore": "a.joule\n", "sub/.gitignore": "!a.joule\n/draft.joule\ndeep/x-*.joule\n"}, tree},
		{"file below, anchored there", map[string]string{"sub/.gitignore": "/a.joule\n*/deep/a.joule\n"}, tree},
		{"repository's own list", map[string]string{".git/info/exclude": "draft.joule\n/out\n", ".gitignore": "!sub/draft.joule\n"}, tree},
	}
}

func TestIgnoreAgreesWithGit(t *testing.T) {
	if _, err := exec.LookPath("git"); err != nil {
		t.Fatal("this test asks git, which is not installed")
	}
	for _, c := range ignoreCases() {
		t.Run(c.name, func(t *testing.T) {
			top := newRepository(t, c)
			want := askGit(t, top, c.paths)
			got := notesBelow(t, top)
			for _, path := range c.paths {
				if skipped := !slices.Contains(got, path); skipped != want[path] {
					t.Errorf("%q: left out %v, git says %v", path, skipped, want[path])
				}
			}
		})
	}
}

func newRepository(t *testing.T, c ignoreCase) string {
	t.Helper()
	top := realTemp(t)
	if out, err := exec.Command("git", "-C", top, "init", "-q").CombinedOutput(); err != nil {
		t.Fatalf("%v: %s", err, out)
	}
	for _, path := range c.paths {
		write(t, filepath.Join(top, path), "")
	}
	for path, text := range c.files {
		write(t, filepath.Join(top, path), text)
	}
	return top
}

func askGit(t *testing.T, top string, paths []string) map[string]bool {
	t.Helper()
	cmd := exec.Command("git", "-C", top, "-c", "core.excludesFile=/dev/null", "check-ignore", "-z", "--stdin", "--no-index")
	cmd.Stdin = strings.NewReader(strings.Join(paths, "\x00") + "\x00")
	var out, fault bytes.Buffer
	cmd.Stdout, cmd.Stderr = &out, &fault
	if err := cmd.Run(); err != nil && cmd.ProcessState.ExitCode() != 1 { // 1: none is ignored
		t.Fatalf("%v: %s", err, &fault)
	}
	ignored := map[string]bool{}
	for _, path := range strings.Split(strings.TrimSuffix(out.String(), "\x00"), "\x00") {
		ignored[path] = true
	}
	return ignored
}

// notesBelow gives what a search finds, relative to the folder.
func notesBelow(t *testing.T, top string) []string {
	t.Helper()
	f := &Finder{Configs: NewConfigs(catalogue(t))}
	files, _ := f.Find(t.Context(), []string{top})
	var out []string
	for _, file := range files {
		rel, err := filepath.Rel(top, file.Abs)
		if err != nil {
			t.Fatal(err)
		}
		out = append(out, filepath.ToSlash(rel))
	}
	return out
}

func realTemp(t *testing.T) string {
	t.Helper()
	dir, err := filepath.EvalSymlinks(t.TempDir())
	if err != nil {
		t.Fatal(err)
	}
	return dir
}

func write(t *testing.T, path, text string) {
	t.Helper()
	if err := os.MkdirAll(filepath.Dir(path), 0o755); err != nil {
		t.Fatal(err)
	}
	if err := os.WriteFile(path, []byte(text), 0o644); err != nil {
		t.Fatal(err)
	}
}
