package lang

// This file is the syntax tree. A tree belongs to one statement and carries
// statement-relative spans, so that a statement whose text did not change
// keeps its tree when it moves. Trees are immutable once parsed; whatever
// later stages learn lives in side tables indexed by Node.ID.

// Span is a half-open range [Start, End) of byte offsets.
type Span struct{ Start, End int }

// Len is the number of bytes in the span.
func (s Span) Len() int { return s.End - s.Start }

// Contains reports whether the offset lies in the span or at its end.
func (s Span) Contains(at int) bool { return s.Start <= at && at <= s.End }

// Shift moves a span by delta bytes, from statement to note offsets.
func (s Span) Shift(delta int) Span { return Span{s.Start + delta, s.End + delta} }

// Node is what every tree node carries: its statement-relative span and an
// index that is dense within the statement, for side tables.
type Node struct {
	Span Span
	ID   int
}

// Place returns the statement-relative span.
func (n *Node) Place() Span { return n.Span }

// Index returns the node's index within its statement.
func (n *Node) Index() int { return n.ID }

// Tree is any node of the tree.
type Tree interface {
	Place() Span
	Index() int
}

// Expr is a node that has a value.
type Expr interface {
	Tree
	expr()
}

// Op is an operator of an expression, as the canonical character.
type Op rune

// The operators. '·' is the dot product, '×' the cross product.
const (
	OpAdd   Op = '+'
	OpSub   Op = '-'
	OpMul   Op = '*'
	OpDiv   Op = '/'
	OpPow   Op = '^'
	OpDot   Op = '·'
	OpCross Op = '×'
)

// Ident is a name as written; Key (see CanonicalName) is what it is compared by.
type Ident struct {
	Node
	Text string
}

// Numeral is a number as written, sign included. Value is the nearest float;
// LastDigit is the power of ten of the last digit written (12.0e3 → 2), so a
// stated result is exact to half of 10^LastDigit.
type Numeral struct {
	Span      Span
	Text      string
	Value     float64
	LastDigit int
}

// UnitPhrase is a unit as written, without blanks (`W/(m^2·K)`).
type UnitPhrase struct {
	Span Span
	Text string
}

// Spread is the uncertainty written after a literal: `± 0.05 mm`, `± 5 %`
// (Limit) or the standard uncertainty in parentheses, `12.0(1)` (Standard).
type Spread struct {
	Span     Span
	Standard bool        // true: standard uncertainty; false: tolerance limit
	Num      Numeral     // as written: the digits in parentheses for 12.0(1)
	Size     float64     // in the literal's unit, or of Unit where that is set
	Unit     *UnitPhrase // the spread's own unit, e.g. `%`
}

// Literal is a number with what touches it: `12.0(1) kV`, `3.00 mm ± 0.05 mm`.
type Literal struct {
	Node
	Num    Numeral
	Unit   *UnitPhrase
	Spread *Spread
}

// Name is the use of a name.
type Name struct {
	Node
	Text string
}

// Member is `X.Field`: a medium's property, a vector's component, a table's
// column, a region's measure, a name of a referred note.
type Member struct {
	Node
	X     Expr
	Field Ident
}

// Cell is `X[N]`: a cell of a table column, counted from 1.
type Cell struct {
	Node
	X  Expr
	At Expr
}

// Lookup is `X at Column = Value`: interpolation in a table.
type Lookup struct {
	Node
	X      Expr
	Column Ident
	Value  Expr
}

// Unary is a sign before an operand.
type Unary struct {
	Node
	Op Op // OpSub or OpAdd
	X  Expr
}

// Binary is an operation on two operands.
type Binary struct {
	Node
	Op     Op
	OpSpan Span // of the operator itself, empty for a superscript power
	X, Y   Expr
}

// Paren is a parenthesized expression, with the unit or spread that may follow
// a constant one: `(3.2 + 1.5*j) ohm`, `(12.0 ± 0.1) kV`.
type Paren struct {
	Node
	X      Expr
	Unit   *UnitPhrase
	Spread *Spread
}

// Bars is `|x|`.
type Bars struct {
	Node
	X Expr
}

// Triple is a vector `(x, y, z)`, with the unit that may follow a constant one.
type Triple struct {
	Node
	X    [3]Expr
	Unit *UnitPhrase
}

// Call is a function call, including the forms that bind a variable:
// `integral(BODY for x from A to B)`, `integral(BODY over REGION)`,
// `solve(LEFT = RIGHT for x from A to B)`, `derivative(BODY for x at A)`,
// `sum(BODY for n from 1 to 20)`.
type Call struct {
	Node
	Fn    Name
	Args  []Expr
	Equal Expr     // right side of solve's equation, else nil
	For   []*Range // bound variables
	Over  Expr     // region, or region.boundary, else nil
	Unit  *UnitPhrase
}

