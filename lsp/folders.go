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

// contains reports whether a file lies in the folder.
func (f folder) contains(file string) bool {
	rel, err := filepath.Rel(string(f), file)
	return err == nil && rel != ".." && !strings.HasPrefix(rel, ".."+string(filepath.Separator))
}
