package rules

import (
	"fmt"

	"inkjoule/lang"
	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file judges the sign of j in formulas: of circuit elements, of what adds
// a loss to a permittivity, and of the exponents of waves.

// forms looks at the formula of a name.
func (v *conventions) forms(s *lang.Symbol) {
	if s.Def == nil || s.Stmt == nil || s.Input || len(s.Def.Members) == 0 || s.Path != "" {
		return
	}
	x := s.Def.Members[0]
	if !mentionsJ(x) {
		return
	}
	if s.Role == lang.RoleFunction || !s.Known {
		v.lossTerm(s, x)
	}
	v.element(s, x)
	if word, _ := v.p.Note.Regime(s); word == "harmonic" {
		v.waves(s, v.p.Note.Within(s, x, lang.UpToDeclared))
	}
}

// mentionsJ reports an expression in which the imaginary unit is written.
func mentionsJ(x lang.Expr) bool {
	found := false
	lang.Walk(x, func(t lang.Tree) bool {
		n, ok := t.(*lang.Name)
		found = found || ok && n.Text == "j"
		return !found
	})
	return found
}

// turnsOf counts the quarter turns of a term's phase, from its sign and from j.
func quarterTurns(t lang.Term) int {
	turns := 0
	if t.Coef.Sign() < 0 {
		turns = 2
	}
	for _, f := range t.Factors {
		if n, whole := f.Exp.Int(); f.Key == "j" && whole {
			turns += n
		}
	}
	return ((turns % 4) + 4) % 4
}

// lossTerm reports +jσ/ω or +j·tan δ in the formula of a permittivity of which
// no value is known: of a function.
func (v *conventions) lossTerm(s *lang.Symbol, x lang.Expr) {
	if !s.Facts.Kind.Is(kind.Permittivity) && !s.Facts.Kind.Is(kind.RelativePermittivity) || activeOwner(v.p.Note, s) || writesConj(x) {
		return
	}
	for _, t := range terms(v.p.Note.Within(s, x, lang.UpToDeclared)) {
		loss := false
		for _, f := range t.Factors {
			loss = loss || isConduction(f) || roleOf(f.Facts) == roleLoss && f.Exp == unit.Whole(1)
		}
		if loss && quarterTurns(t) == 1 {
			f := lang.Fault{
				Span:    s.Stmt.Abs(x),
				Message: fmt.Sprintf("the loss enters %s with a positive imaginary part: with e^{+jωt} a passive medium has a negative one", ownedName(s)),
				Detail:  "A conductivity enters as ε − jσ/ω, a loss factor as ε·(1 − j·tan δ).",
			}
			if !v.harmonic {
				f.Severity = v.p.Lowered()
			}
			v.p.Report(f)
			return
		}
	}
}

// element reports j/(ωC) and −jωL among the terms of an impedance, −jωC and
// j/(ωL) among those of an admittance.
func (v *conventions) element(s *lang.Symbol, x lang.Expr) {
	impedance := isOf(s.Facts, kind.Impedance)
	if !impedance && !isOf(s.Facts, kind.Admittance) || s.Facts.Shape != eval.Scalar || writesConj(x) {
		return
	}
	for _, t := range terms(v.p.Note.Within(s, x, lang.UpToDeclared)) {
		name, power := circuitElement(t)
		if name == "" {
			continue
		}
		want := 1 // jωL, jωC
		if power < 0 {
			want = 3 // 1/(jωC), 1/(jωL)
		}
		if quarterTurns(t) == want+2 || quarterTurns(t) == want-2 {
			v.p.Report(lang.Fault{
				Severity: v.p.Lowered(),
				Span:     s.Stmt.Abs(x),
				Message:  fmt.Sprintf("%s has the reactance of %s with the sign of the convention e^{−iωt}", s.Name, name),
				Detail:   "With e^{+jωt} an inductance has jωL and a capacitance 1/(jωC) = −j/(ωC). If the conjugate is meant, for a match, write `conj(…)`.",
			})
			return
		}
	}
}

// circuitElement reads a term as the reactance or susceptance of one element: which
// one, and with what power of the frequency; "" for others.
func circuitElement(t lang.Term) (name string, power int) {
	j := false
	for _, f := range t.Factors {
		switch n, whole := f.Exp.Int(); {
		case !whole:
			return "", 0
		case f.Key == "j":
			j = n%2 != 0
		case isOf(f.Facts, kind.Frequency):
			power = n
		case isOf(f.Facts, kind.Inductance), isOf(f.Facts, kind.Capacitance):
			if name != "" {
				return "", 0
			}
			if name = "an inductance"; isOf(f.Facts, kind.Capacitance) {
				name = "a capacitance"
			}
		case f.Facts.Known && f.Facts.Dim.IsOne() && f.Call == "":
		default:
			return "", 0
		}
	}
	if !j || power != 1 && power != -1 {
		return "", 0
	}
	return name, power
}

// waves looks at the exponents in each term of a form, and within its calls.
func (v *conventions) waves(s *lang.Symbol, f *lang.Form) {
	for _, t := range terms(f) {
		var exponents []lang.Term
		for _, x := range t.Factors {
			switch n, whole := x.Exp.Int(); {
			case x.Call != "exp":
				v.waves(s, x.Inside)
			case whole && n == 1:
				exponents = append(exponents, terms(x.Inside)...)
			}
		}
		v.exponent(s, exponents)
	}
}

// exponent reports the exponent of a wave that grows in the direction in which
// it travels, and one with −jωt.
func (v *conventions) exponent(s *lang.Symbol, sum []lang.Term) {
	phase, decay := 0, 0
	for _, t := range sum {
		turns := quarterTurns(t)
		switch exponentOf(t) {
		case kind.Time:
			if turns == 3 {
				v.p.Report(lang.Fault{
					Severity: v.p.Lowered(), Span: s.Stmt.Abs(s.Def.Members[0]),
					Message: "the time factor e^{−jωt} stands in a harmonic note, whose convention is e^{+jωt}",
					Detail:  "Write the conjugate of the whole expression, its properties included.",
				})
				return
			}
		case kind.PhaseCoefficient:
			phase = turns
		case kind.AttenuationCoefficient:
			decay = turns
			if decay == 0 {
				decay = 4
			}
		}
	}
	// −αz goes with −jβz (2 with 3), +αz with +jβz (4 with 1).
	if phase != 0 && decay != 0 && (phase == 3) != (decay == 2) {
		v.p.Report(lang.Fault{
			Span:    s.Stmt.Abs(s.Def.Members[0]),
			Message: "with e^{+jωt} this wave grows in the direction in which it travels: the attenuation and the phase have opposite signs",
			Detail:  "Write −(α + j·β)·z for a wave toward +z, or `exp(-γ*z)`.",
		})
	}
}

// exponentOf tells what a term of an exponent is: Time for j·ω·t,
// PhaseCoefficient for j·β·z, AttenuationCoefficient for α·z; 0 for others.
func exponentOf(t lang.Term) kind.ID {
	var found kind.ID
	imaginary, timed, cyclic := false, false, false
	for _, f := range t.Factors {
		k := f.Facts.Kind
		switch {
		case f.Key == "j":
			imaginary = true
		case f.Facts.Complex:
			return 0
		case k.Is(kind.PhaseCoefficient), k.Is(kind.AngularWavenumber):
			found = kind.PhaseCoefficient
		case k.Is(kind.AttenuationCoefficient):
			found = kind.AttenuationCoefficient
		}
		timed = timed || isOf(f.Facts, kind.Time) && f.Exp == unit.Whole(1)
		cyclic = cyclic || isOf(f.Facts, kind.Frequency) && f.Exp == unit.Whole(1)
	}
	switch {
	case timed && cyclic:
		found = kind.Time
	case cyclic && found == 0:
		found = kind.PhaseCoefficient // ω·z/c
	}
	if imaginary != (found == kind.Time || found == kind.PhaseCoefficient) {
		return 0
	}
	return found
}
