package unit

import "strings"

// Entry describes a unit symbol for hover and completion.
type Entry struct {
	Symbol string   // as looked up, prefix included
	Name   string   // `kilovolt`
	Also   []string // further spellings, ASCII twins among them
	Unit   string   // the coherent SI unit of its dimension
	Factor string   // exact factor to Unit as text, "" for level units
	Source string   // where the factor comes from
	Exact  bool     // false: measured, or conventional since 2019
	Prefix bool     // it takes prefixes
}

// Info describes a symbol, prefix included; ok is false for an unknown one.
func Info(symbol string) (Entry, bool) {
	if isLevel(symbol) {
		return levelInfo(symbol)
	}
	r, at, ok := lookup(symbol)
	if !ok {
		return Entry{}, false
	}
	return r.entry(symbol, at), true
}

// entry describes a row with its prefix.
func (r *row) entry(symbol string, at int) Entry {
	f := r.factor(at)
	e := Entry{
		Symbol: symbol, Name: r.name, Also: strings.Fields(r.also), Unit: Coherent(r.dim).Symbol,
		Factor: f.String(), Source: r.source, Exact: !f.Measured, Prefix: at < 0 && r.prefix != 0,
	}
	if at >= 0 {
		e.Name = prefixes[at].name + r.name
		e.Also = nil
	}
	return e
}

func levelInfo(symbol string) (Entry, bool) {
	plain := microAsU.Replace(symbol)
	for i := range levelRows {
		if r := &levelRows[i]; r.symbol == plain {
			return Entry{Symbol: symbol, Name: r.name, Unit: Coherent(r.dim).Symbol, Source: r.source, Exact: r.symbol != "dBd"}, true
		}
	}
	return Entry{}, false
}

// Symbols lists every unit symbol without prefixes, in the order of the table,
// for completion.
func Symbols() []Entry {
	list := make([]Entry, 0, len(rows)+len(levelRows))
	for i := range rows {
		list = append(list, rows[i].entry(rows[i].symbol, -1))
	}
	for _, r := range levelRows {
		e, _ := levelInfo(r.symbol)
		list = append(list, e)
	}
	return list
}
