package lsp

import (
	"strings"
	"testing"

	"inkjoule/lang"
	"inkjoule/lang/unit"
)

type hovered struct {
	Contents struct{ Kind, Value string }
	Range    reach
}

func TestHover(t *testing.T) {
	d := sit(t, able, capacitor)
	for _, c := range []struct {
		mark   string   // where
		range_ string   // the text that is described
		says   []string // parts of the description
	}{
		{"w, peak", "w", []string{"w = 616(16) J/m^3", "*standard uncertainty*: 16 J/m^3", "*worst case*", "*kind*: energy density", "*qualifier*: peak", "*media*: mica"}},
		{"1/2 * |D·E", "D", []string{"D = ", "electric flux density"}},
		{"U, peak", "U", []string{"12.00(10) kV", "*source*: nameplate", "voltage"}},
		{"mica.|eps*E", "mica.eps", []string{"mica.eps\n", "permittivity", "follows from*: mica.eps\\_r = diag(6.900", "supplier sheet"}},
		{"D in |mica", "mica", []string{"medium mica", "*stated*: linear, uniaxial, homogeneous, lossy", "eps\\_r", "E\\_bd"}},
		{"2*p|i", "pi", []string{"constant"}},
		{"N = om|ega", "omega", []string{"ω = 314.2 rad/s"}},
		{"118 k|V/mm", "kV", []string{"kilovolt", "1000 V"}},
		{"118 kV/|mm", "mm", []string{"millimetre", "0.001 m"}},
		{"616.3 J/m^3|", "J/m^3", nil},
		{"peak energy| density", "peak energy density", []string{"*qualifier*: peak", "*unit*: J/m"}},
		{"waive unused|-definition", "unused-definition", []string{"advice"}},
		{"crit|erion", "criterion", []string{"holds", "design rule 4"}},
	} {
		var h *hovered
		d.must("textDocument/hover", d.on(c.mark), &h)
		if h == nil {
			t.Errorf("%s: nothing", c.mark)
			continue
		}
		if h.Contents.Kind != "markdown" {
			t.Errorf("%s: kind %q", c.mark, h.Contents.Kind)
		}
		if got := d.quoted(h.Range); c.says != nil && got != c.range_ {
			t.Errorf("%s: describes %q, want %q", c.mark, got, c.range_)
		}
		for _, part := range c.says {
			if !strings.Contains(h.Contents.Value, part) {
				t.Errorf("%s: does not say %q:\n%s", c.mark, part, h.Contents.Value)
			}
		}
	}
	var h *hovered
	d.must("textDocument/hover", d.on("Grading| capacitor"), &h)
	if h != nil {
		t.Errorf("prose: %s", show(h))
	}
	d.quit()
}

// TestHoverPlain holds that a client without Markdown gets plain text.
func TestHoverPlain(t *testing.T) {
	for _, caps := range []object{{}, {"textDocument": object{"hover": object{"contentFormat": []string{"plaintext", "markdown"}}}}} {
		d := sit(t, caps, capacitor)
		var h *hovered
		d.must("textDocument/hover", d.on("U, peak"), &h)
		if h == nil || h.Contents.Kind != "plaintext" || !strings.Contains(h.Contents.Value, "U = 12.00(10) kV\n") || strings.ContainsAny(h.Contents.Value, "*`\\") {
			t.Errorf("got %s", show(h))
		}
		d.quit()
	}
}

func TestEscape(t *testing.T) {
	if got, want := escape("a<b> & *c* _d_ `e`"), "a&lt;b\\> &amp; \\*c\\* \\_d\\_ \\`e\\`"; got != want {
		t.Errorf("got %s, want %s", got, want)
	}
	if got := fence("a ``` b"); !strings.HasPrefix(got, "````joule\n") {
		t.Errorf("fence %q", got)
	}
}

// TestDescribeUncertainty holds that uncertainty is shown in the unit of the
// value.
func TestDescribeUncertainty(t *testing.T) {
	kV, fault := unit.Parse("kV")
	if fault != nil {
		t.Fatal(fault)
	}
	sym := &lang.Symbol{Name: "U", Role: lang.RoleQuantity, Result: lang.Result{Known: true, Shown: "12.0 kV", Unit: kV, Standard: 100, Low: 11800, High: 12200}}
	got := describe(&lang.Note{}, sym).plain()
	for _, part := range []string{"U = 12.0 kV\n", "standard uncertainty: 0.1 kV\n", "worst case: 11.8 kV to 12.2 kV"} {
		if !strings.Contains(got, part) {
			t.Errorf("does not say %q:\n%s", part, got)
		}
	}
}
