package check

import (
	"context"
	"errors"
	"reflect"
	"slices"
	"strings"
	"testing"

	"inkjoule/lang"
)

func expect(t *testing.T, s *sketch, cfg Config, want ...string) {
	t.Helper()
	found, err := Run(context.Background(), s.note, cfg)
	if err != nil {
		t.Fatal(err)
	}
	if got := s.seen(found); !slices.Equal(got, want) {
		t.Errorf("found\n  %s\nwant\n  %s", strings.Join(got, "\n  "), strings.Join(want, "\n  "))
	}
}

func TestRunSortsByPlaceThenRuleAndKeepsOneOfEach(t *testing.T) {
	s := newSketch(t, "alpha beta gamma")
	s.fault("unknown-name", "gamma", lang.Error)
	s.fault("unknown-unit", "alpha", lang.Error)
	s.fault("unknown-name", "alpha", lang.Error)
	s.fault("unknown-name", "gamma", lang.Error)
	cfg := Config{Rules: []*Rule{s.at("zeta", "alpha beta", lang.Caution), s.at("beta", "beta", lang.Advice)}}
	expect(t, s, cfg,
		"unknown-name error alpha", "unknown-unit error alpha", "zeta caution alpha beta",
		"beta advice beta", "unknown-name error gamma")
}

func TestRunDoesNotDependOnTheOrderOfRules(t *testing.T) {
	s := newSketch(t, "alpha beta gamma")
	rules := []*Rule{s.at("one", "beta", lang.Error), s.at("two", "beta", lang.Error), s.at("three", "alpha", lang.Advice)}
	first, err := Run(context.Background(), s.note, Config{Rules: rules})
	if err != nil {
		t.Fatal(err)
	}
	slices.Reverse(rules)
	second, err := Run(context.Background(), s.note, Config{Rules: rules})
	if err != nil || !reflect.DeepEqual(first, second) {
		t.Errorf("%v, %v and %v", err, first, second)
	}
}

func TestBrokenRuleIsAnErrorAndCostsOnlyItself(t *testing.T) {
	cases := map[string]func(*Pass) error{
		"an error":             func(*Pass) error { return errors.New("lost") },
		"a panic":              func(*Pass) error { panic("lost") },
		"a place outside":      func(p *Pass) error { p.Report(lang.Fault{Span: lang.Span{End: 99}, Message: "m"}); return nil },
		"a place turned round": func(p *Pass) error { p.Report(lang.Fault{Span: lang.Span{Start: 2, End: 1}, Message: "m"}); return nil },
		"no message":           func(p *Pass) error { p.Report(lang.Fault{}); return nil },
	}
	for name, run := range cases {
		t.Run(name, func(t *testing.T) {
			s := newSketch(t, "alpha beta")
			bad := whole(Rule{Name: "bad", Severity: lang.Error, Run: run})
			found, err := Run(context.Background(), s.note, Config{Rules: []*Rule{bad, s.at("good", "beta", lang.Error)}})
			var broken *Broken
			if !errors.As(err, &broken) || broken.Rule != "bad" || broken.Path != "a.joule" {
				t.Errorf("the error is %v", err)
			}
			if got := s.seen(found); !slices.Equal(got, []string{"good error beta"}) {
				t.Errorf("found %q", got)
			}
		})
	}
}

func TestRunStopsWhenCancelled(t *testing.T) {
	s := newSketch(t, "alpha")
	ctx, cancel := context.WithCancel(context.Background())
	stop := whole(Rule{Name: "stop", Severity: lang.Error, Run: func(*Pass) error { cancel(); return nil }})
	if found, err := Run(ctx, s.note, Config{Rules: []*Rule{stop}}); !errors.Is(err, context.Canceled) || found != nil {
		t.Errorf("%v, %v", found, err)
	}
}

