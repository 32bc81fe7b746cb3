package report

import (
	"bytes"
	"errors"
	"strings"
	"testing"

	"inkjoule/check"
	"inkjoule/lang"
)

func TestGoldenOutputs(t *testing.T) {
	for _, format := range Formats() {
		if format == "sarif" {
			continue // holds the whole catalogue; it is read and validated instead
		}
		t.Run(format, func(t *testing.T) {
			golden(t, "cell."+format, written(t, format, sample(), empty()))
		})
	}
}

func TestColourMarksTheSeverityOnly(t *testing.T) {
	var plain, painted bytes.Buffer
	for color, b := range map[bool]*bytes.Buffer{false: &plain, true: &painted} {
		w, err := New("text", b, Options{Color: color})
		if err != nil {
			t.Fatal(err)
		}
		if err := errors.Join(w.Note(sample()), w.Close()); err != nil {
			t.Fatal(err)
		}
	}
	stripped := painted.String()
	for _, code := range []string{plainText, bold, faint, red, yellow, blue} {
		stripped = strings.ReplaceAll(stripped, code, "")
	}
	if stripped != plain.String() || painted.String() == plain.String() {
		t.Errorf("coloured text is not plain text with colours:\n%q", painted.String())
	}
}

func TestUnknownFormatNamesTheOthers(t *testing.T) {
	_, err := New("xml", &bytes.Buffer{}, Options{})
	if err == nil || !strings.Contains(err.Error(), "text, json") {
		t.Errorf("%v", err)
	}
}

// full is a stream that takes so many bytes and then no more.
type full struct{ left int }

var errFull = errors.New("no space left")

func (f *full) Write(p []byte) (int, error) {
	if f.left -= len(p); f.left < 0 {
		return 0, errFull
	}
	return len(p), nil
}

func TestWritersTellThatAStreamFails(t *testing.T) {
	catalogue, err := check.NewCatalogue(nil)
	if err != nil {
		t.Fatal(err)
	}
	for _, format := range Formats() {
		size := len(written(t, format, sample(), empty()))
		for _, left := range []int{0, size / 3, size / 2, size - 1} {
			w, err := New(format, &full{left}, Options{Version: "v1.2.3", Catalogue: catalogue})
			if err != nil {
				t.Fatal(err)
			}
			err = errors.Join(w.Note(sample()), w.Note(empty()), w.Problem("notes/lost.joule does not exist"), w.Close())
			if !errors.Is(err, errFull) {
				t.Errorf("%s after %d of %d bytes: %v", format, left, size, err)
			}
		}
	}
}

func TestExcerpt(t *testing.T) {
	long := strings.Repeat("a", 400)
	cases := []struct{ name, text, mark, code, marks string }{
		{"plain", "    E = U/d\n", "U/d", "E = U/d", "    ^^^"},
		{"indentation is dropped", "\t\tE = U/d", "E", "E = U/d", "^"},
		{"tab inside", "E =\tU/d", "U/d", "E = U/d", "    ^^^"},
		{"empty mark", "E = U/d", "", "E = U/d", "^"},
		{"mark at the end", "E = ", "\x00end", "E =", "    ^"},
		{"several lines", "E = (1,\n 2, 3)", "(1,\n 2, 3)", "E = (1,", "    ^^^"},
		{"CRLF", "E = U/d\r\nx", "U/d", "E = U/d", "    ^^^"},
		{"byte order mark", "\ufeffE = U/d", "U/d", "E = U/d", "    ^^^"},
		{"Greek", "ε = U/µ", "U/µ", "ε = U/µ", "    ^^^"},
		{"wide characters", "電場 = U/d", "U/d", "電場 = U/d", "       ^^^"},
		{"combining mark", "e\u0301 = U", "U", "e\u0301 = U", "    ^"},
		{"escape sequence", "E\x1b[2J = U", "U", "E\ufffd[2J = U", "        ^"},
		{"turned text", "E\u202e = U", "U", "E\ufffd = U", "     ^"},
		{"bytes that are no text", "E\xff = U", "U", "E\ufffd = U", "     ^"},
		{"long line, mark at its start", "b" + long, "b", "b" + long[:159] + "…", "^"},
		{"long line, mark in its middle", long + "b" + long, "b", "…" + long[:39] + "b" + long[:119] + "…", strings.Repeat(" ", 40) + "^"},
		{"long mark", long, long, long[:160] + "…", strings.Repeat("^", 160)},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			at := lang.Span{Start: strings.Index(c.text, c.mark)}
			if c.mark == "\x00end" {
				at.Start, c.mark = len(c.text), ""
			}
			at.End = at.Start + len(c.mark)
			code, marks := Excerpt(lang.NewSource(c.text), at)
			if code != c.code || marks != c.marks {
				t.Errorf("\n%s|\n%s| want\n%s|\n%s|", code, marks, c.code, c.marks)
			}
		})
	}
}

func TestExcerptOfAnyPlace(t *testing.T) {
	texts := []string{"", "\n", "\r\n\r", "a\tb\nc\u0301d\xff\xfe\n", "\ufeff"}
	for _, text := range texts {
		for start := -2; start < len(text)+3; start++ {
			for end := -2; end < len(text)+3; end++ {
				_, marks := Excerpt(lang.NewSource(text), lang.Span{Start: start, End: end})
				if !strings.Contains(marks, "^") {
					t.Fatalf("no mark for %d to %d of %q", start, end, text)
				}
			}
		}
	}
}
