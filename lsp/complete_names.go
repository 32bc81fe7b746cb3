package lsp

import (
	"slices"
	"strings"
	"unicode/utf8"

	"go.lsp.dev/protocol"

	"inkjoule/lang"
	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file offers names with their values, members after a point, and units.

// names are what a formula may use: local names first, then the note's, the
// functions, the constants.
func (s *spot) names(c cursor) []item {
	var out []item
	for _, name := range s.localNames(c) {
		out = append(out, item{label: name, detail: "local", kind: protocol.CompletionItemKindVariable})
	}
	for _, sym := range s.note.Symbols {
		if sym.Owner == nil && sym.Role != lang.RoleParameter {
			out = append(out, s.nameItem(sym, 1))
		}
	}
	for _, f := range functions() {
		out = append(out, item{label: f.name, detail: f.label(), doc: &card{parts: []part{{text: f.doc}}}, kind: protocol.CompletionItemKindFunction, rank: 2})
	}
	for _, k := range eval.Constants() {
		if sym := s.note.Lookup(k.Name); sym != nil {
			out = append(out, s.nameItem(sym, 3))
		}
	}
	return append(out, s.clauses(c)...)
}

// localNames are those of the statement: of its tree where it has one, since a
// range may stand behind the cursor, else of what has been written.
func (s *spot) localNames(c cursor) []string {
	out := c.bound()
	if stmt := s.near(); stmt != nil && stmt.Tree != nil {
		for _, l := range localsOf(stmt.Tree) {
			out = append(out, s.text(l.binder.Shift(stmt.At)))
		}
	}
	slices.Sort(out)
	return slices.Compact(out)
}

// clauses are the words that go on with a statement.
func (s *spot) clauses(c cursor) []item {
	if c.before() == "" || !c.spaced() {
		return nil
	}
	var out []item
	for _, w := range []struct{ word, text string }{
		{"per", "the source"}, {"for", "a range"}, {"from", "a lower bound"}, {"to", "an upper bound"}, {"at", "a value"}, {"over", "a region"},
	} {
		k := keyword(w.word, w.text)
		k.rank = 4
		out = append(out, k)
	}
	return out
}

func (s *spot) nameItem(sym *lang.Symbol, rank int) item {
	it := item{label: sym.Name, detail: detailOf(sym), kind: itemKind(sym), rank: rank}
	if it.detail == "" {
		it.detail = roleWord(sym.Role)
	}
	return it
}

func itemKind(sym *lang.Symbol) protocol.CompletionItemKind {
	switch sym.Role {
	case lang.RoleFunction:
		return protocol.CompletionItemKindFunction
	case lang.RoleMedium:
		return protocol.CompletionItemKindClass
	case lang.RoleProperty:
		return protocol.CompletionItemKindProperty
	case lang.RoleRegion, lang.RoleTable:
		return protocol.CompletionItemKindStruct
	case lang.RoleColumn:
		return protocol.CompletionItemKindField
	case lang.RoleConstant:
		return protocol.CompletionItemKindConstant
	case lang.RoleNote:
		return protocol.CompletionItemKindModule
	}
	return protocol.CompletionItemKindVariable
}

// ownersIn are the media and regions after `in` in a head.
func (s *spot) ownersIn(c cursor) (offering, bool) {
	before := c.before()
	if !c.inHead() || !strings.HasSuffix(before, " in") || strings.Contains(before, ":") {
		return offering{}, false
	}
	o := offering{typed: c.word}
	for _, sym := range s.note.Symbols {
		if sym.Role == lang.RoleMedium || sym.Role == lang.RoleRegion {
			o.items = append(o.items, s.nameItem(sym, 1))
		}
	}
	return o, true
}

// members are what may follow `NAME.`.
func (s *spot) members(c cursor) (offering, bool) {
	chain, ok := c.owner()
	if !ok {
		return offering{}, false
	}
	o := offering{typed: c.word}
	sym := s.note.Lookup(lang.CanonicalName(chain))
	if sym == nil {
		return o, true
	}
	for _, m := range members(s.note, sym) {
		o.items = append(o.items, s.nameItem(m, 1))
	}
	switch sym.Role {
	case lang.RoleMedium:
		o.items = append(o.items, s.derived(sym)...)
	case lang.RoleRegion:
		for _, m := range []string{"volume", "area", "length", "boundary"} {
			o.items = append(o.items, item{label: m, detail: "measure", kind: protocol.CompletionItemKindField, rank: 1})
		}
	case lang.RoleNote:
		o.items = append(o.items, s.fromNote(sym)...)
	default:
		o.items = append(o.items, components(sym.Facts.Shape)...)
	}
	return o, true
}

// derived are the properties that follow from the stated ones, and those of a
// medium of another note.
func (s *spot) derived(medium *lang.Symbol) []item {
	stated := map[string]bool{}
	for _, m := range members(s.note, medium) {
		stated[lastKey(m.Key)] = true
	}
	twin := map[string]string{"eps": "eps_r", "eps_r": "eps", "mu": "mu_r", "mu_r": "mu", "sigma": "rho", "rho": "sigma"}
	var out []item
	for _, p := range propertyNames() {
		switch sym := s.note.Lookup(medium.Key + "." + p); {
		case stated[p]:
		case sym != nil:
			out = append(out, s.nameItem(sym, 1))
		case stated[twin[p]]:
			out = append(out, item{label: p, detail: "from " + twin[p], kind: protocol.CompletionItemKindProperty, rank: 2})
		}
	}
	return out
}

// fromNote are the names of a note that is referred to by an alias.
func (s *spot) fromNote(alias *lang.Symbol) []item {
	targets := referred(s.note, alias)
	if len(targets) == 0 {
		return nil
	}
	other, err := s.view.sibling(s.doc, targets[0].path)
	if err != nil {
		return nil
	}
	a, err := other.read(s.view.ctx)
	if err != nil {
		return nil
	}
	var out []item
	for _, sym := range a.note.Symbols {
		if sym.Owner == nil {
			out = append(out, s.nameItem(sym, 1))
		}
	}
	return out
}

func components(shape eval.Shape) []item {
	names := map[eval.Shape]string{eval.Vector: "x y z", eval.Tensor: "xx xy xz yx yy yz zx zy zz"}[shape]
	var out []item
	for _, n := range strings.Fields(names) {
		out = append(out, item{label: n, detail: "component", kind: protocol.CompletionItemKindField})
	}
	return out
}

// units after a number: those of the expected dimension first.
func (s *spot) units(c cursor) (offering, bool) {
	phrase, ok := c.phrase()
	if !ok {
		return offering{}, false
	}
	from := 0
	if i := strings.LastIndexAny(phrase, "/·.("); i >= 0 {
		_, size := utf8.DecodeRuneInString(phrase[i:])
		from = i + size
	}
	o := offering{typed: phrase[from:]}
	if from == 0 {
		o.items = s.expectedUnits(c)
	}
	want, known := s.expected(c)
	for _, e := range unit.Symbols() {
		it := item{label: e.Symbol, detail: e.Name, kind: protocol.CompletionItemKindUnit, rank: 2}
		if u, fault := unit.Parse(e.Symbol); known && from == 0 && fault == nil && u.Dim.Compatible(want) {
			it.rank = 1
		}
		o.items = append(o.items, it)
	}
	return o, true
}

// expected is the dimension that the statement at the cursor should have.
func (s *spot) expected(c cursor) (unit.Dim, bool) {
	head, _, _ := strings.Cut(c.lastLine(), "=")
	if _, words, ok := strings.Cut(head, ","); ok {
		if _, k, fault := kind.Parse(strings.TrimSpace(words)); fault == nil && k != 0 {
			return k.Dim(), true
		}
	}
	stmt := s.near()
	for _, sym := range s.note.Symbols {
		if stmt != nil && sym.Stmt == stmt && sym.Owner == nil {
			return sym.Facts.Dim, sym.Facts.Known
		}
	}
	return unit.Dim{}, false
}

// expectedUnits are the coherent unit of the expected dimension and its usual
// multiples.
func (s *spot) expectedUnits(c cursor) []item {
	want, known := s.expected(c)
	coherent := unit.Coherent(want)
	if !known || coherent.IsZero() || want.IsOne() {
		return nil
	}
	var out []item
	for _, prefix := range []string{"", "k", "m", "µ", "M", "n", "G", "p"} {
		u, fault := unit.Parse(prefix + coherent.Symbol)
		if fault == nil && u.Dim.Compatible(want) {
			out = append(out, item{label: u.Symbol, detail: "of the right dimension", kind: protocol.CompletionItemKindUnit})
		}
	}
	return out
}
