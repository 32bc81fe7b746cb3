package rules

import (
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// This file compares half products of a core with the curve of a table.

// besideCurve gives half of B²/µ or B·H and ∫H dB along the only table of the
// note that gives H over B as far as the core's flux density.
func (c *claim) besideCurve(k *core) (half, right float64, table *lang.Symbol, ok bool) {
	if !k.known || k.b == 0 {
		return 0, 0, nil, false
	}
	curve, table := c.magnetizationCurve()
	if table == nil || !curve.reaches(0, k.b) {
		return 0, 0, nil, false
	}
	half = c.halfProductOf(k)
	right = curve.area(0, k.b)
	return half, right, table, half > 0 && right > 0
}

// halfProductOf is ½B·H of a core, with the H of the term.
func (c *claim) halfProductOf(k *core) float64 {
	if mu, ok := c.permeability(k); ok {
		return k.b * k.b / mu / 2
	}
	for _, f := range k.byRole[roleMagnetic] {
		if h, ok := sizeOf(c.note, f); ok && isOf(f.Facts, kind.MagneticFieldStrength) {
			return k.b * h / 2
		}
	}
	return 0
}

// magnetizationCurve is H over B of the only table of the note with both.
func (c *claim) magnetizationCurve() (found curve, table *lang.Symbol) {
	for _, s := range c.note.Symbols {
		if s.Role != lang.RoleTable || s.Path != "" {
			continue
		}
		b, h := c.columnsOf(s, kind.MagneticFluxDensity), c.columnsOf(s, kind.MagneticFieldStrength)
		if len(b) != 1 || len(h) != 1 {
			continue
		}
		if table != nil {
			return curve{}, nil
		}
		if k, ok := curveOf(c.note, s.Key, b[0], h[0]); ok {
			found, table = k, s
		}
	}
	return found, table
}

// columnsOf names the columns of a table that have the dimension of a kind.
func (c *claim) columnsOf(table *lang.Symbol, k kind.ID) []string {
	t, ok := table.Stmt.Tree.(*lang.Table)
	if !ok {
		return nil
	}
	var out []string
	for _, col := range t.Columns {
		name := lang.CanonicalName(col.Name.Text)
		if s := c.note.Lookup(table.Key + "." + name); s != nil && isOf(s.Facts, k) {
			out = append(out, name)
		}
	}
	return out
}
