package check

import "inkjoule/lang"

func cautions() []*Rule {
	return []*Rule{
		graded(lang.Caution, Rule{
			Name:   "unread-calculation",
			Title:  "A line of prose reads like a calculation",
			Sees:   "A line outside fenced code that is prose by its place and would be read whole as a statement. It is not checked.",
			Remedy: "Indent it by four columns after a blank line, or fence it if it is an illustration.",
			Wrong: Example{`
Field between the plates:

E = 12 kV / 3 mm = 4.0 kV/mm
`},
			Right: Example{`
Field between the plates:

    E = 12 kV / 3 mm = 4.0 kV/mm
`},
		}),
		graded(lang.Caution, Rule{
			Name:   "unit-hides-name",
			Title:  "A unit symbol is also a name of the note",
			Sees:   "A unit phrase such as `kV/d` in which a symbol after the slash is a name of the note too, and the reading as a unit makes little sense. It is read as a unit.",
			Remedy: "Leave a blank before the operator if the quantity is meant: `12 kV / d`.",
			Wrong: Example{`
    d = 3 mm
    A = d^2 = 9 mm^2
    E = 2*6 kV/d = __
`},
			Right: Example{`
    d = 3 mm
    A = d^2 = 9 mm^2
    E = 2*6 kV / d = 4.0 kV/mm
`},
		}),
		graded(lang.Caution, Rule{
			Name:   "several-roots",
			Title:  "An equation has several roots in its range",
			Sees:   "A `solve` whose sampled range holds more than one root. The least is taken.",
			Remedy: "Narrow the range to the root that is meant.",
			Wrong: Example{`
    x = solve(x^2 = 2 for x from -2 to 2) = -1.414
`},
			Right: Example{`
    x = solve(x^2 = 2 for x from 0 to 2) = 1.414
`},
		}),
		graded(lang.Caution, Rule{
			Name:   "outside-stated-range",
			Title:  "A function is used outside its domain",
			Sees:   "A call with an argument outside the range that the function's definition states by `for … from … to …`.",
			Remedy: "Show that the function holds there and widen its range, or stay inside.",
			Wrong: Example{`
    q(x) = 2*x for x from 0 to 10
    y = q(12) = 24
`},
			Right: Example{`
    q(x) = 2*x for x from 0 to 10
    y = q(8) = 16
`},
		}),
		graded(lang.Caution, Rule{
			Name:   "unused-waiver",
			Title:  "A waiver silences nothing",
			Sees:   "A `waive` statement whose rule does not fire where the waiver speaks of it, or which cannot be waived at all.",
			Remedy: "Take it out, so that it cannot hide a later mistake.",
			Wrong: Example{`
    a = 3 mm
    A = a^2 = 9 mm^2
    waive rms-peak-mix for A: "both are amplitudes"
`},
			Right: Example{`
    a = 3 mm
    A = a^2 = 9 mm^2
`},
		}),
	}
}

func advice() []*Rule {
	offByDefault := graded(lang.Advice, Rule{
		Name:   "input-without-source",
		Title:  "An input does not say where it comes from",
		Sees:   "A definition by a plain value without `per \"…\"`.",
		Remedy: "Add the source: `per \"drawing 12-441 rev C\"`.",
		Wrong: Example{`
    a = 3 mm
    A = a^2 = 9 mm^2
`},
		Right: Example{`
    a = 3 mm per "drawing 12-441 rev C"
    A = a^2 = 9 mm^2
`},
	})
	offByDefault.Off = true
	return []*Rule{
		offByDefault,
		graded(lang.Advice, Rule{
			Name:   "unused-definition",
			Title:  "A definition is not used",
			Sees:   "An input, medium, region, table or function that nothing in the note uses.",
			Remedy: "Take it out, or use it.",
			Wrong: Example{`
    a = 3 mm
    a_old = 4 mm
    A = a^2 = 9 mm^2
`},
			Right: Example{`
    a = 3 mm
    A = a^2 = 9 mm^2
`},
		}),
		graded(lang.Advice, Rule{
			Name:   "unasked-result",
			Title:  "A result is neither stated nor used",
			Sees:   "A computed value that the note does not state, ask for, use or judge.",
			Remedy: "State it (`= 9 mm^2`), or ask for it (`= __ mm^2`).",
			Wrong: Example{`
    a = 3 mm
    A = a^2
`},
			Right: Example{`
    a = 3 mm
    A = a^2 = 9 mm^2
`},
		}),
	}
}
