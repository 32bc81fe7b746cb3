package check

import (
	"slices"

	"inkjoule/lang"
)

// One cause gives one finding. Where two findings speak about the same text,
// the specific one stays; a dimension that does not hold silences all rules on
// its text, except those that explain it, which replace it in its definition.

// beats lists which finding replaces which others on the same text.
type beats struct {
	strong string
	weak   []string
}

// overrides is read only. Order: kind, statistic and convention, medium, value.
var overrides = []beats{
	// A whole formula of another system of quantities, before its single factors.
	{"gaussian-form-in-si", []string{"relative-absolute-constant", "vacuum-constant-slip", "power-called-energy", "flux-field-kind", "half-missing-stored-energy", "quarter-half-average"}},
	{"vacuum-constant-slip", []string{"relative-absolute-constant", "flux-field-kind", "power-called-energy"}},
	// The wrong kind makes every coefficient meaningless.
	{"power-called-energy", []string{"half-missing-stored-energy", "quarter-half-average", "mean-power-half"}},
	{"torque-energy-kind", []string{"half-missing-stored-energy", "quarter-half-average"}},
	{"degree-radian", []string{"hertz-radian-slip"}},
	{"hertz-radian-slip", []string{"quarter-half-average", "mean-power-half"}},
	// A mixed statistic leaves no statistic to judge a coefficient by.
	{"rms-peak-mix", []string{"quarter-half-average", "mean-power-half", "half-missing-stored-energy"}},
	{"emf-crest-twice", []string{"rms-peak-mix"}},
	{"swing-used-as-amplitude", []string{"rms-peak-mix"}},
	{"strength-statistic-mismatch", []string{"rms-peak-mix"}},
	{"conjugate-missing", []string{"mean-power-half", "quarter-half-average", "half-missing-stored-energy"}},
	{"sar-field-statistic", []string{"mean-power-half"}},
	{"wave-impedance-misuse", []string{"mean-power-half"}},
	// Who makes the field decides whether there is a half at all.
	{"pair-sum-double-count", []string{"half-missing-stored-energy"}},
	{"source-work-halved", []string{"half-missing-stored-energy"}},
	{"point-self-energy", []string{"integral-diverges", "division-by-zero", "pair-sum-double-count"}},
	{"external-potential-halved", []string{"half-missing-stored-energy", "quarter-half-average"}},
	{"induced-dipole-half", []string{"half-missing-stored-energy", "quarter-half-average"}},
	{"full-field-plate-force", []string{"quarter-half-average"}},
	{"polarization-energy-count", []string{"half-missing-stored-energy"}},
	// The medium decides which form is right at all.
	{"half-product-nonlinear", []string{"energy-product-as-stored", "half-missing-stored-energy", "quarter-half-average"}},
	{"bias-point-capacitance-energy", []string{"half-product-nonlinear", "half-missing-stored-energy", "quarter-half-average", "property-out-of-range"}},
	{"saturated-core-energy", []string{"half-product-nonlinear", "half-missing-stored-energy", "quarter-half-average"}},
	{"dispersive-energy-density", []string{"half-missing-stored-energy", "quarter-half-average"}},
	{"axis-frame-mismatch", []string{"field-of-another-medium"}},
	{"permittivity-graded-dc", []string{"layer-field-continuity"}},
	{"energy-coenergy-swap", []string{"constraint-sign-of-force"}},
	{"uniform-field-assumed", []string{"breakdown-margin"}},
	{"exposure-averaging-basis", []string{"breakdown-margin"}},
}

// explains names the rules that tell the cause of a dimension that does not
// hold; read only.
var explains = []string{
	"power-called-energy", "relative-absolute-constant", "vacuum-constant-slip",
	"gaussian-form-in-si", "dimensioned-argument", "areal-volumetric-power", "flux-field-kind", "hidden-unit-coefficient", "sar-field-statistic",
}

// dimensional names the findings of the language that silence rules on their
// text; read only.
var dimensional = []string{"dimension-mismatch", "shape-mix", "temperature-offset", "dimensioned-argument"}

// prevail drops every finding that another one on the same text replaces. A
// finding that was waived does not replace one that cannot be waived.
func prevail(found []Finding, p *places, c *Catalogue) []Finding {
	j := &judge{found: found, gone: make([]bool, len(found)), catalogue: c}
	for _, same := range j.byDefinition(p) {
		j.within(same)
	}
	kept := found[:0]
	for i, f := range found {
		if !j.gone[i] {
			kept = append(kept, f)
		}
	}
	return kept
}

// judge compares findings of one definition with each other, never all of a
// note, so that the work grows with the note and not with its square.
type judge struct {
	found     []Finding
	gone      []bool
	catalogue *Catalogue
}

// byDefinition gives the findings of each definition that has more than one,
// as indices.
func (j *judge) byDefinition(p *places) [][]int {
	groups := map[int][]int{}
	for i := range j.found {
		if at := p.index(j.found[i].Span.Start); at >= 0 {
			groups[at] = append(groups[at], i)
		}
	}
	var out [][]int
	for _, g := range groups {
		if len(g) > 1 {
			out = append(out, g)
		}
	}
	return out
}

func (j *judge) within(group []int) {
	byRule := map[string][]int{}
	for _, i := range group {
		byRule[j.found[i].Rule] = append(byRule[j.found[i].Rule], i)
	}
	if len(byRule) < 2 {
		return
	}
	for _, rule := range explains {
		j.drop(byRule[rule], byRule["dimension-mismatch"], anywhere)
	}
	for _, dim := range dimensional {
		for rule, weak := range byRule {
			if r := j.catalogue.Find(rule); r != nil && r.Run != nil && !slices.Contains(explains, rule) && !slices.Contains(dimensional, rule) {
				j.drop(byRule[dim], weak, overlap)
			}
		}
	}
	for _, o := range overrides {
		for _, weak := range o.weak {
			j.drop(byRule[o.strong], byRule[weak], overlap)
		}
	}
}

func (j *judge) drop(strong, weak []int, same func(a, b lang.Span) bool) {
	for _, w := range weak {
		for _, s := range strong {
			if same(j.found[s].Span, j.found[w].Span) && j.replaces(s, w) {
				j.gone[w] = true
				break
			}
		}
	}
}

// replaces reports whether finding s may hide finding w.
func (j *judge) replaces(s, w int) bool {
	return !j.found[s].IsWaived() || !j.found[w].Firm
}

func anywhere(lang.Span, lang.Span) bool { return true }
