package lsp

import (
	"cmp"
	"context"
	"slices"
	"strings"

	"go.lsp.dev/protocol"

	"inkjoule/lang"
)

// navigation leads from a name to its definition, its medium and its uses.
func navigation() feature {
	return feature{
		offer: func(_ *client, to *protocol.ServerCapabilities) {
			to.DefinitionProvider = &protocol.DefinitionOptions{}
			to.TypeDefinitionProvider = &protocol.TypeDefinitionOptions{}
			to.ReferencesProvider = &protocol.ReferenceOptions{}
			to.DocumentHighlightProvider = &protocol.DocumentHighlightOptions{}
		},
		methods: map[string]method{
			protocol.MethodTextDocumentDefinition:        request(definition),
			protocol.MethodTextDocumentTypeDefinition:    request(typeDefinition),
			protocol.MethodTextDocumentReferences:        request(references),
			protocol.MethodTextDocumentDocumentHighlight: request(highlight),
		},
	}
}

func definition(ctx context.Context, v *view, p *protocol.DefinitionParams) (any, error) {
	s, err := v.spot(ctx, p.TextDocumentPositionParams)
	if err != nil {
		return nil, err
	}
	name := s.named()
	if name == nil {
		return protocol.LocationSlice{}, nil
	}
	links := s.links(name.at, name.definitions(s.note))
	return s.locations(links, "textDocument.definition.linkSupport"), nil
}

// typeDefinition leads to the media from which a quantity's value came.
func typeDefinition(ctx context.Context, v *view, p *protocol.TypeDefinitionParams) (any, error) {
	s, err := v.spot(ctx, p.TextDocumentPositionParams)
	if err != nil {
		return nil, err
	}
	u := s.use()
	if u == nil {
		return protocol.LocationSlice{}, nil
	}
	links := s.links(u.Span, s.media(u.Symbol))
	return s.locations(links, "textDocument.typeDefinition.linkSupport"), nil
}

// media are the media that a name belongs to or that entered its value.
func (s *spot) media(sym *lang.Symbol) []target {
	switch {
	case sym.Role == lang.RoleMedium:
		return []target{targetOf(sym)}
	case sym.Owner != nil:
		return []target{targetOf(sym.Owner)}
	}
	var out []target
	for _, key := range sym.Facts.Media {
		if m := s.note.Lookup(key); m != nil {
			out = append(out, targetOf(m))
		}
	}
	return out
}

// target is a definition: the whole of it and the name in it.
type target struct {
	path        string // "" for the note at hand
	whole, name lang.Span
}

func targetOf(sym *lang.Symbol) target {
	if sym.Path != "" {
		return target{sym.Path, sym.Span, sym.Span}
	}
	return target{"", definitionSpan(sym), sym.Span}
}

// links turns definitions into links from an origin; what has no file is left
// out, and each place comes once.
func (s *spot) links(origin lang.Span, to []target) []protocol.LocationLink {
	out := []protocol.LocationLink{}
	from := s.doc.mapper().SpanToRange(origin)
	for _, t := range to {
		whole, ok := s.view.place(s.doc, t.path, t.whole)
		name, _ := s.view.place(s.doc, t.path, t.name)
		if !ok || slices.ContainsFunc(out, func(l protocol.LocationLink) bool {
			return l.TargetURI == whole.URI && l.TargetSelectionRange == name.Range
		}) {
			continue
		}
		out = append(out, protocol.LocationLink{
			OriginSelectionRange: &from, TargetURI: whole.URI, TargetRange: whole.Range, TargetSelectionRange: name.Range,
		})
	}
	return out
}

// locations gives links to a client that shows them, else plain locations.
func (s *spot) locations(links []protocol.LocationLink, capability string) protocol.DefinitionResult {
	if s.view.client.can(capability) {
		return definitionLinks(links)
	}
	out := protocol.LocationSlice{}
	for _, l := range links {
		out = append(out, protocol.Location{URI: l.TargetURI, Range: l.TargetSelectionRange})
	}
	return out
}

func references(ctx context.Context, v *view, p *protocol.ReferenceParams) (any, error) {
	s, err := v.spot(ctx, p.TextDocumentPositionParams)
	if err != nil {
		return nil, err
	}
	out := []protocol.Location{}
	name := s.named()
	if name == nil {
		return out, nil
	}
	for _, place := range s.everywhere(ctx, name) {
		at := place.doc.mapper().ascending()
		for _, o := range place.found {
			if o.defines && !p.Context.IncludeDeclaration {
				continue
			}
			out = append(out, protocol.Location{URI: place.doc.uri, Range: at.SpanToRange(o.span)})
		}
	}
	slices.SortStableFunc(out, func(a, b protocol.Location) int { return strings.Compare(string(a.URI), string(b.URI)) })
	return out, nil
}

func highlight(ctx context.Context, v *view, p *protocol.DocumentHighlightParams) (any, error) {
	s, err := v.spot(ctx, p.TextDocumentPositionParams)
	if err != nil {
		return nil, err
	}
	out := []protocol.DocumentHighlight{}
	name := s.named()
	if name == nil {
		return out, nil
	}
	at := s.doc.mapper().ascending()
	for _, o := range name.occurrences(s.all) {
		kind := protocol.DocumentHighlightKindRead
		if o.defines {
			kind = protocol.DocumentHighlightKindWrite
		}
		out = append(out, protocol.DocumentHighlight{Range: at.SpanToRange(o.span), Kind: kind})
	}
	return out, nil
}

// byPlace orders occurrences as they stand in the text.
func byPlace(a, b occurrence) int { return cmp.Compare(a.span.Start, b.span.Start) }

func definitionLinks(links []protocol.LocationLink) protocol.DefinitionLinkSlice {
	out := make(protocol.DefinitionLinkSlice, len(links))
	for i, l := range links {
		out[i] = protocol.DefinitionLink(l)
	}
	return out
}
