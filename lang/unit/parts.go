package unit

// Part is one symbol of a phrase, at bytes [Start, End) of it.
type Part struct {
	Start, End int
	Operator   byte // '/' or '.' that stands before it, 0 for the first; '(' counts as what stands before the group
}

// Parts finds the symbols of a phrase lexically, units or not: for the caution
// that a symbol after an operator hides a name of the note.
func Parts(phrase string) []Part {
	p := parser{s: phrase}
	var parts []Part
	var op byte
	for p.at < len(p.s) {
		if o := p.operator(); o != 0 {
			op = o
			continue
		}
		n := symbolLen(p.s[p.at:])
		if n == 0 {
			p.at++
			continue
		}
		parts = append(parts, Part{p.at, p.at + n, op})
		p.at += n
	}
	return parts
}
