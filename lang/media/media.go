// Package media is the built-in handbook: notes that state media with their
// properties, ranges and sources, embedded in the program.
package media

import (
	"embed"
	"io/fs"
	"path"
	"strings"
)

//go:embed handbook
var files embed.FS

// Prefix is how a note refers to the handbook: `uses "handbook/liquids"`.
const Prefix = "handbook/"

// Handbook returns the text of a chapter by its name after the prefix.
func Handbook(name string) (text string, ok bool) {
	if !fs.ValidPath(name) || strings.Contains(name, "/") {
		return "", false
	}
	b, err := files.ReadFile(path.Join("handbook", strings.TrimSuffix(name, ".joule")+".joule"))
	return string(b), err == nil
}

// Chapters lists the names of the handbook's notes, in order.
func Chapters() []string {
	entries, err := files.ReadDir("handbook")
	if err != nil {
		return nil
	}
	var out []string
	for _, e := range entries {
		if n, ok := strings.CutSuffix(e.Name(), ".joule"); ok {
			out = append(out, n)
		}
	}
	return out
}
