package rules

import (
	"fmt"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// BreakdownMargin compares the stress of each medium with the strength that the
// medium states, where the note does not do it itself.
func (Book) BreakdownMargin() check.Rule {
	return check.Rule{
		Name:     "breakdown-margin",
		Severity: lang.Error,
		Title:    "A stress is close to or above the strength of its medium, and nothing in the note compares the two",
		Sees: "A field strength or a voltage that is bound to a medium or its region (`E in oil`) and exceeds the dielectric strength, the breakdown or the withstand voltage that the medium states (an error), " +
			"both taken at the crest, unless it is compared with it. A caution where it is more than a fifth of the strength and not compared; where the strength is below the required safety factor " +
			"that the medium or the note states, times the stress; and where a missing statistic decides. A safety factor that is computed as stress over strength, a utilisation as strength over stress; " +
			"a caution for a margin that is a plain quotient.",
		Silent: "Where a criterion, a check or an assumption compares this stress, or a higher one in the same medium, with that strength, directly or through a safety factor, or a criterion with a limit of its own: " +
			"that tells the margin, also of a part that is meant to fail; " +
			"for stresses below a fifth of the strength; for a medium without a strength; against an impulse strength for a stress that is no impulse.",
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

func breakdownMargin(p *check.Pass) error {
	byMedium := map[string][]*stress{}
	var order []string
	for _, s := range p.Note.Symbols {
		x := stressOf(p.Note, s)
		if x == nil {
			continue
		}
		key := x.medium.sym.Key
		if byMedium[key] == nil {
			order = append(order, key)
		}
		byMedium[key] = append(byMedium[key], x)
	}
	if len(order) > 0 {
		made := comparisonsOf(p)
		for _, key := range order {
			made.judge(byMedium[key])
		}
	}
	for _, c := range viewOf(p).claims {
		c.marginForm(p)
	}
	return nil
}

// marginForm reports a safety factor, a utilisation or a margin whose formula
// is another of the three.
func (c *claim) marginForm(p *check.Pass) {
	k := c.sym.Facts.Kind
	safety, used, plain := k.Is(kind.SafetyFactor), k.Is(kind.Utilisation), k == kind.Ratio && isMarginWord(c.words())
	if !c.declared() || !safety && !used && !plain {
		return
	}
	t, single := c.note.Normal(c.sym, lang.UpToDeclared).Single()
	if !single {
		return
	}
	m, ok := marginIn(t)
	if !ok {
		return
	}
	f := lang.Fault{Detail: "Safety factor = strength/stress, utilisation = stress/strength, margin = strength/stress − 1: turn the formula round or name it by what it is."}
	over := m.strength.Exp.Sign() > 0
	switch {
	case safety && !over:
		f.Message = fmt.Sprintf("%s is called a safety factor and is stress over strength, which is the utilisation", c.sym.Name)
	case used && over:
		f.Message = fmt.Sprintf("%s is called a utilisation and is strength over stress, which is the safety factor", c.sym.Name)
	case plain:
		f.Severity = p.Lowered()
		f.Message = fmt.Sprintf("%s is called a margin and is a quotient: a margin is what is left, strength over stress minus 1", c.sym.Name)
	default:
		return
	}
	c.report(p, f)
}

// isMarginWord reports the words of a definition that call it a margin.
func isMarginWord(words string) bool {
	return words == "margin" || words == "safety margin"
}

// report files the finding, where a required safety factor decides with it.
func (x *stress) report(p *check.Pass, required *lang.Symbol) {
	f := lang.Fault{
		Severity: p.Lowered(),
		Span:     x.of.Span,
		Detail: fmt.Sprintf("Write the comparison with the factor that is required: `criterion %s/%s >= …`. A strength from a short test is no service stress.",
			ownedName(x.strength), x.of.Name),
		Related: relatedSymbols(p.Note, x.strength),
	}
	at := fmt.Sprintf("%s is %.3g times the %s of %s at the crest", x.of.Name, x.written, x.strength.Facts.Kind, x.medium.sym.Name)
	switch {
	case x.least > 1:
		f.Severity = p.Rule.Severity
		f.Message = at + ": it breaks down"
		if x.strength.Facts.Kind.Is(kind.WithstandVoltage) {
			f.Message = at + ": it may break down"
		}
		f.Detail = fmt.Sprintf("Lower the stress, or, where the part is meant to fail, say so: `check %s/%s < 1`.", ownedName(x.strength), x.of.Name)
	case x.most > 1:
		f.Message = fmt.Sprintf("%s is %.3g to %.3g times the %s of %s at the crest: whether it breaks down hangs on a statistic that is not stated", x.of.Name, x.least, x.most, x.strength.Facts.Kind, x.medium.sym.Name)
		f.Detail = fmt.Sprintf("Say whether %s and %s are peak or rms values, and compare them.", x.of.Name, ownedName(x.strength))
	case required != nil:
		f.Message = fmt.Sprintf("%s leaves a safety factor of %.3g in %s, and %s = %s is required", x.of.Name, 1/x.written, x.medium.sym.Name, ownedName(required), required.Shown)
		f.Detail = fmt.Sprintf("Lower the stress; `criterion %s/%s >= %s` tells the margin.", ownedName(x.strength), x.of.Name, ownedName(required))
	default:
		f.Message = at + ", and the note does not compare them"
	}
	p.Report(f)
}
