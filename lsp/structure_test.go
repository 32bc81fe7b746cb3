package lsp

import (
	"fmt"
	"slices"
	"strings"
	"testing"

	"go.lsp.dev/protocol"

	"inkjoule/lang"
)

func TestSignatureHelp(t *testing.T) {
	type help struct {
		Signatures []struct {
			Label      string
			Parameters []struct{ Label any }
		}
		ActiveParameter int
	}
	for _, c := range []struct {
		line, label string
		active      int
	}{
		{"    a = atan2(|", "atan2(y, x)", 0},
		{"    a = atan2(1, |", "atan2(y, x)", 1},
		{"    a = atan2(sqrt(2), |", "atan2(y, x)", 1},
		{"    a = atan2(1, sqrt(|", "sqrt(x)", 0},
		{"    a = atan2((1 + 2), |", "atan2(y, x)", 1},
		{"    a = max(1, 2, 3, |", "", -1}, // any number of arguments
		{"    f(x, y) = x*y\n    a = f(2, |", "f(x, y)", 1},
		{"    region r: cylinder(|", "cylinder(R, L)", 0},
		{"    a = integral(|", "integral(EXPR for x from A to B)", 0},
		{"    a = (1 + |", "none", 0},
		{"    a = sqrt(2) + |", "none", 0},
		{"Prose sqrt(|", "none", 0},
	} {
		before, _, _ := strings.Cut(c.line, "|")
		d := sit(t, able, "Signatures\n\n"+before)
		p := positionOf(d.text, len(d.text), d.enc)
		var got *help
		d.must("textDocument/signatureHelp", object{"textDocument": object{"uri": d.uri}, "position": at(int(p.Line), int(p.Character)), "context": object{"triggerKind": 1, "isRetrigger": false}}, &got)
		switch {
		case c.label == "none":
			if got != nil {
				t.Errorf("%s: %s", c.line, show(got))
			}
		case got == nil || len(got.Signatures) != 1:
			t.Errorf("%s: %s", c.line, show(got))
		case c.label != "" && got.Signatures[0].Label != c.label, c.active >= 0 && got.ActiveParameter != c.active,
			got.ActiveParameter >= len(got.Signatures[0].Parameters):
			t.Errorf("%s: %s", c.line, show(got))
		}
		d.quit()
	}
}

// TestSignatureOffsets holds that a parameter is named by its place in the
// label where the client can show that.
func TestSignatureOffsets(t *testing.T) {
	v := &view{client: &client{caps: map[string]any{"textDocument": map[string]any{"signatureHelp": map[string]any{
		"signatureInformation": map[string]any{"parameterInformation": map[string]any{"labelOffsetSupport": true}}}}}}}
	sig := signature{"φ_1", []string{"ω", "T_hot"}, ""}
	got := v.signatureHelp(sig, 5).Signatures[0]
	label := []rune(got.Label)
	for i, p := range sig.params {
		offsets, ok := got.Parameters[i].Label.(protocol.ParameterInformationLabelTuple)
		if !ok || string(label[offsets[0]:offsets[1]]) != p {
			t.Errorf("%s: %v", p, got.Parameters[i].Label)
		}
	}
}

func TestFolding(t *testing.T) {
	note := "Title\n=====\n\nText.\n\n    medium oil: linear\n        eps_r = 2\n        mu_r = 1\n\n## Part\n\n    a = 1 +\n      2\n    b = 3\n\n\n## Other\n\nlast line\n"
	d := sit(t, able, note)
	var got []struct{ StartLine, EndLine int }
	d.must("textDocument/foldingRange", object{"textDocument": object{"uri": d.uri}}, &got)
	lines := strings.Split(note, "\n")
	var shown []string
	for _, f := range got {
		shown = append(shown, strings.TrimSpace(lines[f.StartLine])+" … "+strings.TrimSpace(lines[f.EndLine]))
	}
	want := []string{"Title … last line", "medium oil: linear … mu_r = 1", "## Part … b = 3", "a = 1 + … 2", "## Other … last line"}
	if fmt.Sprint(shown) != fmt.Sprint(want) {
		t.Errorf("got %s\nwant %s", show(shown), show(want))
	}
	d.quit()
}

