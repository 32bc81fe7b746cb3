package lsp

import (
	"path/filepath"
	"strings"

	"go.lsp.dev/uri"
)

// A folder is a workspace folder, as an absolute path of this machine.
type folder string

// foldersOf reads the workspace folders from initialize. Older clients name
// one root.
func foldersOf(h *hello) []folder {
	var out []folder
	for _, p := range h.WorkspaceFolders {
		out = appendFolder(out, p.URI)
	}
	switch {
	case len(out) > 0:
	case h.RootURI != "":
		out = appendFolder(out, h.RootURI)
	case h.RootPath != "":
		out = append(out, folder(filepath.Clean(h.RootPath)))
	}
	return out
}

// appendFolder adds a folder of this machine; others are left out.
func appendFolder(to []folder, u string) []folder {
	parsed, err := uri.Parse(u)
	if err != nil || !parsed.IsFile() {
		return to
	}
	return append(to, folder(filepath.Clean(parsed.FsPath())))
}

// contains reports whether the file lies in the folder.
func (f folder) contains(file string) bool {
	rest, ok := strings.CutPrefix(file, string(f))
	return ok && (rest == "" || rest[0] == filepath.Separator || strings.HasSuffix(string(f), string(filepath.Separator)))
}

// locate gives the folder that a note may refer to and its path in it: the
// outermost workspace folder, else the folder that holds the file. A text that
// is not a file of this machine has no folder.
func (v *view) locate(u uri.URI) (root, name string) {
	if !u.IsFile() {
		return "", u.Path()
	}
	file := filepath.Clean(u.FsPath())
	root = filepath.Dir(file)
	found := false
	for _, f := range v.folders {
		if f.contains(file) && (!found || len(f) < len(root)) {
			root, found = string(f), true
		}
	}
	rel, err := filepath.Rel(root, file)
	if err != nil {
		rel = filepath.Base(file)
	}
	return root, filepath.ToSlash(rel)
}
