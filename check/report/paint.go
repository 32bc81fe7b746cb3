package report

import "inkjoule/lang"

// painter adds colour, or leaves the text alone where it is false.
type painter bool

// Codes of ECMA-48, 8.3.117 (select graphic rendition).
const (
	plainText = "\x1b[0m"
	bold      = "\x1b[1m"
	faint     = "\x1b[2m"
	red       = "\x1b[1;31m"
	yellow    = "\x1b[1;33m"
	blue      = "\x1b[1;34m"
)

func (p painter) with(code, s string) string {
	if !p {
		return s
	}
	return code + s + plainText
}

func (p painter) place(s string) string { return p.with(bold, s) }
func (p painter) rule(s string) string  { return p.with(faint, s) }

func (p painter) severity(s lang.Severity) string { return p.with(colour(s), s.String()) }

func (p painter) marks(s lang.Severity, marks string) string { return p.with(colour(s), marks) }

func colour(s lang.Severity) string {
	switch s {
	case lang.Error:
		return red
	case lang.Caution:
		return yellow
	}
	return blue
}
