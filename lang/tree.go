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
// `sum(BODY for n from 1 to 20)`. Of is what the function belongs to, as in
// `mica.eps_r(300 K)`, else nil.
type Call struct {
	Node
	Of    Expr
	Fn    Name
	Args  []Expr
	Equal Expr     // right side of solve's equation, else nil
	For   []*Range // bound variables
	Over  Expr     // region, or region.boundary, else nil
	Unit  *UnitPhrase
}

// Range is a clause `for VAR from A to B`, or `for VAR at A` of a derivative.
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
