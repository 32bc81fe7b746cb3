package lsp

import (
	"context"
	"fmt"
	"slices"
	"strings"

	"go.lsp.dev/jsonrpc2"
	"go.lsp.dev/protocol"

	"inkjoule/lang"
	"inkjoule/lang/eval"
)

// renaming gives a name another spelling everywhere, Greek twins included.
func renaming() feature {
	return feature{
		offer: func(c *client, to *protocol.ServerCapabilities) {
			to.RenameProvider = protocol.Boolean(true)
			if c.can("textDocument.rename.prepareSupport") {
				to.RenameProvider = &protocol.RenameOptions{PrepareProvider: ptr(true)}
			}
		},
		methods: map[string]method{
			protocol.MethodTextDocumentPrepareRename: request(prepareRename),
			protocol.MethodTextDocumentRename:        request(rename),
		},
	}
}

// refuse is the error that a client shows beside the name.
func refuse(format string, args ...any) error {
	return jsonrpc2.Errorf(jsonrpc2.InvalidParams, format, args...)
}

func prepareRename(ctx context.Context, v *view, p *protocol.PrepareRenameParams) (any, error) {
	s, err := v.spot(ctx, p.TextDocumentPositionParams)
	if err != nil {
		return nil, err
	}
	n, err := s.renamable()
	if err != nil {
		return nil, err
	}
	return &protocol.PrepareRenamePlaceholder{Range: s.doc.mapper().SpanToRange(n.at), Placeholder: n.text}, nil
}

// renamable is the name at the spot, or the reason why it keeps its name.
func (s *spot) renamable() (*named, error) {
	n := s.named()
	switch {
	case n == nil:
		return nil, refuse("there is no name here that could be renamed")
	case n.local != nil:
		return n, nil
	case n.sym.Role == lang.RoleConstant:
		return nil, refuse("%s is a constant of the language", n.text)
	case strings.HasPrefix(n.sym.Path, "handbook/"):
		return nil, refuse("%s belongs to the handbook", n.text)
	case n.sym.Role == lang.RoleProperty && slices.Contains(propertyNames(), lastKey(n.sym.Key)):
		return nil, refuse("%s is a property that the language knows by this name", n.text)
	case n.sym.Stmt == nil && n.sym.Path == "":
		return nil, refuse("%s is not defined in a note", n.text)
	}
	return n, nil
}

func rename(ctx context.Context, v *view, p *protocol.RenameParams) (any, error) {
	s, err := v.spot(ctx, p.TextDocumentPositionParams)
	if err != nil {
		return nil, err
	}
	n, err := s.renamable()
	if err != nil {
		return nil, err
	}
	if err := allowedName(p.NewName); err != nil {
		return nil, err
	}
	edits := map[*snapshot][]lang.Edit{}
	for _, f := range s.everywhere(ctx, n) {
		if err := s.free(ctx, f, n, p.NewName); err != nil {
			return nil, err
		}
		for _, o := range f.found {
			if !o.derived {
				edits[f.doc] = append(edits[f.doc], lang.Edit{Span: o.span, New: p.NewName})
			}
		}
	}
	return v.workspaceEdit(edits), ctx.Err()
}

// allowedName says why a word can't be a name. The language itself is asked: a
// definition of it must be read as one.
func allowedName(name string) error {
	if lang.IsReserved(name) {
		return refuse("%q is a word of the language", name)
	}
	d, ok := lang.ParseStatement(name + " = 1").Tree.(*lang.Definition)
	if !ok || d.Name.Text != name {
		return refuse("%q is no name: a name begins with a letter and goes on with letters, digits and _", name)
	}
	for _, f := range eval.Builtins() {
		if f.Name == name {
			return refuse("%q is a function of the language", name)
		}
	}
	return nil
}

// free refuses a new name that means something else in a note already, and one
// that a local name would hide.
func (s *spot) free(ctx context.Context, f found, n *named, name string) error {
	key := lang.CanonicalName(name)
	a, err := f.doc.read(ctx)
	if err != nil {
		return err
	}
	if n.local != nil {
		if key != n.local.key && clashes(n, key) {
			return refuse("%s is bound in this statement already", name)
		}
		return s.unused(n, key, name)
	}
	sym := symbolIn(a, identityOf(s.note, n.sym))
	if sym == nil {
		return nil
	}
	key = sym.Key[:strings.LastIndexByte(sym.Key, '.')+1] + key
	if other := a.note.Lookup(key); other != nil && !sameSymbol(other, sym) {
		return refuse("%s is defined already%s", other.Name, lineOf(a.note, other))
	}
	for _, o := range f.found {
		if hidden(a.note, o.span, lang.CanonicalName(name)) {
			return refuse("%s would be taken for the local name of line %d", name, a.note.Script.Source.Line(o.span.Start)+1)
		}
	}
	return nil
}

// symbolIn is a name as a note of the work knows it.
func symbolIn(a *reading, id symbolID) *lang.Symbol {
	for _, u := range a.uses() {
		if identityOf(a.note, u.Symbol) == id {
			return u.Symbol
		}
	}
	return nil
}

func lineOf(note *lang.Note, sym *lang.Symbol) string {
	if sym.Stmt == nil || sym.Path != "" {
		return ""
	}
	return fmt.Sprintf(" in line %d", note.Script.Source.Line(sym.Span.Start)+1)
}

// clashes reports whether the statement binds the key already.
func clashes(n *named, key string) bool {
	return slices.ContainsFunc(localsOf(n.stmt.Tree), func(l *local) bool { return l.key == key })
}

// unused refuses a new local name that would hide a name that its statement
// uses.
func (s *spot) unused(n *named, key, name string) error {
	whole := lang.Span{Start: n.stmt.At, End: n.stmt.At + len(n.stmt.Text)}
	for _, u := range s.all.uses() {
		if whole.Start <= u.Span.Start && u.Span.End <= whole.End && u.Symbol.Key == key {
			return refuse("%s is used in this statement with another meaning", name)
		}
	}
	return nil
}

// hidden reports whether a local name of that key is in scope at a place.
func hidden(note *lang.Note, at lang.Span, key string) bool {
	stmt := note.StmtAt(at.Start)
	if stmt == nil || stmt.Tree == nil {
		return false
	}
	return slices.ContainsFunc(localsOf(stmt.Tree), func(l *local) bool { return l.key == key })
}

// propertyNames are the properties from which the language derives others or
// which rules look for.
func propertyNames() []string {
	return []string{"eps_r", "eps", "mu_r", "mu", "sigma", "rho", "tan_delta", "E_bd", "B_sat", "density", "c_p", "k_th", "eps_c"}
}