func TestSelectionRange(t *testing.T) {
	d := sit(t, able, capacitor)
	type nested struct {
		Range  reach
		Parent *nested
	}
	var got []*nested
	d.must("textDocument/selectionRange", object{"textDocument": object{"uri": d.uri}, "positions": []object{
		d.position("mica.E|_bd = __"), d.position("Grading cap|acitor"), at(2, 0), at(999, 0),
	}}, &got)
	if len(got) != 4 {
		t.Fatalf("%d nests for 4 positions", len(got))
	}
	var chain []string
	for n := got[0]; n != nil; n = n.Parent {
		text := d.quoted(n.Range)
		if n.Parent != nil {
			outer := d.quoted(n.Parent.Range)
			if len(outer) <= len(text) || !strings.Contains(outer, text) {
				t.Errorf("%q is not inside of %q", text, outer)
			}
		}
		chain = append(chain, text)
	}
	for _, want := range []string{"E_bd", "mica.E_bd", "|E|/mica.E_bd", "Ü_max, utilisation = |E|/mica.E_bd = __ %"} {
		if !slices.Contains(chain, want) {
			t.Errorf("%q is not selected; got %s", want, show(chain))
		}
	}
	if chain[len(chain)-1] != capacitor {
		t.Error("the outermost range is not the whole note")
	}
	d.quit()
}

func TestDocumentLinks(t *testing.T) {
	d, dir := workshop(t)
	user := writeNote(t, dir, "sub/links.joule", "")
	d.uri, d.text = user, "Links\n\n    uses \"../parts.joule\" as p\n    uses \"handbook/gases\"\n    a = 1\n"
	d.open(d.uri, d.text)
	var got []struct {
		Range  reach
		Target string
	}
	d.must("textDocument/documentLink", object{"textDocument": object{"uri": d.uri}}, &got)
	if len(got) != 1 || d.quoted(got[0].Range) != "../parts.joule" || !strings.HasSuffix(got[0].Target, "/parts.joule") || strings.Contains(got[0].Target, "sub") {
		t.Errorf("got %s", show(got))
	}
	d.quit()
}

// decoded turns the numbers of semantic tokens into `text:type` in the order of
// the text.
func (d *desk) decoded(data []uint32) []string {
	d.t.Helper()
	types := legend().TokenTypes
	var out []string
	var line, column uint32
	for i := 0; i+4 < len(data); i += 5 {
		if data[i] > 0 {
			column = 0
		}
		line, column = line+data[i], column+data[i+1]
		r := reach{}
		r.Start.Line, r.Start.Character, r.End.Line, r.End.Character = line, column, line, column+data[i+2]
		out = append(out, d.quoted(r)+":"+types[data[i+3]])
	}
	return out
}

func TestSemanticTokens(t *testing.T) {
	for _, caps := range []object{able, {}} { // in UTF-8 and in UTF-16
		d := sit(t, caps, capacitor)
		var got struct{ Data []uint32 }
		d.must("textDocument/semanticTokens/full", object{"textDocument": object{"uri": d.uri}}, &got)
		all := d.decoded(got.Data)
		for _, want := range []string{
			"medium:keyword", "mica:class", "linear:enumMember", "eps_r:property", "diag:function", "6.9:number", "per:keyword",
			`"supplier sheet M-7, table 2":string`, "kV/mm:type", "U:variable", "peak voltage:enumMember", "Ü_max:variable", "%:type",
			"ω:variable", "omega:variable", `"µ-test 😀":string`, "criterion:keyword", "unused-definition:enumMember", "for:keyword", "in:keyword",
		} {
			if !slices.Contains(all, want) {
				t.Errorf("%s is missing in %s", want, show(all))
			}
		}
		for _, not := range all {
			if strings.HasPrefix(not, "Grading") {
				t.Errorf("prose has the token %s", not)
			}
		}
		line := strings.Count(d.text[:d.offset("ω = 2")], "\n")
		var part struct{ Data []uint32 }
		d.must("textDocument/semanticTokens/range", object{"textDocument": object{"uri": d.uri}, "range": between(line, 0, line, 90)}, &part)
		if few := d.decoded(part.Data); fmt.Sprint(few) != "[ω:variable 2:number pi:variable 50:number Hz:type]" {
			t.Errorf("the line has %v", few)
		}
		d.quit()
	}
}

