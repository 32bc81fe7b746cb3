package rules

import (
	"fmt"
	"math"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
)

// ScalarEnergyInCrystal finds ε|E|² in a medium in which D is not along E.
func (Book) ScalarEnergyInCrystal() check.Rule {
	return check.Rule{
		Name:     "scalar-energy-in-crystal",
		Severity: lang.Error,
		Title:    "An energy in an anisotropic medium is taken with one number for the permittivity",
		Sees: "An energy or energy density that is a square of the field times a scalar taken from the permittivity tensor of a medium declared uniaxial, biaxial or anisotropic " +
			"(one component, the trace, a single number that the medium states, a refractive index), or times the tensor without contraction. " +
			"A caution where the direction of the field or the tensor is not given by value.",
		Silent: "For E·D, E·(ε·E), D·(inv(ε)·D); where the field or the flux density lies along the principal axis of the component that is used, or across the axis of a uniaxial medium with its value for that plane, " +
			"by value and to 0.1 %, also in the frame of another medium that is the same crystal, turned; where a single number is stated and the field, as a vector, lies along a principal axis; for a tensor that is isotropic to 0.1 %; in isotropic media.",
		Formula: "w = ½ E·ε·E = ½ ε₀(ε₁E₁² + ε₂E₂² + ε₃E₃²) in the principal frame; D and E are not parallel.",
		Remedy:  "Contract the tensor: `1/2 * E·(m.eps*E)`, or `1/2 * D·E` with `D = m.eps*E`.",
		Source:  "Nye, Physical Properties of Crystals, ch. IV (from memory); Landau, Lifshitz, Electrodynamics of Continuous Media, § 13 (from memory)",
		Wrong: check.Example{Note: `    medium crystal: linear, uniaxial, homogeneous, nondispersive
        eps_r = diag(44, 44, 28)
    a = 35°
    E in crystal, static electric field strength = (sin(a), 0, cos(a)) * 2 MV/m
    w, energy density = 1/2 * crystal.eps.zz * |E|^2 = 496 J/m^3
`},
		Right: check.Example{Note: `    medium crystal: linear, uniaxial, homogeneous, nondispersive
        eps_r = diag(44, 44, 28)
    a = 35°
    E in crystal, static electric field strength = (sin(a), 0, cos(a)) * 2 MV/m
    w, energy density = 1/2 * E·(crystal.eps*E) = 589 J/m^3
`},
		Run: perClaim(scalarInCrystal),
	}
}

func scalarInCrystal(p *check.Pass, c *claim) {
	if form, ok := c.form(); ok && form == kind.StoredEnergy {
		c.scalarEnergy(p)
	}
}

// throughFluxes is the expansion of this rule: like atoms, and through flux
// densities, so that a scalar cannot hide in `D = m.eps.zz*E`.
func throughFluxes(s *lang.Symbol) bool {
	return atoms(s) || s.Facts.Kind.Is(kind.ElectricFluxDensity) && !s.Input
}

func (c *claim) scalarEnergy(p *check.Pass) {
	for _, t := range products(c.note.Normal(c.sym, throughFluxes)) {
		q := squareOf(c.note, t, kind.StoredEnergy)
		if q == nil {
			continue
		}
		f, m, ok := c.fromTensor(t, isPermittivity)
		if !ok || !c.electricFieldSquare(q) {
			continue
		}
		d := c.directionIn(q, m)
		if sev, why, right := c.crystalVerdict(p, f, m, d); !right {
			c.reportCrystal(p, q, d.frame, sev, why)
			return
		}
	}
}

// electricFieldSquare reports amplitudes that are fields or flux densities, for
// which a tensor has a direction to be contracted with.
func (c *claim) electricFieldSquare(q *square) bool {
	for _, f := range q.amplitudes {
		b := f.Facts.Dim.Base()
		if b != kind.ElectricFieldStrength.Dim().Base() && b != kind.ElectricFluxDensity.Dim().Base() {
			return false
		}
	}
	return true
}

// crystalVerdict compares the scalar with the contraction where the note gives
// both; why tells what it could not prove.
func (c *claim) crystalVerdict(p *check.Pass, f lang.Factor, m medium, d fieldDirection) (sev lang.Severity, why string, right bool) {
	t, known := d.frame.tensor(c.note, "eps_r", "eps")
	if known && isotropic(t) {
		return 0, "", true
	}
	if f.Facts.Shape == eval.Tensor {
		return p.Rule.Severity, "the tensor multiplies the square of the field, and the two are not contracted", false
	}
	stated, _ := m.tensor(c.note, "eps_r", "eps")
	x, component := scalarOf(f, stated)
	switch {
	case d.known && !component && c.principal(d.frame, t, known, d.v):
		return 0, "", true // which of the two or three numbers it is, is not known
	case !known:
		return p.Lowered(), fmt.Sprintf("medium %s states one number for a permittivity that depends on direction", m.sym.Name), false
	case !d.known:
		return p.Lowered(), "the direction of the field is not given", false
	case !component:
		return p.Rule.Severity, "one number stands for the tensor", false
	}
	k := seenBetween(t, d.v, d.flux)
	if math.Abs(x/k-1) <= crystalTolerance {
		return 0, "", true
	}
	return p.Rule.Severity, fmt.Sprintf("in the direction of this field the tensor counts %.4g and not %.4g: the energy comes out %.3g times its value", k, x, offBy(x/k, d.flux)), false
}

