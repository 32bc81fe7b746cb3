package sheet

import (
	"fmt"
	"html"
	"strings"

	"inkjoule/check"
	"inkjoule/lang"
)

// statement writes one statement and what was found in it.
func (p *page) statement(s *lang.Stmt) {
	if _, ok := s.Tree.(*lang.Safety); !ok {
		p.printf("<div class=\"calc\">%s</div>\n", p.typeset(s))
	}
	for _, f := range p.said[s] {
		p.finding(f)
	}
}

// finding writes a finding in words; advice is for the author and left out.
func (p *page) finding(f *check.Finding) {
	switch {
	case f.IsWaived():
		p.printf("<div class=\"finding\">Waived by the author (%s): %s. Reason: %s</div>\n", html.EscapeString(f.Rule), coded(f.Message), html.EscapeString(f.Waived))
	case f.Severity > lang.Advice:
		word := "Caution"
		if f.Severity == lang.Error {
			word = "Error"
		}
		p.printf("<div class=\"finding\"><strong>%s:</strong> %s (%s). %s</div>\n", word, coded(f.Message), html.EscapeString(f.Rule), coded(f.Detail))
	}
}

// typeset writes a statement; one that is read by nobody stands as its text.
func (p *page) typeset(s *lang.Stmt) string {
	switch t := s.Tree.(type) {
	case *lang.Definition:
		return p.definition(s, t)
	case *lang.Medium:
		return p.medium(s, t)
	case *lang.Region:
		return fmt.Sprintf("Region %s%s: %s%s", math(name(t.Name.Text)), in(t.In), math(expr(t.Shape)), per(t.Per))
	case *lang.Table:
		return table(t)
	case *lang.Regime:
		if t.X == nil || t.Name == nil {
			return fmt.Sprintf("Regime: %s%s", html.EscapeString(t.Word.Text), per(t.Per))
		}
		return fmt.Sprintf("Regime: %s at %s%s", html.EscapeString(t.Word.Text), math(row(name(t.Name.Text), op("="), expr(t.X))), per(t.Per))
	case *lang.Uses:
		return "Uses " + html.EscapeString(t.Path.Text)
	case *lang.Assume:
		return "Assumed: " + p.judged(s)
	case *lang.Criterion:
		return "Criterion: " + p.judged(s)
	case *lang.Check:
		return "Check: " + p.judged(s)
	case *lang.Waive:
		return fmt.Sprintf("Waived: %s, %s", html.EscapeString(t.Rule.Text), html.EscapeString(t.Reason.Text))
	}
	return "<code>" + html.EscapeString(s.Text) + "</code>"
}

func in(m *lang.Ident) string {
	if m == nil {
		return ""
	}
	return " in " + html.EscapeString(m.Text)
}

// judged writes a relation with its verdict.
func (p *page) judged(s *lang.Stmt) string {
	for i := range p.note.Judged {
		if g := &p.note.Judged[i]; g.Stmt == s {
			text := relation(s, g.Text)
			if g.Known {
				text += " <strong>" + verdict(g) + "</strong>"
			}
			if g.Per != "" {
				text += fmt.Sprintf(" <span class=\"per\">(%s)</span>", html.EscapeString(g.Per))
			}
			return text
		}
	}
	return html.EscapeString(s.Text)
}

// definition writes what a name stands for, its formula, and its value.
func (p *page) definition(s *lang.Stmt, d *lang.Definition) string {
	var words []string
	if d.Kind != nil {
		words = append(words, html.EscapeString(d.Kind.Text))
	}
	if d.In != nil {
		words = append(words, "in "+html.EscapeString(d.In.Text))
	}
	head := strings.Join(words, " ")
	if head != "" {
		head = strings.ToUpper(head[:1]) + head[1:] + ": "
	}
	left := name(d.Name.Text)
	if len(d.Params) > 0 {
		params := make([]string, len(d.Params))
		for i, q := range d.Params {
			params[i] = name(q.Text)
		}
		left = row(left, op("("), strings.Join(params, op(",")), op(")"))
	}
	parts := []string{left}
	for _, m := range d.Members {
		if _, blank := m.(*lang.Blank); !blank {
			parts = append(parts, op("="), expr(m))
		}
	}
	return head + math(row(parts...)) + p.value(s, d) + ranges(d.For) + pieces(d) + per(d.Per)
}

