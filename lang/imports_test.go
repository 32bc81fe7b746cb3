package lang

import (
	"go/parser"
	"go/token"
	"io/fs"
	"os"
	"path"
	"strconv"
	"strings"
	"testing"
)

// layers lists the packages from the lowest up; a package imports only from
// layers below its own. The longest matching prefix counts.
var layers = []struct {
	prefix string
	level  int
}{
	{"lang/unit", 0}, {"lang/kind", 1}, {"lang/eval", 1}, {"lang/media", 1}, {"lang", 2},
	{"check", 3}, {"check/project", 4}, {"check/rules", 4}, {"check/report", 4}, {"check/report/sheet", 5}, {"lsp", 5}, {"cmd", 6}, {"corpus", 7}, {"editors", 8},
}

func level(pkg string) int {
	best, at := -1, ""
	for _, l := range layers {
		if (pkg == l.prefix || strings.HasPrefix(pkg, l.prefix+"/")) && len(l.prefix) > len(at) {
			best, at = l.level, l.prefix
		}
	}
	return best
}

func TestImportsPointUpward(t *testing.T) {
	files := os.DirFS("..")
	seen := 0
	err := fs.WalkDir(files, ".", func(name string, d fs.DirEntry, err error) error {
		if err != nil || d.IsDir() || !strings.HasSuffix(name, ".go") || strings.HasSuffix(name, "_test.go") {
			return err
		}
		src, err := fs.ReadFile(files, name)
		if err != nil {
			return err
		}
		f, err := parser.ParseFile(token.NewFileSet(), name, src, parser.ImportsOnly)
		if err != nil {
			return err
		}
		pkg := path.Dir(name)
		for _, i := range f.Imports {
			target, _ := strconv.Unquote(i.Path.Value)
			inner, ours := strings.CutPrefix(target, "inkjoule/")
			if !ours {
				continue
			}
			seen++
			if from, to := level(pkg), level(inner); from < 0 || to < 0 || from <= to {
				t.Errorf("%s (layer %d) imports %s (layer %d)", name, from, inner, to)
			}
		}
		return nil
	})
	if err != nil {
		t.Fatal(err)
	}
	if seen < 20 {
		t.Errorf("only %d imports seen", seen)
	}
}
