package lang

import (
	"math"
	"strings"
	"testing"
	"time"

	"inkjoule/lang/eval"
)

// Whatever a note asks for ends within the budget, as one finding, and the
// other statements keep their values.
func TestOverBudgetIsOneFinding(t *testing.T) {
	cases := map[string]string{
		"nested integrals of a hard integrand": "x = integral(integral(integral(sin(1e4*a*b)*abs(sin(1e4*c) - 1/3) for a from 0 to 1) for b from 0 to 1) for c from 0 to 1)",
		"a long sum":                           "x = sum(sin(n) for n from 1 to 1e9)",
		"a tower of powers":                    "x = 9^9^9^9",
		"functions that call each other":       fibonacci(40),
	}
	for name, text := range cases {
		t.Run(name, func(t *testing.T) {
			start := time.Now()
			note, err := Analyze(t.Context(), indented(text+"\ny = 2*3\nz = x + 1"), Options{Budget: eval.Budget{Steps: 2e6, Time: time.Second}})
			if err != nil {
				t.Fatal(err)
			}
			got := told(note, []string{"y = "})
			if len(got) != 2 || !strings.HasPrefix(got[0], `over-budget "`) || got[1] != "y = 6.000" {
				t.Errorf("got %q", got)
			}
			if took := time.Since(start); took > 10*time.Second {
				t.Errorf("it took %v", took)
			}
		})
	}
}

// fibonacci makes functions each of which calls two others: 2^n calls.
func fibonacci(n int) string {
	lines := []string{"f_0(t) = t", "f_1(t) = t"}
	name := func(i int) string { return "f_" + string(rune('A'+i/26)) + string(rune('a'+i%26)) }
	a, b := "f_0", "f_1"
	for i := range n {
		lines = append(lines, name(i)+"(t) = "+a+"(t) + "+b+"(t)")
		a, b = b, name(i)
	}
	return strings.Join(append(lines, "x = "+b+"(1)"), "\n")
}

func TestRecursionIsACircle(t *testing.T) {
	note, err := Analyze(t.Context(), indented("f(n) = n*f(n - 1)\nx = f(5)\ny = 2*3"), Options{})
	if err != nil {
		t.Fatal(err)
	}
	got := told(note, []string{"y = "})
	if len(got) != 2 || !strings.HasPrefix(got[0], "cyclic-definition") || got[1] != "y = 6.000" {
		t.Errorf("got %q", got)
	}
}

// A note of many slow statements ends too: what all of them may take together
// is five times what one may.
func TestTheNoteAsAWholeHasABudget(t *testing.T) {
	text := strings.Repeat("\nx_# = sum(sin(n) for n from 1 to 1e12)", 40)
	for i := range 40 {
		text = strings.Replace(text, "x_#", "x_"+string(rune('A'+i%26))+string(rune('a'+i/26)), 1)
	}
	start := time.Now()
	note, err := Analyze(t.Context(), indented(text), Options{Budget: eval.Budget{Steps: math.MaxInt64, Time: 50 * time.Millisecond}})
	if err != nil {
		t.Fatal(err)
	}
	whole := 0
	for _, f := range note.Faults {
		if f.Rule == "over-budget" && strings.Contains(f.Message, "as a whole") {
			whole++
		}
	}
	if took := time.Since(start); whole < 30 || took > 5*time.Second {
		t.Errorf("%d statements were left out after %v", whole, took)
	}
}

// Another budget is another analysis: what was over the old one is computed.
func TestARaisedBudgetIsUsed(t *testing.T) {
	text := indented("x = sum(n for n from 1 to 1e5)")
	small, err := Analyze(t.Context(), text, Options{Budget: eval.Budget{Steps: 1000}})
	if err != nil {
		t.Fatal(err)
	}
	large, err := Analyze(t.Context(), text, Options{Previous: small})
	if err != nil {
		t.Fatal(err)
	}
	if small.Lookup("x").Known || !large.Lookup("x").Known {
		t.Errorf("known: %v with little, %v with much", small.Lookup("x").Known, large.Lookup("x").Known)
	}
}
