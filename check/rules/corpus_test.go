package rules

import (
	"flag"
	"os"
	"path"
	"strings"
	"testing"

	"inkjoule/check"
	"inkjoule/corpus"
	"inkjoule/lang"
)

var update = flag.Bool("update", false, "write the .expect files of corpus/rules anew; read them before you commit")

const corpusFolder = "../../corpus"

// The corpus holds for each rule notes on which it fires and notes on which it
// is silent. Each note is reviewed with its own rule alone, so that a case
// tells about one rule only; what the language finds, advice apart, is
// expected too.
func TestCorpus(t *testing.T) {
	cases, err := corpus.Read(os.DirFS(corpusFolder), "rules")
	if err != nil {
		t.Fatal(err)
	}
	byName := map[string]*check.Rule{}
	for _, r := range All() {
		byName[r.Name] = r
	}
	fired := map[string]bool{}
	for _, c := range cases {
		rule := byName[path.Base(path.Dir(c.Path))]
		if rule == nil {
			t.Errorf("%s: the folder is named after no rule", c.Path)
			continue
		}
		t.Run(strings.TrimPrefix(c.Name, "rules/"), func(t *testing.T) {
			seen := seenBy(t, c, rule)
			if *update {
				writeExpect(t, c, seen)
				return
			}
			missing, unexpected := corpus.Compare(c.Expect, seen)
			for _, e := range missing {
				t.Errorf("missing: %s", e)
			}
			for _, e := range unexpected {
				t.Errorf("unexpected: %s", e)
			}
			for _, e := range c.Expect {
				fired[e.Rule] = true
			}
		})
	}
	for name := range byName {
		if !fired[name] && !*update {
			t.Errorf("no case of the corpus shows that %s fires", name)
		}
	}
}

// seenBy reviews a case with one rule.
func seenBy(t *testing.T, c corpus.Case, rule *check.Rule) []corpus.Expectation {
	t.Helper()
	note, err := lang.Analyze(t.Context(), c.Text, lang.Options{Path: c.Path})
	if err != nil {
		t.Fatal(err)
	}
	found, err := check.Run(t.Context(), note, check.Config{Rules: []*check.Rule{rule}})
	if err != nil {
		t.Fatal(err)
	}
	var faults []lang.Fault
	for _, f := range found {
		if !f.IsWaived() && (f.Rule == rule.Name || f.Severity > lang.Advice) {
			faults = append(faults, f.Fault)
		}
	}
	return corpus.Seen(note.Script.Source, faults)
}

func writeExpect(t *testing.T, c corpus.Case, seen []corpus.Expectation) {
	t.Helper()
	var b strings.Builder
	for _, e := range seen {
		b.WriteString(e.String() + "\n")
	}
	if err := os.WriteFile(path.Join(corpusFolder, c.Name+".expect"), []byte(b.String()), 0o644); err != nil {
		t.Fatal(err)
	}
}
