package lang

import (
	"context"
	"fmt"
	"strings"
	"testing"
)

// longNote writes a note of n statements in which inputs, derived results and
// stated results alternate, as in a sizing calculation.
func longNote(n int) string {
	var b strings.Builder
	b.WriteString("A long note\n===========\n\n    medium oil: linear, isotropic, homogeneous\n        eps_r = 2.2 per \"data sheet\"\n\n")
	for i := 0; i < n; i += 5 {
		fmt.Fprintf(&b, "    U_%d, peak voltage = %d V per \"nameplate\"\n", i, 100+i%97)
		fmt.Fprintf(&b, "    d_%d = %d.5 mm\n", i, 1+i%7)
		fmt.Fprintf(&b, "    E_%d in oil, peak electric field strength = U_%d/d_%d = __ kV/mm\n", i, i, i)
		fmt.Fprintf(&b, "    w_%d, peak energy density = 1/2*oil.eps*E_%d^2\n", i, i)
		fmt.Fprintf(&b, "    W_%d, energy = w_%d*1 mm^2*d_%d = __ nJ\n", i, i, i)
	}
	return b.String()
}

func BenchmarkAnalyze(b *testing.B) {
	for _, n := range []int{100, 300, 10_000} {
		text := longNote(n)
		b.Run(fmt.Sprintf("cold/%d", n), func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				if _, err := Analyze(context.Background(), text, Options{Path: "x"}); err != nil {
					b.Fatal(err)
				}
			}
		})
		b.Run(fmt.Sprintf("edit/%d", n), func(b *testing.B) {
			note, err := Analyze(context.Background(), text, Options{Path: "x"})
			if err != nil {
				b.Fatal(err)
			}
			b.ReportAllocs()
			i := 0
			for b.Loop() {
				i++
				changed := strings.Replace(text, "d_0 = 1.5 mm", fmt.Sprintf("d_0 = %d.5 mm", 2+i%7), 1)
				if note, err = Analyze(context.Background(), changed, Options{Path: "x", Previous: note}); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}
