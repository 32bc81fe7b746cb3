package eval

// problem is an integrand with what is demanded of its integral.
type problem struct {
	node   int
	m      int // components
	primal int // of which belong to the value; the rest are tangents
	body   sampler
	cost   int64
	rel    [2]float64 // relative accuracy of the value and of the tangent
	onAbs  bool       // relative to ∫|f|: for the inner of nested integrals
	floor  float64    // accuracy beyond which the integrand is noise, relative to ∫|f|
	// stretch is the rate at which the range grows along the tangents: times
	// the integral it is the size that the tangent cancels from.
	stretch float64
}

// group is 0 for a component of the value, 1 for one of the tangent. Each group
// is judged by its largest component.
func (p *problem) group(c int) int {
	if c < p.primal {
		return 0
	}
	return 1
}

// groups is 2 where there are tangents, else 1.
func (p *problem) groups() int {
	if p.primal < p.m {
		return 2
	}
	return 1
}

// interval is a piece of the range with its estimates. Neighbours are linked;
// -1 is none.
type interval struct {
	a, b       float64
	err, abs   [2]float64
	gap        [2][2]float64 // what the left and the right end add to the error
	key        float64       // place in the heap: error over demanded accuracy
	depth      int
	prev, next int
	heapAt     int  // index in the heap, -1: off it
	counted    bool // in the totals
	closed     bool // the result of a tail: its ends hold the integrand itself
}

// total is the error of a group, ends included.
func (v *interval) total(g int) float64 { return v.err[g] + v.gap[0][g] + v.gap[1][g] }

// resolved reports whether the panel has understood the integrand, so that its
// predictions mean something.
func (v *interval) resolved(g int) bool { return !v.closed && v.err[g] <= 1e-4*v.abs[g] }

// workspace is the storage of one level of nesting, kept by the frame. Component
// k of interval i is at index i·m + k of sums and of the edge slices.
type workspace struct {
	iv          []interval
	heap        []int
	sums        []float64
	left, right []float64 // predictions at the ends of each interval
	ends        []float64 // the integrand at the ends of the range; NaN: unknown
	fx          []float64 // the panel at hand
	total       []float64
	row         []float64
	err, abs    [2]float64
	share       float64

	segs []segment // quadrature: what is left to do
	acc  []float64 // and what is done
	tail tailState
}

// state is how a piece of work ended.
type state uint8

const (
	converged state = iota
	unsettled       // not accurate enough, nothing left to split
	diverging
	singular  // at a point inside: split there
	undefined // without a finite value at several points
	stopped   // a fault stands
)

// enter gives the workspace of the next level of nesting.
func (f *Frame) enter(m int) *workspace {
	if f.level == len(f.work) {
		f.work = append(f.work, &workspace{})
	}
	w := f.work[f.level]
	f.level++
	w.row = grow(w.row, m)
	w.fx = grow(w.fx, m*panelSize)
	w.total = grow(w.total, m)
	w.acc = grow(w.acc, m)
	w.ends = grow(w.ends, 2*m)
	return w
}

func (f *Frame) leave() { f.level-- }

func grow(s []float64, n int) []float64 {
	if cap(s) < n {
		return make([]float64, n)
	}
	return s[:n]
}
