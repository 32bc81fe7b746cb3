package report

import (
	"fmt"
	"strings"

	"inkjoule/lang"
)

// Count is what a review read and found.
type Count struct {
	Notes      int
	Statements int // read
	Values     int // computed
	Prose      int // lines of prose that are not blank
	Errors     int
	Cautions   int
	Advice     int
	Waived     int // findings that the author answers for, in no other count
}

// CountOf counts one note.
func CountOf(n *Note) Count {
	c := Count{Notes: 1, Statements: len(n.Script.Stmts), Prose: len(n.Script.Prose)}
	for _, s := range n.Symbols {
		if isValue(s) && s.Result.Known {
			c.Values++
		}
	}
	for i := range n.Findings {
		c.finding(n.Findings[i].IsWaived(), n.Findings[i].Severity)
	}
	return c
}

func (c *Count) finding(waived bool, s lang.Severity) {
	switch {
	case waived:
		c.Waived++
	case s == lang.Error:
		c.Errors++
	case s == lang.Caution:
		c.Cautions++
	default:
		c.Advice++
	}
}

// Add adds the counts of another note.
func (c *Count) Add(d Count) {
	c.Notes += d.Notes
	c.Statements += d.Statements
	c.Values += d.Values
	c.Prose += d.Prose
	c.Errors += d.Errors
	c.Cautions += d.Cautions
	c.Advice += d.Advice
	c.Waived += d.Waived
}

// AtLeast is the number of findings, not waived, of a severity or a graver one.
func (c Count) AtLeast(s lang.Severity) int {
	n := c.Errors
	if s <= lang.Caution {
		n += c.Cautions
	}
	if s <= lang.Advice {
		n += c.Advice
	}
	return n
}

// String is the summary in a line: `2 notes, 14 statements read, 9 values
// computed, 5 lines of prose: 1 error, no caution, no advice`.
func (c Count) String() string {
	found := []string{some(c.Errors, "error"), some(c.Cautions, "caution"), amount(c.Advice) + " advice"}
	if c.Waived > 0 {
		found = append(found, fmt.Sprintf("%d waived", c.Waived))
	}
	return fmt.Sprintf("%s, %s read, %s computed, %s of prose: %s",
		some(c.Notes, "note"), some(c.Statements, "statement"), some(c.Values, "value"), some(c.Prose, "line"),
		strings.Join(found, ", "))
}

// some writes a count with its noun.
func some(n int, noun string) string {
	if n == 1 {
		return "1 " + noun
	}
	return amount(n) + " " + noun + "s"
}

func amount(n int) string {
	if n == 0 {
		return "no"
	}
	return fmt.Sprint(n)
}

// isValue reports whether a name stands for a value that a review lists: a
// quantity of the note, a medium's property, the frequency of a regime.
func isValue(s *lang.Symbol) bool {
	switch s.Role {
	case lang.RoleQuantity, lang.RoleProperty, lang.RoleCondition:
		return true
	}
	return false
}
