package kind

import "strings"

// Fault is what is wrong with the words after a name's comma, at bytes
// [Start, End) of them. Its rule is "unknown-kind".
type Fault struct {
	Start, End int
	Message    string   // what was found
	Detail     string   // what to write instead
	Suggest    string   // the whole words corrected, "" where there is no one form
	Nearest    []string // names of the nearest kinds, best first
}

// Error returns the message.
func (f *Fault) Error() string { return f.Message }

// Parse reads `[QUALIFIER] [KIND]`: "peak electric field strength", "rms",
// "energy density"; see ParseWords.
func Parse(words string) (Qualifier, ID, *Fault) {
	w, fault := ParseWords(words)
	return w.Qualifier, w.Kind, fault
}

// ParseWords reads `[ADJECTIVE …] [QUALIFIER] [KIND]`: "triangular peak-to-peak
// current". The case of letters does not matter, nor whether an adjective
// stands before or after the qualifier. Where words are readable and the kind
// is not, they are returned with the fault.
func ParseWords(words string) (w Words, fault *Fault) {
	if strings.TrimSpace(words) == "" {
		return w, &Fault{End: len(words), Message: "no kind follows the comma",
			Detail: "write a kind, `energy density`, or drop the comma"}
	}
	rest, ok := w.read(words)
	if !ok {
		return w, unknown(words, len(words)-len(rest))
	}
	return w, nil
}

// read takes words apart up to the end, or up to what is not known.
func (w *Words) read(words string) (rest string, ok bool) {
	for rest = words; ; {
		if k, ok := named(rest); ok {
			w.Kind = k
			return "", true
		}
		if strings.TrimSpace(rest) == "" {
			return "", true
		}
		left, ok := w.cut(rest)
		if !ok {
			return rest, false
		}
		rest = left
	}
}

// cut takes an adjective or the qualifier off the front of words.
func (w *Words) cut(words string) (rest string, ok bool) {
	if rest, ok = w.cutAdjective(words); ok || w.Qualifier != Unqualified {
		return rest, ok
	}
	w.Qualifier, rest = cutQualifier(words)
	return rest, w.Qualifier != Unqualified
}

// Cut takes an adjective or the qualifier that a blank follows off the front of
// words; ok is false where there is none, or w has one of its sort already.
func (w *Words) Cut(words string) (rest string, ok bool) {
	before := *w
	if rest, ok = w.cut(words); ok && (rest != "" || strings.HasSuffix(words, " ")) {
		return rest, true
	}
	*w = before
	return words, false
}

// cutQualifier splits a qualifier off the front of words; `peak to peak` counts
// as peak-to-peak.
func cutQualifier(words string) (Qualifier, string) {
	trimmed := strings.TrimLeft(words, " \t")
	for q := PeakToPeak; q > Unqualified; q-- {
		for _, name := range [...]string{q.String(), strings.ReplaceAll(q.String(), "-", " ")} {
			if len(trimmed) < len(name) || !strings.EqualFold(trimmed[:len(name)], name) {
				continue
			}
			rest := trimmed[len(name):]
			if left := strings.TrimLeft(rest, " \t"); rest == "" || left != rest {
				return q, left
			}
		}
	}
	return Unqualified, words
}

// twins are words that people use for a qualifier or an adjective.
var twins = map[string]string{
	"dc": "static", "direct": "static", "steady": "static", "mean": "average", "time-average": "average", "avg": "average",
	"amplitude": "peak", "maximum": "peak", "max": "peak", "crest": "peak", "effective": "rms", "r.m.s.": "rms", "momentary": "instantaneous",
	"pk-pk": "peak-to-peak", "p-p": "peak-to-peak", "peak-peak": "peak-to-peak",
	"sine": "sinusoidal", "sinewave": "sinusoidal", "rectangular": "square", "squarewave": "square", "triangle": "triangular", "sawtooth": "triangular",
	"pulse": "pulsed", "am": "modulated", "noisy": "random", "circular": "elliptical", "surge": "impulse", "uncorrelated": "incoherent", "correlated": "coherent",
}

// unknown makes the fault for words whose kind begins at from.
func unknown(words string, from int) *Fault {
	text := strings.TrimSpace(words[from:])
	f := &Fault{Start: from, End: len(words), Message: "`" + short(text) + "` is not a kind of quantity"}
	if kind, medium, ok := cutMedium(text); ok {
		f.Detail = "the medium goes before the comma: `NAME in " + medium + ", " + kind + " = …`"
		return f
	}
	if first, second := rivals(words[:from], text); second != "" {
		f.Message, f.Detail = first+" and "+second+" exclude each other", "keep the one that holds"
		return f
	}
	if s := reordered(words); s != "" {
		f.Suggest, f.Detail = s, "write `"+s+"`"
		return f
	}
	hits := nearest(text)
	for _, h := range hits[:min(3, len(hits))] {
		f.Nearest = append(f.Nearest, h.name)
	}
	if len(hits) == 0 {
		f.Detail = "write a kind of ISO 80000, such as `energy density`, or leave the kind out"
		return f
	}
	f.Detail = "did you mean `" + strings.Join(f.Nearest, "`, `") + "`?"
	// One is offered as a correction: the only one, or a slip nearer than others.
	if len(hits) == 1 || hits[0].rank == 0 && hits[0].nearer(hits[1]) {
		f.Suggest = words[:from] + f.Nearest[0]
	}
	return f
}

// short cuts text to what fits a message.
func short(text string) string {
	const longest = 80
	if len(text) > longest {
		text = text[:longest] + "…"
	}
	return strings.ToValidUTF8(text, "\uFFFD")
}

// cutMedium splits `energy density in mica`.
func cutMedium(text string) (kind, medium string, ok bool) {
	kind, medium, ok = strings.Cut(text, " in ")
	if !ok || len(medium) > 40 {
		return "", "", false
	}
	_, ok = named(kind)
	return kind, medium, ok
}

// reordered finds `voltage rms` and `mean power`: a qualifier at the end, or
// another word for one in front. It returns the words in the right form or "".
func reordered(words string) string {
	parts := strings.Fields(words)
	if len(parts) == 0 {
		return ""
	}
	first, last := parts[0], parts[len(parts)-1]
	if q := twins[strings.ToLower(first)]; q != "" {
		return accepted(q + " " + strings.Join(parts[1:], " "))
	}
	if q := twins[strings.ToLower(last)]; q != "" {
		last = q
	}
	return accepted(last + " " + strings.Join(parts[:len(parts)-1], " "))
}

// accepted returns words where they begin with a qualifier or an adjective and
// parse whole.
func accepted(words string) string {
	words = strings.TrimSpace(words)
	var w Words
	if _, ok := w.read(words); !ok || w == (Words{Kind: w.Kind}) {
		return ""
	}
	return words
}
