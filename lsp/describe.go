package lsp

import (
	"fmt"
	"math"
	"strings"

	"inkjoule/lang"
	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// describe tells what a name stands for.
func describe(note *lang.Note, sym *lang.Symbol) *card {
	c := &card{head: titleOf(sym)}
	switch sym.Role {
	case lang.RoleMedium:
		describeMembers(c, note, sym)
	case lang.RoleRegion, lang.RoleTable, lang.RoleNote:
		describeMembers(c, note, sym)
	default:
		describeValue(c, sym)
		describeFacts(c, sym)
	}
	c.line("source", sym.Per)
	c.paragraph(sym.Doc)
	return c
}

// titleOf is the name as its definition begins, with its value.
func titleOf(sym *lang.Symbol) string {
	name := qualifiedName(sym)
	if sym.Def != nil && len(sym.Def.Params) > 0 {
		var params []string
		for _, p := range sym.Def.Params {
			params = append(params, p.Text)
		}
		name += "(" + strings.Join(params, ", ") + ")"
	}
	switch sym.Role {
	case lang.RoleMedium, lang.RoleRegion, lang.RoleTable:
		return roleWord(sym.Role) + " " + name
	}
	if sym.Known && sym.Shown != "" {
		return name + " = " + sym.Shown
	}
	return name
}

func qualifiedName(sym *lang.Symbol) string {
	if sym.Owner != nil {
		return sym.Owner.Name + "." + sym.Name
	}
	return sym.Name
}

// roleWord says what a name is.
func roleWord(r lang.Role) string {
	switch r {
	case lang.RoleFunction:
		return "function"
	case lang.RoleMedium:
		return "medium"
	case lang.RoleProperty:
		return "property"
	case lang.RoleRegion:
		return "region"
	case lang.RoleTable:
		return "table"
	case lang.RoleColumn:
		return "column"
	case lang.RoleConstant:
		return "constant"
	case lang.RoleParameter:
		return "parameter"
	case lang.RoleNote:
		return "note"
	case lang.RoleCondition:
		return "condition"
	}
	return "quantity"
}

func describeValue(c *card, sym *lang.Symbol) {
	if !sym.Known {
		c.line("value", "not known: "+orElse(sym.Why, "it depends on something that is not"))
		return
	}
	if sym.Standard > 0 {
		c.line("standard uncertainty", inUnit(sym.Standard, sym.Unit.Difference(), 2))
	}
	if sym.Low != sym.High {
		c.line("worst case", fmt.Sprintf("%s to %s", inUnit(sym.Low, sym.Unit, 4), inUnit(sym.High, sym.Unit, 4)))
	}
}

// inUnit shows a number of coherent SI units in a unit, with so many digits.
func inUnit(si float64, u unit.Unit, digits int) string {
	x := u.FromSI(si)
	if math.IsNaN(x) {
		return fmt.Sprintf("%.*g (coherent SI)", digits, si)
	}
	return strings.TrimSpace(fmt.Sprintf("%.*g %s", digits, x, u))
}

// describeFacts tells what the name carries besides its value.
func describeFacts(c *card, sym *lang.Symbol) {
	f := sym.Facts
	if sym.Role == lang.RoleFunction || sym.Role == lang.RoleParameter {
		c.line("is", "a "+roleWord(sym.Role))
	}
	if f.Kind != 0 {
		c.line("kind", f.Kind.String()+standing(f.KindBy))
	}
	if f.Qualifier != kind.Unqualified {
		c.line("qualifier", f.Qualifier.String()+standing(f.QualBy))
	}
	c.line("waveform", f.Waveform.String())
	c.line("coherence", f.Coherence.String())
	if f.Known {
		dim := f.Dim.String()
		if shape := (eval.Type{Shape: f.Shape, Complex: f.Complex}); !shape.IsReal() {
			dim += ", " + shape.String()
		}
		c.line("dimension", dim)
	}
	c.line("media", strings.Join(f.Media, ", "))
	if sym.Role == lang.RoleConstant {
		c.line("is", "a constant of nature or mathematics")
	}
}

// standing says how sure a fact is; a declared one needs no word.
func standing(s lang.Standing) string {
	switch s {
	case lang.Guessed:
		return " (guessed)"
	case lang.Inferred:
		return " (inferred)"
	}
	return ""
}

// describeMembers lists what a medium, a region or a table holds.
func describeMembers(c *card, note *lang.Note, owner *lang.Symbol) {
	if m := mediumOf(owner); m != nil {
		var words []string
		for _, a := range m.Adjectives {
			words = append(words, a.Text)
		}
		c.line("stated", strings.Join(words, ", "))
	}
	all := members(note, owner)
	if owner.Path != "" {
		all = foreignMembers(note, owner)
	}
	for _, m := range all {
		text := m.Shown
		if !m.Known {
			text = orElse(m.Why, "not known")
		}
		if m.Per != "" {
			text += "; " + m.Per
		}
		c.line(m.Name, orElse(text, roleWord(m.Role)))
	}
}

// foreignMembers are the well-known properties of a medium of another note.
func foreignMembers(note *lang.Note, owner *lang.Symbol) []*lang.Symbol {
	var out []*lang.Symbol
	for _, p := range propertyNames() {
		if m := note.Lookup(owner.Key + "." + p); m != nil && m.Name == p {
			out = append(out, m)
		}
	}
	return out
}

func mediumOf(sym *lang.Symbol) *lang.Medium {
	if sym.Stmt == nil {
		return nil
	}
	m, _ := sym.Stmt.Tree.(*lang.Medium)
	return m
}

func orElse(text, other string) string {
	if text == "" {
		return other
	}
	return text
}
