package kind

// Qualifier is the time statistic of a quantity.
type Qualifier uint8

// The qualifiers. Unqualified is unknown, not static.
const (
	Unqualified Qualifier = iota
	Static
	Instantaneous
	Peak
	RMS
	Average
	PeakToPeak
)

var qualifierNames = [...]string{"", "static", "instantaneous", "peak", "rms", "average", "peak-to-peak"}

// String returns the word of the note language, "" for Unqualified.
func (q Qualifier) String() string {
	if int(q) < len(qualifierNames) {
		return qualifierNames[q]
	}
	return ""
}

// Qualifiers lists the words of the note language, for completion.
func Qualifiers() []string { return append([]string(nil), qualifierNames[1:]...) }
