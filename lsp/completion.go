package lsp

import (
	"context"
	"fmt"
	"strings"
	"unicode"

	"go.lsp.dev/protocol"

	"inkjoule/lang"
)

// maxItems bounds a list; more come as more is typed.
const maxItems = 400

// completions offer what may stand at the cursor.
func completions() feature {
	return feature{
		offer: func(_ *client, to *protocol.ServerCapabilities) {
			to.CompletionProvider = &protocol.CompletionOptions{TriggerCharacters: []string{".", `"`, "/", "["}}
		},
		methods: map[string]method{protocol.MethodTextDocumentCompletion: request(complete)},
	}
}

// An item is something that may be written at the cursor.
type item struct {
	label  string
	write  string // what is written, if not the label
	detail string // beside the label: a value, a unit's name
	doc    *card
	kind   protocol.CompletionItemKind
	rank   int // lists are shown by rank, then as they come
}

// offering is a list of items and the text before the cursor that they replace.
type offering struct {
	typed string
	items []item
}

func complete(ctx context.Context, v *view, p *protocol.CompletionParams) (any, error) {
	s, err := v.spot(ctx, p.TextDocumentPositionParams)
	if err != nil {
		return nil, err
	}
	list := &protocol.CompletionList{Items: []protocol.CompletionItem{}}
	c, ok := s.cursor()
	if !ok {
		return list, nil
	}
	o := s.offering(c)
	fits := o.fitting()
	if list.IsIncomplete = len(fits) > maxItems; list.IsIncomplete {
		fits = fits[:maxItems]
	}
	within := s.doc.mapper().SpanToRange(lang.Span{Start: s.at - len(o.typed), End: s.at})
	for i, it := range fits {
		list.Items = append(list.Items, v.completionItem(it, i, within))
	}
	return list, nil
}

// fitting are the items that hold the typed letters in their order, those that
// begin with them first. Clients filter again, by rules of their own.
func (o offering) fitting() []item {
	var first, rest []item
	typed := strings.ToLower(o.typed)
	for _, it := range o.items {
		label := strings.ToLower(it.label)
		switch {
		case strings.HasPrefix(label, typed) || strings.HasPrefix(lang.CanonicalName(label), lang.CanonicalName(typed)):
			first = append(first, it)
		case holds(label, typed):
			rest = append(rest, it)
		}
	}
	return append(first, rest...)
}

// holds reports whether the letters of typed occur in label in that order.
func holds(label, typed string) bool {
	for _, r := range typed {
		if unicode.IsSpace(r) {
			continue
		}
		at := strings.IndexRune(label, r)
		if at < 0 {
			return false
		}
		label = label[at:][len(string(r)):]
	}
	return true
}

// completionItem writes an item with a text edit: clients differ in what they
// take for the word to be replaced.
func (v *view) completionItem(it item, order int, within protocol.Range) protocol.CompletionItem {
	out := protocol.CompletionItem{
		Label:    it.label,
		Kind:     it.kind,
		SortText: protocol.NewOptional(fmt.Sprintf("%d%05d", it.rank, order)),
		TextEdit: &protocol.TextEdit{Range: within, NewText: orElse(it.write, it.label)},
	}
	if it.detail != "" {
		out.Detail = protocol.NewOptional(it.detail)
	}
	if it.doc != nil {
		out.Documentation = it.doc.content(v.client.markdown("textDocument.completion.completionItem.documentationFormat"))
	}
	return out
}

// offering finds what fits the place. The order of the cases is that of the
// language: a quotation hides everything, a number makes the next word a unit.
func (s *spot) offering(c cursor) offering {
	if inside, ok := c.quote(); ok {
		return s.paths(c, inside)
	}
	for _, f := range []func(cursor) (offering, bool){
		s.ruleNames, s.adjectives, s.shapes, s.regimes, s.kinds, s.ownersIn, s.members, s.units, s.openings,
	} {
		if o, ok := f(c); ok {
			return o
		}
	}
	if strings.HasSuffix(c.before(), ".") {
		return offering{typed: c.word} // a decimal point
	}
	return offering{c.word, s.names(c)}
}
