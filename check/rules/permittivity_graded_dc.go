package rules

import (
	"fmt"
	"math"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// PermittivityGradedDC finds steady fields of direct voltage that are divided by
// permittivities instead of conductivities.
func (Book) PermittivityGradedDC() check.Rule {
	return check.Rule{
		Name:     "permittivity-graded-dc",
		Severity: lang.Error,
		Title:    "The stress of layers at direct voltage is divided by permittivities",
		Sees: "A static field strength bound to a medium that is made from the permittivities of two media, in a note in which no field of that medium is made from conductivities. " +
			"An error where both media state a conductivity and ε/σ differs by more than 5 %, a caution where a conductivity is missing.",
		Silent: "Under a transient regime (the field at the first moment and after a reversal); for alternating quantities; where ε/σ is the same in both media; for media that are declared lossless; " +
			"where the note takes the field of that medium from the conductivities too; for one layer.",
		Formula: "Steady state: J_n is continuous, E_i ∝ 1/σ_i; the interface holds ε₂E₂ − ε₁E₁. It is reached with τ = (ε₁d₂ + ε₂d₁)/(σ₁d₂ + σ₂d₁).",
		Remedy:  "Divide by conductivities for the steady state: `E in oil, static … = U/(d_o + d_b*oil.sigma/board.sigma)`, and take the permittivities for `regime: transient`.",
		Source:  "Jackson, Classical Electrodynamics, 3rd ed., I.5 (boundary conditions) with continuity of the current; from memory",
		Wrong: check.Example{Note: `    medium oil: linear, isotropic, homogeneous, lossy
        eps_r = 2.2
        sigma = 1e-13 S/m
    medium board: linear, isotropic, homogeneous, lossy
        eps_r = 4.4
        sigma = 1e-15 S/m
    U, static voltage = 90 kV
    d_o = 6 mm
    d_b = 3 mm
    E in board, static electric field strength = U/(d_b + d_o*board.eps_r/oil.eps_r) = 6.0 kV/mm
`},
		Right: check.Example{Note: `    medium oil: linear, isotropic, homogeneous, lossy
        sigma = 1e-13 S/m
    medium board: linear, isotropic, homogeneous, lossy
        sigma = 1e-15 S/m
    U, static voltage = 90 kV
    d_o = 6 mm
    d_b = 3 mm
    E in board, static electric field strength = U/(d_b + d_o*board.sigma/oil.sigma) = 29.4 kV/mm
`},
		Run: gradedDC,
	}
}

func gradedDC(p *check.Pass) error {
	steady := map[string]bool{} // media with a field from conductivities
	var suspects []*claim
	for _, c := range viewOf(p).claims {
		if c.sym.Def.In == nil || !isOf(c.sym.Facts, kind.ElectricFieldStrength) {
			continue
		}
		key := lang.CanonicalName(c.sym.Def.In.Text)
		if uses(p, c.sym.Stmt, kind.Conductivity) || uses(p, c.sym.Stmt, kind.Resistivity) {
			steady[key] = true
		} else if c.isStatic() && len(c.sym.Facts.Media) > 1 && uses(p, c.sym.Stmt, kind.Permittivity) {
			suspects = append(suspects, c)
		}
	}
	for _, c := range suspects {
		if word, _ := c.note.Regime(c.sym); word != "transient" && !steady[lang.CanonicalName(c.sym.Def.In.Text)] {
			c.gradedByPermittivity(p)
		}
	}
	return nil
}

// uses reports whether a property of a kind, absolute or relative, goes into a
// statement.
func uses(p *check.Pass, s *lang.Stmt, k kind.ID) bool {
	return originsOf(p).reaches(s, func(x *lang.Symbol) bool {
		return x.Owner != nil && (isOf(x.Facts, k) || k == kind.Permittivity && x.Facts.Kind.Is(kind.RelativePermittivity))
	})
}

func (c *claim) gradedByPermittivity(p *check.Pass) {
	f := lang.Fault{
		Message: fmt.Sprintf("%s is the division of the first moment: at direct voltage the conductivities divide the field in the end", c.sym.Name),
		Detail:  "Take E_i ∝ 1/σ_i, or put the definition under `regime: transient` if the first moment is meant; a reversal needs both.",
	}
	var first, known float64
	missing := ""
	for _, m := range c.mediaOf() {
		e, ok := m.relativePermittivity(c.note)
		sigma, ok2 := m.conductivity(c.note)
		if m.says("lossless") {
			return
		}
		if !ok || !ok2 {
			missing = m.sym.Name
			continue
		}
		if known++; first == 0 {
			first = e / sigma
		} else if math.Abs(e/sigma/first-1) <= differs {
			return
		}
	}
	if known < 2 {
		f.Severity = p.Lowered()
		f.Detail = fmt.Sprintf("State the conductivity of %s. ", missing) + f.Detail
	}
	c.report(p, f)
}

// conductivity is the scalar conductivity of a medium.
func (m medium) conductivity(n *lang.Note) (float64, bool) {
	if s := n.Lookup(m.sym.Key + ".sigma"); s != nil {
		x, ok := magnitude(s)
		return x, ok && x > 0
	}
	if s := n.Lookup(m.sym.Key + ".rho"); s != nil {
		x, ok := magnitude(s)
		return 1 / x, ok && x > 0
	}
	return 0, false
}
