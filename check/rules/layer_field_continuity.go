package rules

import (
	"fmt"
	"math"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// LayerFieldContinuity finds one field strength in two layers whose
// permittivities differ.
func (Book) LayerFieldContinuity() check.Rule {
	return check.Rule{
		Name:     "layer-field-continuity",
		Severity: lang.Error,
		Title:    "Layers of different permittivity are given the same field strength",
		Sees: "A field strength bound to a medium (`E in void`) that is a voltage over the sum of several thicknesses, in a note with another medium whose permittivity differs by more than 5 % (an error); " +
			"a field strength bound to one medium that is defined as that of another one of different permittivity (a caution; an error for a normal electric field strength).",
		Silent: "For a field that is bound to no medium, such as a mean; for one thickness; for equal permittivities; for a tangential electric field strength; for a field that is made from the flux density or from the permittivities; " +
			"in a static note, where permittivity-graded-dc speaks.",
		Formula: "E_t and D_n are continuous: across layers in series E_i = U/(ε_i·Σ(d_j/ε_j)), so that the layer of the lowest permittivity takes the highest field.",
		Remedy:  "Write `E in void, … = U/(d_1 + d_2*void.eps_r/resin.eps_r)`.",
		Source:  "Jackson, Classical Electrodynamics, 3rd ed., I.5 (boundary conditions; from memory)",
		Wrong: check.Example{Note: `    regime: harmonic at f = 50 Hz
    medium void: linear, isotropic, homogeneous
        eps_r = 1.0006
    medium resin: linear, isotropic, homogeneous
        eps_r = 4
    U, peak voltage = 12 kV
    d_1 = 0.2 mm
    d_2 = 4 mm
    E in void, peak electric field strength = U/(d_1 + d_2) = 2.86 kV/mm
    k = resin.eps_r = 4
`},
		Right: check.Example{Note: `    regime: harmonic at f = 50 Hz
    medium void: linear, isotropic, homogeneous
        eps_r = 1.0006
    medium resin: linear, isotropic, homogeneous
        eps_r = 4
    U, peak voltage = 12 kV
    d_1 = 0.2 mm
    d_2 = 4 mm
    E in void, peak electric field strength = U/(d_1 + d_2*void.eps_r/resin.eps_r) = 9.995 kV/mm
`},
		Run: layerField,
	}
}

// differs is the difference of two permittivities that matters.
const differs = 0.05

func layerField(p *check.Pass) error {
	for _, c := range viewOf(p).claims {
		if c.sym.Def.In == nil || !isOf(c.sym.Facts, kind.ElectricFieldStrength) || c.isStatic() {
			continue
		}
		own, ok := mediumOf(p.Note, lang.CanonicalName(c.sym.Def.In.Text))
		if !ok {
			continue
		}
		if acrossLayers(p.Note, c.sym) {
			c.overAllLayers(p, own)
		} else {
			c.copiedField(p, own)
		}
	}
	return nil
}

// isStatic reports a claim of a static quantity or under a static regime.
func (c *claim) isStatic() bool {
	word, _ := c.note.Regime(c.sym)
	return word == "static" || c.sym.Facts.Qualifier == kind.Static
}

// overAllLayers reports a voltage over all thicknesses as the field of one.
func (c *claim) overAllLayers(p *check.Pass, own medium) {
	other, ratio := otherLayer(p.Note, own)
	if other == nil {
		return
	}
	c.report(p, lang.Fault{
		Message: fmt.Sprintf("%s is the mean over all layers, and not the field in %s: %s has %.3g times its permittivity", c.sym.Name, own.sym.Name, other.Name, ratio),
		Detail:  fmt.Sprintf("D is continuous across the layers: divide by Σ d_j·%s.eps_r/eps_rj. For a mean, leave `in %s` out.", own.sym.Name, own.sym.Name),
		Related: []lang.Related{{Span: other.Span, Path: other.Path, Message: other.Name}},
	})
}

// otherLayer finds a medium of the note with another permittivity, and how many
// times that is the own one.
func otherLayer(n *lang.Note, own medium) (*lang.Symbol, float64) {
	e, ok := own.relativePermittivity(n)
	if !ok {
		return nil, 0
	}
	for _, s := range n.Symbols {
		if s.Role != lang.RoleMedium || s.Key == own.sym.Key {
			continue
		}
		if m, ok := mediumOf(n, s.Key); ok {
			if x, ok := m.relativePermittivity(n); ok && math.Abs(x/e-1) > differs {
				return s, x / e
			}
		}
	}
	return nil, 0
}

// relativePermittivity is the magnitude of a medium's scalar permittivity.
func (m medium) relativePermittivity(n *lang.Note) (float64, bool) {
	for _, k := range []struct {
		name string
		over float64
	}{{"eps_r", 1}, {"eps", epsilon0(n)}} {
		if s := n.Lookup(m.sym.Key + "." + k.name); s != nil {
			if x, ok := magnitude(s); ok && x > 0 && s.Role != lang.RoleFunction {
				return x / k.over, true
			}
		}
	}
	return 0, false
}

// epsilon0 is the electric constant as the language has it.
func epsilon0(n *lang.Note) float64 {
	if s := n.Lookup("eps_0"); s != nil {
		return s.Value.Re()
	}
	return 1
}

// copiedField reports the field of one medium taken for that of another.
func (c *claim) copiedField(p *check.Pass, own medium) {
	name, ok := unparenthesized(c.x).(*lang.Name)
	if !ok {
		return
	}
	from := p.Note.Lookup(lang.CanonicalName(name.Text))
	if from == nil || from.Def == nil || from.Def.In == nil || from.Path != "" {
		return
	}
	other, ok := mediumOf(p.Note, lang.CanonicalName(from.Def.In.Text))
	if !ok || other.sym.Key == own.sym.Key {
		return
	}
	a, ok1 := own.relativePermittivity(p.Note)
	b, ok2 := other.relativePermittivity(p.Note)
	if !ok1 || !ok2 || math.Abs(a/b-1) <= differs {
		return
	}
	if c.sym.Facts.Kind.Is(kind.TangentialFieldStrength) || from.Facts.Kind.Is(kind.TangentialFieldStrength) {
		return
	}
	f := lang.Fault{
		Severity: p.Lowered(),
		Message:  fmt.Sprintf("%s takes the field of %s as it is; its normal component is %.3g times that", c.sym.Name, other.sym.Name, b/a),
		Detail:   fmt.Sprintf("Only the tangential component is the same on both sides. For the normal one write `%s.eps/%s.eps*%s`.", other.sym.Name, own.sym.Name, from.Name),
		Related:  []lang.Related{{Span: from.Span, Message: from.Name + " in " + other.sym.Name}},
	}
	if c.sym.Facts.Kind.Is(kind.NormalFieldStrength) || from.Facts.Kind.Is(kind.NormalFieldStrength) {
		f.Severity = p.Rule.Severity
	} else {
		f.Detail += " If it is the tangential one, declare a tangential electric field strength."
	}
	c.report(p, f)
}
