package rules

import (
	"fmt"
	"math/big"
	"slices"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// SourceWorkHalved finds the energy of the store given as what the source
// delivers.
func (Book) SourceWorkHalved() check.Rule {
	return check.Rule{
		Name:     "source-work-halved",
		Severity: lang.Caution,
		Title:    "What a source delivers at constant voltage is twice what is stored, and the heat of charging is left out",
		Sees: "A source work that is ½·C·U², ½·Q·U, Q²/(2C) or a stored energy of that make, in a linear circuit; a charging heat of 0; " +
			"a stored energy Q·U (C·U²) times an efficiency of 0.4 to 0.6, which stands for the half.",
		Silent: "For the whole product; for a sum with another term, such as the heat of the charging resistor, which closes the balance; in a note with an inductance, which charges by resonance or as a converter, " +
			"and where the charge is a current times a time (constant current); for rms and average values; in a nonlinear medium.",
		Formula: "At constant U the source gives QU = CU²: ½CU² is stored and ½CU² becomes heat, whatever the series resistance.",
		Remedy:  "Write the balance: `W_s, source work = C*U^2`, `Q_h, charging heat = W_s - W`.",
		Source:  "Feynman, Leighton, Sands, Lectures on Physics, vol. II, 8-2 (energy of a condenser; from memory), and common practice",
		Wrong: check.Example{Note: `    C = 470 uF
    U, static voltage = 400 V
    W_s, source work = 1/2*C*U^2 = 37.6 J
`},
		Right: check.Example{Note: `    C = 470 uF
    U, static voltage = 400 V
    W_s, source work = C*U^2 = 75.2 J
`},
		Run: sourceHalved,
	}
}

func sourceHalved(p *check.Pass) error {
	if hasInductance(p.Note) {
		return nil
	}
	for _, c := range viewOf(p).claims {
		c.sourceBalance(p)
	}
	for _, s := range p.Note.Symbols {
		if s.Facts.Kind.Is(kind.ChargingHeat) && s.Input && s.Known && s.Value.Len() == 1 && s.Value.Re() == 0 {
			p.Report(lang.Fault{
				Span:    s.Span,
				Message: fmt.Sprintf("%s is zero, and charging at constant voltage turns as much into heat as it stores, whatever the resistance", s.Name),
				Detail:  "Write the source work less the stored energy. A resonant charger shows by its inductance, a ramped one by a charge that is a current times a time.",
			})
		}
	}
	return nil
}

// hasInductance reports an inductor in the note: it charges and moves charge
// without the loss of a resistance.
func hasInductance(n *lang.Note) bool {
	return slices.ContainsFunc(n.Symbols, func(s *lang.Symbol) bool {
		return s.Role == lang.RoleQuantity && isOf(s.Facts, kind.Inductance)
	})
}

// throughStores looks through auxiliary names and through names of energies.
func throughStores(s *lang.Symbol) bool { return atoms(s) || isOf(s.Facts, kind.Energy) }

// sourceBalance judges a source work and a stored energy that is made with an
// efficiency.
func (c *claim) sourceBalance(p *check.Pass) {
	if _, speaks := c.nonlinear(); speaks {
		return
	}
	ps := products(c.note.Normal(c.sym, throughStores))
	if len(ps) != 1 {
		return
	}
	q := squareOf(c.note, ps[0], kind.StoredEnergy)
	if q == nil || q.pi != 0 || len(q.byRole[roleElectric]) == 0 || q.known && q.stat != kind.Static && q.stat != kind.Instantaneous || q.mixed || c.ramped(q) {
		return
	}
	found := numbersOf(c.note, c.sym)
	halved := found.mayBe(q.coef, big.NewRat(1, 2)) && !found.mayBe(q.coef, big.NewRat(1, 1))
	switch half := c.halfByEfficiency(q); {
	case c.sym.Facts.Kind.Is(kind.SourceWork) && halved && len(ps[0].byRole[roleNumber]) == 0:
		c.report(p, lang.Fault{
			Message: fmt.Sprintf("%s is half of what a source delivers at constant voltage: this is what is stored", c.sym.Name),
			Detail: fmt.Sprintf("Leave the half out: the other half becomes heat in any series resistance. For the store write `%s, stored energy = …`; "+
				"a resonant charger shows by its inductance, a ramped one by a charge that is a current times a time.", c.sym.Name),
			Related: c.because(q.amplitudes, func(s *lang.Symbol) string { return s.Name + " = " + s.Shown }),
		})
	case half != nil && c.isStored():
		c.report(p, lang.Fault{
			Message: fmt.Sprintf("%s takes the half of a stored energy for an efficiency, %s", c.sym.Name, half.Name),
			Detail:  "Half of the charge crosses less than half of the voltage, with any charger: write 1/2, and let an efficiency stand beside the source work.",
			Related: c.because([]lang.Factor{{Symbol: half}}, func(s *lang.Symbol) string { return s.Name + " = " + s.Shown }),
		})
	}
}

// halfByEfficiency is an efficiency near 1/2 beside the whole product.
func (c *claim) halfByEfficiency(q *square) *lang.Symbol {
	if !q.is(1, 1) {
		return nil
	}
	for _, f := range q.byRole[roleNumber] {
		if x, known := magnitude(f.Symbol); f.Facts.Kind.Is(kind.Efficiency) && known && f.Exp == unit.Whole(1) && x >= 0.4 && x <= 0.6 {
			return f.Symbol
		}
	}
	return nil
}

// ramped reports a charge that is made of a current and a time: a source of
// constant current delivers what is stored.
func (c *claim) ramped(q *square) bool {
	for _, f := range q.byRole[roleElectric] {
		if f.Symbol != nil && restsOn(c.note, f.Symbol, func(s *lang.Symbol) bool { return isOf(s.Facts, kind.ElectricCurrent) }) {
			return true
		}
	}
	return false
}
