package rules

import (
	"fmt"
	"math"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file looks at a permeability across an air gap, in a skin depth, and at
// the magnitude of a complex one.

// acrossGap finds the permeability of the material in an inductance of a core
// that has an air gap.
func (u *use) acrossGap(p *check.Pass) bool {
	if !isOf(u.sym.Facts, kind.Inductance) || u.mu.Exp != unit.Whole(1) || u.kind == kind.EffectivePermeability {
		return false
	}
	gap, shared := u.gap()
	if gap == nil {
		return false
	}
	severity, detail := p.Rule.Severity, fmt.Sprintf("Take the effective permeability, `μ_e, effective permeability = μ/(1 + μ*%s/l)`, or add the reluctance of the gap, `%[1]s/(mu_0*A)`.", gap.Name)
	switch {
	case shared && u.withGapToo(gap):
		severity = p.Lowered()
		detail += " If it is meant for comparison, as if there were no gap, give the whole core a medium of its own and bind the gap to the other."
	case !shared:
		severity = p.Lowered()
		detail += fmt.Sprintf(" If %s belongs to another core, bind both to their media.", gap.Name)
	}
	return u.tell(p, severity, fmt.Sprintf("%s leaves out the air gap %s: %s is that of the material%s", u.sym.Name, gap.Name, u.name(), u.gapFactor(gap)), detail)
}

// gap finds an air gap on which the claim does not depend; shared is true where
// it is bound to the core's medium, or something that depends on it has a measure or the turns of the claim too.
func (u *use) gap() (gap *lang.Symbol, shared bool) {
	for _, s := range u.note.Symbols {
		v, known := magnitude(s)
		if s.Role != lang.RoleQuantity || !s.Facts.Kind.Is(kind.AirGap) || known && v == 0 || dependsOn(u.note, u.sym, s) {
			continue
		}
		if len(s.Facts.Media) > 0 {
			if !u.core.bound || s.Facts.Media[0] != u.core.m.sym.Key {
				continue // the gap of another core
			}
			return s, true
		}
		gap = s
		for _, o := range u.view.claims {
			if o != u.claim && dependsOn(u.note, o.sym, s) && u.sharesMeasure(o) {
				return s, true
			}
		}
	}
	return gap, false
}

// withGapToo reports that the note has an inductance with the gap in it: the
// one without may be meant for comparison.
func (u *use) withGapToo(gap *lang.Symbol) bool {
	for _, o := range u.view.claims {
		if o != u.claim && isOf(o.sym.Facts, kind.Inductance) && dependsOn(u.note, o.sym, gap) {
			return true
		}
	}
	return false
}

// sharesMeasure reports another claim that is made with a length, an area or
// the turns of this one.
func (u *use) sharesMeasure(o *claim) bool {
	for _, f := range u.t.all {
		r := roleOf(f.Facts)
		if f.Symbol != nil && f.Over == nil && (r == roleGeometry || f.Facts.Kind.Is(kind.NumberOfTurns)) && dependsOn(u.note, o.sym, f.Symbol) {
			return true
		}
	}
	return false
}

// gapFactor tells how much the gap takes off, where the path length is known.
func (u *use) gapFactor(gap *lang.Symbol) string {
	mu, ok := sizeOf(u.note, u.mu)
	g, ok2 := magnitude(gap)
	for _, f := range u.t.byRole[roleGeometry] {
		l, ok3 := sizeOf(u.note, f)
		if ok && ok2 && ok3 && f.Exp == unit.Whole(-1) && isOf(f.Facts, kind.Length) && l > g && u.mu.Facts.Kind.Is(kind.RelativePermeability) {
			return fmt.Sprintf(", %.3g times the effective one", 1+mu*g/l)
		}
	}
	return ""
}

// inSkin finds the static permeability in the skin depth of saturated steel.
func (u *use) inSkin(p *check.Pass) bool {
	if !u.sym.Facts.Kind.Is(kind.SkinDepth) || !u.core.bound || u.kind == kind.EffectivePermeability || u.kind == kind.IncrementalPermeability || u.kind == kind.ReversiblePermeability {
		return false
	}
	l, limited := u.limitOf(u.core)
	if !limited {
		return false
	}
	for _, s := range u.note.Symbols {
		b, known := magnitude(s)
		if s.Role != lang.RoleQuantity || !known || len(s.Facts.Media) == 0 || s.Facts.Media[0] != u.core.m.sym.Key || !isOf(s.Facts, kind.MagneticFluxDensity) || s == l.of || b <= l.b {
			continue
		}
		return u.tell(p, p.Rule.Severity, fmt.Sprintf("%s takes %s, %s, and %s is driven to %s, beyond its knee", u.sym.Name, u.name(), u.title(), u.core.m.sym.Name, tesla(b)),
			"In saturated steel the field goes in as a front: take an effective permeability for the surface at this field strength, or the limiting nonlinear theory.")
	}
	return false
}

// magnitude finds |µ_c| where the real part µ′ belongs.
func (u *use) magnitude(p *check.Pass) bool {
	if !u.mu.Bars || u.kind != kind.ComplexPermeability && !u.mu.Facts.Complex && (u.mu.Symbol == nil || !u.mu.Symbol.Facts.Complex) {
		return false
	}
	k := u.sym.Facts.Kind
	form, isForm := kind.FormOf(k)
	if !k.Is(kind.Inductance) && !k.Is(kind.RelativePermeability) && !k.Is(kind.Permeability) && !(isForm && form == kind.StoredEnergy) {
		return false
	}
	u.kind = kind.ComplexPermeability
	factor := ""
	if s := u.mu.Symbol; s != nil && s.Result.Known && s.Value.Len() == 1 && s.Value.Re() != 0 {
		factor = fmt.Sprintf(", %.3g times that", math.Hypot(s.Value.Re(), s.Value.Im())/math.Abs(s.Value.Re()))
	}
	return u.tell(p, p.Rule.Severity, fmt.Sprintf("%s takes the magnitude of the complex permeability %s for its real part%s", u.sym.Name, u.name(), factor),
		fmt.Sprintf("What stores energy is the real part, `Re(%s)`; the imaginary part is the loss.", u.name()))
}
