// Package lang reads, resolves and evaluates calculation notes.
//
// # Pipeline
//
//	text ─ Read ─► statements and prose, each statement a tree with its own spans
//	     ─ declare, link, order ─► cells with their needs, in order of evaluation
//	     ─ elaborate ─► what every node carries (Facts), and code that computes it
//	     ─ eval ─► values with uncertainty
//	     ══► a frozen Note: symbols, uses, judgements, faults, normal forms
//
// No stage changes the result of an earlier one. Everything that is wrong with a
// note is a Fault; an error means cancelled or unreadable. What could not be
// known has Facts.Known == false and absorbs every further finding, so that a
// cause is told once.
//
// A cell is the smallest thing that is analysed as a whole. Its work is kept for
// the next analysis of an edited note as long as its tree and every cell that it
// needs are the same; whatever is built on it (gradients, normal forms, what
// rules have found) is kept with it. Incremental analysis gives what a fresh one
// gives; a property test holds that.
//
// # The language's silent corners
//
// The note language is described for its users elsewhere. This is what was
// decided where that description says nothing.
//
// Text. The byte order mark belongs to the first line and is kept. A line of
// calculation that begins with # is a remark of its own and belongs to no
// statement. A deeper line that opens with `NAME =` below a definition is a
// fault, and is read as a statement of its own so that its name is not lost.
// Between two properties of a medium, and between two rows of a table, blank
// lines may stand.
//
// Names. A subscript digit is `_` and the digit, so ε₀ is eps_0. Parameters,
// bound variables and coordinates of a region hide names of the note silently.
// The left side of a definition may have the name of a property: properties and
// columns live behind their owner's point, and inside a medium or a table the
// siblings come first.
//
// Numbers. `12.0(1)` has its standard uncertainty in units of the last digit,
// `12.0(0.1)` in the unit of the number. `± 5 %` is of the value, unless the
// value is itself in per cent: then the note has to say whether it means points.
// Constants (CODATA 2022) are used with their value alone: their uncertainty,
// of 1.6e-10 relative where there is one, is not propagated.
//
// Units. A unit of dimension one that is written (`1`, `%`, `°`) is shown; a
// value without one is a plain number. The unit in which a result is shown is
// that of the last member of its chain; else the SI unit of its kind with the
// prefix that gives 1 to 999; else the coherent unit of its dimension. A level
// unit needs a kind that tells whether it counts a power or a field: `P, power =
// 30 dBm`, `G, power gain = 3 dB`; in a relation the kind of what it is compared
// with tells it. Numbers that are nothing but rounding beside the
// largest component of a vector or tensor are shown as 0.
//
// Temperatures. °C alone is absolute: two of them can't be added, and their
// difference, or that to a quantity declared as a temperature, is a temperature
// rise in kelvin. A tolerance in °C is a difference, and so is a literal or a
// stated result in °C of a quantity declared as a temperature rise. A thermal
// resistance times a power, and a heating rate times a time, is a temperature
// rise. In a product or a quotient a temperature in °C counts in kelvin.
//
// Definitions. The first member decides; every further one is verified. A stated
// result agrees if it is the computed value rounded to the digits written, with
// ties in either direction (2.5 may be stated as 2 or 3) and 1e-9 relative slack.
// In a vector, a tensor or a complex number every component is judged by the
// finest digit written in any. A stated spread is judged by its own digits. A
// chain of equals may state several results in several units.
//
// Ranges. `for x from A to B` on a function is its domain; several pieces
// together cover the union of their ranges, and where two touch the earlier one
// holds at the common end. On a plain value or a property it is a validity range
// for the quantity of that name: it makes no dependency, and is compared with the
// note's quantity of that name, or with `PROPERTY at NAME = VALUE` where that is
// written. That a value was used outside is a finding of check/rules.
//
// Integrals. Of several `for` clauses the first is the innermost, so that the
// bounds of an earlier one may use the variables of a later one. The element of a
// region is included. `over R.boundary` binds the outward normal n. An integral
// along a table replaces each of its columns by its interpolant at the variable.
// Divergence and failure to converge are two findings, and neither gives a number.
//
// Equations. solve looks for every sign change on a sampled range. No root is the
// error no-root; more than one is the caution several-roots, and the least is
// taken. Its uncertainty follows from the implicit function.
//
// Tables. `table NAME from "file.csv"` reads columns from a CSV file beside the
// note: the first row has heads `NAME [UNIT]` or `NAME/UNIT`, cells are numbers
// with a decimal point, quotes follow RFC 4180. The file obeys the wall of the
// workspace. Interpolation is a monotone cubic (Fritsch and Butland), or straight
// for `table NAME, linear:`; it needs one of the two columns to be monotone, and
// reads both ways where both are.
//
// Uncertainty. Propagation is first order by forward differentiation with every
// uncertain literal as one input, so what shares an input is correlated in full.
// The worst-case bounds are first order too: the value plus and minus the sum of
// |derivative| times limit, the limit being that of a tolerance as written and
// twice a standard uncertainty. `lower(x)` and `upper(x)` are these bounds as
// plain numbers. A criterion that holds for the value and not at the bounds is
// the caution criterion-within-uncertainty.
//
// Margins. The margin of `a < b` is b/a − 1, of `a > b` it is a/b − 1; a chain has
// the margin of its tightest pair. `<<` and `>>` ask for a factor of ten. `check a =
// b` is judged by the digits written on its right.
//
// Tensors. `diag(a, b, c)`, `uniaxial(across, along, axis)` and `tensor(xx, xy, xz,
// yx, …, zz)` with nine numbers, row by row. `rotate(T, axis, angle)` turns the
// tensor, not the frame. Components are D.x and eps.xz, in the frame in which the
// tensor was written.
//
// Harmonic notes. The convention is e^{+jωt} and eps = eps′ − j·eps″. `eps_c` is the
// permittivity with the loss that tan_delta or sigma adds; `eps` and `eps_r` are as
// written. `·` does not conjugate; |x| of a complex vector is √(x·conj x).
//
// References. `uses "PATH"` takes the names of another note, `uses "PATH" as NAME`
// puts them behind NAME and a point. Paths are relative to the note, and end where
// the workspace ends: the nearest folder upward with a repository or a
// configuration. Circles are refused at the statement that closes them. What is
// wrong in the other note is told there, and at each use of a name that has no
// value for it. A note that computes nothing (inputs, media, tables, functions) is
// a library: that nothing in it is used is no advice.
//
// Waivers. A waiver speaks of one rule, for one name or for the whole note. It is
// no use of that name. Errors of syntax, dimension and arithmetic can't be waived.
//
// Layout. Tidy changes blanks alone: statements start in the fifth column,
// properties in the ninth; `=`, `for` and `per` of neighbouring lines are brought to
// the rightmost column at which one of them stands already, so that a column that
// the author chose for the whole note is kept; a head that is more than 24 columns
// longer than its neighbours stands out instead.
//
// # Words that rules ask for
//
// A fact that a rule needs is a word of the definition: a kind, a qualifier, an
// adjective, a property. All of them are completed in the editor.
//
// Words before the kind, in any order with the qualifier: a waveform (sinusoidal,
// square, triangular, pulsed, modulated, distorted, random, impulse, elliptical)
// and a coherence (coherent, incoherent, worst-case); on a result the coherence
// says what was assumed.
//
// Alternating and pulsed quantities: crest factor; line-to-line and line-to-earth
// voltage (without a statistic it is an rms value), earth fault factor;
// withstand, breakdown and inception voltage, inception field strength; incident
// electric field strength, which is that before the body is there; peak envelope
// power, pulse duration, pulse repetition frequency, transient thermal
// impedance; electromagnetic energy, the electric and the magnetic one together.
//
// Curved media: rated voltage; differential (small-signal, incremental),
// energy-equivalent and charge-equivalent capacitance; incremental inductance;
// initial, amplitude, incremental, reversible, effective and complex
// permeability; saturation flux density (the kind of B_sat), flux density at the
// knee, saturation current, remanent flux density and polarization, energy
// product, recoverable energy, air gap. Of two tables with one tip, the one with
// the greater field at the same flux is the increasing branch; with one table,
// rows with falling field are the decreasing branch. A property that is constant
// over a range from zero is a linear segment.
//
// Crystals: a medium is a frame. A medium whose tensor is `rotate(other.eps_r, …)`
// is the same crystal in another frame; `E in wafer` puts E into the frame of
// wafer; a property of the kind optic axis is written in the frame of the note.
// Impermittivity, absolute and relative, is the inverse of the permittivity.
// Media may be declared piezoelectric; constant-stress (free) and
// constant-strain (clamped) relative permittivity, mechanical resonance
// frequency and coupling factor belong to that.
//
// Charges: external electric potential (others make it), interaction energy,
// permanent and induced electric dipole moment, polarizability; capacitance
// coefficient and partial capacitance of several conductors; vacuum energy
// density (of the field alone); internal energy (with the heat that flows at
// constant temperature) beside stored energy.
//
// Losses: polarization loss factor and direct-current conductivity are parts; a
// loss factor or a conductivity without such a word is the whole at its
// frequency. A medium may be active instead of lossless or lossy.
//
// # Budget
//
// One evaluation takes at most the steps, the time and the memory of Options.Budget;
// one that takes more is the finding over-budget, and what is built on it is
// unknown. All evaluations of a note together take at most five times that time.
// All other statements keep their values. References are followed 32
// deep, expressions are nested 200 deep, and of a note's statements the first
// 200,000 are read.
package lang
