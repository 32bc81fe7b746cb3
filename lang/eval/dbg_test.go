package eval

import (
	"context"
	"fmt"
	"math"
	"testing"
)

func TestDbg(t *testing.T) {
	p := &problem{m: 1, primal: 1, body: &realSampler{0, func(f *Frame) float64 { return math.Sqrt(f.slots[0].Re()) }}, cost: 1, rel: [2]float64{1e-9, 1e-9}}
	f := NewFrame(context.Background(), 1, Budget{})
	s, st := f.tail(p, tail{from: 0, dir: 1, width: 1. / 1024}, [2]float64{.66, 0})
	fmt.Println(st, s.sum, s.err, s.size[0], s.last, s.end)
	w := f.enter(1)
	st2, x := f.adaptive(w, p, 0, 1, ends{tails: true, checkLeft: true, checkRight: true}, [2]float64{})
	fmt.Println(st2, x, w.total, w.err, w.abs, len(w.iv), len(w.heap))
}
