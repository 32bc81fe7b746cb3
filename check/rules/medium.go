package rules

import (
	"slices"

	"inkjoule/lang"
)

// medium is a declared medium as the rules see it.
type medium struct {
	sym  *lang.Symbol
	tree *lang.Medium
}

// mediumOf finds a medium by its key; ok is false where the note and those that
// it uses do not declare it.
func mediumOf(n *lang.Note, key string) (medium, bool) {
	s := n.Lookup(key)
	if s == nil || s.Stmt == nil {
		return medium{}, false
	}
	tree, ok := s.Stmt.Tree.(*lang.Medium)
	return medium{s, tree}, ok
}

// says reports whether the declaration has one of the adjectives.
func (m medium) says(adjectives ...string) bool {
	return slices.ContainsFunc(m.tree.Adjectives, func(w *lang.Words) bool { return slices.Contains(adjectives, w.Text) })
}

// nonlinear and anisotropic media, by declaration.
func (m medium) nonlinear() bool   { return m.says("nonlinear", "hysteretic") }
func (m medium) anisotropic() bool { return m.says("uniaxial", "biaxial", "anisotropic") }

// mediaOf gives the media of a claim: those that entered its value.
func (c *claim) mediaOf() []medium {
	var out []medium
	for _, key := range c.sym.Facts.Media {
		if m, ok := mediumOf(c.note, key); ok {
			out = append(out, m)
		}
	}
	return out
}

// nonlinear gives a medium of the claim that is declared nonlinear.
func (c *claim) nonlinear() (medium, bool) {
	for _, m := range c.mediaOf() {
		if m.nonlinear() {
			return m, true
		}
	}
	return medium{}, false
}

// harmonic reports whether the claim stands under a harmonic regime.
func (c *claim) harmonic() bool {
	word, _ := c.note.Regime(c.sym)
	return word == "harmonic"
}
