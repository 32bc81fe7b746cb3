package rules

import (
	"os"
	"path"
	"strings"
	"testing"

	"inkjoule/check"
	"inkjoule/corpus"
	"inkjoule/lang"
)

// A correction that a finding of the corpus offers is applied alone: the finding
// is gone then, nothing of its rule has come instead, and the note still reads.
func TestFixesOfTheCorpus(t *testing.T) {
	cases, err := corpus.Read(os.DirFS(corpusFolder), "rules")
	if err != nil {
		t.Fatal(err)
	}
	byName := map[string]*check.Rule{}
	for _, r := range All() {
		byName[r.Name] = r
	}
	applied := 0
	for _, c := range cases {
		rule := byName[path.Base(path.Dir(c.Path))]
		if rule == nil {
			continue
		}
		before := ownFindings(t, c.Path, c.Text, rule)
		for _, f := range before {
			if f.Fix == nil {
				continue
			}
			applied++
			after := ownFindings(t, c.Path, edited(c.Text, f.Fix.Edits), rule)
			if len(after) != len(before)-1 {
				t.Errorf("%s: after %q of %q there are %d findings, before %d:%s", c.Path, f.Fix.Title, f.Message, len(after), len(before), told(after))
			}
		}
	}
	if applied < 10 {
		t.Errorf("%d corrections were applied: the test shows nothing", applied)
	}
}

// ownFindings are those of the rule, and faults of syntax and dimension.
func ownFindings(t *testing.T, file, text string, rule *check.Rule) []check.Finding {
	t.Helper()
	note, err := lang.Analyze(t.Context(), text, lang.Options{Path: file})
	if err != nil {
		t.Fatal(err)
	}
	found, err := check.Run(t.Context(), note, check.Config{Rules: []*check.Rule{rule}})
	if err != nil {
		t.Fatal(err)
	}
	var own []check.Finding
	for _, f := range found {
		if f.Rule == rule.Name || f.Rule == "syntax" || strings.HasSuffix(f.Rule, "mismatch") || strings.HasPrefix(f.Rule, "unknown-") {
			own = append(own, f)
		}
	}
	return own
}

// edited makes edits that do not overlap, the last first.
func edited(text string, edits []lang.Edit) string {
	for i := len(edits) - 1; i >= 0; i-- {
		e := edits[i]
		text = text[:e.Span.Start] + e.New + text[e.Span.End:]
	}
	return text
}
