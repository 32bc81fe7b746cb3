package rules

import (
	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// view is what the rules need to know of a note, made once for all of them.
type view struct {
	note   *lang.Note
	book   *check.Catalogue
	claims []*claim                // in text order
	fresh  []*spot                 // statements that no earlier run has looked at
	kept   map[string][]lang.Fault // what earlier runs found of the others, by rule
	used   map[string]bool         // names that another definition uses, by key
	hasRMS bool                    // something in the note is an rms value
	forms  map[*lang.Symbol][]*product
	aparts map[*lang.Symbol][]*product
}

// viewOf gives the view of the note of a pass.
func viewOf(p *check.Pass) *view {
	type key struct{}
	return p.Once(key{}, func() any { return newView(p) }).(*view)
}

func newView(p *check.Pass) *view {
	n := p.Note
	v := &view{note: n, book: p.Book, used: map[string]bool{}, forms: map[*lang.Symbol][]*product{}, aparts: map[*lang.Symbol][]*product{}}
	for _, s := range n.Symbols {
		if c := newClaim(v, s); c != nil {
			v.claims = append(v.claims, c)
		}
		v.hasRMS = v.hasRMS || s.Facts.Qualifier == kind.RMS
	}
	for _, u := range n.Uses {
		if u.Symbol == nil || u.Define || u.Stmt == u.Symbol.Stmt {
			continue
		}
		if _, ok := u.Stmt.Tree.(*lang.Definition); ok {
			v.used[u.Symbol.Key] = true
		}
	}
	v.sortOut()
	return v
}

// products takes the definition of a name apart, once; nil where its form is
// not known. They must not be changed.
func (v *view) products(s *lang.Symbol) []*product {
	made, ok := v.forms[s]
	if !ok {
		made = products(v.note.Normal(s, atoms))
		v.forms[s] = made
	}
	return made
}

// apart is products for functions too, with integrals over lengths and sums
// taken apart.
func (v *view) apart(s *lang.Symbol) []*product {
	made, ok := v.aparts[s]
	if !ok {
		made = products(v.note.Apart(s, atoms))
		v.aparts[s] = made
	}
	return made
}
