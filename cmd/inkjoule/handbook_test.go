package main

import (
	"strings"
	"testing"

	"inkjoule/lang"
	"inkjoule/lang/media"
)

func TestHandbookIsListedAndShown(t *testing.T) {
	list := inside(t, "", "handbook")
	if list.status != 0 || !strings.Contains(list.out, "\n  polyethylene ") {
		t.Fatalf("status %d\n%s", list.status, list.out)
	}
	one := inside(t, "", "handbook", "polyethylene")
	for _, part := range []string{`uses "handbook/polymers"`, "medium polyethylene:", "per \"IEC 60287"} {
		if one.status != 0 || !strings.Contains(one.out, part) {
			t.Errorf("%q is missing (status %d)\n%s", part, one.status, one.out)
		}
	}
	if wrong := inside(t, "", "handbook", "polyethylen"); wrong.status != 2 || !strings.Contains(wrong.err, "did you mean polyethylene?") {
		t.Errorf("status %d, %q", wrong.status, wrong.err)
	}
}

// The bar for the handbook: at least 60 media, every property with a source
// and a condition, no finding above advice.
func TestHandbookIsSourced(t *testing.T) {
	all, err := chapters(t.Context())
	if err != nil {
		t.Fatal(err)
	}
	count := 0
	for _, c := range all {
		count += len(c.media())
		for _, s := range c.note.Symbols {
			if s.Role == lang.RoleProperty && s.Per == "" {
				t.Errorf("%s%s: %s has no source", media.Prefix, c.name, s.Key)
			}
		}
		for _, f := range c.note.Faults {
			if f.Severity > lang.Advice {
				t.Errorf("%s%s: %s: %s", media.Prefix, c.name, f.Rule, f.Message)
			}
		}
	}
	if count < 60 {
		t.Errorf("the handbook has %d media", count)
	}
}
