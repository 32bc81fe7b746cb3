package rules

import (
	"math"
	"slices"
	"strings"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file finds sums in which the loss of a conductivity stands beside that of
// a loss factor or of an imaginary permittivity, whatever both are multiplied
// by: two terms whose quotient is σ/(ωε″).

// lossPair is a conductivity and what makes a dielectric loss beside it.
type lossPair struct {
	in         *lang.Symbol // the definition in which the sum stands
	span       lang.Span    // of the sum
	conduction *lang.Symbol
	dielectric *lang.Symbol
	ratio      float64 // of the conduction loss to the dielectric one; 0 where it is not known
	guessed    bool    // the permittivity is real: it can but be meant for ε″
}

// losses are the pairs of a note, by the definition that adds them up.
type losses struct {
	view  *view
	none  bool // the note knows no conductivity
	found map[*lang.Symbol]*lossPair
}

// lossesOf gives them, once for a pass.
func lossesOf(p *check.Pass) *losses {
	type key struct{}
	return p.Once(key{}, func() any {
		return &losses{viewOf(p), !knowsConductivity(p.Note), map[*lang.Symbol]*lossPair{}}
	}).(*losses)
}

// knowsConductivity reports a note in which anything that is used or defined is
// a conductivity or a resistivity.
func knowsConductivity(n *lang.Note) bool {
	is := func(s *lang.Symbol) bool {
		return s != nil && (isOf(s.Facts, kind.Conductivity) || isOf(s.Facts, kind.Resistivity))
	}
	return slices.ContainsFunc(n.Symbols, is) || slices.ContainsFunc(n.Uses, func(u lang.Use) bool { return is(u.Symbol) })
}

// lossParts looks through powers, capacitances and permittivities too, since a
// loss is mostly added up from names of its own.
func lossParts(s *lang.Symbol) bool {
	return atoms(s) || isLossPart(s.Facts.Kind)
}

func isLossPart(k kind.ID) bool {
	for _, part := range []kind.ID{
		kind.Power, kind.PowerDensity, kind.LineicPower, kind.SpecificAbsorptionRate, kind.SpecificPower, kind.Capacitance, kind.Permittivity, kind.RelativePermittivity,
	} {
		if k.Is(part) {
			return true
		}
	}
	return false
}

// in finds the pair that a definition adds up; nil if there is none.
func (l *losses) in(s *lang.Symbol) *lossPair {
	if x, known := l.found[s]; known || l.none {
		return x
	}
	l.found[s] = nil
	x := l.look(s)
	l.found[s] = x
	return x
}

func (l *losses) look(s *lang.Symbol) *lossPair {
	n := l.view.note
	if x := l.pairIn(s, n.Apart(s, lossParts)); x != nil {
		x.span = s.Stmt.Abs(s.Def.Members[0])
		return x
	}
	var found *lossPair
	for _, x := range definedBy(s) {
		lang.Walk(x, func(t lang.Tree) bool {
			b, ok := t.(*lang.Binary)
			if found == nil && ok && (b.Op == lang.OpAdd || b.Op == lang.OpSub) {
				if found = l.pairIn(s, n.Within(s, b, lossParts)); found != nil {
					found.span = s.Stmt.Abs(b)
				}
			}
			return found == nil
		})
	}
	return found
}

// above reports that a name which s is made of adds the same up already.
func (l *losses) above(s *lang.Symbol) bool {
	return restsOn(l.view.note, s, func(x *lang.Symbol) bool {
		return x != s && x.Def != nil && x.Stmt != nil && len(x.Def.Members) > 0 && !x.Input && l.in(x) != nil
	})
}

// pairIn finds the pair among the terms of a form.
func (l *losses) pairIn(s *lang.Symbol, f *lang.Form) *lossPair {
	if f == nil || len(f.Terms) < 2 {
		return nil
	}
	for _, a := range f.Terms {
		if !slices.ContainsFunc(a.Factors, isConduction) {
			continue
		}
		for _, b := range f.Terms {
			if x := l.pair(s, a, b); x != nil {
				return x
			}
		}
	}
	return nil
}

// isConduction reports a conductivity, or a resistivity below the line.
func isConduction(f lang.Factor) bool {
	return isOf(f.Facts, kind.Conductivity) && f.Exp == unit.Whole(1) || isOf(f.Facts, kind.Resistivity) && f.Exp == unit.Whole(-1)
}

// sameLoss is how near two losses are that are one: within the digits of a
// conductivity that was computed elsewhere and written down.
const sameLoss = 0.01

// equal reports two losses that have the same value.
func (x *lossPair) equal() bool { return math.Abs(x.ratio-1) < sameLoss }

// pair reads a/b as the quotient of a conduction loss and a dielectric loss.
func (l *losses) pair(s *lang.Symbol, a, b lang.Term) *lossPair {
	q := newQuotient(l.view.note, a, b)
	if !q.fits() {
		return nil
	}
	of, turns := q.lossOf(l.view.note)
	x := &lossPair{in: s, conduction: q.conduction.Symbol, dielectric: of}
	if of == nil && isDissipation(s.Facts.Kind) {
		x.dielectric, x.guessed = q.permittivity(), true
	}
	if x.dielectric == nil || x.conduction == nil || (q.turns+turns)%4 != 0 {
		return nil // the terms do not add up, or the one is taken out of the other
	}
	x.ratio = q.value
	return x
}

// isDissipation reports kinds of which every part is real: a real permittivity
// in a sum that gives one can but be an imaginary part.
func isDissipation(k kind.ID) bool {
	form, ok := kind.FormOf(k)
	return ok && form == kind.Dissipation || k.Is(kind.Conductivity) || k.Is(kind.LossFactor)
}

// quotient is one term over another, taken apart as σ/(ωε″).
type quotient struct {
	conduction lang.Factor
	losses     []lang.Factor // loss factors and loss indices below the line
	links      []lang.Factor // permittivities and capacitances
	omega      unit.Rat      // exponent of frequency
	turns      int           // quarter turns of the phase, from signs and j
	value      float64       // 0 where it is not known
	geometry   bool          // lengths are left
	other      bool          // something else is left
}

func newQuotient(n *lang.Note, a, b lang.Term) *quotient {
	ca, _ := a.Coef.Float64()
	cb, _ := b.Coef.Float64()
	q := &quotient{value: math.Abs(ca/cb) * math.Pow(math.Pi, float64(a.Pi-b.Pi))}
	if ca*cb < 0 {
		q.turns = 2
	}
	for _, f := range overFactors(a, b) {
		q.add(f)
		q.measure(n, f)
	}
	return q
}

// overFactors are the factors of a over b.
func overFactors(a, b lang.Term) []lang.Factor {
	out := slices.Clone(a.Factors)
	for _, f := range b.Factors {
		f.Exp = f.Exp.Neg()
		if i := slices.IndexFunc(out, func(g lang.Factor) bool { return g.Key == f.Key }); i >= 0 {
			out[i].Exp = out[i].Exp.Add(f.Exp)
			continue
		}
		out = append(out, f)
	}
	return slices.DeleteFunc(out, func(f lang.Factor) bool { return f.Exp.IsZero() || strings.HasPrefix(f.Key, "along ") })
}

// add sorts a factor in.
func (q *quotient) add(f lang.Factor) {
	turns, whole := f.Exp.Int()
	switch r := roleOf(f.Facts); {
	case f.Key == "j" && whole:
		q.turns += turns
	case isConduction(f) && q.conduction.Key == "":
		q.conduction = f
	case r == roleLoss && f.Exp == unit.Whole(-1):
		q.losses = append(q.losses, f)
	case r == roleCapacity, f.Call == "Im":
		q.links = append(q.links, f)
	case isOf(f.Facts, kind.Frequency):
		q.omega = q.omega.Add(f.Exp)
	case isOf(f.Facts, kind.Time):
		q.omega = q.omega.Add(f.Exp.Neg())
	case r == roleGeometry:
		q.geometry = true
	case strings.HasPrefix(f.Key, "#"):
	default:
		q.other = true
	}
}

// measure multiplies the value of a factor into that of the quotient.
func (q *quotient) measure(n *lang.Note, f lang.Factor) {
	if f.Key == "j" {
		return
	}
	x, ok := sizeOf(n, f)
	if r, is := rootOf(f); is {
		x, _ = r.Float64()
		ok = true
	}
	if !ok || f.Call != "" {
		q.value = 0
		return
	}
	q.value *= math.Pow(x, float64(f.Exp.Num())/float64(f.Exp.Den()))
}

// fits reports a conductivity over a frequency and what makes a permittivity;
// lengths may be left where a capacitance holds others.
func (q *quotient) fits() bool {
	if q.conduction.Key == "" || q.other || q.omega != unit.Whole(-1) || len(q.losses) > 1 || len(q.links) == 0 {
		return false
	}
	capacitor := slices.ContainsFunc(q.links, func(f lang.Factor) bool { return isOf(f.Facts, kind.Capacitance) })
	return !q.geometry || capacitor
}

// lossOf is the property or quantity that makes the dielectric loss, and the
// quarter turns that it adds to the phase of the quotient; nil where the
// permittivity is real.
func (q *quotient) lossOf(n *lang.Note) (of *lang.Symbol, turns int) {
	if len(q.losses) == 1 {
		return q.losses[0].Symbol, 0
	}
	for _, f := range q.links {
		switch {
		case f.Exp != unit.Whole(-1):
		case f.Call == "Im" && f.Bars:
			return lossWithin(n, f.Inside), 0
		case f.Call == "Im":
			return lossWithin(n, f.Inside), 2 // it is negative
		case f.Facts.Complex:
			return lossBehind(n, f), 1 // ε′ − jε″ below the line
		}
	}
	return nil, 0
}

// permittivity is the property that stands for the permittivity.
func (q *quotient) permittivity() *lang.Symbol {
	for _, f := range q.links {
		if f.Symbol != nil && f.Symbol.Stmt != nil {
			return f.Symbol
		}
	}
	return nil
}

// lossWithin finds what makes the imaginary part of a permittivity.
func lossWithin(n *lang.Note, f *lang.Form) *lang.Symbol {
	var found *lang.Symbol
	for _, t := range terms(f) {
		for _, x := range t.Factors {
			switch {
			case roleOf(x.Facts) == roleLoss, isConduction(x):
				return x.Symbol
			case x.Facts.Complex && found == nil && x.Key != "j":
				found = lossBehind(n, x)
			}
		}
	}
	return found
}

// lossBehind is what makes a permittivity complex: for eps_c what the medium
// states, else the permittivity itself.
func lossBehind(n *lang.Note, f lang.Factor) *lang.Symbol {
	medium, is := strings.CutSuffix(f.Key, ".eps_c")
	if f.Symbol != nil || !is {
		return f.Symbol
	}
	return firstOf(n, medium, "tan_delta", "sigma", "rho", "eps", "eps_r")
}
