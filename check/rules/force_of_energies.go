package rules

import (
	"fmt"
	"math"
	"math/big"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
)

// This file looks at forces that are made of energies at two positions: what
// was held between the two, the current or the flux.

// held is what an energy ends with: the greatest current or voltage, and the
// greatest flux or charge, that its definition goes to.
type held struct {
	field, flux       float64
	hasField, hasFlux bool
	table             *lang.Symbol // of the characteristic, nil for none
	field0, flux0     string       // its columns
}

// holder collects what an energy ends with.
type holder struct {
	note *lang.Note
	seen map[string]bool
	out  held
}

// heldBy reads the definition of an energy down to its inputs.
func heldBy(n *lang.Note, s *lang.Symbol) held {
	h := &holder{note: n, seen: map[string]bool{}}
	h.symbol(s)
	return h.out
}

func (h *holder) symbol(s *lang.Symbol) {
	if s == nil || s.Def == nil || h.seen[s.Key] || len(s.Def.Members) == 0 {
		return
	}
	h.seen[s.Key] = true
	params := map[string]bool{}
	for _, p := range s.Def.Params {
		params[lang.CanonicalName(p.Text)] = true
	}
	lang.Walk(s.Def.Members[0], func(t lang.Tree) bool {
		switch t := t.(type) {
		case *lang.Name:
			if key := lang.CanonicalName(t.Text); !params[key] {
				h.name(h.note.Lookup(key))
			}
		case *lang.Range:
			if t.To != nil {
				if f, ok := h.note.FactsOf(s.Stmt, t.To); ok {
					v, known := valueOf(h.note, t.To)
					h.value(f, v, known)
				}
			}
		case *lang.Member:
			h.column(t)
		}
		return true
	})
}

// name takes the value of a current or flux, and looks through everything else.
func (h *holder) name(s *lang.Symbol) {
	if s == nil || s.Role != lang.RoleQuantity {
		return
	}
	if isField(s.Facts) || isFluxQuantity(s.Facts) {
		v, known := magnitude(s)
		h.value(s.Facts, v, known)
	}
	h.symbol(s)
}

func (h *holder) value(f lang.Facts, v float64, known bool) {
	switch {
	case !known:
	case isField(f):
		h.out.field, h.out.hasField = math.Max(h.out.field, math.Abs(v)), true
	case isFluxQuantity(f):
		h.out.flux, h.out.hasFlux = math.Max(h.out.flux, math.Abs(v)), true
	}
}

// column notes the table of a characteristic.
func (h *holder) column(m *lang.Member) {
	t, name := columnOwner(h.note, m)
	if t == nil {
		return
	}
	s := h.note.Lookup(t.Key + "." + name)
	if s == nil || s.Facts.Shape != eval.List {
		return
	}
	h.out.table = t
	tree, ok := t.Stmt.Tree.(*lang.Table)
	if !ok {
		return
	}
	for _, col := range tree.Columns {
		key := lang.CanonicalName(col.Name.Text)
		c := h.note.Lookup(t.Key + "." + key)
		switch {
		case c == nil:
		case isField(c.Facts):
			h.out.field0 = key
		case isFluxQuantity(c.Facts):
			h.out.flux0 = key
		}
	}
}

func isField(f lang.Facts) bool { return isOf(f, kind.ElectricCurrent) || isOf(f, kind.Voltage) }

func isFluxQuantity(f lang.Facts) bool {
	return isOf(f, kind.MagneticFlux) || isOf(f, kind.ElectricCharge)
}

// curve is the flux over the current of the characteristic.
func (h held) curve(n *lang.Note) (curve, bool) {
	if h.table == nil || h.field0 == "" || h.flux0 == "" {
		return curve{}, false
	}
	return curveOf(n, h.table.Key, h.field0, h.flux0)
}

// bent reports a characteristic that is not straight as far as the current goes.
func (h held) bent(n *lang.Note) bool {
	k, ok := h.curve(n)
	if !ok {
		return false
	}
	to, _ := k.tip()
	if h.hasField {
		to = h.field
	}
	return !k.proportional(to, straightTolerance)
}

