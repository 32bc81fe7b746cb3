package report

import (
	"bufio"
	"fmt"
	"io"
	"strings"

	"inkjoule/check"
	"inkjoule/lang"
)

// Safety is the sentence under every text summary: what a review is not.
const Safety = "A clean review is not an approval: the figures are for a qualified person to verify; " +
	"local codes and standards and licensed practice prevail."

// text writes findings in the GNU error form, each with its source line.
type text struct {
	w     *bufio.Writer
	count Count
	paint painter
}

func newText(w io.Writer, opt Options) Writer {
	return &text{w: bufio.NewWriterSize(w, 1<<16), paint: painter(opt.Color)}
}

func (t *text) Note(n *Note) error {
	t.count.Add(CountOf(n))
	t.against(n)
	for i := range n.Findings {
		if !n.Findings[i].IsWaived() {
			t.finding(n, &n.Findings[i])
		}
	}
	for _, w := range check.Waivers(n.Note, n.Findings) {
		t.waiver(n, w)
	}
	return t.w.Flush()
}

// against writes what became of the results since a revision.
func (t *text) against(n *Note) {
	c := n.Against
	if c == nil {
		return
	}
	if c.Added {
		t.printf("%s: new since %s\n", clean(n.Path), clean(c.Revision))
		return
	}
	for _, f := range c.Flips {
		t.printf("%s:%d: since %s: %s\n", clean(n.Path), f.Line, clean(c.Revision), oneLine(f.text()))
	}
	for _, ch := range c.Changes {
		at := clean(n.Path)
		if ch.Line > 0 {
			at += fmt.Sprintf(":%d", ch.Line)
		}
		t.printf("%s: since %s: %s\n", at, clean(c.Revision), oneLine(ch.text()))
	}
}

func (t *text) finding(n *Note, f *check.Finding) {
	src := n.Script.Source
	line, column := src.Position(f.Span.Start)
	t.printf("%s: %s: %s %s\n", t.paint.place(fmt.Sprintf("%s:%d:%d", f.Path, line, column)),
		t.paint.severity(f.Severity), oneLine(f.Message), t.paint.rule("["+f.Rule+"]"))
	code, marks := Excerpt(src, f.Span)
	t.printf("    %s\n    %s\n", code, t.paint.marks(f.Severity, marks))
	for _, s := range strings.Split(strings.TrimSpace(f.Detail), "\n") {
		if s != "" {
			t.printf("    %s\n", clean(s))
		}
	}
	for _, r := range f.Related {
		t.printf("    %s: %s\n", relatedPlace(n, r), oneLine(r.Message))
	}
}

// relatedPlace is path:line:column of a further place. The line of a place in
// another note is not known here, and its path alone is given.
func relatedPlace(n *Note, r lang.Related) string {
	if r.Path != "" && r.Path != n.Path {
		return r.Path
	}
	line, column := n.Script.Source.Position(r.Span.Start)
	return fmt.Sprintf("%s:%d:%d", n.Path, line, column)
}

func (t *text) waiver(n *Note, w check.Waiver) {
	if w.Used == 0 {
		return // a finding of its own
	}
	line, column := n.Script.Source.Position(w.Span.Start)
	about := w.Rule
	if w.Name != "" {
		about += " for " + w.Name
	}
	t.printf("%s:%d:%d: waived: %s: %s\n", n.Path, line, column, clean(about), oneLine(w.Reason))
}

// Problem goes to standard error by its caller; here it would break the form.
func (t *text) Problem(string) error { return nil }

func (t *text) Close() error {
	t.printf("%s.\n%s\n", t.count, Safety)
	return t.w.Flush()
}

// printf keeps the first error inside the buffer; Flush gives it.
func (t *text) printf(format string, args ...any) { _, _ = fmt.Fprintf(t.w, format, args...) }

// oneLine joins the lines of a message and makes it safe to show.
func oneLine(s string) string { return clean(strings.Join(strings.Fields(s), " ")) }
