package lsp

import (
	"fmt"
	"os"
	"path/filepath"
	"sort"
	"strings"
	"testing"

	"go.lsp.dev/uri"
)

type located struct {
	URI                  string
	Range                reach
	TargetURI            string
	TargetSelectionRange reach
	TargetRange          reach
}

func TestDefinition(t *testing.T) {
	d := sit(t, able, capacitor)
	for _, c := range []struct{ mark, name, line string }{
		{"1/2 * |D·E", "D", "D in mica"},
		{"1/2 * D|·E", "D", "D in mica"},
		{"1/2 * D·|E", "E", "E in mica"},
		{"mica.|E_bd = __", "E_bd", "E_bd = 118 kV/mm"},
		{"mica.e|ps*E", "eps_r", "eps_r = diag"},
		{"D in mi|ca", "mica", "medium mica"},
		{"N = omeg|a", "ω", "ω = 2"},
		{"w, peak", "w", "w, peak"},
	} {
		var got []located
		d.must("textDocument/definition", d.on(c.mark), &got)
		if len(got) != 1 || got[0].TargetURI != d.uri || d.quoted(got[0].TargetSelectionRange) != c.name || !strings.HasPrefix(d.quoted(got[0].TargetRange), c.line) {
			t.Errorf("%s: %s", c.mark, show(got))
		}
	}
	for _, nothing := range []string{"Grading| cap", "p|i*50", "118| kV"} {
		var got []located
		d.must("textDocument/definition", d.on(nothing), &got)
		if len(got) != 0 {
			t.Errorf("%s: %s", nothing, show(got))
		}
	}
	d.quit()
}

// TestDefinitionWithoutLinks holds that a client without links gets locations.
func TestDefinitionWithoutLinks(t *testing.T) {
	d := sit(t, object{}, capacitor)
	var got []located
	d.must("textDocument/definition", d.on("1/2 * |D·E"), &got)
	if len(got) != 1 || got[0].URI != d.uri || d.quoted(got[0].Range) != "D" {
		t.Errorf("got %s", show(got))
	}
	d.quit()
}

func TestTypeDefinition(t *testing.T) {
	d := sit(t, object{}, capacitor)
	for _, c := range []struct{ mark, want string }{
		{"w, peak", "mica"}, {"mica.|E_bd = __", "mica"}, {"D in m|ica", "mica"}, {"U, peak", ""},
	} {
		var got []located
		d.must("textDocument/typeDefinition", d.on(c.mark), &got)
		found := ""
		for _, l := range got {
			found += d.quoted(l.Range)
		}
		if found != c.want {
			t.Errorf("%s: %q, want %q", c.mark, found, c.want)
		}
	}
	d.quit()
}

func (d *desk) places(method string, params object) []string {
	d.t.Helper()
	var got []struct {
		Range reach
		Kind  int
	}
	d.must(method, params, &got)
	var out []string
	for _, l := range got {
		out = append(out, fmt.Sprintf("%d:%s:%d", l.Range.Start.Line, d.quoted(l.Range), l.Kind))
	}
	sort.Strings(out)
	return out
}

// locals is a note with names that are local to a statement.
const locals = `Locals

    k = 2
    f(x, y) = x^2*k + y for x from 0 to 3
    s = sum(n*k for n from 1 to 3)
    p = f(k, 2) + integral(k*x for x from 0 to k)
    x = 7
    q = sum(sum(a*b for a from 1 to 2) for b from 1 to a)
    a = 1
`

func TestReferencesAndHighlight(t *testing.T) {
	d := sit(t, able, locals)
	for _, c := range []struct {
		mark string
		want []string // line:name:kind of highlight, 3 for the definition
	}{
		{"|k = 2", []string{"2:k:3", "3:k:2", "4:k:2", "5:k:2", "5:k:2", "5:k:2"}},
		{"|x^2", []string{"3:x:2", "3:x:2", "3:x:3"}},
		{"f(x, |y", []string{"3:y:2", "3:y:3"}},
		{"for |n", []string{"4:n:2", "4:n:3"}},
		{"for |x from 0 to k", []string{"5:x:2", "5:x:3"}},
		{"|x = 7", []string{"6:x:3"}},
		{"|b for a", []string{"7:b:2", "7:b:3"}},
		{"to |a)", []string{"7:a:2", "8:a:3"}},
		{"p = |f", []string{"3:f:3", "5:f:2"}},
	} {
		if got := d.places("textDocument/documentHighlight", d.on(c.mark)); fmt.Sprint(got) != fmt.Sprint(c.want) {
			t.Errorf("%s: highlights %v, want %v", c.mark, got, c.want)
		}
		all := d.on(c.mark)
		all["context"] = object{"includeDeclaration": true}
		if got := d.places("textDocument/references", all); len(got) != len(c.want) {
			t.Errorf("%s: references %v, want %d", c.mark, got, len(c.want))
		}
		all["context"] = object{"includeDeclaration": false}
		if got := d.places("textDocument/references", all); len(got) != len(c.want)-1 {
			t.Errorf("%s: references without the definition %v, want %d", c.mark, got, len(c.want)-1)
		}
	}
	d.quit()
}

// workshop is a folder with notes that refer to each other; the second one is
// open in the editor with other text than on the disk.
func workshop(t *testing.T) (*desk, string) {
	t.Helper()
	dir := t.TempDir()
	if err := os.Mkdir(filepath.Join(dir, ".git"), 0o755); err != nil {
		t.Fatal(err)
	}
	writeNote(t, dir, "sub/user.joule", "Disk\n\n    uses \"../parts.joule\" as p\n    W = 1/2*p.C*(3 V)^2 = 9 J\n    e = p.glass.eps_r + p.glass.own\n")
	writeNote(t, dir, "flat.joule", "Flat\n\n    uses \"parts.joule\"\n    Q = C*4 V\n")
	writeNote(t, dir, "stranger.joule", "Stranger\n\n    C = 7 F\n    Q = C*4 V\n")
	parts := writeNote(t, dir, "parts.joule", "stale")
	d := &desk{editor: launch(t, realOptions(t)), uri: parts, enc: utf8Bytes,
		text: "Parts\n\n    C = 2 F\n    D = 2*C\n    medium glass\n        eps_r = 5\n        own = 3\n"}
	d.startIn(able, dir)
	d.open(parts, d.text)
	return d, dir
}

func TestReferencesAcrossNotes(t *testing.T) {
	d, dir := workshop(t)
	for _, c := range []struct {
		mark string
		want map[string]int
	}{
		{"|C = 2 F", map[string]int{"parts.joule": 2, "flat.joule": 1, "sub/user.joule": 1}},
		{"o|wn = 3", map[string]int{"parts.joule": 1, "sub/user.joule": 1}},
		{"medium gl|ass", map[string]int{"parts.joule": 1, "sub/user.joule": 2}},
	} {
		params := d.on(c.mark)
		params["context"] = object{"includeDeclaration": true}
		var all []located
		d.must("textDocument/references", params, &all)
		got := map[string]int{}
		for _, l := range all {
			rel, _ := filepath.Rel(dir, uri.URI(l.URI).FsPath())
			got[filepath.ToSlash(rel)]++
		}
		if fmt.Sprint(got) != fmt.Sprint(c.want) {
			t.Errorf("%s: %v, want %v", c.mark, got, c.want)
		}
	}
	d.quit()
}
