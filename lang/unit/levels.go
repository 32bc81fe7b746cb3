package unit

import (
	"math"
	"strings"
)

// levelRow is one level unit that stands alone.
type levelRow struct {
	symbol, name string
	field        Field
	ref          float64 // in coherent SI units of dim
	dim          Dim
	neper        bool
	source       string
}

// dipoleGain is the gain of a half-wave dipole, 2.15 dB as it is used in
// licences (ITU-R BS.561; the computed value is 1.6409, 2.151 dB).
var dipoleGain = math.Pow(10, 0.215)

const srcLevel = "IEC 60027-3; ISO 80000-3:2006, 3-21 to 3-24"

// levelRows are the level units. `u` stands for both micro signs too.
var levelRows = [...]levelRow{
	{"dB", "decibel", ByKind, 1, dimOne, false, srcLevel},
	{"Np", "neper", ByKind, 1, dimOne, true, srcLevel},
	{"dBm", "decibel over 1 mW", Power, 1e-3, dimPower, false, srcLevel},
	{"dBW", "decibel over 1 W", Power, 1, dimPower, false, srcLevel},
	{"dBi", "decibel over the isotropic radiator", Power, 1, dimOne, false, srcTrade},
	{"dBd", "decibel over the half-wave dipole", Power, dipoleGain, dimOne, false, "ITU-R BS.561"},
	{"dBuV", "decibel over 1 µV", RootPower, 1e-6, dimVoltage, false, srcLevel},
	{"dBuV/m", "decibel over 1 µV/m", RootPower, 1e-6, dimVoltage.Div(dimLength), false, srcLevel},
	{"dBuA", "decibel over 1 µA", RootPower, 1e-6, dimCurrent, false, srcLevel},
	{"dBuA/m", "decibel over 1 µA/m", RootPower, 1e-6, dimCurrent.Div(dimLength), false, srcLevel},
}

// isLevel reports a phrase that begins with dB or Np; dBq is a becquerel.
func isLevel(s string) bool {
	if len(s) < 2 || s[:2] != "dB" && s[:2] != "Np" {
		return false
	}
	return len(s) < 3 || s[2] != 'q'
}

// microAsU writes both micro signs as `u`.
var microAsU = strings.NewReplacer("µ", "u", "μ", "u")

// parseLevel reads a level unit: one of levelRows, `dB(REFERENCE)`, or a level
// per length, which is an attenuation coefficient.
func parseLevel(phrase string) (Unit, *PhraseError) {
	plain := phrase
	if strings.ContainsAny(phrase, "µμ") {
		plain = microAsU.Replace(phrase)
	}
	for i := range levelRows {
		if r := &levelRows[i]; r.symbol == plain {
			return r.unit(phrase), nil
		}
	}
	word, rest := phrase[:2], phrase[2:]
	switch {
	case strings.HasPrefix(rest, "/"):
		return perLength(phrase, word)
	case word == "dB" && strings.HasPrefix(rest, "(") && strings.HasSuffix(rest, ")"):
		return reference(phrase)
	}
	return Unit{}, levelFault(phrase)
}

func (r *levelRow) unit(phrase string) Unit {
	l := &Level{Field: r.field, Ref: r.ref, Neper: r.neper}
	u, _ := Unit{Symbol: phrase, Dim: r.dim, Level: l}.finish()
	return u
}

// perLength reads dB/m, dB/km, Np/m: the attenuation coefficient of a
// root-power quantity, α in Np/m, so that 1 dB/m is ln 10/20 m⁻¹ = 0.1151 m⁻¹.
func perLength(phrase, word string) (Unit, *PhraseError) {
	per, err := Parse("1" + phrase[2:])
	if err != nil {
		return Unit{}, shifted(err, 1, phrase)
	}
	if !per.Dim.Compatible(Dim{}.Div(dimLength)) {
		return Unit{}, levelFault(phrase)
	}
	f := per.Factor
	if word == "dB" {
		f = f.Mul(Factor{rest: math.Ln10 / 20})
	}
	u, ok := Unit{Symbol: phrase, Dim: per.Dim, Factor: f}.finish()
	if !ok {
		return Unit{}, levelFault(phrase)
	}
	return u, nil
}

// shifted moves a fault of an inner phrase that began delta bytes earlier.
func shifted(e *PhraseError, delta int, phrase string) *PhraseError {
	e.Start = min(e.Start+delta, len(phrase))
	e.End = min(e.End+delta, len(phrase))
	e.Suggest = ""
	return e
}

// rootPowerDims and powerDims tell how a level over a reference is taken.
var (
	rootPowerDims = [...]Dim{dimVoltage, dimCurrent, dimVoltage.Div(dimLength), dimOersted, dimTesla, dimPressure}
	powerDims     = [...]Dim{dimPower, dimPower.Div(dimArea), dimEnergy, of(0, 1, -2, 0)}
)

// reference reads dB(uV/m): a level over one of the unit in parentheses.
func reference(phrase string) (Unit, *PhraseError) {
	inner := phrase[len("dB(") : len(phrase)-1]
	ref, err := Parse(inner)
	if err != nil {
		return Unit{}, shifted(err, len("dB("), phrase)
	}
	if ref.Level != nil || ref.Affine() {
		return Unit{}, levelFault(phrase)
	}
	l := &Level{Ref: ref.Scale()}
	for _, d := range rootPowerDims {
		if ref.Dim.Base() == d {
			l.Field = RootPower
		}
	}
	for _, d := range powerDims {
		if ref.Dim.Base() == d {
			l.Field = Power
		}
	}
	u, _ := Unit{Symbol: phrase, Dim: ref.Dim, Level: l}.finish()
	return u, nil
}

// levelInside reports a level unit at [start, end) among other units.
func levelInside(start, end int) *PhraseError {
	e := levelFault("dB/")
	e.Start, e.End = start, end
	return e
}

// levelFault reports a phrase that begins like a level unit and is none.
func levelFault(phrase string) *PhraseError {
	if n := symbolLen(phrase); n == len(phrase) {
		a := advise(phrase)
		return &PhraseError{End: n, Rule: "unknown-unit", Symbol: phrase, Message: "`" + printable(phrase) + "` is not a unit",
			Detail: a.detail, Suggest: a.write}
	}
	return &PhraseError{End: len(phrase), Rule: "syntax", Message: "a level unit stands alone, over a reference or per length",
		Detail: "write `dB`, `dBm`, `dB(uV/m)` or `dB/m`"}
}
