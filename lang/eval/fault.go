package eval

import "fmt"

// The rules under which this package reports. They are names of the language.
const (
	// RuleDivision: a division by zero, or a function at its pole.
	RuleDivision = "division-by-zero"
	// RuleShape: lists of unlike length, a real function whose value is complex,
	// an order or a count that is not a whole number.
	RuleShape = "shape-mix"
	// RuleDiverges: an integral without a finite value.
	RuleDiverges = "integral-diverges"
	// RuleNotConverged: an integral that did not reach its accuracy.
	RuleNotConverged = "integral-not-converged"
	// RuleNoRoot: no sign change in solve's range, or several.
	RuleNoRoot = "no-root"
	// RuleTable: a table read outside its rows.
	RuleTable = "table-outside-rows"
	// RuleRange: a value outside all the pieces of a function.
	RuleRange = "outside-stated-range"
	// RuleBudget: out of steps, memory or time, or beyond the range of numbers.
	RuleBudget = "over-budget"
)

// Fault is what went wrong while computing. Node is the number that the
// compiler gave the combinator, so that the fault can be placed. Numbers in the
// text are in coherent SI units.
type Fault struct {
	Rule    string
	Node    int
	Message string // what was found and what was expected
	Detail  string // what to write instead
}

// ShapeError says why a combinator refuses its operands.
type ShapeError struct {
	Message string // what was found
	Detail  string // what to write instead
}

// Error gives both sentences.
func (e *ShapeError) Error() string {
	if e.Detail == "" {
		return e.Message
	}
	return e.Message + "; " + e.Detail
}

func refuse(detail, format string, args ...any) error {
	return &ShapeError{Message: fmt.Sprintf(format, args...), Detail: detail}
}

// number prints a value in a message.
func number(x float64) string { return fmt.Sprintf("%.6g", x) }
