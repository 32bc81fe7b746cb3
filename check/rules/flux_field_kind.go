package rules

import (
	"fmt"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// FluxFieldKind explains sums of H, M and B that lack µ₀, and fluxes of one turn
// where the linked flux is meant.
func (Book) FluxFieldKind() check.Rule {
	return check.Rule{
		Name:     "flux-field-kind",
		Severity: lang.Error,
		Title:    "A flux density, a field strength and a magnetization are mixed, or the flux of one turn stands for the linked flux",
		Sees: "A sum of something in tesla and something in A/m (B = M + µ₀H); a stored energy ½·Φ·I, an inductance Φ/I or a voltage from the flux of one turn " +
			"in a note with a number of turns above 1, which stands neither there nor in the flux.",
		Silent:  "For µ₀·(H + M); for a linked flux; for one turn; where the number of turns is a factor.",
		Formula: "B = µ₀(H + M), J = µ₀M in tesla; λ = NΦ, L = λ/I, W = ½λI. In cgs numbers B and H nearly agree in air, in SI they differ by 4π·10⁻⁷ H/m.",
		Remedy:  "Multiply by mu_0; write `λ, linked flux = N*Φ`.",
		Source:  "ISO 80000-6:2022, items 6-21 to 6-28 (from memory)",
		Wrong: check.Example{Note: `    M, magnetization = 950 kA/m
    H, magnetic field strength = 20 kA/m
    B, magnetic flux density = M + mu_0*H
`},
		Right: check.Example{Note: `    M, magnetization = 950 kA/m
    H, magnetic field strength = 20 kA/m
    B, magnetic flux density = mu_0*(M + H) = 1.219 T
`},
		Run: fluxField,
	}
}

func fluxField(p *check.Pass) error {
	for _, s := range p.Note.Script.Stmts {
		lang.Walk(s.Tree, func(t lang.Tree) bool {
			if b, ok := t.(*lang.Binary); ok && (b.Op == lang.OpAdd || b.Op == lang.OpSub) {
				teslaAndAmpere(p, s, b)
			}
			return true
		})
	}
	turns := turnsOf(p.Note)
	if turns == nil {
		return nil
	}
	for _, c := range viewOf(p).claims {
		c.oneTurn(p, turns)
	}
	return nil
}

// teslaAndAmpere reports a sum whose sides are in T and in A/m.
func teslaAndAmpere(p *check.Pass, s *lang.Stmt, b *lang.Binary) {
	x, ok1 := p.Note.FactsOf(s, b.X)
	y, ok2 := p.Note.FactsOf(s, b.Y)
	if !ok1 || !ok2 || !x.Known || !y.Known {
		return
	}
	side := b.X
	if isOf(x, kind.MagneticFluxDensity) && isOf(y, kind.MagneticFieldStrength) {
		side = b.Y
	} else if !isOf(x, kind.MagneticFieldStrength) || !isOf(y, kind.MagneticFluxDensity) {
		return
	}
	at := s.Abs(side)
	p.Report(lang.Fault{
		Span:    at,
		Message: "this is in A/m, and is added to something in T: mu_0 is missing",
		Detail:  "B = µ₀·(H + M): multiply it by mu_0, or compare H with M.",
	})
}

// turnsOf is the note's only number of turns above 1.
func turnsOf(n *lang.Note) *lang.Symbol {
	var found *lang.Symbol
	for _, s := range n.Symbols {
		if !s.Facts.Kind.Is(kind.NumberOfTurns) || s.Role != lang.RoleQuantity {
			continue
		}
		if found != nil || !s.Known || s.Value.Len() != 1 || s.Value.Re() <= 1 {
			return nil
		}
		found = s
	}
	return found
}

// oneTurn reports a flux that is declared as that of one turn where the linked
// one is meant.
func (c *claim) oneTurn(p *check.Pass, turns *lang.Symbol) {
	form, stored := c.form()
	if !(stored && form == kind.StoredEnergy && isOf(c.sym.Facts, kind.Energy)) && !c.sym.Facts.Kind.Is(kind.Inductance) || originsOf(p).madeFrom(c.sym, turns) {
		return
	}
	t, single := c.note.Normal(c.sym, lang.UpToDeclared).Single()
	if !single {
		return
	}
	for _, f := range t.Factors {
		if f.Symbol != nil && f.Facts.Kind.Is(kind.MagneticFlux) && f.Facts.KindBy == lang.Declared && !f.Facts.Kind.Is(kind.LinkedFlux) {
			c.report(p, lang.Fault{
				Message: fmt.Sprintf("%s takes %s, the flux of one turn; the winding has %s = %s", c.sym.Name, f.Symbol.Name, turns.Name, turns.Shown),
				Detail:  fmt.Sprintf("The linked flux is %s*%s. If %s is linked already, declare it as a linked flux.", turns.Name, f.Symbol.Name, f.Symbol.Name),
				Related: []lang.Related{{Span: turns.Span, Path: turns.Path, Message: turns.Name + " is the number of turns"}},
			})
			return
		}
	}
}
