package lang

import (
	"math"
	"slices"
	"strings"
	"testing"
	"time"

	"inkjoule/lang/eval"
)

// Whatever a note asks for ends within the budget, as one finding, and the
// other statements keep their values.
func TestOverBudgetIsOneFinding(t *testing.T) {
	hard := "integral(integral(integral(sin(1e4*a*b)*abs(sin(1e4*c) - 1/3) for a from 0 to q) for b from 0 to 1) for c from 0 to 1)"
	cases := map[string]string{
		"nested integrals of a hard integrand": "q = 1\nx = " + hard,
		"nested integrals of uncertain bounds": "q = 1.0(0.1)\nx = " + hard,
		"the worst case of nested integrals":   "q = 1.0(0.1)\nx = 1 + upper(" + hard + ")",
		"a region of a hard integrand":         "region v: box(1 m, 1 m, 1 m)\nx = integral(abs(sin(1e4*x*y/(1 m^2)) - z/(1 m)) over v)/(1 m^3)",
		"an equation of a slow sum":            "x = solve(sum(sin(n*s) for n from 1 to 1e7) = s for s from 0 to 1)",
		"a slope of a slow sum":                "x = derivative(sum(sin(n*s) for n from 1 to 1e8) for s at 1)",
		"a column of slow sums":                "table t: n [1], s [1] = sum(sin(k*n) for k from 1 to 1e8)\n    1\n    2\nx = t.s[1] + t.s[2]",
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
			if note.Lookup("x").Known || note.Lookup("z").Known {
				t.Error("what was over the budget, or is built on it, has a value")
			}
			if took := time.Since(start); took > 10*time.Second {
				t.Errorf("it took %v", took)
			}
		})
	}
}

// A list has to fit into the memory of the budget.
func TestALargeListIsOverBudget(t *testing.T) {
	text := indented("table t: a [1], b [1]" + strings.Repeat("\n    1 2", 100) + "\nx = sum(t.a*t.b)\ny = 2*3")
	for memory, want := range map[int64][]string{
		1000:    {`over-budget "t.a*t.b"`, "y = 6.000"},
		1 << 20: {"y = 6.000"},
	} {
		note, err := Analyze(t.Context(), text, Options{Budget: eval.Budget{Memory: memory}})
		if err != nil {
			t.Fatal(err)
		}
		if got := told(note, []string{"y = "}); !slices.Equal(got, want) {
			t.Errorf("%d bytes: %q", memory, got)
		}
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
