package lang

import (
	"io/fs"
	"os"
	"strings"
	"testing"
)

// seeds are the notes of the corpus and what has broken readers before.
func seeds(f *testing.F) {
	f.Helper()
	files := os.DirFS("..")
	for _, folder := range []string{"corpus", "lang/media/handbook"} {
		err := fs.WalkDir(files, folder, func(name string, d fs.DirEntry, err error) error {
			if err != nil || d.IsDir() || !strings.Contains(name, ".joule") {
				return err
			}
			b, err := fs.ReadFile(files, name)
			f.Add(string(b))
			return err
		})
		if err != nil {
			f.Fatal(err)
		}
	}
	for _, s := range []string{"", "\x00", "\xff\xfe", "\n    a = (", "\n    a = |b", "\n    x = 1 ± \n", "\r\r    a = 2\r\n", "\ufeff    a = 3 m\n", "    a = " + strings.Repeat("(", 500)} {
		f.Add(s)
	}
}

// FuzzSplit: any text is divided without a panic, and every statement is the
// text that stands at its place.
func FuzzSplit(f *testing.F) {
	seeds(f)
	f.Fuzz(func(t *testing.T, text string) {
		for _, s := range Read(text, nil).Stmts {
			if s.At < 0 || s.At+len(s.Text) > len(text) || text[s.At:s.At+len(s.Text)] != s.Text {
				t.Fatalf("statement %q does not stand at %d", s.Text, s.At)
			}
		}
	})
}

// FuzzParse: what parses without a fault prints to text that parses to the
// same print.
func FuzzParse(f *testing.F) {
	seeds(f)
	f.Fuzz(func(t *testing.T, text string) {
		for _, s := range Read(text, nil).Stmts {
			if len(s.Faults) > 0 {
				continue
			}
			printed := Print(s.Tree)
			again := ParseStatement(printed)
			if len(again.Faults) > 0 {
				t.Fatalf("%q prints as %q, which does not parse: %s", s.Text, printed, again.Faults[0].Message)
			}
			if twice := Print(again.Tree); twice != printed {
				t.Fatalf("%q prints as %q, then as %q", s.Text, printed, twice)
			}
		}
	})
}

// FuzzAnalyze: no text makes the analysis panic or place a finding outside.
func FuzzAnalyze(f *testing.F) {
	seeds(f)
	f.Fuzz(func(t *testing.T, text string) {
		if len(text) > 20_000 {
			t.Skip("long texts only slow the search down")
		}
		n, err := Analyze(t.Context(), text, Options{Path: "x.joule"})
		if err != nil {
			t.Fatal(err)
		}
		for _, x := range n.Faults {
			if x.Span.Start < 0 || x.Span.End < x.Span.Start || x.Span.End > len(text) {
				t.Fatalf("%s stands at %v of %d bytes", x.Rule, x.Span, len(text))
			}
		}
	})
}
