package rules

import (
	"inkjoule/lang"
	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
)

// This file finds the integral that an energy is made of, and what is
// integrated over what.

// along is an integral with one bound variable.
type along struct {
	stmt  *lang.Stmt
	call  *lang.Call
	sym   *lang.Symbol // whose definition holds it
	y, x  lang.Facts   // what is integrated, over what
	table *lang.Symbol // whose columns they are, nil for functions
	colY  string
	colX  string
	fn    *lang.Symbol // the function that is integrated, nil for others
	scale bool         // something multiplies it: a volume, a number of parts
}

// alongSeeker follows an energy through names and factors to its integral.
type alongSeeker struct {
	note *lang.Note
	stop func(*lang.Symbol) bool // names that are not looked through
	seen map[string]bool
}

// integralOf gives the integral of which a name is a multiple by geometry and
// by whole numbers of parts; nil where it is anything else.
func integralOf(n *lang.Note, s *lang.Symbol, stop func(*lang.Symbol) bool) *along {
	k := &alongSeeker{note: n, stop: stop, seen: map[string]bool{s.Key: true}}
	return k.in(s)
}

func (k *alongSeeker) in(s *lang.Symbol) *along {
	if s.Def == nil || len(s.Def.Members) == 0 || len(s.Def.Params) > 0 {
		return nil
	}
	var found *along
	factors := productFactors(s.Def.Members[0])
	for _, x := range factors {
		a, ok := k.factor(s, x)
		if !ok || a != nil && found != nil {
			return nil
		}
		if a != nil {
			found = a
		}
	}
	if found != nil {
		found.scale = found.scale || len(factors) > 1
	}
	return found
}

// productFactors lists the factors of a product or quotient, parentheses taken
// off. A sum is one factor.
func productFactors(x lang.Expr) []lang.Expr {
	switch y := unwrapped(x).(type) {
	case *lang.Binary:
		if y.Op == lang.OpMul || y.Op == lang.OpDiv || y.Op == lang.OpDot {
			return append(productFactors(y.X), productFactors(y.Y)...)
		}
	}
	return []lang.Expr{unwrapped(x)}
}

// factor reads one factor: an integral, an energy that is one, or something
// that only scales it; ok is false for anything else.
func (k *alongSeeker) factor(s *lang.Symbol, x lang.Expr) (*along, bool) {
	f, known := k.note.FactsOf(s.Stmt, x)
	if !known || !f.Known || f.Shape != eval.Scalar {
		return nil, false
	}
	if c, ok := x.(*lang.Call); ok {
		a := alongOf(k.note, s, c)
		return a, a != nil
	}
	switch r := roleOf(f); {
	case r == roleGeometry:
		return nil, true
	case r == roleNumber:
		return nil, k.counts(x, f)
	}
	name, ok := x.(*lang.Name)
	if !ok {
		return nil, false
	}
	y := k.note.Lookup(lang.CanonicalName(name.Text))
	if y == nil || y.Role != lang.RoleQuantity || k.seen[y.Key] || k.stop(y) {
		return nil, false
	}
	k.seen[y.Key] = true
	a := k.in(y)
	return a, a != nil
}

// counts reports a plain number that may count parts or turn a unit: no
// efficiency and no part of one.
func (k *alongSeeker) counts(x lang.Expr, f lang.Facts) bool {
	v, ok := valueOf(k.note, x)
	return ok && v >= 1 && (f.Kind == 0 || f.Kind.Is(kind.NumberOfTurns))
}

// alongOf reads a call as an integral; nil for others.
func alongOf(n *lang.Note, s *lang.Symbol, c *lang.Call) *along {
	if c.Fn.Text != "integral" || len(c.Args) != 1 || len(c.For) != 1 || c.For[0].From == nil || c.For[0].To == nil {
		return nil
	}
	a := &along{stmt: s.Stmt, call: c, sym: s}
	var okY, okX bool
	a.y, okY = n.FactsOf(s.Stmt, c.Args[0])
	a.x, okX = n.FactsOf(s.Stmt, c.For[0].Var)
	if m, ok := c.For[0].Var.(*lang.Member); ok {
		a.table, a.colX = columnOwner(n, m)
		if a.table != nil {
			if col := n.Lookup(a.table.Key + "." + a.colX); col != nil {
				a.x, okX = col.Facts, true
			}
		}
	}
	switch y := unwrapped(c.Args[0]).(type) {
	case *lang.Member:
		if t, col := columnOwner(n, y); t != nil && t == a.table {
			a.colY = col
		}
	case *lang.Call:
		a.fn = calledFunction(n, y)
	}
	if !okY || !okX || !a.y.Known || !a.x.Known {
		return nil
	}
	return a
}

// columnOwner is the table of a column, with the column's canonical name.
func columnOwner(n *lang.Note, m *lang.Member) (*lang.Symbol, string) {
	o, ok := m.X.(*lang.Name)
	if !ok {
		return nil, ""
	}
	t := n.Lookup(lang.CanonicalName(o.Text))
	if t == nil || t.Role != lang.RoleTable {
		return nil, ""
	}
	return t, lang.CanonicalName(m.Field.Text)
}

// calledFunction is the note's function, or a medium's, that a call names.
func calledFunction(n *lang.Note, c *lang.Call) *lang.Symbol {
	key := lang.CanonicalName(c.Fn.Text)
	if o, ok := c.Of.(*lang.Name); ok {
		key = lang.CanonicalName(o.Text) + "." + key
	}
	s := n.Lookup(key)
	if s == nil || s.Def == nil || len(s.Def.Params) == 0 {
		return nil
	}
	return s
}

// pairs are fields and the flux quantities that they drive; read only.
var pairs = []struct{ field, flux kind.ID }{
	{kind.ElectricFieldStrength, kind.ElectricFluxDensity},
	{kind.MagneticFieldStrength, kind.MagneticFluxDensity},
	{kind.Voltage, kind.ElectricCharge},
	{kind.ElectricCurrent, kind.MagneticFlux},
}

// overFlux reports a field that is integrated over its flux quantity: an
// energy; overField the reverse: a coenergy.
func (a *along) overFlux() bool {
	for _, p := range pairs {
		if isOf(a.y, p.field) && isOf(a.x, p.flux) {
			return true
		}
	}
	return false
}

// overField reports a flux quantity that is integrated over its field: a
// coenergy.
func (a *along) overField() bool {
	for _, p := range pairs {
		if isOf(a.y, p.flux) && isOf(a.x, p.field) {
			return true
		}
	}
	return false
}

// bounds are the values of the limits.
func (a *along) bounds(n *lang.Note) (from, to float64, ok bool) {
	from, ok1 := valueOf(n, a.call.For[0].From)
	to, ok2 := valueOf(n, a.call.For[0].To)
	return from, to, ok1 && ok2
}
