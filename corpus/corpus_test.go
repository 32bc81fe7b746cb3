package corpus_test

import (
	"context"
	"flag"
	"fmt"
	"os"
	"strings"
	"testing"

	"inkjoule/check"
	"inkjoule/check/rules"
	"inkjoule/corpus"
	"inkjoule/lang"
)

// propose prints what the program sees as the text of an .expect file. It
// writes nothing: an expectation is physics, thought out before it is compared.
var propose = flag.Bool("propose", false, "print the findings of each case that differs, for a person to judge")

// The folders whose cases are reviewed with every rule. corpus/syntax and
// corpus/rules have tests of their own beside the code that they are about.
var folders = []string{"demo", "notes", "values"}

// off are the findings that a configuration must ask for.
var off = map[string]lang.Severity{"input-without-source": 0}

func TestEveryCaseIsReviewedAsExpected(t *testing.T) {
	runner, err := check.NewRunner(check.Config{Rules: rules.All(), Severity: off})
	if err != nil {
		t.Fatal(err)
	}
	for _, folder := range folders {
		for _, c := range read(t, folder) {
			t.Run(c.Name, func(t *testing.T) { review(t, runner, c) })
		}
	}
}

func read(t *testing.T, folder string) []corpus.Case {
	t.Helper()
	cases, err := corpus.Read(os.DirFS("."), folder)
	if err != nil {
		t.Fatal(err)
	}
	if len(cases) == 0 {
		t.Fatalf("no note in %s", folder)
	}
	return cases
}

func review(t *testing.T, runner check.Runner, c corpus.Case) {
	t.Parallel()
	note, err := lang.Analyze(context.Background(), c.Text, lang.Options{Path: c.Path})
	if err != nil {
		t.Fatal(err)
	}
	found, err := runner.Run(context.Background(), note)
	if err != nil {
		t.Fatal(err)
	}
	seen := corpus.Seen(note.Script.Source, open(found))
	missing, unexpected := corpus.Compare(c.Expect, seen)
	for _, e := range missing {
		t.Errorf("%s: missing: %s", c.Path, e)
	}
	for _, e := range unexpected {
		t.Errorf("%s: unexpected: %s%s", c.Path, e, message(found, note.Script.Source, e))
	}
	if *propose && len(missing)+len(unexpected) > 0 {
		fmt.Printf("\n%s.expect, if the physics agrees:\n%s\n", c.Name, lines(seen))
	}
}

// open leaves the findings that count: those that no waiver answers.
func open(found []check.Finding) []lang.Fault {
	var out []lang.Fault
	for _, f := range found {
		if !f.IsWaived() {
			out = append(out, f.Fault)
		}
	}
	return out
}

// message is what the finding says, so that a failure can be judged at once.
func message(found []check.Finding, src *lang.Source, e corpus.Expectation) string {
	for _, f := range found {
		if line, _ := src.Position(f.Span.Start); line == e.Line && f.Rule == e.Rule {
			return "\n\t" + f.Message
		}
	}
	return ""
}

func lines(seen []corpus.Expectation) string {
	var b strings.Builder
	for _, e := range seen {
		fmt.Fprintln(&b, e)
	}
	return b.String()
}

// A demo that teaches nothing would pass the comparison too: each faulty note
// has its right twin beside it, and the two differ in what they find.
func TestDemoNotesComeInPairs(t *testing.T) {
	byName := map[string]corpus.Case{}
	for _, c := range read(t, "demo") {
		byName[c.Name] = c
	}
	pairs := 0
	for name, c := range byName {
		if !c.Stated {
			t.Errorf("%s has no .expect beside it", c.Path)
		}
		right, isFaulty := strings.CutSuffix(name, "-faulty")
		if !isFaulty {
			if len(c.Expect) > 0 {
				t.Errorf("%s is a right note and expects findings", c.Path)
			}
			continue
		}
		pairs++
		if _, ok := byName[right]; !ok || len(c.Expect) < 3 {
			t.Errorf("%s: right twin %v, %d faults seeded", c.Path, ok, len(c.Expect))
		}
	}
	if pairs != 6 {
		t.Errorf("%d pairs of demo notes, want 6", pairs)
	}
}

// The notes that must stay clean are the alarm against false alarms; fewer, or
// shorter ones, would weaken it unseen.
func TestCleanNotesAreManyAndRealistic(t *testing.T) {
	cases := read(t, "notes")
	if len(cases) < 40 {
		t.Errorf("%d clean notes, want 40", len(cases))
	}
	for _, c := range cases {
		if len(c.Expect) > 0 {
			t.Errorf("%s is not clean: it expects findings", c.Path)
		}
	}
}

// Rows of the list of published check values that the notes cover, by the name
// of the row in the source of a statement.
func TestCheckValuesCoverTheList(t *testing.T) {
	rows := map[string]bool{}
	for _, c := range read(t, "values") {
		for _, s := range lang.Read(c.Text, nil).Stmts {
			for _, row := range rowNames(s.Text) {
				rows[row] = true
			}
		}
	}
	if len(rows) < 439 {
		t.Errorf("%d rows covered, want 439", len(rows))
	}
}

// rowNames finds names of rows, `CP-03` or `EX-L12`, in a statement's source.
func rowNames(text string) []string {
	_, source, ok := strings.Cut(text, `per "`)
	if !ok {
		return nil
	}
	var out []string
	for _, word := range strings.FieldsFunc(source, func(r rune) bool { return strings.ContainsRune(" ;,\"", r) }) {
		topic, number, ok := strings.Cut(word, "-")
		if ok && len(topic) == 2 && topic == strings.ToUpper(topic) && strings.ContainsAny(number, "0123456789") {
			out = append(out, word)
		}
	}
	return out
}

// A relation that could not be judged, or a quantity without a value, would
// pass in silence. In these notes all of them are known.
func TestEveryValueAndRelationIsKnown(t *testing.T) {
	for _, folder := range folders {
		for _, c := range read(t, folder) {
			if len(c.Expect) > 0 {
				continue // a faulty note may lack a value
			}
			note, err := lang.Analyze(context.Background(), c.Text, lang.Options{Path: c.Path})
			if err != nil {
				t.Fatal(err)
			}
			for _, name := range unknown(note) {
				t.Errorf("%s: %s has no value", c.Path, name)
			}
		}
	}
}

// unknown lists what a note could not compute.
func unknown(note *lang.Note) []string {
	var out []string
	for _, j := range note.Judged {
		if !j.Known && !quoted(j.Stmt.Tree) {
			out = append(out, j.Word+" "+j.Text)
		}
	}
	for _, s := range note.Symbols {
		if s.Role == lang.RoleQuantity && !s.Result.Known {
			out = append(out, s.Name+" ("+s.Why+")")
		}
	}
	return out
}

// quoted reports an assumption in words, which nothing can judge.
func quoted(t lang.Statement) bool {
	a, ok := t.(*lang.Assume)
	return ok && a.Text != nil
}
