package lsp

import (
	"fmt"
	"slices"
	"strings"
	"testing"

	"inkjoule/lang"
)

type completed struct {
	IsIncomplete bool
	Items        []struct {
		Label, Detail, SortText string
		Documentation           *struct{ Kind, Value string }
		TextEdit                *changed
	}
}

func (c completed) labels() []string {
	var out []string
	for _, it := range c.Items {
		out = append(out, it.Label)
	}
	return out
}

// typed opens the capacitor with a line added, `|` marking the cursor, and asks
// for completion there.
func typed(t *testing.T, line string) (*desk, completed) {
	t.Helper()
	before, after, _ := strings.Cut(line, "|")
	d := sit(t, able, capacitor+before+after+"\n")
	p := positionOf(d.text, len(capacitor)+len(before), d.enc)
	var got completed
	d.must("textDocument/completion", object{"textDocument": object{"uri": d.uri}, "position": at(int(p.Line), int(p.Character))}, &got)
	return d, got
}

func TestCompletion(t *testing.T) {
	for _, c := range []struct {
		line  string
		first string   // the first label, "" for any
		has   []string // labels that must be there
		not   []string // labels that must not
		line2 string   // the line after the first has been accepted, "" to skip
	}{
		{"    a = |", "mica", []string{"U", "E", "Ü_max", "ω", "sqrt", "integral", "eps_0"}, []string{"eps_r", "medium", "kV"}, ""},
		{"    a = 2*om|", "ω", []string{"ω"}, []string{"U"}, "    a = 2*ω"},
		{"    a = Ü|", "Ü_max", nil, []string{"U"}, "    a = Ü_max"},
		{"    a = norm|", "", nil, []string{"normnormal"}, ""},
		{"    a = mica.|", "eps_r", []string{"E_bd", "eps"}, []string{"U", "sqrt", "rho"}, "    a = mica.eps_r"},
		{"    a = mica.E_|", "E_bd", nil, nil, "    a = mica.E_bd"},
		{"    a = E.|", "x", []string{"y", "z"}, []string{"U", "eps_r"}, "    a = E.x"},
		{"    a = 3.|", "", nil, []string{"U", "mica", "x"}, ""},
		{"    a, |", "", []string{"energy density", "peak", "voltage"}, []string{"U", "kV"}, ""},
		{"    a, peak elec|", "electric current", []string{"electric field strength"}, []string{"peak", "U"}, "    a, peak electric current"},
		{"    a in |", "mica", nil, []string{"U"}, "    a in mica"},
		{"    a, voltage = 12 |", "V", []string{"kV", "mV", "W"}, []string{"U", "mica"}, "    a, voltage = 12 V"},
		{"    a, voltage = 12 k|", "kV", nil, []string{"U"}, "    a, voltage = 12 kV"},
		{"    a = 12 V/m|", "", []string{"m"}, []string{"U", "mica"}, ""},
		{"    a = U/|", "", []string{"d", "U"}, []string{"kV"}, ""},
		{"    a = U*2/d = __ |", "", []string{"V/m", "kV/m"}, []string{"U"}, ""},
		{"    waive |", "", []string{"unused-definition"}, []string{"unknown-name", "U"}, ""},
		{"    waive unused-d|", "unused-definition", nil, nil, "    waive unused-definition"},
		{"    waive unused-definition for |", "", []string{"U", "mica"}, []string{"unused-definition"}, ""},
		{"    medium oil: |", "linear", []string{"isotropic"}, []string{"U"}, ""},
		{"    medium oil: linear, |", "nonlinear", []string{"isotropic"}, []string{"linear"}, ""},
		{"    region r in mica: cyl|", "cylinder", nil, nil, "    region r in mica: cylinder"},
		{"    regime: |", "static", []string{"harmonic", "transient"}, []string{"U"}, ""},
		{"    |", "", []string{"medium", "criterion", "waive"}, []string{"U", "sqrt"}, ""},
		{"    crit|", "criterion", nil, nil, "    criterion"},
		{"    criterion |", "", []string{"U", "E"}, nil, ""},
		{"    uses \"hand|", "", []string{"handbook/gases"}, []string{"U"}, ""},
		{"    a = 2 V per \"|", "", nil, []string{"U", "V"}, ""},
		{"    a = 2 # |", "", nil, []string{"U", "V"}, ""},
		{"Prose |", "", nil, []string{"U", "medium"}, ""},
		{"    f(x, y) = 2*x + |", "", []string{"x", "y", "U"}, []string{"kV"}, ""},
		{"    medium oil: linear\n        eps_r = 2\n        m|", "mu_r", []string{"mu"}, []string{"eps_r", "medium"}, "        mu_r = "},
	} {
		d, got := typed(t, c.line)
		labels := got.labels()
		if c.first != "" && (len(labels) == 0 || labels[0] != c.first) {
			t.Errorf("%q: first is %v, want %s", c.line, labels[:min(5, len(labels))], c.first)
		}
		for _, l := range c.has {
			if !slices.Contains(labels, l) {
				t.Errorf("%q: %s is not among %d labels", c.line, l, len(labels))
			}
		}
		for _, l := range c.not {
			if slices.Contains(labels, l) {
				t.Errorf("%q: %s is offered", c.line, l)
			}
		}
		for _, it := range got.Items {
			if it.TextEdit == nil {
				t.Errorf("%q: %s has no text edit", c.line, it.Label)
			}
		}
		if c.line2 != "" && len(got.Items) > 0 {
			if last := lastLineOf(d.applied([]changed{*got.Items[0].TextEdit})); last != c.line2 {
				t.Errorf("%q becomes %q, want %q", c.line, last, c.line2)
			}
		}
		d.quit()
	}
}

