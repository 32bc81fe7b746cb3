// Package sheet writes the calculation sheet: one self-contained page to read,
// print and sign. Prose stands as it was written, formulas are typeset, results
// stand behind the formulas that give them, and everything that a reviewer has
// to weigh (criteria, assumptions, waivers, findings) is said in words.
package sheet

import (
	"bufio"
	"bytes"
	"crypto/sha256"
	"encoding/hex"
	"fmt"
	"html"
	"io"
	"strings"

	"github.com/yuin/goldmark"
	"github.com/yuin/goldmark/extension"

	"inkjoule/check"
	"inkjoule/check/report"
	"inkjoule/lang"
)

// page is one sheet in the making.
type page struct {
	w    *bufio.Writer
	note *report.Note
	said map[*lang.Stmt][]*check.Finding
}

// Write writes the sheet of a reviewed note. The same note gives the same bytes:
// no date, no machine. The error is that of the stream.
func Write(w io.Writer, n *report.Note, version string) error {
	p := &page{w: bufio.NewWriter(w), note: n, said: map[*lang.Stmt][]*check.Finding{}}
	for i := range n.Findings {
		f := &n.Findings[i]
		p.said[n.StmtAt(f.Span.Start)] = append(p.said[n.StmtAt(f.Span.Start)], f)
	}
	sum := sha256.Sum256([]byte(n.Script.Source.Text))
	p.printf("<!DOCTYPE html>\n<html lang=\"en\">\n<head>\n<meta charset=\"utf-8\">\n<title>%s</title>\n<style>%s</style>\n</head>\n<body>\n", html.EscapeString(n.Path), style)
	p.printf("<p class=\"id\">Calculation sheet of %s, text %s, by inkjoule %s</p>\n", html.EscapeString(n.Path), hex.EncodeToString(sum[:6]), html.EscapeString(version))
	p.summary()
	p.hazards()
	p.body()
	p.lists()
	p.signatures()
	p.printf("</body>\n</html>\n")
	return p.w.Flush()
}

func (p *page) printf(format string, args ...any) { _, _ = fmt.Fprintf(p.w, format, args...) }

// style: black on white; yellow is the warning colour of ISO 3864-1 and stands
// for hazards alone.
const style = `
body { font: 11pt/1.45 Georgia, "DejaVu Serif", serif; color: #000; background: #fff; max-width: 46em; margin: 2em auto; padding: 0 1em; }
h1, h2, h3 { line-height: 1.2; margin: 1.4em 0 .5em; } h1 { font-size: 1.5em; } h2 { font-size: 1.2em; } h3 { font-size: 1em; }
table { border-collapse: collapse; margin: .6em 0; } th, td { border: 1px solid #000; padding: .2em .6em; text-align: left; vertical-align: top; }
.id { font-size: .85em; } .calc { margin: .35em 0 .35em 2em; } .calc .prop { margin-left: 2em; } .per { font-size: .85em; }
.finding { margin: .2em 0 .5em 4em; font-size: .92em; } .hazard { border: 2px solid #000; background: #f9a800; padding: .4em .8em; margin: .6em 0; }
.sign td { height: 2.6em; min-width: 9em; } math { font-size: 1.05em; }
@media print { body { margin: 0; max-width: none; } h2, h3 { break-after: avoid; } .calc, .hazard, tr { break-inside: avoid; } @page { margin: 20mm; } }
`

// summary says in a sentence how the review came out, and lists the criteria.
func (p *page) summary() {
	c := report.CountOf(p.note)
	p.printf("<p>%s.</p>\n", html.EscapeString(c.String()))
	head := "<table>\n<tr><th>Line</th><th>Criterion or check</th><th>Verdict</th><th>Source</th></tr>\n"
	for i := range p.note.Judged {
		g := &p.note.Judged[i]
		if g.Word == "assume" {
			continue
		}
		p.printf("%s<tr><td>%d</td><td>%s</td><td>%s</td><td>%s</td></tr>\n", head, p.line(g.Stmt.At), relation(g.Stmt, g.Text), verdict(g), html.EscapeString(g.Per))
		head = ""
	}
	if head == "" {
		p.printf("</table>\n")
	}
}

func (p *page) line(offset int) int {
	line, _ := p.note.Script.Source.Position(offset)
	return line
}

