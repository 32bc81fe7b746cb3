package rules

import (
	"fmt"
	"math"
	"math/big"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// EnergySuperposition finds energies and powers of parts that are added although
// the parts are one field.
func (Book) EnergySuperposition() check.Rule {
	return check.Rule{
		Name:     "energy-superposition",
		Severity: lang.Error,
		Title:    "Energies of the parts of one field are added, and the term between the parts is missing",
		Sees: "An energy, a power, a pressure or a density that is a sum of squares of two fields, voltages or currents with the same other factors, where the note adds these two to one field " +
			"(`E = E_1 + E_2`, or their difference), and no product of the two stands beside the squares, also under names of their own and in integrals; for currents and voltages where the note has the square of their sum with the same factors, too.",
		Silent: "With the product; for vectors at right angles in an isotropic medium; for a static and an alternating part in an average; for averages of parts under regimes of different frequencies; for incoherent parts; " +
			"for a root of the sum of squares; for parts in different media or volumes. A caution for a static and an alternating part where the result does not say that it is an average.",
		Formula: "|E₁ + E₂|² = E₁² + E₂² + 2E₁·E₂: fields superpose, energies do not. For two equal fields in phase the energy is 4 times that of one, not 2 times.",
		Remedy:  "Add the fields first: `1/2*eps_0*(E_1 + E_2)^2`.",
		Source:  "Jackson, Classical Electrodynamics, 3rd ed., 1.11 (interaction term of the energy density, eq. 1.57; from memory)",
		Wrong: check.Example{Note: `    E_1, static electric field strength = 2.0 MV/m
    E_2, static electric field strength = 1.5 MV/m
    E, static electric field strength = E_1 + E_2 = 3.5 MV/m
    w, energy density = 1/2*eps_0*(E_1^2 + E_2^2) = 27.7 J/m^3
`},
		Right: check.Example{Note: `    E_1, static electric field strength = 2.0 MV/m
    E_2, static electric field strength = 1.5 MV/m
    E, static electric field strength = E_1 + E_2 = 3.5 MV/m
    w, energy density = 1/2*eps_0*E^2 = 54.2 J/m^3
`},
		Run: superposition,
	}
}

func superposition(p *check.Pass) error {
	sums := summedPairs(p)
	if len(sums) == 0 {
		return nil
	}
	for _, c := range viewOf(p).claims {
		if _, ok := c.form(); ok || c.sym.Facts.Kind.Is(kind.Pressure) {
			c.superposed(p, sums)
		}
	}
	return nil
}

// pair is two symbols in the order of their keys.
type pair [2]string

func inOrder(a, b string) pair {
	if a > b {
		a, b = b, a
	}
	return pair{a, b}
}

// summedPairs finds the amplitudes that the note adds to one, and by what name.
func summedPairs(p *check.Pass) map[pair]*lang.Symbol {
	out := map[pair]*lang.Symbol{}
	for _, sym := range p.Note.Symbols {
		if sym.Role != lang.RoleQuantity && sym.Role != lang.RoleFunction || sym.Def == nil || sym.Input || !isAmplitude(sym.Facts) {
			continue
		}
		form := p.Note.Apart(sym, lang.NamesStay)
		if form == nil || len(form.Terms) < 2 {
			continue
		}
		var keys []string
		for _, t := range form.Terms {
			if len(t.Factors) == 1 && t.Factors[0].Symbol != nil && t.Factors[0].Exp == unit.Whole(1) && new(big.Rat).Abs(t.Coef).Cmp(pow2(0)) == 0 {
				keys = append(keys, t.Factors[0].Symbol.Key)
			}
		}
		for i := range keys {
			for j := range i {
				out[inOrder(keys[i], keys[j])] = sym
			}
		}
	}
	return out
}

// throughSquares looks through auxiliary names and through names of what is
// quadratic in the fields.
func throughSquares(s *lang.Symbol) bool {
	_, quadratic := kind.FormOf(s.Facts.Kind)
	return atoms(s) || quadratic
}

// superposed reports squares of two summed amplitudes without their product.
func (c *claim) superposed(p *check.Pass, sums map[pair]*lang.Symbol) {
	form := c.note.Apart(c.sym, throughSquares)
	if form == nil || len(form.Terms) < 2 {
		return
	}
	for i := range form.Terms {
		a, restA := squaredIn(form.Terms[i])
		for j := range i {
			b, restB := squaredIn(form.Terms[j])
			if a == nil || b == nil || restA != restB || form.Terms[i].Coef.Cmp(form.Terms[j].Coef) != 0 {
				continue
			}
			sum := sums[inOrder(a.Symbol.Key, b.Symbol.Key)]
			if sum == nil || hasProduct(form, a.Key, b.Key) || c.apart(a, b) || !isLocal(*a) && !c.view.squares(sum, restA) {
				continue
			}
			c.report(p, lang.Fault{
				Severity: c.ofSum(p, a, b),
				Message:  fmt.Sprintf("%s adds the energies of %s and %s, which add to one field: the term with their product is missing%s", c.sym.Name, a.Symbol.Name, b.Symbol.Name, missingFactor(a, b)),
				Detail:   fmt.Sprintf("Add the fields first, as in %s. Say why the product vanishes if it does: other directions, or an average over different frequencies.", sum.Name),
				Related:  []lang.Related{{Span: sum.Span, Message: sum.Name + " adds them"}},
			})
			return
		}
	}
}

// isLocal reports a field, of which the parts are in one place. Currents that add
// at a node flow through parts of their own, and so do voltages in series.
func isLocal(f lang.Factor) bool {
	return !isOf(f.Facts, kind.ElectricCurrent) && !isOf(f.Facts, kind.Voltage)
}

// squares reports a definition with the square of a sum beside the same other
// factors: the sum is in the same element as its parts.
func (v *view) squares(sum *lang.Symbol, rest string) bool {
	for _, c := range v.claims {
		form := v.note.Form(c.sym, c.x, atoms)
		if form == nil {
			continue
		}
		for _, t := range form.Terms {
			if a, r := squaredIn(t); a != nil && a.Key == sum.Key && r == rest {
				return true
			}
		}
	}
	return false
}

// squaredIn is the amplitude whose square stands in a term, and the key of
// everything else.
func squaredIn(t lang.Term) (*lang.Factor, string) {
	var found *lang.Factor
	rest := fmt.Sprint("π", t.Pi)
	for i := range t.Factors {
		f := &t.Factors[i]
		if f.Exp == two && f.Symbol != nil && isAmplitude(f.Facts) && found == nil {
			found = f
			continue
		}
		rest += "·" + f.Key + "^" + f.Exp.String()
	}
	return found, rest
}

// hasProduct reports a term in which both amplitudes stand.
func hasProduct(form *lang.Form, a, b string) bool {
	for _, t := range form.Terms {
		n := 0
		for _, f := range t.Factors {
			if f.Key == a || f.Key == b {
				n++
			}
		}
		if n == 2 {
			return true
		}
	}
	return false
}

// apart reports parts whose product does not count: at right angles, in other
// media, incoherent, or in a mean of a static and an alternating one or of other
// frequencies.
func (c *claim) apart(a, b *lang.Factor) bool {
	if ma, mb := a.Symbol.Def, b.Symbol.Def; ma != nil && mb != nil && ma.In != nil && mb.In != nil && lang.CanonicalName(ma.In.Text) != lang.CanonicalName(mb.In.Text) {
		return true
	}
	if a.Symbol.Facts.Coherence == kind.Incoherent || b.Symbol.Facts.Coherence == kind.Incoherent || c.sym.Facts.Coherence == kind.Incoherent {
		return true
	}
	return c.overCycles(a, b) || c.square(a, b)
}

// overCycles reports a mean in which the product averages out.
func (c *claim) overCycles(a, b *lang.Factor) bool {
	sa, sb := statOf(c.note, *a), statOf(c.note, *b)
	mean := c.sym.Facts.Qualifier == kind.Average || sa == kind.RMS || sb == kind.RMS
	if sa != sb && (sa == kind.Static || sb == kind.Static) {
		return mean
	}
	wa, fa := c.note.Regime(a.Symbol)
	wb, fb := c.note.Regime(b.Symbol)
	return wa == "harmonic" && wb == "harmonic" && fa != fb && (mean || c.sym.Facts.Qualifier == kind.Unqualified)
}

// square reports two vectors at right angles; in an anisotropic medium the
// product of one with the flux density of the other may remain.
func (c *claim) square(a, b *lang.Factor) bool {
	for _, m := range c.mediaOf() {
		if m.anisotropic() {
			return false
		}
	}
	va, okA := direction(a.Symbol)
	vb, okB := direction(b.Symbol)
	dot := 0.0
	for i := range 3 {
		dot += va[i] * vb[i]
	}
	la, lb := va[0]*va[0]+va[1]*va[1]+va[2]*va[2], vb[0]*vb[0]+vb[1]*vb[1]+vb[2]*vb[2]
	return okA && okB && math.Abs(dot) < 1e-9*math.Sqrt(la*lb)
}

// ofSum is one level lower where the result may be meant as a mean of a static
// and an alternating part.
func (c *claim) ofSum(p *check.Pass, a, b *lang.Factor) lang.Severity {
	sa, sb := statOf(c.note, *a), statOf(c.note, *b)
	if sa != sb && (sa == kind.Static || sb == kind.Static) && c.sym.Facts.Qualifier == kind.Unqualified {
		return p.Lowered()
	}
	return p.Rule.Severity
}

// missingFactor tells by what the sum of squares is off, where both are known
// numbers in phase.
func missingFactor(a, b *lang.Factor) string {
	x, ok1 := magnitude(a.Symbol)
	y, ok2 := magnitude(b.Symbol)
	if !ok1 || !ok2 || x == 0 || a.Symbol.Value.Len() != 1 {
		return ""
	}
	return fmt.Sprintf(" (in phase, the energy is %.3g times this)", (x+y)*(x+y)/(x*x+y*y))
}
