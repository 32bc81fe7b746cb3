package corpus_test

import (
	"context"
	"math"
	"slices"
	"strconv"
	"testing"

	"inkjoule/corpus"
	"inkjoule/lang"
)

// A corpus that stays clean whatever stands in it would prove nothing. Here
// every stated figure of the clean notes is moved by two units of its last
// digit, one at a time, and the review must notice.
func TestMovedFiguresAreNoticed(t *testing.T) {
	moved := 0
	for _, folder := range folders {
		for _, c := range read(t, folder) {
			if len(c.Expect) > 0 {
				continue
			}
			for _, f := range figures(c) {
				moved++
				if !noticed(t, c, f) {
					t.Errorf("%s: %s moved to %s goes unnoticed", c.Path, f.numeral.Text, f.other())
				}
			}
		}
	}
	if moved < 500 {
		t.Errorf("%d stated figures in the clean notes, want 500", moved)
	}
}

// figure is a stated number at its place in the note.
type figure struct {
	at      lang.Span
	numeral lang.Numeral
}

// other is the number moved by two units of its last digit, and by no less
// than 1e-8 of itself, ten times the slack of the comparison.
func (f figure) other() string {
	step := 2 * math.Pow10(f.numeral.LastDigit)
	step = max(step, 1e-8*math.Abs(f.numeral.Value))
	return strconv.FormatFloat(f.numeral.Value+step, 'e', 14, 64)
}

// noticed reports whether the note with the moved figure gets an error where
// the figure stands.
func noticed(t *testing.T, c corpus.Case, f figure) bool {
	t.Helper()
	text := c.Text[:f.at.Start] + f.other() + c.Text[f.at.End:]
	note, err := lang.Analyze(context.Background(), text, lang.Options{Path: c.Path})
	if err != nil {
		t.Fatal(err)
	}
	return slices.ContainsFunc(note.Faults, func(x lang.Fault) bool {
		return x.Severity == lang.Error && x.Span.Start <= f.at.Start && f.at.Start <= x.Span.End
	})
}

// figures lists the stated results of definitions and of `check a = FIGURE`.
func figures(c corpus.Case) []figure {
	var out []figure
	for _, s := range lang.Read(c.Text, nil).Stmts {
		for _, x := range statedIn(s.Tree) {
			if l, ok := x.(*lang.Literal); ok && l.Spread == nil {
				out = append(out, figure{l.Num.Span.Shift(s.At), l.Num})
			}
		}
	}
	return out
}

func statedIn(t lang.Statement) []lang.Expr {
	switch t := t.(type) {
	case *lang.Definition:
		if len(t.Params) == 0 && len(t.Members) > 1 {
			return t.Members[len(t.Members)-1:]
		}
	case *lang.Check:
		if t.Rel != nil && slices.Equal(t.Rel.Ops, []string{"="}) {
			return t.Rel.Terms[1:]
		}
	}
	return nil
}
