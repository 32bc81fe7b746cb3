package rules

import (
	"fmt"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// ArealVolumetricPower explains a power per area, per volume, per mass or per
// length that is taken for another of them.
func (Book) ArealVolumetricPower() check.Rule {
	return check.Rule{
		Name:     "areal-volumetric-power",
		Severity: lang.Error,
		Title:    "A power per area, per volume, per mass or per length is taken for another of them",
		Sees:     "A definition, a stated unit or a relation in which W/m², W/m³, W/kg and W/m meet: a value of one of them declared, stated or limited as another.",
		Silent:   "Where both have the same dimension; where a thickness, a volume or a density stands between.",
		Formula:  "The absorbed areic power is ∫p dz = S·(1 − R)·(1 − e^{−2αd}), and p(z) = 2αS(1 − R)·e^{−2αz}: a length lies between; SAR = p/ρ_m: a density.",
		Remedy:   "Integrate over the depth or multiply by the thickness; divide by the density for W/kg.",
		Source:   "ISO 80000-5:2019 and 80000-6:2022 (areic, volumic, massic; from memory); the conversions are common practice",
		Wrong: check.Example{Note: `    p, average power density = 12.6 MW/m^3
    criterion p < 10 W/m^2
`},
		Right: check.Example{Note: `    p, average power density = 12.6 W/m^3
    d = 30 mm
    criterion p*d < 10 W/m^2
`},
		Run: arealPower,
	}
}

func arealPower(p *check.Pass) error {
	for _, m := range mismatches(p) {
		if a, b := powerPer(m.found.Dim), powerPer(m.claims); a != "" && b != "" {
			p.Report(perFault(m.span, fmt.Sprintf("%s is a power per %s, and %s is claimed", m.sym.Name, a, m.claim()), a, b))
		}
	}
	for _, g := range p.Note.Judged {
		if rel := relationOf(g.Stmt); rel != nil {
			perRelation(p, g.Stmt, rel)
		}
	}
	return nil
}

// perRelation compares the sides of a relation.
func perRelation(p *check.Pass, s *lang.Stmt, rel *lang.Relation) {
	for i := 1; i < len(rel.Terms); i++ {
		x, ok1 := p.Note.FactsOf(s, rel.Terms[i-1])
		y, ok2 := p.Note.FactsOf(s, rel.Terms[i])
		if !ok1 || !ok2 || !x.Known || !y.Known || x.Dim.Compatible(y.Dim) {
			continue
		}
		if a, b := powerPer(x.Dim), powerPer(y.Dim); a != "" && b != "" {
			p.Report(perFault(s.Abs(rel), fmt.Sprintf("a power per %s is compared with one per %s", a, b), a, b))
			return
		}
	}
}

// relationOf is the relation of an assumption, a criterion or a check.
func relationOf(s *lang.Stmt) *lang.Relation {
	switch t := s.Tree.(type) {
	case *lang.Assume:
		return t.Rel
	case *lang.Criterion:
		return t.Rel
	case *lang.Check:
		return t.Rel
	}
	return nil
}

// powerPer tells what a power is related to; "" where it is none of the four.
func powerPer(d unit.Dim) string {
	switch d.Base() {
	case kind.PowerFluxDensity.Dim().Base():
		return "area"
	case kind.PowerDensity.Dim().Base():
		return "volume"
	case kind.SpecificAbsorptionRate.Dim().Base():
		return "mass"
	case kind.LineicPower.Dim().Base():
		return "length"
	}
	return ""
}

func perFault(at lang.Span, message, a, b string) lang.Fault {
	between := "a length lies between the two: multiply the power per volume by the thickness, or integrate it over the depth"
	switch {
	case a == "mass" || b == "mass":
		between = "a density lies between a power per volume and one per mass: divide by it"
	case a == "length" || b == "length":
		between = "an area or a perimeter lies between: multiply or divide by it"
	}
	return lang.Fault{Span: at, Message: message, Detail: between}
}
