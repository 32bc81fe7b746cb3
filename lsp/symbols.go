package lsp

import (
	"context"

	"go.lsp.dev/protocol"

	"inkjoule/lang"
)

// documentSymbols list what a note defines, with the values.
func documentSymbols() feature {
	return feature{
		offer: func(_ *client, to *protocol.ServerCapabilities) {
			to.DocumentSymbolProvider = &protocol.DocumentSymbolOptions{}
		},
		methods: map[string]method{protocol.MethodTextDocumentDocumentSymbol: request(outline)},
	}
}

func outline(ctx context.Context, v *view, p *protocol.DocumentSymbolParams) (any, error) {
	s, err := v.whole(ctx, p.TextDocument.URI)
	if err != nil {
		return nil, err
	}
	tree := s.outline()
	if v.client.can("textDocument.documentSymbol.hierarchicalDocumentSymbolSupport") {
		return protocol.DocumentSymbolSlice(tree), nil
	}
	return protocol.SymbolInformationSlice(flat(nil, tree, "", s.doc)), nil
}

// outline builds the tree: properties and columns below what they belong to.
func (s *spot) outline() []protocol.DocumentSymbol {
	at := s.doc.mapper().ascending()
	below := map[*lang.Symbol][]protocol.DocumentSymbol{}
	for _, sym := range s.note.Symbols {
		if sym.Owner != nil && sym.Stmt != nil {
			below[sym.Owner] = append(below[sym.Owner], entry(at, sym))
		}
	}
	out := []protocol.DocumentSymbol{}
	for _, sym := range s.note.Symbols {
		if sym.Owner != nil || sym.Stmt == nil || sym.Role == lang.RoleParameter || sym.Role == lang.RoleConstant {
			continue
		}
		e := entry(at, sym)
		e.Children = below[sym]
		out = append(out, e)
	}
	return out
}

// entry is a symbol in the outline. The range of the name lies within the
// range of the definition: editors refuse the whole reply otherwise.
func entry(at mapper, sym *lang.Symbol) protocol.DocumentSymbol {
	whole := definitionSpan(sym)
	e := protocol.DocumentSymbol{
		Name: sym.Name, Kind: symbolKind(sym),
		Range: at.SpanToRange(whole), SelectionRange: at.SpanToRange(sym.Span),
	}
	if detail := detailOf(sym); detail != "" {
		e.Detail = &detail
	}
	return e
}

// definitionSpan is the statement that defines a name, or its part of one, with
// the name.
func definitionSpan(sym *lang.Symbol) lang.Span {
	whole := sym.Span
	switch {
	case sym.Def != nil:
		whole = sym.Stmt.Abs(sym.Def)
	case sym.Owner == nil && sym.Stmt != nil:
		whole = lang.Span{Start: sym.Stmt.At, End: sym.Stmt.At + len(sym.Stmt.Text)}
	}
	return lang.Span{Start: min(whole.Start, sym.Span.Start), End: max(whole.End, sym.Span.End)}
}

// detailOf is a symbol's value, or else its kind.
func detailOf(sym *lang.Symbol) string {
	switch {
	case sym.Known && sym.Shown != "":
		return sym.Shown
	case sym.Facts.Kind != 0:
		return sym.Facts.Kind.String()
	}
	return ""
}

func symbolKind(sym *lang.Symbol) protocol.SymbolKind {
	switch sym.Role {
	case lang.RoleFunction:
		return protocol.SymbolKindFunction
	case lang.RoleMedium:
		return protocol.SymbolKindClass
	case lang.RoleProperty:
		return protocol.SymbolKindProperty
	case lang.RoleRegion:
		return protocol.SymbolKindInterface
	case lang.RoleTable:
		return protocol.SymbolKindArray
	case lang.RoleColumn:
		return protocol.SymbolKindField
	case lang.RoleNote:
		return protocol.SymbolKindModule
	}
	if sym.Input {
		return protocol.SymbolKindConstant
	}
	return protocol.SymbolKindVariable
}

// flat lists the tree for clients that show no hierarchy.
func flat(to []protocol.SymbolInformation, tree []protocol.DocumentSymbol, container string, doc *snapshot) []protocol.SymbolInformation {
	for _, e := range tree {
		info := protocol.SymbolInformation{
			BaseSymbolInformation: protocol.BaseSymbolInformation{Name: e.Name, Kind: e.Kind},
			Location:              protocol.Location{URI: doc.uri, Range: e.Range},
		}
		if container != "" {
			info.ContainerName = &container
		}
		to = flat(append(to, info), e.Children, e.Name, doc)
	}
	return to
}