func lastLineOf(text string) string {
	lines := strings.Split(strings.TrimSuffix(text, "\n"), "\n")
	return lines[len(lines)-1]
}

// TestCompletionTellsValues holds that a name comes with its value and a
// function with its meaning.
func TestCompletionTellsValues(t *testing.T) {
	_, got := typed(t, "    a = |")
	for _, it := range got.Items {
		switch it.Label {
		case "w":
			if it.Detail != "616(16) J/m^3" {
				t.Errorf("w: %q", it.Detail)
			}
		case "sqrt":
			if it.Documentation == nil || it.Documentation.Kind != "markdown" || it.Documentation.Value == "" {
				t.Errorf("sqrt: %s", show(it))
			}
		}
	}
	if !slices.IsSortedFunc(got.Items, func(a, b struct {
		Label, Detail, SortText string
		Documentation           *struct{ Kind, Value string }
		TextEdit                *changed
	}) int {
		return strings.Compare(a.SortText, b.SortText)
	}) {
		t.Error("the order of the list is not that of the sort texts")
	}
}

// TestCompletionIsBounded holds that a long list is cut and said to be so.
func TestCompletionIsBounded(t *testing.T) {
	var b strings.Builder
	b.WriteString("Many\n\n")
	for i := range 2 * maxItems {
		fmt.Fprintf(&b, "    a%d = %d\n", i, i)
	}
	b.WriteString("    x = ")
	d := sit(t, able, b.String())
	p := positionOf(d.text, len(d.text), d.enc)
	var got completed
	d.must("textDocument/completion", object{"textDocument": object{"uri": d.uri}, "position": at(int(p.Line), int(p.Character))}, &got)
	if len(got.Items) != maxItems || !got.IsIncomplete {
		t.Errorf("%d items, incomplete %v", len(got.Items), got.IsIncomplete)
	}
	d.quit()
}

// TestFormsAreDescribed holds that every function of the language has its help.
func TestFormsAreDescribed(t *testing.T) {
	for _, name := range lang.FunctionNames() {
		if s, ok := signatureOf(name); !ok || s.doc == "" || len(s.params) == 0 {
			t.Errorf("%s is not described", name)
		}
	}
}

// TestShapesAreRead holds that every shape that is offered is one of the
// language.
func TestShapesAreRead(t *testing.T) {
	for _, s := range shapes() {
		var args []string
		for range s.params {
			args = append(args, fmt.Sprintf("%d m", len(args)+1))
		}
		note := "Shape\n\n    region g: " + s.name + "(" + strings.Join(args, ", ") + ")\n    m = g.volume + g.area + g.length\n"
		d := sit(t, able, note)
		for _, x := range d.diagnosed(d.uri, 1).Diagnostics {
			if x.Code == "unknown-function" || x.Code == "syntax" {
				t.Errorf("%s: %s", s.label(), x.Message)
			}
		}
		d.quit()
	}
}
