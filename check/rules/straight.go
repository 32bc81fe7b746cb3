package rules

import (
	"strings"

	"inkjoule/lang"
	"inkjoule/lang/unit"
)

// This file tells whether a characteristic is a straight line through zero, as
// far as a note shows it.

// shapeOfCurve is what is known of a characteristic.
type shapeOfCurve uint8

const (
	curveUnknown shapeOfCurve = iota
	curveStraight
	curveBent
	curveAmbiguous // the variable stands as a factor: y could be x times a slope
)

// straightTolerance is how far a measured characteristic may leave its chord.
const straightTolerance = 0.01

// bend tells the shape of the curve that an integral runs along.
func (a *along) bend(n *lang.Note) shapeOfCurve {
	if a.table != nil && a.colY == "" && a.mentionsColumn(n) {
		return curveAmbiguous
	}
	if a.table != nil {
		k, ok := curveOf(n, a.table.Key, a.colX, a.colY)
		_, to, known := a.bounds(n)
		switch {
		case !ok || a.colY == "":
			return curveUnknown
		case known && k.proportional(to, straightTolerance), !known && k.proportional(k.x[len(k.x)-1], straightTolerance):
			return curveStraight
		}
		return curveBent
	}
	v, ok := a.call.For[0].Var.(*lang.Name)
	if !ok {
		return curveUnknown
	}
	switch {
	case a.fn == nil:
	case len(a.fn.Def.Params) != 1 || len(a.fn.Def.Pieces) > 0:
		return curveUnknown
	default:
		if l, ok := unwrapped(a.fn.Def.Members[0]).(*lang.Lookup); ok {
			return bendOfReading(n, l)
		}
		return bendOf(n.Form(a.fn, a.fn.Def.Members[0], lang.NamesStay), a.fn.Def.Params[0].Text)
	}
	return bendOf(n.Form(a.sym, a.call.Args[0], lang.NamesStay), v.Text)
}

// mentionsColumn reports an integrand in which the column that is integrated
// over stands itself.
func (a *along) mentionsColumn(n *lang.Note) (found bool) {
	lang.Walk(a.call.Args[0], func(t lang.Tree) bool {
		if m, ok := t.(*lang.Member); ok {
			table, col := columnOwner(n, m)
			found = found || table == a.table && col == a.colX
		}
		return !found
	})
	return found
}

// bendOfReading tells the shape of the table that a function reads.
func bendOfReading(n *lang.Note, l *lang.Lookup) shapeOfCurve {
	m, ok := l.X.(*lang.Member)
	if !ok {
		return curveUnknown
	}
	t, y := columnOwner(n, m)
	if t == nil {
		return curveUnknown
	}
	k, ok := curveOf(n, t.Key, lang.CanonicalName(l.Column.Text), y)
	if !ok {
		return curveUnknown
	}
	if x, _ := k.tip(); k.proportional(x, straightTolerance) {
		return curveStraight
	}
	return curveBent
}

// bendOf tells the shape of a form in a variable: straight for multiples of it,
// bent where it stands in a function or under a power.
func bendOf(f *lang.Form, variable string) shapeOfCurve {
	if f == nil || len(f.Terms) == 0 {
		return curveUnknown
	}
	straight, bare, opaque := true, true, false
	for _, t := range f.Terms {
		power := unit.Rat{}
		for _, x := range t.Factors {
			switch {
			case isVariable(x, variable):
				power = x.Exp
			case opaqueFactor(x) && mentions(x.Key, variable):
				opaque = true
			}
		}
		straight = straight && power == unit.Whole(1)
		bare = bare && power.Sign() > 0
	}
	switch {
	case straight && !opaque:
		return curveStraight
	case bare && len(f.Terms)+boolInt(opaque) > 1:
		return curveAmbiguous
	case opaque || !straight && bare:
		return curveBent
	}
	return curveUnknown
}

func boolInt(b bool) int {
	if b {
		return 1
	}
	return 0
}

// isVariable reports the factor that is the bound variable itself.
func isVariable(f lang.Factor, variable string) bool {
	key := lang.CanonicalName(variable)
	return f.Key == "bound "+key || f.Key == "("+variable+")" || f.Key == key && f.Symbol == nil || f.Key == key && f.Symbol != nil && f.Symbol.Role == lang.RoleQuantity
}

// mentions reports a word in the text of a part that could not be taken apart.
func mentions(text, word string) bool {
	for _, w := range strings.FieldsFunc(text, func(r rune) bool { return strings.ContainsRune(" ()+-*/^;·,|", r) }) {
		if w == word || lang.CanonicalName(w) == lang.CanonicalName(word) {
			return true
		}
	}
	return false
}
