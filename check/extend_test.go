package check

import (
	"context"
	"strings"
	"testing"

	"inkjoule/lang"
)

// extending is a rule of the same name as a finding of the language, which
// speaks at each of the texts.
func extending(s *sketch, name string, texts ...string) *Rule {
	return whole(Rule{Name: name, Severity: lang.Error, Extends: true, Run: func(p *Pass) error {
		for _, text := range texts {
			p.Report(lang.Fault{Span: s.span(text), Message: "explained"})
		}
		return nil
	}})
}

// A rule that extends a finding of the language explains it in its place and
// adds its own; only what the language has found is firm.
func TestRuleExplainsFindingsOfTheLanguage(t *testing.T) {
	s := newSketch(t, "W = C*U^2\nX = L*I^2\n")
	s.fault("shape-mix", "C*U^2", lang.Error)
	rule := extending(s, "shape-mix", "C*U^2", "L*I^2")
	expect(t, s, Config{Rules: []*Rule{rule}}, "shape-mix error C*U^2", "shape-mix error L*I^2")
	found, _ := Run(context.Background(), s.note, Config{Rules: []*Rule{rule}})
	if found[0].Message != "explained" || !found[0].Firm || found[1].Firm {
		t.Errorf("%+v", found)
	}
	wider := extending(s, "shape-mix", "W = C*U^2")
	expect(t, s, Config{Rules: []*Rule{wider}}, "shape-mix error W = C*U^2")
	expect(t, s, Config{Rules: []*Rule{rule}, Severity: map[string]lang.Severity{"shape-mix": lang.Advice}},
		"shape-mix error C*U^2", "shape-mix advice L*I^2")
	expect(t, s, Config{Rules: []*Rule{rule}, Severity: map[string]lang.Severity{"shape-mix": 0}}, "shape-mix error C*U^2")
}

func TestOnlyWhatTheRuleAddsIsWaived(t *testing.T) {
	for name, want := range map[string][]string{
		"W": {"shape-mix error C*U^2", "shape-mix error L*I^2", "unused-waiver caution shape-mix"},
		"X": {"shape-mix error C*U^2", "shape-mix error waived L*I^2"},
	} {
		s := newSketch(t, "W = C*U^2\nX = L*I^2\nwaive shape-mix for "+name+`: "agreed"`)
		s.define("W = C*U^2")
		s.define("X = L*I^2")
		s.waive("shape-mix", name, "agreed")
		s.fault("shape-mix", "C*U^2", lang.Error)
		expect(t, s, Config{Rules: []*Rule{extending(s, "shape-mix", "L*I^2")}}, want...)
	}
}

func TestRuleMustExtendWhatTheLanguageFinds(t *testing.T) {
	s := newSketch(t, "alpha")
	_, err := NewCatalogue([]*Rule{extending(s, "no-such")})
	if err == nil || !strings.Contains(err.Error(), "no finding of this name") {
		t.Errorf("the error is %v", err)
	}
}