// complete fills in the current that goes with a flux on the characteristic.
func (h held) complete(n *lang.Note) held {
	if h.hasField || !h.hasFlux || h.table == nil || h.field0 == "" || h.flux0 == "" {
		return h
	}
	if k, ok := curveOf(n, h.table.Key, h.flux0, h.field0); ok && k.reaches(h.flux, h.flux) {
		h.field, h.hasField = k.at(h.flux), true
	}
	return h
}

// positions are the two energies, or halves of products, of which a force is
// the difference.
type positions struct {
	a, b    lang.Factor // the energies; without a symbol where they are half products
	half    bool
	current float64 // of half products: the one that both have
}

// forceOfEnergies judges a force that is a difference of two energies over a
// distance.
func (c *claim) forceOfEnergies(p *check.Pass) {
	w, ok := c.twoPositions()
	if !ok {
		c.derivedForce(p)
		return
	}
	if w.half {
		c.forceOfHalves(p, w)
		return
	}
	a, b := heldBy(c.note, w.a.Symbol).complete(c.note), heldBy(c.note, w.b.Symbol).complete(c.note)
	_, nonlinear := mediaSay(c.note, c.sym)
	if !a.bent(c.note) && !b.bent(c.note) && !nonlinear {
		return
	}
	sameField := a.hasField && b.hasField && withinOne(a.field, b.field)
	sameFlux := a.hasFlux && b.hasFlux && withinOne(a.flux, b.flux)
	switch k := w.a.Facts.Kind; {
	case isEnergyNoCoenergy(k) && sameField && !sameFlux:
		c.reportSwap(p, w, fmt.Sprintf("%s is the difference of two energies at the same %s: at fixed %[2]s the force is the change of the coenergy", c.sym.Name, fieldWord(a)), c.byTables(a, b))
	case isCoenergy(k) && sameFlux && !sameField:
		c.reportSwap(p, w, fmt.Sprintf("%s is the difference of two coenergies at the same flux: at fixed flux the force is the change of the energy", c.sym.Name), "")
	}
}

// fieldWord tells currents from voltages.
func fieldWord(h held) string {
	if h.table == nil || h.hasFlux && h.flux0 == "" {
		return "current or voltage"
	}
	return "current"
}

// byTables compares the change of the coenergy with that of the energy.
func (c *claim) byTables(a, b held) string {
	ka, okA := a.curve(c.note)
	kb, okB := b.curve(c.note)
	if !okA || !okB || !ka.reaches(0, a.field) || !kb.reaches(0, b.field) {
		return ""
	}
	ca, cb := ka.area(0, a.field), kb.area(0, b.field)
	wa, wb := ka.at(a.field)*a.field-ca, kb.at(b.field)*b.field-cb
	if wa == wb {
		return ""
	}
	return fmt.Sprintf(" By the tables the coenergy changes by %.3g J, and the energy by %.3g J.", ca-cb, wa-wb)
}

func (c *claim) reportSwap(p *check.Pass, w positions, message, numbers string) {
	c.report(p, lang.Fault{
		Message: message,
		Detail:  "Take F = +∂W′/∂x from the coenergies at fixed current, or F = −∂W/∂x from the energies at fixed flux; in an element that is not linear no other pairing holds." + numbers,
		Related: c.because([]lang.Factor{w.a, w.b}, func(s *lang.Symbol) string { return s.Name + " is " + withArticle(s.Facts.Kind.String()) }),
	})
}

