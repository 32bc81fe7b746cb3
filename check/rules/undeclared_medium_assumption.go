package rules

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
)

// UndeclaredMediumAssumption names the facts about a medium that a formula
// needs and nobody wrote down.
func (Book) UndeclaredMediumAssumption() check.Rule {
	return check.Rule{
		Name:     "undeclared-medium-assumption",
		Severity: lang.Caution,
		Title:    "A formula needs a fact about a medium that its declaration does not state, or denies",
		Sees: "A formula with a list of assumptions, and a medium that does not say whether it meets them, once for each medium with all that it lacks. " +
			"A stored energy or its density made as a square of amplitudes (½εE², ½E·D, ½CU², ½µH² …): linear; isotropic where a permittivity or permeability enters as one number; " +
			"nondispersive in a harmonic note. A skin depth √(2/(ωµσ)), an attenuation or a surface resistance of that form: linear where µ_r enters. " +
			"A refractive index or a phase speed from √ε_r: nondispersive in a harmonic note. An inductance with the permeability of a medium: linear. " +
			"A skin depth with mu_0, an index or a speed from √ε_r in a medium that states a saturation, a remanence or a coercivity: µ_r; in one that states another µ_r than 1 it is an error.",
		Silent: "Where the declaration says something of each group that is needed, whatever it says: then the rules about it speak; for media of a note that is referred to by `uses`; " +
			"for integrals along a curve; for a property that is stated for fields from zero (linear); for one that is stated for a band of frequencies or wavelengths, as a function of the frequency, " +
			"beside a loss factor below 0.03, or that is 1 within a hundredth (dispersion); for µ_r in a medium that states nothing magnetic.",
		Formula: "½εE² needs D = εE with one constant ε from 0 to E; ½E·D needs D proportional to E; n = √ε_r needs µ_r = 1 and one ω; δ = √(2/(ωµσ)) needs a constant µ (and σ ≫ ωε, see skin-depth-range); L = N²/R_m needs B proportional to H.",
		Remedy:  "Add to the medium's line what is known of it: `medium G: linear, isotropic, nondispersive`; state `mu_r = 1` where that is so.",
		Source:  "Landau and Lifshitz, Electrodynamics of Continuous Media, 2nd ed., §§ 10, 13, 59 and 80 (from memory)",
		Wrong: check.Example{Note: `    medium G: homogeneous
        eps_r = 4.3
    E in G, static electric field strength = 2 kV/mm
    w, energy density = 1/2*G.eps*E^2 = 76.1 J/m^3
`},
		Right: check.Example{Note: `    medium G: linear, isotropic, homogeneous
        eps_r = 4.3
    E in G, static electric field strength = 2 kV/mm
    w, energy density = 1/2*G.eps*E^2 = 76.1 J/m^3
`},
		Run: undeclaredAssumption,
	}
}

// need is a fact that a formula rests on.
type need uint8

const (
	needLinear need = 1 << iota
	needIsotropic
	needNondispersive
	needPermeability
)

// needWords are the adjectives of the needs, in the order in which a
// declaration lists them.
var needWords = []struct {
	need need
	word string
}{{needLinear, "linear"}, {needIsotropic, "isotropic"}, {needNondispersive, "nondispersive"}}

// lack is what one medium does not say, with the first formula that needs it.
type lack struct {
	m     medium
	needs need
	by    *claim
}

func undeclaredAssumption(p *check.Pass) error {
	var order []*lack
	lacks := map[string]*lack{}
	for _, c := range viewOf(p).claims {
		for _, a := range c.assumes() {
			if c.denies(p, a) {
				continue
			}
			missing := a.m.unstated(c.note, a.needs)
			if missing == 0 || a.m.sym.Path != "" {
				continue
			}
			l := lacks[a.m.sym.Key]
			if l == nil {
				l = &lack{m: a.m, by: c}
				lacks[a.m.sym.Key] = l
				order = append(order, l)
			}
			l.needs |= missing
		}
	}
	for _, l := range order {
		l.report(p)
	}
	return nil
}

// assumption is what a formula needs of one of its media.
type assumption struct {
	m     medium
	needs need
}

// assumes lists the assumptions of the formula that the claim is.
func (c *claim) assumes() []assumption {
	if form, ok := c.form(); ok && form == kind.StoredEnergy {
		return c.energyAssumes()
	}
	if out := c.conductorAssumes(); out != nil {
		return out
	}
	if out := c.indexAssumes(); out != nil {
		return out
	}
	if c.sym.Facts.Kind.Is(kind.Inductance) && c.declared() {
		return c.inductanceAssumes()
	}
	return nil
}

