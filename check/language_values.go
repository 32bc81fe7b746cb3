package check

import "inkjoule/lang"

func valueFaults() []*Rule {
	return []*Rule{
		firm(Rule{
			Name:    "stated-result-differs",
			Title:   "A stated result is not what the formula gives",
			Sees:    "A number that stands as the result of a formula and is not the computed value rounded to the digits written.",
			Formula: "|stated − computed| ≤ half a unit of the last digit written.",
			Remedy:  "Correct the result, or find what is wrong with the formula or an input: the factor between the two is a hint (2: a half; 1.41: peak and rms; 6.28: frequency and angular frequency; 1000: a prefix).",
			Source:  "ISO 80000-1, annex B (rounding)",
			Wrong: Example{`
    U = 12 kV
    a = 3 mm
    E = U/a = 4.5 kV/mm
`},
			Right: Example{`
    U = 12 kV
    a = 3 mm
    E = U/a = 4.0 kV/mm
`},
		}),
		firm(Rule{
			Name:    "substituted-member-differs",
			Title:   "The numbers put in do not give the formula's value",
			Sees:    "A further member of a chain of equals, no plain number, whose value is off the first by more than 0.5 %.",
			Formula: "a = f(x) = f(numbers) = result: each sign of equality is a claim.",
			Remedy:  "Put in the numbers that the names stand for.",
			Wrong: Example{`
    U = 12 kV
    a = 3 mm
    E = U/a = 12 kV / 5 mm = 4.0 kV/mm
`},
			Right: Example{`
    U = 12 kV
    a = 3 mm
    E = U/a = 12 kV / 3 mm = 4.0 kV/mm
`},
		}),
		firm(Rule{
			Name:   "integral-diverges",
			Title:  "An integral has no finite value",
			Sees:   "An integral whose value grows without bound, at a point where the integrand is infinite or towards an infinite limit.",
			Remedy: "Begin at a physical radius, or take a difference that is finite.",
			Wrong: Example{`
    k = integral(1/x for x from 0 to 1) = __
`},
			Right: Example{`
    k = integral(1/x for x from 1 to 2) = 0.6931
`},
		}),
		firm(Rule{
			Name:   "integral-not-converged",
			Title:  "An integral could not be computed to its accuracy",
			Sees:   "An integral that does not reach a relative error of 1e-9 within its budget. No number is shown rather than a doubtful one.",
			Remedy: "Split it where the integrand jumps or swings, or substitute a smoother variable.",
			Wrong: Example{`
    k = integral(sin(1/x)/x for x from 0 to 1) = __
`},
			Right: Example{`
    k = integral(sin(u)/u for u from 1 to 10) = 0.7123
`},
		}),
		firm(Rule{
			Name:   "no-root",
			Title:  "An equation has no solution in the range",
			Sees:   "A `solve` whose two sides do not meet between the bounds.",
			Remedy: "Widen the range, or look at the equation.",
			Wrong: Example{`
    x_1 = solve(x^2 = -1 for x from 0 to 2) = __
`},
			Right: Example{`
    x_1 = solve(x^2 = 2 for x from 0 to 2) = 1.414
`},
		}),
		firm(Rule{
			Name:   "table-outside-rows",
			Title:  "A table is asked outside its rows",
			Sees:   "A lookup at a value below the first or above the last row, or a cell that the table does not have.",
			Remedy: "Extend the table with measured rows; nothing is extrapolated.",
			Wrong: Example{`
    table bh: H [A/m], B [T]
        0    0
        100  0.30
        200  0.36
    B_1 = bh.B at H = 300 A/m
    k = B_1/(1 T) = __
`},
			Right: Example{`
    table bh: H [A/m], B [T]
        0    0
        100  0.30
        200  0.36
    B_1 = bh.B at H = 100 A/m
    k = B_1/(1 T) = 0.300
`},
		}),
		firm(Rule{
			Name:   "division-by-zero",
			Title:  "A quotient has zero below the line",
			Sees:   "A division by a value that is zero.",
			Remedy: "Look at the inputs: two that should differ are equal, or one is missing.",
			Wrong: Example{`
    a = 3 mm
    b = 3 mm
    k = a/(a - b) = __
`},
			Right: Example{`
    a = 3 mm
    b = 1 mm
    k = a/(a - b) = 1.5
`},
		}),
		firm(Rule{
			Name:   "over-budget",
			Title:  "A value takes too long to compute",
			Sees:   "A sum, integral or solution that exceeds the steps, the time or the memory that one note may use.",
			Remedy: "Use fewer terms, or a closed form.",
			Wrong: Example{`
    s = sum(1/n^2 for n from 1 to 1e12) = __
`},
			Right: Example{`
    s = sum(1/n^2 for n from 1 to 1000) = 1.6439
`},
		}),
	}
}

func verdicts() []*Rule {
	return []*Rule{
		graded(lang.Error, Rule{
			Name:   "criterion-fails",
			Title:  "An acceptance criterion is not met",
			Sees:   "A `criterion` whose relation does not hold; the message gives the margin.",
			Remedy: "Change the design, or waive the criterion with the reason for which the departure was accepted.",
			Wrong: Example{`
    U = 12 kV
    criterion U <= 10 kV per "nameplate"
`},
			Right: Example{`
    U = 8 kV
    criterion U <= 10 kV per "nameplate"
`},
		}),
		firm(Rule{
			Name:   "check-fails",
			Title:  "A check does not hold",
			Sees:   "A `check` whose relation is not true. A sign of equality is judged by the digits written.",
			Remedy: "Correct the statement: it claims what the note does not give.",
			Wrong: Example{`
    E = 12 kV / 3 mm
    check E = 4.5 kV/mm
`},
			Right: Example{`
    E = 12 kV / 3 mm
    check E = 4.0 kV/mm
`},
		}),
		graded(lang.Caution, Rule{
			Name:   "criterion-within-uncertainty",
			Title:  "A criterion holds for the value and not for its bounds",
			Sees:   "A `criterion` that is met by the value and missed within its uncertainty: at a tolerance limit, or at two standard uncertainties.",
			Remedy: "Narrow the inputs that contribute most, or show that the worst case cannot occur.",
			Source: "JCGM 106:2012, 8 (guarded acceptance)",
			Wrong: Example{`
    U = 9.8 kV ± 0.5 kV
    criterion U <= 10 kV per "nameplate"
`},
			Right: Example{`
    U = 9.0 kV ± 0.5 kV
    criterion U <= 10 kV per "nameplate"
`},
		}),
		graded(lang.Caution, Rule{
			Name:   "assumption-fails",
			Title:  "An assumption does not hold",
			Sees:   "An `assume` whose relation is not true; `<<` asks for a factor of ten.",
			Remedy: "Use a formula that does not need the assumption, or change the design.",
			Wrong: Example{`
    a = 3 mm
    R = 10 mm
    assume a << R
`},
			Right: Example{`
    a = 3 mm
    R = 40 mm
    assume a << R
`},
		}),
	}
}
