package corpus_test

import (
	"cmp"
	"context"
	"fmt"
	"slices"
	"strconv"
	"strings"
	"testing"

	"inkjoule/check"
	"inkjoule/check/rules"
	"inkjoule/lang"
	"inkjoule/lang/eval"
	"inkjoule/lang/unit"
)

// A verdict must not hang on how a note is spelled: the same physics under
// other names, in other units and with the factors in another order has the
// same findings on the same lines.
func TestSpellingDoesNotChangeTheVerdict(t *testing.T) {
	runner, err := check.NewRunner(check.Config{Rules: rules.All(), Severity: off})
	if err != nil {
		t.Fatal(err)
	}
	ways := []struct {
		name    string
		rewrite func(*lang.Note) []lang.Edit
	}{
		{"renamed", renamed},
		{"in other units", inOtherUnits},
		{"commuted", commuted},
	}
	edits := map[string]int{}
	for _, folder := range []string{"demo", "notes", "rules"} {
		for _, c := range read(t, folder) {
			note := analyse(t, c.Path, c.Text)
			want := verdict(t, runner, note)
			for _, way := range ways {
				changes := way.rewrite(note)
				edits[way.name] += len(changes)
				text := applied(c.Text, changes)
				got := verdict(t, runner, analyse(t, c.Path, text))
				if !slices.Equal(got, want) {
					t.Errorf("%s %s:\n%s\nbefore: %s\nafter:  %s", c.Path, way.name, text, strings.Join(want, ", "), strings.Join(got, ", "))
				}
			}
		}
	}
	for _, way := range ways {
		if edits[way.name] < 100 {
			t.Errorf("only %d places were %s: the test shows nothing", edits[way.name], way.name)
		}
	}
}

func analyse(t *testing.T, path, text string) *lang.Note {
	t.Helper()
	note, err := lang.Analyze(context.Background(), text, lang.Options{Path: path})
	if err != nil {
		t.Fatal(err)
	}
	return note
}

// verdict lists what is found, by line; the texts may name the names.
func verdict(t *testing.T, runner check.Runner, note *lang.Note) []string {
	t.Helper()
	found, err := runner.Run(context.Background(), note)
	if err != nil {
		t.Fatal(err)
	}
	var out []string
	for _, f := range found {
		line, _ := note.Script.Source.Position(f.Span.Start)
		out = append(out, fmt.Sprintf("%d %s %s", line, f.Rule, f.Severity))
	}
	slices.Sort(out)
	return out
}

// applied makes the edits, which do not overlap.
func applied(text string, edits []lang.Edit) string {
	slices.SortFunc(edits, func(a, b lang.Edit) int { return cmp.Compare(b.Span.Start, a.Span.Start) })
	for _, e := range edits {
		text = text[:e.Span.Start] + e.New + text[e.Span.End:]
	}
	return text
}

// renamed gives every quantity, function, medium, region and table a name that
// says nothing. Properties and columns keep theirs: they are words of the
// language, or of the one that the table came from.
func renamed(note *lang.Note) []lang.Edit {
	names := map[*lang.Symbol]string{}
	for _, s := range note.Symbols {
		switch s.Role {
		case lang.RoleQuantity, lang.RoleFunction, lang.RoleMedium, lang.RoleRegion, lang.RoleTable:
			names[s] = "zzq_" + strconv.Itoa(len(names))
		}
	}
	var edits []lang.Edit
	for _, u := range note.Uses {
		if name, ok := names[u.Symbol]; ok {
			edits = append(edits, lang.Edit{Span: u.Span, New: name})
		}
	}
	return edits
}

// inOtherUnits takes the first prefix off every unit: 4.70 kV is 4.70e3 V, with
// the same digits.
func inOtherUnits(note *lang.Note) []lang.Edit {
	var edits []lang.Edit
	for _, s := range note.Script.Stmts {
		lang.Walk(s.Tree, func(t lang.Tree) bool {
			l, ok := t.(*lang.Literal)
			if !ok || l.Unit == nil || l.Spread != nil || strings.ContainsAny(l.Num.Text, "eE×") {
				return true
			}
			if bare, power, ok := unprefixed(l.Unit.Text); ok {
				edits = append(edits,
					lang.Edit{Span: lang.Span{Start: s.At + l.Num.Span.End, End: s.At + l.Num.Span.End}, New: fmt.Sprintf("e%d", power)},
					lang.Edit{Span: l.Unit.Span.Shift(s.At), New: bare})
			}
			return true
		})
	}
	return edits
}

// unprefixed takes a prefix off the front of a unit phrase, and tells the power
// of ten that it stood for.
func unprefixed(phrase string) (bare string, power int, ok bool) {
	with, fault := unit.Parse(phrase)
	if fault != nil {
		return "", 0, false
	}
	for power, prefixes := range map[int][]string{9: {"G"}, 6: {"M"}, 3: {"k"}, -3: {"m"}, -6: {"u", "µ", "μ"}, -9: {"n"}, -12: {"p"}} {
		for _, prefix := range prefixes {
			bare, cut := strings.CutPrefix(phrase, prefix)
			if !cut || bare == "" {
				continue
			}
			without, fault := unit.Parse(bare)
			ratio, err := strconv.ParseFloat(fmt.Sprintf("1e%d", power), 64)
			if fault == nil && err == nil && without.Dim == with.Dim && without.Level == nil && close(with.Scale(), without.Scale()*ratio) {
				return bare, power, true
			}
		}
	}
	return "", 0, false
}

func close(a, b float64) bool { return a/b > 1-1e-12 && a/b < 1+1e-12 }

// commuted swaps the factors of every innermost product of two scalars.
func commuted(note *lang.Note) []lang.Edit {
	var edits []lang.Edit
	for _, s := range note.Script.Stmts {
		lang.Walk(s.Tree, func(t lang.Tree) bool {
			b, ok := t.(*lang.Binary)
			if !ok || b.Op != lang.OpMul || !isScalar(note, s, b.X) || !isScalar(note, s, b.Y) || !isPlain(b.X) || !isPlain(b.Y) {
				return true
			}
			x, y := s.Abs(b.X), s.Abs(b.Y)
			text := note.Script.Source.Text
			edits = append(edits,
				lang.Edit{Span: x, New: text[y.Start:y.End]},
				lang.Edit{Span: y, New: text[x.Start:x.End]})
			return false
		})
	}
	return edits
}

func isScalar(note *lang.Note, s *lang.Stmt, x lang.Expr) bool {
	f, ok := note.FactsOf(s, x)
	return ok && f.Known && f.Shape == eval.Scalar
}

// isPlain reports an operand that stands alone in either place.
func isPlain(x lang.Expr) bool {
	switch x.(type) {
	case *lang.Name, *lang.Member, *lang.Literal, *lang.Paren, *lang.Call:
		return true
	}
	return false
}