// twoPositions sees a form as k·(W_a − W_b).
func (c *claim) twoPositions() (positions, bool) {
	ts := products(c.note.Normal(c.sym, atoms))
	if len(ts) != 2 || new(big.Rat).Add(ts[0].coef, ts[1].coef).Sign() != 0 {
		return positions{}, false
	}
	if ts[0].coef.Sign() < 0 {
		ts[0], ts[1] = ts[1], ts[0]
	}
	a, okA := energyFactor(ts[0])
	b, okB := energyFactor(ts[1])
	if okA && okB && a.Facts.Kind != 0 && isCoenergy(a.Facts.Kind) == isCoenergy(b.Facts.Kind) {
		return positions{a: a, b: b}, true
	}
	fa, ia, okA := fluxTimesField(ts[0])
	fb, ib, okB := fluxTimesField(ts[1])
	x, known := sizeOf(c.note, ia)
	y, known2 := sizeOf(c.note, ib)
	half := new(big.Rat).Abs(ts[0].coef).Cmp(big.NewRat(1, 2)) == 0
	if okA && okB && half && (ia.Key == ib.Key || known && known2 && withinOne(x, y)) && fa.Key != fb.Key {
		return positions{a: fa, b: fb, half: true, current: x}, true
	}
	return positions{}, false
}

// energyFactor is the energy of a term that stands beside lengths and angles.
func energyFactor(t *product) (w lang.Factor, ok bool) {
	for _, f := range t.all {
		switch r := roleOf(f.Facts); {
		case f.Symbol != nil && f.Symbol.Facts.KindBy == lang.Declared && (isEnergyNoCoenergy(f.Facts.Kind) || isCoenergy(f.Facts.Kind)) && !ok:
			w, ok = f, true
		case r != roleGeometry && r != roleNumber:
			return w, false
		}
	}
	return w, ok
}

// fluxTimesField finds Ψ·i or Q·U in a term beside lengths and angles.
func fluxTimesField(t *product) (flux, field lang.Factor, ok bool) {
	n := 0
	for _, f := range t.all {
		switch r := roleOf(f.Facts); {
		case isFluxQuantity(f.Facts):
			flux, n = f, n+1
		case isField(f.Facts):
			field, n = f, n+1
		case r != roleGeometry && r != roleNumber:
			return flux, field, false
		}
	}
	return flux, field, n == 2 && flux.Symbol != nil
}

// forceOfHalves judges the difference of two halves of current and flux.
func (c *claim) forceOfHalves(p *check.Pass, w positions) {
	a, b := heldBy(c.note, w.a.Symbol), heldBy(c.note, w.b.Symbol)
	a.field, a.hasField, b.field, b.hasField = w.current, w.current > 0, w.current, w.current > 0
	_, nonlinear := mediaSay(c.note, c.sym)
	if !a.bent(c.note) && !b.bent(c.note) && !nonlinear {
		return
	}
	c.reportSwap(p, w, fmt.Sprintf("%s is the difference of two halves of current and flux: where the element saturates that is neither the energy nor the coenergy", c.sym.Name), c.byTables(a, b))
}

// derivedForce judges the derivative of an energy that is a function of the
// position at a fixed current or voltage, in a nonlinear medium.
func (c *claim) derivedForce(p *check.Pass) {
	for _, x := range productFactors(c.x) {
		if u, ok := x.(*lang.Unary); ok {
			x = unwrapped(u.X)
		}
		d, ok := x.(*lang.Call)
		if !ok || d.Fn.Text != "derivative" || len(d.Args) != 1 {
			continue
		}
		body, ok := unwrapped(d.Args[0]).(*lang.Call)
		if !ok {
			continue
		}
		fn := calledFunction(c.note, body)
		if fn == nil || fn.Facts.KindBy != lang.Declared {
			continue
		}
		_, nonlinear := mediaSay(c.note, fn)
		h := heldBy(c.note, fn)
		w := positions{a: lang.Factor{Symbol: fn, Facts: fn.Facts}}
		switch {
		case !nonlinear && !h.bent(c.note):
		case isEnergyNoCoenergy(fn.Facts.Kind) && h.hasField && !h.hasFlux:
			c.reportSwap(p, w, fmt.Sprintf("%s is the derivative of an energy at a fixed current or voltage: there the force is the derivative of the coenergy", c.sym.Name), "")
		case isCoenergy(fn.Facts.Kind) && h.hasFlux && !h.hasField:
			c.reportSwap(p, w, fmt.Sprintf("%s is the derivative of a coenergy at a fixed flux or charge: there the force is minus the derivative of the energy", c.sym.Name), "")
		}
	}
}
