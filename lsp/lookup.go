package lsp

import (
	"context"
	"sort"

	"go.lsp.dev/protocol"
	"go.lsp.dev/uri"

	"inkjoule/check"
	"inkjoule/lang"
)

// A spot is a place in an analysed note, as most requests name it.
type spot struct {
	view  *view
	doc   *snapshot
	note  *lang.Note
	all   *reading
	found []check.Finding // only where the request is about them
	at    int             // note offset
}

// spot finds what a position means. It waits for the analysis.
func (v *view) spot(ctx context.Context, p protocol.TextDocumentPositionParams) (*spot, error) {
	s, err := v.whole(ctx, p.TextDocument.URI)
	if err == nil {
		s.at = s.doc.mapper().PositionToOffset(p.Position)
	}
	return s, err
}

// whole is the spot of a request for a whole note.
func (v *view) whole(ctx context.Context, u uri.URI) (*spot, error) {
	doc, err := v.note(u)
	if err != nil {
		return nil, err
	}
	a, err := doc.read(ctx)
	if err != nil {
		return nil, err
	}
	return &spot{view: v, doc: doc, note: a.note, all: a}, nil
}

// stmt is the statement at the spot, or nil. Its end belongs to it.
func (s *spot) stmt() *lang.Stmt { return s.note.StmtAt(s.at) }

// path is the chain of nodes at the spot, outermost first; a node's end
// belongs to it, and of two that touch the later one is taken.
func (s *spot) path() []lang.Tree {
	stmt := s.stmt()
	if stmt == nil || stmt.Tree == nil {
		return nil
	}
	return pathTo(stmt.Tree, s.at-stmt.At)
}

func pathTo(top lang.Tree, at int) []lang.Tree {
	path := []lang.Tree{top}
	for {
		var next lang.Tree
		for _, c := range lang.Children(path[len(path)-1]) {
			if c.Place().Contains(at) {
				next = c
			}
		}
		if next == nil {
			return path
		}
		path = append(path, next)
	}
}

// use is the use or definition of a name at the spot, or nil: the shortest that
// stands there.
func (s *spot) use() *lang.Use {
	all := s.all.uses()
	end := sort.Search(len(all), func(i int) bool { return all[i].Span.Start > s.at })
	var best *lang.Use
	for i := end - 1; i >= 0 && s.at-all[i].Span.Start <= longestName; i-- {
		if u := &all[i]; u.Span.Contains(s.at) && (best == nil || u.Span.Len() < best.Span.Len()) {
			best = u
		}
	}
	return best
}

// longestName bounds how far the beginning of a use is looked for, in bytes.
const longestName = 1000

// sameSymbol reports whether two symbols, perhaps of two analyses, are one.
func sameSymbol(a, b *lang.Symbol) bool {
	return a == b || a != nil && b != nil && a.Key == b.Key && a.Role == b.Role && a.Role != lang.RoleParameter
}

// members are the properties, columns or parts of a name.
func members(note *lang.Note, owner *lang.Symbol) []*lang.Symbol {
	var out []*lang.Symbol
	for _, m := range note.Symbols {
		if m.Owner == owner {
			out = append(out, m)
		}
	}
	return out
}
