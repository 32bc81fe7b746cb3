package check

import (
	"errors"
	"fmt"
	"slices"
	"strings"

	"inkjoule/lang"
)

// Catalogue is every finding that the program can make: those of the language
// and those of the rules, by name. It is immutable.
type Catalogue struct {
	all    []*Rule // sorted by name
	byName map[string]*Rule
	firm   map[string]bool // findings of the language that are firm, whoever explains them
}

// NewCatalogue joins the rules with the findings of the language. The error
// tells every rule that is not complete and every name that is used twice. A
// rule that extends a finding of the language stands in its place.
func NewCatalogue(rules []*Rule) (*Catalogue, error) {
	c := &Catalogue{byName: map[string]*Rule{}, firm: map[string]bool{}}
	for _, r := range Language() {
		c.firm[r.Name] = r.Firm
		if !slices.ContainsFunc(rules, func(x *Rule) bool { return x.Extends && x.Name == r.Name }) {
			c.all = append(c.all, r)
		}
	}
	c.all = append(c.all, rules...)
	var faults []error
	for i, r := range c.all {
		faults = append(faults, r.Validate())
		if i >= len(c.all)-len(rules) && r.Run == nil {
			faults = append(faults, fmt.Errorf("rule %q: it has no code", r.Name))
		}
		if _, language := c.firm[r.Name]; r.Extends && !language {
			faults = append(faults, fmt.Errorf("rule %q: the language has no finding of this name to extend", r.Name))
		}
		if c.byName[r.Name] != nil {
			faults = append(faults, fmt.Errorf("rule %q: the name is used twice", r.Name))
		}
		c.byName[r.Name] = r
	}
	slices.SortFunc(c.all, func(a, b *Rule) int { return strings.Compare(a.Name, b.Name) })
	return c, errors.Join(faults...)
}

// All gives every entry, by name.
func (c *Catalogue) All() []*Rule { return slices.Clone(c.all) }

// Find gives the entry of a name, or nil.
func (c *Catalogue) Find(name string) *Rule { return c.byName[name] }

// Names gives every name, sorted.
func (c *Catalogue) Names() []string {
	names := make([]string, len(c.all))
	for i, r := range c.all {
		names[i] = r.Name
	}
	return names
}

// Nearest gives the name that a misspelt one most probably means, or "".
func (c *Catalogue) Nearest(name string) string { return Nearest(name, c.Names()) }

// severity of a finding under an override: the override stands for the rule's
// own severity, and a finding that the rule lowered stays lowered by as much.
func (c *Catalogue) severity(f *lang.Fault, override lang.Severity) lang.Severity {
	r := c.byName[f.Rule]
	if r == nil || f.Severity == r.Severity {
		return override
	}
	lowered := int(override) - (int(r.Severity) - int(f.Severity))
	return lang.Severity(min(max(lowered, int(lang.Advice)), int(lang.Error)))
}
