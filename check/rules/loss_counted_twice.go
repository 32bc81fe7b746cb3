package rules

import (
	"fmt"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// LossCountedTwice finds a dissipation that adds the loss of a conductivity to
// that of a loss factor which already holds it.
func (Book) LossCountedTwice() check.Rule {
	return check.Rule{
		Name:     "loss-counted-twice",
		Severity: lang.Error,
		Title:    "A loss is counted twice: the conductivity and the loss factor hold the same one",
		Sees: "A power, a power density or a conductivity that is the sum of σ·E² and ω·ε″·E² (or ω·ε·tan δ·E², ω·Im(ε)·E²), where σ is computed from that loss factor, " +
			"or where both are properties of one medium and neither is said to be a part only. A caution where they come from different sources.",
		Silent: "Where the loss factor is declared as a polarization loss factor, or the conductivity as a direct-current conductivity beside it: then each is a part; for one of the two alone; " +
			"for the losses of two media.",
		Formula: "J = σE + jω(ε′ − jε″)E: a measurement at one frequency gives σ + ωε″ and no parts, so tan δ = (σ + ωε″)/(ωε′) holds σ already.",
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
		Run: perClaim(lossTwice),
	}
}

func lossTwice(p *check.Pass, c *claim) {
	form, ok := c.form()
	if !(ok && form == kind.Dissipation) && !c.sym.Facts.Kind.Is(kind.Conductivity) {
		return
	}
	ps := c.view.products(c.sym)
	for _, a := range ps {
		sigma, ok := conductionOf(a)
		if !ok {
			continue
		}
		for _, b := range ps {
			if loss, ok := polarizationOf(b); ok && a != b && sameAmplitudes(a, b) && c.reportTwice(p, sigma, loss) {
				return
			}
		}
	}
}

// conductionOf is the conductivity of a term that is a conduction loss.
func conductionOf(t *product) (lang.Factor, bool) {
	var found []lang.Factor
	for _, f := range t.byRole[roleResistive] {
		if isOf(f.Facts, kind.Conductivity) && f.Exp == unit.Whole(1) {
			found = append(found, f)
		}
	}
	if len(found) != 1 || len(t.byRole[roleResistive]) != 1 || len(t.byRole[roleLoss])+len(t.byRole[roleCapacity])+len(t.byRole[roleFrequency]) > 0 {
		return lang.Factor{}, false
	}
	return found[0], true
}

// polarizationOf is the factor that makes a term a loss of polarization: tan δ,
// or a permittivity beside ω.
func polarizationOf(t *product) (lang.Factor, bool) {
	if len(t.byRole[roleFrequency]) != 1 || len(t.byRole[roleCapacity]) == 0 || len(t.byRole[roleResistive]) > 0 {
		return lang.Factor{}, false
	}
	for _, f := range append(t.byRole[roleLoss], t.byRole[roleCapacity]...) {
		if f.Symbol != nil || f.Inside != nil {
			return f, true
		}
	}
	return lang.Factor{}, false
}

// sameAmplitudes reports terms with the same fields or voltages in them.
func sameAmplitudes(a, b *product) bool {
	x, y := a.byRole[roleElectric], b.byRole[roleElectric]
	if len(x) != len(y) {
		return false
	}
	for i := range x {
		if x[i].Key != y[i].Key || x[i].Exp != y[i].Exp {
			return false
		}
	}
	return true
}

// reportTwice files the finding, unless the note says that each is a part.
func (c *claim) reportTwice(p *check.Pass, sigma, loss lang.Factor) bool {
	of := lossSymbol(loss)
	if of == nil || sigma.Symbol == nil {
		return false
	}
	f := lang.Fault{
		Message: fmt.Sprintf("%s counts the loss twice: %s stands in it beside %s", c.sym.Name, ownedName(sigma.Symbol), ownedName(of)),
		Related: c.because([]lang.Factor{sigma, {Symbol: of}}, func(s *lang.Symbol) string { return s.Name }),
	}
	made := originsOf(p).madeFrom(sigma.Symbol, of)
	switch {
	case made:
		f.Detail = fmt.Sprintf("%s is computed from %s. Use one of the two.", sigma.Symbol.Name, ownedName(of))
	case of.Facts.Kind.Is(kind.PolarizationLossFactor), sigma.Facts.Kind.Is(kind.DCConductivity):
		return false
	case sigma.Symbol.Owner == nil || of.Owner == nil:
		f.Severity = p.Lowered()
		f.Detail = "A loss factor as it is measured holds the conduction too. " + partsRemedy
	case sigma.Symbol.Owner.Key != of.Owner.Key:
		return false // two media
	case sigma.Symbol.Per != of.Per:
		f.Severity = p.Lowered()
		f.Detail = "They come from two sources; a loss factor as it is measured holds the conduction too. " + partsRemedy
	default:
		f.Detail = "A loss factor as it is measured holds the conduction too: use one of the two. " + partsRemedy
	}
	c.report(p, f)
	return true
}

const partsRemedy = "If each is a part only, say so: `tan_delta, polarization loss factor = …`."

// lossSymbol is the property or quantity that a loss rests on.
func lossSymbol(f lang.Factor) *lang.Symbol {
	if f.Symbol != nil {
		return f.Symbol
	}
	if t, ok := f.Inside.Single(); ok {
		for _, x := range t.Factors {
			if x.Symbol != nil && isPermittivity(x) {
				return x.Symbol
			}
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