// energyAssumes are those of a square of amplitudes.
func (c *claim) energyAssumes() []assumption {
	squares, ok := c.squares(kind.StoredEnergy)
	if !ok {
		return nil
	}
	var out []assumption
	for _, m := range c.mediaOf() {
		a := assumption{m, needLinear}
		if scalarProperty(m, squares) {
			a.needs |= needIsotropic
		}
		alternates := func(q *square) bool { return q.stat != kind.Static && q.withResponseOf(m) }
		if c.harmonic() && !c.isStatic() && slices.ContainsFunc(squares, alternates) {
			a.needs |= needNondispersive
		}
		out = append(out, a)
	}
	return out
}

// conductorAssumes are those of a length, an attenuation coefficient or a
// resistance in which √(ωµσ) or its inverse stands.
func (c *claim) conductorAssumes() []assumption {
	t, single := c.note.Normal(c.sym, lang.UpToDeclared).Single()
	if !single {
		return nil
	}
	var sigma, mu *lang.Factor
	frequency := false
	for i, f := range t.Factors {
		if f.Exp.Den() != 2 {
			continue
		}
		switch {
		case isOf(f.Facts, kind.Conductivity), isOf(f.Facts, kind.Resistivity):
			sigma = &t.Factors[i]
		case isOf(f.Facts, kind.Permeability):
			mu = &t.Factors[i]
		case isOf(f.Facts, kind.Frequency):
			frequency = true
		}
	}
	if sigma == nil || mu == nil || !frequency {
		return nil
	}
	var out []assumption
	for _, key := range sigma.Facts.Media {
		m, ok := mediumOf(c.note, key)
		switch {
		case !ok:
		case slices.ContainsFunc(t.Factors, func(f lang.Factor) bool { return takesPermeability(f) && slices.Contains(f.Facts.Media, key) }):
			out = append(out, assumption{m, needLinear})
		case mu.Key == "mu_0" && !slices.ContainsFunc(t.Factors, func(f lang.Factor) bool { return f.Key != "mu_0" && takesPermeability(f) }):
			out = append(out, assumption{m, needPermeability})
		}
	}
	return out
}

// takesPermeability reports a factor that is a permeability, absolute or relative.
func takesPermeability(f lang.Factor) bool {
	return isOf(f.Facts, kind.Permeability) || f.Facts.Kind.Is(kind.RelativePermeability)
}

// indexAssumes are those of a refractive index or a phase speed that is made
// from the root of a relative permittivity alone.
func (c *claim) indexAssumes() []assumption {
	if k := c.sym.Facts.Kind; !c.declared() || !k.Is(kind.RefractiveIndex) && !k.Is(kind.PhaseSpeed) {
		return nil
	}
	t, single := c.note.Normal(c.sym, lang.UpToDeclared).Single()
	if !single || slices.ContainsFunc(t.Factors, takesPermeability) {
		return nil
	}
	var out []assumption
	for _, f := range t.Factors {
		if f.Symbol == nil || !f.Symbol.Facts.Kind.Is(kind.RelativePermittivity) || f.Exp.Den() != 2 {
			continue
		}
		if m, ok := ownerMedium(c.note, f.Symbol); ok {
			a := assumption{m, needPermeability}
			if c.harmonic() {
				a.needs |= needNondispersive
			}
			out = append(out, a)
		}
	}
	return out
}

// inductanceAssumes are those of an inductance: the flux grows with the current.
func (c *claim) inductanceAssumes() []assumption {
	var out []assumption
	for _, m := range c.mediaOf() {
		if restsOn(c.note, c.sym, func(s *lang.Symbol) bool {
			return s.Owner == m.sym && (isOf(s.Facts, kind.Permeability) || s.Facts.Kind.Is(kind.RelativePermeability))
		}) {
			out = append(out, assumption{m, needLinear})
		}
	}
	return out
}

// unstated are those of the needs of which the medium says nothing.
func (m medium) unstated(n *lang.Note, needs need) need {
	for _, w := range needWords {
		if _, stated := n.Adjective(m.sym.Key, w.word); stated {
			needs &^= w.need
		}
	}
	if m.linearByRange(n) {
		needs &^= needLinear
	}
	if m.tellsDispersion(n) {
		needs &^= needNondispersive
	}
	if m.property(n, "mu_r", "mu") != nil || !m.magnetic(n) {
		needs &^= needPermeability
	}
	return needs
}

// magnetic reports a medium with a property that only magnetic media have.
func (m medium) magnetic(n *lang.Note) bool {
	for _, k := range []kind.ID{kind.SaturationFluxDensity, kind.KneeFluxDensity, kind.RemanentFluxDensity, kind.Coercivity} {
		if m.propertyOf(n, k) != nil {
			return true
		}
	}
	return false
}

