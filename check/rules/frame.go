package rules

import (
	"math"

	"inkjoule/lang"
	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
)

// This file tells in which frame the components of vectors and tensors are
// written. Every medium is a frame of its own: a tensor of a medium and a vector
// that is bound to it (`E in wafer`) have one frame, and a medium whose tensor
// is turned out of another's is the same crystal in another frame. What nothing
// ties to a medium has no known frame.

// frame is a frame as far as it is known.
type frame struct {
	medium string       // its key; "" where it is not known
	base   *lang.Member // the tensor of the medium as it is written
	turned bool         // a rotation has left that frame
	stmt   *lang.Stmt   // where base stands
}

// framer finds frames; depth bounds how many names it looks through.
type framer struct {
	note  *lang.Note
	depth int
}

const deepestFrame = 32

// of tells the frame of an expression.
func (k framer) of(s *lang.Stmt, x lang.Expr) frame {
	switch x := x.(type) {
	case *lang.Paren:
		return k.of(s, x.X)
	case *lang.Unary:
		return k.of(s, x.X)
	case *lang.Member:
		return k.member(s, x)
	case *lang.Name:
		return k.name(x)
	case *lang.Binary:
		return k.binary(s, x)
	case *lang.Call:
		return k.call(s, x)
	}
	return frame{}
}

// member is the frame of a medium's property.
func (k framer) member(s *lang.Stmt, m *lang.Member) frame {
	o, ok := m.X.(*lang.Name)
	f, known := k.note.FactsOf(s, m)
	if !ok || !known || f.Shape != eval.Tensor {
		return frame{}
	}
	if medium := k.note.Lookup(lang.CanonicalName(o.Text)); medium != nil && medium.Role == lang.RoleMedium {
		return frame{medium: medium.Key, base: m, stmt: s}
	}
	return frame{}
}

// name is the frame of a quantity: of the medium that it is bound to, else that
// of its definition.
func (k framer) name(x *lang.Name) frame {
	s := k.note.Lookup(lang.CanonicalName(x.Text))
	if s == nil || s.Def == nil || s.Role != lang.RoleQuantity || len(s.Def.Members) == 0 || k.depth > deepestFrame {
		return frame{}
	}
	f := framer{k.note, k.depth + 1}.of(s.Stmt, s.Def.Members[0])
	if s.Def.In != nil && len(s.Facts.Media) > 0 && !f.turned {
		f = frame{medium: s.Facts.Media[0], base: f.base, stmt: f.stmt}
	}
	return f
}

// binary is the frame of an operation: that of the tensor or vector in it, left
// by a rotation.
func (k framer) binary(s *lang.Stmt, b *lang.Binary) frame {
	x, y := k.of(s, b.X), k.of(s, b.Y)
	if b.Op == lang.OpMul || b.Op == lang.OpDot {
		if k.isRotation(s, b.X) || k.isRotation(s, b.Y) {
			x.turned, y.turned = true, true
		}
	}
	if x.medium == "" {
		return y
	}
	return x
}

// call is the frame of an inverse or a turned tensor.
func (k framer) call(s *lang.Stmt, c *lang.Call) frame {
	if len(c.Args) == 0 || c.Of != nil {
		return frame{}
	}
	switch c.Fn.Text {
	case "inv":
		return k.of(s, c.Args[0])
	case "rotate":
		f := k.of(s, c.Args[0])
		f.turned = true
		return f
	}
	return frame{}
}

// isRotation reports an expression that is a rotation: a name of an orthogonal
// tensor of numbers, or its inverse.
func (k framer) isRotation(s *lang.Stmt, x lang.Expr) bool {
	switch x := x.(type) {
	case *lang.Paren:
		return k.isRotation(s, x.X)
	case *lang.Call:
		return x.Fn.Text == "inv" && len(x.Args) == 1 && k.isRotation(s, x.Args[0])
	case *lang.Member:
		if o, ok := x.X.(*lang.Name); ok {
			t, ok := tensorValue(k.note.Lookup(lang.CanonicalName(o.Text) + "." + lang.CanonicalName(x.Field.Text)))
			return ok && isRotation(t)
		}
	case *lang.Name:
		sym := k.note.Lookup(lang.CanonicalName(x.Text))
		t, ok := tensorValue(sym)
		return ok && sym.Facts.Dim.IsOne() && isRotation(t)
	}
	return false
}

