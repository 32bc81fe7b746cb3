package lsp

import (
	"context"
	"strings"
	"testing"

	"inkjoule/check"
	"inkjoule/lang"
)

type acted struct {
	Title, Kind string
	IsPreferred bool
	Diagnostics []struct{ Code string }
	Edit        struct {
		Changes         map[string][]changed
		DocumentChanges []struct {
			TextDocument struct {
				URI     string
				Version *int
			}
			Edits []changed
		}
	}
}

type changed struct {
	Range   reach
	NewText string
}

// applied is the text of the note after its edits.
func (d *desk) applied(edits []changed) string {
	d.t.Helper()
	m := newMapper(lang.NewSource(d.text), d.enc)
	text := d.text
	for i := len(edits) - 1; i >= 0; i-- { // the server gives them in the order of the text
		span := m.RangeToSpan(toRange(edits[i].Range))
		text = text[:span.Start] + edits[i].NewText + text[span.End:]
	}
	return text
}

func (d *desk) actions(mark string, only ...string) []acted {
	d.t.Helper()
	p := d.position(mark)
	context := object{"diagnostics": []int{}}
	if only != nil {
		context["only"] = only
	}
	var out []acted
	d.must("textDocument/codeAction", object{"textDocument": object{"uri": d.uri}, "range": object{"start": p, "end": p}, "context": context}, &out)
	return out
}

func TestWriteAskedValue(t *testing.T) {
	d := sit(t, able, capacitor)
	got := d.actions("__| %")
	if len(got) != 1 || got[0].Kind != "quickfix" || got[0].Title != "Write the result 3.390(43) %" {
		t.Fatalf("got %s", show(got))
	}
	doc := got[0].Edit.DocumentChanges[0]
	if doc.TextDocument.Version == nil || *doc.TextDocument.Version != 1 {
		t.Errorf("version %v, want 1", doc.TextDocument.Version)
	}
	if text := d.applied(doc.Edits); text != strings.Replace(capacitor, "__ %", "3.390(43) %", 1) {
		t.Errorf("the note becomes:\n%s", text)
	}
	d.quit()
}

func TestWriteResult(t *testing.T) {
	d := sit(t, able, capacitor)
	got := d.actions("N = om|ega")
	if len(got) != 1 || got[0].Kind != "refactor.rewrite" {
		t.Fatalf("got %s", show(got))
	}
	if text := d.applied(got[0].Edit.DocumentChanges[0].Edits); !strings.Contains(text, "N = omega*2 s = 628.3 rad  ") {
		t.Errorf("the note becomes:\n%s", text)
	}
	if got := d.actions("N = om|ega", "quickfix"); len(got) != 0 {
		t.Errorf("a client that asks for quick fixes gets %s", show(got))
	}
	if got := d.actions("N = om|ega", "refactor"); len(got) != 1 {
		t.Errorf("a client that asks for refactorings gets %s", show(got))
	}
	d.quit()
}

// swapping is an analyser that offers to swap each `a` for `b`.
func swapping(ctx context.Context, in Input) (*lang.Note, []check.Finding, error) {
	note, _, err := letters(ctx, in)
	var found []check.Finding
	for i, r := range in.Text {
		if r == 'a' {
			at := lang.Span{Start: i, End: i + 1}
			fix := &lang.Fix{Title: "Write b", Edits: []lang.Edit{{Span: at, New: "b"}}}
			found = append(found, check.Finding{Path: in.Path, Fault: lang.Fault{Rule: "swap", Severity: lang.Error, Span: at, Message: "an a", Fix: fix}})
		}
	}
	return note, found, err
}

func TestFixes(t *testing.T) {
	for _, caps := range []object{able, {"textDocument": object{"codeAction": object{"codeActionLiteralSupport": object{}}}}} {
		d := &desk{editor: launch(t, Options{Analyser: atOnce(swapping)}), uri: "file:///a.joule", text: "x a y a z"}
		d.start(caps)
		d.open(d.uri, d.text)
		one := d.actions("a y|")
		if len(one) != 0 {
			t.Errorf("actions where there is no finding: %s", show(one))
		}
		one = d.actions("x |a")
		if len(one) != 1 || one[0].Title != "Write b" || len(one[0].Diagnostics) != 1 || one[0].Diagnostics[0].Code != "swap" {
			t.Fatalf("got %s", show(one))
		}
		edits := one[0].Edit.Changes[d.uri]
		if _, rich := caps["workspace"]; rich {
			edits = one[0].Edit.DocumentChanges[0].Edits
		}
		if text := d.applied(edits); text != "x b y a z" {
			t.Errorf("the note becomes %q", text)
		}
		d.quit()
	}
}

