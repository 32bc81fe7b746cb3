package rules

import (
	"fmt"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// SourceWorkHalved finds the energy of the store given as what the source
// delivers.
func (Book) SourceWorkHalved() check.Rule {
	return check.Rule{
		Name:     "source-work-halved",
		Severity: lang.Caution,
		Title:    "What a source delivers at constant voltage is twice what is stored, and only the store is counted",
		Sees:     "A source work that is ½·C·U², ½·Q·U, Q²/(2C), ½·L·I² or ½·λ·I of static values, in a linear circuit.",
		Silent: "For the whole product; for a sum with another term, such as the heat of the charging resistor; where a resonant charger or a constant current makes it: then call it a stored energy; " +
			"in a nonlinear medium.",
		Formula: "At constant U the source gives QU = CU²: ½CU² is stored and ½CU² becomes heat in any series resistance.",
		Remedy:  "Write the balance: `W_s, source work = C*U^2`, `Q_h, heat = W_s - W`.",
		Source:  "common practice; a standard exercise of textbooks on circuits (from memory)",
		Wrong: check.Example{Note: `    C = 470 uF
    U, static voltage = 400 V
    W_s, source work = 1/2*C*U^2 = 37.6 J
`},
		Right: check.Example{Note: `    C = 470 uF
    U, static voltage = 400 V
    W_s, source work = C*U^2 = 75.2 J
`},
		Run: perClaim(sourceHalved),
	}
}

func sourceHalved(p *check.Pass, c *claim) {
	if !c.sym.Facts.Kind.Is(kind.SourceWork) {
		return
	}
	if _, speaks := c.nonlinear(); speaks {
		return
	}
	ps := c.view.products(c.sym)
	if len(ps) != 1 {
		return
	}
	q := squareOf(c.note, ps[0], kind.StoredEnergy)
	if q == nil || q.pi != 0 || !q.is(1, 2) || q.stat != kind.Static && q.known {
		return
	}
	c.report(p, lang.Fault{
		Message: fmt.Sprintf("%s is half of what a source delivers at constant voltage or current: this is what is stored", c.sym.Name),
		Detail:  fmt.Sprintf("Leave the half out, or, for a resonant or ramped charger, write `%s, stored energy = …`.", c.sym.Name),
		Related: c.because(q.amplitudes, func(s *lang.Symbol) string { return s.Name + " = " + s.Shown }),
	})
}
