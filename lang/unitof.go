package lang

// UnitOf is the unit phrase at the end of a literal, a vector or tensor of
// literals, or a blank; nil where none is written.
func UnitOf(x Expr) *UnitPhrase { return unitOf(x) }
