package lsp

import (
	"cmp"
	"context"
	"slices"
	"strings"
	"unicode/utf8"

	"go.lsp.dev/protocol"

	"inkjoule/lang"
)

// tokenType is an index of the legend.
type tokenType uint32

// The types, all of the standard ones, so that every theme has a colour.
const (
	tokKeyword tokenType = iota
	tokComment
	tokString
	tokNumber
	tokUnit
	tokWords // kinds, adjectives, rule names
	tokVariable
	tokParameter
	tokFunction
	tokProperty
	tokMedium
	tokStruct
	tokNamespace
)

// Modifiers, as bits.
const (
	modDeclaration = 1 << iota
	modReadonly    // an input or a constant
	modLibrary     // of the language
)

func legend() protocol.SemanticTokensLegend {
	return protocol.SemanticTokensLegend{
		TokenTypes: []string{"keyword", "comment", "string", "number", "type", "enumMember", "variable", "parameter",
			"function", "property", "class", "struct", "namespace"},
		TokenModifiers: []string{"declaration", "readonly", "defaultLibrary"},
	}
}

// semanticTokens colour statements by what the names stand for. Prose keeps
// the colours of the editor's own grammar.
func semanticTokens() feature {
	return feature{
		offer: func(_ *client, to *protocol.ServerCapabilities) {
			to.SemanticTokensProvider = &protocol.SemanticTokensOptions{Legend: legend(), Full: protocol.Boolean(true), Range: protocol.Boolean(true)}
		},
		methods: map[string]method{
			protocol.MethodTextDocumentSemanticTokensFull: request(func(ctx context.Context, v *view, p *protocol.SemanticTokensParams) (any, error) {
				return tokensOf(ctx, v, p.TextDocument, nil)
			}),
			protocol.MethodTextDocumentSemanticTokensRange: request(func(ctx context.Context, v *view, p *protocol.SemanticTokensRangeParams) (any, error) {
				return tokensOf(ctx, v, p.TextDocument, &p.Range)
			}),
		},
	}
}

func tokensOf(ctx context.Context, v *view, doc protocol.TextDocumentIdentifier, r *protocol.Range) (any, error) {
	s, err := v.whole(ctx, doc.URI)
	if err != nil {
		return nil, err
	}
	within := lang.Span{Start: 0, End: len(s.note.Script.Source.Text)}
	if r != nil {
		within = s.doc.mapper().RangeToSpan(*r)
	}
	return &protocol.SemanticTokens{Data: encodeTokens(s.doc.mapper().ascending(), s.tokens(within))}, nil
}

// token is a piece of text with its colour.
type token struct {
	span lang.Span
	kind tokenType
	mods uint32
}

// encodeTokens writes tokens as five numbers each: lines and columns from the
// token before, length, type, modifiers.
func encodeTokens(at mapper, all []token) []uint32 {
	data := make([]uint32, 0, 5*len(all))
	var last protocol.Position
	for _, t := range all {
		r := at.SpanToRange(t.span)
		column := r.Start.Character
		if r.Start.Line == last.Line {
			column -= last.Character
		}
		data = append(data, r.Start.Line-last.Line, column, r.End.Character-r.Start.Character, uint32(t.kind), t.mods)
		last = r.Start
	}
	return data
}

// tokens lists the tokens of the statements that touch a span, in the order of
// the text, none over another and each on one line.
func (s *spot) tokens(within lang.Span) []token {
	k := &colouring{spot: s}
	for _, u := range s.all.uses() {
		span := s.lastPart(u.Span)
		if touches(span, within) {
			k.use(span, u)
		}
	}
	for _, stmt := range s.note.Script.Stmts {
		if touches(within, lang.Span{Start: stmt.At, End: stmt.At + len(stmt.Text)}) {
			k.statement(stmt)
		}
	}
	slices.SortStableFunc(k.out, func(a, b token) int { return cmp.Compare(a.span.Start, b.span.Start) })
	return k.apart()
}

// colouring gathers tokens in any order; of two at one place the first counts.
type colouring struct {
	spot *spot
	out  []token
}

func (k *colouring) add(span lang.Span, kind tokenType, mods uint32) {
	if span.Len() > 0 {
		k.out = append(k.out, token{span, kind, mods})
	}
}

