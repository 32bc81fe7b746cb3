package lang

import (
	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
)

// A cell is the smallest thing that is analysed as a whole: one definition,
// property, column, medium, region, table, regime or relation. What belongs to
// one analysis of the note stands in the cell; what was found out about it
// stands in its work, which is immutable once done and which the next analysis
// of an edited note takes over when the cell's tree and every cell that it
// depends on are the same. Places in the work are statement-relative, so that
// a statement may move.
type cell struct {
	path   string    // of the note that defines it, "" for this one
	view   *analysis // where the names of a cell of another note are looked up
	key    string    // canonical name, "" for a relation
	role   Role      // 0 for a relation
	stmt   *Stmt     // nil for constants
	tree   Tree      // *Definition, *Medium, *Region, *Table, *Regime or a relation statement
	owner  *cell     // medium of a property, table of a column
	regime *cell     // the regime statement in force, nil if unstated
	name   *Ident    // nil for a relation
	needs  []need    // free names, resolved by name before anything is evaluated
	deps   []*cell   // the cells behind needs, same order, nil where there is none
	base   int       // Node.ID of tree, the first of its side table
	colour uint8     // of the walk that orders the cells
	cyclic bool      // part of a cycle: unknown
	used   bool      // some cell uses its name
	slot   int       // of its value in the frame
	inputs []input   // uncertain literals, with their slots in the frame
	made   *work     // the work as it was first done: what reuse compares by
	*work
}

// work is what the analysis of a cell found out.
type work struct {
	facts  []Facts // by Node.ID - base
	faults []Fault // statement-relative
	uses   []usage // statement-relative, by place
	sym    Symbol  // what the cell defines; Stmt and Span are set by the note
	judged *Judgement
	plain  bool          // a pure number
	hinted bool          // a fault may name the nearest of all names: it holds for those names only
	pi     int           // power of π in a plain number's value, for 2π·Hz
	grad   eval.Gradient // of the value with respect to the note's uncertain inputs
	forms  *keptForms    // normal forms, built when a rule asks
	memo   *memo         // what rules keep; nil where there is no work of its own
	from   []kind.ID     // kinds that went in, where the cell has none of its own
}

// noWork is that of a cell which has not been analysed; it is never written to.
var noWork = &work{}

// begin gives the cell work of its own to write into.
func (c *cell) begin() {
	c.work = &work{forms: &keptForms{}, memo: &memo{}}
	if _, whole := c.tree.(*Definition); whole && c.owner == nil && c.stmt != nil {
		c.facts = make([]Facts, 0, c.stmt.Nodes)
	}
	c.made = c.work
}

// usage is a use of a name inside a cell.
type usage struct {
	key  string
	span Span
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
