// Package report writes reviewed notes in the formats of the command line. All
// writers stream: a note is written when it comes and may then be forgotten.
package report

import (
	"fmt"
	"io"
	"strings"

	"inkjoule/check"
	"inkjoule/lang"
)

// Note is a reviewed note.
type Note struct {
	*lang.Note
	Findings []check.Finding // sorted
	Against  *Comparison     // with an earlier revision; nil: not asked for
}

// Writer writes a review. Notes come in their final order, from one goroutine;
// after an error nothing more may be written.
type Writer interface {
	// Note writes a reviewed note.
	Note(*Note) error
	// Problem writes what kept a file, or a part of the program, from its work.
	Problem(message string) error
	// Close writes what stands at the end; it does not close the stream.
	Close() error
}

// Options of a writer.
type Options struct {
	Color     bool             // text only: mark severities by colour
	Catalogue *check.Catalogue // what the rules mean; sarif needs it
	Version   string           // of the program
}

// maker makes the writer of one format.
type maker struct {
	format string
	make   func(io.Writer, Options) Writer
}

func makers() []maker {
	return []maker{
		{"text", newText},
		{"json", newJSON},
		{"sarif", newSARIF},
		{"junit", newJUnit},
		{"markdown", newMarkdown},
	}
}

// Formats gives the names of the formats.
func Formats() []string {
	var names []string
	for _, m := range makers() {
		names = append(names, m.format)
	}
	return names
}

// New gives the writer of a format.
func New(format string, w io.Writer, opt Options) (Writer, error) {
	for _, m := range makers() {
		if m.format == format {
			return m.make(w, opt), nil
		}
	}
	return nil, fmt.Errorf("there is no format %q; the formats are %s", format, strings.Join(Formats(), ", "))
}