// tensorValue is the value of a real tensor.
func tensorValue(s *lang.Symbol) (t [9]float64, ok bool) {
	if s == nil || !s.Result.Known || s.Facts.Shape != eval.Tensor || s.Facts.Complex {
		return t, false
	}
	for i := range t {
		t[i] = s.Value.At(i).Re()
	}
	return t, true
}

// isRotation reports R·Rᵀ = 1 with a determinant of 1, and R not the unit tensor.
func isRotation(t [9]float64) bool {
	off, unit := 0.0, 0.0
	for i := range 3 {
		for j := range 3 {
			sum, one := 0.0, 0.0
			for k := range 3 {
				sum += t[3*i+k] * t[3*j+k]
			}
			if i == j {
				one = 1
			}
			off = math.Max(off, math.Abs(sum-one))
			unit = math.Max(unit, math.Abs(t[3*i+j]-one))
		}
	}
	det := t[0]*(t[4]*t[8]-t[5]*t[7]) - t[1]*(t[3]*t[8]-t[5]*t[6]) + t[2]*(t[3]*t[7]-t[4]*t[6])
	return off < 1e-6 && det > 0 && unit > crystalTolerance
}

// turnedFrom reports a medium one of whose tensors is another's, turned.
func turnedFrom(n *lang.Note, a, b string) bool {
	m, ok := mediumOf(n, a)
	if !ok {
		return false
	}
	for _, d := range m.tree.Properties {
		if len(d.Members) == 0 {
			continue
		}
		if f := (framer{note: n}).of(m.sym.Stmt, d.Members[0]); f.turned && f.medium == b {
			return true
		}
	}
	return false
}

// sameCrystal reports two media that are one crystal in two frames.
func sameCrystal(n *lang.Note, a, b string) bool {
	return a != b && a != "" && b != "" && (turnedFrom(n, a, b) || turnedFrom(n, b, a))
}

// alike reports that a property of two media has the same components, so that
// the frames do not matter for it.
func alike(n *lang.Note, a, b, property string) bool {
	s, ok := tensorBehind(n, a, property)
	t, ok2 := tensorBehind(n, b, property)
	if !ok || !ok2 {
		return false
	}
	scale := 0.0
	for _, x := range s {
		scale = math.Max(scale, math.Abs(x))
	}
	for i := range s {
		if math.Abs(s[i]-t[i]) > crystalTolerance*scale {
			return false
		}
	}
	return true
}

// twins are the relative and the absolute of one property; read only.
var twinProperties = map[string]string{"eps": "eps_r", "eps_r": "eps", "mu": "mu_r", "mu_r": "mu"}

// tensorBehind is the value of a property, or of the one that it rests on.
func tensorBehind(n *lang.Note, medium, property string) ([9]float64, bool) {
	if t, ok := tensorValue(n.Lookup(medium + "." + property)); ok {
		return t, true
	}
	return tensorValue(n.Lookup(medium + "." + twinProperties[property]))
}

// opticAxis is the direction of the optic axis that a medium states.
func opticAxis(n *lang.Note, key string) (v [3]float64, s *lang.Symbol, ok bool) {
	m, ok := mediumOf(n, key)
	if !ok {
		return v, nil, false
	}
	if s = m.propertyOf(n, kind.OpticAxis); s == nil {
		return v, nil, false
	}
	v, ok = direction(s)
	return v, s, ok
}

// symmetricAbout reports a tensor that has the axis as an axis of symmetry.
func symmetricAbout(t [9]float64, v [3]float64) bool {
	c := contraction(t, v)
	a := (t[0] + t[4] + t[8] - c) / 2
	norm := v[0]*v[0] + v[1]*v[1] + v[2]*v[2]
	for i := range 3 {
		for j := range 3 {
			want := (c - a) * v[i] * v[j] / norm
			if i == j {
				want += a
			}
			if math.Abs(t[3*i+j]-want) > crystalTolerance*math.Max(math.Abs(a), math.Abs(c)) {
				return false
			}
		}
	}
	return true
}
