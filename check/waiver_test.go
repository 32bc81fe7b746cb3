package check

import (
	"context"
	"reflect"
	"testing"

	"inkjoule/lang"
)

const twoResults = "W = C*U^2\nX = L*I^2\ncriterion W < 3 J\n"

// waived builds a note with two results, a criterion and one waiver.
func waived(t *testing.T, waiver [3]string, line string) *sketch {
	s := newSketch(t, twoResults+line)
	w := s.define("W = C*U^2")
	s.define("X = L*I^2")
	s.stmt("criterion W < 3 J", &lang.Criterion{})
	s.use(w, lang.Span{Start: s.span("W < 3 J").Start, End: s.span("W < 3 J").Start + 1})
	s.waive(waiver[0], waiver[1], waiver[2])
	return s
}

func TestWaivers(t *testing.T) {
	cases := []struct {
		name string
		args [3]string
		line string
		want []string
	}{
		{
			"for a name", [3]string{"r", "W", "agreed"}, `waive r for W: "agreed"`,
			[]string{"r caution waived C*U^2", "r caution L*I^2", "r caution waived W < 3 J"},
		},
		{
			"for the note", [3]string{"r", "", "agreed"}, `waive r: "agreed"`,
			[]string{"r caution waived C*U^2", "r caution waived L*I^2", "r caution waived W < 3 J"},
		},
		{
			"for another name", [3]string{"r", "X", "agreed"}, `waive r for X: "agreed"`,
			[]string{"r caution C*U^2", "r caution waived L*I^2", "r caution W < 3 J"},
		},
		{
			"of a rule that does not fire", [3]string{"quiet", "X", "agreed"}, `waive quiet for X: "agreed"`,
			[]string{"r caution C*U^2", "r caution L*I^2", "r caution W < 3 J", `unused-waiver caution waive quiet for X: "agreed"`},
		},
		{
			"of an unknown rule", [3]string{"quite", "X", "agreed"}, `waive quite for X: "agreed"`,
			[]string{"r caution C*U^2", "r caution L*I^2", "r caution W < 3 J", "unknown-rule error quite"},
		},
		{
			"for an unknown name", [3]string{"r", "Y", "agreed"}, `waive r for Y: "agreed"`,
			[]string{"r caution C*U^2", "r caution L*I^2", "r caution W < 3 J", "unknown-name error Y"},
		},
		{
			"of an error of arithmetic", [3]string{"stated-result-differs", "W", "agreed"}, `waive stated-result-differs for W: "agreed"`,
			[]string{"r caution C*U^2", "r caution L*I^2", "r caution W < 3 J", "unused-waiver caution stated-result-differs"},
		},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			s := waived(t, c.args, c.line)
			places := []lang.Span{s.span("C*U^2"), s.span("L*I^2"), s.span("W < 3 J")}
			r := whole(Rule{Name: "r", Severity: lang.Caution, Run: func(p *Pass) error {
				for _, at := range places {
					p.Report(lang.Fault{Span: at, Message: "m"})
				}
				return nil
			}})
			quiet := whole(Rule{Name: "quiet", Severity: lang.Error, Run: func(*Pass) error { return nil }})
			expect(t, s, Config{Rules: []*Rule{r, quiet}}, c.want...)
		})
	}
}

func TestUnknownRuleOffersTheNearest(t *testing.T) {
	s := waived(t, [3]string{"quite", "", "agreed"}, `waive quite: "agreed"`)
	quiet := whole(Rule{Name: "quiet", Severity: lang.Error, Run: func(*Pass) error { return nil }})
	found, err := Run(context.Background(), s.note, Config{Rules: []*Rule{quiet}})
	if err != nil || len(found) != 1 || found[0].Fix == nil || found[0].Fix.Edits[0].New != "quiet" {
		t.Errorf("%+v, %v", found, err)
	}
}

func TestWaivedFindingDoesNotHideWhatCannotBeWaived(t *testing.T) {
	s := newSketch(t, "W = C*U^2\n"+`waive power-called-energy: "agreed"`)
	s.define("W = C*U^2")
	s.waive("power-called-energy", "", "agreed")
	s.fault("dimension-mismatch", "W = C", lang.Error)
	expect(t, s, Config{Rules: []*Rule{s.at("power-called-energy", "C*U^2", lang.Error)}},
		"dimension-mismatch error W = C", "power-called-energy error waived C*U^2")
}

func TestWaiversAreListedWithTheirUse(t *testing.T) {
	s := waived(t, [3]string{"r", "W", "agreed"}, `waive r for W: "agreed"`)
	found, err := Run(context.Background(), s.note, Config{Rules: []*Rule{s.at("r", "C*U^2", lang.Error)}})
	if err != nil {
		t.Fatal(err)
	}
	want := []Waiver{{Rule: "r", Name: "W", Reason: "agreed", Span: s.span(`waive r for W: "agreed"`), Used: 1}}
	if got := Waivers(s.note, found); !reflect.DeepEqual(got, want) {
		t.Errorf("%+v", got)
	}
}
