package rules

import (
	"fmt"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// RelativeAbsoluteConstant explains permittivities and permeabilities that are
// relative where absolute ones are needed, or the reverse.
func (Book) RelativeAbsoluteConstant() check.Rule {
	return check.Rule{
		Name:     "relative-absolute-constant",
		Severity: lang.Error,
		Title:    "A relative permittivity or permeability stands for an absolute one, or the reverse",
		Sees: "A quantity whose dimension is off by exactly one permittivity or permeability (a relative value without ε₀ or µ₀, or an absolute one multiplied by it again); " +
			"a static relative permittivity below 1; a susceptibility where D, ε or a capacitance needs the relative permittivity χ + 1.",
		Silent: "Where the dimension is off by anything else; for a polarization ε₀χE; for a relative permittivity below 1 in a harmonic or transient note or a dispersive medium " +
			"(plasma, metal).",
		Formula: "D = ε₀ε_r E, ε_r = 1 + χ; B = µ₀µ_r H, µ_r = 1 + χ_m.",
		Remedy:  "Multiply by eps_0 or mu_0, or take the property with the right name: m.eps is absolute, m.eps_r relative.",
		Source:  "ISO/IEC 80000-6:2022, items 6-14 (permittivity) and 6-15 (relative permittivity) (from memory)",
		Wrong: check.Example{Note: `    medium film: linear, isotropic, homogeneous
        eps_r = 2.9
    A = 40 cm^2
    d = 20 um
    C, capacitance = film.eps_r*A/d
`},
		Right: check.Example{Note: `    medium film: linear, isotropic, homogeneous
        eps_r = 2.9
    A = 40 cm^2
    d = 20 um
    C, capacitance = film.eps*A/d = 5.14 nF
`},
		Run: relativeAbsolute,
	}
}

func relativeAbsolute(p *check.Pass) error {
	for _, m := range mismatches(p) {
		if f, ok := constantOff(p.Note, m); ok {
			p.Report(f)
		}
	}
	for _, s := range p.Note.Symbols {
		belowOne(p, s)
	}
	for _, c := range viewOf(p).claims {
		susceptibility(p, c)
	}
	return nil
}

// constantOff explains a dimension that is off by one absolute constant.
func constantOff(n *lang.Note, m mismatch) (lang.Fault, bool) {
	for _, k := range []struct {
		abs, rel kind.ID
		name     string
	}{
		{kind.Permittivity, kind.RelativePermittivity, "eps_0"},
		{kind.Permeability, kind.RelativePermeability, "mu_0"},
	} {
		d := k.abs.Dim().Base()
		f := lang.Fault{Span: m.span, Related: relatedTo(n, m, k.abs, k.rel)}
		switch m.factor() {
		case unit.Dim{}.Div(d).Base():
			f.Message = fmt.Sprintf("%s lacks one %s: its formula gives %s, and %s is claimed", m.sym.Name, k.abs, describeDim(m.found), m.claim())
			f.Detail = fmt.Sprintf("A relative value stands where the absolute one is needed: multiply by %s, or write the property without _r.", k.name)
			return f, true
		case d:
			f.Message = fmt.Sprintf("%s has one %s too many: its formula gives %s, and %s is claimed", m.sym.Name, k.abs, describeDim(m.found), m.claim())
			f.Detail = fmt.Sprintf("An absolute value is multiplied by %s again: take the relative one, or leave %s out.", k.name, k.name)
			return f, true
		}
	}
	return lang.Fault{}, false
}

// relatedTo points at the permittivities that entered.
func relatedTo(n *lang.Note, m mismatch, kinds ...kind.ID) []lang.Related {
	var out []lang.Related
	for _, t := range terms(n.Form(m.sym, m.x, lang.NamesStay)) {
		for _, f := range t.Factors {
			for _, k := range kinds {
				if f.Symbol != nil && f.Symbol.Stmt != nil && f.Facts.Kind.Is(k) {
					out = append(out, lang.Related{Path: f.Symbol.Path, Span: f.Symbol.Span, Message: fmt.Sprintf("%s is %s", f.Symbol.Name, withArticle(f.Symbol.Facts.Kind.String()))})
				}
			}
		}
	}
	return out
}

func terms(f *lang.Form) []lang.Term {
	if f == nil {
		return nil
	}
	return f.Terms
}

// belowOne reports a static relative permittivity below that of vacuum.
func belowOne(p *check.Pass, s *lang.Symbol) {
	if !s.Facts.Kind.Is(kind.RelativePermittivity) || !s.Input || !s.Result.Known || s.Facts.Complex || s.Facts.Shape == eval.List {
		return
	}
	if word, _ := p.Note.Regime(s); word == "harmonic" || word == "transient" {
		return
	}
	if m, ok := ownerMedium(p.Note, s); ok && m.says("dispersive") {
		return
	}
	least := s.Value.At(0).Re()
	if s.Facts.Shape == eval.Tensor {
		least = min(least, s.Value.At(4).Re(), s.Value.At(8).Re())
	}
	if least >= 1 || least <= 0 && s.Facts.Shape != eval.Scalar {
		return
	}
	f := lang.Fault{
		Span:    s.Span,
		Message: fmt.Sprintf("%s is %s: a static relative permittivity is never below 1", s.Name, s.Shown),
		Detail:  "If it is a susceptibility, add 1; if it is absolute, give it its unit F/m. A plasma or a metal is dispersive: declare that, or the frequency.",
	}
	if s.Facts.KindBy != lang.Declared && s.Role != lang.RoleProperty {
		f.Severity = p.Lowered()
	}
	p.Report(f)
}

// ownerMedium is the medium of a property.
func ownerMedium(n *lang.Note, s *lang.Symbol) (medium, bool) {
	if s.Owner == nil {
		return medium{}, false
	}
	return mediumOf(n, s.Owner.Key)
}

// susceptibility reports a flux density, permittivity or capacitance made with
// a susceptibility alone.
func susceptibility(p *check.Pass, c *claim) {
	k := c.sym.Facts.Kind
	if !c.declared() || !k.Is(kind.ElectricFluxDensity) && !k.Is(kind.Permittivity) && !k.Is(kind.Capacitance) {
		return
	}
	t, single := c.note.Normal(c.sym, lang.UpToDeclared).Single()
	if !single {
		return
	}
	for _, f := range t.Factors {
		if f.Facts.Kind.Is(kind.ElectricSusceptibility) && f.Exp == unit.Whole(1) {
			c.report(p, lang.Fault{
				Message: fmt.Sprintf("%s is made with the susceptibility alone: the 1 of vacuum is missing", c.sym.Name),
				Detail:  fmt.Sprintf("Write `(1 + %s)` for the relative permittivity; eps_0*%s*E is the polarization.", f.Key, f.Key),
				Related: c.because([]lang.Factor{f}, func(s *lang.Symbol) string { return s.Name + " is a susceptibility" }),
			})
			return
		}
	}
}
