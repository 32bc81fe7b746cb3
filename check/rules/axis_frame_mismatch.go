package rules

import (
	"fmt"
	"math"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/eval"
)

// AxisFrameMismatch finds products of components that are written in two frames.
func (Book) AxisFrameMismatch() check.Rule {
	return check.Rule{
		Name:     "axis-frame-mismatch",
		Severity: lang.Error,
		Title:    "Components in the axes of the crystal meet components in another frame",
		Sees: "The product of a tensor of one medium with a vector that is bound to another, where the tensor of one of the two is the other's, turned (`rotate`, or R·T·R⁻¹): one crystal in two frames; " +
			"the product of a vector with a tensor in its principal axes where the medium states an optic axis that lies elsewhere; " +
			"a tensor that is a rotation times a tensor, without the inverse rotation on its other side. " +
			"A caution for a sum of such tensors, and for a vector that is bound to the crystal and multiplied by its turned tensor.",
		Silent: "For tensors that are the same in both frames to 0.1 %: isotropic ones, and uniaxial ones turned about their axis; for vectors that a rotation has brought into the frame; " +
			"for vectors that nothing binds to a medium, unless the medium states its optic axis; where both media state optic axes with which their tensors agree.",
		Formula: "ε_w = R·ε_c·Rᵀ, E_w = R·E_c. E·ε·E, the trace and the determinant are the same in every frame, if both factors are in one.",
		Remedy:  "Turn the tensor into the frame of the vector: `rotate(crystal.eps, axis, angle)`, give it a medium of its own, and bind the vector to that.",
		Source:  "Nye, Physical Properties of Crystals, ch. I (from memory)",
		Wrong: check.Example{Note: `    medium crystal: linear, uniaxial, homogeneous
        eps_r = diag(44, 44, 28)
    medium wafer: linear, anisotropic, homogeneous
        eps_r = rotate(crystal.eps_r, (0, 1, 0), 35°)
    E in wafer, static electric field strength = (0, 0, 1.5) MV/m
    D = crystal.eps*E
    w, energy density = 1/2*D·E = 279 J/m^3
`},
		Right: check.Example{Note: `    medium crystal: linear, uniaxial, homogeneous
        eps_r = diag(44, 44, 28)
    medium wafer: linear, anisotropic, homogeneous
        eps_r = rotate(crystal.eps_r, (0, 1, 0), 35°)
    E in wafer, static electric field strength = (0, 0, 1.5) MV/m
    D = wafer.eps*E
    w, energy density = 1/2*D·E = 331 J/m^3
`},
		Run: perSymbol(axisFrame),
	}
}

func axisFrame(p *check.Pass, s *lang.Symbol) {
	x := s.Def.Members[0]
	if onceTurned(p, s, x) {
		return
	}
	lang.Walk(x, func(t lang.Tree) bool {
		b, ok := t.(*lang.Binary)
		if !ok {
			return true
		}
		fx, ok := p.Note.FactsOf(s.Stmt, b.X)
		fy, ok2 := p.Note.FactsOf(s.Stmt, b.Y)
		if !ok || !ok2 {
			return true
		}
		tensors := fx.Shape == eval.Tensor && fy.Shape == eval.Tensor
		switch product := b.Op == lang.OpMul || b.Op == lang.OpDot; {
		case product && fx.Shape == eval.Tensor && fy.Shape == eval.Vector:
			applied{p, s, b, b.X, b.Y}.check()
		case product && fx.Shape == eval.Vector && fy.Shape == eval.Tensor:
			applied{p, s, b, b.Y, b.X}.check()
		case (b.Op == lang.OpAdd || b.Op == lang.OpSub) && tensors:
			framesAdded(p, s, b)
		}
		return true
	})
}

// applied is a tensor that acts on a vector.
type applied struct {
	p              *check.Pass
	s              *lang.Symbol
	at             *lang.Binary
	tensor, vector lang.Expr
}

func (a applied) check() {
	k := framer{note: a.p.Note}
	t, v := k.of(a.s.Stmt, a.tensor), k.of(a.s.Stmt, a.vector)
	switch {
	case t.base == nil || t.medium == "" || v.turned:
	case !t.turned && a.offAxis(t):
	case v.medium == "":
	case t.turned && v.medium == t.medium:
		a.boundToCrystal(t)
	case !t.turned && sameCrystal(a.p.Note, t.medium, v.medium) && !alike(a.p.Note, t.medium, v.medium, fieldOf(t)):
		a.twoFrames(t, v)
	}
}

// fieldOf is the canonical name of the property behind a frame.
func fieldOf(f frame) string { return lang.CanonicalName(f.base.Field.Text) }

