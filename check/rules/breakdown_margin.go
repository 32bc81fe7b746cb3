package rules

import (
	"fmt"
	"math"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// BreakdownMargin compares the field in each medium with the strength that the
// medium states, where the note does not do it itself.
func (Book) BreakdownMargin() check.Rule {
	return check.Rule{
		Name:     "breakdown-margin",
		Severity: lang.Error,
		Title:    "A field is close to or above the strength of its medium, and nothing in the note compares the two",
		Sees: "A field strength that is bound to a medium (`E in oil`) and exceeds the dielectric strength that the medium states (an error), or is more than a fifth of it (a caution), " +
			"both taken at the crest, in a note without a criterion, check or assumption in which that strength stands.",
		Silent: "Where a criterion, a check or an assumption compares something with that strength, directly or through a safety factor: then that tells the margin; for fields below a fifth of the strength; " +
			"for a medium without a strength.",
		Formula: "SF = E_bd/E_max, both as crest values of one class of waveform, at the place of the highest field; utilisation 1/SF, margin SF − 1.",
		Remedy:  "Write the comparison, and which margin is meant: `criterion oil.E_bd/E >= 3   per \"design rule\"`.",
		Source:  "IEC 60243-1:2013, clause 1 (a short-time strength is for comparison and is no service stress; scope as printed by the publisher); the fifth is common practice",
		Wrong: check.Example{Note: `    medium void: linear, isotropic, homogeneous
        eps_r = 1.0006
        E_bd, peak dielectric strength = 6.3 kV/mm
    E in void, peak electric field strength = 10.7 kV/mm
    w, peak energy density = 1/2*void.eps*E^2 = 507 J/m^3
`},
		Right: check.Example{Note: `    medium void: linear, isotropic, homogeneous
        eps_r = 1.0006
        E_bd, peak dielectric strength = 6.3 kV/mm
    E in void, peak electric field strength = 10.7 kV/mm
    w, peak energy density = 1/2*void.eps*E^2 = 507 J/m^3
    check void.E_bd/E < 1
`},
		Run: breakdownMargin,
	}
}

// needsCheck is the part of the strength above which a comparison is expected.
const needsCheck = 0.2

func breakdownMargin(p *check.Pass) error {
	worst := map[string]*stress{}
	var order []string
	for _, s := range p.Note.Symbols {
		x := stressOf(p.Note, s)
		if x == nil {
			continue
		}
		if old := worst[x.strength.Key]; old == nil {
			order = append(order, x.strength.Key)
			worst[x.strength.Key] = x
		} else if x.utilisation > old.utilisation {
			worst[x.strength.Key] = x
		}
	}
	for _, key := range order {
		if x := worst[key]; x.utilisation > needsCheck && !compared(p, x.strength) {
			x.report(p)
		}
	}
	return nil
}

// stress is a field in a medium that has a strength.
type stress struct {
	field, strength *lang.Symbol
	utilisation     float64 // crest over crest
}

// stressOf reads a name as a field in a medium with a strength; nil for others.
func stressOf(n *lang.Note, s *lang.Symbol) *stress {
	if s.Role != lang.RoleQuantity || s.Def == nil || s.Def.In == nil || !isFieldStrength(s.Facts.Kind) || !isOf(s.Facts, kind.ElectricFieldStrength) {
		return nil
	}
	m, ok := mediumOf(n, lang.CanonicalName(s.Def.In.Text))
	if !ok {
		return nil
	}
	strength := m.propertyOf(n, kind.DielectricStrength)
	if strength == nil {
		return nil
	}
	e, ok := magnitude(s)
	limit, ok2 := magnitude(strength)
	if !ok || !ok2 || limit == 0 {
		return nil
	}
	return &stress{s, strength, atCrest(e, s) / atCrest(limit, strength)}
}

// atCrest turns an rms value into that at the crest of a sinusoid.
func atCrest(x float64, s *lang.Symbol) float64 {
	if s.Facts.Qualifier == kind.RMS {
		return math.Sqrt2 * x
	}
	return x
}

// compared reports a relation of the note in which the strength stands, itself
// or through what is computed from it.
func compared(p *check.Pass, strength *lang.Symbol) bool {
	from := originsOf(p)
	for _, g := range p.Note.Judged {
		if from.reaches(g.Stmt, func(x *lang.Symbol) bool { return x.Key == strength.Key }) {
			return true
		}
	}
	return false
}

func (x *stress) report(p *check.Pass) {
	f := lang.Fault{
		Severity: p.Lowered(),
		Span:     x.field.Span,
		Message: fmt.Sprintf("%s is %.3g times the strength of %s at the crest, and the note does not compare them",
			x.field.Name, x.utilisation, x.strength.Owner.Name),
		Detail: fmt.Sprintf("Write the comparison with the factor that is required: `criterion %s/%s >= …`. A strength from a short test is no service stress.",
			ownedName(x.strength), x.field.Name),
		Related: []lang.Related{{Path: x.strength.Path, Span: x.strength.Span, Message: ownedName(x.strength) + " = " + x.strength.Shown}},
	}
	if x.utilisation > 1 {
		f.Severity = p.Rule.Severity
		f.Message = fmt.Sprintf("%s is %.3g times the strength of %s at the crest: it breaks down", x.field.Name, x.utilisation, x.strength.Owner.Name)
		f.Detail = fmt.Sprintf("Lower the field, or, where the part is meant to fail, say so: `check %s/%s < 1`.", ownedName(x.strength), x.field.Name)
	}
	p.Report(f)
}
