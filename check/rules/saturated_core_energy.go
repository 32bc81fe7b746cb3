package rules

import (
	"fmt"
	"math"
	"slices"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// SaturatedCoreEnergy finds energies of a core that is driven beyond the range
// in which its permeability, or the inductance, is constant.
func (Book) SaturatedCoreEnergy() check.Rule {
	return check.Rule{
		Name:     "saturated-core-energy",
		Severity: lang.Error,
		Title:    "The energy of a saturated core is taken with a constant permeability or inductance",
		Sees: "B²/2µ, ½µH² or ½B·H with the permeability of a core, where B is beyond the core's knee (kind flux density at the knee, else 0.7 of its saturation flux density), " +
			"or beyond the range of an initial permeability; ½LI² where I is beyond a stated saturation current; " +
			"½B·H or B²/2µ at a point of a table whose curve gives another energy by more than 5 %. " +
			"A caution where nothing ties the limit to the core, where the medium is declared linear without a range, and for an initial permeability without a range above 5 % of the saturation flux density, or above 1 mT where that is not stated.",
		Silent: "For gaps (µ0 alone); in a medium declared linear whose permeability is stated for a range that reaches from zero to B; " +
			"for integrals along the curve; below the knee; where the only curve of the note agrees to 5 %; where the core's term is less than 5 % of the total.",
		Formula: "w = ∫H dB. For a saturating curve B²/2µ_i is too low and ½B·H too high; the gap adds B²/2µ0 for its own volume.",
		Remedy:  "Integrate H over B along the curve of the core, and add the energy of the gap by itself.",
		Source:  "Jackson, Classical Electrodynamics, 3rd ed., 5.16; Bozorth, Ferromagnetism, ch. 11 (both from memory); 0.7 of saturation: common practice",
		Wrong: check.Example{Note: `    medium core: nonlinear, isotropic, homogeneous
        mu_i, initial permeability = 2069
        B_sat, saturation flux density = 0.39 T
    B in core, static magnetic flux density = 0.376 T
    w, energy density = B^2/(2*mu_0*core.mu_i) = 27.2 J/m^3
`},
		Right: check.Example{Note: `    medium core: nonlinear, isotropic, homogeneous
        H(b), magnetic field strength = 75 A/m*ln((0.39 T + b)/(0.39 T - b)) for b from 0 T to 0.388 T
    B in core, static magnetic flux density = 0.376 T
    w, energy density = integral(core.H(b) for b from 0 T to B) = 35.3 J/m^3
`},
		Run: saturatedCore,
	}
}

// initialShare is the part of the saturation flux density up to which an
// initial permeability is taken for good where its range is not stated: power
// ferrites are 10 to 30 % above it at 25 mT (maker's curves, from memory).
const initialShare = 0.05

// initialField is the flux density above which an initial permeability wants
// its range stated: it is measured below 0.25 mT (IEC 62044-2, from memory).
const initialField = 1e-3

// curveTolerance is how far an energy may be off its curve.
const curveTolerance = 0.05

func saturatedCore(p *check.Pass) error {
	for _, c := range viewOf(p).claims {
		if c.isEnergy() && c.isMagnetic() {
			c.coreEnergy(p)
		}
	}
	return nil
}

// isMagnetic reports a claim with a current, a flux or a magnetic field in it.
func (c *claim) isMagnetic() bool {
	return slices.ContainsFunc(c.view.products(c.sym), func(t *product) bool { return len(t.byRole[roleMagnetic]) > 0 })
}

// coreEnergy files the first finding about the terms of a claim, seen through
// each of the ways in which a permeability can be hidden.
func (c *claim) coreEnergy(p *check.Pass) {
	for _, expand := range magneticExpansions {
		terms := products(c.note.Normal(c.sym, expand))
		for _, t := range terms {
			if c.isMinor(t, terms) {
				continue
			}
			if k := c.coreOf(t); k != nil && !c.onCurve(k) && (c.beyondKnee(p, k) || c.beyondInitial(p, k) || c.offCurve(p, k)) {
				return
			}
			if c.beyondCurrent(p, t) {
				return
			}
		}
	}
}

// isLinear reports a core whose medium is declared linear.
func (k *core) isLinear() bool { return k.bound && k.m.says("linear") }

// beyondKnee compares the flux density with the knee.
func (c *claim) beyondKnee(p *check.Pass, k *core) bool {
	l, ok := c.limitOf(k)
	covered, ranged := c.permeabilityCovers(k)
	if !ok || !k.known || k.b <= l.b || covered && k.isLinear() {
		return false
	}
	f := lang.Fault{
		Message: fmt.Sprintf("%s takes the core as linear, and B = %s lies beyond its knee%s", c.sym.Name, tesla(k.b), l.text()),
		Detail:  remedyOfCore + c.againstCurve(k),
		Related: append(c.because(k.byRole[roleMagnetic], func(s *lang.Symbol) string { return s.Name + " = " + s.Shown }), pointTo(l.of, "the limit of the core")...),
	}
	switch {
	case l.loose:
		f.Severity = p.Lowered()
		f.Detail += fmt.Sprintf(" If %s belongs to another core, bind it to its medium: `%s in MEDIUM`.", l.of.Name, l.of.Name)
	case k.isLinear() && !ranged:
		f.Severity = p.Lowered()
		f.Detail += fmt.Sprintf(" If the curve is straight up to there, state it with the permeability of %s: `for B from 0 T to …`.", k.m.sym.Name)
	case !c.declared():
		f.Severity = p.Lowered()
	}
	c.report(p, f)
	return true
}

// remedyOfCore is what to write instead.
const remedyOfCore = "Integrate the curve, `integral(H(b) for b from 0 T to B)` or along its table. With the initial permeability B²/2µ is too low, half of B·H is too high."

// text tells which limit it is.
func (l limit) text() string {
	if l.knee {
		return fmt.Sprintf(" (%s)", tesla(l.b))
	}
	return fmt.Sprintf(" (%s, %g of the saturation flux density)", tesla(l.b), kneeShare)
}

func tesla(b float64) string {
	if b < 0.1 {
		return fmt.Sprintf("%.3g mT", b*1e3)
	}
	return fmt.Sprintf("%.3g T", b)
}

// pointTo points at the definition of a name of the note.
func pointTo(s *lang.Symbol, message string) []lang.Related {
	if s == nil || s.Stmt == nil {
		return nil
	}
	return []lang.Related{{Name: s.Key, Path: s.Path, Span: s.Span, Message: s.Name + " is " + message}}
}

// beyondInitial finds an initial permeability at more than a small signal.
func (c *claim) beyondInitial(p *check.Pass, k *core) bool {
	covered, ranged := c.permeabilityCovers(k)
	if !k.known || typeOf(k.mu) != kind.InitialPermeability || k.isLinear() || covered {
		return false
	}
	f := lang.Fault{
		Message: fmt.Sprintf("%s takes an initial permeability at B = %s: it holds for vanishing fields", c.sym.Name, tesla(k.b)),
		Detail:  remedyOfCore + c.againstCurve(k),
		Related: c.because([]lang.Factor{k.mu}, func(s *lang.Symbol) string { return s.Name + " is an initial permeability" }),
	}
	l, limited := c.limitOf(k)
	switch {
	case ranged:
		f.Message += ", and its range ends below"
	case limited && k.b <= initialShare*l.saturation(), !limited && k.b <= initialField:
		return false
	default:
		f.Severity = p.Lowered()
		f.Detail += " If the core is linear up to there, declare its medium so, or state the range with the permeability: `for B from 0 T to …`."
	}
	if !c.declared() {
		f.Severity = p.Lowered()
	}
	c.report(p, f)
	return true
}

// saturation is the saturation flux density that goes with the limit.
func (l limit) saturation() float64 { return l.b / kneeShare }

// onCurve reports a half product that agrees with the only curve of the note:
// up to there the core is straight.
func (c *claim) onCurve(k *core) bool {
	half, right, _, ok := c.besideCurve(k)
	return ok && math.Abs(half/right-1) <= curveTolerance
}

// offCurve compares a half product with the area beside the curve of a table
// that the claim is made with.
func (c *claim) offCurve(p *check.Pass, k *core) bool {
	half, right, table, ok := c.besideCurve(k)
	if !ok || !dependsOn(c.note, c.sym, table) || math.Abs(half/right-1) <= curveTolerance {
		return false
	}
	f := lang.Fault{
		Message: fmt.Sprintf("%s is half of the product at one point of a curve: %.3g times the energy along the table %s", c.sym.Name, half/right, table.Name),
		Detail:  remedyOfCore,
		Related: pointTo(table, "the curve"),
	}
	if !c.declared() {
		f.Severity = p.Lowered()
	}
	c.report(p, f)
	return true
}

// againstCurve tells the factor where a single table of the note gives H over B.
func (c *claim) againstCurve(k *core) string {
	half, right, table, ok := c.besideCurve(k)
	if !ok {
		return ""
	}
	return fmt.Sprintf(" Along the table %s the energy density is %s: the half product is %.3g times that.", table.Name, perVolume(right), half/right)
}

// perVolume writes an energy density.
func perVolume(w float64) string {
	switch {
	case w >= 1e6:
		return fmt.Sprintf("%.3g MJ/m^3", w/1e6)
	case w >= 1e3:
		return fmt.Sprintf("%.3g kJ/m^3", w/1e3)
	}
	return fmt.Sprintf("%.3g J/m^3", w)
}