// TestFixAll holds that the writing is corrected, and that nothing is touched
// that may have a meaning.
func TestFixAll(t *testing.T) {
	for _, c := range []struct{ note, want string }{
		{"Fix\n\n    a = 12kV\n    b := 3 m\n    c = a*2 = 24 kV\n", "Fix\n\n    a = 12 kV\n    b = 3 m\n    c = a*2 = 24 kV\n"},
		{"Fix\n\n    a = 2 m\n    c = a*2 = 5 m\n", ""},       // a result that differs
		{"Fix\n\n    area = 2 m\n    c = aera*2 = 4 m\n", ""}, // a name that is not known
		{"Fix\n\n    a = 1,5 mm\n    b = 1,000 ohm\n", ""},    // a comma
		{"Fix\n\n    a = 2 m = 2 m\n", ""},
	} {
		d := sit(t, able, c.note)
		got := d.actions("|Fix", "source.fixAll")
		switch {
		case c.want == "" && len(got) > 0:
			t.Errorf("%q: %s", c.note, show(got))
		case c.want != "" && len(got) != 1:
			t.Errorf("%q: %s", c.note, show(got))
		case c.want != "":
			if text := d.applied(got[0].Edit.DocumentChanges[0].Edits); text != c.want {
				t.Errorf("%q becomes %q", c.note, text)
			}
		}
		d.quit()
	}
}

// TestWaive holds that a finding can be answered for, for its name, and that
// the waiver silences it.
func TestWaive(t *testing.T) {
	for _, end := range []string{"\n", "\r\n"} {
		note := strings.ReplaceAll("Waive\n\n    f(x) = x^2 for x from 0 to 3\n    y = f(5)*2 = 50   # beyond\n    z = y*2 = 100\n", "\n", end)
		d := sit(t, able, note)
		got := d.actions("y = f(|5)", "quickfix")
		if len(got) != 1 || got[0].Title != "Waive outside-stated-range for y" || len(got[0].Diagnostics) != 1 {
			t.Fatalf("got %s", show(got))
		}
		text := d.applied(got[0].Edit.DocumentChanges[0].Edits)
		if want := strings.Replace(note, "# beyond"+end, "# beyond"+end+"    waive outside-stated-range for y: \"REASON\""+end, 1); text != want {
			t.Errorf("the note becomes %q, want %q", text, want)
		}
		d.edit(d.uri, 2, text)
		for _, x := range d.diagnosed(d.uri, 2).Diagnostics {
			if x.Code == "outside-stated-range" || x.Code == "unused-waiver" || x.Code == "syntax" {
				t.Errorf("after the waiver: %s", x.Message)
			}
		}
		d.quit()
	}
}

// TestWaiveOnlyWhatCanBe holds that an error of dimension has no waiver.
func TestWaiveOnlyWhatCanBe(t *testing.T) {
	d := sit(t, able, "Waive\n\n    b = 3 m + 2 s = 1 m\n")
	if got := d.actions("3 m| + 2"); len(got) != 0 {
		t.Errorf("got %s", show(got))
	}
	d.quit()
}

// TestExtractProperty holds that a number in a formula of a medium becomes the
// medium's property, with the same value.
func TestExtractProperty(t *testing.T) {
	note := "Extract\n\n    medium oil: linear, isotropic\n        eps_r = 2.2\n    E = 2 kV/mm\n    D in oil = 2.35*eps_0*E\n"
	d := sit(t, able, note)
	got := d.actions("2.3|5*eps_0", "refactor.extract")
	if len(got) != 1 || got[0].Title != "Make 2.35 the property oil.property_1" {
		t.Fatalf("got %s", show(got))
	}
	want := strings.Replace(strings.Replace(note, "eps_r = 2.2\n", "eps_r = 2.2\n        property_1 = 2.35\n", 1), "= 2.35*", "= oil.property_1*", 1)
	if text := d.applied(got[0].Edit.DocumentChanges[0].Edits); text != want {
		t.Errorf("the note becomes\n%s\nwant\n%s", text, want)
	}
	for _, none := range []string{"E |= 2 kV", "*eps|_0*E", "2|.2\n"} {
		if got := d.actions(none, "refactor.extract"); len(got) != 0 {
			t.Errorf("%s: %s", none, show(got))
		}
	}
	d.quit()
}
