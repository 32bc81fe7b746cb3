// Package kind is the table of quantity kinds and qualifiers.
package kind

// ID is a kind of quantity; 0 is unknown.
type ID uint16

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
