package rules

import (
	"fmt"
	"slices"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// TorqueEnergyKind finds torques that are taken for energies, and the reverse.
func (Book) TorqueEnergyKind() check.Rule {
	return check.Rule{
		Name:     "torque-energy-kind",
		Severity: lang.Error,
		Title:    "A torque and an energy are taken for each other, though both have the dimension N·m",
		Sees: "A torque declared as what its formula shows to be an energy, or the reverse; a torque added to or compared with an energy; a torque stated in J or an energy in N·m; " +
			"a power from a torque and a rotational frequency in Hz (the 2π is missing). A caution where the kind of the formula is only inferred.",
		Silent:  "For T·θ with an angle, ∂W/∂θ, J/rad, and wherever either kind is unknown.",
		Formula: "T = −∂W/∂θ at fixed charge or flux = +∂W′/∂θ at fixed voltage or current; W = ∫T dθ; P = Tω = 2πfT.",
		Remedy:  "Differentiate the energy with respect to the angle, and state torques in N·m.",
		Source:  "BIPM, SI Brochure, 9th ed., 2.3.4 (the newton metre for torque); ISO 80000-4:2019, item 4-12.1 (from memory)",
		Wrong: check.Example{Note: `    W, energy = 0.8 J
    T, torque = W = 0.8 N·m
`},
		Right: check.Example{Note: `    Wc(x), coenergy = 0.8 J*cos(2*x) for x from 0 rad to 3 rad
    T, torque = derivative(Wc(x) for x at 30°) = -1.39 N·m
`},
		Run: torqueEnergy,
	}
}

func torqueEnergy(p *check.Pass) error {
	for _, s := range p.Note.Symbols {
		if s.Def != nil && s.Stmt != nil && len(s.Def.Members) > 0 && len(s.Def.Params) == 0 {
			torqueDeclared(p, s)
			torqueUnit(p, s)
			rotaryPower(p, s)
		}
	}
	for _, st := range p.Note.Script.Stmts {
		lang.Walk(st.Tree, func(t lang.Tree) bool { torqueOperands(p, st, t); return true })
	}
	return nil
}

// torqueAndEnergy tells whether one kind is a torque and the other an energy.
func torqueAndEnergy(a, b kind.ID) bool {
	return a.Is(kind.Torque) && isEnergyKind(b) || b.Is(kind.Torque) && isEnergyKind(a)
}

func isEnergyKind(k kind.ID) bool {
	return k.Is(kind.Energy) || k.Is(kind.Coenergy) || k.Is(kind.Heat)
}

// torqueDeclared compares the declared kind with that of the formula.
func torqueDeclared(p *check.Pass, s *lang.Symbol) {
	x := s.Def.Members[0]
	found, ok := p.Note.FactsOf(s.Stmt, x)
	if !ok || s.Facts.KindBy != lang.Declared || found.Kind == 0 || !torqueAndEnergy(s.Facts.Kind, found.Kind) {
		return
	}
	f := lang.Fault{
		Span:    s.Stmt.Abs(x),
		Message: fmt.Sprintf("%s is declared as %s, and its formula gives %s", s.Name, withArticle(s.Facts.Kind.String()), withArticle(found.Kind.String())),
		Detail:  "A torque is the derivative of an energy by an angle: the numbers agree only for an angle of 1 rad.",
	}
	if found.KindBy != lang.Declared && onMoment(p.Note, s) {
		return
	}
	if found.KindBy != lang.Declared {
		f.Severity = p.Lowered()
		f.Detail += " If the formula is what is meant, declare the kind of the name that it starts from."
	}
	p.Report(f)
}

// onMoment reports m·B or p·E, which is the torque on a dipole across the field,
// and anything with the sine of an angle.
func onMoment(n *lang.Note, s *lang.Symbol) bool {
	t, single := n.Normal(s, momentsStay).Single()
	return single && slices.ContainsFunc(t.Factors, func(f lang.Factor) bool { return isMoment(f.Facts) || f.Call == "sin" })
}

// torqueUnit finds a torque stated in J, an energy in N·m.
func torqueUnit(p *check.Pass, s *lang.Symbol) {
	for _, m := range s.Def.Members {
		phrase := lang.UnitOf(m)
		if phrase == nil || s.Facts.KindBy != lang.Declared {
			continue
		}
		wrong := ""
		switch inJoule := hasSymbol(phrase.Text, "J"); {
		case s.Facts.Kind.Is(kind.Torque) && inJoule && !hasSymbol(phrase.Text, "rad"):
			wrong = "a torque is stated in N·m (or J/rad)"
		case isEnergyKind(s.Facts.Kind) && !inJoule && hasSymbol(phrase.Text, "N"):
			wrong = "an energy is stated in J"
		default:
			continue
		}
		p.Report(lang.Fault{
			Span:    phrase.Span.Shift(s.Stmt.At),
			Message: fmt.Sprintf("%s is %s in %s: %s", s.Name, withArticle(s.Facts.Kind.String()), phrase.Text, wrong),
			Detail:  "The SI keeps the two units apart, so that a reader can tell which is meant.",
		})
		return
	}
}

// hasSymbol reports a unit phrase with the symbol in it, prefixed or not.
func hasSymbol(phrase, symbol string) bool {
	for _, part := range unitParts(phrase) {
		if e, ok := unit.Info(part); ok && e.Symbol == symbol || part == symbol {
			return true
		}
		if n := len(part) - len(symbol); n > 0 && part[n:] == symbol {
			if _, err := unit.Parse(part); err == nil && symbol != "rad" {
				return true
			}
		}
	}
	return false
}

// rotaryPower finds P = T·f.
func rotaryPower(p *check.Pass, s *lang.Symbol) {
	if !s.Facts.Kind.Is(kind.Power) || s.Facts.KindBy != lang.Declared {
		return
	}
	t, single := p.Note.Normal(s, lang.UpToDeclared).Single()
	if !single || t.Pi != 0 {
		return
	}
	torque, cycles := false, false
	for _, f := range t.Factors {
		torque = torque || f.Facts.Kind.Is(kind.Torque) && f.Exp == unit.Whole(1)
		c, _ := countsOf(f.Facts.Dim)
		cycles = cycles || c && f.Exp == unit.Whole(1)
	}
	if torque && cycles {
		p.Report(lang.Fault{
			Span:    s.Stmt.Abs(s.Def.Members[0]),
			Message: fmt.Sprintf("%s is a torque times a rotational frequency in Hz: it is %s times too small", s.Name, perCycle),
			Detail:  "The power of a torque is T·ω: multiply by 2*pi.",
		})
	}
}

// torqueOperands finds sums and comparisons of a torque with an energy.
func torqueOperands(p *check.Pass, s *lang.Stmt, t lang.Tree) {
	tell := func(x, y lang.Expr, verb string) {
		a, ok := p.Note.FactsOf(s, x)
		b, ok2 := p.Note.FactsOf(s, y)
		if !ok || !ok2 || !torqueAndEnergy(a.Kind, b.Kind) {
			return
		}
		f := lang.Fault{
			Span:    s.Abs(t),
			Message: fmt.Sprintf("%s is %s %s", withArticle(a.Kind.String()), verb, withArticle(b.Kind.String())),
			Detail:  "Both have the dimension N·m and mean different things: multiply the torque by an angle first.",
		}
		if a.KindBy != lang.Declared || b.KindBy != lang.Declared {
			f.Severity = p.Lowered()
		}
		p.Report(f)
	}
	switch t := t.(type) {
	case *lang.Binary:
		if t.Op == lang.OpAdd || t.Op == lang.OpSub {
			tell(t.X, t.Y, "added to")
		}
	case *lang.Relation:
		for i := range t.Ops {
			tell(t.Terms[i], t.Terms[i+1], "compared with")
		}
	}
}
