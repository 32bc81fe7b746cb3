package rules

import (
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// This file finds out where a capacitance comes from: whether it is a slope of
// charge over voltage at a bias, or read off a characteristic over the voltage.

// slope is a capacitance that belongs to a voltage.
type slope struct {
	what   string // how the note shows it: "a differential capacitance"
	sure   bool   // the note says that it is a slope
	charge bool   // it is the quotient of charge and voltage
	span   lang.Span
	sym    *lang.Symbol // that carries it, nil for an expression

	valid    lang.Validity // the voltages for which it is stated
	hasRange bool
	bias     float64 // the voltage at which it was taken
	biased   bool
	table    string // of the characteristic, its columns and the reading
	volts    string
	farads   string
	call     *lang.Call // of the characteristic as a function
}

// slopeSeeker looks through definitions.
type slopeSeeker struct {
	note *lang.Note
	seen map[string]bool
}

// slopeOf tells what kind of slope a named capacitance is; nil for none.
func slopeOf(n *lang.Note, s *lang.Symbol) *slope {
	return (&slopeSeeker{n, map[string]bool{}}).symbol(s)
}

// slopeIn finds a slope in an expression of a statement.
func slopeIn(n *lang.Note, s *lang.Stmt, x lang.Expr) *slope {
	return (&slopeSeeker{n, map[string]bool{}}).expr(s, x)
}

func (k *slopeSeeker) symbol(s *lang.Symbol) *slope {
	if s == nil || k.seen[s.Key] || s.Facts.Kind.Is(kind.EnergyEquivalentCapacitance) || linearOnly(k.note, s) {
		return nil
	}
	k.seen[s.Key] = true
	valid, hasRange := rangeOver(s, kind.Voltage)
	found := k.declared(s, hasRange)
	if s.Def != nil && len(s.Def.Members) > 0 && !s.Input && len(s.Def.Params) == 0 {
		if from := k.expr(s.Stmt, s.Def.Members[0]); found == nil {
			found = from
		} else if from != nil {
			found.bias, found.biased = from.bias, from.biased
			found.table, found.volts, found.farads = from.table, from.volts, from.farads
		}
	}
	if found == nil {
		return nil
	}
	found.sym, found.span = s, s.Span
	if hasRange {
		found.valid, found.hasRange = valid, true
	}
	return found
}

// declared is what the kind and the range of a name say.
func (k *slopeSeeker) declared(s *lang.Symbol, hasRange bool) *slope {
	switch {
	case s.Facts.Kind.Is(kind.DifferentialCapacitance):
		return &slope{what: "a differential capacitance", sure: true}
	case s.Facts.Kind.Is(kind.ChargeEquivalentCapacitance):
		return &slope{what: "a charge-equivalent capacitance", sure: true, charge: true}
	case hasRange:
		return &slope{what: "stated for a range of voltages"}
	}
	return nil
}

// expr finds the first slope among the capacitances of an expression. Inside
// an integral a slope is where it belongs.
func (k *slopeSeeker) expr(s *lang.Stmt, x lang.Expr) (found *slope) {
	lang.Walk(x, func(t lang.Tree) bool {
		if found != nil {
			return false
		}
		switch t := t.(type) {
		case *lang.Call:
			found = k.call(s, t)
			return found == nil && plainCall(t)
		case *lang.Lookup:
			found = k.lookup(s, t)
			return false
		case *lang.Name:
			if f, ok := k.note.FactsOf(s, t); ok && isOf(f, kind.Capacitance) {
				found = k.symbol(k.note.Lookup(lang.CanonicalName(t.Text)))
			}
		case *lang.Member:
			if o, ok := t.X.(*lang.Name); ok {
				if f, ok := k.note.FactsOf(s, t); ok && isOf(f, kind.Capacitance) {
					found = k.symbol(k.note.Lookup(lang.CanonicalName(o.Text) + "." + lang.CanonicalName(t.Field.Text)))
				}
			}
			return false
		}
		return true
	})
	return found
}

// plainCall reports a call whose arguments enter its value as they are.
func plainCall(c *lang.Call) bool {
	switch c.Fn.Text {
	case "sqrt", "abs", "min", "max", "sum", "mean":
		return c.For == nil && c.Of == nil
	}
	return false
}

// call finds a function of the voltage, and the derivative of a charge.
func (k *slopeSeeker) call(s *lang.Stmt, c *lang.Call) *slope {
	f, ok := k.note.FactsOf(s, c)
	if !ok || !isOf(f, kind.Capacitance) || f.Kind.Is(kind.EnergyEquivalentCapacitance) {
		return nil
	}
	if c.Fn.Text == "derivative" && c.Of == nil && len(c.For) == 1 && c.For[0].At != nil {
		if at, ok := k.note.FactsOf(s, c.For[0].At); ok && isOf(at, kind.Voltage) {
			out := &slope{what: "the derivative of the charge", sure: true}
			out.bias, out.biased = valueOf(k.note, c.For[0].At)
			return out
		}
		return nil
	}
	for _, a := range c.Args {
		at, ok := k.note.FactsOf(s, a)
		if !ok || !isOf(at, kind.Voltage) || plainCall(c) {
			continue
		}
		out := &slope{what: "a function of the voltage", sure: f.Kind.Is(kind.DifferentialCapacitance), charge: f.Kind.Is(kind.ChargeEquivalentCapacitance), call: c}
		if out.sure {
			out.what = "a differential capacitance"
		} else if out.charge {
			out.what, out.sure = "a charge-equivalent capacitance", true
		}
		out.bias, out.biased = valueOf(k.note, a)
		return out
	}
	return nil
}

// lookup finds a reading of a capacitance over the voltage.
func (k *slopeSeeker) lookup(s *lang.Stmt, l *lang.Lookup) *slope {
	f, ok := k.note.FactsOf(s, l)
	m, isMember := l.X.(*lang.Member)
	if !ok || !isMember || !isOf(f, kind.Capacitance) {
		return nil
	}
	owner, named := m.X.(*lang.Name)
	at, ok := k.note.FactsOf(s, l.Value)
	if !ok || !named || !isOf(at, kind.Voltage) {
		return nil
	}
	out := &slope{what: "read off a characteristic over the voltage", table: lang.CanonicalName(owner.Text),
		volts: lang.CanonicalName(l.Column.Text), farads: lang.CanonicalName(m.Field.Text)}
	out.bias, out.biased = valueOf(k.note, l.Value)
	return out
}

// linearOnly reports a quantity whose media are all declared linear, and that
// has one.
func linearOnly(n *lang.Note, s *lang.Symbol) bool {
	keys := s.Facts.Media
	if s.Owner != nil && s.Owner.Role == lang.RoleMedium {
		keys = append([]string{s.Owner.Key}, keys...)
	}
	for _, key := range keys {
		if yes, _ := n.Adjective(key, "linear"); !yes {
			return false
		}
	}
	return len(keys) > 0
}
