package kind

import (
	"sort"
	"strings"
)

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
	if fold(words) == "" {
		return Unqualified, 0, &Fault{End: len(words), Message: "no kind follows the comma",
			Detail: "write a kind, `energy density`, or drop the comma"}
	}
	if k, ok := derived().byName[fold(words)]; ok {
		return Unqualified, k, nil
	}
	q, rest := cutQualifier(words)
	if q == Unqualified {
		return Unqualified, 0, unknown(words, 0)
	}
	if fold(rest) == "" {
		return q, 0, nil
	}
	if k, ok := derived().byName[fold(rest)]; ok {
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
	f := &Fault{Start: from, End: len(words), Message: "`" + text + "` is not a kind of quantity"}
	if s := reordered(words); s != "" {
		f.Suggest, f.Detail = s, "write `"+s+"`"
		return f
	}
	f.Nearest = Nearest(text, 3)
	if len(f.Nearest) == 0 {
		f.Detail = "write a kind of ISO 80000, such as `energy density`, or leave the kind out"
		return f
	}
	f.Detail = "did you mean `" + strings.Join(f.Nearest, "`, `") + "`?"
	f.Suggest = words[:from] + f.Nearest[0]
	return f
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
	if _, ok := derived().byName[fold(rest)]; !ok && rest != "" {
		return ""
	}
	return words
}

// Nearest returns up to n names of kinds nearest to the words, best first.
func Nearest(words string, n int) []string {
	want := fold(words)
	if len(want) > 80 {
		return nil // no kind is nearly as long
	}
	type hit struct {
		name string
		far  int
	}
	var hits []hit
	for _, k := range All() {
		for _, name := range table[k].Names() {
			if d := distance(want, fold(name)); d*3 <= len(want) || shares(want, fold(name)) {
				hits = append(hits, hit{name, d})
			}
		}
	}
	sort.SliceStable(hits, func(i, j int) bool { return hits[i].far < hits[j].far })
	var names []string
	for _, h := range hits {
		if len(names) < n {
			names = append(names, h.name)
		}
	}
	return names
}

// shares reports that every word of one is a word of the other: `field
// strength` is near `electric field strength`.
func shares(a, b string) bool {
	wa, wb := strings.Fields(a), strings.Fields(b)
	if len(wa) > len(wb) {
		wa, wb = wb, wa
	}
	for _, w := range wa {
		found := false
		for _, v := range wb {
			found = found || v == w
		}
		if !found {
			return false
		}
	}
	return len(wa) > 0
}

// distance is the number of characters to change, insert or drop to turn a
// into b.
func distance(a, b string) int {
	x, y := []rune(a), []rune(b)
	row := make([]int, len(y)+1)
	for j := range row {
		row[j] = j
	}
	for i, c := range x {
		left, diagonal := i+1, i
		for j, d := range y {
			cost := diagonal
			if c != d {
				cost = 1 + min(diagonal, left, row[j+1])
			}
			diagonal, left, row[j] = row[j+1], cost, left
		}
		row[len(y)] = left
	}
	return row[len(y)]
}
