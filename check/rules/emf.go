package rules

import (
	"math"

	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file recognises the law of induction of a winding, U = K·f·N·B·A,
// whichever of its quantities it is solved for, and the number K in it.

// emf is the law of induction as a definition states it.
type emf struct {
	voltage, flux lang.Factor // U, and B or Φ; one of them may be the claim itself
	number        float64     // K, in U = K·f·N·B·A
	decimals      []float64   // named numbers that could belong to K: a form factor
}

// emfOf reads a claim as the law of induction; nil for everything else.
func (c *claim) emfOf() *emf {
	t, single := c.note.Normal(c.sym, atoms).Single()
	if !single {
		return nil
	}
	self := lang.Factor{Key: c.sym.Key, Facts: c.sym.Facts, Symbol: c.sym, Exp: unit.Whole(-1)}
	e := &emf{}
	var cycles, radians unit.Rat
	up, across := unit.Rat{}, unit.Rat{} // exponents of the voltage and of the flux
	for _, f := range append(t.Factors[:len(t.Factors):len(t.Factors)], self) {
		_, root := rootOf(f)
		switch r := roleOf(f.Facts); {
		case root:
		case opaqueFactor(f):
			return nil
		case isOf(f.Facts, kind.Voltage):
			e.voltage, up = f, up.Add(f.Exp)
		case isOf(f.Facts, kind.MagneticFluxDensity), isOf(f.Facts, kind.MagneticFlux):
			e.flux, across = f, across.Add(f.Exp)
		case r == roleFrequency && f.Facts.Dim[unit.Time].Sign() < 0:
			if isCycles(f) {
				cycles = cycles.Add(f.Exp)
			} else {
				radians = radians.Add(f.Exp)
			}
		case r != roleGeometry && !isTurns(f):
			return nil
		}
	}
	return e.solved(c, t, up, across, cycles, radians)
}

// isTurns reports a number of turns, or a number that says nothing else.
func isTurns(f lang.Factor) bool {
	return f.Facts.Kind.Is(kind.NumberOfTurns) || f.Facts.Dim.IsOne() && f.Facts.Kind == 0
}

// solved finds the number K; nil where the exponents are not those of the law.
func (e *emf) solved(c *claim, t lang.Term, up, across, cycles, radians unit.Rat) *emf {
	one := unit.Whole(1)
	if up != one && up != one.Neg() || across != up.Neg() || cycles.Add(radians) != across {
		return nil
	}
	s, ok := scaleOf(t)
	if !ok || s.value == 0 {
		return nil
	}
	w := &numberProduct{note: c.note, product: 1, ok: true}
	if w.walk(c.x, 1); !w.ok {
		return nil
	}
	e.number, e.decimals = s.value/w.product, w.decimals
	if up == one {
		e.number = 1 / e.number
		for i, x := range e.decimals {
			e.decimals[i] = 1 / x
		}
	}
	if radians == across {
		e.number *= 2 * math.Pi // U = K/2π·ω·N·B·A
	}
	return e
}

// numberProduct multiplies the plain numbers that names stand for in a product,
// such as a number of turns, and numbers of 5 and more that are written out; ok
// is false where the expression is no product.
type numberProduct struct {
	note    *lang.Note
	product float64
	ok      bool
	depth   int

	decimals []float64 // of the named numbers, those that count nothing
}

func (w *numberProduct) walk(x lang.Expr, exp float64) {
	if w.depth++; w.depth > maxNodes {
		w.ok = false
		return
	}
	switch x := x.(type) {
	case *lang.Paren:
		w.walk(x.X, exp)
	case *lang.Literal:
		if x.Unit == nil && x.Num.Value >= 5 && x.Num.Value == math.Trunc(x.Num.Value) {
			w.product *= math.Pow(x.Num.Value, exp)
		}
	case *lang.Name:
		w.name(x, exp)
	case *lang.Binary:
		w.binary(x, exp)
	case *lang.Call:
		if x.Fn.Text == "sqrt" && len(x.Args) == 1 {
			w.walk(x.Args[0], exp/2)
		}
	}
}

// maxNodes bounds the parts of a product that are looked at.
const maxNodes = 256

func (w *numberProduct) binary(b *lang.Binary, exp float64) {
	switch b.Op {
	case lang.OpMul, lang.OpDot:
		w.walk(b.X, exp)
		w.walk(b.Y, exp)
	case lang.OpDiv:
		w.walk(b.X, exp)
		w.walk(b.Y, -exp)
	case lang.OpPow:
		n, ok := b.Y.(*lang.Literal)
		if !ok {
			w.ok = false
			return
		}
		w.walk(b.X, exp*n.Num.Value)
	default:
		w.ok = false
	}
}

func (w *numberProduct) name(x *lang.Name, exp float64) {
	s := w.note.Lookup(lang.CanonicalName(x.Text))
	switch {
	case s == nil || s.Role != lang.RoleQuantity || !atoms(s):
	case s.Input && s.Facts.Dim.IsOne():
		x := math.Pow(s.Value.Re(), exp)
		w.product *= x
		if s.Value.Re() != math.Trunc(s.Value.Re()) {
			w.decimals = append(w.decimals, x)
		}
	case !s.Input && s.Def != nil && len(s.Def.Members) > 0:
		w.walk(s.Def.Members[0], exp)
	}
}

// is reports whether the law has the number, a named form factor counted or not.
func (e *emf) is(number float64) bool {
	if near(e.number, number) {
		return true
	}
	for _, x := range e.decimals {
		if near(e.number*x, number) {
			return true
		}
	}
	return false
}

// emfNumber is the number K that belongs to the statistics of a voltage and a flux
// of the waveform: 2π between two crests of a sinusoid, 4 between the crests of
// a square voltage and its triangular flux, and 4 for the mean of any voltage.
func emfNumber(voltage, flux kind.Qualifier, square bool) (float64, bool) {
	k, fluxCrest := 2*math.Pi, math.Sqrt2
	if square {
		k, fluxCrest = 4, math.Sqrt(3)
	}
	switch {
	case voltage == kind.Average:
		k = 4
	case voltage == kind.PeakToPeak:
		k *= 2
	case voltage == kind.RMS && !square:
		k /= math.Sqrt2
	case voltage != kind.Peak && voltage != kind.RMS:
		return 0, false
	}
	switch flux {
	case kind.Peak:
	case kind.RMS:
		k *= fluxCrest
	case kind.PeakToPeak:
		k /= 2
	default:
		return 0, false
	}
	return k, true
}

// near reports two numbers of the law that are meant to be the same: 4.4 and
// 4.44, 4.44 and √2·π.
func near(a, b float64) bool { return math.Abs(a/b-1) < 0.012 }

// statisticOf is the statistic of a voltage or a flux of the law; the claim's
// own is the declared one alone.
func (c *claim) statisticOf(f lang.Factor) kind.Qualifier {
	if f.Symbol == c.sym {
		return c.stat
	}
	return statOf(c.note, f)
}

// squareWave tells whether the law is that of a square voltage and a triangular
// flux; ok is false for waveforms that it does not know.
func (c *claim) squareWave(e *emf) (square, ok bool) {
	u, b := waveOf(c.note, e.voltage), waveOf(c.note, e.flux)
	switch {
	case (u == kind.Square || u == kind.AnyWave) && (b == kind.Triangular || b == kind.AnyWave):
		return u != b, true
	case !shaped(u) && !shaped(b):
		return false, true
	}
	return false, false
}
