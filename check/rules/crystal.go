package rules

import (
	"math"

	"inkjoule/lang"
	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
)

// This file compares scalar forms in anisotropic media with the contraction of
// the tensor, by value where the note gives both the tensor and the field.

// crystalTolerance is how far a scalar form may be off before it is wrong: a
// field along a principal axis, or a tensor that is isotropic in effect.
const crystalTolerance = 1e-3

// tensor gives the value of a tensor property of a medium, by the property or
// its relative twin; ok is false where the medium states none.
func (m medium) tensor(n *lang.Note, names ...string) (t [9]float64, ok bool) {
	for _, name := range names {
		s := n.Lookup(m.sym.Key + "." + name)
		if s == nil || !s.Result.Known || s.Facts.Shape != eval.Tensor || s.Facts.Complex {
			continue
		}
		for i := range t {
			t[i] = s.Value.At(i).Re()
		}
		return t, true
	}
	return t, false
}

// isotropic reports a tensor that is a multiple of the unit tensor.
func isotropic(t [9]float64) bool {
	scale := math.Abs(t[0])
	for i, x := range t {
		want := 0.0
		if i%4 == 0 {
			want = t[0]
		}
		if math.Abs(x-want) > crystalTolerance*scale {
			return false
		}
	}
	return true
}

// scalarOf is the number that a factor takes from a tensor: a component, or
// the mean of the diagonal for trace; ok is false for anything else.
func scalarOf(f lang.Factor, t [9]float64) (x float64, ok bool) {
	switch {
	case len(f.Part) == 2:
		i, j := axis(f.Part[0]), axis(f.Part[1])
		return t[3*i+j], i >= 0 && j >= 0
	case f.Call == "trace":
		return (t[0] + t[4] + t[8]) / 3, true
	}
	return 0, false
}

func axis(c byte) int {
	if c < 'x' || c > 'z' {
		return -1
	}
	return int(c - 'x')
}

// contraction is v·T·v over |v|²: the number that stands for the tensor in the
// direction of v.
func contraction(t [9]float64, v [3]float64) float64 {
	sum, norm := 0.0, 0.0
	for i := range 3 {
		for j := range 3 {
			sum += v[i] * t[3*i+j] * v[j]
		}
		norm += v[i] * v[i]
	}
	return sum / norm
}

// seenBetween is the permittivity that relates the energy to the square of a
// field or, for a flux density, the reciprocal to its square.
func seenBetween(t [9]float64, v [3]float64, flux bool) float64 {
	if !flux {
		return contraction(t, v)
	}
	inv, ok := inverse(t)
	if !ok {
		return math.NaN()
	}
	return 1 / contraction(inv, v)
}

// applied3 is T·v.
func applied3(t [9]float64, v [3]float64) (out [3]float64) {
	for i := range 3 {
		for j := range 3 {
			out[i] += t[3*i+j] * v[j]
		}
	}
	return out
}

func length(v [3]float64) float64 { return math.Sqrt(v[0]*v[0] + v[1]*v[1] + v[2]*v[2]) }

// parallel reports two directions that are the same or opposite, to the
// tolerance in the sine of the angle.
func parallel(a, b [3]float64) bool {
	x, y, z := a[1]*b[2]-a[2]*b[1], a[2]*b[0]-a[0]*b[2], a[0]*b[1]-a[1]*b[0]
	return length([3]float64{x, y, z}) <= crystalTolerance*length(a)*length(b)
}

// direction gives a vector quantity's components; ok is false for a scalar, an
// unknown or a zero vector.
func direction(s *lang.Symbol) (v [3]float64, ok bool) {
	if s == nil || !s.Result.Known || s.Facts.Shape != eval.Vector || s.Facts.Complex {
		return v, false
	}
	for i := range v {
		v[i] = s.Value.At(i).Re()
	}
	return v, v != [3]float64{}
}

// fromTensor finds a factor that is a scalar taken from a tensor property of an
// anisotropic medium, or the tensor itself beside the square of the field.
func (c *claim) fromTensor(p *product, is func(lang.Factor) bool) (lang.Factor, medium, bool) {
	for _, f := range p.all {
		if f.Applied || !is(f) {
			continue
		}
		keys := f.Facts.Media
		if f.Symbol != nil && f.Symbol.Owner != nil {
			keys = append([]string{f.Symbol.Owner.Key}, keys...)
		}
		for _, key := range keys {
			if m, ok := mediumOf(c.note, key); ok && m.anisotropic() {
				return f, m, true
			}
		}
	}
	return lang.Factor{}, medium{}, false
}

// isPermittivity reports a factor that stands for a permittivity: absolute,
// relative, or a refractive index.
func isPermittivity(f lang.Factor) bool {
	k := f.Facts.Kind
	if k.Is(kind.RefractiveIndex) {
		return true
	}
	if roleOf(f.Facts) != roleCapacity || f.Facts.Dim.Base() == kind.Capacitance.Dim().Base() {
		return f.Call == "trace" && k == 0 && len(f.Facts.Media) > 0
	}
	return true
}
