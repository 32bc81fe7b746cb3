package rules

import (
	"fmt"
	"strings"
	"testing"

	"inkjoule/check"
	"inkjoule/lang"
)

// longNote is a note of about n statements as engineers write them.
func longNote(n int) string {
	var t strings.Builder
	t.WriteString("A long note\n===========\n\n    medium mica: linear, uniaxial, homogeneous, lossless, nondispersive\n" +
		"        eps_r = diag(6.9, 6.9, 8.7)   per \"sheet M-7\"\n")
	for i := 0; i*10 < n; i++ {
		fmt.Fprintf(&t, `
    U_%[1]d, peak voltage = 12.0(1) kV       per "nameplate"
    a_%[1]d = 3.00 mm ± 0.05 mm              per "drawing"
    R_%[1]d = 40 mm
    assume a_%[1]d < R_%[1]d
    E_%[1]d in mica, peak electric field strength = (0, 0, 1)*U_%[1]d/a_%[1]d = (0, 0, 4.00) kV/mm
    D_%[1]d in mica = mica.eps*E_%[1]d
    w_%[1]d, peak energy density = 1/2 * D_%[1]d·E_%[1]d = 616.3 J/m^3
    V_%[1]d = pi*R_%[1]d^2*a_%[1]d = 15.08 cm^3
    W_%[1]d, peak energy = w_%[1]d*V_%[1]d = 9.29 mJ
    criterion W_%[1]d < 20 mJ
`, i)
	}
	return t.String()
}

// BenchmarkCheck is what all rules cost on a note of 100 statements that no
// rule has seen before.
func BenchmarkCheck(b *testing.B) {
	runner, err := check.NewRunner(check.Config{Rules: All()})
	if err != nil {
		b.Fatal(err)
	}
	text := longNote(100)
	b.ReportAllocs()
	for range b.N {
		b.StopTimer()
		note, err := lang.Analyze(b.Context(), text, lang.Options{Path: "a.joule"})
		if err != nil {
			b.Fatal(err)
		}
		b.StartTimer()
		if _, err := runner.Run(b.Context(), note); err != nil {
			b.Fatal(err)
		}
	}
}

// BenchmarkEachRule tells what each rule costs on the same note, with the forms
// and the view that all share made before.
func BenchmarkEachRule(b *testing.B) {
	for _, rule := range All() {
		b.Run(rule.Name, func(b *testing.B) {
			runner, err := check.NewRunner(check.Config{Rules: []*check.Rule{rule}})
			if err != nil {
				b.Fatal(err)
			}
			text := longNote(100)
			for range b.N {
				b.StopTimer()
				note, err := lang.Analyze(b.Context(), text, lang.Options{Path: "a.joule"})
				if err != nil {
					b.Fatal(err)
				}
				b.StartTimer()
				if _, err := runner.Run(b.Context(), note); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}
