package eval

// The closures below are the inner loop of every integral. Operands that are
// constants or bare slots are read in place, which spares a call each.

func realAdd(a, b Code) func(*Frame) float64 {
	x, y := a.Real, b.Real
	if k, ok := a.number(); ok {
		return func(f *Frame) float64 { return k + y(f) }
	}
	if k, ok := b.number(); ok {
		return func(f *Frame) float64 { return x(f) + k }
	}
	return func(f *Frame) float64 { return x(f) + y(f) }
}

func realSub(a, b Code) func(*Frame) float64 {
	x, y := a.Real, b.Real
	if k, ok := a.number(); ok {
		return func(f *Frame) float64 { return k - y(f) }
	}
	if k, ok := b.number(); ok {
		return func(f *Frame) float64 { return x(f) - k }
	}
	return func(f *Frame) float64 { return x(f) - y(f) }
}

func realMul(a, b Code) func(*Frame) float64 {
	x, y, i, j := a.Real, b.Real, a.slot, b.slot
	if k, ok := a.number(); ok {
		if j >= 0 {
			return func(f *Frame) float64 { return k * real(f.slots[j].x) }
		}
		return func(f *Frame) float64 { return k * y(f) }
	}
	if k, ok := b.number(); ok {
		return func(f *Frame) float64 { return x(f) * k }
	}
	switch {
	case i >= 0 && j >= 0:
		return func(f *Frame) float64 { return real(f.slots[i].x) * real(f.slots[j].x) }
	case i >= 0:
		return func(f *Frame) float64 { return real(f.slots[i].x) * y(f) }
	case j >= 0:
		return func(f *Frame) float64 { return x(f) * real(f.slots[j].x) }
	}
	return func(f *Frame) float64 { return x(f) * y(f) }
}

func realDiv(node int, a, b Code) func(*Frame) float64 {
	x, y, i, j := a.Real, b.Real, a.slot, b.slot
	if k, ok := b.number(); ok && k != 0 {
		return func(f *Frame) float64 { return x(f) / k }
	}
	if i >= 0 && j >= 0 {
		return func(f *Frame) float64 {
			d := real(f.slots[j].x)
			if d == 0 {
				f.divided(node)
				return 0
			}
			return real(f.slots[i].x) / d
		}
	}
	if k, ok := a.number(); ok {
		return func(f *Frame) float64 {
			d := y(f)
			if d == 0 {
				f.divided(node)
				return 0
			}
			return k / d
		}
	}
	return func(f *Frame) float64 {
		n, d := x(f), y(f)
		if d == 0 {
			f.divided(node)
			return 0
		}
		return n / d
	}
}