// permeabilityUnlike1 is the relative permeability of a medium that states one
// value other than 1.
func (m medium) permeabilityUnlike1(n *lang.Note) (float64, bool) {
	for _, t := range []struct {
		name string
		over string
	}{{"mu_r", ""}, {"mu", "mu_0"}} {
		s := n.Lookup(m.sym.Key + "." + t.name)
		x, ok := magnitude(s)
		if !ok || len(s.Def.Params) > 0 {
			continue
		}
		if k, is := magnitude(n.Lookup(t.over)); is {
			x /= k
		}
		return x, math.Abs(x-1) > 0.02
	}
	return 0, false
}

// denies reports a formula that leaves out a permeability which the medium states.
func (c *claim) denies(p *check.Pass, a assumption) bool {
	if a.needs&needPermeability == 0 {
		return false
	}
	mu, stated := a.m.permeabilityUnlike1(c.note)
	if !stated {
		return false
	}
	c.report(p, lang.Fault{
		Severity: lang.Error,
		Message:  fmt.Sprintf("%s leaves the permeability of %s out, whose µ_r is %.4g: a root of it is a factor of %.3g", c.sym.Name, a.m.sym.Name, mu, math.Sqrt(mu)),
		Detail:   fmt.Sprintf("Put %s.mu_r beside ε_r, or %s.mu in the place of mu_0.", a.m.sym.Name, a.m.sym.Name),
		Related:  []lang.Related{{Span: a.m.sym.Span, Path: a.m.sym.Path, Message: a.m.sym.Name}},
	})
	return true
}

// property is the first of the named properties that the medium states.
func (m medium) property(n *lang.Note, names ...string) *lang.Symbol {
	for _, name := range names {
		if s := n.Lookup(m.sym.Key + "." + name); s != nil {
			return s
		}
	}
	return nil
}

// linearByRange reports a constant that is stated for all fields from zero.
func (m medium) linearByRange(n *lang.Note) bool {
	s := m.property(n, "eps_r", "eps", "mu_r", "mu")
	if s == nil || len(s.Def.Params) > 0 {
		return false
	}
	for _, k := range []kind.ID{kind.ElectricFieldStrength, kind.MagneticFieldStrength, kind.MagneticFluxDensity, kind.Voltage} {
		if v, ok := rangeOver(s, k); ok && v.Low <= 0 {
			return true
		}
	}
	return false
}

// tellsDispersion reports a medium that tells how its constants go with the
// frequency: as a function of it, for a band, by a small loss, or by being
// hardly a medium.
func (m medium) tellsDispersion(n *lang.Note) bool {
	s := m.property(n, "eps_r", "eps", "mu_r", "mu")
	if s == nil || len(s.Def.Params) > 0 || m.slightDispersion(n) {
		return s != nil
	}
	for _, k := range []kind.ID{kind.Frequency, kind.Length} {
		if v, ok := rangeOver(s, k); ok && v.High > v.Low {
			return true
		}
	}
	e, ok := m.relativePermittivity(n)
	return ok && math.Abs(e-1) <= 0.01
}

// scalarProperty reports a permittivity or permeability of the medium that
// enters as one number.
func scalarProperty(m medium, squares []*square) bool {
	for _, q := range squares {
		for _, f := range q.all {
			if f.Symbol != nil && f.Symbol.Owner == m.sym && f.Facts.Shape == eval.Scalar && f.Part == "" {
				if r := roleOf(f.Facts); r == roleCapacity || r == roleInduction {
					return true
				}
			}
		}
	}
	return false
}

func (l *lack) report(p *check.Pass) {
	c := l.by
	var words []string
	for _, w := range needWords {
		if l.needs&w.need != 0 {
			words = append(words, w.word)
		}
	}
	var says, add []string
	if len(words) > 0 {
		says = append(says, "whether it is "+orList(words))
		add = append(add, fmt.Sprintf("`medium %s: %s, …`, or what it is instead", l.m.sym.Name, strings.Join(words, ", ")))
	}
	if l.needs&needPermeability != 0 {
		says = append(says, "what its permeability is")
		add = append(add, "`mu_r = 1` below it, or what it is instead")
	}
	p.Report(lang.Fault{
		Span:    l.m.sym.Span,
		Message: fmt.Sprintf("medium %s does not say %s, and %s rests on that", l.m.sym.Name, strings.Join(says, ", nor "), c.sym.Name),
		Detail:  fmt.Sprintf("Add what is known: %s.", strings.Join(add, "; ")),
		Related: []lang.Related{{Span: c.span(), Message: fmt.Sprintf("%s is made with %s", c.sym.Name, l.m.sym.Name)}},
	})
}

// orList writes "a, b or c".
func orList(words []string) string {
	if len(words) < 2 {
		return strings.Join(words, "")
	}
	return strings.Join(words[:len(words)-1], ", ") + " or " + words[len(words)-1]
}
