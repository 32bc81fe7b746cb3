package rules

import (
	"os"
	"slices"
	"strings"
	"testing"

	"inkjoule/corpus"
	"inkjoule/lang"
)

// A correction that is offered must be right: once it is made, the finding is
// gone, and nothing is wrong with the statement but the results stated in it.
func TestFixesPutRight(t *testing.T) {
	cases, err := corpus.Read(os.DirFS(corpusFolder), "rules")
	if err != nil {
		t.Fatal(err)
	}
	tried := 0
	for _, c := range cases {
		for _, f := range review(t, c.Text, "") {
			if f.Fix == nil || len(f.Fix.Edits) == 0 {
				continue
			}
			tried++
			text := edited(c.Text, f.Fix.Edits)
			line := strings.Count(c.Text[:f.Span.Start], "\n")
			for _, g := range review(t, text, "") {
				same := strings.Count(text[:g.Span.Start], "\n") == line
				if same && g.Severity > lang.Advice && g.Rule != "stated-result-differs" {
					t.Errorf("%s: %q (%s) leaves %s: %s", c.Path, f.Fix.Title, f.Message, g.Rule, g.Message)
				}
			}
		}
	}
	if tried == 0 {
		t.Error("no case offers a correction: the test shows nothing")
	}
}

// edited makes the edits, which do not overlap.
func edited(text string, edits []lang.Edit) string {
	edits = slices.Clone(edits)
	slices.SortFunc(edits, func(a, b lang.Edit) int { return b.Span.Start - a.Span.Start })
	for _, e := range edits {
		text = text[:e.Span.Start] + e.New + text[e.Span.End:]
	}
	return text
}
