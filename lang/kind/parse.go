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
// "energy density". The case of letters does not matter. Where the qualifier is
// readable and the kind is not, it is returned with the fault.
func Parse(words string) (Qualifier, ID, *Fault) {
	if strings.TrimSpace(words) == "" {
		return Unqualified, 0, &Fault{End: len(words), Message: "no kind follows the comma",
			Detail: "write a kind, `energy density`, or drop the comma"}
	}
	if k, ok := named(words); ok {
		return Unqualified, k, nil
	}
	q, rest := cutQualifier(words)
	if q == Unqualified {
		return Unqualified, 0, unknown(words, 0)
	}
	if strings.TrimSpace(rest) == "" {
		return q, 0, nil
	}
	if k, ok := named(rest); ok {
		return q, k, nil
	}
	return q, 0, unknown(words, len(words)-len(rest))
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

// twins are words that people use for a qualifier.
var twins = map[string]string{
	"dc": "static", "direct": "static", "steady": "static", "mean": "average", "time-average": "average", "avg": "average",
	"amplitude": "peak", "maximum": "peak", "max": "peak", "crest": "peak", "effective": "rms", "r.m.s.": "rms", "momentary": "instantaneous",
	"pk-pk": "peak-to-peak", "p-p": "peak-to-peak", "peak-peak": "peak-to-peak",
}

// unknown makes the fault for words whose kind begins at from.
func unknown(words string, from int) *Fault {
	text := strings.TrimSpace(words[from:])
	f := &Fault{Start: from, End: len(words), Message: "`" + short(text) + "` is not a kind of quantity"}
	if kind, medium, ok := cutMedium(text); ok {
		f.Detail = "the medium goes before the comma: `NAME in " + medium + ", " + kind + " = …`"
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

// accepted returns words where they begin with a qualifier and parse whole.
func accepted(words string) string {
	words = strings.TrimSpace(words)
	q, rest := cutQualifier(words)
	if q == Unqualified {
		return ""
	}
	if _, ok := named(rest); !ok && rest != "" {
		return ""
	}
	return words
}
