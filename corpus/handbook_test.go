package corpus_test

import (
	"context"
	"strings"
	"testing"

	"inkjoule/lang"
	"inkjoule/lang/media"
)

// Every property of the handbook says where it comes from, for which
// conditions it holds, and whether it is typical or guaranteed.
func TestHandbookStatesSourceRangeAndStanding(t *testing.T) {
	count := 0
	for _, chapter := range media.Chapters() {
		text, ok := media.Handbook(chapter)
		if !ok {
			t.Fatalf("chapter %s cannot be read", chapter)
		}
		for _, s := range lang.Read(text, nil).Stmts {
			m, ok := s.Tree.(*lang.Medium)
			if !ok {
				t.Errorf("%s: a statement that is no medium: %s", chapter, s.Text)
				continue
			}
			count++
			if len(m.Adjectives) == 0 {
				t.Errorf("%s: %s has no adjective", chapter, m.Name.Text)
			}
			for _, p := range m.Properties {
				if why := wanting(p); why != "" {
					t.Errorf("%s: %s.%s %s", chapter, m.Name.Text, p.Name.Text, why)
				}
			}
		}
	}
	if count < 60 {
		t.Errorf("%d media, want 60", count)
	}
}

// wanting says what a property of the handbook lacks.
func wanting(p *lang.Definition) string {
	switch {
	case p.Per == nil:
		return "names no source"
	case !strings.HasSuffix(p.Per.Text, "; typical") && !strings.HasSuffix(p.Per.Text, "; guaranteed"):
		return "does not say whether it is typical or guaranteed"
	case len(p.For) == 0 && p.Name.Text != "mu_r":
		return "has no range" // a permeability of one holds everywhere
	}
	return ""
}

// The chapters are notes like any other: nothing in them is wrong, and every
// property has a value.
func TestHandbookIsEvaluated(t *testing.T) {
	for _, chapter := range media.Chapters() {
		text, _ := media.Handbook(chapter)
		note, err := lang.Analyze(context.Background(), text, lang.Options{Path: chapter})
		if err != nil {
			t.Fatal(err)
		}
		for _, f := range note.Faults {
			if f.Rule != "unused-definition" { // other notes use them
				t.Errorf("%s: %s: %s", chapter, f.Rule, f.Message)
			}
		}
		for _, s := range note.Symbols {
			if s.Role == lang.RoleProperty && len(s.Def.Params) == 0 && !s.Result.Known {
				t.Errorf("%s: %s has no value: %s", chapter, s.Key, s.Why)
			}
		}
	}
}
