package check

import (
	"slices"
	"strings"
	"testing"

	"inkjoule/lang"
)

// The names that the design fixes; other people's notes and configurations
// rely on them.
const languageNames = `syntax unknown-name unknown-unit unknown-kind unknown-function unknown-rule unknown-property unknown-note
name-defined-twice constant-redefined cyclic-definition dimension-mismatch shape-mix dimensioned-argument
temperature-offset stated-result-differs substituted-member-differs integral-diverges integral-not-converged
no-root table-outside-rows division-by-zero over-budget criterion-fails check-fails
unread-calculation unit-hides-name criterion-within-uncertainty assumption-fails
outside-stated-range several-roots unused-waiver unused-definition input-without-source unasked-result`

func TestCatalogueExplainsEveryFindingOfTheLanguage(t *testing.T) {
	c, err := NewCatalogue(nil)
	if err != nil {
		t.Fatal(err)
	}
	for _, name := range strings.Fields(languageNames) {
		if c.Find(name) == nil {
			t.Errorf("%s is not explained", name)
		}
	}
	if !slices.IsSorted(c.Names()) {
		t.Errorf("the names are not sorted: %q", c.Names())
	}
}

func TestPrecedenceSpeaksOfNamesThatCanExist(t *testing.T) {
	for _, o := range overrides {
		for _, name := range append([]string{o.strong}, o.weak...) {
			if !validName(name) {
				t.Errorf("%q is no rule name", name)
			}
		}
		if slices.Contains(o.weak, o.strong) {
			t.Errorf("%s silences itself", o.strong)
		}
	}
}

func TestValidate(t *testing.T) {
	run := func(*Pass) error { return nil }
	good := func(change func(*Rule)) *Rule {
		r := whole(Rule{Name: "good-rule", Severity: lang.Error, Run: run})
		change(r)
		return r
	}
	cases := []struct {
		name   string
		change func(*Rule)
		want   string // part of the error; "" for none
	}{
		{"complete", func(*Rule) {}, ""},
		{"no name", func(r *Rule) { r.Name = "" }, "name"},
		{"capitals", func(r *Rule) { r.Name = "Good-rule" }, "name"},
		{"two hyphens", func(r *Rule) { r.Name = "good--rule" }, "name"},
		{"digits", func(r *Rule) { r.Name = "rule-1" }, "name"},
		{"no severity", func(r *Rule) { r.Severity = 0 }, "severity"},
		{"unknown severity", func(r *Rule) { r.Severity = 9 }, "severity"},
		{"no title", func(r *Rule) { r.Title = " " }, "title"},
		{"title of two lines", func(r *Rule) { r.Title = "a\nb" }, "title"},
		{"no condition", func(r *Rule) { r.Sees = "" }, "Sees"},
		{"no exceptions", func(r *Rule) { r.Silent = "" }, "Silent"},
		{"no formula", func(r *Rule) { r.Formula = "" }, "formula"},
		{"no remedy", func(r *Rule) { r.Remedy = "" }, "remedy"},
		{"no source", func(r *Rule) { r.Source = "" }, "source"},
		{"no wrong example", func(r *Rule) { r.Wrong.Note = "" }, "wrong example"},
		{"no right example", func(r *Rule) { r.Right.Note = "" }, "right example"},
		{"same examples", func(r *Rule) { r.Right = r.Wrong }, "same"},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			err := good(c.change).Validate()
			if c.want == "" && err != nil || c.want != "" && (err == nil || !strings.Contains(err.Error(), c.want)) {
				t.Errorf("the error is %v, want one about %q", err, c.want)
			}
		})
	}
}

func TestCatalogueRefusesTwoRulesOfOneName(t *testing.T) {
	run := func(*Pass) error { return nil }
	one := whole(Rule{Name: "one", Severity: lang.Error, Run: run})
	two := whole(Rule{Name: "syntax", Severity: lang.Error, Run: run})
	noCode := whole(Rule{Name: "three", Severity: lang.Error})
	_, err := NewCatalogue([]*Rule{one, one, two, noCode})
	for _, part := range []string{`"one": the name is used twice`, `"syntax": the name is used twice`, `"three": it has no code`} {
		if err == nil || !strings.Contains(err.Error(), part) {
			t.Errorf("%v does not say %s", err, part)
		}
	}
}

func TestNearest(t *testing.T) {
	names := []string{"half-missing-stored-energy", "rms-peak-mix", "review", "rules", "off"}
	cases := map[string]string{
		"half-missing-stored-energie": "half-missing-stored-energy",
		"half-missing-store-energy":   "half-missing-stored-energy",
		"rms-peek-mix":                "rms-peak-mix",
		"reviwe":                      "review",
		"revw":                        "review",
		"rule":                        "rules",
		"zzzzzz":                      "",
		"":                            "",
		"x":                           "",
	}
	for given, want := range cases {
		if got := Nearest(given, names); got != want {
			t.Errorf("Nearest(%q) = %q, want %q", given, got, want)
		}
	}
}
