package unit

// prefix is an SI prefix.
type prefix struct {
	symbol, name string
	exp          int // power of ten
}

// prefixes are the 24 SI prefixes (BIPM, SI Brochure, 9th edition with the
// 2022 additions of CGPM resolution 3, table 7), largest first.
var prefixes = [...]prefix{
	{"Q", "quetta", 30}, {"R", "ronna", 27}, {"Y", "yotta", 24}, {"Z", "zetta", 21},
	{"E", "exa", 18}, {"P", "peta", 15}, {"T", "tera", 12}, {"G", "giga", 9},
	{"M", "mega", 6}, {"k", "kilo", 3}, {"h", "hecto", 2}, {"da", "deca", 1},
	{"d", "deci", -1}, {"c", "centi", -2}, {"m", "milli", -3}, {"u", "micro", -6},
	{"n", "nano", -9}, {"p", "pico", -12}, {"f", "femto", -15}, {"a", "atto", -18},
	{"z", "zepto", -21}, {"y", "yocto", -24}, {"r", "ronto", -27}, {"q", "quecto", -30},
}

// prefixSet is the set of prefixes that a unit takes, a bit for each of prefixes.
type prefixSet uint32

// The sets. Most units outside the SI take none, or the few that are in use,
// so that `ft`, `Pt` or `dG` never turn up by accident.
const (
	noPrefix  prefixSet = 0
	anyPrefix prefixSet = 1<<len(prefixes) - 1
	upKMG     prefixSet = 1<<6 | 1<<7 | 1<<8 | 1<<9 // T G M k
	downMUN   prefixSet = 1<<14 | 1<<15 | 1<<16     // m u n
	kiloMega  prefixSet = 1<<8 | 1<<9
)

// cutPrefix splits symbol into a prefix (an index of prefixes) and the rest;
// ok is false where it does not begin with one or nothing would be left. Both
// micro signs and `u` are micro. `da` is tried by cutDeca.
func cutPrefix(symbol string) (at int, rest string, ok bool) {
	if len(symbol) < 2 {
		return 0, "", false
	}
	if symbol[0] == 0xC2 && symbol[1] == 0xB5 || symbol[0] == 0xCE && symbol[1] == 0xBC {
		return 15, symbol[2:], len(symbol) > 2 // µ U+00B5, μ U+03BC
	}
	at = int(prefixAt[symbol[0]]) - 1
	return at, symbol[1:], at >= 0
}

// decaAt is the index of the one prefix of two letters.
const decaAt = 11

// prefixAt gives the index + 1 of each one-letter prefix.
var prefixAt = func() (t [256]uint8) {
	for i, p := range prefixes {
		if len(p.symbol) == 1 {
			t[p.symbol[0]] = uint8(i + 1)
		}
	}
	return t
}()
