package main

import (
	"path/filepath"
	"strings"
	"testing"

	"inkjoule/check"
	"inkjoule/check/rules"
)

func TestRulesAreListedAndExplained(t *testing.T) {
	list := inside(t, "", "rules")
	catalogue, err := check.NewCatalogue(rules.All())
	if err != nil {
		t.Fatal(err)
	}
	for _, r := range catalogue.All() {
		if !strings.Contains(list.out, "  "+r.Name+" ") {
			t.Errorf("%s is not listed", r.Name)
		}
		got := inside(t, "", "rules", r.Name)
		for _, part := range []string{r.Name, r.Severity.String(), r.Title + ".", "\nFires\n", "\nWrite instead\n", "\nWrong\n", "\nRight\n"} {
			if !strings.Contains(got.out, part) || got.status != 0 {
				t.Errorf("%s: %q is missing (status %d)", r.Name, part, got.status)
			}
		}
	}
	if list.status != 0 || !strings.HasPrefix(list.out, "Physics\n") || !strings.Contains(list.out, "input-without-source           off ") {
		t.Errorf("status %d\n%s", list.status, list.out)
	}
}

func TestVersion(t *testing.T) {
	got := inside(t, "", "version")
	if got.status != 0 || !strings.HasPrefix(got.out, "inkjoule ") || !strings.Contains(got.out, "go1.") {
		t.Errorf("status %d, %q", got.status, got.out)
	}
}

func TestHelpIsComplete(t *testing.T) {
	w := standard()
	for _, verb := range verbs(w) {
		if verb.Short == "" || strings.HasSuffix(verb.Short, ".") {
			t.Errorf("the help of %s is %q", verb.Name(), verb.Short)
		}
		got := inside(t, "", verb.Name(), "--help")
		if got.status != 0 || !strings.Contains(got.out, "Usage:") {
			t.Errorf("%s --help: status %d\n%s", verb.Name(), got.status, got.out)
		}
	}
}

func TestManual(t *testing.T) {
	for _, verb := range verbs(standard()) {
		got := inside(t, "", "man", verb.Name())
		if got.status != 0 || !strings.Contains(got.out, "inkjoule-"+verb.Name()+" - ") || !strings.Contains(got.out, ".SH SYNOPSIS") {
			t.Errorf("man %s: status %d\n%s%s", verb.Name(), got.status, got.out, got.err)
		}
	}
	if got := inside(t, "", "man", "reveiw"); got.status != statusTrouble || !strings.Contains(got.err, "did you mean `inkjoule review`?") {
		t.Errorf("status %d, %q", got.status, got.err)
	}
	dir := filepath.Join(t.TempDir(), "man1")
	if got := inside(t, "", "man", "--folder", dir); got.status != 0 {
		t.Errorf("status %d, %q", got.status, got.err)
	}
	pages, err := filepath.Glob(filepath.Join(dir, "inkjoule*.1"))
	if err != nil || len(pages) < len(verbs(standard()))+1 {
		t.Errorf("%d pages, %v", len(pages), err)
	}
}

func TestCompletionKnowsVerbsFormatsAndRules(t *testing.T) {
	for _, c := range []struct {
		args []string
		want string
	}{
		{[]string{"__complete", "re"}, "review\t"},
		{[]string{"__complete", "review", "--format", "s"}, "sarif\n"},
		{[]string{"__complete", "rules", "half-m"}, "half-missing-stored-energy\n"},
		{[]string{"__complete", "tidy", ""}, "joule\n"},
		{[]string{"completion", "bash"}, "complete -o"},
		{[]string{"completion", "zsh"}, "#compdef inkjoule"},
		{[]string{"completion", "fish"}, "complete -c inkjoule"},
		{[]string{"completion", "powershell"}, "Register-ArgumentCompleter"},
	} {
		if got := inside(t, "", c.args...); got.status != 0 || !strings.Contains(got.out, c.want) {
			t.Errorf("%v: status %d, no %q in %.200s", c.args, got.status, c.want, got.out)
		}
	}
}

func TestSheetIsWritten(t *testing.T) {
	dir := folder(t, map[string]string{"a.joule": clean, "b.joule": clean})
	out := filepath.Join(dir, "a.html")
	if got := inside(t, "", "sheet", filepath.Join(dir, "a.joule"), "-o", out); got.status != 0 || got.out != "" {
		t.Errorf("status %d, %q %q", got.status, got.out, got.err)
	}
	if page := readFile(t, out); !strings.HasPrefix(page, "<!DOCTYPE html>") || !strings.Contains(page, "<h") && !strings.Contains(page, "Field") {
		t.Errorf("%.200s", page)
	}
	if got := inside(t, clean, "sheet", "-"); got.status != 0 || !strings.Contains(got.out, "<!DOCTYPE html>") {
		t.Errorf("status %d, %q", got.status, got.err)
	}
	for _, args := range [][]string{{"sheet", dir}, {"sheet", filepath.Join(dir, "lost.joule")}, {"sheet"}} {
		if got := inside(t, "", args...); got.status != statusTrouble {
			t.Errorf("%v: status %d, %q", args, got.status, got.err)
		}
	}
}
