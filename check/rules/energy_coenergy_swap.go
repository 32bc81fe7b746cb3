package rules

import (
	"fmt"
	"math"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// EnergyCoenergySwap finds coenergies that are called energies, and forces from
// the one where the other belongs.
func (Book) EnergyCoenergySwap() check.Rule {
	return check.Rule{
		Name:     "energy-coenergy-swap",
		Severity: lang.Error,
		Title:    "An energy and a coenergy are taken for each other in an element that is not linear",
		Sees: "A quantity or function declared as an energy that is the integral of the flux quantity over the field (∫Ψ di, ∫Q dv, ∫D dE, ∫B dH) along a curve that is not straight; " +
			"a force or torque that is the difference of two energies, or of two halves of current and flux, at the same current (or voltage), or of two coenergies at the same flux (or charge). " +
			"A caution where the curve cannot be seen; advice in a medium declared linear.",
		Silent: "Along a curve that is straight to 1 %, where both are the same; for coenergies at fixed current, energies at fixed flux; " +
			"for λ·i less the coenergy; for v·C(v), which may be either.",
		Formula: "W(Ψ, x) + W′(i, x) = Ψ·i; F = −∂W/∂x at fixed Ψ = +∂W′/∂x at fixed i. In a linear element W = W′ = ½Ψi.",
		Remedy:  "Call ∫Ψ di what it is, `W_c, coenergy = …`; the energy is `Ψ*i - W_c`. Take forces at fixed current from the coenergy.",
		Source:  "Woodson, Melcher, Electromechanical Dynamics, part I, ch. 3 (from memory); Sen, Principles of Electric Machines and Power Electronics, 3rd ed., p. 103",
		Wrong: check.Example{Note: `    table near, linear: i [A], Ψ [Wb]
        0   0
        2   0.112
        4   0.166
    W, energy = integral(near.Ψ for near.i from 0 A to 4 A) = 0.390 J
`},
		Right: check.Example{Note: `    table near, linear: i [A], Ψ [Wb]
        0   0
        2   0.112
        4   0.166
    W_c, coenergy = integral(near.Ψ for near.i from 0 A to 4 A) = 0.390 J
    W, energy = 0.166 Wb * 4 A - W_c = 0.274 J
`},
		Run: perSpot(energyCoenergy),
	}
}

func energyCoenergy(p *check.Pass, s *spot) {
	for _, sym := range s.symbols {
		if sym.Facts.KindBy == lang.Declared {
			coenergyCalledEnergy(p, sym)
		}
	}
	for _, c := range s.claims {
		if k := c.sym.Facts.Kind; c.declared() && (k.Is(kind.Force) || k.Is(kind.Torque) || k.Is(kind.LineicForce)) {
			c.forceOfEnergies(p)
		}
	}
}

// isEnergyNoCoenergy reports the kinds of energies that are not coenergies,
// whether of a whole or per volume, length or area.
func isEnergyNoCoenergy(k kind.ID) bool {
	form, ok := kind.FormOf(k)
	return ok && form == kind.StoredEnergy && !isCoenergy(k)
}

func isCoenergy(k kind.ID) bool { return k.Is(kind.Coenergy) || k.Is(kind.CoenergyDensity) }

// through looks through every name.
func through(*lang.Symbol) bool { return false }

// coenergyCalledEnergy compares the kind of a name with its integral.
func coenergyCalledEnergy(p *check.Pass, s *lang.Symbol) {
	if !isEnergyNoCoenergy(s.Facts.Kind) {
		return
	}
	a := integralOf(p.Note, s, through)
	if a == nil && len(s.Def.Params) > 0 {
		if c, ok := unwrapped(s.Def.Members[0]).(*lang.Call); ok {
			a = alongOf(p.Note, s, c)
		}
	}
	if a == nil || !a.overField() {
		return
	}
	f := lang.Fault{
		Span:    s.Stmt.Abs(s.Def.Members[0]),
		Message: fmt.Sprintf("%s is declared as %s, and the flux integrated over the field is the coenergy%s", s.Name, withArticle(s.Facts.Kind.String()), ratioOfBoth(p.Note, a)),
		Detail:  fmt.Sprintf("Declare it as `%s, %s`, or integrate the field over the flux. The two add up to the product of field and flux.", s.Name, coenergyKind(s.Facts.Kind)),
	}
	switch a.bend(p.Note) {
	case curveStraight, curveAmbiguous:
		return
	case curveUnknown:
		f.Severity = p.Lowered()
		f.Detail += " Where the curve is straight the two are the same: declare its medium as linear."
	}
	switch linear, nonlinear := mediaSay(p.Note, s); {
	case linear:
		f.Severity = lang.Advice
	case nonlinear:
		f.Severity = lang.Error
	}
	f.Fix = coenergyFix(s)
	p.Report(f)
}

// coenergyKind is the kind that goes with an energy's.
func coenergyKind(k kind.ID) string {
	if k.Is(kind.EnergyDensity) {
		return kind.CoenergyDensity.String()
	}
	return kind.Coenergy.String()
}

// coenergyFix writes the kind that the integral has.
func coenergyFix(s *lang.Symbol) *lang.Fix {
	if s.Def.Kind == nil || !s.Facts.Kind.Is(kind.Energy) && !s.Facts.Kind.Is(kind.EnergyDensity) {
		return nil
	}
	words := coenergyKind(s.Facts.Kind)
	if q := s.Facts.Qualifier; q != kind.Unqualified && s.Facts.QualBy == lang.Declared {
		words = q.String() + " " + words
	}
	return &lang.Fix{Title: "Call it " + withArticle(coenergyKind(s.Facts.Kind)), Edits: []lang.Edit{{Span: s.Stmt.Abs(s.Def.Kind), New: words}}}
}

// ratioOfBoth tells how much more the coenergy is, where a table shows it.
func ratioOfBoth(n *lang.Note, a *along) string {
	if a.table == nil || a.colY == "" {
		return ""
	}
	k, ok := curveOf(n, a.table.Key, a.colX, a.colY)
	from, to, known := a.bounds(n)
	if !ok || !known || from != 0 || !k.reaches(0, to) {
		return ""
	}
	co := k.area(0, to)
	if w := k.at(to)*to - co; w > 0 {
		return fmt.Sprintf(", %.3g times the energy", co/w)
	}
	return ""
}

// mediaSay tells what the media of a name declare about linearity.
func mediaSay(n *lang.Note, s *lang.Symbol) (linear, nonlinear bool) {
	linear = linearOnly(n, s)
	keys := s.Facts.Media
	if s.Owner != nil && s.Owner.Role == lang.RoleMedium {
		keys = append([]string{s.Owner.Key}, keys...)
	}
	for _, key := range keys {
		if m, ok := mediumOf(n, key); ok && m.nonlinear() {
			nonlinear = true
		}
	}
	return linear, nonlinear
}

// withinOne reports two values that are the same but for rounding.
func withinOne(a, b float64) bool { return math.Abs(a-b) <= 1e-6*math.Max(math.Abs(a), math.Abs(b)) }
