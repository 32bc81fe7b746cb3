package rules

import (
	"fmt"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// LossCountedTwice finds sums of a conduction loss and of a dielectric loss that
// already holds it.
func (Book) LossCountedTwice() check.Rule {
	return check.Rule{
		Name:     "loss-counted-twice",
		Severity: lang.Error,
		Title:    "A loss is counted twice: the conductivity and the loss factor hold the same one",
		Sees: "A sum of a conduction loss and of a dielectric loss of one body, σ beside ω·ε·tan δ, ω·ε₀·ε″ or ω·Im(ε), in a power, a conductivity, a conductance, a loss factor, " +
			"a permittivity ε − jσ/ω or below the root of a propagation coefficient, and the eps_c of a medium that states both a complex permittivity and a conductivity: " +
			"where one of the two is computed from the other or has just its value; where the one is declared as a total (total loss factor, effective conductivity); " +
			"where both come from the same source and neither is said to be a part. A caution where they come from different sources or from none, and where only the conductivity is said to be a part.",
		Silent: "Where the loss factor is declared as a polarization loss factor (an ε″ as a polarization loss index), beside a conductivity that is no effective one; for one of the two alone; " +
			"for a difference, which takes the one out of the other; for the losses of two media; for a resistor beside a capacitor.",
		Formula: "J = σE + jω(ε′ − jε″)E = jωε′E + (σ + ωε″)E: a measurement at one frequency gives σ + ωε″ and no parts, so tan δ = (σ + ωε″)/(ωε′) holds σ already.",
		Remedy:  "Use one of the two, or declare what each is: `tan_delta, polarization loss factor = …`, `sigma, direct-current conductivity = …`.",
		Source:  "von Hippel, Dielectrics and Waves, part I (equivalent conductivity, from memory)",
		Wrong: check.Example{Note: `    regime: harmonic at f = 915 MHz
    medium resin: linear, isotropic, homogeneous, lossy
        eps_r = 6.4
        tan_delta = 0.09
    ω, angular frequency = 2*pi*f
    σ_e, conductivity = ω*resin.eps*resin.tan_delta
    E in resin, rms electric field strength = 8 kV/m
    p, average power density = (σ_e + ω*resin.eps*resin.tan_delta)*E^2 = 3.75 MW/m^3
`},
		Right: check.Example{Note: `    regime: harmonic at f = 915 MHz
    medium resin: linear, isotropic, homogeneous, lossy
        eps_r = 6.4
        tan_delta = 0.09
    ω, angular frequency = 2*pi*f
    σ_e, conductivity = ω*resin.eps*resin.tan_delta
    E in resin, rms electric field strength = 8 kV/m
    p, average power density = σ_e*E^2 = 1.88 MW/m^3
`},
		Run: perSymbol(lossTwice),
	}
}

// lossTwice looks at the sums of one definition.
func lossTwice(p *check.Pass, s *lang.Symbol) {
	l := lossesOf(p)
	if x := l.in(s); x != nil && !l.above(s) {
		x.report(p)
	}
	doubledPermittivity(p, s)
}

// report files the finding, with what the note says of the two.
func (x *lossPair) report(p *check.Pass) {
	sigma, of := x.conduction, x.dielectric
	f := lang.Fault{
		Span:    x.span,
		Message: fmt.Sprintf("%s counts the loss twice: %s stands in it beside %s", x.in.Name, ownedName(sigma), ownedName(of)),
		Related: relatedSymbols(p.Note, sigma, of),
	}
	if x.ratio > 0 {
		f.Message += fmt.Sprintf(", and the sum is %.2f times what that gives alone", 1+x.ratio)
	}
	if f.Severity, f.Detail = x.verdict(p); f.Severity != 0 {
		p.Report(f)
	}
}

const partsRemedy = "If each is a part only, say so: `tan_delta, polarization loss factor = …`, `sigma, direct-current conductivity = …`."

// verdict judges the two by what the note says they are; 0: each is a part.
func (x *lossPair) verdict(p *check.Pass) (lang.Severity, string) {
	sigma, of := x.conduction, x.dielectric
	part := of.Facts.Kind.Is(kind.PolarizationLossFactor) || of.Facts.Kind.Is(kind.PolarizationLossIndex)
	direct := sigma.Facts.Kind.Is(kind.DCConductivity)
	switch {
	case sigma == of || dependsOn(p.Note, sigma, of) || dependsOn(p.Note, of, sigma):
		return p.Rule.Severity, "One of the two is computed from the other: use one of them."
	case x.guessed:
		return p.Lowered(), fmt.Sprintf("A dissipation has room for the imaginary part of %s alone, and as it is measured that holds the conduction too. Declare it as a loss index, or a polarization loss index.", ownedName(of))
	case sigma.Facts.Kind.Is(kind.EffectiveConductivity):
		return p.Rule.Severity, fmt.Sprintf("%s is an effective conductivity, which holds every loss at its frequency: use it alone.", ownedName(sigma))
	case part:
		return 0, ""
	case of.Facts.Kind.Is(kind.TotalLossFactor):
		return p.Rule.Severity, fmt.Sprintf("%s is a total loss factor, which holds the conduction too: use it alone.", ownedName(of))
	case x.equal():
		return p.Rule.Severity, fmt.Sprintf("%s has just the value that this loss gives at this frequency: it is the same loss. Use one of the two.", ownedName(sigma))
	case direct && of.Facts.Complex:
		return 0, "" // the note has taken the two apart, and has no further word for the permittivity
	case direct:
		return p.Lowered(), "A loss factor as it is measured holds the conduction too. If this one is of polarization alone, say so: `tan_delta, polarization loss factor = …`."
	case sigma.Owner == nil || of.Owner == nil:
		return p.Lowered(), "A loss factor as it is measured holds the conduction too. " + partsRemedy
	case sigma.Owner.Key != of.Owner.Key:
		return 0, "" // two media
	case sigma.Per != of.Per:
		return p.Lowered(), "They come from two sources; a loss factor as it is measured holds the conduction too. " + partsRemedy
	case sigma.Per == "":
		return p.Lowered(), "Neither names its source; a loss factor as it is measured holds the conduction too. " + partsRemedy
	}
	return p.Rule.Severity, "Both come from one source; a loss factor as it is measured holds the conduction too: use one of the two. " + partsRemedy
}

// doubledPermittivity finds the use of the complex permittivity of a medium that
// states a complex one and a conductivity, which eps_c adds to it.
func doubledPermittivity(p *check.Pass, s *lang.Symbol) {
	for _, x := range definedBy(s) {
		lang.Walk(x, func(t lang.Tree) bool {
			if m, ok := t.(*lang.Member); ok && m.Field.Text == "eps_c" {
				if pair := complexBeside(p.Note, m); pair != nil {
					pair.in, pair.span = s, s.Stmt.Abs(m)
					pair.report(p)
				}
			}
			return true
		})
	}
}

// complexBeside are the conductivity and the complex permittivity that eps_c of
// a medium adds up; nil where it does not.
func complexBeside(n *lang.Note, m *lang.Member) *lossPair {
	o, ok := m.X.(*lang.Name)
	if !ok {
		return nil
	}
	key := lang.CanonicalName(o.Text)
	eps := firstOf(n, key, "eps", "eps_r")
	sigma := firstOf(n, key, "sigma", "rho")
	if eps == nil || sigma == nil || !eps.Facts.Complex || n.Lookup(key+".eps_c") != nil || n.Lookup(key+".tan_delta") != nil {
		return nil
	}
	return &lossPair{conduction: sigma, dielectric: eps}
}

// firstOf is the first of some properties that a medium states.
func firstOf(n *lang.Note, medium string, properties ...string) *lang.Symbol {
	for _, name := range properties {
		if s := n.Lookup(medium + "." + name); s != nil {
			return s
		}
	}
	return nil
}

// ownedName writes a name with its medium before it.
func ownedName(s *lang.Symbol) string {
	if s.Owner != nil {
		return s.Owner.Name + "." + s.Name
	}
	return s.Name
}

// relatedSymbols points at the definitions of names, constants left out.
func relatedSymbols(n *lang.Note, symbols ...*lang.Symbol) []lang.Related {
	var out []lang.Related
	for _, s := range symbols {
		if s != nil && s.Stmt != nil {
			out = append(out, lang.Related{Path: s.Path, Span: s.Span, Message: ownedName(s)})
		}
	}
	return out
}
