package check

import (
	"cmp"
	"errors"
	"fmt"
	"runtime/debug"
	"strings"

	"inkjoule/lang"
)

// Rule is one check of the physics, or one finding of the language itself (then
// Run is nil, since lang reports it). It is a value and is never changed.
type Rule struct {
	Name     string // fixed, e.g. "half-missing-stored-energy"
	Severity lang.Severity
	Firm     bool   // an error of syntax, dimension or arithmetic: never waived, lowered or switched off
	Extends  bool   // the language makes findings of this name too: the rule explains them and adds to them
	Off      bool   // does not fire unless the configuration turns it on
	Title    string // what is wrong, in one line without a full stop
	Sees     string // what fires
	Silent   string // when it stays silent
	Formula  string // the physics in one formula
	Remedy   string // what to write instead
	Source   string // published source, or "common practice", "from memory"
	Wrong    Example
	Right    Example
	Run      func(*Pass) error
}

// Example is a whole note of a few lines, executed by the tests: the rule fires
// on Wrong and nothing fires on Right, which is the same note put right.
type Example struct{ Note string }

// Pass is one run of one rule over one note.
type Pass struct {
	Rule   *Rule
	Note   *lang.Note
	Book   *Catalogue // of the run: the same for every note that one Runner reviews
	report func(lang.Fault)
	shared map[any]any
}

// Finisher is what Once has made and wants to know that every rule has run.
type Finisher interface{ Finish() }

// Tee is the pass with every report told to also, as it is filed.
func (p *Pass) Tee(also func(lang.Fault)) *Pass {
	q := *p
	q.report = func(f lang.Fault) {
		p.report(f)
		also(f)
	}
	return &q
}

// Once gives what the first rule that asks for the key has made for this note,
// so that rules share what they all need. What it gives must not be changed.
func (p *Pass) Once(key any, make func() any) any {
	made, ok := p.shared[key]
	if !ok {
		made = make()
		p.shared[key] = made
	}
	return made
}

// Report files a finding; Rule is set, and Severity unless the rule set it.
func (p *Pass) Report(f lang.Fault) {
	f.Rule = p.Rule.Name
	if f.Severity == 0 {
		f.Severity = p.Rule.Severity
	}
	p.report(f)
}

// Lowered is the rule's severity one level down: for a finding whose trigger
// rests on a guess or on a fact that the note leaves unstated.
func (p *Pass) Lowered() lang.Severity { return max(lang.Advice, p.Rule.Severity-1) }

// Validate tells everything that keeps the rule from being used.
func (r *Rule) Validate() error {
	var faults []error
	complain := func(bad bool, format string, args ...any) {
		if bad {
			faults = append(faults, fmt.Errorf(format, args...))
		}
	}
	complain(!validName(r.Name), "the name %q is not made of lower-case words joined by hyphens", r.Name)
	complain(r.Severity < lang.Advice || r.Severity > lang.Error, "it has no severity")
	for _, part := range r.required() {
		complain(strings.TrimSpace(part.text) == "", "its %s is empty", part.what)
	}
	complain(strings.ContainsAny(r.Title, "\n"), "its title is longer than a line")
	complain(r.Wrong == r.Right && r.Wrong.Note != "", "its two examples are the same")
	if len(faults) == 0 {
		return nil
	}
	return fmt.Errorf("rule %q: %w", r.Name, errors.Join(faults...))
}

type part struct{ what, text string }

// required are the texts without which a finding cannot be explained. What the
// language itself finds needs neither a formula nor a list of exceptions.
func (r *Rule) required() []part {
	parts := []part{
		{"title", r.Title}, {"condition (Sees)", r.Sees}, {"remedy", r.Remedy},
		{"wrong example", r.Wrong.Note}, {"right example", r.Right.Note},
	}
	if r.Run != nil {
		parts = append(parts, part{"exceptions (Silent)", r.Silent}, part{"formula", r.Formula}, part{"source", r.Source})
	}
	return parts
}

// validName accepts a lower-case word or lower-case words joined by single
// hyphens: the same names serve the note, the config and every output.
func validName(name string) bool {
	for _, word := range strings.Split(name, "-") {
		if word == "" || strings.Trim(word, "abcdefghijklmnopqrstuvwxyz") != "" {
			return false
		}
	}
	return true
}

// Broken is the failure of a rule, not of the note: an error of the program.
type Broken struct {
	Rule  string
	Path  string // the note on which it failed
	Err   error
	Stack []byte // of a panic; for the maintainers, shown on request only
}

func (b *Broken) Error() string {
	return fmt.Sprintf("internal error: the rule %s failed on %s (%v); its findings are missing, all others stand. Please report it with the note", b.Rule, b.Path, b.Err)
}

func (b *Broken) Unwrap() error { return b.Err }

// apply runs the rule and turns an error or a panic into *Broken.
func (r *Rule) apply(pass Pass, report func(lang.Fault)) (broken *Broken) {
	note := pass.Note
	defer func() {
		if p := recover(); p != nil {
			broken = &Broken{Rule: r.Name, Path: note.Path, Err: fmt.Errorf("%v", p), Stack: debug.Stack()}
		}
	}()
	var unfit error
	pass.Rule, pass.report = r, func(f lang.Fault) {
		if err := fit(note, f); err != nil {
			unfit = err
			return
		}
		report(f)
	}
	if err := cmp.Or(r.Run(&pass), unfit); err != nil {
		return &Broken{Rule: r.Name, Path: note.Path, Err: err}
	}
	return nil
}

// fit tells why a finding cannot be shown: outputs rely on a place within the
// note and on a message.
func fit(note *lang.Note, f lang.Fault) error {
	size := len(note.Script.Source.Text)
	switch {
	case f.Span.Start < 0 || f.Span.End < f.Span.Start || f.Span.End > size:
		return fmt.Errorf("it reported the bytes %d to %d of a note of %d", f.Span.Start, f.Span.End, size)
	case f.Message == "":
		return errors.New("it reported a finding without a message")
	}
	return nil
}
