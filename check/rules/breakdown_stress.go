package rules

import (
	"math"

	"inkjoule/lang"
	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
)

// This file finds the stresses of media, their strengths, and what a note
// compares.

// needsCheck is the part of the strength above which a comparison is expected.
const needsCheck = 0.2

// stress is a field strength or a voltage in a medium that has a strength.
type stress struct {
	of, strength *lang.Symbol
	medium       medium
	strengths    []*lang.Symbol // every strength of the medium for this quantity
	crest        float64        // SI, the largest that its statistic allows
	least, most  float64        // crest over crest, as missing statistics allow
	written      float64        // the same with missing statistics read as crests
}

// stressOf reads a name as a stress of a medium with a strength; nil for others.
func stressOf(n *lang.Note, s *lang.Symbol) *stress {
	if s.Role != lang.RoleQuantity || s.Def == nil || s.Def.In == nil || isStrength(s.Facts) || !isElectricAmplitude(s.Facts) {
		return nil
	}
	m, ok := boundMedium(n, s)
	if !ok {
		return nil
	}
	x := &stress{of: s, medium: m}
	e, ok := crestOf(s)
	if !ok {
		return nil
	}
	x.crest = e.high
	x.choose(n, e)
	if x.strength == nil {
		return nil
	}
	return x
}

// boundMedium is the medium to which a name is bound, through a region too.
func boundMedium(n *lang.Note, s *lang.Symbol) (medium, bool) {
	key := lang.CanonicalName(s.Def.In.Text)
	if r := n.Lookup(key); r != nil && r.Stmt != nil {
		if t, ok := r.Stmt.Tree.(*lang.Region); ok && t.In != nil {
			key = lang.CanonicalName(t.In.Text)
		}
	}
	return mediumOf(n, key)
}

// choose finds the highest strength of the medium that speaks of such a stress.
func (x *stress) choose(n *lang.Note, e crestRange) {
	best := 0.0
	for _, d := range x.medium.tree.Properties {
		s := n.Lookup(x.medium.sym.Key + "." + lang.CanonicalName(d.Name.Text))
		if s == nil || !limits(s, x.of) {
			continue
		}
		limit, ok := crestOf(s)
		if !ok || limit.low <= 0 {
			continue
		}
		x.strengths = append(x.strengths, s)
		if limit.low > best {
			best, x.strength = limit.low, s
			x.least, x.most, x.written = e.low/limit.high, e.high/limit.low, e.written/limit.written
		}
	}
}

// limits reports a strength that speaks of a stress: a dielectric strength of a
// field, a breakdown or withstand voltage of a voltage, impulses of impulses.
func limits(strength, of *lang.Symbol) bool {
	k := strength.Facts.Kind
	if strength.Facts.Waveform == kind.Impulse && of.Facts.Waveform != kind.Impulse {
		return false
	}
	if isOf(of.Facts, kind.ElectricFieldStrength) {
		return k.Is(kind.DielectricStrength)
	}
	return k.Is(kind.BreakdownVoltage) || k.Is(kind.WithstandVoltage)
}

// crestRange is what the crest of a quantity may be, SI.
type crestRange struct{ low, high, written float64 }

// crestOf turns a value into that at its crest; a missing statistic leaves both
// the crest and the rms value of a sinusoid open.
func crestOf(s *lang.Symbol) (crestRange, bool) {
	x, ok := largest(s)
	if !ok {
		return crestRange{}, false
	}
	switch s.Facts.Qualifier {
	case kind.RMS:
		x *= math.Sqrt(crestSquare(s.Facts.Waveform))
		return crestRange{x, x, x}, true
	case kind.PeakToPeak:
		return crestRange{x / 2, x / 2, x / 2}, true
	case kind.Unqualified:
		return crestRange{x, x * math.Sqrt(crestSquare(s.Facts.Waveform)), x}, true
	}
	return crestRange{x, x, x}, true
}

// crestSquare is the square of the crest factor, that of a sinusoid where the
// waveform does not tell it.
func crestSquare(w kind.Waveform) float64 {
	if square, ok := w.Crest(); ok {
		return float64(square)
	}
	return 2
}

// largest is the magnitude of a known number or vector, of phasors too.
func largest(s *lang.Symbol) (float64, bool) {
	if !s.Result.Known || s.Facts.Shape != eval.Scalar && s.Facts.Shape != eval.Vector {
		return 0, false
	}
	sum := 0.0
	for i := range s.Value.Len() {
		x := magnitudeOf(s.Value.At(i).C())
		sum += x * x
	}
	return math.Sqrt(sum), true
}
