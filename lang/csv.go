package lang

import (
	"encoding/csv"
	"errors"
	"fmt"
	"io"
	"path"
	"slices"
	"strconv"
	"strings"
)

// This file reads the rows of a table from a file beside the note. The file
// becomes a table tree of its own, so that everything after it is the same as
// for rows written in the note; its places are that of the quoted path.

// csvTable is a file that was read, kept for the next analysis.
type csvTable struct {
	text  string
	tree  *Table
	fault *Fault // statement-relative
}

// filled is the table with the rows of its file, if it names one.
func (a *analysis) filled(s *Stmt, t *Table) *Table {
	if t.File == nil {
		return t
	}
	fail := func(message, detail string) *Table {
		a.faults = append(a.faults, Fault{Rule: "unknown-note", Severity: Error, Span: t.File.Span.Shift(s.At), Message: message, Detail: detail})
		return t
	}
	if a.opt.Files == nil {
		return fail("files cannot be read here", "")
	}
	text, err := a.opt.Files.Read(a.ctx, path.Join(path.Dir(a.opt.Path), t.File.Text))
	if err != nil {
		return fail(fmt.Sprintf("%q cannot be read: %v", t.File.Text, err), "the path is relative to this note and stays inside the workspace")
	}
	c := a.csv(t, text)
	if c.fault != nil {
		a.faults = append(a.faults, c.fault.shift(s.At))
	}
	return c.tree
}

// csv reads a file's text, or takes over what was read of the same text.
func (a *analysis) csv(t *Table, text string) *csvTable {
	if a.previous != nil {
		if old := a.previous.csv[t]; old != nil && old.text == text {
			a.keepCSV(t, old)
			return old
		}
	}
	c := &csvTable{text: text}
	r := csvReader{t: t, name: t.File.Text}
	c.tree, c.fault = r.read(text)
	a.keepCSV(t, c)
	return c
}

func (a *analysis) keepCSV(t *Table, c *csvTable) {
	if a.csvRead == nil {
		a.csvRead = map[*Table]*csvTable{}
	}
	a.csvRead[t] = c
}

// csvReader reads one file.
type csvReader struct {
	t    *Table
	name string
}

// node gives synthetic nodes the place of the quoted path.
func (r csvReader) node() Node { return Node{Span: r.t.File.Span, ID: r.t.ID} }

func (r csvReader) fault(message, detail string) *Fault {
	return &Fault{Rule: "syntax", Severity: Error, Span: r.t.File.Span, Message: r.name + ": " + message, Detail: detail}
}

// read gives the table with its rows. A fault in a row leaves the table
// without rows, so that no value rests on half a file.
func (r csvReader) read(text string) (*Table, *Fault) {
	out := *r.t
	in := csv.NewReader(strings.NewReader(strings.TrimPrefix(text, bom)))
	in.Comma, in.Comment, in.FieldsPerRecord, in.TrimLeadingSpace = separator(text), '#', -1, true
	head, err := in.Read()
	if err != nil {
		return &out, r.fault("the first line names the columns with their units, as in `H [A/m],B [T]`", "")
	}
	places, fault := r.columns(&out, head)
	if fault != nil {
		return &out, fault
	}
	for {
		record, err := in.Read()
		if errors.Is(err, io.EOF) {
			return &out, nil
		}
		if err != nil {
			out.Rows = nil
			return &out, r.fault(err.Error(), "")
		}
		line, _ := in.FieldPos(0)
		row, fault := r.row(record, len(head), places, line)
		if fault != nil {
			out.Rows = nil
			return &out, fault
		}
		out.Rows = append(out.Rows, row)
	}
}

// separator is what divides the cells: a tab, a semicolon, else a comma.
func separator(text string) rune {
	first, _, _ := strings.Cut(text, "\n")
	for _, c := range "\t;" {
		if strings.ContainsRune(first, c) {
			return c
		}
	}
	return ','
}

// columns matches the columns of the note with those of the file; a note that
// names none takes all. places are the file's columns that fill the rows.
func (r csvReader) columns(out *Table, head []string) (places []int, fault *Fault) {
	heads := make([]*Column, len(head))
	for i, h := range head {
		name, u := columnHead(h)
		if name == "" {
			return nil, r.fault(fmt.Sprintf("column %d has no name", i+1), "")
		}
		heads[i] = &Column{Node: r.node(), Name: Ident{Node: r.node(), Text: name}}
		if u != "" {
			heads[i].Unit = &UnitPhrase{Span: r.t.File.Span, Text: u}
		}
	}
	if len(r.t.Columns) == 0 {
		out.Columns = heads
		for i := range heads {
			places = append(places, i)
		}
		return places, nil
	}
	out.Columns = nil
	for _, c := range r.t.Columns {
		if c.Formula != nil {
			out.Columns = append(out.Columns, c)
			continue
		}
		at := slices.IndexFunc(heads, func(h *Column) bool { return CanonicalName(h.Name.Text) == CanonicalName(c.Name.Text) })
		if at < 0 {
			return nil, r.fault(fmt.Sprintf("there is no column %s", c.Name.Text), "it has "+list(names(heads)))
		}
		own := *c
		if h := heads[at]; h.Unit != nil && c.Unit != nil && h.Unit.Text != c.Unit.Text {
			return nil, r.fault(fmt.Sprintf("column %s is in %s, and the note says %s", c.Name.Text, h.Unit.Text, c.Unit.Text), "write the unit of the file")
		} else if c.Unit == nil {
			own.Unit = h.Unit
		}
		out.Columns, places = append(out.Columns, &own), append(places, at)
	}
	return places, nil
}

func names(cs []*Column) []string {
	out := make([]string, len(cs))
	for i, c := range cs {
		out[i] = c.Name.Text
	}
	return out
}

// columnHead reads `H [A/m]`, `H/(A/m)` and `H/T` (ISO 80000-1, 7.1).
func columnHead(s string) (name, u string) {
	s = strings.TrimSpace(s)
	if i := strings.IndexByte(s, '['); i >= 0 {
		return strings.TrimSpace(s[:i]), strings.TrimSpace(strings.TrimSuffix(s[i+1:], "]"))
	}
	if n, u, ok := strings.Cut(s, "/"); ok {
		u = strings.TrimSpace(u)
		if strings.HasPrefix(u, "(") && strings.HasSuffix(u, ")") {
			u = u[1 : len(u)-1]
		}
		return strings.TrimSpace(n), u
	}
	return s, ""
}

// row reads one line of the file.
func (r csvReader) row(record []string, want int, places []int, line int) (*Row, *Fault) {
	if len(record) != want {
		return nil, r.fault(fmt.Sprintf("line %d has %d %s, and the head has %d", line, len(record), plural("cell", len(record)), want), "was a decimal comma written?")
	}
	out := &Row{Node: r.node()}
	for _, i := range places {
		cell := strings.TrimSpace(record[i])
		x, err := strconv.ParseFloat(strings.ReplaceAll(cell, "−", "-"), 64)
		if err != nil {
			return nil, r.fault(fmt.Sprintf("line %d: %q is no number", line, cell), "numbers take a decimal point")
		}
		out.Cells = append(out.Cells, &Literal{Node: r.node(), Num: Numeral{Text: cell, Value: x}})
	}
	return out, nil
}
