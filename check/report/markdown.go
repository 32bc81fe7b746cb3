package report

import (
	"bufio"
	"fmt"
	"io"
	"strings"

	"inkjoule/check"
	"inkjoule/lang"
)

// markdown writes the summary that a reviewer reads in a merge request: what
// was agreed and by what margin it holds, what was assumed, what the author
// answers for, and what was found.
type markdown struct {
	w     *bufio.Writer
	count Count
}

func newMarkdown(w io.Writer, _ Options) Writer {
	return &markdown{w: bufio.NewWriterSize(w, 1<<16)}
}

func (m *markdown) Note(n *Note) error {
	c := CountOf(n)
	m.count.Add(c)
	m.printf("## %s\n\n%s read, %s computed: %s, %s, %s advice.\n", inCode(n.Path),
		some(c.Statements, "statement"), some(c.Values, "value"), some(c.Errors, "error"), some(c.Cautions, "caution"), amount(c.Advice))
	m.judged(n)
	m.against(n)
	m.assumptions(n)
	m.waivers(n)
	m.findings(n)
	m.printf("\n")
	return m.w.Flush()
}

// judged is the table of what was agreed.
func (m *markdown) judged(n *Note) {
	head := "\n| line | | relation | verdict | margin | at worst | source |\n|---:|---|---|---|---:|---:|---|\n"
	for i := range n.Judged {
		g := &n.Judged[i]
		if g.Word == "assume" {
			continue
		}
		verdict, margin, worst := "not known", "", ""
		if g.Known {
			verdict = "holds"
			if !g.Holds {
				verdict = "**fails**"
			}
			margin, worst = fmt.Sprintf("%.3g %%", 100*g.Margin), fmt.Sprintf("%.3g %%", 100*g.Worst)
		}
		m.printf("%s| %d | %s | %s | %s | %s | %s | %s |\n", head, lineOf(n, g.Stmt.At), g.Word, strings.ReplaceAll(inCode(g.Text), "|", "\\|"), verdict, margin, worst, plain(g.Per))
		head = ""
	}
}

// against is the table of what changed since a revision.
func (m *markdown) against(n *Note) {
	c := n.Against
	switch {
	case c == nil:
		return
	case c.Added:
		m.printf("\nThe note is new since %s.\n", inCode(c.Revision))
		return
	case len(c.Changes)+len(c.Flips) == 0:
		m.printf("\nNo result changed since %s.\n", inCode(c.Revision))
		return
	}
	if len(c.Flips) > 0 {
		m.printf("\nVerdicts that changed since %s:\n\n", inCode(c.Revision))
	}
	for _, f := range c.Flips {
		m.printf("- line %d: %s\n", f.Line, plain(f.text()))
	}
	head := fmt.Sprintf("\nChanged since %s:\n\n| name | | before | now | factor |\n|---|---|---|---|---:|\n", inCode(c.Revision))
	for _, ch := range c.Changes {
		role, factor := "result", ""
		if ch.Input {
			role = "input"
		}
		if ch.Factor != 0 {
			factor = fmt.Sprintf("%.4g", ch.Factor)
		}
		m.printf("%s| %s | %s | %s | %s | %s |\n", head, inCode(ch.Name), role, plain(ch.Old), plain(ch.New), factor)
		head = ""
	}
}

func (m *markdown) assumptions(n *Note) {
	head := "\nAssumed:\n\n"
	for i := range n.Judged {
		g := &n.Judged[i]
		if g.Word != "assume" {
			continue
		}
		m.printf("%s- line %d: %s", head, lineOf(n, g.Stmt.At), plain(g.Text))
		head = ""
		if g.Known && !g.Holds {
			m.printf(" — **does not hold**")
		}
		if g.Per != "" {
			m.printf(" (%s)", plain(g.Per))
		}
		m.printf("\n")
	}
}

func (m *markdown) waivers(n *Note) {
	head := "\nWaived by the author:\n\n"
	for _, w := range check.Waivers(n.Note, n.Findings) {
		about := inCode(w.Rule)
		if w.Name != "" {
			about += " for " + inCode(w.Name)
		}
		m.printf("%s- line %d: %s: %s (%s)\n", head, lineOf(n, w.Span.Start), about, plain(w.Reason), some(w.Used, "finding"))
		head = ""
	}
}

func (m *markdown) findings(n *Note) {
	head := "\nFound:\n\n"
	for i := range n.Findings {
		f := &n.Findings[i]
		if f.IsWaived() {
			continue
		}
		m.printf("%s- line %d, %s, %s: %s", head, lineOf(n, f.Span.Start), severityOf(f), inCode(f.Rule), plain(sentence(f.Message)))
		head = ""
		if d := oneLine(f.Detail); d != "" {
			m.printf(" %s", plain(sentence(d)))
		}
		m.printf("\n")
	}
}

// severityOf writes an error in bold: a merge request has no colours.
func severityOf(f *check.Finding) string {
	if f.Severity == lang.Error {
		return "**error**"
	}
	return f.Severity.String()
}

func (m *markdown) Problem(message string) error {
	m.printf("**Not reviewed:** %s\n\n", plain(message))
	return m.w.Flush()
}

func (m *markdown) Close() error {
	m.printf("%s.\n\n%s\n", m.count, Safety)
	return m.w.Flush()
}

func (m *markdown) printf(format string, args ...any) { _, _ = fmt.Fprintf(m.w, format, args...) }

// plain writes a text so that nothing in it is markup; spans in backquotes, as
// messages have them, stay code.
func plain(s string) string {
	var b strings.Builder
	for i, part := range strings.Split(oneLine(s), "`") {
		if i%2 == 1 {
			b.WriteString(inCode(part))
			continue
		}
		b.WriteString(escaper.Replace(part))
	}
	return b.String()
}

// inCode writes a text as code, also with backquotes in it.
func inCode(s string) string {
	s = oneLine(s)
	if strings.Contains(s, "`") {
		return "`` " + s + " ``"
	}
	return "`" + s + "`"
}

// escaper escapes what CommonMark, or HTML within it, takes for markup.
var escaper = strings.NewReplacer(`\`, `\\`, "*", `\*`, "_", `\_`, "[", `\[`, "]", `\]`, "<", "&lt;", ">", "&gt;", "|", `\|`, "#", `\#`, "~", `\~`, "&", "&amp;")
