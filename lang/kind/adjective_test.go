package kind

import "testing"

func TestParseWords(t *testing.T) {
	for _, c := range []struct {
		words string
		want  Words
	}{
		{"triangular peak-to-peak current", Words{Waveform: Triangular, Qualifier: PeakToPeak, Kind: ElectricCurrent}},
		{"peak to peak Triangular current", Words{Waveform: Triangular, Qualifier: PeakToPeak, Kind: ElectricCurrent}},
		{"coherent modulated rms electric field", Words{Modulated, Coherent, RMS, ElectricFieldStrength}},
		{"impulse withstand voltage", Words{Waveform: Impulse, Kind: WithstandVoltage}},
		{"pulsed peak envelope power", Words{Waveform: Pulsed, Kind: PeakEnvelopePower}},
		{"square", Words{Waveform: Square}},
		{"incoherent rms", Words{Coherence: Incoherent, Qualifier: RMS}},
		{"sinusoidal  voltage", Words{Waveform: Sinusoidal, Kind: Voltage}},
	} {
		if got, fault := ParseWords(c.words); fault != nil || got != c.want {
			t.Errorf("%q reads as %+v (%v), want %+v", c.words, got, fault, c.want)
		}
	}
}

func TestParseWordsFaults(t *testing.T) {
	for _, c := range []struct{ words, message, suggest string }{
		{"square sinusoidal voltage", "square and sinusoidal exclude each other", ""},
		{"coherent rms incoherent voltage", "coherent and incoherent exclude each other", ""},
		{"rms peak voltage", "rms and peak exclude each other", ""},
		{"sine voltage", "`sine voltage` is not a kind of quantity", "sinusoidal voltage"},
		{"voltage triangle", "`voltage triangle` is not a kind of quantity", "triangular voltage"},
		{"squared voltage", "`squared voltage` is not a kind of quantity", ""},
	} {
		_, fault := ParseWords(c.words)
		if fault == nil || fault.Message != c.message || c.suggest != "" && fault.Suggest != c.suggest {
			t.Errorf("%q gives %+v, want %q and the correction %q", c.words, fault, c.message, c.suggest)
		}
	}
}

// TestAdjectives holds that each word says one thing and is no part of a kind's
// name, which would hide it.
func TestAdjectives(t *testing.T) {
	for _, word := range Adjectives() {
		w, fault := ParseWords(word + " voltage")
		if fault != nil || w.Waveform.String()+w.Coherence.String() != word || w.Takes(word) {
			t.Errorf("%s reads as %+v (%v)", word, w, fault)
		}
	}
	// Crest factors of elementary waveforms: mean squares 1/2, 1 and 1/3 of the
	// square of the crest, by integration of sin², 1 and x² over [0, 1].
	for _, c := range []struct {
		wave   Waveform
		square int
	}{{Sinusoidal, 2}, {Square, 1}, {Triangular, 3}} {
		if got, ok := c.wave.Crest(); !ok || got != c.square {
			t.Errorf("crest factor of a %s quantity: √%d, want √%d", c.wave, got, c.square)
		}
	}
	for _, w := range []Waveform{AnyWave, Pulsed, Modulated, Distorted, Random, Impulse, Elliptical} {
		if _, ok := w.Crest(); ok {
			t.Errorf("the word %q tells a crest factor", w)
		}
	}
}

func TestCut(t *testing.T) {
	for _, c := range []struct {
		words, rest string
		ok          bool
	}{
		{"peak volt", "volt", true}, {"triangular ", "", true}, {"peak", "peak", false}, {"volt", "volt", false},
	} {
		var w Words
		if rest, ok := w.Cut(c.words); rest != c.rest || ok != c.ok {
			t.Errorf("%q: %q is left (%t), want %q (%t)", c.words, rest, ok, c.rest, c.ok)
		}
	}
}
