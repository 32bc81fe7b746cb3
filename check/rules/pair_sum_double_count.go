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

// PairSumDoubleCount finds energies of assemblies in which every pair of charges
// or currents stands twice.
func (Book) PairSumDoubleCount() check.Rule {
	return check.Rule{
		Name:     "pair-sum-double-count",
		Severity: lang.Error,
		Title:    "The energy of an assembly counts every pair of its charges or currents twice",
		Sees: "An energy that is Σq·φ (over a list, as an integral of ρ·φ, or term by term), Σλ·I or an integral of J·A with the coefficient 1, where the potentials or fluxes are made by these same charges or currents; " +
			"and a sum of q_i·q_j/(4πε·r_ij) in which the same pair at the same distance stands twice. " +
			"A caution where the note does not show who makes the potential, and for one charge in a potential that is computed from a charge of the same name.",
		Silent: "For sums over pairs i < j (assembly_energy too) and for charges that are brought in one after the other, each in the potential of those before it; for a potential that other charges make, " +
			"by its formula or by its kind (external electric potential); for an interaction energy; for work; for rms values.",
		Formula: "W = ½Σᵢ qᵢφᵢ = Σ_{i<j} qᵢqⱼ/(4πε·rᵢⱼ); likewise ½∫ρφ dV, ½Σλᵢ·Iᵢ, ½∫J·A dV. The full sum meets each pair twice, once from each side.",
		Remedy:  "Put in the half, or sum over the pairs: `assembly_energy(t.q, t.x, t.y, t.z)`. If others make the potential, say so: `φ, external electric potential = …`.",
		Source:  "Jackson, Classical Electrodynamics, 3rd ed., 1.11 and 5.16 (from memory)",
		Wrong: check.Example{Note: `    q_a = 3 nC
    q_b = 5 nC
    r = 40 mm
    φ_a, electric potential = q_b/(4*pi*eps_0*r)
    φ_b, electric potential = q_a/(4*pi*eps_0*r)
    W, energy = q_a*φ_a + q_b*φ_b = 6.74 uJ
`},
		Right: check.Example{Note: `    q_a = 3 nC
    q_b = 5 nC
    r = 40 mm
    φ_a, electric potential = q_b/(4*pi*eps_0*r)
    φ_b, electric potential = q_a/(4*pi*eps_0*r)
    W, energy = 1/2*(q_a*φ_a + q_b*φ_b) = 3.37 uJ
`},
		Run: perClaim(pairSum),
	}
}

func pairSum(p *check.Pass, c *claim) {
	if !c.isAssembly() {
		return
	}
	gs := c.couplings()
	doubt := (*coupling)(nil)
	for _, g := range gs {
		switch {
		case g.isExternal() || g.unsuited() || !g.offHalf() && !g.equalCharges(gs):
		case g.twice(gs):
			c.reportPairs(p, g, gs)
			return
		case doubt == nil && g.doubtful():
			doubt = g
		}
	}
	if !c.pairsTwice(p) && doubt != nil {
		c.reportDoubt(p, doubt)
	}
}

// isAssembly reports a claim that is the energy of an assembly as a whole.
func (c *claim) isAssembly() bool {
	return c.isStored() && !c.sym.Facts.Kind.Is(kind.InteractionEnergy) && (c.declared() || !c.usedElsewhere()) && c.stat != kind.Average
}

// twice reports a term of which the note shows that its pairs stand twice.
func (g *coupling) twice(all []*coupling) bool {
	if g.many && (g.self() || g.shared()) {
		return true
	}
	for _, h := range all {
		if g.mutual(h) && h.offHalf() && !h.isExternal() {
			return true
		}
	}
	return g.equalCharges(all)
}

// equalCharges reports N equal charges of one name, each in the potential of
// the other N − 1.
func (g *coupling) equalCharges(all []*coupling) bool {
	n := new(big.Rat)
	var met *big.Rat
	for _, h := range all {
		if h.source.Key != g.source.Key {
			continue
		}
		n.Add(n, h.coef)
		w := h.met()
		if w == nil || met != nil && met.Cmp(w) != 0 {
			return false
		}
		met = w
	}
	return met != nil && n.Cmp(big.NewRat(2, 1)) >= 0 && new(big.Rat).Add(met, big.NewRat(1, 1)).Cmp(n) == 0
}

// met counts the point charges that make the potential of a term, all equal to
// its source; nil where the potential is something else.
func (g *coupling) met() *big.Rat {
	if g.field.Symbol == nil || g.many {
		return nil
	}
	form := g.claim.note.Normal(g.field.Symbol, lang.Through)
	if form == nil || len(form.Terms) == 0 {
		return nil
	}
	sum := new(big.Rat)
	for _, t := range form.Terms {
		q := newProduct(t)
		fs := q.byRole[roleElectric]
		if len(fs) != 1 || fs[0].Key != g.source.Key || fs[0].Exp != unit.Whole(1) || q.pi != -1 {
			return nil
		}
		sum.Add(sum, new(big.Rat).Mul(q.coef, big.NewRat(4, 1)))
	}
	return sum
}

