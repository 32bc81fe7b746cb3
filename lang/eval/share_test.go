package eval

import (
	"context"
	"sync"
	"testing"
)

// Code is shared between frames on several goroutines.
func TestCodeIsSharedBetweenFrames(t *testing.T) {
	codes := fastCodes(t)
	tab := bhTable(t, false)
	codes["table"] = must(t)(Integral(0, 0, Num(0), Num(1.7), must(t)(tab.At(0, 0, 1, slot(0)))))
	want := map[string]float64{}
	eval := func(c Code, dual bool) float64 {
		f := NewFrame(context.Background(), 30, Budget{})
		f.Set(7, Real(3))
		f.Set(8, Ten([9]float64{2, 0, 0, 0, 3, 0, 0, 0, 4}))
		do := f.Run
		if dual {
			do = f.RunDual
		}
		v, fault := do(0, c)
		if fault != nil {
			t.Errorf("%+v", *fault)
		}
		return v.Re()
	}
	for name, c := range codes {
		want[name] = eval(c, false)
	}
	var wg sync.WaitGroup
	for i := range 4 {
		for name, c := range codes {
			wg.Go(func() { near(t, name, eval(c, i%2 == 1), want[name], 1e-9) })
		}
	}
	wg.Wait()
}
