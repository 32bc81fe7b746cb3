package rules

import (
	"fmt"
	"strings"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
)

// UndeclaredMediumAssumption names the facts about a medium that a formula
// needs and nobody wrote down.
func (Book) UndeclaredMediumAssumption() check.Rule {
	return check.Rule{
		Name:     "undeclared-medium-assumption",
		Severity: lang.Caution,
		Title:    "A formula needs a fact about a medium that its declaration does not state",
		Sees: "A stored energy or energy density made as a square of amplitudes (½εE², ½E·D, ½CU², ½µH² …) with a medium that does not say whether it is linear; " +
			"with a permittivity or permeability taken as one number, whether it is isotropic. Once for each medium.",
		Silent: "Where the declaration says something of each group that is needed, whatever it says: then the rules about it speak; for media of a note that is referred to by `uses`; " +
			"for integrals along a curve.",
		Formula: "½εE² needs D = εE with one constant ε from 0 to E; ½E·D needs D proportional to E.",
		Remedy:  "Add to the medium's line what is known of it: `medium G: linear, isotropic`.",
		Source:  "Landau, Lifshitz, Electrodynamics of Continuous Media, §§ 10 and 13 (from memory)",
		Wrong: check.Example{Note: `    medium G: homogeneous
        eps_r = 4.3
    E in G, static electric field strength = 2 kV/mm
    w, energy density = 1/2*G.eps*E^2 = 76.1 J/m^3
`},
		Right: check.Example{Note: `    medium G: linear, isotropic, homogeneous
        eps_r = 4.3
    E in G, static electric field strength = 2 kV/mm
    w, energy density = 1/2*G.eps*E^2 = 76.1 J/m^3
`},
		Run: undeclaredAssumption,
	}
}

// lack is what one medium does not say, with the first formula that needs it.
type lack struct {
	m     medium
	words []string
	by    *claim
}

func undeclaredAssumption(p *check.Pass) error {
	var order []string
	lacks := map[string]*lack{}
	for _, c := range viewOf(p).claims {
		form, ok := c.form()
		if !ok || form != kind.StoredEnergy {
			continue
		}
		squares, ok := c.squares(kind.StoredEnergy)
		if !ok {
			continue
		}
		for _, m := range c.mediaOf() {
			if m.sym.Path != "" {
				continue
			}
			words := c.unsaid(m, squares)
			if len(words) == 0 {
				continue
			}
			l := lacks[m.sym.Key]
			if l == nil {
				l = &lack{m: m, by: c}
				lacks[m.sym.Key] = l
				order = append(order, m.sym.Key)
			}
			l.add(words)
		}
	}
	for _, key := range order {
		lacks[key].report(p)
	}
	return nil
}

func (l *lack) add(words []string) {
	for _, w := range words {
		if !strings.Contains(strings.Join(l.words, " "), w) {
			l.words = append(l.words, w)
		}
	}
}

// unsaid lists the facts that the claim needs and the medium does not state.
func (c *claim) unsaid(m medium, squares []*square) []string {
	var out []string
	need := func(word string, needed bool) {
		if _, stated := c.note.Adjective(m.sym.Key, word); needed && !stated {
			out = append(out, word)
		}
	}
	need("linear", true)
	need("isotropic", scalarProperty(m, squares))
	return out
}

// scalarProperty reports a permittivity or permeability of the medium that
// enters as one number.
func scalarProperty(m medium, squares []*square) bool {
	for _, q := range squares {
		for _, f := range q.all {
			if f.Symbol != nil && f.Symbol.Owner == m.sym && f.Facts.Shape == eval.Scalar && f.Part == "" {
				if r := roleOf(f.Facts); r == roleCapacity || r == roleInduction {
					return true
				}
			}
		}
	}
	return false
}

func (l *lack) report(p *check.Pass) {
	c := l.by
	p.Report(lang.Fault{
		Span:    l.m.sym.Span,
		Message: fmt.Sprintf("medium %s does not say whether it is %s, and %s rests on that", l.m.sym.Name, orList(l.words), c.sym.Name),
		Detail:  fmt.Sprintf("Add what is known: `medium %s: %s, …`, or what it is instead.", l.m.sym.Name, strings.Join(l.words, ", ")),
		Related: []lang.Related{{Span: c.span(), Message: fmt.Sprintf("%s is made with %s", c.sym.Name, l.m.sym.Name)}},
	})
}

// orList writes "a, b or c".
func orList(words []string) string {
	if len(words) < 2 {
		return strings.Join(words, "")
	}
	return strings.Join(words[:len(words)-1], ", ") + " or " + words[len(words)-1]
}
