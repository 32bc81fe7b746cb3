package report

import (
	"bytes"
	"flag"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

var update = flag.Bool("update", false, "write the golden files anew")

// golden compares an output with its file, or writes the file.
func golden(t *testing.T, name string, got []byte) {
	t.Helper()
	path := filepath.Join("testdata", name)
	if *update {
		if err := os.WriteFile(path, got, 0o644); err != nil {
			t.Fatal(err)
		}
	}
	want, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	if !bytes.Equal(got, want) {
		t.Errorf("%s differs (go test -run %s -update writes it anew); got\n%s", path, t.Name(), got)
	}
}

const cellText = `Test cell
=========

    medium µ-oil_1: linear
    	eps_r = 2.2
    E, peak electric field strength = (0, 0, 4) kV/mm
    w, peak energy density = oil.eps*E·E = 311.7 J/m^3
    criterion |E| <= 5 kV/mm per "design rule 4.2"
    assume "fringing is left out" per "common practice"
    safety "short the terminals" per "work instruction 7"
    waive rms-peak-mix for E: "both are amplitudes"
`

// sample is a note analysed by hand: what the writers show must not depend on
// the state of the analysis.
func sample() *Note {
	n := &lang.Note{Path: "notes/cell.joule", Script: lang.Read(cellText, nil)}
	at := func(text string) lang.Span {
		i := strings.Index(cellText, text)
		return lang.Span{Start: i, End: i + len(text)}
	}
	parse := func(words, phrase string) lang.Facts {
		q, k, _ := kind.Parse(words)
		u, _ := unit.Parse(phrase)
		return lang.Facts{Known: true, Kind: k, Qualifier: q, Dim: u.Dim, Media: []string{"oil"}}
	}
	n.Symbols = []*lang.Symbol{
		{Name: "E", Key: "E", Role: lang.RoleQuantity, Span: at("E, peak"), Input: true, Facts: parse("peak electric field strength", "V/m"),
			Result: lang.Result{Known: true, Value: eval.Vec(0, 0, 4e6), Shown: "(0, 0, 4.000) kV/mm"}},
		{Name: "w", Key: "w", Role: lang.RoleQuantity, Span: at("w, peak"), Facts: parse("peak energy density", "J/m^3"),
			Result: lang.Result{Known: true, Value: eval.Real(311.67), Standard: 1.5, Low: 308, High: 315, Shown: "311.7 J/m^3"}},
		{Name: "f", Key: "f", Role: lang.RoleFunction},
	}
	n.Judged = []lang.Judgement{
		{Stmt: n.Script.Stmts[3], Word: "criterion", Text: "|E| <= 5 kV/mm", Known: true, Holds: true, Margin: 0.25, Worst: 0.2, Per: "design rule 4.2"},
		{Stmt: n.Script.Stmts[4], Word: "assume", Text: "fringing is left out", Per: "common practice"},
	}
	found := []check.Finding{
		{Path: n.Path, Fault: lang.Fault{Rule: "syntax", Severity: lang.Advice, Span: at("µ-oil_1"), Message: "a name holds letters, digits and _",
			Detail: "Write µ_oil_1.", Fix: &lang.Fix{Title: "Write µ_oil_1", Edits: []lang.Edit{{Span: at("µ-oil_1"), New: "µ_oil_1"}}}}},
		{Path: n.Path, Fault: lang.Fault{Rule: "rms-peak-mix", Severity: lang.Error, Span: at("(0, 0, 4) kV/mm"), Message: "m"},
			Waived: "both are amplitudes", WaivedBy: at(`waive rms-peak-mix for E: "both are amplitudes"`)},
		{Path: n.Path, Fault: lang.Fault{Rule: "half-missing-stored-energy", Severity: lang.Error, Span: at("oil.eps*E·E"),
			Message: "the stored energy density lacks its half: 2.00 times the value", Detail: "Write 1/2 * oil.eps*E·E.\nOr call it source work.",
			Related: []lang.Related{{Span: at("E, peak"), Message: "E is a peak value"}, {Path: "notes/oil.joule", Span: lang.Span{Start: 3, End: 4}, Message: "oil is linear"}}}},
	}
	return &Note{Note: n, Findings: found}
}

// empty is a note without anything.
func empty() *Note {
	return &Note{Note: &lang.Note{Path: "notes/empty.joule", Script: lang.Read("", nil)}}
}

// written gives what a format makes of the sample.
func written(t *testing.T, format string, notes ...*Note) []byte {
	t.Helper()
	var b bytes.Buffer
	c, err := check.NewCatalogue(nil)
	if err != nil {
		t.Fatal(err)
	}
	w, err := New(format, &b, Options{Catalogue: c, Version: "v1.2.3"})
	if err != nil {
		t.Fatal(err)
	}
	for _, n := range notes {
		if err := w.Note(n); err != nil {
			t.Fatal(err)
		}
	}
	if err := w.Problem("notes/lost.joule does not exist"); err != nil {
		t.Fatal(err)
	}
	if err := w.Close(); err != nil {
		t.Fatal(err)
	}
	return b.Bytes()
}