// verdict writes "holds, margin 19.4 %, at worst 8.1 %".
func verdict(g *lang.Judgement) string {
	if !g.Known {
		return "not known"
	}
	word := "holds"
	if !g.Holds {
		word = "fails"
	}
	text := fmt.Sprintf("%s, margin %.3g %%", word, 100*g.Margin)
	if g.Worst != g.Margin {
		text += fmt.Sprintf(", at worst %.3g %%", 100*g.Worst)
	}
	return minus(text)
}

// relation typesets the relation of a statement; its text where it is none.
func relation(s *lang.Stmt, text string) string {
	var rel *lang.Relation
	switch t := s.Tree.(type) {
	case *lang.Assume:
		rel = t.Rel
	case *lang.Criterion:
		rel = t.Rel
	case *lang.Check:
		rel = t.Rel
	}
	if rel == nil || len(rel.Terms) == 0 {
		return html.EscapeString(text)
	}
	parts := []string{expr(rel.Terms[0])}
	for i, o := range rel.Ops {
		parts = append(parts, op(strings.NewReplacer("<=", "≤", ">=", "≥", "<<", "≪", ">>", "≫").Replace(o)), expr(rel.Terms[i+1]))
	}
	return math(row(parts...))
}

// hazards come first, in the colour of a warning.
func (p *page) hazards() {
	for _, s := range p.note.Script.Stmts {
		if t, ok := s.Tree.(*lang.Safety); ok {
			p.printf("<div class=\"hazard\"><strong>Warning.</strong> %s%s</div>\n", html.EscapeString(t.Text.Text), per(t.Per))
		}
	}
}

// per writes a source in parentheses.
func per(q *lang.Quote) string {
	if q == nil {
		return ""
	}
	return fmt.Sprintf(" <span class=\"per\">(%s)</span>", html.EscapeString(q.Text))
}

// body writes prose and calculation in their order.
func (p *page) body() {
	src := p.note.Script.Source
	next, prose := 0, []string{}
	flush := func() {
		p.prose(strings.Join(prose, "\n"))
		prose = nil
	}
	for line := 0; line < src.Lines(); line++ {
		if next < len(p.note.Script.Stmts) {
			s := p.note.Script.Stmts[next]
			if src.Line(s.At) == line {
				flush()
				p.statement(s)
				line = src.Line(max(s.At, s.At+len(s.Text)-1))
				next++
				continue
			}
		}
		span := src.LineSpan(line)
		if text := strings.TrimPrefix(src.Text[span.Start:span.End], "\ufeff"); !strings.HasPrefix(strings.TrimLeft(text, " \t"), "#") || !strings.HasPrefix(text, "    ") {
			prose = append(prose, text)
		}
	}
	flush()
}

// prose renders what stands between the calculation; raw HTML in it is dropped.
func (p *page) prose(text string) {
	if strings.TrimSpace(text) == "" {
		return
	}
	var out bytes.Buffer
	if err := goldmark.New(goldmark.WithExtensions(extension.Table)).Convert([]byte(text), &out); err == nil {
		p.printf("%s", out.String())
	}
}

// lists are what the author assumes and answers for.
func (p *page) lists() {
	head := "<h2>Assumptions</h2>\n<ul>\n"
	for i := range p.note.Judged {
		if g := &p.note.Judged[i]; g.Word == "assume" {
			p.printf("%s<li>%s", head, relation(g.Stmt, g.Text))
			if g.Known {
				p.printf(": %s", verdict(g))
			}
			if g.Per != "" {
				p.printf(" <span class=\"per\">(%s)</span>", html.EscapeString(g.Per))
			}
			p.printf("</li>\n")
			head = ""
		}
	}
	if head == "" {
		p.printf("</ul>\n")
	}
	head = "<h2>Waivers</h2>\n<ul>\n"
	for _, w := range check.Waivers(p.note.Note, p.note.Findings) {
		about := w.Rule
		if w.Name != "" {
			about += " for " + w.Name
		}
		p.printf("%s<li>%s: %s</li>\n", head, html.EscapeString(about), html.EscapeString(w.Reason))
		head = ""
	}
	if head == "" {
		p.printf("</ul>\n")
	}
}

// signatures leaves room for those who answer for the sheet.
func (p *page) signatures() {
	p.printf("<table class=\"sign\">\n<tr><th></th><th>Name</th><th>Date</th><th>Signature</th></tr>\n")
	for _, who := range []string{"Prepared", "Checked", "Approved"} {
		p.printf("<tr><th>%s</th><td></td><td></td><td></td></tr>\n", who)
	}
	p.printf("</table>\n<p>%s</p>\n", html.EscapeString(report.Safety))
}