// value is the computed value, where the note does not state it itself.
func (p *page) value(s *lang.Stmt, d *lang.Definition) string {
	for _, sym := range p.note.Symbols {
		if sym.Stmt != s || sym.Def != d {
			continue
		}
		if sym.Known && !sym.Stated && !sym.Input && len(d.Params) == 0 && sym.Shown != "" {
			return " = " + html.EscapeString(printed(sym.Shown))
		}
		if !sym.Known && !sym.Input && len(d.Params) == 0 && sym.Role == lang.RoleQuantity {
			return " <em>(no value)</em>"
		}
	}
	return ""
}

// printed writes a shown value as print has it: a minus sign, the unit with its
// superscripts. The unit follows the last blank outside of parentheses.
func printed(shown string) string {
	depth, at := 0, -1
	for i, r := range shown {
		switch r {
		case '(', '[':
			depth++
		case ')', ']':
			depth--
		case ' ':
			if depth == 0 {
				at = i
			}
		}
	}
	if at < 0 {
		return minus(shown)
	}
	return minus(shown[:at]) + " " + unitText(shown[at+1:])
}

// coded escapes a message and sets what stands in backquotes as code.
func coded(s string) string {
	parts := strings.Split(html.EscapeString(s), "`")
	for i := 1; i < len(parts); i += 2 {
		parts[i] = "<code>" + parts[i] + "</code>"
	}
	return strings.Join(parts, "")
}

// ranges writes `for x from a to b`.
func ranges(rs []*lang.Range) string {
	var b strings.Builder
	for _, r := range rs {
		if r.From != nil && r.To != nil {
			fmt.Fprintf(&b, " for %s", math(row(expr(r.From), op("≤"), expr(r.Var), op("≤"), expr(r.To))))
		}
	}
	return b.String()
}

// pieces writes the further pieces of a piecewise definition.
func pieces(d *lang.Definition) string {
	var b strings.Builder
	for _, q := range d.Pieces {
		b.WriteString("; " + math(expr(q.X)))
		if q.For != nil {
			b.WriteString(ranges([]*lang.Range{q.For}))
		}
		b.WriteString(per(q.Per))
	}
	return b.String()
}

// medium writes a medium with its properties.
func (p *page) medium(s *lang.Stmt, m *lang.Medium) string {
	adjectives := make([]string, len(m.Adjectives))
	for i, a := range m.Adjectives {
		adjectives[i] = html.EscapeString(a.Text)
	}
	var b strings.Builder
	fmt.Fprintf(&b, "Medium <strong>%s</strong>", html.EscapeString(m.Name.Text))
	if len(adjectives) > 0 {
		b.WriteString(": " + strings.Join(adjectives, ", "))
	}
	b.WriteString(per(m.Per))
	for _, d := range m.Properties {
		fmt.Fprintf(&b, "<div class=\"prop\">%s</div>", p.definition(s, d))
	}
	return b.String()
}

// table writes a table as a table.
func table(t *lang.Table) string {
	var b strings.Builder
	fmt.Fprintf(&b, "Table %s%s<table><tr>", html.EscapeString(t.Name.Text), per(t.Per))
	for _, c := range t.Columns {
		unit := ""
		if c.Unit != nil {
			unit = " in " + html.EscapeString(unitText(c.Unit.Text))
		}
		fmt.Fprintf(&b, "<th>%s%s</th>", math(name(c.Name.Text)), unit)
	}
	b.WriteString("</tr>")
	for _, r := range t.Rows {
		b.WriteString("<tr>")
		for _, c := range r.Cells {
			fmt.Fprintf(&b, "<td>%s</td>", html.EscapeString(minus(c.Num.Text)))
		}
		b.WriteString("</tr>")
	}
	b.WriteString("</table>")
	return b.String()
}
