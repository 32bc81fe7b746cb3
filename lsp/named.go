package lsp

import (
	"path"
	"slices"
	"strings"

	"inkjoule/lang"
)

// named is the name at a spot: one of the note or of a note that it uses, or
// one that is local to a statement.
type named struct {
	sym   *lang.Symbol // nil for a local name
	local *local
	stmt  *lang.Stmt // of a local name
	text  string     // as it is spelled at the spot
	at    lang.Span  // the name at the spot, note offsets
}

// An occurrence is a place of a name, in note offsets.
type occurrence struct {
	span    lang.Span // the name itself, without an owner before a point
	defines bool
	derived bool // spelled as a property that follows from this one: mica.eps from eps_r
}

// named finds the name at the spot, or nil.
func (s *spot) named() *named {
	if stmt := s.stmt(); stmt != nil && stmt.Tree != nil {
		for _, l := range localsOf(stmt.Tree) {
			for _, span := range l.all() {
				if span = span.Shift(stmt.At); span.Contains(s.at) {
					return &named{local: l, stmt: stmt, text: s.text(span), at: span}
				}
			}
		}
	}
	u := s.use()
	if u == nil {
		return nil
	}
	span := s.lastPart(u.Span)
	return &named{sym: u.Symbol, text: s.text(span), at: span}
}

func (s *spot) text(span lang.Span) string { return s.note.Script.Source.Text[span.Start:span.End] }

// lastPart is the name after the last point of `mica.eps_r`.
func (s *spot) lastPart(span lang.Span) lang.Span { return lastPart(s.note, span) }

func lastPart(note *lang.Note, span lang.Span) lang.Span {
	text := note.Script.Source.Text[span.Start:span.End]
	return lang.Span{Start: span.Start + strings.LastIndexByte(text, '.') + 1, End: span.End}
}

// definitions are the places that define the name.
func (n *named) definitions(note *lang.Note) []target {
	if n.local == nil {
		switch {
		case n.sym.Stmt == nil:
			return nil
		case n.sym.Role == lang.RoleNote:
			return referred(note, n.sym)
		}
		return []target{targetOf(n.sym)}
	}
	if n.local.binder == (lang.Span{}) {
		return nil
	}
	at := n.local.binder.Shift(n.stmt.At)
	return []target{{"", at, at}}
}

// referred is the note that an alias stands for.
func referred(note *lang.Note, alias *lang.Symbol) []target {
	u, ok := alias.Stmt.Tree.(*lang.Uses)
	if !ok {
		return nil
	}
	return []target{{path: path.Join(path.Dir(note.Path), u.Path.Text)}}
}

// occurrences lists the places of the name in its note, in the order of the
// text.
func (n *named) occurrences(a *reading) []occurrence {
	if n.local == nil {
		return occurrencesOf(a, func(sym *lang.Symbol) bool { return sameSymbol(sym, n.sym) })
	}
	var out []occurrence
	for _, span := range n.local.all() {
		out = append(out, occurrence{span: span.Shift(n.stmt.At), defines: span == n.local.binder})
	}
	return out
}

// occurrencesOf lists the places of the names that fit, each once.
func occurrencesOf(a *reading, fits func(*lang.Symbol) bool) []occurrence {
	var out []occurrence
	note := a.note
	for _, u := range a.uses() {
		if !fits(u.Symbol) {
			continue
		}
		o := occurrence{span: lastPart(note, u.Span), defines: u.Define}
		spelled := lang.CanonicalName(note.Script.Source.Text[o.span.Start:o.span.End])
		o.derived = spelled != lang.CanonicalName(lastKey(u.Symbol.Key))
		out = append(out, o)
	}
	slices.SortStableFunc(out, byPlace)
	return slices.CompactFunc(out, func(a, b occurrence) bool { return a.span == b.span })
}

func lastKey(key string) string { return key[strings.LastIndexByte(key, '.')+1:] }

// identity tells a name from all others of the work: the note that defines it
// and its key there.
type symbolID struct{ path, key string }

// identityOf finds the identity of a symbol as note refers to it.
func identityOf(note *lang.Note, sym *lang.Symbol) symbolID {
	if sym.Path == "" {
		return symbolID{note.Path, sym.Key}
	}
	key := sym.Key
	if alias, rest, ok := strings.Cut(key, "."); ok {
		if a := note.Lookup(alias); a != nil && a.Role == lang.RoleNote {
			key = rest
		}
	}
	return symbolID{path.Clean(sym.Path), key}
}
