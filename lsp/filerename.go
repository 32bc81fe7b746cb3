package lsp

import (
	"context"
	"path"
	"path/filepath"
	"strings"

	"go.lsp.dev/protocol"
	"go.lsp.dev/uri"

	"inkjoule/lang"
	"inkjoule/lang/media"
)

// fileRenames keep the references between notes when the editor renames or
// moves a note or a folder of notes.
func fileRenames() feature {
	return feature{
		offer: func(c *client, to *protocol.ServerCapabilities) {
			if !c.can("workspace.fileOperations.willRename") {
				return
			}
			if to.Workspace == nil {
				to.Workspace = &protocol.WorkspaceOptions{}
			}
			to.Workspace.FileOperations = &protocol.FileOperationOptions{WillRename: renameFilters()}
		},
		methods: map[string]method{protocol.MethodWorkspaceWillRenameFiles: request(willRename)},
	}
}

// renameFilters are what may be referred to, and the folders that hold it.
func renameFilters() protocol.FileOperationRegistrationOptions {
	filter := func(glob string, kind protocol.FileOperationPatternKind) protocol.FileOperationFilter {
		return protocol.FileOperationFilter{Scheme: ptr("file"), Pattern: protocol.FileOperationPattern{Glob: glob, Matches: kind}}
	}
	return protocol.FileOperationRegistrationOptions{Filters: []protocol.FileOperationFilter{
		filter("**/*.{joule,joule.md,csv}", protocol.FileOperationPatternKindFile),
		filter("**", protocol.FileOperationPatternKindFolder),
	}}
}

// move is a renaming of a file, or of a folder with all that it holds.
type move struct{ from, to string }

// moves are renamings that happen together.
type moves []move

// of is where a file will be.
func (m moves) of(file string) string {
	for _, one := range m {
		if file == one.from {
			return one.to
		}
		if rest, ok := strings.CutPrefix(file, one.from+string(filepath.Separator)); ok {
			return filepath.Join(one.to, rest)
		}
	}
	return file
}

func willRename(ctx context.Context, v *view, p *protocol.RenameFilesParams) (any, error) {
	var all moves
	for _, f := range p.Files {
		from, err := uri.Parse(f.OldURI)
		to, err2 := uri.Parse(f.NewURI)
		if err == nil && err2 == nil && from.IsFile() && to.IsFile() {
			all = append(all, move{filepath.Clean(from.FsPath()), filepath.Clean(to.FsPath())})
		}
	}
	edits := map[*snapshot][]lang.Edit{}
	for _, u := range v.everyNote(ctx) {
		doc, err := v.note(u)
		if err != nil || doc.home.root == "" || !refersTo(doc.src.Text) {
			continue
		}
		if e := doc.redirected(all); len(e) > 0 {
			edits[doc] = e
		}
	}
	if len(edits) == 0 {
		return (*protocol.WorkspaceEdit)(nil), ctx.Err()
	}
	return v.workspaceEdit(edits), ctx.Err()
}

// redirected rewrites the paths of a note that lead elsewhere once files have
// moved, those of the note itself included. Other paths stay as they are
// written.
func (s *snapshot) redirected(all moves) []lang.Edit {
	self := s.home.file(s.home.path)
	var out []lang.Edit
	for _, stmt := range lang.Read(s.src.Text, nil).Stmts {
		q := pathIn(stmt.Tree)
		if q == nil || strings.HasPrefix(q.Text, media.Prefix) {
			continue
		}
		target := filepath.Join(filepath.Dir(self), filepath.FromSlash(q.Text))
		rel, err := filepath.Rel(filepath.Dir(all.of(self)), all.of(target))
		if err != nil || filepath.ToSlash(rel) == path.Clean(q.Text) {
			continue
		}
		out = append(out, lang.Edit{Span: inQuotes(stmt.Abs(q)), New: filepath.ToSlash(rel)})
	}
	return out
}
