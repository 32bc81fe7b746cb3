package lang

import (
	"fmt"
	"strings"
)

// sexpr writes a tree in the compact form of the tests: names and numbers as
// they stand, a unit in brackets, an uncertainty in braces, every other node as
// (KIND PARTS…). It leaves out places and indices.
func sexpr(t Tree) string {
	switch n := t.(type) {
	case *Ident:
		return n.Text
	case *Words:
		return "'" + n.Text + "'"
	case *Quote:
		return fmt.Sprintf("%q", n.Text)
	case *Name:
		return n.Text
	case *Literal:
		return n.Num.Text + sexprSpread(n.Spread) + sexprUnit(n.Unit)
	case *Binary:
		return sList(string(n.Op), sexpr(n.X), sexpr(n.Y))
	case *Unary:
		return sList(map[Op]string{OpSub: "neg", OpAdd: "pos"}[n.Op], sexpr(n.X))
	case *Paren:
		return sList("paren", sexpr(n.X), sexprUnit(n.Unit), sexprSpread(n.Spread))
	case *Bars:
		return sList("bars", sexpr(n.X))
	case *Triple:
		return sList("vec", sexpr(n.X[0]), sexpr(n.X[1]), sexpr(n.X[2]), sexprUnit(n.Unit))
	case *Member:
		return sexpr(n.X) + "." + n.Field.Text
	case *Cell:
		return sList("cell", sexpr(n.X), sexpr(n.At))
	case *Lookup:
		return sList("at", sexpr(n.X), n.Column.Text, sexpr(n.Value))
	case *Blank:
		return "__" + sexprUnit(n.Unit)
	case *Broken:
		return "?"
	}
	return sexprForm(t)
}

func sexprForm(t Tree) string {
	switch n := t.(type) {
	case *Call:
		fn := n.Fn.Text
		if n.Of != nil {
			fn = sexpr(n.Of) + "." + fn
		}
		over := ""
		if n.Over != nil {
			over = sList("over", sexpr(n.Over))
		}
		eq := ""
		if n.Equal != nil {
			eq = sList("=", sexpr(n.Equal))
		}
		return sList(fn, each(n.Args), eq, each(n.For), over, sexprUnit(n.Unit))
	case *Range:
		if n.At != nil {
			return sList("for", sexpr(n.Var), "at", sexpr(n.At))
		}
		return sList("for", sexpr(n.Var), sexpr(n.From), sexpr(n.To))
	case *Relation:
		parts := []string{sexpr(n.Terms[0])}
		for i, op := range n.Ops {
			parts = append(parts, op, sexpr(n.Terms[i+1]))
		}
		return sList(parts...)
	case *Definition:
		params := ""
		for _, p := range n.Params {
			params += " " + p.Text
		}
		if params != "" {
			params = "(" + params[1:] + ")"
		}
		return sList("def", n.Name.Text, params, opt("in", n.In), opt("", n.Kind), "=", each(n.Members), each(n.For), opt("per", n.Per), each(n.Pieces))
	case *Piece:
		return sList("piece", sexpr(n.X), sexpr(n.For), opt("per", n.Per))
	}
	return sexprStatement(t)
}

func sexprStatement(t Tree) string {
	switch n := t.(type) {
	case *Medium:
		return sList("medium", n.Name.Text, each(n.Adjectives), opt("per", n.Per), each(n.Properties))
	case *Region:
		return sList("region", n.Name.Text, opt("in", n.In), sexpr(n.Shape), opt("per", n.Per))
	case *Table:
		return sList("table", n.Name.Text, map[bool]string{true: "linear"}[n.Linear], opt("from", n.File), each(n.Columns), opt("per", n.Per), each(n.Rows))
	case *Column:
		formula := ""
		if n.Formula != nil {
			formula = "= " + sexpr(n.Formula)
		}
		return sList("col", n.Name.Text, sexprUnit(n.Unit), formula)
	case *Row:
		return sList("row", each(n.Cells))
	case *Regime:
		at := ""
		if n.Name != nil {
			at = sList("at", n.Name.Text, sexpr(n.X))
		}
		return sList("regime", n.Word.Text, at, opt("per", n.Per))
	case *Uses:
		return sList("uses", sexpr(&n.Path), opt("as", n.As))
	case *Assume:
		return sList("assume", opt("", n.Rel), opt("", n.Text), opt("per", n.Per))
	case *Criterion:
		return sList("criterion", sexpr(n.Rel), opt("per", n.Per))
	case *Check:
		return sList("check", sexpr(n.Rel), opt("per", n.Per))
	case *Safety:
		return sList("safety", sexpr(&n.Text), opt("per", n.Per))
	case *Waive:
		target := ""
		if n.For != nil {
			target = sList("for", sexpr(n.For))
		}
		return sList("waive", n.Rule.Text, target, sexpr(&n.Reason))
	case *Plot:
		return sList("plot", each(n.X), opt("", n.For), opt("per", n.Per))
	case *Unread:
		return sList("unread", opt("", n.Name))
	}
	return fmt.Sprintf("<%T>", t)
}

// sList joins the parts that are not empty.
func sList(parts ...string) string {
	var kept []string
	for _, p := range parts {
		if p != "" {
			kept = append(kept, p)
		}
	}
	return "(" + strings.Join(kept, " ") + ")"
}

func each[T Tree](nodes []T) string {
	var parts []string
	for _, n := range nodes {
		parts = append(parts, sexpr(n))
	}
	return strings.Join(parts, " ")
}

// opt writes a part that may be absent, as (word PART), or bare without a word.
func opt[P interface {
	*T
	Tree
}, T any](word string, p P) string {
	switch {
	case p == nil:
		return ""
	case word == "":
		return sexpr(p)
	}
	return sList(word, sexpr(p))
}

func sexprUnit(u *UnitPhrase) string {
	if u == nil {
		return ""
	}
	return "[" + u.Text + "]"
}

func sexprSpread(s *Spread) string {
	switch {
	case s == nil:
		return ""
	case s.Standard:
		return fmt.Sprintf("{u %s %v}", s.Num.Text, s.Size)
	}
	return fmt.Sprintf("{± %s%s}", s.Num.Text, sexprUnit(s.Unit))
}
