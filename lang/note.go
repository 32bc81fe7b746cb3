package lang

import (
	"context"

	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// Role tells what a name stands for.
type Role uint8

// The roles of a name.
const (
	RoleQuantity  Role = iota + 1 // NAME = …
	RoleFunction                  // NAME(x) = …
	RoleMedium                    // medium NAME
	RoleProperty                  // a property of a medium
	RoleRegion                    // region NAME
	RoleTable                     // table NAME
	RoleColumn                    // a column of a table
	RoleConstant                  // eps_0, pi, j …
	RoleParameter                 // a parameter, bound variable or coordinate
	RoleNote                      // the name of a referred note (uses … as NAME)
	RoleCondition                 // the frequency that `regime: harmonic at f = …` defines
)

// Standing tells how a kind or qualifier came to be known.
type Standing uint8

// From least to most certain. Guessed rests on a unit or a name alone.
const (
	Unknown Standing = iota
	Guessed
	Inferred
	Declared
)

// Facts is what every expression and name carries besides its value.
type Facts struct {
	Known     bool // Dim and Shape are known; false absorbs every further finding
	Dim       unit.Dim
	Shape     eval.Shape
	Complex   bool
	Kind      kind.ID
	KindBy    Standing
	Qualifier kind.Qualifier
	QualBy    Standing
	Waveform  kind.Waveform  // as declared; a name that is another name keeps it
	Coherence kind.Coherence // as declared
	Absolute  bool           // an absolute temperature written in °C, or derived from one
	Media     []string       // keys of the media whose properties or fields entered, in order of first use
}

// Result is the value of a quantity, in coherent SI units.
type Result struct {
	Known     bool
	Why       string // when not Known: the reason, for hover and advice
	Value     eval.Value
	Standard  float64   // standard uncertainty, 0 if none; scalars only
	Low, High float64   // worst-case bounds; both 0 if there is no uncertainty
	Unit      unit.Unit // the unit in which it is shown
	Shown     string    // e.g. "616.3 J/m^3"
	Stated    bool      // the note states the result itself
	Asked     *Blank    // the `__` that asks for it, or nil
}

// Validity is a range for which a definition is stated: `for T from A to B`.
type Validity struct {
	Name      string // of the condition, as written
	Key       string // canonical
	Low, High float64
	Unit      unit.Unit // in which the range is written
	Span      Span      // of the clause, statement-relative
}

// Symbol is a name of the note.
type Symbol struct {
	Name  string // as its definition spells it
	Key   string // canonical; a property or column is "owner.key"
	Path  string // the note that defines it; "" for the note itself
	Role  Role
	Owner *Symbol // medium, table or region that it belongs to
	Stmt  *Stmt   // nil for constants
	Def   *Definition
	Span  Span // the name in its definition, note offsets
	Input bool // its definition is a literal
	Doc   string
	Per   string     // the source that the definition names
	Valid []Validity // the conditions under which it holds; parameters are none
	Facts Facts
	Result
}

// Judgement is the verdict on a relation of assume, criterion or check.
type Judgement struct {
	Stmt   *Stmt
	Word   string // "assume", "criterion", "check"
	Text   string // the relation or the quoted text as written
	Known  bool   // false: a text, or something in it is unknown
	Holds  bool
	Margin float64 // limit/value − 1 for <, value/limit − 1 for >; of the tightest pair
	Worst  float64 // the margin at the worst-case bounds; = Margin without uncertainty
	Per    string
}

// Use is one place where a name is used or defined.
type Use struct {
	Symbol *Symbol
	Stmt   *Stmt
	Span   Span // note offsets
	Define bool
}

// Note is the frozen result of analysis. Nothing in it changes afterwards; it
// may be read from several goroutines.
type Note struct {
	Path    string
	Script  *Script
	Symbols []*Symbol // the note's own, in text order, properties after their medium
	Uses    []Use     // by place
	Faults  []Fault   // sorted by place, then rule; syntax included
	Judged  []Judgement

	state *state
}

// Files gives the text of other notes: of the editor first, then of the disk.
type Files interface {
	// Read returns the text of the note at the slash-separated path.
	Read(ctx context.Context, path string) (string, error)
}

// Options of an analysis.
type Options struct {
	Path     string
	Files    Files       // nil: references to other notes are unknown
	Previous *Note       // an earlier analysis of the same path, for reuse; may be nil
	Budget   eval.Budget // of one evaluation; zero takes the defaults

	within []string // the notes that led here, to find circles
}

// Analyze reads, resolves, infers and evaluates a note. The error is non-nil
// only when ctx is cancelled; everything about the note is in Note.Faults.
func Analyze(ctx context.Context, text string, opt Options) (*Note, error) {
	return analyze(ctx, text, opt)
}
