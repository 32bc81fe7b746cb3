package corpus_test

import (
	"reflect"
	"strings"
	"testing"
	"testing/fstest"

	"inkjoule/corpus"
	"inkjoule/lang"
)

func TestReadPairsNotesWithExpectations(t *testing.T) {
	files := fstest.MapFS{
		"d/a.joule":        {Data: []byte("Title\n\n    x = 1\n")},
		"d/a.expect":       {Data: []byte("# why\n\n3 unused-definition advice \"x\"\n")},
		"d/sub/b.joule.md": {Data: []byte("Only prose.\n")},
		"d/readme.txt":     {Data: []byte("not a note")},
	}
	got, err := corpus.Read(files, "d")
	if err != nil {
		t.Fatal(err)
	}
	want := []corpus.Case{
		{Name: "d/a", Path: "d/a.joule", Text: "Title\n\n    x = 1\n", Stated: true,
			Expect: []corpus.Expectation{{Line: 3, Rule: "unused-definition", Severity: "advice", Excerpt: "x"}}},
		{Name: "d/sub/b", Path: "d/sub/b.joule.md", Text: "Only prose.\n"},
	}
	if !reflect.DeepEqual(got, want) {
		t.Errorf("got %+v\nwant %+v", got, want)
	}
}

func TestReadNamesTheFaultyFile(t *testing.T) {
	files := fstest.MapFS{
		"a.joule":  {Data: []byte("x\n")},
		"a.expect": {Data: []byte("3 syntax fatal \"x\"\n")},
	}
	_, err := corpus.Read(files, ".")
	if err == nil || !strings.Contains(err.Error(), "a.expect: line 1") {
		t.Errorf("got %v", err)
	}
}

func TestParseExpectRefuses(t *testing.T) {
	for _, line := range []string{
		"3 syntax error", "x syntax error \"a\"", "0 syntax error \"a\"",
		"3 syntax wrong \"a\"", "3 syntax error a", "3 syntax error \"a",
	} {
		if got, err := corpus.ParseExpect(line); err == nil {
			t.Errorf("%q is read as %v", line, got)
		}
	}
}

func TestExpectationIsWrittenAsItIsRead(t *testing.T) {
	for _, e := range []corpus.Expectation{
		{Line: 4, Rule: "syntax", Severity: "error", Excerpt: "a + b"},
		{Line: 1, Rule: "unknown-note", Severity: "caution", Excerpt: `uses "x"`},
		{Line: 9, Rule: "syntax", Severity: "error", Excerpt: ""},
	} {
		got, err := corpus.ParseExpect(e.String())
		if err != nil || len(got) != 1 || got[0] != e {
			t.Errorf("%s is read as %v, %v", e, got, err)
		}
	}
}

func TestSeenAndCompare(t *testing.T) {
	src := lang.NewSource("A\n\n    x = 1 +\n        2\n")
	faults := []lang.Fault{
		{Rule: "r", Severity: lang.Error, Span: lang.Span{Start: 7, End: 27}},
		{Rule: "r", Severity: lang.Error, Span: lang.Span{Start: 7, End: 27}},
	}
	seen := corpus.Seen(src, faults)
	once := corpus.Expectation{Line: 3, Rule: "r", Severity: "error", Excerpt: "x = 1 + 2"}
	if !reflect.DeepEqual(seen, []corpus.Expectation{once, once}) {
		t.Fatalf("seen %+v", seen)
	}
	other := corpus.Expectation{Line: 1, Rule: "s", Severity: "advice", Excerpt: "A"}
	missing, unexpected := corpus.Compare([]corpus.Expectation{other, once}, seen)
	if !reflect.DeepEqual(missing, []corpus.Expectation{other}) ||
		!reflect.DeepEqual(unexpected, []corpus.Expectation{once}) {
		t.Errorf("missing %v, unexpected %v", missing, unexpected)
	}
}
