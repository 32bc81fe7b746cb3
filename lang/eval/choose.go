package eval

import "math"

// Piece is one piece of a function: Body holds for From <= x <= To.
type Piece struct {
	From, To Code // real numbers, in either order
	Body     Code
}

// Choose is the body of the first piece whose range holds x, ends included. A
// value that misses a piece by rounding only (1e-12 of the piece's bounds)
// belongs to it; one outside all pieces is a fault. Where x is a bare slot an
// integral along that slot is split at the ends of the pieces.
func Choose(node int, x Code, pieces []Piece) (Code, error) {
	if len(pieces) == 0 {
		return Code{}, refuse("", "a function in pieces has at least one piece")
	}
	t, args := pieces[0].Body.Type, []Code{x}
	for _, p := range pieces {
		if p.Body.Type.Shape != t.Shape {
			return Code{}, refuse("", "the pieces have different shapes: %s and %s", t, p.Body.Type)
		}
		if !p.From.Type.IsReal() || !p.To.Type.IsReal() {
			return Code{}, refuse("", "a piece runs between two real numbers")
		}
		t.Complex = t.Complex || p.Body.Type.Complex
		args = append(args, p.From, p.To, p.Body)
	}
	if !x.Type.IsReal() {
		return Code{}, refuse("", "a function in pieces takes a real number, not %s", x.Type)
	}
	c := Code{Type: t, Any: func(f *Frame) Value {
		i := f.piece(node, x.Any(f).Re(), pieces)
		if i < 0 {
			return zero(t)
		}
		return pieces[i].Body.Any(f).as(t)
	}}
	if t.IsReal() {
		r := x.Real
		c.Real = func(f *Frame) float64 {
			i := f.piece(node, r(f), pieces)
			if i < 0 {
				return 0
			}
			return pieces[i].Body.Real(f)
		}
	}
	c = build(c, args...)
	if x.slot >= 0 && c.konst == nil {
		c.info.breaks = joinBreaks(pieceBreaks(x.slot, pieces), c.info.breaks)
	}
	return c.derive(func(d *differ) (Code, error) { return d.pieces(node, x, pieces) }), nil
}

// as is the value in a type of the same shape that may be complex.
func (v Value) as(t Type) Value {
	v.typ = t
	return v
}

func pieceBreaks(slot int, pieces []Piece) []breaks {
	b := breaks{slot: slot}
	for _, p := range pieces {
		b.at = append(b.at, p.From, p.To)
	}
	return []breaks{b}
}

// piece is the index of the piece that holds x, or -1 with a fault.
func (f *Frame) piece(node int, x float64, pieces []Piece) int {
	nearest, least := -1, math.Inf(1)
	for i := range pieces {
		a, b := pieces[i].From.Real(f), pieces[i].To.Real(f)
		lo, hi := min(a, b), max(a, b)
		if lo <= x && x <= hi {
			return i
		}
		gap := max(lo-x, x-hi)
		if slack := 1e-12 * max(math.Abs(a), math.Abs(b)); gap <= slack && gap < least {
			nearest, least = i, gap
		}
	}
	if nearest < 0 {
		f.fail(node, RuleRange, "no piece of the function holds "+number(x)+" (SI unit of the variable)",
			"add a piece for this range, or keep the argument inside the pieces")
	}
	return nearest
}

func (d *differ) pieces(node int, x Code, pieces []Piece) (Code, error) {
	ds := make([]Piece, len(pieces))
	t := pieces[0].Body.Type
	for i, p := range pieces {
		db, err := d.of(p.Body)
		if err != nil {
			return Code{}, err
		}
		if t.Shape == List {
			return Code{}, refuse("", "lists in pieces cannot be differentiated")
		}
		ds[i] = Piece{p.From, p.To, db}
	}
	return Choose(node, x, ds)
}
