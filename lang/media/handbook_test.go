package media_test

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"inkjoule/lang"
	"inkjoule/lang/eval"
	"inkjoule/lang/media"
)

// medium is a medium of the handbook where it is written.
type medium struct {
	chapter string
	stmt    *lang.Stmt
	*lang.Medium
}

// handbook reads all chapters; a statement that is no medium is an error.
func handbook(t *testing.T) []medium {
	t.Helper()
	var out []medium
	for _, chapter := range media.Chapters() {
		text, ok := media.Handbook(chapter)
		if !ok {
			t.Fatalf("chapter %s cannot be read", chapter)
		}
		for _, s := range lang.Read(text, nil).Stmts {
			m, ok := s.Tree.(*lang.Medium)
			if !ok {
				t.Errorf("%s: a statement that is no medium: %s", chapter, s.Text)
				continue
			}
			out = append(out, medium{chapter, s, m})
		}
	}
	if len(out) < 60 {
		t.Errorf("%d media, want 60", len(out))
	}
	return out
}

func analyse(t *testing.T, text string) *lang.Note {
	t.Helper()
	note, err := lang.Analyze(t.Context(), text, lang.Options{Path: "n.joule"})
	if err != nil {
		t.Fatal(err)
	}
	return note
}

// Every property of the handbook says where it comes from, for which
// conditions it holds, and whether it is typical or guaranteed.
func TestHandbookStatesSourceRangeAndStanding(t *testing.T) {
	for _, m := range handbook(t) {
		if len(m.Adjectives) == 0 || len(m.Properties) == 0 {
			t.Errorf("%s: %s has %d adjectives and %d properties", m.chapter, m.Name.Text, len(m.Adjectives), len(m.Properties))
		}
		for _, p := range m.Properties {
			if why := wanting(p); why != "" {
				t.Errorf("%s: %s.%s %s", m.chapter, m.Name.Text, p.Name.Text, why)
			}
		}
	}
}

// wanting says what a property of the handbook lacks.
func wanting(p *lang.Definition) string {
	switch {
	case p.Per == nil:
		return "names no source"
	case !strings.HasSuffix(p.Per.Text, "; typical") && !strings.HasSuffix(p.Per.Text, "; guaranteed"):
		return "does not say whether it is typical or guaranteed"
	case len(p.For) == 0 && p.Name.Text != "mu_r":
		return "has no range" // a permeability of one holds everywhere
	}
	return ""
}

// A name means one medium, so that a note may use several chapters at once.
func TestNamesOfMediaAreUnique(t *testing.T) {
	where := map[string]string{}
	for _, m := range handbook(t) {
		if other, twice := where[m.Name.Text]; twice {
			t.Errorf("%s stands in %s and in %s", m.Name.Text, other, m.chapter)
		}
		where[m.Name.Text] = m.chapter
	}
}

// The chapters are notes like any other, and nothing in them is wrong.
func TestHandbookHasNoFinding(t *testing.T) {
	for _, chapter := range media.Chapters() {
		text, _ := media.Handbook(chapter)
		for _, f := range analyse(t, text).Faults {
			if f.Severity > lang.Advice {
				t.Errorf("%s: %s: %s", chapter, f.Rule, f.Message)
			}
		}
	}
}

// A note that uses a chapter gets a finite value from every property: a number
// or a tensor as it stands, a function at both ends of its range. Only a
// permittivity may be complex, and all of them are positive but for temperature
// coefficients.
func TestEveryPropertyHasAValueOverItsRange(t *testing.T) {
	for _, m := range handbook(t) {
		for _, p := range m.Properties {
			for _, call := range calls(t, m, p) {
				note := analyse(t, fmt.Sprintf("Note\n\n    uses \"handbook/%s\" as h\n    v = h.%s%s\n", m.chapter, m.Name.Text, call))
				v := note.Lookup("v")
				switch {
				case v == nil || !v.Known || !v.Value.Finite():
					t.Errorf("%s: %s%s has no value: %+v", m.chapter, m.Name.Text, call, note.Faults)
				case v.Facts.Complex && p.Name.Text != "eps_r":
					t.Errorf("%s: %s%s is complex", m.chapter, m.Name.Text, call)
				case v.Value.Shape() == eval.Scalar && v.Value.Re() <= 0 && !strings.HasPrefix(p.Name.Text, "alpha_") && call != ".H(0 T)":
					t.Errorf("%s: %s%s is %g", m.chapter, m.Name.Text, call, v.Value.Re())
				}
			}
		}
	}
}

