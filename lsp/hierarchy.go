package lsp

import (
	"context"
	"slices"
	"strings"

	"go.lsp.dev/protocol"
	"go.lsp.dev/uri"

	"inkjoule/lang"
)

// dependencies is the call hierarchy: what a value depends on and what depends
// on it, criteria and checks included.
func dependencies() feature {
	return feature{
		offer: func(_ *client, to *protocol.ServerCapabilities) {
			to.CallHierarchyProvider = &protocol.CallHierarchyOptions{}
		},
		methods: map[string]method{
			protocol.MethodTextDocumentPrepareCallHierarchy: request(prepareHierarchy),
			protocol.MethodCallHierarchyIncomingCalls:       request(incoming),
			protocol.MethodCallHierarchyOutgoingCalls:       request(outgoing),
		},
	}
}

// itemParams are the parameters of both directions; of the item only what
// finds it again.
type itemParams struct {
	Item struct {
		URI            uri.URI        `json:"uri"`
		SelectionRange protocol.Range `json:"selectionRange"`
	} `json:"item"`
}

func (p *itemParams) position() protocol.TextDocumentPositionParams {
	return protocol.TextDocumentPositionParams{
		TextDocument: protocol.TextDocumentIdentifier{URI: p.Item.URI}, Position: p.Item.SelectionRange.Start,
	}
}

func prepareHierarchy(ctx context.Context, v *view, p *protocol.CallHierarchyPrepareParams) (any, error) {
	s, err := v.spot(ctx, p.TextDocumentPositionParams)
	if err != nil {
		return nil, err
	}
	out := []protocol.CallHierarchyItem{}
	if u := s.use(); u != nil {
		if it, ok := s.dependencyItem(u.Symbol); ok {
			out = append(out, it)
		}
	}
	return out, nil
}

// dependencyItem is a name as an item; false for one that no note defines.
func (s *spot) dependencyItem(sym *lang.Symbol) (protocol.CallHierarchyItem, bool) {
	if sym.Stmt == nil {
		return protocol.CallHierarchyItem{}, false
	}
	t := targetOf(sym)
	whole, ok := s.view.place(s.doc, t.path, t.whole)
	name, _ := s.view.place(s.doc, t.path, t.name)
	it := protocol.CallHierarchyItem{
		Name: qualifiedName(sym), Kind: symbolKind(sym), URI: whole.URI, Range: whole.Range, SelectionRange: name.Range,
	}
	if detail := detailOf(sym); detail != "" {
		it.Detail = &detail
	}
	return it, ok
}

// dependent is what uses names: a definition, or a statement without a name.
type dependent struct {
	sym  *lang.Symbol // nil: a statement without a name
	stmt *lang.Stmt
}

// dependents finds what places belong to.
type dependents map[*lang.Stmt][]*lang.Symbol

func dependentsOf(note *lang.Note) dependents {
	d := dependents{}
	for _, sym := range note.Symbols {
		if sym.Stmt != nil {
			d[sym.Stmt] = append(d[sym.Stmt], sym)
		}
	}
	return d
}

// at is the innermost definition of a statement that holds the offset, else
// the statement.
func (d dependents) at(stmt *lang.Stmt, offset int) dependent {
	var owner *lang.Symbol
	for _, sym := range d[stmt] {
		if sym.Owner == nil {
			owner = sym
		} else if sym.Def != nil && stmt.Abs(sym.Def).Contains(offset) {
			return dependent{sym, stmt}
		}
	}
	return dependent{owner, stmt}
}

// statementItem is a statement without a name as an item.
func (s *spot) statementItem(stmt *lang.Stmt) protocol.CallHierarchyItem {
	line, _, _ := strings.Cut(stmt.Text, "\n")
	r := s.doc.mapper().SpanToRange(lang.Span{Start: stmt.At, End: stmt.At + len(strings.TrimRight(line, "\r"))})
	return protocol.CallHierarchyItem{Name: strings.TrimSpace(line), Kind: protocol.SymbolKindEvent, URI: s.doc.uri, Range: r, SelectionRange: r}
}

// incoming lists what depends on a value, in all notes of the work.
func incoming(ctx context.Context, v *view, p *itemParams) (any, error) {
	out := []protocol.CallHierarchyIncomingCall{}
	s, err := v.spot(ctx, p.position())
	if err != nil {
		return nil, err
	}
	name := s.named()
	if name == nil || name.local != nil {
		return out, nil
	}
	for _, f := range s.everywhere(ctx, name) {
		a, err := f.doc.read(ctx)
		if err != nil {
			return nil, err
		}
		there := &spot{view: v, doc: f.doc, note: a.note, all: a}
		out = append(out, there.users(f.found)...)
	}
	return out, nil
}

// users groups the places of a name by what they belong to.
func (s *spot) users(places []occurrence) []protocol.CallHierarchyIncomingCall {
	var order []dependent
	ranges := map[dependent][]protocol.Range{}
	at := s.doc.mapper().ascending()
	all := dependentsOf(s.note)
	for _, o := range places {
		stmt := s.note.StmtAt(o.span.Start)
		if o.defines || stmt == nil {
			continue
		}
		d := all.at(stmt, o.span.Start)
		if ranges[d] == nil {
			order = append(order, d)
		}
		ranges[d] = append(ranges[d], at.SpanToRange(o.span))
	}
	var out []protocol.CallHierarchyIncomingCall
	for _, d := range order {
		from := s.statementItem(d.stmt)
		if d.sym != nil {
			from, _ = s.dependencyItem(d.sym)
		}
		out = append(out, protocol.CallHierarchyIncomingCall{From: from, FromRanges: ranges[d]})
	}
	return out
}

// outgoing lists what a value, or a statement, depends on.
func outgoing(ctx context.Context, v *view, p *itemParams) (any, error) {
	s, err := v.spot(ctx, p.position())
	if err != nil {
		return nil, err
	}
	out := []protocol.CallHierarchyOutgoingCall{}
	stmt := s.stmt()
	if stmt == nil {
		return out, nil
	}
	all := dependentsOf(s.note)
	self := all.at(stmt, s.at)
	whole := lang.Span{Start: stmt.At, End: stmt.At + len(stmt.Text)}
	at := s.doc.mapper()
	for _, u := range s.all.uses() {
		inside := whole.Start <= u.Span.Start && u.Span.End <= whole.End
		if !inside || u.Define || u.Symbol.Role == lang.RoleConstant || all.at(stmt, u.Span.Start) != self {
			continue
		}
		to, ok := s.dependencyItem(u.Symbol)
		if !ok {
			continue
		}
		r := at.SpanToRange(s.lastPart(u.Span))
		i := slices.IndexFunc(out, func(c protocol.CallHierarchyOutgoingCall) bool {
			return c.To.URI == to.URI && c.To.SelectionRange == to.SelectionRange
		})
		if i < 0 {
			out = append(out, protocol.CallHierarchyOutgoingCall{To: to})
			i = len(out) - 1
		}
		out[i].FromRanges = append(out[i].FromRanges, r)
	}
	return out, nil
}
