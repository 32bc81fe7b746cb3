package lsp

import (
	"fmt"
	"strings"
	"testing"
)

type inlaid struct {
	Position  struct{ Line, Character uint32 }
	Label     string
	TextEdits []struct {
		Range   reach
		NewText string
	}
}

func (d *desk) hints() []inlaid {
	d.t.Helper()
	var out []inlaid
	last := strings.Count(d.text, "\n")
	d.must("textDocument/inlayHint", object{"textDocument": object{"uri": d.uri}, "range": between(0, 0, last, 0)}, &out)
	return out
}

// TestInlayHints holds that a value stands at the end of each definition that
// does not state it, and nothing at inputs and stated results.
func TestInlayHints(t *testing.T) {
	d := sit(t, able, capacitor)
	got := map[string]string{}
	for _, h := range d.hints() {
		line := strings.Split(d.text, "\n")[h.Position.Line]
		if rest := strings.TrimSpace(line[h.Position.Character:]); rest != "" {
			t.Errorf("%s: %q follows the hint", line, rest)
		}
		if len(h.TextEdits) != 1 {
			t.Errorf("%s: %d edits", line, len(h.TextEdits))
			continue
		}
		e := h.TextEdits[0]
		from := int(e.Range.Start.Character)
		got[strings.TrimSpace(line[:from])+e.NewText] = h.Label
	}
	want := map[string]string{
		"D in mica = mica.eps*E = (0, 0, 308.1) µC/m^2":   "= (0, 0, 308.1) µC/m^2",
		"Ü_max, utilisation = |E|/mica.E_bd =3.390(43) %": "3.390(43) %",
		"ω = 2*pi*50 Hz = 314.2 rad/s":                    "= 314.2 rad/s",
		"N = omega*2 s = 628.3 rad":                       "= 628.3 rad",
	}
	if fmt.Sprint(got) != fmt.Sprint(want) {
		t.Errorf("got %s\nwant %s", show(got), show(want))
	}
	d.quit()
}

func TestInlayHintsOfARange(t *testing.T) {
	d := sit(t, able, capacitor)
	line := strings.Count(d.text[:d.offset("ω = 2")], "\n")
	var out []inlaid
	d.must("textDocument/inlayHint", object{"textDocument": object{"uri": d.uri}, "range": between(line, 0, line, 99)}, &out)
	if len(out) != 1 || out[0].Label != "= 314.2 rad/s" {
		t.Errorf("got %s", show(out))
	}
	d.quit()
}
