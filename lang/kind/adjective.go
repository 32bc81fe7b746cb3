package kind

import "strings"

// Waveform is the course of a quantity in time, or of a field vector in space
// and time, as far as its statistics hang on it.
type Waveform uint8

// The waveforms (IEC 60050-103 and, for impulses, IEC 60060-1). AnyWave is
// unknown, not sinusoidal.
const (
	AnyWave    Waveform = iota
	Sinusoidal          // one frequency, one linear component
	Square              // two levels, half of the time each
	Triangular          // straight from crest to crest; a sawtooth too
	Pulsed              // on for a part of the time
	Modulated           // a carrier whose amplitude varies
	Distorted           // a fundamental with harmonics, several tones
	Random              // noise
	Impulse             // one unidirectional surge: lightning, switching
	Elliptical          // a field vector whose tip turns; circular polarization too
)

// Coherence tells whether the phases of several sources are tied together.
type Coherence uint8

// The coherences. AnyPhase is unknown.
const (
	AnyPhase   Coherence = iota
	Coherent             // one frequency and fixed phases: fields add as phasors
	Incoherent           // other frequencies or drifting phases: mean squares add
	WorstCase            // of a result: magnitudes were added, whatever the phases
)

// adjective is a word that may stand before the kind.
type adjective struct {
	word string
	wave Waveform
	tied Coherence
}

var adjectives = [...]adjective{
	{"sinusoidal", Sinusoidal, 0}, {"square", Square, 0}, {"triangular", Triangular, 0}, {"pulsed", Pulsed, 0},
	{"modulated", Modulated, 0}, {"distorted", Distorted, 0}, {"random", Random, 0}, {"impulse", Impulse, 0}, {"elliptical", Elliptical, 0},
	{"coherent", 0, Coherent}, {"incoherent", 0, Incoherent}, {"worst-case", 0, WorstCase},
}

// Adjectives lists the words for waveform and coherence, for completion.
func Adjectives() []string {
	out := make([]string, len(adjectives))
	for i, a := range adjectives {
		out[i] = a.word
	}
	return out
}

// String returns the word of the note language, "" for AnyWave.
func (w Waveform) String() string {
	for _, a := range adjectives {
		if a.wave == w && w != AnyWave {
			return a.word
		}
	}
	return ""
}

// String returns the word of the note language, "" for AnyPhase.
func (c Coherence) String() string {
	for _, a := range adjectives {
		if a.tied == c && c != AnyPhase {
			return a.word
		}
	}
	return ""
}

// Crest returns the square of the crest factor, peak over rms: 2 for a
// sinusoid, 1 for a square wave, 3 for a triangle; ok is false where the word
// alone does not tell it.
func (w Waveform) Crest() (square int, ok bool) {
	switch w {
	case Sinusoidal:
		return 2, true
	case Square:
		return 1, true
	case Triangular:
		return 3, true
	}
	return 0, false
}

// Words is what the words after a name's comma say.
type Words struct {
	Waveform  Waveform
	Coherence Coherence
	Qualifier Qualifier
	Kind      ID
}

// cutAdjective takes an adjective off the front of words; ok is false where
// there is none, or where the quantity already has one of its group.
func (w *Words) cutAdjective(words string) (rest string, ok bool) {
	trimmed := strings.TrimLeft(words, " \t")
	for _, a := range adjectives {
		if len(trimmed) < len(a.word) || !strings.EqualFold(trimmed[:len(a.word)], a.word) {
			continue
		}
		rest = trimmed[len(a.word):]
		left := strings.TrimLeft(rest, " \t")
		if rest != "" && left == rest || a.wave != 0 && w.Waveform != 0 || a.tied != 0 && w.Coherence != 0 {
			return words, false
		}
		w.Waveform, w.Coherence = max(w.Waveform, a.wave), max(w.Coherence, a.tied)
		return left, true
	}
	return words, false
}

// Takes reports whether the words may have the adjective besides what they have.
func (w Words) Takes(adjective string) bool {
	_, ok := w.cutAdjective(adjective)
	return ok
}

// rivals finds an adjective or qualifier at the front of rest that excludes one
// of those before it; both are empty where there is none.
func rivals(before, rest string) (first, second string) {
	var had Words
	if left, ok := had.read(before); !ok || left != "" {
		return "", ""
	}
	var next Words
	if _, ok := next.cut(rest); !ok {
		return "", ""
	}
	switch {
	case next.Waveform != 0 && had.Waveform != 0:
		return had.Waveform.String(), next.Waveform.String()
	case next.Coherence != 0 && had.Coherence != 0:
		return had.Coherence.String(), next.Coherence.String()
	case next.Qualifier != 0 && had.Qualifier != 0:
		return had.Qualifier.String(), next.Qualifier.String()
	}
	return "", ""
}
