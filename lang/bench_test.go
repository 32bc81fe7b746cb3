package lang

import (
	"fmt"
	"strings"
	"testing"
)

// bigNote has n statements of the usual kinds, some 40 bytes each.
func bigNote(n int) string {
	lines := []string{
		"U_%d, peak voltage = 12.0(1) kV   per \"nameplate\"",
		"d_%d = 3.00 mm ± 0.05 mm",
		"E_%d in mica, peak electric field strength = (0, 0, 1)*U_1/d_1 = (0, 0, 4.000) kV/mm",
		"w_%d, peak energy density = 1/2 * D·E = 616.3 J/m^3",
		"W_%d, energy = integral(w_3 over disc) = __ mJ",
		"g_%d(r) = U_0/(r*ln(b/a)) for r from a to b",
		"x_%d = sqrt(a^2 + b^2)",
		"k_%d = 2*pi*f*sqrt(mu_0*eps_0) = 1.05 m^-1",
		"region disc_%d in mica: cylinder(R, d)",
		"criterion E_%d <= mica.E_bd/10   per \"design rule 4.2\"",
	}
	var b strings.Builder
	b.WriteString("A note\n\n")
	for i := range n {
		fmt.Fprintf(&b, "    "+lines[i%len(lines)]+"\n", i)
	}
	return b.String()
}

func BenchmarkParse(b *testing.B) {
	for _, n := range []int{100, 10_000} {
		text := bigNote(n)
		b.Run(fmt.Sprint(n), func(b *testing.B) {
			b.SetBytes(int64(len(text)))
			b.ReportAllocs()
			for b.Loop() {
				if s := Read(text, nil); len(s.Stmts) != n {
					b.Fatal(len(s.Stmts))
				}
			}
		})
	}
}

func BenchmarkReadAgain(b *testing.B) {
	text := bigNote(10_000)
	before := Read(text, nil)
	edited := strings.Replace(text, "x_5006", "y_5006", 1)
	b.ReportAllocs()
	for b.Loop() {
		Read(edited, before)
	}
}