// apart drops what overlaps and splits what runs over a line end.
func (k *colouring) apart() []token {
	var out []token
	end := 0
	src := k.spot.note.Script.Source
	for _, t := range k.out {
		if t.span.Start < end {
			continue
		}
		end = t.span.End
		for line := src.Line(t.span.Start); t.span.Len() > 0; line++ {
			cut := min(t.span.End, src.LineSpan(line).End)
			if cut > t.span.Start {
				out = append(out, token{lang.Span{Start: t.span.Start, End: cut}, t.kind, t.mods})
			}
			if line+1 >= src.Lines() {
				break
			}
			t.span.Start = max(t.span.Start, src.LineSpan(line+1).Start)
		}
	}
	return out
}

func (k *colouring) use(span lang.Span, u lang.Use) {
	kind, mods := roleToken(u.Symbol)
	if u.Define {
		mods |= modDeclaration
	}
	k.add(span, kind, mods)
}

// roleToken is the colour of a name.
func roleToken(sym *lang.Symbol) (tokenType, uint32) {
	switch sym.Role {
	case lang.RoleFunction:
		return tokFunction, 0
	case lang.RoleMedium:
		return tokMedium, 0
	case lang.RoleProperty, lang.RoleColumn:
		return tokProperty, 0
	case lang.RoleRegion, lang.RoleTable:
		return tokStruct, 0
	case lang.RoleNote:
		return tokNamespace, 0
	case lang.RoleParameter:
		return tokParameter, 0
	case lang.RoleConstant:
		return tokVariable, modReadonly | modLibrary
	}
	if sym.Input {
		return tokVariable, modReadonly
	}
	return tokVariable, 0
}

func (k *colouring) statement(stmt *lang.Stmt) {
	if stmt.Tree != nil {
		for _, l := range localsOf(stmt.Tree) {
			for _, span := range l.all() {
				mods := uint32(0)
				if span == l.binder {
					mods = modDeclaration
				}
				k.add(span.Shift(stmt.At), tokParameter, mods)
			}
		}
		lang.Walk(stmt.Tree, func(t lang.Tree) bool { k.node(stmt, t); return true })
	}
	k.words(stmt)
}

// node colours what belongs to a node itself.
func (k *colouring) node(stmt *lang.Stmt, t lang.Tree) {
	switch n := t.(type) {
	case *lang.Literal:
		k.add(n.Num.Span.Shift(stmt.At), tokNumber, 0)
		if n.Spread != nil {
			k.spread(stmt, n.Spread)
		}
	case *lang.Paren:
		if n.Spread != nil {
			k.spread(stmt, n.Spread)
		}
	case *lang.Quote:
		k.add(stmt.Abs(n), tokString, 0)
	case *lang.Words:
		k.add(stmt.Abs(n), tokWords, 0)
	case *lang.Call:
		if _, ok := signatureOf(n.Fn.Text); ok && n.Of == nil {
			k.add(n.Fn.Span.Shift(stmt.At), tokFunction, modLibrary)
		}
	}
	if u := phraseOf(t); u != nil {
		k.add(u.Span.Shift(stmt.At), tokUnit, 0)
	}
}

func (k *colouring) spread(stmt *lang.Stmt, s *lang.Spread) {
	k.add(s.Num.Span.Shift(stmt.At), tokNumber, 0)
	if s.Unit != nil {
		k.add(s.Unit.Span.Shift(stmt.At), tokUnit, 0)
	}
}

// words colours the words of the language and the remarks, which have no node.
func (k *colouring) words(stmt *lang.Stmt) {
	text := stmt.Text
	for at := 0; at < len(text); {
		switch {
		case text[at] == '"':
			at = skipTo(text, at+1, "\"\n") + 1
		case text[at] == '#':
			end := skipTo(text, at, "\r\n")
			k.add(lang.Span{Start: at, End: end}.Shift(stmt.At), tokComment, 0)
			at = end
		default:
			end := at
			for end < len(text) {
				r, size := utf8.DecodeRuneInString(text[end:])
				if !nameRune(r) {
					break
				}
				end += size
			}
			if lang.IsReserved(text[at:end]) && text[at:end] != "pi" && text[at:end] != "π" {
				k.add(lang.Span{Start: at, End: end}.Shift(stmt.At), tokKeyword, 0)
			}
			at = max(end, at+1)
		}
	}
}

// skipTo is the offset of the next of some characters, or the end.
func skipTo(text string, at int, any string) int {
	if i := strings.IndexAny(text[min(at, len(text)):], any); i >= 0 {
		return at + i
	}
	return len(text)
}