// written is the tensor of a frame as the note writes it.
func written(f frame) string { return lang.PrintExpr(f.base) }

// twoFrames reports a tensor of the crystal that acts on a vector of the wafer.
func (a applied) twoFrames(t, v frame) {
	n := a.p.Note
	own := n.Lookup(t.medium).Name
	other := n.Lookup(v.medium)
	f := lang.Fault{
		Span: a.s.Stmt.Abs(a.at),
		Message: fmt.Sprintf("%s has its components in the frame of %s, and %s in that of %s: %s is the same crystal, turned",
			lang.PrintExpr(a.tensor), own, lang.PrintExpr(a.vector), other.Name, other.Name),
		Detail:  fmt.Sprintf("Take the tensor in the frame of the vector, `%s.%s`, or turn the vector into the frame of %s.", other.Name, t.base.Field.Text, own),
		Related: append(pointTo(n.Lookup(t.medium), "the one frame"), pointTo(other, "the other")...),
	}
	if m, ok := a.tensor.(*lang.Member); ok {
		if _, known := tensorBehind(n, v.medium, fieldOf(t)); known {
			f.Fix = &lang.Fix{Title: "Take the tensor of " + other.Name, Edits: []lang.Edit{{Span: a.s.Stmt.Abs(m.X), New: other.Name}}}
		}
	}
	a.p.Report(f)
}

// boundToCrystal cautions about a turned tensor that acts on a vector which is
// bound to the crystal itself.
func (a applied) boundToCrystal(t frame) {
	n := a.p.Note
	base, ok := tensorBehind(n, t.medium, fieldOf(t))
	if name, is := unwrapped(a.tensor).(*lang.Name); is && ok {
		if now, ok := tensorValue(n.Lookup(lang.CanonicalName(name.Text))); ok && proportional(now, base) {
			return
		}
	}
	own := n.Lookup(t.medium)
	a.p.Report(lang.Fault{
		Severity: a.p.Lowered(),
		Span:     a.s.Stmt.Abs(a.at),
		Message: fmt.Sprintf("%s is turned out of the frame of %s, and %s is bound to %s: it is not stated in which frame its components are",
			lang.PrintExpr(a.tensor), own.Name, lang.PrintExpr(a.vector), own.Name),
		Detail: fmt.Sprintf("Give the turned crystal a medium of its own, `medium wafer: …` with `%s = rotate(%s, …)`, and bind the vector to the medium in whose frame it is.",
			t.base.Field.Text, written(t)),
		Related: pointTo(own, "the crystal"),
	})
}

// proportional reports two tensors of the same components, a factor apart.
func proportional(a, b [9]float64) bool {
	ta, tb := a[0]+a[4]+a[8], b[0]+b[4]+b[8]
	if ta == 0 || tb == 0 {
		return false
	}
	for i := range a {
		if math.Abs(a[i]/ta-b[i]/tb) > crystalTolerance {
			return false
		}
	}
	return true
}

// offAxis reports a tensor in its principal axes whose medium states an optic
// axis that lies elsewhere in the frame of the note.
func (a applied) offAxis(t frame) bool {
	n := a.p.Note
	v, s, ok := opticAxis(n, t.medium)
	value, known := tensorBehind(n, t.medium, fieldOf(t))
	if !ok || !known || symmetricAbout(value, v) {
		return false
	}
	own := n.Lookup(t.medium)
	a.p.Report(lang.Fault{
		Span: a.s.Stmt.Abs(a.at),
		Message: fmt.Sprintf("%s is written in the principal axes of %s, and %s is not: the optic axis lies along (%.3g, %.3g, %.3g)",
			written(t), own.Name, lang.PrintExpr(a.vector), v[0], v[1], v[2]),
		Detail: fmt.Sprintf("Turn the tensor: `rotate(%s, axis, angle)`, or make it from its two values and the axis: `uniaxial(across, along, %s.%s)`. "+
			"If the vector is in the principal axes, turn it there by a rotation, or state the optic axis in that frame.", written(t), own.Name, s.Name),
		Related: append(pointTo(s, "the optic axis"), pointTo(statedTensor(n, t), "the tensor")...),
	})
	return true
}

// statedTensor is the property behind a frame, or the one that it rests on.
func statedTensor(n *lang.Note, f frame) *lang.Symbol {
	if s := n.Lookup(f.medium + "." + fieldOf(f)); s != nil {
		return s
	}
	return n.Lookup(f.medium + "." + twinProperties[fieldOf(f)])
}

