package lang

import (
	"strings"
	"unicode/utf8"
)

// isStatementWord reports whether the word opens a statement other than a definition.
func isStatementWord(word string) bool {
	switch word {
	case "medium", "region", "table", "uses", "regime", "plot",
		"assume", "criterion", "check", "safety", "waive":
		return true
	}
	return false
}

// isReserved reports whether the word cannot be a name.
func isReserved(word string) bool {
	switch word {
	case "for", "from", "to", "in", "over", "at", "per", "as", "j", "pi", "π":
		return true
	}
	return isStatementWord(word)
}

// ReservedWords are the words that cannot be names, statement words first.
func ReservedWords() []string {
	return []string{"medium", "region", "table", "uses", "regime", "plot",
		"assume", "criterion", "check", "safety", "waive",
		"for", "from", "to", "in", "over", "at", "per", "as", "j", "pi"}
}

// statementWords is the number of statement words among the reserved ones.
const statementWords = 11

// IsReserved reports whether the word is reserved, in any spelling.
func IsReserved(word string) bool { return isReserved(word) }

// greek gives the one name of each Greek letter. Letter variants count as the
// letter; `eps` stands for epsilon, as in the constants.
var greek = map[string]string{
	"α": "alpha", "β": "beta", "γ": "gamma", "δ": "delta", "ε": "eps", "ϵ": "eps", "ζ": "zeta", "η": "eta",
	"θ": "theta", "ϑ": "theta", "ι": "iota", "κ": "kappa", "ϰ": "kappa", "λ": "lambda", "μ": "mu", "µ": "mu",
	"ν": "nu", "ξ": "xi", "ο": "omicron", "π": "pi", "ϖ": "pi", "ρ": "rho", "ϱ": "rho", "σ": "sigma", "ς": "sigma",
	"τ": "tau", "υ": "upsilon", "φ": "phi", "ϕ": "phi", "χ": "chi", "ψ": "psi", "ω": "omega",
	"Α": "Alpha", "Β": "Beta", "Γ": "Gamma", "Δ": "Delta", "Ε": "Epsilon", "Ζ": "Zeta", "Η": "Eta", "Θ": "Theta",
	"Ι": "Iota", "Κ": "Kappa", "Λ": "Lambda", "Μ": "Mu", "Ν": "Nu", "Ξ": "Xi", "Ο": "Omicron", "Π": "Pi", "Ρ": "Rho",
	"Σ": "Sigma", "Τ": "Tau", "Υ": "Upsilon", "Φ": "Phi", "Χ": "Chi", "Ψ": "Psi", "Ω": "Omega", "\u2126": "Omega",
	"epsilon": "eps", "Å": "Å", "\u212b": "Å",
}

// CanonicalName is the spelling by which names are compared: Greek letters and
// their English names are one, by whole segments between `_` (and `.`, for a
// dotted name), and a subscript digit is the digit after `_`: `ε_r`, `eps_r` and
// `epsilon_r` are one name, `ε₀` is `eps_0`; `steps` stays as it is.
func CanonicalName(text string) string {
	if isPlain(text) {
		return text
	}
	text = spellSubscripts(text)
	var b strings.Builder
	b.Grow(len(text) + 8)
	for start := 0; ; {
		n := strings.IndexAny(text[start:], "_.")
		segment := text[start:]
		if n >= 0 {
			segment = text[start : start+n]
		}
		if name, ok := greek[segment]; ok {
			segment = name
		}
		b.WriteString(segment)
		if n < 0 {
			return b.String()
		}
		b.WriteByte(text[start+n])
		start += n + 1
	}
}

// isPlain reports that a name is its own canonical spelling.
func isPlain(text string) bool {
	for i := 0; i < len(text); i++ {
		if text[i] >= utf8.RuneSelf {
			return false
		}
	}
	return !strings.Contains(text, "epsilon")
}

// spellSubscripts writes a run of subscript digits as `_` and the digits.
func spellSubscripts(text string) string {
	if !strings.ContainsFunc(text, isSubscript) {
		return text
	}
	var b strings.Builder
	var before rune
	for _, r := range text {
		if isSubscript(r) {
			if !isSubscript(before) && before != '_' {
				b.WriteByte('_')
			}
			b.WriteRune('0' + r - '₀')
		} else {
			b.WriteRune(r)
		}
		before = r
	}
	return b.String()
}

// GreekLetter is the Greek letter that a segment of a name stands for, as `ε` for
// `eps`, `epsilon` or `ε` itself; "" for any other.
func GreekLetter(segment string) string {
	name, ok := greek[segment]
	if !ok {
		name = segment
	}
	best := ""
	for letter, n := range greek {
		if n == name && letter >= "Α" && letter <= "ώ" && (best == "" || letter < best) {
			best = letter
		}
	}
	return best
}
