package rules

import (
	"slices"
	"strings"
	"testing"

	"inkjoule/check"
	"inkjoule/lang"
)

// review gives the findings of a note under all rules, with one of them turned
// on if it is off by default.
func review(t *testing.T, text, on string) []check.Finding {
	t.Helper()
	note, err := lang.Analyze(t.Context(), text, lang.Options{Path: "example.joule"})
	if err != nil {
		t.Fatal(err)
	}
	cfg := check.Config{Rules: All()}
	if on != "" {
		cfg.Severity = map[string]lang.Severity{on: lang.Advice}
	}
	found, err := check.Run(t.Context(), note, cfg)
	if err != nil {
		t.Fatal(err)
	}
	return found
}

// told writes findings for a message.
func told(found []check.Finding) string {
	var b strings.Builder
	for _, f := range found {
		b.WriteString("\n  " + f.Severity.String() + ": " + f.Message + " [" + f.Rule + "] " + f.Detail)
	}
	return b.String()
}

// pending names the findings that the analysis does not make yet, with what
// they wait for. The test holds the list to the truth: an entry whose example
// has come to work must go.
var pending = map[string]string{
	"integral-not-converged": "integrals",
}

// The documentation is executed: a rule fires, and alone, on its wrong example,
// and the right one is clean.
func TestExamples(t *testing.T) {
	catalogue, err := check.NewCatalogue(All())
	if err != nil {
		t.Fatal(err)
	}
	for _, r := range catalogue.All() {
		t.Run(r.Name, func(t *testing.T) {
			fault := exampleFault(t, r)
			wait, waits := pending[r.Name]
			switch {
			case fault != "" && !waits:
				t.Error(fault)
			case fault == "" && waits:
				t.Errorf("its examples work now (they waited for %s): take it out of the list", wait)
			}
		})
	}
}

// exampleFault tells what is wrong with the examples of a rule, "" for nothing.
func exampleFault(t *testing.T, r *check.Rule) string {
	on := ""
	if r.Off {
		on = r.Name
	}
	wrong := review(t, r.Wrong.Note, on)
	if len(wrong) == 0 || slices.ContainsFunc(wrong, func(f check.Finding) bool { return f.Rule != r.Name }) {
		return "the wrong example gives" + told(wrong)
	}
	if right := review(t, r.Right.Note, on); len(right) > 0 {
		return "the right example gives" + told(right)
	}
	return ""
}
