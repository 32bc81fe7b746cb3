package lsp

import (
	"encoding/json"
	"strings"
	"testing"

	"go.lsp.dev/protocol"

	"inkjoule/check"
	"inkjoule/check/rules"
	"inkjoule/lang"
)

// capacitor is the note of most feature tests. Its figures are those of the
// worked example of the language.
const capacitor = `Grading capacitor, stored energy
================================

    medium mica: linear, uniaxial, homogeneous, lossy
        eps_r = diag(6.9, 6.9, 8.7)      per "supplier sheet M-7, table 2"
        E_bd = 118 kV/mm                 per "supplier sheet M-7, table 4"

    U, peak voltage = 12.0(1) kV         per "nameplate"
    d = 3.00 mm ± 0.05 mm                per "drawing 12-441 rev C"
    E in mica, peak electric field strength = (0, 0, 1)*U/d = (0, 0, 4.000) kV/mm
    D in mica = mica.eps*E
    w, peak energy density = 1/2 * D·E = 616.3 J/m^3
    Ü_max, utilisation = |E|/mica.E_bd = __ %
    ω = 2*pi*50 Hz
    N = omega*2 s                        per "µ-test 😀"

    criterion |E| <= mica.E_bd/10        per "design rule 4.2"
    waive unused-definition for N: "kept for the next sheet"
`

// realOptions are the server's options as the program has them.
func realOptions(t testing.TB) Options {
	t.Helper()
	c, err := check.NewCatalogue(rules.All())
	if err != nil {
		t.Fatal(err)
	}
	return Options{Analyser: NewAnalyser(rules.All(), c), Catalogue: c, Version: "test"}
}

// able are the capabilities of an editor that can nearly all.
var able = object{
	"general": object{"positionEncodings": []string{"utf-8", "utf-16"}},
	"textDocument": object{
		"hover":          object{"contentFormat": []string{"markdown", "plaintext"}},
		"completion":     object{"completionItem": object{"documentationFormat": []string{"markdown"}, "snippetSupport": true, "labelDetailsSupport": true}},
		"documentSymbol": object{"hierarchicalDocumentSymbolSupport": true},
		"codeAction":     object{"codeActionLiteralSupport": object{"codeActionKind": object{"valueSet": []string{"quickfix"}}}, "isPreferredSupport": true},
		"definition":     object{"linkSupport": true},
		"rename":         object{"prepareSupport": true},
	},
	"workspace": object{"workspaceEdit": object{"documentChanges": true}},
}

// desk is an editor with one note open.
type desk struct {
	*editor
	uri  string
	text string
	enc  encoding
}

// sit opens a note in an editor with the given capabilities.
func sit(t testing.TB, caps object, text string) *desk {
	t.Helper()
	d := &desk{editor: launch(t, realOptions(t)), uri: "file:///w/a.joule", text: text}
	result := d.start(caps)
	if result["capabilities"].(object)["positionEncoding"] == "utf-8" {
		d.enc = utf8Bytes
	}
	d.open(d.uri, text)
	return d
}

// position finds a text that occurs once; `|` in it marks the place, which is
// its start otherwise.
func (d *desk) position(mark string) object {
	d.t.Helper()
	p := positionOf(d.text, d.offset(mark), d.enc)
	return at(int(p.Line), int(p.Character))
}

func (d *desk) offset(mark string) int {
	d.t.Helper()
	before, after, _ := strings.Cut(mark, "|")
	where := strings.Index(d.text, before+after)
	if where < 0 || strings.Count(d.text, before+after) != 1 {
		d.t.Fatalf("%q occurs %d times", before+after, strings.Count(d.text, before+after))
	}
	if !strings.Contains(mark, "|") {
		return where
	}
	return where + len(before)
}

// on asks about a place.
func (d *desk) on(mark string) object {
	d.t.Helper()
	return object{"textDocument": object{"uri": d.uri}, "position": d.position(mark)}
}

// reach is a range of the protocol.
type reach struct {
	Start, End struct{ Line, Character uint32 }
}

// quoted is the text at a range.
func (d *desk) quoted(r reach) string {
	d.t.Helper()
	m := newMapper(lang.NewSource(d.text), d.enc)
	span := m.RangeToSpan(toRange(r))
	return d.text[span.Start:span.End]
}

// show writes a value as JSON, for messages.
func show(v any) string {
	raw, _ := json.MarshalIndent(v, "", " ")
	return string(raw)
}

func toRange(r reach) protocol.Range {
	return protocol.Range{Start: protocol.Position(r.Start), End: protocol.Position(r.End)}
}
