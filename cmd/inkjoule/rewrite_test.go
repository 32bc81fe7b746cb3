package main

import (
	"os"
	"path/filepath"
	"regexp"
	"runtime"
	"strings"
	"testing"
)

const asking = "Field\r\n\r\n    E = 12 kV / 3 mm = __ kV/mm\r\n    # by the  way\r\n    F = 2 * 3 = 7\r\n"

func readFile(t *testing.T, path string) string {
	t.Helper()
	raw, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	return string(raw)
}

func TestFillWritesWhatIsAskedAndNothingElse(t *testing.T) {
	dir := folder(t, map[string]string{"a.joule": "\ufeff" + asking, "b.joule": clean})
	note := filepath.Join(dir, "a.joule")
	if err := os.Chmod(note, 0o640); err != nil {
		t.Fatal(err)
	}
	c := inside(t, "", "fill", dir)
	if want := strings.Replace("\ufeff"+asking, "__ kV/mm", "4.000 kV/mm", 1); readFile(t, note) != want || c.status != statusClean {
		t.Errorf("status %d, %q\n%s%s", c.status, readFile(t, note), c.out, c.err)
	}
	if strings.Count(c.out, "filled") != 1 || !strings.Contains(c.out, "a.joule: filled") {
		t.Errorf("told %q", c.out)
	}
	if info, err := os.Stat(note); err != nil || runtime.GOOS != "windows" && info.Mode().Perm() != 0o640 {
		t.Errorf("the mode is %v, %v", info.Mode(), err)
	}
	if c := inside(t, "", "fill", dir); c.status != statusClean || c.out != "" {
		t.Errorf("a second run: status %d, %q", c.status, c.out)
	}
}

func TestFillStaleReplacesWhatDiffers(t *testing.T) {
	c := inside(t, asking, "fill", "--stale", "-")
	if want := strings.NewReplacer("__ kV/mm", "4.000 kV/mm", "= 7", "= 6").Replace(asking); c.out != want || c.status != statusClean {
		t.Errorf("status %d, %q", c.status, c.out)
	}
}

func TestDiffShowsAndWritesNothing(t *testing.T) {
	dir := folder(t, map[string]string{"a.joule": asking})
	c := inside(t, "", "fill", "--diff", dir)
	for _, line := range []string{"@@ -1,5 +1,5 @@", "-    E = 12 kV / 3 mm = __ kV/mm\r", "+    E = 12 kV / 3 mm = 4.000 kV/mm\r"} {
		if !strings.Contains(c.out, line+"\n") {
			t.Errorf("no line %q in\n%s", line, c.out)
		}
	}
	if c.status != statusFound || readFile(t, filepath.Join(dir, "a.joule")) != asking {
		t.Errorf("status %d", c.status)
	}
	if c := inside(t, "", "tidy", "--diff", dir); c.status != statusClean || c.out != "" {
		t.Errorf("a tidy note: status %d, %q", c.status, c.out)
	}
}

func TestFillTellsWhatItCannotFillAndFillsTheRest(t *testing.T) {
	dir := folder(t, map[string]string{"a.joule": "Field\n\n    E = 12 kV / 3 mm = __ kV/mm\n    G = 2*(E = __\n    H = 2*missing = __ kV\n"})
	c := inside(t, "", "fill", dir)
	got := readFile(t, filepath.Join(dir, "a.joule"))
	if c.status != statusTrouble || !strings.Contains(got, "= 4.000 kV/mm") || !strings.Contains(got, "G = 2*(E = __\n") {
		t.Errorf("status %d, %q", c.status, got)
	}
	if !regexp.MustCompile(`a\.joule:5:21: the value of H is not filled in: `).MatchString(c.err) {
		t.Errorf("told %q", c.err)
	}
}

func TestRewritingFollowsALinkAndKeepsIt(t *testing.T) {
	if runtime.GOOS == "windows" {
		t.Skip("links want a privilege there")
	}
	dir := folder(t, map[string]string{"real/a.joule": asking})
	link := filepath.Join(dir, "b.joule")
	if err := os.Symlink(filepath.Join("real", "a.joule"), link); err != nil {
		t.Fatal(err)
	}
	inside(t, "", "fill", link)
	if info, err := os.Lstat(link); err != nil || info.Mode()&os.ModeSymlink == 0 {
		t.Errorf("the link is %v, %v", info.Mode(), err)
	}
	if !strings.Contains(readFile(t, filepath.Join(dir, "real", "a.joule")), "4.000") {
		t.Error("what it leads to was not filled")
	}
}

func TestRewritingLeavesWhatItCannotRead(t *testing.T) {
	dir := folder(t, map[string]string{"a.joule": asking, "bad.joule": "a\x00b"})
	c := inside(t, "", "fill", filepath.Join(dir, "a.joule"), filepath.Join(dir, "none.joule"))
	if c.status != statusTrouble || !strings.Contains(readFile(t, filepath.Join(dir, "a.joule")), "4.000") {
		t.Errorf("status %d", c.status)
	}
	inside(t, "", "tidy", dir)
	if readFile(t, filepath.Join(dir, "bad.joule")) != "a\x00b" {
		t.Error("a binary file was changed")
	}
}

func TestTidyOnStandardInput(t *testing.T) {
	c := inside(t, "Field\n\n      E=12 kV / 3 mm\n", "tidy", "-")
	if c.out != "Field\n\n    E = 12 kV / 3 mm\n" || c.status != statusClean {
		t.Errorf("status %d, %q", c.status, c.out)
	}
}

// The notes of the corpus are filled without a change outside the blanks, and
// afterwards nothing is found in them that was not found before.
func TestFillOfTheCorpus(t *testing.T) {
	blank := regexp.MustCompile(`= __[^=\n]*?(\s+(for|per) |\n|$)`)
	for _, folder := range []string{"demo", "notes"} {
		err := filepath.WalkDir(filepath.Join("..", "..", "corpus", folder), func(path string, e os.DirEntry, err error) error {
			if err != nil || filepath.Ext(path) != ".joule" {
				return err
			}
			text := readFile(t, path)
			c := inside(t, text, "fill", "--as", path, "-")
			if c.status != statusClean {
				t.Errorf("%s: status %d, %s", path, c.status, c.err)
			}
			before, after := blank.Split(text, -1), c.out
			for _, part := range before {
				at := strings.Index(after, part)
				if at < 0 {
					t.Errorf("%s: %q is not kept", path, part)
					break
				}
				after = after[at+len(part):]
			}
			a, b := inside(t, text, "review", "--as", path, "-"), inside(t, c.out, "review", "--as", path, "-")
			if a.status != b.status {
				t.Errorf("%s: reviewed with status %d before and %d after\n%s", path, a.status, b.status, b.out)
			}
			return nil
		})
		if err != nil {
			t.Fatal(err)
		}
	}
}
