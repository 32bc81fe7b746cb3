package lsp

import (
	"context"
	"fmt"
	"maps"
	"math/rand/v2"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"

	"go.lsp.dev/protocol"

	"inkjoule/check"
	"inkjoule/lang"
)

// corpusNotes are the notes below a folder of the corpus, by path.
func corpusNotes(t testing.TB, folder string) map[string]string {
	t.Helper()
	out := map[string]string{}
	err := filepath.WalkDir(filepath.Join("..", "corpus", folder), func(path string, e os.DirEntry, err error) error {
		if err != nil || e.IsDir() || filepath.Ext(path) != ".joule" {
			return err
		}
		raw, err := os.ReadFile(path)
		out[filepath.ToSlash(path)] = string(raw)
		return err
	})
	if err != nil || len(out) == 0 {
		t.Fatalf("%d notes in corpus/%s: %v", len(out), folder, err)
	}
	return out
}

// state writes everything that the editor is told about an analysed note.
func state(note *lang.Note, found []check.Finding) string {
	var b strings.Builder
	for _, s := range note.Symbols {
		fmt.Fprintf(&b, "%s %d %v known %v %q %v stated %v %v %v %v %v %q\n",
			s.Key, s.Role, s.Span, s.Known, s.Shown, s.Why, s.Stated, s.Standard, s.Low, s.High, s.Facts, s.Per)
	}
	for _, u := range note.Uses {
		fmt.Fprintf(&b, "use %s %v %v\n", u.Symbol.Key, u.Span, u.Define)
	}
	for _, j := range note.Judged {
		fmt.Fprintf(&b, "%s %s %v %v %v %v\n", j.Word, j.Text, j.Known, j.Holds, j.Margin, j.Worst)
	}
	for _, f := range found {
		fmt.Fprintf(&b, "%s %v %v %q %q %v %q\n", f.Rule, f.Severity, f.Span, f.Message, f.Detail, f.Related, f.Waived)
	}
	return b.String()
}

// scribbler makes random edits as people do.
type scribbler struct {
	*rand.Rand
	pieces  []string
	history []*lang.Source
}

func newScribbler(seed uint64, text string) *scribbler {
	pieces := strings.Fields(text)
	pieces = append(pieces, " ", "\n", "\r\n", "\n\n", "    ", "µ", "Ω²", "😀", "é\u0301", "=", "(", ")", "__", "\"", "#", "\ufeff", "\r")
	for line := range strings.Lines(text) {
		pieces = append(pieces, line)
	}
	return &scribbler{Rand: rand.New(rand.NewPCG(seed, 1)), pieces: pieces}
}

// edit makes one change: an insertion, a deletion, a replacement at several
// cursors, or an undo. What grows too long is cut.
func (r *scribbler) edit(src *lang.Source, enc encoding) *lang.Source {
	if r.IntN(6) == 0 && len(r.history) > 0 {
		src, r.history = r.history[len(r.history)-1], r.history[:len(r.history)-1]
		return src
	}
	r.history = append(r.history, src)
	var edits []edit
	for range 1 + r.IntN(3)/2 {
		start := r.IntN(len(src.Text) + 1)
		end := start
		if r.IntN(3) == 0 {
			end = min(len(src.Text), start+r.IntN(12))
		}
		put := ""
		if r.IntN(3) > 0 {
			put = r.pieces[r.IntN(len(r.pieces))]
		}
		if len(src.Text) > 3000 {
			end, put = min(len(src.Text), start+1000), ""
		}
		m := newMapper(src, enc)
		edits = append(edits, edit{Range: &protocol.Range{Start: m.OffsetToPosition(start), End: m.OffsetToPosition(end)}, Text: put})
	}
	return apply(src, enc, edits)
}

// TestIncrementalEqualsFull holds that after any edits a note that was analysed
// step by step is what a fresh analysis of its text gives.
func TestIncrementalEqualsFull(t *testing.T) {
	const edits = 10_000
	notes := corpusNotes(t, "demo")
	maps.Copy(notes, corpusNotes(t, "rules"))
	opt := realOptions(t)
	each := edits / len(notes)
	seed := uint64(0)
	for _, path := range slices.Sorted(maps.Keys(notes)) {
		text := notes[path]
		seed++
		r := newScribbler(seed, text)
		src := lang.NewSource(text)
		var previous *lang.Note
		for i := range each {
			src = r.edit(src, encodings[i%len(encodings)])
			note, found := analysed(t, opt, src.Text, previous)
			if i%5 == 0 { // each difference lasts until it is seen
				fresh, want := analysed(t, opt, src.Text, nil)
				if a, b := state(note, found), state(fresh, want); a != b {
					t.Fatalf("%s, edit %d: %s\nof %q", path, i, firstDifference(a, b), src.Text)
				}
			}
			previous = note
		}
	}
}

func analysed(t *testing.T, opt Options, text string, previous *lang.Note) (*lang.Note, []check.Finding) {
	t.Helper()
	in := Input{Path: "a.joule", Text: text, Previous: previous}
	note, err := opt.Analyser.Read(context.Background(), in)
	var found []check.Finding
	if err == nil {
		found, err = opt.Analyser.Check(context.Background(), in, note)
	}
	if err != nil {
		t.Fatalf("%v\n%q", err, text)
	}
	return note, found
}

func firstDifference(a, b string) string {
	as, bs := strings.Split(a, "\n"), strings.Split(b, "\n")
	for i := range as {
		if i >= len(bs) || as[i] != bs[i] {
			return fmt.Sprintf("step by step %q, fresh %q", as[i], bs[min(i, len(bs)-1)])
		}
	}
	return fmt.Sprintf("fresh has more: %q", bs[min(len(as), len(bs)-1)])
}
