package lsp

import (
	"path"
	"path/filepath"
	"slices"
	"strings"

	"go.lsp.dev/protocol"

	"inkjoule/check/project"
	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/media"
)

// This file offers the words of the language: rules, adjectives, shapes,
// kinds, statements, paths.

func keyword(word, detail string) item {
	return item{label: word, detail: detail, kind: protocol.CompletionItemKindKeyword}
}

// ruleNames after `waive`, and names after its `for`.
func (s *spot) ruleNames(c cursor) (offering, bool) {
	if !c.opens("waive") || strings.Contains(c.line, ":") {
		return offering{}, false
	}
	rest := strings.TrimLeft(c.line[len("waive"):], " \t")
	if strings.Contains(rest, " for ") || strings.HasSuffix(c.before(), " for") {
		return offering{}, false
	}
	if strings.Contains(rest, " ") {
		return offering{c.word, []item{keyword("for", "the name that is spoken of")}}, true
	}
	o := offering{typed: rest}
	for _, r := range s.view.catalogue.All() {
		if !r.Firm {
			o.items = append(o.items, item{label: r.Name, detail: r.Title, doc: s.view.ruleCard(r.Name), kind: protocol.CompletionItemKindEnumMember})
		}
	}
	return o, true
}

// adjectives after `medium NAME:`, without those that are said.
func (s *spot) adjectives(c cursor) (offering, bool) {
	_, said, ok := strings.Cut(c.line, ":")
	if !c.opens("medium") || !ok || strings.Contains(c.line, "\n") {
		return offering{}, false
	}
	o := offering{typed: c.word}
	for _, a := range lang.Adjectives() {
		if !slices.Contains(strings.FieldsFunc(said, func(r rune) bool { return r == ',' || r == ' ' }), a) || a == c.word {
			o.items = append(o.items, keyword(a, "adjective of a medium"))
		}
	}
	return o, true
}

// shapes after `region NAME:`.
func (s *spot) shapes(c cursor) (offering, bool) {
	if !c.opens("region") || !strings.HasSuffix(c.before(), ":") {
		return offering{}, false
	}
	o := offering{typed: c.word}
	for _, f := range shapes() {
		o.items = append(o.items, item{label: f.name, detail: f.label(), doc: &card{parts: []part{{text: f.doc}}}, kind: protocol.CompletionItemKindConstructor})
	}
	return o, true
}

func (s *spot) regimes(c cursor) (offering, bool) {
	if !strings.HasPrefix(c.line, "regime:") || strings.TrimSpace(c.line[len("regime:"):]) != c.word {
		return offering{}, false
	}
	return offering{c.word, []item{
		keyword("static", "nothing changes in time"),
		keyword("harmonic", "sinusoidal at one frequency: `harmonic at f = …`"),
		keyword("transient", "values at an instant"),
	}}, true
}

// kinds after the comma of a head, with the qualifiers where none is said.
func (s *spot) kinds(c cursor) (offering, bool) {
	words, ok := c.kindWords()
	if !ok || c.opens("table") || c.opens("medium") && !strings.Contains(c.line, "\n") {
		return offering{}, false
	}
	o := offering{typed: words}
	before := kind.Words{}
	for more := true; more; {
		o.typed, more = before.Cut(o.typed)
	}
	for _, q := range kind.Qualifiers() {
		if before.Qualifier == kind.Unqualified {
			o.items = append(o.items, item{label: q, detail: "qualifier", kind: protocol.CompletionItemKindKeyword, rank: 1})
		}
	}
	for _, a := range kind.Adjectives() {
		if before.Takes(a) {
			o.items = append(o.items, item{label: a, detail: "waveform or coherence", kind: protocol.CompletionItemKindKeyword, rank: 1})
		}
	}
	for _, id := range kind.All() {
		info := id.Info()
		for _, name := range info.Names() {
			o.items = append(o.items, item{label: name, detail: info.Unit, doc: kindCard(name), kind: protocol.CompletionItemKindUnit, rank: 2})
		}
	}
	return o, true
}

// openings are the words that a statement begins with and, below a medium, the
// properties that it does not state yet.
func (s *spot) openings(c cursor) (offering, bool) {
	if c.lastLine() != c.word {
		return offering{}, false
	}
	if owner := s.mediumAbove(); owner != nil {
		return offering{c.word, s.missingProperties(owner)}, true
	}
	if strings.Contains(c.line, "\n") {
		return offering{}, false
	}
	o := offering{typed: c.word}
	for _, w := range lang.ReservedWords() {
		if text, ok := openingWords[w]; ok {
			o.items = append(o.items, keyword(w, text))
		}
	}
	return o, true
}

// openingWords tells what a statement that begins so says; read only.
var openingWords = map[string]string{
	"medium": "a material and its properties", "region": "a body, surface or line", "table": "data in rows",
	"uses": "takes the names of another note", "regime": "how quantities depend on time", "plot": "a plot for the sheet",
	"assume": "an assumption, verified if it is a relation", "criterion": "what must hold", "check": "a verified relation",
	"safety": "a hazard and what is done about it", "waive": "silences a rule, with the reason",
}

// mediumAbove is the medium to whose properties the spot's line belongs.
func (s *spot) mediumAbove() *lang.Medium {
	src := s.note.Script.Source
	line := src.LineSpan(src.Line(s.at))
	if line.Start == 0 {
		return nil
	}
	stmt := s.note.StmtAt(src.LineSpan(src.Line(line.Start - 1)).End)
	if stmt == nil {
		stmt = s.stmt()
	}
	if stmt == nil || stmt.At >= line.Start {
		return nil
	}
	m, ok := stmt.Tree.(*lang.Medium)
	if !ok || indentOf(src.Text[line.Start:line.End]) <= indentOf(src.Text[src.LineSpan(src.Line(stmt.At)).Start:]) {
		return nil
	}
	return m
}

// indentOf is the width of the blanks that a line begins with, tabs to the
// next multiple of four.
func indentOf(line string) int {
	n := 0
	for _, r := range line {
		switch r {
		case ' ':
			n++
		case '\t':
			n += 4 - n%4
		default:
			return n
		}
	}
	return n
}

func (s *spot) missingProperties(m *lang.Medium) []item {
	said := map[string]bool{}
	for _, p := range m.Properties {
		said[lang.CanonicalName(p.Name.Text)] = true
	}
	var out []item
	for _, name := range propertyNames() {
		if !said[name] && name != "eps_c" {
			out = append(out, item{label: name, write: name + " = ", detail: "property", kind: protocol.CompletionItemKindProperty})
		}
	}
	return out
}

// paths of other notes, and the chapters of the handbook, after `uses "`. In
// other quotations nothing is offered.
func (s *spot) paths(c cursor, inside string) offering {
	o := offering{typed: inside}
	if !strings.HasPrefix(c.line, "uses") {
		return o
	}
	for _, chapter := range media.Chapters() {
		o.items = append(o.items, item{label: media.Prefix + chapter, detail: "handbook", kind: protocol.CompletionItemKindModule})
	}
	home := s.doc.home
	if home.root == "" {
		return o
	}
	for _, u := range s.view.notesOf(s.view.ctx, home.root) {
		rel, err := filepath.Rel(filepath.Dir(home.file(home.path)), u.FsPath())
		if err == nil && u != s.doc.uri && project.IsNote(rel) {
			o.items = append(o.items, item{label: path.Clean(filepath.ToSlash(rel)), detail: "note", kind: protocol.CompletionItemKindFile, rank: 1})
		}
	}
	return o
}
