package lang

// Walk visits the tree in pre-order, in the order of the text; where visit
// returns false, what is below is left out.
func Walk(t Tree, visit func(Tree) bool) {
	if t == nil || !visit(t) {
		return
	}
	eachChild(t, func(c Tree) { Walk(c, visit) })
}

// Children are the nodes directly below a node, in the order of the text.
func Children(t Tree) []Tree {
	var out []Tree
	eachChild(t, func(c Tree) { out = append(out, c) })
	return out
}

// eachChild visits the nodes directly below a node, in the order of the text.
func eachChild(t Tree, f func(Tree)) {
	switch n := t.(type) {
	case *Binary:
		f(n.X)
		f(n.Y)
	case *Unary:
		f(n.X)
	case *Paren:
		f(n.X)
	case *Bars:
		f(n.X)
	case *Triple:
		eachOf(n.X[:], f)
	case *Member:
		f(n.X)
		f(&n.Field)
	case *Cell:
		f(n.X)
		f(n.At)
	case *Lookup:
		f(n.X)
		f(&n.Column)
		f(n.Value)
	case *Call:
		callChildren(n, f)
	case *Range:
		optional(n.Var, f)
		optional(n.From, f)
		optional(n.To, f)
		optional(n.At, f)
	default:
		statementChildren(t, f)
	}
}

func callChildren(n *Call, f func(Tree)) {
	optional(n.Of, f)
	f(&n.Fn)
	eachOf(n.Args, f)
	optional(n.Equal, f)
	eachOf(n.For, f)
	optional(n.Over, f)
}

func statementChildren(t Tree, f func(Tree)) {
	switch n := t.(type) {
	case *Definition:
		definitionChildren(n, f)
	case *Piece:
		optional(n.X, f)
		some(n.For, f)
		some(n.Per, f)
	case *Medium:
		f(&n.Name)
		eachOf(n.Adjectives, f)
		some(n.Per, f)
		eachOf(n.Properties, f)
	case *Region:
		f(&n.Name)
		some(n.In, f)
		some(n.Shape, f)
		some(n.Per, f)
	case *Table:
		f(&n.Name)
		some(n.File, f)
		eachOf(n.Columns, f)
		some(n.Per, f)
		eachOf(n.Rows, f)
	case *Column:
		f(&n.Name)
		optional(n.Formula, f)
	case *Row:
		eachOf(n.Cells, f)
	default:
		plainChildren(t, f)
	}
}

func plainChildren(t Tree, f func(Tree)) {
	switch n := t.(type) {
	case *Regime:
		f(&n.Word)
		some(n.Name, f)
		optional(n.X, f)
		some(n.Per, f)
	case *Uses:
		f(&n.Path)
		some(n.As, f)
	case *Relation:
		eachOf(n.Terms, f)
	case *Assume:
		some(n.Rel, f)
		some(n.Text, f)
		some(n.Per, f)
	case *Criterion:
		some(n.Rel, f)
		some(n.Per, f)
	case *Check:
		some(n.Rel, f)
		some(n.Per, f)
	case *Safety:
		f(&n.Text)
		some(n.Per, f)
	case *Waive:
		f(&n.Rule)
		optional(n.For, f)
		f(&n.Reason)
	case *Plot:
		eachOf(n.X, f)
		some(n.For, f)
		some(n.Per, f)
	case *Unread:
		some(n.Name, f)
	}
}

func definitionChildren(n *Definition, f func(Tree)) {
	f(&n.Name)
	for i := range n.Params {
		f(&n.Params[i])
	}
	some(n.In, f)
	some(n.Kind, f)
	eachOf(n.Members, f)
	eachOf(n.For, f)
	some(n.Per, f) // with pieces, the source of the first
	eachOf(n.Pieces, f)
}

func eachOf[T Tree](list []T, f func(Tree)) {
	for _, t := range list {
		f(t)
	}
}

// some visits a node that may be absent.
func some[P interface {
	*T
	Tree
}, T any](p P, f func(Tree)) {
	if p != nil {
		f(p)
	}
}

// optional visits an expression that may be absent.
func optional(x Expr, f func(Tree)) {
	if x != nil {
		f(x)
	}
}
