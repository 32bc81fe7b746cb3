package main

import (
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
