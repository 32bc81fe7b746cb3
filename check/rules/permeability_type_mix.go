package rules

import (
	"fmt"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// PermeabilityTypeMix finds a permeability of one type where another belongs.
func (Book) PermeabilityTypeMix() check.Rule {
	return check.Rule{
		Name:     "permeability-type-mix",
		Severity: lang.Error,
		Title:    "A permeability of one type is used where another type belongs",
		Sees: "An initial permeability in B = µH beyond its range, or beyond the core's knee; an amplitude or initial permeability in an incremental inductance, or in the swing of a core that has a bias; " +
			"the permeability of the material in the inductance of a core for which an air gap is stated; the static permeability in the skin depth of steel that is driven beyond its knee; " +
			"the magnitude of a complex permeability in an inductance or as a permeability. " +
			"A caution where the type is not stated, where the range of an initial permeability is not stated, and where nothing ties the bias or the gap to the core.",
		Silent: "Where the types match: incremental or reversible for a small swing on a bias, effective for a gapped core, amplitude for a swing about zero; " +
			"where a conversion is shown (µ_e = µ/(1 + µ·g/l), a factor from the maker's curve); in media declared linear; for an initial permeability within its range; " +
			"for the magnitude of the permeability in the magnitude of an impedance.",
		Formula: "µ_i = lim B/(µ0·H) for H → 0; µ_a = B̂/(µ0·Ĥ) about zero; µ_Δ = ΔB/(µ0·ΔH) about a bias, µ_rev its limit for ΔH → 0; µ_e = (l/A)/(µ0·R_m) of a gapped circuit.",
		Remedy:  "Declare the type as a kind (`initial`, `amplitude`, `incremental`, `reversible`, `effective permeability`) and take the one that fits the use.",
		Source:  "IEC 60050-221, section 221-03 (types of permeability)",
		Wrong: check.Example{Note: `    μ_a, amplitude permeability = 60
    N, number of turns = 42
    A, area = 1.34 cm^2
    l, length = 10.7 cm
    L, incremental inductance = μ_a*mu_0*N^2*A/l = 167 uH
`},
		Right: check.Example{Note: `    μ_Δ, incremental permeability = 41
    N, number of turns = 42
    A, area = 1.34 cm^2
    l, length = 10.7 cm
    L, incremental inductance = μ_Δ*mu_0*N^2*A/l = 114 uH
`},
		Run: permeabilityType,
	}
}

// throughPermeabilities looks through absolute and untyped permeabilities and
// through reluctances, so that a type cannot hide in `μ = mu_0*μ_i`.
func throughPermeabilities(s *lang.Symbol) bool {
	if atoms(s) {
		return true
	}
	k := s.Facts.Kind
	return !s.Input && (k == kind.RelativePermeability || isOf(s.Facts, kind.Permeability) && !k.Is(kind.LineicInductance) || isOf(s.Facts, kind.Reluctance))
}

func permeabilityType(p *check.Pass) error {
	for _, c := range viewOf(p).claims {
		if !mayHavePermeability(c.sym.Facts) {
			continue
		}
		t, single := c.note.Normal(c.sym, throughPermeabilities).Single()
		if !single {
			continue
		}
		q := newProduct(t)
		m, ok := permeabilityOf(q)
		if !ok {
			continue
		}
		u := c.useOf(q, m)
		switch {
		case u.magnitude(p), u.linear():
		case u.smallSignal(p), u.onBias(p), u.acrossGap(p), u.inSkin(p):
		}
	}
	return nil
}

// mayHavePermeability reports what the types of permeability are judged in: flux
// densities, field strengths, inductances, permeabilities, skin depths, energies.
func mayHavePermeability(f lang.Facts) bool {
	for _, k := range []kind.ID{kind.MagneticFluxDensity, kind.MagneticFieldStrength, kind.Inductance, kind.Permeability} {
		if isOf(f, k) {
			return true
		}
	}
	form, isForm := kind.FormOf(f.Kind)
	return f.Kind.Is(kind.SkinDepth) || f.Kind.Is(kind.RelativePermeability) || isForm && form == kind.StoredEnergy
}

// permeabilityOf finds the permeability of a material in a term.
func permeabilityOf(t *product) (lang.Factor, bool) {
	for _, f := range t.all {
		if isPermeability(f) {
			return f, true
		}
	}
	return lang.Factor{}, false
}

// permeabilityTypes are the types by their kinds; read only.
var permeabilityTypes = []kind.ID{
	kind.InitialPermeability, kind.AmplitudePermeability, kind.IncrementalPermeability,
	kind.ReversiblePermeability, kind.EffectivePermeability, kind.ComplexPermeability,
}

// typeOf is the type of a permeability, or of the relative one that an absolute
// one rests on; 0 where it is not stated.
func typeOf(f lang.Factor) kind.ID {
	for _, k := range permeabilityTypes {
		if f.Facts.Kind.Is(k) || f.Symbol != nil && f.Symbol.Facts.Kind.Is(k) {
			return k
		}
	}
	return 0
}

// use is a permeability in the formula of a claim.
type use struct {
	*claim
	t    *product
	mu   lang.Factor
	kind kind.ID // its type, 0 for not stated
	core *core
}

func (c *claim) useOf(t *product, mu lang.Factor) *use {
	u := &use{claim: c, t: t, mu: mu, kind: typeOf(mu), core: &core{product: t, mu: mu, hasMu: true}}
	u.core.m, u.core.bound = c.mediumOfFactor(mu)
	for _, f := range append(t.byRole[roleMagnetic], lang.Factor{Facts: c.sym.Facts}) {
		if !u.core.bound {
			u.core.m, u.core.bound = c.mediumOfFactor(f)
		}
	}
	return u
}

// linear reports a core whose medium is declared linear.
func (u *use) linear() bool { return u.core.isLinear() }

// name is the permeability as the note calls it.
func (u *use) name() string {
	switch {
	case u.mu.Symbol == nil:
		return "the permeability"
	case u.mu.Symbol.Owner != nil:
		return u.mu.Symbol.Owner.Name + "." + u.mu.Symbol.Name
	}
	return u.mu.Symbol.Name
}

// title is the type in words.
func (u *use) title() string {
	if u.kind == 0 {
		return "a permeability of which the type is not stated"
	}
	return withArticle(u.kind.String())
}

// tell files a finding; one that rests on an unstated type is a caution.
func (u *use) tell(p *check.Pass, severity lang.Severity, message, detail string) bool {
	if u.kind == 0 || u.sym.Facts.KindBy == lang.Guessed {
		severity = min(severity, p.Lowered())
	}
	if u.kind == 0 {
		detail += fmt.Sprintf(" State the type of %s as its kind.", u.name())
	}
	u.report(p, lang.Fault{
		Severity: severity, Message: message, Detail: detail,
		Related: u.because([]lang.Factor{u.mu}, func(s *lang.Symbol) string { return s.Name + " is " + u.title() }),
	})
	return true
}

// smallSignal finds an initial permeability in B = µH at more than a small
// signal.
func (u *use) smallSignal(p *check.Pass) bool {
	if u.kind != kind.InitialPermeability && u.kind != 0 || !u.largeSignal() {
		return false
	}
	covered, ranged := u.permeabilityCovers(u.core)
	l, limited := u.limitOf(u.core)
	b := u.core.b
	beyond := limited && b > l.b
	severity, detail := p.Rule.Severity, "Take the amplitude permeability for this flux density, or read B off the curve."
	switch {
	case covered, u.kind == 0 && !(beyond && u.core.bound && u.core.m.nonlinear()):
		return false
	case ranged:
	case beyond:
		if l.loose {
			severity = p.Lowered()
		}
		detail += fmt.Sprintf(" The knee lies at %s.", tesla(l.b))
	case limited && b <= initialShare*l.saturation(), !limited && b <= initialField:
		return false
	default:
		severity = p.Lowered()
		detail += " If it holds up to there, state its range: `for B from 0 T to …`; a core of low permeability may be declared linear."
	}
	return u.tell(p, severity, fmt.Sprintf("%s takes %s, %s, at B = %s", u.sym.Name, u.name(), u.title(), tesla(b)), detail)
}

// largeSignal reports B = µH or H = B/µ with a known flux density.
func (u *use) largeSignal() bool {
	switch {
	case isOf(u.sym.Facts, kind.MagneticFluxDensity) && u.mu.Exp == unit.Whole(1):
		u.core.b, u.core.known = magnitude(u.sym)
	case isOf(u.sym.Facts, kind.MagneticFieldStrength) && u.mu.Exp == unit.Whole(-1):
		for _, f := range u.t.byRole[roleMagnetic] {
			if isOf(f.Facts, kind.MagneticFluxDensity) && f.Exp == unit.Whole(1) {
				u.core.b, u.core.known = sizeOf(u.note, f)
			}
		}
	}
	return u.core.known
}

// ofWholeSwing reports the types that hold for a swing about zero.
func (u *use) ofWholeSwing() bool {
	return u.kind == kind.AmplitudePermeability || u.kind == kind.InitialPermeability ||
		u.kind == 0 && u.core.bound && u.core.m.nonlinear()
}

// converted reports a factor that turns the permeability into another: a ratio
// or a reading of the maker's curve.
func (u *use) converted() bool {
	for _, f := range u.t.byRole[roleNumber] {
		if opaqueFactor(f) || f.Facts.Kind.Is(kind.Ratio) {
			return true
		}
		if f.Symbol != nil && f.Symbol.Def != nil && len(f.Symbol.Def.Members) > 0 {
			if _, ok := unwrapped(f.Symbol.Def.Members[0]).(*lang.Lookup); ok {
				return true
			}
		}
	}
	return false
}

// onBias finds a permeability about zero where a swing rides on a bias.
func (u *use) onBias(p *check.Pass) bool {
	if !u.ofWholeSwing() || u.converted() {
		return false
	}
	const remedy = "Take the incremental permeability at that bias (the reversible one for a small swing): near saturation it is many times smaller."
	if u.sym.Facts.Kind.Is(kind.IncrementalInductance) {
		return u.tell(p, p.Rule.Severity, fmt.Sprintf("%s is an incremental inductance, and %s is %s", u.sym.Name, u.name(), u.title()), remedy)
	}
	if u.sym.Facts.Qualifier != kind.PeakToPeak || !isOf(u.sym.Facts, kind.MagneticFluxDensity) && !isOf(u.sym.Facts, kind.MagneticFieldStrength) {
		return u.swingOfInductance(p, remedy)
	}
	bias, tied := u.bias()
	if bias == nil {
		return false
	}
	severity := p.Rule.Severity
	if !tied {
		severity = p.Lowered()
	}
	return u.tell(p, severity, fmt.Sprintf("%s is a swing on the bias %s, and %s is %s", u.sym.Name, bias.Name, u.name(), u.title()), remedy+tieHint(tied, bias))
}

// tieHint names the fact that would tell a bias of another core.
func tieHint(tied bool, bias *lang.Symbol) string {
	if tied {
		return ""
	}
	return fmt.Sprintf(" If %s belongs to another part, bind both to their media: `%s in MEDIUM`.", bias.Name, bias.Name)
}

// bias finds a static field or current other than zero: of the core's medium,
// or one that no medium claims.
func (u *use) bias() (found *lang.Symbol, tied bool) {
	for _, s := range u.note.Symbols {
		if s.Role != lang.RoleQuantity || s.Facts.Qualifier != kind.Static || s.Facts.QualBy != lang.Declared || s == u.sym {
			continue
		}
		v, known := magnitude(s)
		field := isOf(s.Facts, kind.MagneticFieldStrength) || isOf(s.Facts, kind.MagneticFluxDensity) || isOf(s.Facts, kind.ElectricCurrent)
		if !known || v == 0 || !field || s.Facts.Kind.Is(kind.SaturationCurrent) || s.Facts.Kind.Is(kind.SaturationFluxDensity) || s.Facts.Kind.Is(kind.KneeFluxDensity) {
			continue
		}
		switch {
		case len(s.Facts.Media) > 0 && u.core.bound && s.Facts.Media[0] == u.core.m.sym.Key:
			return s, true
		case len(s.Facts.Media) == 0 && found == nil:
			found = s
		}
	}
	return found, false
}

// swingOfInductance finds an inductance made with a permeability about zero by
// which a ripple is computed on a bias.
func (u *use) swingOfInductance(p *check.Pass, remedy string) bool {
	if !isOf(u.sym.Facts, kind.Inductance) || u.mu.Exp != unit.Whole(1) {
		return false
	}
	bias, tied := u.bias()
	ripple := u.rippleBy()
	if bias == nil || ripple == nil {
		return false
	}
	severity := p.Rule.Severity
	if !tied {
		severity = p.Lowered()
	}
	return u.tell(p, severity, fmt.Sprintf("%s gives the ripple %s on the bias %s, and %s is %s", u.sym.Name, ripple.Name, bias.Name, u.name(), u.title()), remedy+tieHint(tied, bias))
}

// rippleBy is a peak-to-peak quantity whose formula holds the claim's name.
func (u *use) rippleBy() *lang.Symbol {
	for _, o := range u.view.claims {
		if o.sym.Facts.Qualifier != kind.PeakToPeak || o.sym.Facts.QualBy != lang.Declared {
			continue
		}
		for _, t := range u.view.products(o.sym) {
			for _, f := range t.all {
				if f.Symbol == u.sym {
					return o.sym
				}
			}
		}
	}
	return nil
}
