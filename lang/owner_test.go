package lang

import "testing"

// A property knows its medium, also where another note declares it, under its
// own name or behind that of the note.
func TestOwnersOfForeignProperties(t *testing.T) {
	oils := files{"oils.joule": "Oils\n\n    medium oil: linear\n        eps_r = 2.2\n        sigma = 1 pS/m\n"}
	for _, c := range []struct{ uses, key, owner string }{
		{"uses \"oils.joule\"", "oil.eps_r", "oil"},
		{"uses \"oils.joule\" as m", "m.oil.sigma", "m.oil"},
		{"uses \"handbook/liquids\"", "water.eps_r", "water"},
	} {
		for range 20 { // the order in which names are entered is random
			n, err := Analyze(t.Context(), indented(c.uses), Options{Path: "a.joule", Files: oils})
			if err != nil {
				t.Fatal(err)
			}
			s := n.Lookup(c.key)
			if s == nil || s.Owner == nil || s.Owner.Key != c.owner || s.Owner != n.Lookup(c.owner) {
				t.Fatalf("%s: %s belongs to %v", c.uses, c.key, s)
			}
		}
	}
}
