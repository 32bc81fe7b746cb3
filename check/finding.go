// Package check runs rules over an analysed note and collects findings.
//
// A rule is a value: its file in check/rules is its only home. Run gives the
// findings of the language (lang.Note.Faults) and those of the rules in one
// total order: place, rule, message. Precedence then leaves one finding for
// each cause, waivers mark what the author answers for, and the configuration
// sets severities. A rule that returns an error or panics is broken: that is
// an error of the program, never a finding about the note.
package check

import (
	"cmp"
	"slices"

	"inkjoule/lang"
)

// Finding is a fault at a place in a file, as every front end shows it.
type Finding struct {
	lang.Fault
	Path     string
	Firm     bool      // an error of syntax, dimension or arithmetic: never waived, lowered or switched off
	Waived   string    // the waiver's reason; "" if not waived. Waived findings do not count.
	WaivedBy lang.Span // the waive statement, note offsets; empty if not waived
}

// IsWaived reports whether the author answers for the finding in the note.
func (f *Finding) IsWaived() bool { return f.WaivedBy.End > f.WaivedBy.Start }

// compare is the total order of findings.
func compare(a, b Finding) int {
	return cmp.Or(
		cmp.Compare(a.Path, b.Path),
		cmp.Compare(a.Span.Start, b.Span.Start),
		cmp.Compare(a.Span.End, b.Span.End),
		cmp.Compare(a.Rule, b.Rule),
		cmp.Compare(b.Severity, a.Severity), // of two, the graver is kept
		cmp.Compare(a.Message, b.Message),
		cmp.Compare(a.Detail, b.Detail),
	)
}

// sortUnique sorts the findings and keeps one for each file, place and rule.
func sortUnique(found []Finding) []Finding {
	slices.SortFunc(found, compare)
	return slices.CompactFunc(found, func(a, b Finding) bool {
		return a.Path == b.Path && a.Span == b.Span && a.Rule == b.Rule
	})
}

// overlap reports whether two places share text; an empty place counts as the
// byte that follows it.
func overlap(a, b lang.Span) bool {
	return a.Start < max(b.End, b.Start+1) && b.Start < max(a.End, a.Start+1)
}