// offBy is the factor by which an energy is off: ½D²/ε goes with the inverse.
func offBy(ratio float64, flux bool) float64 {
	if flux {
		return 1 / ratio
	}
	return ratio
}

// fieldDirection is the direction of the field of a square, in the frame of a
// medium.
type fieldDirection struct {
	v     [3]float64
	known bool
	flux  bool   // it is that of the flux density
	frame medium // the crystal, or the same crystal in the frame of the vector
}

func (c *claim) directionIn(q *square, m medium) fieldDirection {
	d := fieldDirection{frame: m}
	for _, a := range q.amplitudes {
		s := vectorBehind(c.note, a.Symbol)
		v, known := direction(s)
		if !known || a.Part != "" || d.known && !d.flux {
			continue // of two the field decides
		}
		d.v, d.known, d.flux = v, true, isOf(a.Facts, kind.ElectricFluxDensity)
		if len(s.Facts.Media) > 0 && s.Def != nil && s.Def.In != nil && sameCrystal(c.note, s.Facts.Media[0], m.sym.Key) {
			d.frame, _ = mediumOf(c.note, s.Facts.Media[0])
		}
	}
	return d
}

// vectorBehind is the vector of which a scalar is the magnitude, else the
// symbol itself.
func vectorBehind(n *lang.Note, s *lang.Symbol) *lang.Symbol {
	if s == nil || s.Def == nil || len(s.Def.Members) == 0 || s.Facts.Shape != eval.Scalar {
		return s
	}
	inner := lang.Expr(nil)
	switch x := unwrapped(s.Def.Members[0]).(type) {
	case *lang.Bars:
		inner = x.X
	case *lang.Call:
		if x.Fn.Text == "abs" && len(x.Args) == 1 {
			inner = x.Args[0]
		}
	}
	if name, ok := inner.(*lang.Name); ok {
		if v := n.Lookup(lang.CanonicalName(name.Text)); v != nil && v.Facts.Shape == eval.Vector {
			return v
		}
	}
	return s
}

// principal reports a direction along a principal axis: of the tensor, else of
// the stated optic axis and the plane across it, else of the frame.
func (c *claim) principal(m medium, t [9]float64, known bool, v [3]float64) bool {
	if known {
		return parallel(applied3(t, v), v)
	}
	if axis, _, ok := opticAxis(c.note, m.sym.Key); ok {
		dot := axis[0]*v[0] + axis[1]*v[1] + axis[2]*v[2]
		return parallel(axis, v) || math.Abs(dot) <= crystalTolerance*length(axis)*length(v)
	}
	for i := range 3 {
		var e [3]float64
		e[i] = 1
		if parallel(e, v) {
			return true
		}
	}
	return false
}

func (c *claim) reportCrystal(p *check.Pass, q *square, m medium, sev lang.Severity, why string) {
	f := lang.Fault{
		Severity: sev,
		Message:  fmt.Sprintf("%s takes the permittivity of %s, which is anisotropic, as one number: %s", c.sym.Name, m.sym.Name, why),
		Detail:   fmt.Sprintf("Contract the tensor: `1/2 * E·(%s.eps*E)`, with E as a vector in the frame of the tensor.", m.sym.Name),
		Related:  append([]lang.Related{{Name: m.sym.Key, Span: m.sym.Span, Path: m.sym.Path, Message: m.sym.Name + " is declared anisotropic"}}, c.because(q.amplitudes, func(s *lang.Symbol) string { return s.Name + " is the field" })...),
	}
	_, known := m.tensor(c.note, "eps_r", "eps")
	if !known {
		f.Detail = fmt.Sprintf("State the tensor, `eps_r = diag(…)`, in the medium %s and contract it: `1/2 * E·(%[1]s.eps*E)`.", m.sym.Name)
	}
	if sev != p.Rule.Severity {
		f.Detail += " If the field lies along a principal axis, give it as a vector: then this form is right with that axis's value."
	}
	if known {
		f.Fix = c.contractionFix(q, m)
	}
	c.report(p, f)
}

// contractionFix rewrites a plain ½·ε·E² of a vector E.
func (c *claim) contractionFix(q *square, m medium) *lang.Fix {
	if len(q.amplitudes) != 1 || q.amplitudes[0].Symbol == nil || len(q.byRole[roleGeometry]) > 0 || q.region {
		return nil
	}
	e := q.amplitudes[0].Symbol
	if e.Facts.Shape != eval.Vector || !e.Facts.Kind.Is(kind.ElectricFieldStrength) || len(products(c.note.Normal(c.sym, throughFluxes))) != 1 {
		return nil
	}
	return &lang.Fix{
		Title: "Contract the tensor",
		Edits: []lang.Edit{{Span: c.span(), New: fmt.Sprintf("%s * %s·(%s.eps*%s)", ratio(q.coef), e.Name, m.sym.Name, e.Name)}},
	}
}