func TestSeverityIsConfigured(t *testing.T) {
	lowered := func(s *sketch) *Rule {
		f := lang.Fault{Span: s.span("beta"), Message: "m"}
		return whole(Rule{Name: "r", Severity: lang.Error, Run: func(p *Pass) error {
			f.Severity = p.Lowered()
			p.Report(f)
			return nil
		}})
	}
	cases := []struct {
		name   string
		rule   func(*sketch) *Rule
		config map[string]lang.Severity
		want   []string
	}{
		{"nothing set", func(s *sketch) *Rule { return s.at("r", "beta", lang.Error) }, nil, []string{"r error beta"}},
		{"lowered by the file", func(s *sketch) *Rule { return s.at("r", "beta", lang.Error) }, map[string]lang.Severity{"r": lang.Advice}, []string{"r advice beta"}},
		{"raised by the file", func(s *sketch) *Rule { return s.at("r", "beta", lang.Advice) }, map[string]lang.Severity{"r": lang.Error}, []string{"r error beta"}},
		{"switched off", func(s *sketch) *Rule { return s.at("r", "beta", lang.Error) }, map[string]lang.Severity{"r": 0}, []string{}},
		{"lowered by the rule", lowered, nil, []string{"r caution beta"}},
		{"lowered by both", lowered, map[string]lang.Severity{"r": lang.Caution}, []string{"r advice beta"}},
		{"never below advice", lowered, map[string]lang.Severity{"r": lang.Advice}, []string{"r advice beta"}},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			s := newSketch(t, "alpha beta")
			expect(t, s, Config{Rules: []*Rule{c.rule(s)}, Severity: c.config}, c.want...)
		})
	}
}

func TestFindingsOfTheLanguageAreConfiguredExceptFirmOnes(t *testing.T) {
	s := newSketch(t, "alpha beta gamma")
	s.fault("syntax", "alpha", lang.Error)
	s.fault("unused-definition", "beta", lang.Advice)
	s.fault("input-without-source", "gamma", lang.Advice)
	expect(t, s, Config{}, "syntax error alpha", "unused-definition advice beta")
	expect(t, s, Config{Severity: map[string]lang.Severity{"syntax": 0, "unused-definition": 0, "input-without-source": lang.Caution}},
		"syntax error alpha", "input-without-source caution gamma")
}

func TestOneFindingForEachCause(t *testing.T) {
	type at struct{ rule, text string }
	cases := []struct {
		name string
		all  []at
		want []at
	}{
		{"a medium decides before a factor", []at{{"half-product-nonlinear", "C*U^2"}, {"half-missing-stored-energy", "C*U^2"}}, []at{{"half-product-nonlinear", "C*U^2"}}},
		{"the wider text too", []at{{"half-product-nonlinear", "C*U^2"}, {"half-missing-stored-energy", "W = C*U^2"}}, []at{{"half-product-nonlinear", "C*U^2"}}},
		{"other text stays", []at{{"half-product-nonlinear", "C*U^2"}, {"half-missing-stored-energy", "L*I^2"}}, []at{{"half-product-nonlinear", "C*U^2"}, {"half-missing-stored-energy", "L*I^2"}}},
		{"a kind before a statistic", []at{{"power-called-energy", "C*U^2"}, {"mean-power-half", "C*U^2"}}, []at{{"power-called-energy", "C*U^2"}}},
		{"a dimension silences rules on its text", []at{{"dimension-mismatch", "C*U^2"}, {"rms-peak-mix", "U^2"}}, []at{{"dimension-mismatch", "C*U^2"}}},
		{"but not elsewhere", []at{{"dimension-mismatch", "C*U^2"}, {"rms-peak-mix", "L*I^2"}}, []at{{"dimension-mismatch", "C*U^2"}, {"rms-peak-mix", "L*I^2"}}},
		{"a rule that explains the dimension replaces it", []at{{"dimension-mismatch", "W"}, {"power-called-energy", "C*U^2"}}, []at{{"power-called-energy", "C*U^2"}}},
		{"in its own definition only", []at{{"dimension-mismatch", "L*I^2"}, {"power-called-energy", "C*U^2"}}, []at{{"power-called-energy", "C*U^2"}, {"dimension-mismatch", "L*I^2"}}},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			s := newSketch(t, "W = C*U^2\nX = L*I^2")
			s.define("W = C*U^2")
			s.define("X = L*I^2")
			var rules []*Rule
			for _, f := range c.all {
				if f.rule == "dimension-mismatch" {
					s.fault(f.rule, f.text, lang.Error)
				} else {
					rules = append(rules, s.at(f.rule, f.text, lang.Error))
				}
			}
			var want []string
			for _, f := range c.want {
				want = append(want, f.rule+" error "+f.text)
			}
			expect(t, s, Config{Rules: rules}, want...)
		})
	}
}