// calls are the readings of a property: `.eps_r`, or `.n(0.21 um)` and
// `.n(3.71 um)`.
func calls(t *testing.T, m medium, p *lang.Definition) []string {
	t.Helper()
	name := "." + p.Name.Text
	if len(p.Params) == 0 {
		return []string{name}
	}
	if len(p.Params) != 1 || len(p.For) != 1 {
		t.Fatalf("%s%s has %d parameters and %d ranges", m.Name.Text, name, len(p.Params), len(p.For))
	}
	text := func(x lang.Expr) string { s := x.Place(); return m.stmt.Text[s.Start:s.End] }
	return []string{name + "(" + text(p.For[0].From) + ")", name + "(" + text(p.For[0].To) + ")"}
}

// A typical value is a round figure of a wide field; these are the handbook's
// numbers against what was published, with the tolerance of the publication.
func TestSpotValues(t *testing.T) {
	const (
		physics2 = "University Physics 2, OpenStax, CC BY 4.0, commit db44eb99, sec. 8.5 (permittivity, strength) and 9.3 (resistivity)"
		crc      = "CRC Handbook, permittivity of inorganic crystals, after Young and Frederikse, J. Phys. Chem. Ref. Data 2, 313 (1973)"
		indexDB  = "refractiveindex.info, CC0, commit ff11b589, evaluated from the coefficients"
		nbs100   = "NBS Handbook 100 (1966), annealed copper at 20 °C"
		malmberg = "Malmberg and Maryott, J. Res. NBS 56, 1 (1956), abstract: 78.30 at 25 °C within 0.1 %"
		radio    = "radiopolyus.ru, table of dielectrics"
		memory   = "from memory, as the handbook says itself"
	)
	cases := []struct {
		chapter, expr string
		want, abs     float64
		source        string
	}{
		{"gases", "air.eps_r - 1", 0.59e-3, 0.06e-3, physics2}, // printed for 0 °C; a gas at 20 °C is 7 % thinner
		{"gases", "air.E_bd/(1 MV/m)", 3.0, 0.05, physics2},
		{"gases", "sulfur_hexafluoride.E_p/(1 kV/(mm·MPa))", 88.75, 0.9, "critical reduced field 88.5 to 89 kV/(mm·MPa), high-voltage texts, from memory"},
		{"polymers", "ptfe.eps_r", 2.1, 0.05, physics2},
		{"polymers", "ptfe.E_bd/(1 MV/m)", 60, 0.5, physics2},
		{"polymers", "ptfe.tan_delta", 2e-4, 0.5e-4, radio},
		{"polymers", "paraffin.eps_r", 2.3, 0.05, physics2},
		{"polymers", "paraffin.E_bd/(1 MV/m)", 11, 0.5, physics2},
		{"liquids", "silicone_oil.eps_r", 2.5, 0.05, physics2},
		{"liquids", "silicone_oil.E_bd/(1 MV/m)", 10, 0.5, physics2},
		{"polymers", "polystyrene.eps_r", 2.56, 0.005, physics2},
		{"polymers", "polystyrene.E_bd/(1 MV/m)", 19.7, 0.05, physics2},
		{"polymers", "polystyrene.tan_delta", 2e-4, 0.5e-4, radio},
		{"polymers", "polyethylene.eps_r", 2.21, 0.1, radio}, // 2.3 there for rating: the safe side
		{"polymers", "polyethylene.tan_delta", 3e-4, 0.5e-4, radio},
		{"polymers", "nylon.eps_r", 3.4, 0.05, physics2},
		{"polymers", "nylon.E_bd/(1 MV/m)", 14, 0.5, physics2},
		{"polymers", "paper.eps_r", 3.7, 0.05, physics2},
		{"polymers", "paper.E_bd/(1 MV/m)", 16, 0.5, physics2},
		{"ceramics", "fused_silica.eps_r", 3.78, 0.005, physics2},
		{"ceramics", "fused_silica.E_bd/(1 MV/m)", 8, 0.5, physics2},
		{"polymers", "phenolic.eps_r", 4.9, 0.05, physics2},
		{"polymers", "phenolic.E_bd/(1 MV/m)", 24, 0.5, physics2},
		{"crystals", "diamond.eps_r", 5.5, 0.05, physics2},
		{"crystals", "diamond.E_bd/(1 MV/m)", 2000, 50, physics2},
		{"ceramics", "borosilicate.eps_r", 5.6, 0.05, physics2},
		{"ceramics", "borosilicate.E_bd/(1 MV/m)", 14, 0.5, physics2},
		{"ceramics", "mica.eps_n", 6.0, 0.05, physics2},
		{"ceramics", "mica.E_bd/(1 MV/m)", 118, 0.5, physics2},
		{"ceramics", "mica.tan_delta", 4e-4, 0.5e-4, radio},
		{"polymers", "neoprene.eps_r", 6.7, 0.05, physics2},
		{"polymers", "neoprene.E_bd/(1 MV/m)", 15.7, 0.05, physics2},
		{"ceramics", "strontium_titanate.eps_r", 310, 5, physics2},
		{"ceramics", "strontium_titanate.E_bd/(1 MV/m)", 8, 0.5, physics2},
		{"liquids", "water.eps_r", 78.30, 0.08, malmberg},
		{"liquids", "water.eps_s(25 °C)", 78.30, 0.08, malmberg},

		{"crystals", "sapphire.eps_r.xx", 9.34, 0.05, crc},
		{"crystals", "sapphire.eps_r.zz", 11.54, 0.05, crc},
		{"crystals", "topaz.eps_r.xx", 6.62, 0.01, crc},
		{"crystals", "topaz.eps_r.yy", 6.58, 0.01, crc},
		{"crystals", "topaz.eps_r.zz", 6.95, 0.01, crc},
		{"crystals", "barium_formate.eps_r.xx", 7.9, 0.1, crc},
		{"crystals", "barium_formate.eps_r.yy", 5.9, 0.1, crc},
		{"crystals", "barium_formate.eps_r.zz", 7.5, 0.1, crc},
		{"crystals", "rutile.eps_r.xx", 86, 4.3, memory},
		{"crystals", "rutile.eps_r.zz", 173, 5, physics2 + ", upper end of 86 to 173"},
		{"crystals", "lithium_niobate.eps_r.xx", 84, 4.2, memory},
		{"crystals", "lithium_niobate.eps_r.zz", 30, 1.5, memory},
		{"crystals", "calcite.eps_r.xx", 8.5, 0.425, memory},
		{"crystals", "calcite.eps_r.zz", 8.0, 0.4, memory},
		{"crystals", "quartz.eps_r.xx", 4.52, 0.09, memory},
		{"crystals", "quartz.eps_r.zz", 4.64, 0.09, memory},
		{"crystals", "sapphire.n_o(0.5893 um)", 1.76808, 1e-5, indexDB},
		{"crystals", "sapphire.n_e(0.5893 um)", 1.76000, 1e-5, indexDB},
		{"crystals", "quartz.n_o(0.5893 um)", 1.54421, 1e-5, indexDB},
		{"crystals", "quartz.n_e(0.5893 um)", 1.55331, 1e-5, indexDB},
		{"crystals", "lithium_niobate.n_o(0.6328 um)", 2.28646, 1e-5, indexDB},
		{"crystals", "lithium_niobate.n_e(0.6328 um)", 2.20222, 1e-5, indexDB},
		{"crystals", "calcite.n_o", 1.66, 0.005, "textbook problem on walk-off, 1.66 and 1.49"},
		{"crystals", "calcite.n_e", 1.49, 0.005, "textbook problem on walk-off, 1.66 and 1.49"},
		{"ceramics", "fused_silica.n(0.5876 um)", 1.45846, 5e-6, indexDB},
		{"ceramics", "fused_silica.n(1.55 um)", 1.444024, 2e-6, "from memory, and from the coefficients of Malitson (1965)"},

		{"metals", "copper.rho/(1e-8 ohm·m)", 100.0 / 58, 5e-5, nbs100},
		{"metals", "copper.alpha_20*(1 K)", 0.00393, 5e-6, nbs100},
		{"metals", "copper.density/(1 g/cm^3)", 8.89, 0.005, nbs100},
		{"metals", "copper.rho*copper.density/(1 ohm·g/m^2)", 0.15328, 9e-5, nbs100 + ", mass resistivity"}, // the density has three digits
		{"metals", "silver.rho/(1e-8 ohm·m)", 1.59, 0.005, physics2},
		{"metals", "gold.rho/(1e-8 ohm·m)", 2.44, 0.005, physics2},
		{"metals", "aluminium.rho/(1e-8 ohm·m)", 2.65, 0.005, physics2},
		{"metals", "aluminium_conductor.sigma/(1 MS/m)", 35.38, 0.18, "61 % IACS, from memory"},
		{"metals", "tungsten.rho/(1e-8 ohm·m)", 5.60, 0.005, physics2},
		{"metals", "platinum.rho/(1e-8 ohm·m)", 10.6, 0.05, physics2},
		{"metals", "iron.rho/(1e-8 ohm·m)", 9.71, 0.005, physics2},
		{"metals", "manganin.rho/(1e-8 ohm·m)", 48.2, 0.05, physics2},
		{"metals", "constantan.rho/(1e-8 ohm·m)", 49.0, 0.05, physics2},
		{"metals", "nichrome.rho/(1e-8 ohm·m)", 100, 0.5, physics2},
		{"metals", "silver.rho_T(30 °C)/silver.rho_T(20 °C)", 1.038, 1e-9, physics2 + ", coefficient"},
		{"metals", "gold.rho_T(30 °C)/gold.rho_T(20 °C)", 1.034, 1e-9, physics2 + ", coefficient"},
		{"metals", "aluminium.rho_T(30 °C)/aluminium.rho_T(20 °C)", 1.039, 1e-9, physics2 + ", coefficient"},
		{"metals", "tungsten.rho_T(30 °C)/tungsten.rho_T(20 °C)", 1.045, 1e-9, physics2 + ", coefficient"},
		{"metals", "platinum.rho_T(30 °C)/platinum.rho_T(20 °C)", 1.039, 1e-9, physics2 + ", coefficient"},
		{"metals", "iron.rho_T(30 °C)/iron.rho_T(20 °C)", 1.065, 1e-9, physics2 + ", coefficient"},
		{"metals", "nichrome.rho_T(30 °C)/nichrome.rho_T(20 °C)", 1.004, 1e-9, physics2 + ", coefficient"},
		{"metals", "manganin.alpha_20*(1 K)", 2e-6, 5e-7, physics2},
		{"metals", "constantan.alpha_20*(1 K)", 3e-5, 5e-6, physics2},
	}
	for _, c := range cases {
		note := analyse(t, fmt.Sprintf("Note\n\n    uses \"handbook/%s\"\n    v = %s\n", c.chapter, c.expr))
		v := note.Lookup("v")
		if v == nil || !v.Known || v.Value.Re() == 0 {
			t.Errorf("%s has no value: %+v", c.expr, note.Faults)
			continue
		}
		if got := v.Value.Re(); math.Abs(got-c.want) > c.abs*(1+1e-9) {
			t.Errorf("%s = %.7g, published %g ± %g (%s)", c.expr, got, c.want, c.abs, c.source)
		}
	}
}

func TestHandbookRefusesWhatIsNoChapter(t *testing.T) {
	for _, name := range []string{"", ".", "..", "nothing", "../media", "../../unit/table", "a/b", "/etc/hosts", "liquids/", "liquids.go", "LIQUIDS"} {
		if _, ok := media.Handbook(name); ok {
			t.Errorf("%q is read", name)
		}
	}
	a, _ := media.Handbook("liquids")
	if b, ok := media.Handbook("liquids.joule"); !ok || a != b {
		t.Error("the ending of a chapter's name is not optional")
	}
}
