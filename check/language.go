package check

import (
	"slices"
	"strings"

	"inkjoule/lang"
)

// Language is the documentation of what the language itself finds, in the form
// of rules without code: lang reports these findings, here they are explained.
func Language() []*Rule {
	return slices.Concat(readingFaults(), nameFaults(), physicsFaults(), valueFaults(), verdicts(), cautions(), advice())
}

// firm is an error of syntax, dimension or arithmetic.
func firm(r Rule) *Rule {
	r.Severity, r.Firm = lang.Error, true
	return example(r)
}

// graded is a finding that may be waived and graded by the configuration.
func graded(s lang.Severity, r Rule) *Rule {
	r.Severity = s
	return example(r)
}

// example drops the line end that opens a raw string.
func example(r Rule) *Rule {
	r.Wrong.Note = strings.TrimPrefix(r.Wrong.Note, "\n")
	r.Right.Note = strings.TrimPrefix(r.Right.Note, "\n")
	return &r
}

func readingFaults() []*Rule {
	return []*Rule{
		firm(Rule{
			Name:   "syntax",
			Title:  "A statement cannot be read",
			Sees:   "A calculation line that is no statement. The mark stands where reading broke off; the message tells what was expected there. All other statements are read and checked; what this one would have defined is unknown and causes no further finding.",
			Remedy: "Write what the message offers, or set the line flush left if it is prose.",
			Wrong: Example{`
    U = 12 kV + = 15 kV
`},
			Right: Example{`
    U = 12 kV + 3 kV = 15 kV
`},
		}),
		firm(Rule{
			Name:   "unknown-unit",
			Title:  "A unit is not known",
			Sees:   "A symbol in a unit phrase that is neither an SI unit with or without a prefix, nor accepted beside the SI, nor customary in the trade.",
			Remedy: "Write the unit that is meant. If a quantity is meant, leave a blank before the operator: `20 V / r`.",
			Source: "BIPM, SI Brochure, 9th ed. (2019), tables 2 to 8; NIST SP 811 (2008), appendix B",
			Wrong: Example{`
    a = 3 milimetre
    A = a^2 = 9 mm^2
`},
			Right: Example{`
    a = 3 mm
    A = a^2 = 9 mm^2
`},
		}),
		firm(Rule{
			Name:   "unknown-kind",
			Title:  "A quantity kind is not known",
			Sees:   "Words after the comma of a definition that name no kind of quantity and no time statistic.",
			Remedy: "Write the name that ISO 80000 gives the quantity, or the everyday word of the trade; the message offers the nearest.",
			Source: "ISO 80000-3 to -6",
			Wrong: Example{`
    E, electric feild strength = 12 kV / 3 mm = 4.0 kV/mm
`},
			Right: Example{`
    E, electric field strength = 12 kV / 3 mm = 4.0 kV/mm
`},
		}),
		firm(Rule{
			Name:   "unknown-rule",
			Title:  "A waiver names no rule",
			Sees:   "A `waive` statement whose rule does not exist.",
			Remedy: "Write the rule's name as the finding shows it, or take the waiver out.",
			Wrong: Example{`
    a = 3 mm
    A = a^2 = 9 mm^2
    waive square-of-a-length for A: "an area is meant"
`},
			Right: Example{`
    a = 3 mm
    A = a^2 = 9 mm^2
`},
		}),
	}
}

