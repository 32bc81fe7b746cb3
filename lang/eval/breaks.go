package eval

// breaks are places on the axis of one slot where a code is not smooth: the
// ends of pieces, the rows of a table. An integral along that slot is split
// there, which makes it fast, and its derivative exact when the place moves.
type breaks struct {
	slot  int
	at    []Code    // places that may move
	knots []float64 // fixed places, ascending
}

// joinBreaks concatenates; a body with a great many pieces keeps the first.
func joinBreaks(a, b []breaks) []breaks {
	if len(b) == 0 {
		return a
	}
	if len(a) == 0 {
		return b
	}
	if len(a)+len(b) > 64 {
		return a
	}
	return append(a[:len(a):len(a)], b...)
}

// letBreaks carries a body's breaks through a call: a break along a parameter
// is one along the slot that is passed for it, where that is a bare slot.
func letBreaks(slots []int, args []Code, body Code) []breaks {
	var out []breaks
	for _, b := range body.breaks {
		if !b.free(slots) {
			continue
		}
		for i, s := range slots {
			if s == b.slot {
				b.slot = args[i].slot
				break
			}
		}
		if b.slot >= 0 {
			out = append(out, b)
		}
	}
	return out
}

// free reports whether the places read none of the bound slots.
func (b breaks) free(bound []int) bool {
	for _, c := range b.at {
		for _, s := range bound {
			if c.Reads(s) {
				return false
			}
		}
	}
	return true
}

// withoutSlot drops the breaks along a bound slot and those placed by it.
func withoutSlot(bs []breaks, slot int) []breaks {
	var out []breaks
	for _, b := range bs {
		if b.slot != slot && b.free([]int{slot}) {
			out = append(out, b)
		}
	}
	return out
}
