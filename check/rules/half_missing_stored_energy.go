package rules

import (
	"fmt"
	"math/big"
	"strings"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// HalfMissingStoredEnergy finds energies that are products of final values.
func (Book) HalfMissingStoredEnergy() check.Rule {
	return check.Rule{
		Name:     "half-missing-stored-energy",
		Severity: lang.Error,
		Title:    "A stored energy is twice what it should be: its half is missing",
		Sees: "A stored energy or energy density that is a product of two amplitudes of the same state (C·U², Q·U, Q²/C, ε·E², E·D, D²/ε, L·I², λ·I, λ²/L, µ·H², B·H, B²/µ, " +
			"also times a volume, in a function, in a sum, and with fields in an integral over space) with a coefficient that is off 1/2 by exactly 2, for static, instantaneous or peak values. " +
			"A caution where the statistic is not stated in a note with rms values or a harmonic regime, or where the kind follows from the formula alone.",
		Silent: "For a source work or work, for heat, for a power such as C·U²·f; for rms values, of which the whole square is the energy at the crest; " +
			"for the mutual term of two currents, for a product with a coercivity (the area of a loop); " +
			"for a charge in a potential that others make (kind electric potential) or that is moved through a voltage without being stored by it; " +
			"for the electric and magnetic energy together (kind volumic electromagnetic energy); in a nonlinear medium, where half-product-nonlinear speaks; " +
			"for an energy per count, where the half is written and the rest is a whole number of equal parts.",
		Formula: "W = ∫U dQ = ∫(Q/C) dQ = Q²/(2C) = ½CU²; likewise w = ½E·D, w = ½B·H, W = ½LI².",
		Remedy:  "Put in the half, or call the result what it is: `W, source work = C*U^2`.",
		Source:  "Jackson, Classical Electrodynamics, 3rd ed., 1.11, 4.7 and 5.16 (from memory)",
		Wrong: check.Example{Note: `    C = 470 uF
    U, static voltage = 400 V
    W, stored energy = C*U^2 = 75.2 J
`},
		Right: check.Example{Note: `    C = 470 uF
    U, static voltage = 400 V
    W, stored energy = 1/2 * C*U^2 = 37.6 J
`},
		Run: perSpot(halfMissing),
	}
}

func halfMissing(p *check.Pass, s *spot) {
	for _, c := range s.claims {
		if c.isStored() {
			checkHalf(p, c)
		}
	}
	for _, sym := range s.symbols {
		if c := newFunctionClaim(viewOf(p), sym); c != nil && c.isStored() {
			checkHalf(p, c)
		}
	}
}

// isStored reports whether the claim is a stored energy or its density.
func (c *claim) isStored() bool {
	k := c.sym.Facts.Kind
	if form, ok := c.form(); !ok || form != kind.StoredEnergy || k.Is(kind.Coenergy) || k.Is(kind.CoenergyDensity) {
		return false
	}
	words := c.words()
	return !strings.Contains(words, "work") && !c.isTotal()
}

// isTotal reports whether the words mean the electric and the magnetic energy
// together, as ISO 80000-6 does by this name.
func (c *claim) isTotal() bool { return strings.Contains(c.words(), "electromagnetic") }

func checkHalf(p *check.Pass, c *claim) {
	if _, speaks := c.nonlinear(); speaks || !c.declared() && c.usedElsewhere() {
		return
	}
	squares, ok := c.squares(kind.StoredEnergy)
	if !ok {
		squares, ok = c.squaresWithin(kind.StoredEnergy)
	}
	if !ok || c.stated && c.stat != kind.Static && c.stat != kind.Instantaneous && c.stat != kind.Peak {
		return
	}
	for _, q := range squares {
		if off := c.halfOff(q); off != nil {
			c.reportHalf(p, q, off, len(squares) == 1)
			return
		}
	}
}

// halfOff tells by what factor a term is off its half: 2, 1/2, or nil.
func (c *claim) halfOff(q *square) *big.Rat {
	if q.mixed || q.stat == kind.RMS || q.stat == kind.PeakToPeak || q.stat == kind.Average || !c.sameState(q) {
		return nil
	}
	by := []*big.Rat{big.NewRat(2, 1)}
	found := numbersOf(c.note, c.sym)
	if q.stat == kind.Static && !found.raised {
		by = append(by, big.NewRat(1, 2))
	}
	return q.off(found, big.NewRat(1, 2), by...)
}

// sameState reports whether both amplitudes belong to one state: a square
// always, a charge and a voltage if one follows from the other or the words
// speak of a store, fields and fluxes unless the charge sits in a potential.
func (c *claim) sameState(q *square) bool {
	if len(q.amplitudes) == 1 {
		return true
	}
	a, b := q.amplitudes[0], q.amplitudes[1]
	if a.Facts.Dim.Base() == b.Facts.Dim.Base() || a.Symbol == nil && b.Symbol == nil {
		return false // a mutual term, which counts once; or bare numbers
	}
	if a.Facts.Kind.Is(kind.Coercivity) || b.Facts.Kind.Is(kind.Coercivity) {
		return false // the area of a loop
	}
	if a.Facts.Kind.Is(kind.ElectricPotential) || b.Facts.Kind.Is(kind.ElectricPotential) {
		return false
	}
	charge := isCharge(a) || isCharge(b)
	if !charge || strings.Contains(c.words(), "stored") {
		return true
	}
	return a.Symbol != nil && b.Symbol != nil && (dependsOn(c.note, a.Symbol, b.Symbol) || dependsOn(c.note, b.Symbol, a.Symbol))
}

// isCharge reports a charge or a charge density, which may be moved by a
// voltage instead of being stored by it.
func isCharge(f lang.Factor) bool {
	base := f.Facts.Dim.Base()
	for _, k := range []kind.ID{kind.ElectricCharge, kind.LineicElectricCharge, kind.VolumicElectricCharge} {
		if base == k.Dim().Base() {
			return true
		}
	}
	return false
}

func (c *claim) reportHalf(p *check.Pass, q *square, off *big.Rat, alone bool) {
	f := lang.Fault{
		Severity: c.halfSeverity(p, q),
		Message:  fmt.Sprintf("%s is %s times the energy that is stored: the half is missing", c.sym.Name, times(off)),
		Detail:   fmt.Sprintf("Write `1/2 * %s`.", c.text()),
		Related: c.because(q.amplitudes, func(s *lang.Symbol) string {
			return s.Name + " is the final value; it was less while the store was filled"
		}),
	}
	if off.Cmp(big.NewRat(1, 1)) < 0 {
		f.Message = fmt.Sprintf("%s is %s times the energy that is stored: it is halved twice", c.sym.Name, times(off))
		f.Detail = "The coefficient of a stored energy is 1/2 for static values."
	} else if alone {
		f.Fix = &lang.Fix{Title: "Put in the half", Edits: []lang.Edit{insert(c.span().Start, "1/2 * ")}}
	}
	f.Detail += c.halfUnless(f.Severity)
	c.report(p, f)
}

// halfSeverity is one level lower where a fact is missing.
func (c *claim) halfSeverity(p *check.Pass, q *square) lang.Severity {
	if !c.declared() || !q.known && (c.harmonic() || c.view.hasRMS) {
		return p.Lowered()
	}
	return p.Rule.Severity
}

// halfUnless names the fact that would silence the finding.
func (c *claim) halfUnless(s lang.Severity) string {
	unless := fmt.Sprintf(" If it is the energy that a source delivers at constant voltage or current, write `%s, source work = …`", c.sym.Name)
	if s != lang.Error && (c.harmonic() || c.view.hasRMS) {
		return unless + fmt.Sprintf("; if the amplitudes are rms values and %s is the energy at the crest, say so at their definitions.", c.sym.Name)
	}
	return unless + "."
}

// insert is an edit that puts text in.
func insert(at int, text string) lang.Edit {
	return lang.Edit{Span: lang.Span{Start: at, End: at}, New: text}
}