// Range is a clause `for VAR from A to B`, or `for VAR at A`. Where is the
// name of `PROPERTY at T = T_hot` conditions and of validity ranges.
type Range struct {
	Node
	Var      Expr // *Name, or *Member for a table's column
	From, To Expr
	At       Expr // `for x at A`
}

// Blank is `__ UNIT`, the blank that asks for the result.
type Blank struct {
	Node
	Unit *UnitPhrase
}

// Broken stands where an expression could not be parsed.
type Broken struct{ Node }

func (*Literal) expr() {}
func (*Name) expr()    {}
func (*Member) expr()  {}
func (*Cell) expr()    {}
func (*Lookup) expr()  {}
func (*Unary) expr()   {}
func (*Binary) expr()  {}
func (*Paren) expr()   {}
func (*Bars) expr()    {}
func (*Triple) expr()  {}
func (*Call) expr()    {}
func (*Blank) expr()   {}
func (*Broken) expr()  {}

// Words is a run of words: a kind, a medium's adjective.
type Words struct {
	Node
	Text string // single blanks between the words
}

// Quote is a quoted text; Text is without the quotes.
type Quote struct {
	Node
	Text string
}

// Statement is one of the statement nodes below.
type Statement interface {
	Tree
	statement()
}

// Definition is
// NAME [(PARAM, …)] [in MEDIUM] [, [QUALIFIER] [KIND]] = EXPR {= EXPR} {for …} [per "…"].
// A medium's property is a definition too.
type Definition struct {
	Node
	Name    Ident
	Params  []Ident
	In      *Ident
	Kind    *Words // text after the comma: qualifier and kind, undivided
	Members []Expr // the chain of equals; Members[0] defines
	For     []*Range
	Pieces  []*Piece // further pieces `, EXPR for VAR from A to B`; Members[0] with For is the first
	Per     *Quote
}

// Piece is one further piece of a piecewise definition.
type Piece struct {
	Node
	X   Expr
	For *Range
	Per *Quote
}

// Medium is `medium NAME: ADJECTIVES` with its indented properties.
type Medium struct {
	Node
	Name       Ident
	Adjectives []*Words
	Properties []*Definition
	Per        *Quote
}

// Region is `region NAME [in MEDIUM]: SHAPE`.
type Region struct {
	Node
	Name  Ident
	In    *Ident
	Shape *Call
	Per   *Quote
}

// Table is `table NAME[, linear]: COLUMN [UNIT], …` with its rows.
type Table struct {
	Node
	Name    Ident
	Linear  bool
	File    *Quote // `table NAME from "file.csv"`
	Columns []*Column
	Rows    []*Row
	Per     *Quote
}

// Column is a column's head; Formula is set for a computed column.
type Column struct {
	Node
	Name    Ident
	Unit    *UnitPhrase // nil: none was written
	Formula Expr
}

// Row is a line of cells; Cells are literals without units.
type Row struct {
	Node
	Cells []*Literal
}

// Regime is `regime: static | harmonic at f = EXPR | transient`.
type Regime struct {
	Node
	Word Words
	Name *Ident
	X    Expr
	Per  *Quote
}

// Uses is `uses "PATH" [as NAME]`.
type Uses struct {
	Node
	Path Quote
	As   *Ident
}

// Relation is `a < b`, a chain of such, for assume, criterion and check.
// Ops has one operator fewer than Terms: "<", "<=", ">", ">=", "<<", ">>", "=".
type Relation struct {
	Node
	Terms []Expr
	Ops   []string
}

// Assume is `assume REL` or `assume "text"`.
type Assume struct {
	Node
	Rel  *Relation
	Text *Quote
	Per  *Quote
}

// Criterion is `criterion REL [per "…"]`.
type Criterion struct {
	Node
	Rel *Relation
	Per *Quote
}

// Check is `check REL [per "…"]`.
type Check struct {
	Node
	Rel *Relation
	Per *Quote
}

// Safety is `safety "text" [per "…"]`.
type Safety struct {
	Node
	Text Quote
	Per  *Quote
}

// Waive is `waive RULE [for NAME[.PROPERTY]]: "reason"`.
type Waive struct {
	Node
	Rule   Words
	For    Expr // *Name or *Member, or nil for the whole note
	Reason Quote
}

// Plot is `plot EXPR, … for VAR from A to B`.
type Plot struct {
	Node
	X   []Expr
	For *Range
	Per *Quote
}

// Unread is a statement that could not be parsed; Name is what it would have
// defined where that much is clear, so that its uses are unknown, not wrong.
type Unread struct {
	Node
	Name *Ident
}

func (*Definition) statement() {}
func (*Medium) statement()     {}
func (*Region) statement()     {}
func (*Table) statement()      {}
func (*Regime) statement()     {}
func (*Uses) statement()       {}
func (*Assume) statement()     {}
func (*Criterion) statement()  {}
func (*Check) statement()      {}
func (*Safety) statement()     {}
func (*Waive) statement()      {}
func (*Plot) statement()       {}
func (*Unread) statement()     {}
