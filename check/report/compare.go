package report

import (
	"fmt"
	"math"

	"inkjoule/lang"
	"inkjoule/lang/eval"
)

// Comparison is what became of a note's results since a revision.
type Comparison struct {
	Revision string
	Added    bool     // the note did not exist then
	Changes  []Change // inputs first, then by place; names that are gone last
	Flips    []Flip   // criteria, checks and assumptions whose verdict is another now
}

// Change is a value that differs. Old or New is "" where the name is new or gone.
type Change struct {
	Name     string
	Line     int // in the note as it is now; 0 where the name is gone
	Input    bool
	Old, New string
	Factor   float64 // new over old; 0 where there is no such number
}

// Flip is a relation with another verdict.
type Flip struct {
	Line                 int
	Word, Text           string
	Held, Holds          bool
	OldMargin, NewMargin float64
}

// unchanged is how far two values of the same formula may be apart: rounding in
// another order of evaluation.
const unchanged = 1e-9

// Compare tells what changed from one analysis of a note to another.
func Compare(revision string, old, now *lang.Note) *Comparison {
	c := &Comparison{Revision: revision}
	was := map[string]*lang.Symbol{}
	for _, s := range old.Symbols {
		if isValue(s) {
			was[s.Key] = s
		}
	}
	var results []Change
	for _, s := range now.Symbols {
		if !isValue(s) {
			continue
		}
		if ch, ok := changeOf(was[s.Key], s); ok {
			ch.Line, _ = now.Script.Source.Position(s.Span.Start)
			if s.Input {
				c.Changes = append(c.Changes, ch)
			} else {
				results = append(results, ch)
			}
		}
		delete(was, s.Key)
	}
	c.Changes = append(c.Changes, results...)
	for _, s := range old.Symbols {
		if was[s.Key] == s {
			c.Changes = append(c.Changes, Change{Name: fullName(s), Input: s.Input, Old: shownOf(s)})
		}
	}
	c.flips(old, now)
	return c
}

// changeOf compares one value; ok is false where it is the same.
func changeOf(old, now *lang.Symbol) (Change, bool) {
	c := Change{Name: fullName(now), Input: now.Input, New: shownOf(now)}
	if old == nil {
		return c, true
	}
	c.Old = shownOf(old)
	switch {
	case !old.Known && !now.Known:
		return c, false
	case old.Known != now.Known, old.Value.Shape() != now.Value.Shape(), !old.Facts.Dim.Compatible(now.Facts.Dim):
		return c, true
	}
	same := old.Value.Len() == now.Value.Len() && near(old.Standard, now.Standard) && near(old.Low, now.Low) && near(old.High, now.High)
	for i := 0; same && i < now.Value.Len(); i++ {
		a, b := old.Value.At(i), now.Value.At(i)
		same = near(a.Re(), b.Re()) && near(a.Im(), b.Im())
	}
	if now.Value.Shape() == eval.Scalar && now.Value.IsReal() && old.Value.IsReal() && old.Value.Re() != 0 {
		c.Factor = now.Value.Re() / old.Value.Re()
	}
	return c, !same
}

// near compares two numbers but for rounding.
func near(a, b float64) bool {
	return a == b || math.Abs(a-b) <= unchanged*math.Max(math.Abs(a), math.Abs(b)) || math.IsNaN(a) && math.IsNaN(b)
}

// shownOf writes a value, or that there is none.
func shownOf(s *lang.Symbol) string {
	if !s.Known {
		return "not known"
	}
	return s.Shown
}

// flips pairs the relations by their words and text, in order.
func (c *Comparison) flips(old, now *lang.Note) {
	type relation struct{ word, text string }
	was := map[relation][]*lang.Judgement{}
	for i := range old.Judged {
		g := &old.Judged[i]
		k := relation{g.Word, g.Text}
		was[k] = append(was[k], g)
	}
	for i := range now.Judged {
		g := &now.Judged[i]
		k := relation{g.Word, g.Text}
		if len(was[k]) == 0 {
			continue
		}
		before := was[k][0]
		was[k] = was[k][1:]
		if before.Known && g.Known && before.Holds != g.Holds {
			line, _ := now.Script.Source.Position(g.Stmt.At)
			c.Flips = append(c.Flips, Flip{line, g.Word, g.Text, before.Holds, g.Holds, before.Margin, g.Margin})
		}
	}
}

// verdict is a verdict in a word.
func verdict(holds bool) string {
	if holds {
		return "holds"
	}
	return "fails"
}

// text writes a change as a line: `C = 470 uF → 330 uF (factor 0.702)`.
func (c Change) text() string {
	switch {
	case c.Old == "":
		return fmt.Sprintf("%s = %s is new", c.Name, c.New)
	case c.New == "":
		return fmt.Sprintf("%s = %s is gone", c.Name, c.Old)
	}
	line := fmt.Sprintf("%s = %s, was %s", c.Name, c.New, c.Old)
	if c.Factor != 0 {
		line += fmt.Sprintf(" (factor %.4g)", c.Factor)
	}
	return line
}

// text writes a flip as a line.
func (f Flip) text() string {
	return fmt.Sprintf("%s %s %s (margin %.3g %%), and %s before (margin %.3g %%)",
		f.Word, f.Text, verdict(f.Holds), 100*f.NewMargin, pastVerdict(f.Held), 100*f.OldMargin)
}

func pastVerdict(held bool) string {
	if held {
		return "held"
	}
	return "failed"
}
