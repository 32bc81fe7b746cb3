package lang

// Severity grades a finding. The names are what every output prints.
type Severity uint8

// Advice: provenance, presentation, robustness. Caution: likely wrong or
// unproven. Error: wrong under the facts declared in the note.
const (
	Advice Severity = iota + 1
	Caution
	Error
)

// String returns "advice", "caution" or "error".
func (s Severity) String() string {
	switch s {
	case Error:
		return "error"
	case Caution:
		return "caution"
	case Advice:
		return "advice"
	}
	return "none"
}

// Related is a further place that contributed to a fault. Where Name is set,
// the place is that name's definition and Span and Path are filled in from it.
type Related struct {
	Path    string // "" is the note itself
	Name    string // canonical key of the name meant, "" where Span is given
	Span    Span   // note offsets
	Message string
}

// Edit replaces the text at Span (note offsets) by New.
type Edit struct {
	Span Span
	New  string
}

// Fix is a correction that can be applied without changing meaning elsewhere.
type Fix struct {
	Title string
	Edits []Edit
}

// Fault is something wrong with the note, at the narrowest text that is wrong.
// Message says what was found and what was expected; Detail says what to write
// instead, with the factor by which the value is off where that is known.
type Fault struct {
	Rule     string // the finding's name, e.g. "unknown-name"
	Severity Severity
	Span     Span // note offsets
	Message  string
	Detail   string
	Related  []Related
	Fix      *Fix
}
