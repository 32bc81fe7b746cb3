package lang

import (
	"strings"
	"testing"
)

// slipCase is a statement with what is said of it.
type slipCase struct {
	text    string
	at      string // the marked text
	name    string // what the broken statement would have defined; "-" if it is read all the same
	fixed   string // the statement after the fix, "" if there is none
	message string
	detail  string
}

// apply makes the edits of a fix, which are in the order of the text.
func apply(text string, edits []Edit) string {
	for i := len(edits) - 1; i >= 0; i-- {
		text = text[:edits[i].Span.Start] + edits[i].New + text[edits[i].Span.End:]
	}
	return text
}

func TestSlips(t *testing.T) {
	for _, c := range slipCases {
		s := ParseStatement(c.text)
		if len(s.Faults) != 1 {
			t.Errorf("%s: %d faults, want one", c.text, len(s.Faults))
			continue
		}
		f := s.Faults[0]
		severity, name := Error, "-"
		if u, ok := s.Tree.(*Unread); ok {
			name = ""
			if u.Name != nil {
				name = u.Name.Text
			}
		} else {
			severity = Caution
		}
		if f.Rule != "syntax" || f.Severity != severity || name != c.name {
			t.Errorf("%s: %s %s, defines %q, want %q", c.text, f.Rule, f.Severity, name, c.name)
		}
		if got := c.text[f.Span.Start:f.Span.End]; got != c.at || f.Message != c.message || f.Detail != c.detail {
			t.Errorf("%s:\n got %q: %s | %s\nwant %q: %s | %s", c.text, got, f.Message, f.Detail, c.at, c.message, c.detail)
		}
		checkFix(t, c, f.Fix)
	}
}

// checkFix applies the fix, which must leave a statement without a fault.
func checkFix(t *testing.T, c slipCase, fix *Fix) {
	t.Helper()
	fixed := ""
	if fix != nil {
		fixed = apply(c.text, fix.Edits)
	}
	if fixed != c.fixed {
		t.Errorf("%s: the fix gives %q, want %q", c.text, fixed, c.fixed)
	}
	if fixed == "" || strings.HasPrefix(c.text, "#") {
		return
	}
	for _, f := range ParseStatement(fixed).Faults {
		t.Errorf("%s: after the fix: %s", fixed, f.Message)
	}
}

// Messages speak to engineers: no names of Go types or of the grammar.
func TestMessagesShowNoInnerNames(t *testing.T) {
	for _, c := range slipCases {
		for _, inner := range []string{"Ident", "Expr", "Quote", "token", "*lang", "nil", "<", "%!"} {
			if said := c.message + c.detail; strings.Contains(strings.NewReplacer("`<`", "", "`<=`", "", "`<<`", "").Replace(said), inner) {
				t.Errorf("%s: the message shows %q: %s", c.text, inner, said)
			}
		}
	}
}

// An unclosed bracket or bar points to its opener too.
func TestUnclosedPointsToItsOpener(t *testing.T) {
	for _, c := range [][2]string{{"x = (a + b", "("}, {"x = |a + b", "|"}, {"x = f(a, (b + c)", "("}, {"x = t.B[1", "["}} {
		f := ParseStatement(c[0]).Faults[0]
		if len(f.Related) != 1 || c[0][f.Related[0].Span.Start:f.Related[0].Span.End] != c[1] {
			t.Errorf("%s: %+v", c[0], f.Related)
		}
	}
}
