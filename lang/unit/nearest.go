package unit

import (
	"strings"
	"sync"
)

// advice is what to write instead of an unknown symbol.
type advice struct{ write, detail string }

// notes are spellings whose meaning is known, with what to write for them.
var notes = map[string]advice{
	"sec": meant("s"), "secs": meant("s"), "hr": meant("h"), "hrs": meant("h"), "mins": meant("min"),
	"amp": meant("A"), "amps": meant("A"), "Amp": meant("A"), "Amps": meant("A"), "cps": meant("Hz"),
	"mho": meant("S"), "mhos": meant("S"), "℧": meant("S"), "micron": meant("µm"), "microns": meant("µm"), "cc": meant("cm^3"), "ccm": meant("cm^3"),
	"lbs": meant("lb"), "inches": meant("in"), "feet": meant("ft"), "mhz": meant("MHz"), "Kg": meant("kg"), "KG": meant("kg"),
	"AWG":  {"", "a wire gauge is no unit: `awg(18)` gives the diameter"},
	"°F":   {"", "write the temperature in °C: (x − 32)/1.8"},
	"℉":    {"", "write the temperature in °C: (x − 32)/1.8"},
	"degF": {"", "write the temperature in °C: (x − 32)/1.8"},
	"At":   {"A", "ampere turns are amperes; the number of turns is a factor of its own: write `A`"},
	"AT":   {"A", "ampere turns are amperes; the number of turns is a factor of its own: write `A`"},
	"rev":  {"", "a revolution is no unit: write `rpm`, `Hz` or `rad/s`"},
	"yr":   {"", "years differ in length: write the days, `365.25 d`"}, "y": {"", "years differ in length: write the days, `365.25 d`"},
	"Nm": meant("N·m"), "kNm": meant("kN·m"), "mNm": meant("mN·m"), "As": meant("A·s"), "mAs": meant("mA·s"), "Ws": meant("W·s"), "Vs": meant("V·s"),
	"mVs": meant("mV·s"), "Wm": meant("W·m"), "Js": meant("J·s"), "Cm": meant("C·m"),
}

func meant(s string) advice { return advice{s, "did you mean `" + s + "`?"} }

// statistics are endings by which people mark a unit, with the qualifier.
var statistics = [...][2]string{{"rms", "rms"}, {"RMS", "rms"}, {"eff", "rms"}, {"pp", "peak-to-peak"}, {"pk", "peak"}, {"peak", "peak"},
	{"dc", "static"}, {"DC", "static"}, {"ac", "rms"}, {"AC", "rms"}}

// advise finds what was probably meant by an unknown symbol.
func advise(symbol string) advice {
	if len(symbol) > 32 {
		return advice{detail: "no unit has such a long symbol; the unit follows the number, and a name needs an operator before it"}
	}
	if a, ok := notes[symbol]; ok {
		return a
	}
	for _, s := range statistics {
		if rest, ok := strings.CutSuffix(symbol, s[0]); ok && known(rest) {
			return advice{rest, "the unit is `" + rest + "`; `" + s[1] + "` goes before the kind: `NAME, " + s[1] + " KIND = …`"}
		}
	}
	for _, try := range [...]func(string) string{byName, byCase, byProduct, bySlip} {
		if s := try(symbol); s != "" {
			return meant(s)
		}
	}
	return advice{detail: "no unit has this symbol or one near it"}
}

// Nearest returns the unit that was probably meant by an unknown symbol, such
// as `kV` for `KV`, `N·m` for `Nm`, `A` for `amps`; "" if none is near.
func Nearest(symbol string) string { return advise(symbol).write }

// known reports whether the symbol is a unit, with or without prefix.
func known(symbol string) bool {
	_, _, ok := lookup(symbol)
	return ok
}

// folded is the table in lower case, built when a fault needs it.
var folded = sync.OnceValue(func() (f struct{ symbols, names map[string]*row }) {
	f.symbols, f.names = make(map[string]*row), make(map[string]*row)
	for i := len(rows) - 1; i >= 0; i-- {
		r := &rows[i]
		for _, s := range append(strings.Fields(r.also), r.symbol) {
			f.symbols[strings.ToLower(s)] = r
		}
		f.names[r.name] = r
	}
	return f
})

// byName finds `volts`, `kilometer`, `Tesla`.
func byName(symbol string) string {
	word := strings.ToLower(symbol)
	names := folded().names
	for _, w := range [...]string{word, strings.TrimSuffix(word, "s"), strings.TrimSuffix(word, "es")} {
		for _, v := range [...]string{w, strings.Replace(w, "meter", "metre", 1), strings.Replace(w, "liter", "litre", 1)} {
			if r := names[v]; r != nil {
				return r.symbol
			}
			for _, p := range prefixes {
				if rest, ok := strings.CutPrefix(v, p.name); ok && names[rest] != nil && known(p.symbol+names[rest].symbol) {
					return p.symbol + names[rest].symbol
				}
			}
		}
	}
	return ""
}

// byCase finds `KV`, `hz`, `dbm`: right letters in wrong case. Of several the
// one with the fewest changes is taken.
func byCase(symbol string) string {
	word, best, changes := strings.ToLower(symbol), "", len(symbol)+1
	consider := func(s string) {
		if n := caseChanges(symbol, s); n < changes {
			best, changes = s, n
		}
	}
	for _, r := range levelRows {
		if strings.ToLower(r.symbol) == word {
			consider(r.symbol)
		}
	}
	symbols := folded().symbols
	if r := symbols[word]; r != nil {
		consider(r.symbol)
	}
	for i, p := range prefixes {
		rest, ok := strings.CutPrefix(word, strings.ToLower(p.symbol))
		if r := symbols[rest]; ok && r != nil && r.prefix&(1<<i) != 0 {
			consider(p.symbol + r.symbol)
		}
	}
	return best
}

// caseChanges counts the bytes that differ; strings of unlike length differ in
// more than any of like length.
func caseChanges(a, b string) int {
	if len(a) != len(b) {
		return len(a)
	}
	n := 0
	for i := range len(a) {
		if a[i] != b[i] {
			n++
		}
	}
	return n
}

// byProduct finds two units written together: `kVm` is kV·m.
func byProduct(symbol string) string {
	for i := len(symbol) - 1; i > 0; i-- {
		if known(symbol[:i]) && known(symbol[i:]) {
			return symbol[:i] + "·" + symbol[i:]
		}
	}
	return ""
}

// bySlip finds a symbol of three letters or more, or a name of five, that
// differs in one letter, or whose letters were exchanged.
func bySlip(symbol string) string {
	if len(symbol) < 3 {
		return ""
	}
	word := strings.ToLower(symbol)
	for i := range rows {
		r := &rows[i]
		for _, s := range append(strings.Fields(r.also), r.symbol) {
			if len(s) >= 3 && oneSlip(symbol, s) {
				return s
			}
		}
		if len(r.name) >= 5 && oneSlip(word, r.name) {
			return r.symbol
		}
	}
	return ""
}

// oneSlip reports that a becomes b by one letter changed, inserted, dropped or
// exchanged with its neighbour.
func oneSlip(a, b string) bool {
	i := 0
	for i < len(a) && i < len(b) && a[i] == b[i] {
		i++
	}
	a, b = a[i:], b[i:]
	switch len(a) - len(b) {
	case 0:
		return len(a) > 0 && a[1:] == b[1:] || len(a) > 1 && a[0] == b[1] && a[1] == b[0] && a[2:] == b[2:]
	case 1:
		return a[1:] == b
	case -1:
		return b[1:] == a
	}
	return false
}
