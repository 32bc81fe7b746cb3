package kind

import (
	"strings"
	"sync"

	"inkjoule/lang/unit"
)

// tables is what is worked out from the data once, at the first use.
type tables struct {
	units  []unit.Unit
	byName map[string]ID
	byDim  map[unit.Dim][]ID // exact dimension, angle and cycle included
	byBase map[unit.Dim][]ID
	apart  map[[2]ID]bool
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
			t.byName[fold(name)] = k
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

// fold is the form by which names are compared.
func fold(words string) string {
	return strings.ToLower(strings.Join(strings.Fields(words), " "))
}