// TestTokensOfRemarks holds it for remarks, strings with a mark, and names of
// a statement.
func TestTokensOfRemarks(t *testing.T) {
	d := sit(t, able, "Remarks\n\n    a = 1 per \"no # remark\"   # for a remark\n    b = sum(n*a for n from 1 to 3)\n")
	var got struct{ Data []uint32 }
	d.must("textDocument/semanticTokens/full", object{"textDocument": object{"uri": d.uri}}, &got)
	all := d.decoded(got.Data)
	for _, want := range []string{`"no # remark":string`, "# for a remark:comment", "n:parameter", "sum:function", "from:keyword"} {
		if !slices.Contains(all, want) {
			t.Errorf("%s is missing in %s", want, show(all))
		}
	}
	d.quit()
}

func TestCallHierarchy(t *testing.T) {
	d := sit(t, able, capacitor)
	var items []object
	d.must("textDocument/prepareCallHierarchy", d.on("E in mica, |peak"), &items)
	if len(items) != 0 {
		t.Errorf("a kind has %s", show(items))
	}
	d.must("textDocument/prepareCallHierarchy", d.on("1/2 * D·|E"), &items)
	if len(items) != 1 || items[0]["name"] != "E" {
		t.Fatalf("got %s", show(items))
	}
	type call struct {
		From, To   struct{ Name string }
		FromRanges []reach
	}
	names := func(method string) []string {
		var calls []call
		d.must(method, object{"item": items[0]}, &calls)
		var out []string
		for _, c := range calls {
			out = append(out, fmt.Sprintf("%s%s %d", c.From.Name, c.To.Name, len(c.FromRanges)))
			for _, r := range c.FromRanges {
				if text := d.quoted(r); method == "callHierarchy/incomingCalls" && text != "E" {
					t.Errorf("%s: marks %q", c.From.Name, text)
				}
			}
		}
		return out
	}
	if got, want := names("callHierarchy/incomingCalls"), []string{"D 1", "w 1", "Ü_max 1", `criterion |E| <= mica.E_bd/10        per "design rule 4.2" 1`}; fmt.Sprint(got) != fmt.Sprint(want) {
		t.Errorf("incoming %v, want %v", got, want)
	}
	if got, want := names("callHierarchy/outgoingCalls"), []string{"mica 1", "U 1", "d 1"}; fmt.Sprint(got) != fmt.Sprint(want) {
		t.Errorf("outgoing %v, want %v", got, want)
	}
	d.quit()
}

func TestHierarchyAcrossNotes(t *testing.T) {
	d, _ := workshop(t)
	var items []object
	d.must("textDocument/prepareCallHierarchy", d.on("|C = 2 F"), &items)
	var calls []struct{ From struct{ Name string } }
	d.must("callHierarchy/incomingCalls", object{"item": items[0]}, &calls)
	var got []string
	for _, c := range calls {
		got = append(got, c.From.Name)
	}
	slices.Sort(got)
	if fmt.Sprint(got) != "[D Q W]" {
		t.Errorf("got %v", got)
	}
	d.quit()
}

func TestHeadings(t *testing.T) {
	script := lang.Read("One\n===\n\ntext\n---\n\n# A\n### B ###\n\n    # remark\n#no\n```\n# code\n```\n", nil)
	var got []string
	for _, h := range headings(script) {
		got = append(got, fmt.Sprintf("%d %s", h.level, h.text))
	}
	if fmt.Sprint(got) != "[1 One 2 text 1 A 3 B ###]" {
		t.Errorf("got %q", got)
	}
}
