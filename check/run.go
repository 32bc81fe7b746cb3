package check

import (
	"context"
	"errors"

	"inkjoule/lang"
)

// Config is what a run obeys.
type Config struct {
	Rules    []*Rule
	Severity map[string]lang.Severity // overrides by rule name; 0 switches the rule off
}

// Run gives the findings of a note: those of the language and those of the
// rules, waivers applied, sorted by place and rule. The error is non-nil only
// when ctx is cancelled or a rule is broken (*Broken, joined); the findings are
// then those of everything else, and nothing after a cancellation.
func Run(ctx context.Context, note *lang.Note, cfg Config) ([]Finding, error) {
	catalogue, _ := NewCatalogue(cfg.Rules) // what is wrong with a rule is said at start
	return Runner{catalogue, cfg}.Run(ctx, note)
}

// Runner runs one configuration over many notes. It may be used from several
// goroutines.
type Runner struct {
	catalogue *Catalogue
	cfg       Config
}

// NewRunner validates the rules once; see NewCatalogue.
func NewRunner(cfg Config) (Runner, error) {
	catalogue, err := NewCatalogue(cfg.Rules)
	return Runner{catalogue, cfg}, err
}

// Catalogue gives everything that the runner can find.
func (r Runner) Catalogue() *Catalogue { return r.catalogue }

// Run reviews one note; see the function Run.
func (r Runner) Run(ctx context.Context, note *lang.Note) ([]Finding, error) {
	found, broken := r.collect(ctx, note)
	if err := ctx.Err(); err != nil {
		return nil, err
	}
	found = sortUnique(found)
	p := newPlaces(note)
	w := newWaiving(note, p, r.catalogue)
	w.apply(found)
	found = prevail(found, p, r.catalogue)
	w.unused(found)
	found = sortUnique(append(found, r.wanted(w.said)...))
	r.grade(found)
	return found, broken
}

// collect gathers the findings of the language and of every rule that is on.
func (r Runner) collect(ctx context.Context, note *lang.Note) ([]Finding, error) {
	var found []Finding
	for _, f := range note.Faults {
		found = append(found, Finding{Fault: f, Path: note.Path, Firm: r.catalogue.firm[f.Rule]})
	}
	found = r.wanted(found)
	said := len(found)
	file := func(f lang.Fault) {
		entry := r.catalogue.Find(f.Rule)
		firm := entry.Extends && explain(found[:said], f)
		found = append(found, Finding{Fault: f, Path: note.Path, Firm: entry.Firm || firm})
	}
	var broken []error
	pass := Pass{Note: note, Book: r.catalogue, shared: map[any]any{}}
	for _, rule := range r.cfg.Rules {
		if ctx.Err() != nil {
			return nil, nil
		}
		if rule.Run == nil || r.off(rule.Name) {
			continue
		}
		if b := rule.apply(pass, file); b != nil {
			broken = append(broken, b)
		}
	}
	if len(broken) == 0 {
		pass.finish()
	}
	return found, errors.Join(broken...)
}

// explain puts the finding of a rule in the place of those that the language has
// made under the same name within the same text; it reports whether one of them
// is firm.
func explain(found []Finding, f lang.Fault) (firm bool) {
	for i := range found {
		g := &found[i]
		if g.Rule == f.Rule && f.Span.Start <= g.Span.Start && g.Span.End <= f.Span.End {
			firm = firm || g.Firm
			g.Fault = f
		}
	}
	return firm
}

// finish tells those who asked for it that every rule has run.
func (p *Pass) finish() {
	for _, made := range p.shared {
		if f, ok := made.(Finisher); ok {
			f.Finish()
		}
	}
}

// wanted leaves the findings that the configuration does not switch off.
func (r Runner) wanted(found []Finding) []Finding {
	kept := found[:0]
	for _, f := range found {
		if f.Firm || !r.off(f.Rule) {
			kept = append(kept, f)
		}
	}
	return kept
}

// off reports whether a finding is switched off, by the configuration or
// because it is so by default. What cannot be waived cannot be switched off.
func (r Runner) off(name string) bool {
	severity, set := r.cfg.Severity[name]
	entry := r.catalogue.Find(name)
	switch {
	case entry == nil:
		return set && severity == 0
	case set:
		return severity == 0 && !entry.Firm
	}
	return entry.Off
}

// grade applies the configured severities.
func (r Runner) grade(found []Finding) {
	for i := range found {
		f := &found[i].Fault
		if s, set := r.cfg.Severity[f.Rule]; set && s != 0 && !found[i].Firm {
			f.Severity = r.catalogue.severity(f, s)
		}
	}
}
