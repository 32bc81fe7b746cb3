package lang

import (
	"io/fs"
	"os"
	"path/filepath"
	"strings"
	"testing"
)

// corpusTexts are the notes of the corpus, by path.
func corpusTexts(t testing.TB) map[string]string {
	t.Helper()
	out := map[string]string{}
	err := filepath.WalkDir(filepath.Join("..", "corpus"), func(path string, e fs.DirEntry, err error) error {
		if err != nil || e.IsDir() || filepath.Ext(path) != ".joule" {
			return err
		}
		raw, err := os.ReadFile(path)
		out[path] = string(raw)
		return err
	})
	if err != nil || len(out) < 50 {
		t.Fatalf("%d notes of the corpus: %v", len(out), err)
	}
	return out
}

func tidied(text string) string {
	l := &tidying{script: Read(text, nil)}
	l.edits = Tidy(l.script)
	return l.applied()
}

// Whatever a note looks like, tidying changes nothing but blanks, what it says
// stays the same, and a tidy note is left alone.
func checkTidy(t *testing.T, path, text string) {
	t.Helper()
	got := tidied(text)
	bare := strings.NewReplacer(" ", "", "\t", "")
	if bare.Replace(got) != bare.Replace(text) {
		t.Errorf("%s: more than blanks was changed:\n%s", path, got)
	}
	if !sameStatements(Read(text, nil), Read(got, nil)) {
		t.Errorf("%s: it says something else now:\n%s", path, got)
	}
	if again := tidied(got); again != got {
		t.Errorf("%s: not tidy after tidying:\n%s\nbut\n%s", path, got, again)
	}
}

func TestTidyChangesBlanksAloneAndIsIdempotent(t *testing.T) {
	for path, text := range corpusTexts(t) {
		checkTidy(t, path, text)
		checkTidy(t, path+" with CRLF", strings.ReplaceAll(text, "\n", "\r\n"))
		checkTidy(t, path+" with tabs", strings.ReplaceAll(text, "    ", "\t"))
		checkTidy(t, path+" cut", text[:len(text)/2])
		checkTidy(t, path+" deeper", strings.ReplaceAll(text, "\n    ", "\n       "))
	}
}

func FuzzTidy(f *testing.F) {
	for _, text := range corpusTexts(f) {
		f.Add(text)
	}
	f.Fuzz(func(t *testing.T, text string) { checkTidy(t, "fuzz", text) })
}

func TestTidy(t *testing.T) {
	cases := []struct{ name, in, out string }{
		{"indentation", "      C = 1 uF\n      U = 2 V\n", "    C = 1 uF\n    U = 2 V\n"},
		{"a tab", "\tC = 1 uF\n", "    C = 1 uF\n"},
		{"signs of equality below one another", "    C = 1 uF\n    U_max, voltage=2 V\n", "    C              = 1 uF\n    U_max, voltage = 2 V\n"},
		{"a wider column of the author", "    C      = 1 uF\n    U  = 2 V\n", "    C      = 1 uF\n    U      = 2 V\n"},
		{"a long head stands out", "    C = 1 uF\n    E_p in xlpe, peak electric field strength = 1 V/m\n", "    C = 1 uF\n    E_p in xlpe, peak electric field strength = 1 V/m\n"},
		{"a chain", "    W =1/2*C*U^2=  2 J=2e3 mJ\n", "    W = 1/2*C*U^2 = 2 J = 2e3 mJ\n"},
		{"what follows a literal keeps its blanks", "    x = 3 kV / d\n    y = 3 m ^2\n", "    x = 3 kV / d\n    y = 3 m ^2\n"},
		{"properties", "    medium oil: linear\n      eps_r=2.2 per \"a\"\n      sigma = 1 pS/m  per \"b\"\n",
			"    medium oil: linear\n        eps_r = 2.2     per \"a\"\n        sigma = 1 pS/m  per \"b\"\n"},
		{"rows keep their columns", "      table cv: v [V], C [uF]\n              0    10.0\n            100     8.0\n", "    table cv: v [V], C [uF]\n            0    10.0\n          100     8.0\n"},
		{"a continuation moves along", "        x = 1\n           + 2\n", "    x = 1\n       + 2\n"},
		{"ranges and sources", "    a = 1 for T from 1 K to 2 K per \"x\"\n    b = 1.25 per \"y\"\n", "    a = 1  for T from 1 K to 2 K  per \"x\"\n    b = 1.25                      per \"y\"\n"},
		{"prose and remarks", "Prose  with   blanks = 3  \n\n    a = 1  # why  not \n    #  aside\n    b=2\n", "Prose  with   blanks = 3  \n\n    a = 1  # why  not\n    #  aside\n    b = 2\n"},
		{"a faulty statement stays, and keeps its neighbours' depth", "      a = 1\n      b=(2\n      c=3\n", "      a = 1\n      b=(2\n      c = 3\n"},
		{"a byte order mark and CRLF", "\ufeff      a =1\r\n", "\ufeff    a = 1\r\n"},
		{"blanks at the end", "    a = 1  \n    b = 2\t\n", "    a = 1\n    b = 2\n"},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			if got := tidied(c.in); got != c.out {
				t.Errorf("got\n%s\nwant\n%s", got, c.out)
			}
			checkTidy(t, c.name, c.in)
		})
	}
}
