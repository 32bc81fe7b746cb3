package rules

import (
	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// view is what the rules need to know of a note, made once for all of them.
type view struct {
	note   *lang.Note
	claims []*claim        // in text order
	used   map[string]bool // names that another definition uses, by key
	hasRMS bool            // something in the note is an rms value
	forms  map[*lang.Symbol][]*product
}

// viewOf gives the view of the note of a pass.
func viewOf(p *check.Pass) *view {
	type key struct{}
	return p.Once(key{}, func() any { return newView(p.Note) }).(*view)
}

func newView(n *lang.Note) *view {
	v := &view{note: n, used: map[string]bool{}, forms: map[*lang.Symbol][]*product{}}
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

// perClaim makes a rule of a look at one claim. What the look tells may depend
// on the claim, on whatever its value is computed from, and on the view; then
// an unchanged claim need not be looked at again.
func perClaim(look func(*check.Pass, *claim)) func(*check.Pass) error {
	return func(p *check.Pass) error {
		for _, c := range viewOf(p).claims {
			look(p, c)
		}
		return nil
	}
}
