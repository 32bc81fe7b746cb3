package lsp

import (
	"os"
	"path/filepath"
	"strings"
	"testing"

	"go.lsp.dev/uri"

	"inkjoule/lang"
)

func (d *desk) rename(mark, name string) (map[string]string, error) {
	d.t.Helper()
	params := d.on(mark)
	params["newName"] = name
	var w struct {
		DocumentChanges []struct {
			TextDocument struct {
				URI     string
				Version *int
			}
			Edits []changed
		}
	}
	if err := d.call("textDocument/rename", params, &w); err != nil {
		return nil, err
	}
	out := map[string]string{}
	for _, doc := range w.DocumentChanges {
		text := d.text
		if doc.TextDocument.URI != d.uri {
			raw, err := os.ReadFile(uri.URI(doc.TextDocument.URI).FsPath())
			if err != nil {
				d.t.Fatal(err)
			}
			text = string(raw)
			if doc.TextDocument.Version != nil {
				d.t.Errorf("%s is not open but has the version %d", doc.TextDocument.URI, *doc.TextDocument.Version)
			}
		} else if doc.TextDocument.Version == nil {
			d.t.Errorf("the open note has no version")
		}
		m := newMapper(lang.NewSource(text), d.enc)
		for i := len(doc.Edits) - 1; i >= 0; i-- {
			span := m.RangeToSpan(toRange(doc.Edits[i].Range))
			text = text[:span.Start] + doc.Edits[i].NewText + text[span.End:]
		}
		out[filepath.Base(uri.URI(doc.TextDocument.URI).FsPath())] = text
	}
	return out, nil
}

// TestRename holds that all spellings of a name become the new one and nothing
// else changes, after text that makes columns differ.
func TestRename(t *testing.T) {
	for _, c := range []struct {
		note, mark, name string
		swap             []string // pairs: old, new
	}{
		{capacitor, "ω = 2", "Ω_1", []string{"ω = 2*pi", "Ω_1 = 2*pi", "omega*2 s", "Ω_1*2 s"}},
		{capacitor, "= ome|ga*2", "w_0", []string{"ω = 2*pi", "w_0 = 2*pi", "omega*2 s", "w_0*2 s"}},
		{capacitor, "N = omega", "count", []string{"N = omega", "count = omega", "for N:", "for count:"}},
		{capacitor, "medium m|ica", "glimmer", []string{"medium mica", "medium glimmer", "in mica", "in glimmer", "mica.", "glimmer."}},
		{capacitor, "Ü_max", "ratio_µ", []string{"Ü_max", "ratio_µ"}},
		{locals, "|k = 2", "kk", []string{"k", "kk"}},
		{locals, "f(|x, y", "u", []string{"f(x, y) = x^2*k + y for x from", "f(u, y) = u^2*k + y for u from"}},
		{locals, "sum(|n", "i", []string{"sum(n*k for n from", "sum(i*k for i from"}},
	} {
		d := sit(t, able, c.note)
		got, err := d.rename(c.mark, c.name)
		if err != nil {
			t.Errorf("%s: %v", c.mark, err)
			continue
		}
		want := strings.NewReplacer(c.swap...).Replace(c.note)
		if c.name == "kk" {
			want = strings.NewReplacer("k =", "kk =", "*k", "*kk", "(k,", "(kk,", "(k*", "(kk*", "to k", "to kk").Replace(c.note)
		}
		if len(got) != 1 || got["a.joule"] != want {
			t.Errorf("%s: the note becomes\n%s\nwant\n%s", c.mark, got["a.joule"], want)
		}
		d.quit()
	}
}

func TestRenameAcrossNotes(t *testing.T) {
	d, _ := workshop(t)
	got, err := d.rename("|C = 2 F", "C_new")
	if err != nil {
		t.Fatal(err)
	}
	for name, part := range map[string]string{
		"parts.joule": "C_new = 2 F\n    D = 2*C_new", "user.joule": "W = 1/2*p.C_new*(3 V)^2", "flat.joule": "Q = C_new*4 V",
	} {
		if !strings.Contains(got[name], part) {
			t.Errorf("%s becomes\n%s", name, got[name])
		}
	}
	if len(got) != 3 {
		t.Errorf("%d notes change, want 3", len(got))
	}
	d.quit()
}

// TestRenameRefused holds that what can't be renamed is refused with a reason,
// never answered with nothing.
func TestRenameRefused(t *testing.T) {
	for _, c := range []struct{ note, mark, name, says string }{
		{capacitor, "Grading| cap", "x", "no name here"},
		{capacitor, "2*p|i", "x", "constant"},
		{capacitor, "118 k|V", "x", "no name here"},
		{capacitor, "ep|s_r = diag", "x", "knows by this name"},
		{capacitor, "ω = 2", "for", "word of the language"},
		{capacitor, "ω = 2", "2x", "no name"},
		{capacitor, "ω = 2", "a b", "no name"},
		{capacitor, "ω = 2", "", "no name"},
		{capacitor, "ω = 2", "a = 2 #", "no name"},
		{capacitor, "ω = 2", "sqrt", "function of the language"},
		{capacitor, "ω = 2", "U", "defined already in line 8"},
		{capacitor, "ω = 2", "eps_0", "defined already"},
		{capacitor, "ω = 2", "ε₀", "defined already"},
		{locals, "|k = 2", "n", "local name"},
		{locals, "|k = 2", "x", "defined already"},
		{locals, "f(|x, y", "y", "bound in this statement"},
		{locals, "f(|x, y", "k", "another meaning"},
	} {
		d := sit(t, able, c.note)
		_, err := d.rename(c.mark, c.name)
		if err == nil || !strings.Contains(err.Error(), c.says) {
			t.Errorf("%s to %q: %v, want %q", c.mark, c.name, err, c.says)
		}
		if strings.Contains(c.says, "no name here") || c.says == "constant" {
			if err := d.call("textDocument/prepareRename", d.on(c.mark), nil); err == nil {
				t.Errorf("%s: preparing is not refused", c.mark)
			}
		}
		d.quit()
	}
}

func TestPrepareRename(t *testing.T) {
	d := sit(t, able, capacitor)
	for _, c := range []struct{ mark, name string }{{"= ome|ga*2", "omega"}, {"N|=", "N"}, {"D in mi|ca", "mica"}} {
		mark := strings.Replace(c.mark, "N|=", "N| = omega", 1)
		var got struct {
			Range       reach
			Placeholder string
		}
		d.must("textDocument/prepareRename", d.on(mark), &got)
		if got.Placeholder != c.name || d.quoted(got.Range) != c.name {
			t.Errorf("%s: %s", c.mark, show(got))
		}
	}
	d.quit()
}
