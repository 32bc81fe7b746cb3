package lang

import (
	"sync"

	"github.com/alecthomas/participle/v2"
	"github.com/alecthomas/participle/v2/lexer"
)

// This file is the grammar of the statements: the tags of the structs are read
// by participle. What has no tags is read by a hook: expressions by precedence
// climbing (parse_expr.go), definitions, relations, ranges, columns and rows
// because their layout or their tokens want more than a tag can say
// (parse_def.go, parse_hooks.go). The tags give, besides the shape of the tree,
// the words of "expected …" in a message.

// statementLine is one statement that begins with a statement word.
type statementLine struct {
	Medium    *Medium    `parser:"  @@"`
	Region    *Region    `parser:"| @@"`
	Table     *Table     `parser:"| @@"`
	Regime    *Regime    `parser:"| @@"`
	Uses      *Uses      `parser:"| @@"`
	Assume    *Assume    `parser:"| @@"`
	Criterion *Criterion `parser:"| @@"`
	Check     *Check     `parser:"| @@"`
	Safety    *Safety    `parser:"| @@"`
	Waive     *Waive     `parser:"| @@"`
	Plot      *Plot      `parser:"| @@"`
}

// production parses one kind of statement.
type production func(*lexer.PeekingLexer) (Statement, error)

// productions are the kinds of statements by their first word, which saves the
// parser to try one after the other. The grammar is built on first use: it costs
// some tenths of a millisecond.
var productions = sync.OnceValue(func() map[string]production {
	g := participle.MustBuild[statementLine](participle.Lexer(lexing{}), participle.ParseTypeWith(parseExpr))
	return map[string]production{
		"medium": productionOf[Medium](g), "region": productionOf[Region](g), "table": productionOf[Table](g),
		"regime": productionOf[Regime](g), "uses": productionOf[Uses](g), "assume": productionOf[Assume](g),
		"criterion": productionOf[Criterion](g), "check": productionOf[Check](g), "safety": productionOf[Safety](g),
		"waive": productionOf[Waive](g), "plot": productionOf[Plot](g),
	}
})

func productionOf[T any, P interface {
	*T
	Statement
}](g *participle.Parser[statementLine]) production {
	parser, err := participle.ParserForProduction[T](g)
	if err != nil {
		panic(err) // the grammar is fixed; a test builds it
	}
	return func(lex *lexer.PeekingLexer) (Statement, error) {
		tree, err := parser.ParseFromLexer(lex)
		return P(tree), err
	}
}

// Statement is one of the statement nodes below.
type Statement interface {
	Tree
	statement()
}

// Definition is
//
//	NAME [(PARAM, …)] [in MEDIUM] [, [QUALIFIER] [KIND]] = EXPR {= EXPR} {for …} [per "…"] {, PIECE}
//
// read by a hook (parse_def.go). A medium's property is a definition too.
type Definition struct {
	Node
	Name    Ident
	Params  []Ident
	In      *Ident // Text may be dotted: a medium of a referred note
	Kind    *Words // text after the comma: qualifier and kind, undivided
	Members []Expr // the chain of equals; Members[0] defines
	For     []*Range
	Pieces  []*Piece // further pieces `, EXPR for VAR from A to B`; Members[0] with For is the first
	Per     *Quote   // with Pieces: the source of the first piece

	broken *breakage // a property that could not be parsed, until the statement is put together
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
	Name       Ident         `parser:"'medium' @@"`
	Adjectives []*Words      `parser:"( ':' ( @@ ( ',' @@ )* )? )?"`
	Per        *Quote        `parser:"( 'per' @@ )?"`
	Properties []*Definition `parser:"( Line @@ )*"`
}

// Region is `region NAME [in MEDIUM]: SHAPE`.
type Region struct {
	Node
	Name  Ident  `parser:"'region' @@"`
	In    *Ident `parser:"( 'in' @@ )?"`
	Shape *Call  `parser:"':' @@"`
	Per   *Quote `parser:"( 'per' @@ )?"`
}

// Table is `table NAME[, linear]: COLUMN [UNIT], …` with its rows.
type Table struct {
	Node
	Name    Ident     `parser:"'table' @@"`
	Linear  bool      `parser:"( ',' @'linear' )?"`
	File    *Quote    `parser:"( 'from' @@ )?"` // `table NAME from "file.csv"`
	Columns []*Column `parser:"( ':' @@ ( ',' @@ )* )?"`
	Per     *Quote    `parser:"( 'per' @@ )?"`
	Rows    []*Row    `parser:"( Line @@ )*"`
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
	Word Words  `parser:"'regime' ':' @@"`
	Name *Ident `parser:"( 'at' @@"`
	X    Expr   `parser:"  '=' @@ )?"`
	Per  *Quote `parser:"( 'per' @@ )?"`
}

// Uses is `uses "PATH" [as NAME]`.
type Uses struct {
	Node
	Path Quote  `parser:"'uses' @@"`
	As   *Ident `parser:"( 'as' @@ )?"`
}

// Relation is `a < b`, a chain of such, for assume, criterion and check.
// Ops has one operator fewer than Terms: "<", "<=", ">", ">=", "<<", ">>", "="
// (the last in check alone).
type Relation struct {
	Node
	Terms []Expr
	Ops   []string
}

// Assume is `assume REL` or `assume "text"`.
type Assume struct {
	Node
	Text *Quote    `parser:"'assume' ( @@"`
	Rel  *Relation `parser:"| @@ )"`
	Per  *Quote    `parser:"( 'per' @@ )?"`
}

// Criterion is `criterion REL [per "…"]`.
type Criterion struct {
	Node
	Rel *Relation `parser:"'criterion' @@"`
	Per *Quote    `parser:"( 'per' @@ )?"`
}

// Check is `check REL [per "…"]`.
type Check struct {
	Node
	Rel *Relation `parser:"'check' @@"`
	Per *Quote    `parser:"( 'per' @@ )?"`
}

// Safety is `safety "text" [per "…"]`.
type Safety struct {
	Node
	Text Quote  `parser:"'safety' @@"`
	Per  *Quote `parser:"( 'per' @@ )?"`
}

// Waive is `waive RULE [for NAME[.PROPERTY]]: "reason"`.
type Waive struct {
	Node
	Rule   Words `parser:"'waive' @@"`
	For    Expr  `parser:"( 'for' @@ )?"` // *Name or *Member, or nil for the whole note
	Reason Quote `parser:"':' @@"`
}

// Plot is `plot EXPR, … for VAR from A to B`.
type Plot struct {
	Node
	X   []Expr `parser:"'plot' @@ ( ',' @@ )*"`
	For *Range `parser:"@@"`
	Per *Quote `parser:"( 'per' @@ )?"`
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
