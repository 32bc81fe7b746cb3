package project

import (
	"cmp"
	"errors"
	"fmt"
	"strings"

	"github.com/pelletier/go-toml/v2/unstable"
)

// position is a 1-based line and column.
type position struct{ row, column int }

// fault is something wrong in a configuration file.
type fault struct {
	path string
	at   position
	text string
}

func (f fault) Error() string {
	return fmt.Sprintf("%s:%d:%d: %s", f.path, f.at.row, f.at.column, f.text)
}

func (f fault) compare(g fault) int {
	return cmp.Or(cmp.Compare(f.at.row, g.at.row), cmp.Compare(f.at.column, g.at.column), cmp.Compare(f.text, g.text))
}

func join(faults []fault) error {
	errs := make([]error, len(faults))
	for i, f := range faults {
		errs[i] = f
	}
	return errors.Join(errs...)
}

// positions tells where the keys of a document stand, by dotted path.
type positions map[string]position

// newPositions reads a document as far as it is well formed.
func newPositions(data []byte) positions {
	p := positions{}
	var parser unstable.Parser
	parser.Reset(data)
	table := ""
	for parser.NextExpression() {
		node := parser.Expression()
		path, at := keyOf(&parser, node)
		switch node.Kind {
		case unstable.Table, unstable.ArrayTable:
			table = path
			p[path] = at
		case unstable.KeyValue:
			p[strings.TrimPrefix(table+"."+path, ".")] = at
		}
	}
	return p
}

func keyOf(parser *unstable.Parser, node *unstable.Node) (string, position) {
	var parts []string
	at := position{1, 1}
	for it := node.Key(); it.Next(); {
		parts = append(parts, string(it.Node().Data))
		start := parser.Shape(it.Node().Raw).Start
		at = position{start.Line, start.Column}
	}
	return strings.Join(parts, "."), at
}

// of gives the position of a key, or of what holds it, or the first line.
func (p positions) of(path ...string) position {
	for n := len(path); n > 0; n-- {
		if at, ok := p[strings.Join(path[:n], ".")]; ok {
			return at
		}
	}
	return position{1, 1}
}
