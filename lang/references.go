package lang

import (
	"strings"

	"inkjoule/lang/media"
)

// References gives the files that a note refers to, as written: notes by `uses`
// and data by `table … from`. The handbook is no file.
func (s *Script) References() []string {
	var out []string
	for _, st := range s.Stmts {
		switch t := st.Tree.(type) {
		case *Uses:
			if !strings.HasPrefix(t.Path.Text, media.Prefix) {
				out = append(out, t.Path.Text)
			}
		case *Table:
			if t.File != nil {
				out = append(out, t.File.Text)
			}
		}
	}
	return out
}