// doubtful reports a term of which the note does not show whose the potential
// is.
func (g *coupling) doubtful() bool {
	potential := g.field.Facts.Kind.Is(kind.ElectricPotential)
	switch {
	case g.self():
		return potential // of a voltage half-missing-stored-energy speaks
	case g.many:
		return isOf(g.field.Facts, kind.Voltage) && !g.ofOthers()
	}
	return false
}

func (c *claim) reportPairs(p *check.Pass, g *coupling, all []*coupling) {
	if !g.many && strangers(all) {
		c.reportStrangers(p, g)
		return
	}
	f := lang.Fault{
		Message: fmt.Sprintf("%s counts every pair twice, and is 2.00 times the energy: %s is made by the %s that it multiplies", c.sym.Name, g.fieldName(), g.sources()),
		Detail:  fmt.Sprintf("Write `%s`%s. %s", c.halved(), g.orPairs(), g.unless()),
		Related: c.because([]lang.Factor{g.source, g.field}, func(s *lang.Symbol) string { return s.Name }),
	}
	if !c.declared() {
		f.Severity = p.Lowered()
	}
	if len(all) == len(c.view.apart(c.sym)) {
		f.Fix = &lang.Fix{Title: "Put in the half", Edits: []lang.Edit{{Span: c.span(), New: c.halved()}}}
	}
	c.report(p, f)
}

// strangers reports potentials that are made by charges beside those that the
// terms multiply: of their part nothing is counted twice.
func strangers(all []*coupling) bool {
	for _, g := range all {
		foreign := func(s *lang.Symbol) bool {
			return s.Input && isSource(lang.Factor{Facts: s.Facts}) && !slices.ContainsFunc(all, func(h *coupling) bool {
				return h.source.Symbol != nil && (h.source.Symbol.Key == s.Key || dependsOn(g.claim.note, h.source.Symbol, s))
			})
		}
		if g.field.Symbol != nil && restsOn(g.claim.note, g.field.Symbol, foreign) {
			return true
		}
	}
	return false
}

// reportStrangers files the finding where a factor cannot be told.
func (c *claim) reportStrangers(p *check.Pass, g *coupling) {
	f := lang.Fault{
		Message: fmt.Sprintf("%s counts the pairs among its %s twice: each stands in the field of the others", c.sym.Name, g.sources()),
		Detail:  "Take half of what they make at each other, and the whole of what others make at them.",
		Related: c.because([]lang.Factor{g.source, g.field}, func(s *lang.Symbol) string { return s.Name }),
	}
	if !c.declared() {
		f.Severity = p.Lowered()
	}
	c.report(p, f)
}

func (c *claim) reportDoubt(p *check.Pass, g *coupling) {
	f := lang.Fault{
		Severity: p.Lowered(),
		Message:  fmt.Sprintf("%s counts every pair twice if %s is made by the %s that it multiplies", c.sym.Name, g.fieldName(), g.sources()),
		Detail:   fmt.Sprintf("The energy of the whole is then `%s`. %s", c.halved(), g.unless()),
		Related:  c.because([]lang.Factor{g.source, g.field}, func(s *lang.Symbol) string { return s.Name }),
	}
	if !c.declared() {
		f.Severity = max(lang.Advice, f.Severity-1)
	}
	if g.self() {
		f.Message = fmt.Sprintf("%s is twice the energy if %s is the potential of this same charge, or of its images", c.sym.Name, g.fieldName())
		f.Detail = fmt.Sprintf("%s is computed from %s. If that is its own potential, write `%s`; if other charges of the same size make it, declare %s as interaction energy.",
			g.fieldName(), factorName(g.source), c.halved(), c.sym.Name)
	}
	c.report(p, f)
}

// fieldName names the potential as its author does.
func (g *coupling) fieldName() string { return factorName(g.field) }

// sources is what the term is made of, in words.
func (g *coupling) sources() string {
	if isOf(g.source.Facts, kind.ElectricCurrent) || isOf(g.source.Facts, kind.ElectricCurrentDensity) {
		return "currents"
	}
	return "charges"
}

// orPairs offers the sum over pairs where there is a list of point charges.
func (g *coupling) orPairs() string {
	if s := g.source.Symbol; s != nil && s.Role == lang.RoleColumn && isOf(s.Facts, kind.ElectricCharge) {
		return fmt.Sprintf(", or `assembly_energy(%s.%s, …)`, which takes each pair once", s.Owner.Name, s.Name)
	}
	return ""
}

// unless names the fact that would silence the finding.
func (g *coupling) unless() string {
	if isOf(g.field.Facts, kind.Voltage) {
		return "If others make the potential, say so: `φ, external electric potential = …`."
	}
	return "If others make the flux, declare the result as interaction energy."
}