func nameFaults() []*Rule {
	return []*Rule{
		firm(Rule{
			Name:   "unknown-name",
			Title:  "A name is not defined",
			Sees:   "A name that the note, the notes it uses and the constants do not define.",
			Remedy: "Define it, in this note or in one that it `uses`, or write the nearest name that the message offers.",
			Wrong: Example{`
    U = 12 kV
    E = U/gap = 4.0 kV/mm
`},
			Right: Example{`
    U = 12 kV
    gap = 3 mm
    E = U/gap = 4.0 kV/mm
`},
		}),
		firm(Rule{
			Name:   "unknown-function",
			Title:  "A function is not defined",
			Sees:   "A call of what is neither a function of the language nor one of the note.",
			Remedy: "Write the function that is meant, or define it: `NAME(x) = …`.",
			Wrong: Example{`
    k = squareroot(9) = 3
`},
			Right: Example{`
    k = sqrt(9) = 3
`},
		}),
		firm(Rule{
			Name:   "unknown-property",
			Title:  "A medium, region or table has no such member",
			Sees:   "A name after the point that the medium, the region or the table does not have and that cannot be derived (eps from eps_r, sigma from rho).",
			Remedy: "Add the property to the medium, with its source, or write the one that is meant.",
			Wrong: Example{`
    medium oil: linear, isotropic
        eps_r = 2.2
    k = 1/oil.eps_rel = 0.455
    m = 2*oil.eps_r = 4.4
`},
			Right: Example{`
    medium oil: linear, isotropic
        eps_r = 2.2
    k = 1/oil.eps_r = 0.455
    m = 2*oil.eps_r = 4.4
`},
		}),
		firm(Rule{
			Name:   "unknown-note",
			Title:  "A note that is used cannot be found",
			Sees:   "A `uses` statement whose note does not exist, cannot be read, or lies outside the folder of the work.",
			Remedy: "Write the path relative to this note, or `handbook/…` for the built-in media.",
			Wrong: Example{`
    uses "no-such-note"
`},
			Right: Example{`
    uses "handbook/gases"
`},
		}),
		firm(Rule{
			Name:   "name-defined-twice",
			Title:  "A name is defined twice",
			Sees:   "Two definitions of one name. A Greek letter and its English name are one name, and so are x₀ and x_0.",
			Remedy: "Rename one of them.",
			Wrong: Example{`
    a = 3 mm
    a = 4 mm
    A = a*a = __ mm^2
`},
			Right: Example{`
    a = 3 mm
    b = 4 mm
    A = a*b = 12 mm^2
`},
		}),
		firm(Rule{
			Name:   "constant-redefined",
			Title:  "A constant of nature is defined anew",
			Sees:   "A definition of eps_0, mu_0, c_0, Z_0, q_e, m_e, m_p, k_B, N_A, h_planck, hbar, sigma_SB, g_n, pi or j.",
			Remedy: "Take the definition out, or give the quantity a name of its own.",
			Source: "CODATA recommended values 2022",
			Wrong: Example{`
    c_0 = 3e8 m/s
    f = 50 MHz
    lambda = c_0/f = 6.00 m
`},
			Right: Example{`
    f = 50 MHz
    lambda = c_0/f = 6.00 m
`},
		}),
		firm(Rule{
			Name:   "cyclic-definition",
			Title:  "Definitions go round in a circle",
			Sees:   "A definition that needs its own value, through others or by itself. The message lists the circle.",
			Remedy: "Give one of the names a value, or solve the equation: `x = solve(LEFT = RIGHT for x from A to B)`.",
			Wrong: Example{`
    a = b + 1 mm
    b = a - 1 mm
`},
			Right: Example{`
    a = b + 1 mm = 3 mm
    b = 2 mm
`},
		}),
	}
}

func physicsFaults() []*Rule {
	return []*Rule{
		firm(Rule{
			Name:    "dimension-mismatch",
			Title:   "Dimensions do not agree",
			Sees:    "Quantities of different dimension that are added, subtracted, compared or equated, and a value whose dimension is not that of its declared kind or of its stated unit.",
			Formula: "Only quantities of one dimension add: [a + b] = [a] = [b].",
			Remedy:  "Look for a factor that is missing or written twice; the message gives both dimensions.",
			Source:  "ISO 80000-1, 4.2 and 5; BIPM, SI Brochure, 9th ed., 2.3.3",
			Wrong: Example{`
    U = 12 kV
    a = 3 mm
    s = U + a = __
`},
			Right: Example{`
    U = 12 kV
    a = 3 mm
    E = U/a = 4.0 kV/mm
`},
		}),
		firm(Rule{
			Name:   "shape-mix",
			Title:  "A scalar, a vector and a tensor are mixed",
			Sees:   "A sum or comparison of a vector with a scalar, a product of two vectors by `*`, a limit on a vector instead of its magnitude, and the like. The message prints how the expression was read.",
			Remedy: "Take the magnitude `|E|`, the dot product `·`, the cross product `×` or a component `E.x`.",
			Source: "ISO 80000-2, clause 18",
			Wrong: Example{`
    E = (1, 2, 2) kV/m
    E_abs = E + 1 kV/m = __
`},
			Right: Example{`
    E = (1, 2, 2) kV/m
    E_abs = |E| = 3 kV/m
`},
		}),
		firm(Rule{
			Name:    "dimensioned-argument",
			Title:   "A function of numbers is given a quantity with a dimension",
			Sees:    "exp, ln, log10, a sine, a power with an exponent that is no constant, of something that has a dimension.",
			Formula: "exp x = 1 + x + x²/2 + …: the terms add only if x is a number.",
			Remedy:  "Divide by a reference: `ln(b/a)`.",
			Source:  "NIST SP 811 (2008), 7.1; ISO 80000-1, 5",
			Wrong: Example{`
    a = 5 mm
    b = 50 mm
    k = ln(b) - ln(a) = __
`},
			Right: Example{`
    a = 5 mm
    b = 50 mm
    k = ln(b/a) = 2.303
`},
		}),
		firm(Rule{
			Name:    "temperature-offset",
			Title:   "Two temperatures on the Celsius scale are added, or a difference gets the offset",
			Sees:    "A sum of two absolute Celsius temperatures, an absolute Celsius temperature where a difference or a ratio is formed, 273.15 on a difference.",
			Formula: "T/K = t/°C + 273.15, and ΔT/K = Δt/°C.",
			Remedy:  "Write the difference in kelvin: `25 °C + 5 K`.",
			Source:  "NIST SP 811 (2008), 4.2.1.1 and 8.5",
			Wrong: Example{`
    T = 25 °C + 5 °C = __ °C
`},
			Right: Example{`
    T = 25 °C + 5 K = 30 °C
`},
		}),
	}
}
