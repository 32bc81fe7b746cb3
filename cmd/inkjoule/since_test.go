package main

import (
	"encoding/json"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"
)

// git runs git in a folder, with nothing of the user's configuration.
func git(t *testing.T, dir string, args ...string) {
	t.Helper()
	cmd := exec.CommandContext(t.Context(), "git", append([]string{"-C", dir, "-c", "user.name=N", "-c", "user.email=n@example.org", "-c", "commit.gpgsign=false"}, args...)...)
	cmd.Env = append(os.Environ(), "GIT_CONFIG_GLOBAL=/dev/null", "GIT_CONFIG_SYSTEM=/dev/null")
	if out, err := cmd.CombinedOutput(); err != nil {
		t.Fatalf("git %v: %v\n%s", args, err, out)
	}
}

// committed makes a repository with files, all committed.
func committed(t *testing.T, files map[string]string) string {
	t.Helper()
	dir := folder(t, files)
	git(t, dir, "init", "-q", "-b", "main")
	git(t, dir, "add", "-A")
	git(t, dir, "commit", "-qm", "notes")
	return dir
}

func put(t *testing.T, path, text string) {
	t.Helper()
	if err := os.WriteFile(path, []byte(text), 0o644); err != nil {
		t.Fatal(err)
	}
}

func chain(t *testing.T) string {
	return committed(t, map[string]string{
		"data/cv.csv":     "v [V],C_d [uF]\n0,10\n100,8\n",
		"inputs.joule":    "Inputs\n\n    C = 470 uF\n    U, static voltage = 400 V\n",
		"energy.joule":    "Energy\n\n    uses \"inputs.joule\"\n    W, stored energy = 1/2*C*U^2\n    criterion W < 40 J\n",
		"sub/table.joule": "Table\n\n    table cv from \"../data/cv.csv\"\n    Q, electric charge = integral(cv.C_d for cv.v from 0 V to 100 V)\n",
		"other.joule":     "Other\n\n    a = 2\n    b = 2*a\n",
	})
}

func reviewedPaths(c *call) []string {
	var got struct{ Notes []struct{ Path string } }
	if err := json.Unmarshal([]byte(c.out), &got); err != nil {
		return []string{c.out + c.err}
	}
	var out []string
	for _, n := range got.Notes {
		out = append(out, filepath.Base(n.Path))
	}
	return out
}

func TestChangedReviewsWhatChangedAndWhatRefersToIt(t *testing.T) {
	dir := chain(t)
	changed := func() string {
		return strings.Join(reviewedPaths(inside(t, "", "review", "--changed", "HEAD", "-f", "json", dir)), " ")
	}
	if got := changed(); got != "" {
		t.Errorf("nothing changed, and %q was reviewed", got)
	}
	put(t, filepath.Join(dir, "inputs.joule"), "Inputs\n\n    C = 330 uF\n    U, static voltage = 400 V\n")
	put(t, filepath.Join(dir, "new.joule"), "New\n\n    c = 1\n")
	if got := changed(); got != "energy.joule inputs.joule new.joule" {
		t.Errorf("reviewed %q", got)
	}
	git(t, dir, "add", "-A")
	git(t, dir, "commit", "-qm", "other values")
	put(t, filepath.Join(dir, "data", "cv.csv"), "v [V],C_d [uF]\n0,10\n100,9\n")
	if got := changed(); got != "table.joule" {
		t.Errorf("reviewed %q after the data changed", got)
	}
}

func TestAgainstTellsWhatBecameOfTheResults(t *testing.T) {
	dir := chain(t)
	put(t, filepath.Join(dir, "inputs.joule"), "Inputs\n\n    C = 940 uF\n    U, static voltage = 400 V\n")
	put(t, filepath.Join(dir, "new.joule"), "New\n\n    c = 1\n")
	out := inside(t, "", "review", "--against", "HEAD", dir).out
	for _, want := range []string{
		"inputs.joule:3: since HEAD: C = 940.0 uF, was 470.0 uF (factor 2)",
		"energy.joule:4: since HEAD: W = 75.20 J, was 37.60 J (factor 2)",
		"energy.joule:5: since HEAD: criterion W < 40 J fails (margin -46.8 %), and held before (margin 6.38 %)",
		"new.joule: new since HEAD",
	} {
		if !strings.Contains(out, want) {
			t.Errorf("no %q in\n%s", want, out)
		}
	}
	if strings.Contains(out, "other.joule") && strings.Contains(out, "other.joule:3: since") {
		t.Errorf("a note that did not change is told:\n%s", out)
	}
	var got struct {
		Notes []struct {
			Path    string
			Against *struct {
				Changes []struct {
					Name        string
					Before, Now *string
					Factor      float64
				}
				Flips []struct{ Held, Holds bool }
			}
		}
	}
	raw := inside(t, "", "review", "--against", "HEAD", "-f", "json", filepath.Join(dir, "energy.joule")).out
	if err := json.Unmarshal([]byte(raw), &got); err != nil || len(got.Notes) != 1 || got.Notes[0].Against == nil {
		t.Fatalf("%v\n%s", err, raw)
	}
	a := got.Notes[0].Against
	if len(a.Changes) != 1 || a.Changes[0].Name != "W" || a.Changes[0].Factor != 2 || len(a.Flips) != 1 || !a.Flips[0].Held || a.Flips[0].Holds {
		t.Errorf("%s", raw)
	}
}

func TestAgainstTellsNamesThatCameAndWent(t *testing.T) {
	dir := committed(t, map[string]string{"a.joule": "A\n\n    gone = 2\n    kept = 3\n"})
	put(t, filepath.Join(dir, "a.joule"), "A\n\n    kept = 3\n    came = 4\n")
	out := inside(t, "", "review", "--against", "HEAD", dir).out
	for _, want := range []string{"a.joule:4: since HEAD: came = 4.000 is new", "a.joule: since HEAD: gone = 2.000 is gone"} {
		if !strings.Contains(out, want) {
			t.Errorf("no %q in\n%s", want, out)
		}
	}
	if strings.Contains(out, "kept") {
		t.Errorf("what did not change is told:\n%s", out)
	}
}

func TestRevisionsThatCannotBeRead(t *testing.T) {
	dir := committed(t, map[string]string{"a.joule": clean})
	outside := folder(t, map[string]string{"a.joule": clean})
	for _, c := range []struct{ dir, rev, want string }{
		{dir, "nowhere", `no revision "nowhere"`},
		{dir, "--output=x", `no revision "--output=x"`},
		{outside, "HEAD", "lies in no Git repository"},
	} {
		for _, flag := range []string{"--changed=", "--against="} {
			got := inside(t, "", "review", flag+c.rev, c.dir)
			if got.status != statusTrouble || !strings.Contains(got.err, c.want) {
				t.Errorf("%s%s: status %d, %q", flag, c.rev, got.status, got.err)
			}
		}
	}
}