// framesAdded cautions about a sum of tensors in two frames.
func framesAdded(p *check.Pass, s *lang.Symbol, b *lang.Binary) {
	k := framer{note: p.Note}
	x, y := k.of(s.Stmt, b.X), k.of(s.Stmt, b.Y)
	if x.base == nil || y.base == nil || x.turned || y.turned || !sameCrystal(p.Note, x.medium, y.medium) || alike(p.Note, x.medium, y.medium, fieldOf(x)) {
		return
	}
	if onAxis(p.Note, x) && onAxis(p.Note, y) {
		return
	}
	p.Report(lang.Fault{
		Severity: p.Lowered(),
		Span:     s.Stmt.Abs(b),
		Message:  fmt.Sprintf("%s and %s have their components in two frames", written(x), written(y)),
		Detail: "Turn the one into the frame of the other. If they are two domains in one frame, state the optic axis of each: " +
			"`c, optic axis = (…)`, as a property of its medium.",
		Related: append(pointTo(p.Note.Lookup(x.medium), "the one frame"), pointTo(p.Note.Lookup(y.medium), "the other")...),
	})
}

// onAxis reports a medium that states an optic axis with which its tensor agrees.
func onAxis(n *lang.Note, f frame) bool {
	v, _, ok := opticAxis(n, f.medium)
	t, known := tensorBehind(n, f.medium, fieldOf(f))
	return ok && known && symmetricAbout(t, v)
}

// onceTurned reports a tensor that is defined as a rotation times a tensor.
func onceTurned(p *check.Pass, s *lang.Symbol, x lang.Expr) bool {
	f, ok := p.Note.FactsOf(s.Stmt, x)
	if !ok || f.Shape != eval.Tensor {
		return false
	}
	k := framer{note: p.Note}
	var rotations, tensors []lang.Expr
	for _, y := range tensorFactors(p.Note, s.Stmt, x) {
		if k.isRotation(s.Stmt, y) {
			rotations = append(rotations, y)
		} else {
			tensors = append(tensors, y)
		}
	}
	if len(rotations) != 1 || len(tensors) != 1 || k.isotropicFactor(s.Stmt, tensors[0]) {
		return false
	}
	r, t := lang.PrintExpr(rotations[0]), lang.PrintExpr(tensors[0])
	back := inverted(rotations[0])
	both := fmt.Sprintf("%s*%s*%s", r, t, back)
	if tensors[0].Index() < rotations[0].Index() {
		both = fmt.Sprintf("%s*%s*%s", back, t, r)
	}
	fault := lang.Fault{
		Span:    s.Stmt.Abs(x),
		Message: fmt.Sprintf("%s is turned once only: %s times %s has neither the components of the crystal nor those of the turned frame", s.Name, r, t),
		Detail:  fmt.Sprintf("A tensor is turned on both sides: `%s`, or `rotate(%s, axis, angle)`.", both, t),
	}
	if b, ok := unwrapped(x).(*lang.Binary); ok && b.X == rotations[0] && b.Y == tensors[0] {
		end := s.Stmt.Abs(x).End
		fault.Fix = &lang.Fix{Title: "Turn the other side too", Edits: []lang.Edit{insert(end, "*"+back)}}
	}
	p.Report(fault)
	return true
}

// inverted writes the inverse of a rotation.
func inverted(x lang.Expr) string {
	if c, ok := unwrapped(x).(*lang.Call); ok && c.Fn.Text == "inv" {
		return lang.PrintExpr(c.Args[0])
	}
	return "inv(" + lang.PrintExpr(x) + ")"
}

// isotropicFactor reports a tensor that is isotropic by value.
func (k framer) isotropicFactor(s *lang.Stmt, x lang.Expr) bool {
	f := k.of(s, x)
	if f.base != nil && !f.turned {
		t, ok := tensorBehind(k.note, f.medium, fieldOf(f))
		return ok && isotropic(t)
	}
	if name, ok := unwrapped(x).(*lang.Name); ok {
		t, ok := tensorValue(k.note.Lookup(lang.CanonicalName(name.Text)))
		return ok && isotropic(t)
	}
	return false
}

// tensorFactors lists the tensors of a product, in order.
func tensorFactors(n *lang.Note, s *lang.Stmt, x lang.Expr) []lang.Expr {
	switch y := x.(type) {
	case *lang.Paren:
		return tensorFactors(n, s, y.X)
	case *lang.Binary:
		if y.Op == lang.OpMul || y.Op == lang.OpDot {
			return append(tensorFactors(n, s, y.X), tensorFactors(n, s, y.Y)...)
		}
	}
	if f, ok := n.FactsOf(s, x); ok && f.Shape == eval.Tensor {
		return []lang.Expr{x}
	}
	return nil
}
