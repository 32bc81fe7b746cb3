package lsp

import (
	"cmp"
	"context"
	"path"
	"slices"
	"strings"

	"go.lsp.dev/protocol"
	"go.lsp.dev/uri"

	"inkjoule/lang"
)

// maxSymbols bounds the answer to a query; exact names come first.
const maxSymbols = 256

// workspaceSymbols find a name in all notes of the workspace.
func workspaceSymbols() feature {
	return feature{
		offer: func(_ *client, to *protocol.ServerCapabilities) {
			to.WorkspaceSymbolProvider = &protocol.WorkspaceSymbolOptions{}
		},
		methods: map[string]method{protocol.MethodWorkspaceSymbol: request(findSymbols)},
	}
}

func findSymbols(ctx context.Context, v *view, p *protocol.WorkspaceSymbolParams) (any, error) {
	var fits []ranked
	for _, u := range v.everyNote(ctx) {
		all, err := v.symbolsOf(ctx, u)
		if ctx.Err() != nil {
			return nil, ctx.Err()
		}
		if err != nil {
			continue // a note that can't be read has no names
		}
		for _, sym := range all {
			if rank := likeness(sym.Name, p.Query); rank > 0 {
				fits = append(fits, ranked{sym, rank})
			}
		}
	}
	slices.SortStableFunc(fits, func(a, b ranked) int { return cmp.Compare(a.rank, b.rank) })
	out := protocol.WorkspaceSymbolSlice{}
	for _, f := range fits[:min(len(fits), maxSymbols)] {
		out = append(out, f.sym)
	}
	return out, nil
}

type ranked struct {
	sym  protocol.WorkspaceSymbol
	rank int
}

// likeness ranks a name against a query: 1 the same name (Greek twins are), 2
// the same letters, 3 begins so, 4 holds it, 5 holds its letters in order, 0
// none of these.
func likeness(name, query string) int {
	key, wanted := lang.CanonicalName(name), lang.CanonicalName(query)
	low, low2 := strings.ToLower(key), strings.ToLower(wanted)
	switch {
	case key == wanted:
		return 1
	case low == low2:
		return 2
	case strings.HasPrefix(low, low2):
		return 3
	case strings.Contains(low, low2):
		return 4
	case holds(low, low2):
		return 5
	}
	return 0
}

// symbolsOf are the names that a note defines.
func (v *view) symbolsOf(ctx context.Context, u uri.URI) ([]protocol.WorkspaceSymbol, error) {
	if v.docs[u] == nil {
		r, err := v.record(ctx, u)
		if err != nil {
			return nil, err
		}
		return r.symbols, nil
	}
	s, err := v.whole(ctx, u)
	if err != nil {
		return nil, err
	}
	return s.workspaceSymbols(), nil
}

// workspaceSymbols lists the note's names for queries over all notes.
func (s *spot) workspaceSymbols() []protocol.WorkspaceSymbol {
	at := s.doc.mapper().ascending()
	var out []protocol.WorkspaceSymbol
	for _, sym := range s.note.Symbols {
		if sym.Stmt == nil || sym.Path != "" || sym.Role == lang.RoleParameter || sym.Role == lang.RoleConstant {
			continue
		}
		container := path.Base(s.doc.home.path)
		if sym.Owner != nil {
			container = sym.Owner.Name + " in " + container
		}
		out = append(out, protocol.WorkspaceSymbol{
			BaseSymbolInformation: protocol.BaseSymbolInformation{Name: sym.Name, Kind: symbolKind(sym), ContainerName: &container},
			Location:              &protocol.Location{URI: s.doc.uri, Range: at.SpanToRange(sym.Span)},
		})
	}
	return out
}

// everyNote lists the notes of all workspace folders and the open documents.
func (v *view) everyNote(ctx context.Context) []uri.URI {
	var out []uri.URI
	seen := map[uri.URI]bool{}
	add := func(u uri.URI) {
		if !seen[u] {
			seen[u] = true
			out = append(out, u)
		}
	}
	for _, f := range v.folders {
		for _, u := range v.notesOf(ctx, string(f)) {
			add(u)
		}
	}
	open := make([]uri.URI, 0, len(v.docs))
	for u := range v.docs {
		open = append(open, u)
	}
	slices.Sort(open)
	for _, u := range open {
		add(u)
	}
	return out
}
