package lsp

import (
	"context"
	"path/filepath"
	"strings"

	"go.lsp.dev/uri"

	"inkjoule/check/project"
	"inkjoule/lang"
)

// found are the places of a name in one note.
type found struct {
	doc   *snapshot
	found []occurrence
}

// everywhere lists the places of a name in all notes of the work that refer to
// the note that defines it.
func (s *spot) everywhere(ctx context.Context, n *named) []found {
	if n.local != nil {
		return []found{{s.doc, n.occurrences(s.all)}}
	}
	id := identityOf(s.note, n.sym)
	var out []found
	for _, doc := range s.view.relatives(ctx, s.doc, id) {
		a, err := doc.read(ctx)
		if err != nil {
			continue
		}
		if places := occurrencesIn(a, id); len(places) > 0 {
			out = append(out, found{doc, places})
		}
	}
	return out
}

func occurrencesIn(a *reading, id symbolID) []occurrence {
	return occurrencesOf(a, func(sym *lang.Symbol) bool { return identityOf(a.note, sym) == id })
}

// relatives are the notes in which a name may occur: this one, the one that
// defines it and those of the same work that use others.
func (v *view) relatives(ctx context.Context, doc *snapshot, id symbolID) []*snapshot {
	out := []*snapshot{doc}
	if doc.home.root == "" {
		return out
	}
	for _, u := range v.notesOf(ctx, doc.home.root) {
		if u == doc.uri {
			continue
		}
		other, err := v.note(u)
		if err == nil && (other.home.path == id.path || strings.Contains(other.src.Text, "uses")) {
			out = append(out, other)
		}
	}
	return out
}

// notesOf lists the notes of a folder, those open in the editor included, each
// once and in the order of their paths.
func (v *view) notesOf(ctx context.Context, root string) []uri.URI {
	finder := &project.Finder{Configs: project.NewConfigs(v.catalogue)}
	files, _ := finder.Find(ctx, []string{root}) // what can't be read can't be shown
	var out []uri.URI
	seen := map[uri.URI]bool{}
	add := func(u uri.URI) {
		if !seen[u] {
			seen[u] = true
			out = append(out, u)
		}
	}
	for _, f := range files {
		add(uri.File(f.Abs))
	}
	for u, doc := range v.docs {
		if doc.home.root == root && project.IsNote(filepath.Base(doc.home.path)) {
			add(u)
		}
	}
	return out
}
