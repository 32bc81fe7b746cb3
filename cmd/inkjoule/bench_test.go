package main

import (
	"fmt"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"
)

// The budgets of a cold review, process start included, measured on the real
// binary: `go test -run '^$' -bench Cold ./cmd/inkjoule`.

// program builds the binary as it is released.
func program(b *testing.B) string {
	b.Helper()
	path := filepath.Join(b.TempDir(), "inkjoule")
	cmd := exec.CommandContext(b.Context(), "go", "build", "-trimpath", "-ldflags=-s -w", "-o", path, ".")
	cmd.Env = append(os.Environ(), "CGO_ENABLED=0")
	if out, err := cmd.CombinedOutput(); err != nil {
		b.Fatalf("%v\n%s", err, out)
	}
	return path
}

// longNote is a note of about n statements, clean, as engineers write them: a
// medium, inputs with tolerance and source, formulas with results, a vector
// field in a crystal, criteria.
func longNote(n int) string {
	var t strings.Builder
	t.WriteString("A long note\n===========\n\n    medium mica: linear, uniaxial, homogeneous, lossless, nondispersive\n" +
		"        eps_r = diag(6.9, 6.9, 8.7)   per \"sheet M-7\"\n")
	for i := 0; i*10 < n; i++ {
		fmt.Fprintf(&t, `
Cell %[1]d of the stack.

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

func coldReview(b *testing.B, notes, statements int) {
	path, dir := program(b), b.TempDir()
	text := []byte(longNote(statements))
	for i := range notes {
		if err := os.WriteFile(filepath.Join(dir, fmt.Sprintf("n%04d.joule", i)), text, 0o644); err != nil {
			b.Fatal(err)
		}
	}
	b.ResetTimer()
	for range b.N {
		cmd := exec.CommandContext(b.Context(), path, "review", dir)
		if out, err := cmd.CombinedOutput(); err != nil {
			b.Fatalf("%v\n%.2000s", err, out)
		}
	}
	b.ReportMetric(float64(b.Elapsed().Milliseconds())/float64(b.N), "ms/review")
}

func BenchmarkColdNoteOf100Statements(b *testing.B)      { coldReview(b, 1, 100) }
func BenchmarkColdNoteOf10000Statements(b *testing.B)    { coldReview(b, 1, 10_000) }
func BenchmarkCold1000NotesOf100Statements(b *testing.B) { coldReview(b, 1000, 100) }

// BenchmarkColdStart is what every call pays.
func BenchmarkColdStart(b *testing.B) {
	path := program(b)
	b.ResetTimer()
	for range b.N {
		if err := exec.CommandContext(b.Context(), path, "version").Run(); err != nil {
			b.Fatal(err)
		}
	}
}
