package lsp

import (
	"context"
	"slices"
	"strings"

	"go.lsp.dev/protocol"

	"inkjoule/lang"
)

// fixAllKind is the action that an editor may run at each save.
const fixAllKind protocol.CodeActionKind = "source.fixAll.joule"

// codeActions offer the corrections of findings and the values to be written.
func codeActions() feature {
	return feature{
		offer: func(c *client, to *protocol.ServerCapabilities) {
			if !c.has("textDocument.codeAction.codeActionLiteralSupport") {
				return // such a client could only run commands
			}
			to.CodeActionProvider = &protocol.CodeActionOptions{CodeActionKinds: []protocol.CodeActionKind{
				protocol.CodeActionKindQuickFix, protocol.CodeActionKindRefactorRewrite, protocol.CodeActionKindRefactorExtract, fixAllKind,
			}}
		},
		methods: map[string]method{protocol.MethodTextDocumentCodeAction: request(actions)},
	}
}

// actionParams are CodeActionParams without the client's diagnostics, which may
// belong to an older text: what can be done follows from the present one.
type actionParams struct {
	TextDocument protocol.TextDocumentIdentifier `json:"textDocument"`
	Range        protocol.Range                  `json:"range"`
	Context      struct {
		Only []string `json:"only"`
	} `json:"context"`
}

func actions(ctx context.Context, v *view, p *actionParams) (any, error) {
	s, err := v.whole(ctx, p.TextDocument.URI)
	if err != nil {
		return nil, err
	}
	if s.found, err = s.doc.findings(ctx); err != nil {
		return nil, err
	}
	within := s.doc.mapper().RangeToSpan(p.Range)
	out := []protocol.CommandOrCodeAction{}
	for _, offer := range actionKinds() {
		if wanted(offer.kind, p.Context.Only) {
			out = append(out, offer.make(s, within)...)
		}
	}
	return out, nil
}

// An offer makes the actions of one kind for a place.
type offer struct {
	kind protocol.CodeActionKind
	make func(s *spot, within lang.Span) []protocol.CommandOrCodeAction
}

func actionKinds() []offer {
	return []offer{
		{protocol.CodeActionKindQuickFix, (*spot).fixes},
		{protocol.CodeActionKindQuickFix, (*spot).writeAsked},
		{protocol.CodeActionKindQuickFix, (*spot).waivers},
		{protocol.CodeActionKindRefactorRewrite, (*spot).writeResults},
		{protocol.CodeActionKindRefactorExtract, (*spot).extractions},
		{fixAllKind, (*spot).fixAll},
	}
}

// wanted reports whether the client asks for a kind: by name or by what the
// name begins with. Actions on the whole note are for those who ask for them.
func wanted(kind protocol.CodeActionKind, only []string) bool {
	if len(only) == 0 {
		return !strings.HasPrefix(string(kind), "source.")
	}
	for _, o := range only {
		if o == "" || string(kind) == o || strings.HasPrefix(string(kind), o+".") {
			return true
		}
	}
	return false
}

// touches reports whether two spans share a byte or a boundary.
func touches(a, b lang.Span) bool { return a.Start <= b.End && b.Start <= a.End }

// fixes are the corrections of the findings at a place.
func (s *spot) fixes(within lang.Span) []protocol.CommandOrCodeAction {
	var out []protocol.CommandOrCodeAction
	rep := s.view.reporter(s.doc)
	for _, f := range s.found {
		if f.Fix == nil || f.IsWaived() || len(f.Fix.Edits) == 0 || !touches(f.Span, within) {
			continue
		}
		a := s.action(f.Fix.Title, protocol.CodeActionKindQuickFix, f.Fix.Edits)
		a.Diagnostics = []protocol.Diagnostic{rep.diagnostic(f)}
		if s.view.client.can("textDocument.codeAction.isPreferredSupport") {
			a.IsPreferred = ptr(true)
		}
		out = append(out, a)
	}
	return out
}

// writeAsked writes the value that a blank at a place asks for.
func (s *spot) writeAsked(within lang.Span) []protocol.CommandOrCodeAction {
	return s.write(within, protocol.CodeActionKindQuickFix, func(h hint) bool { return h.asked })
}

// writeResults writes a computed value beside its formula.
func (s *spot) writeResults(within lang.Span) []protocol.CommandOrCodeAction {
	return s.write(within, protocol.CodeActionKindRefactorRewrite, func(h hint) bool { return !h.asked })
}

func (s *spot) write(within lang.Span, kind protocol.CodeActionKind, fits func(hint) bool) []protocol.CommandOrCodeAction {
	var out []protocol.CommandOrCodeAction
	for _, sym := range s.note.Symbols {
		h, ok := s.hint(sym)
		if ok && fits(h) && touches(definitionSpan(sym), within) {
			out = append(out, s.action("Write the result "+strings.TrimPrefix(h.value, "= "), kind, []lang.Edit{h.write}))
		}
	}
	return out
}

// fixAll corrects the writing of statements that could not be read, where it is
// clear what was meant. It may run at each save, so it never touches what has a
// meaning: a stated result that differs, or a name that is not known, is for a
// person to look at. Where there is nothing to do there is no action: an empty
// one would make each save an edit.
func (s *spot) fixAll(lang.Span) []protocol.CommandOrCodeAction {
	var edits []lang.Edit
	for _, f := range s.found {
		if f.Rule == "syntax" && f.Fix != nil && !guesses(f.Fix) && !overlapsAny(edits, f.Fix.Edits) {
			edits = append(edits, f.Fix.Edits...)
		}
	}
	if len(edits) == 0 {
		return nil
	}
	return []protocol.CommandOrCodeAction{s.action("Correct the writing", fixAllKind, edits)}
}

// guesses reports whether a correction may miss what was meant: a comma in a
// number stands for a point or for nothing.
func guesses(f *lang.Fix) bool {
	return slices.ContainsFunc(f.Edits, func(e lang.Edit) bool { return e.New == "." })
}

func overlapsAny(all, more []lang.Edit) bool {
	for _, a := range all {
		for _, b := range more {
			if touches(a.Span, b.Span) {
				return true
			}
		}
	}
	return false
}

// action is a code action that edits this note.
func (s *spot) action(title string, kind protocol.CodeActionKind, edits []lang.Edit) *protocol.CodeAction {
	return &protocol.CodeAction{Title: title, Kind: &kind, Edit: s.view.workspaceEdit(map[*snapshot][]lang.Edit{s.doc: edits})}
}
