package unit

import "strings"

// index finds rows by symbol and further spellings. It is built once at start
// from constant data and never changed.
var index = func() map[string]*row {
	m := make(map[string]*row, 2*len(rows))
	for i := range rows {
		r := &rows[i]
		m[r.symbol] = r
		for _, s := range strings.Fields(r.also) {
			m[s] = r
		}
	}
	return m
}()

// lookup finds a symbol: the whole symbol first (`cd`, `min`, `ft`, `yd` are
// themselves), then prefix and symbol. at is the prefix, −1 for none.
func lookup(symbol string) (r *row, at int, ok bool) {
	if r, ok = index[symbol]; ok {
		return r, -1, true
	}
	at, rest, ok := cutPrefix(symbol)
	if ok {
		if r, ok = index[rest]; ok && r.prefix&(1<<at) != 0 {
			return r, at, true
		}
	}
	if rest, ok = strings.CutPrefix(symbol, "da"); ok {
		if r, ok = index[rest]; ok && r.prefix&(1<<decaAt) != 0 {
			return r, decaAt, true
		}
	}
	return nil, -1, false
}

// factor returns the factor of a row with its prefix.
func (r *row) factor(at int) Factor {
	f := Factor{num: r.num, den: r.den, exp: r.exp, pi: r.pi, Measured: r.measured}
	if r.num == 0 {
		f = supplied()[r.symbol]
	}
	if at >= 0 {
		f.exp += prefixes[at].exp
	}
	return f
}
