package kind

import (
	"strings"
	"sync"

	"inkjoule/lang/unit"
)

// tables is what is worked out from the data once, at the first use.
type tables struct {
	units  []unit.Unit
	names  []spelling // every name, those of a kind together
	byName map[string]ID
	byDim  map[unit.Dim][]ID // exact dimension, angle and cycle included
	byBase map[unit.Dim][]ID
	apart  map[[2]ID]bool
}

// spelling is one name of a kind, prepared for comparison.
type spelling struct {
	name, folded string
	words        []string
	kind         ID
}

var derived = sync.OnceValue(func() *tables {
	t := &tables{
		units: make([]unit.Unit, len(table)), byName: make(map[string]ID, 2*len(table)),
		byDim: make(map[unit.Dim][]ID), byBase: make(map[unit.Dim][]ID), apart: make(map[[2]ID]bool),
	}
	for _, k := range All() {
		u, _ := unit.Parse(table[k].Unit) // a test parses every one
		t.units[k] = u
		t.byDim[u.Dim] = append(t.byDim[u.Dim], k)
		t.byBase[u.Dim.Base()] = append(t.byBase[u.Dim.Base()], k)
		for _, name := range table[k].Names() {
			s := spelling{name: name, folded: fold(name), kind: k}
			s.words = strings.Fields(s.folded)
			t.names = append(t.names, s)
			t.byName[s.folded] = k
		}
	}
	for _, chain := range keptApart {
		t.keepApart(chain.kinds)
	}
	return t
})

// keepApart keeps every two kinds of the chain, and what specializes them, apart.
func (t *tables) keepApart(chain []ID) {
	for i, a := range chain {
		for _, b := range chain[i+1:] {
			t.apart[[2]ID{a, b}] = true
			t.apart[[2]ID{b, a}] = true
		}
	}
}

// named finds a kind by any of its names, whatever the case and the blanks.
func named(words string) (ID, bool) {
	byName := derived().byName
	if k, ok := byName[words]; ok { // as it is mostly written
		return k, true
	}
	k, ok := byName[fold(words)]
	return k, ok
}

// fold is the form by which names are compared.
func fold(words string) string {
	return strings.ToLower(strings.Join(strings.Fields(words), " "))
}
