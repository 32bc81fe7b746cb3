package lang

import (
	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
)

// A cell is the smallest thing that is analysed as a whole: one definition,
// property, medium, region, table, regime or relation. It is immutable once it
// is done, and the next analysis of an edited note takes it over when its tree
// and every cell that it depends on are the same. All its places are
// statement-relative, so a cell may move.
type cell struct {
	path   string    // of the note that defines it, "" for this one
	view   *analysis // where the names of a cell of another note are looked up
	key    string    // canonical name, "" for a relation
	role   Role      // 0 for a relation
	stmt   *Stmt     // of the analysis that made it; only its tree is relied on
	tree   Tree      // *Definition, *Medium, *Region, *Table, *Regime or a relation statement
	owner  *cell     // medium of a property
	regime *cell     // the regime statement in force, nil if unstated
	name   *Ident    // nil for a relation
	needs  []need    // free names, resolved by name before anything is evaluated
	deps   []*cell   // the cells behind needs, same order, nil where there is none
	base   int       // Node.ID of tree, the first of its side table
	facts  []Facts   // by Node.ID - base
	faults []Fault   // statement-relative
	uses   []usage   // statement-relative
	sym    Symbol    // what the cell defines; Stmt and Span are set by the note
	judged *Judgement
	cyclic bool          // part of a cycle: unknown
	made   *cell         // the cell whose work this is: itself, or the one it was taken over from
	slot   int           // of its value in the frame
	plain  bool          // a pure number
	pi     int           // power of π in a plain number's value, for 2π·Hz
	grad   eval.Gradient // of the value with respect to the note's uncertain inputs
	inputs []input       // uncertain literals of the cell
	from   []kind.ID     // kinds that went in, where the cell has none of its own
}

// usage is a use of a name inside a cell.
type usage struct {
	key    string
	span   Span
	define bool
}

// factsOf returns the facts recorded for a node of the cell.
func (c *cell) factsOf(t Tree) (Facts, bool) {
	i := t.Index() - c.base
	if i < 0 || i >= len(c.facts) {
		return Facts{}, false
	}
	return c.facts[i], true
}

// record stores what a node carries.
func (c *cell) record(t Tree, f Facts) {
	i := t.Index() - c.base
	if i < 0 {
		return
	}
	for len(c.facts) <= i {
		c.facts = append(c.facts, Facts{})
	}
	c.facts[i] = f
}

// fault adds a finding to the cell.
func (c *cell) fault(f Fault) { c.faults = append(c.faults, f) }
