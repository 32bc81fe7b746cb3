package sheet

import (
	"bytes"
	"encoding/xml"
	"errors"
	"io"
	"os"
	"path/filepath"
	"regexp"
	"strings"
	"testing"

	"inkjoule/check"
	"inkjoule/check/report"
	"inkjoule/check/rules"
	"inkjoule/lang"
)

// sheetOf reviews a text with all rules and writes its sheet.
func sheetOf(t *testing.T, text string) string {
	t.Helper()
	note, err := lang.Analyze(t.Context(), text, lang.Options{Path: "a.joule"})
	if err != nil {
		t.Fatal(err)
	}
	found, err := check.Run(t.Context(), note, check.Config{Rules: rules.All()})
	if err != nil {
		t.Fatal(err)
	}
	var b bytes.Buffer
	if err := Write(&b, &report.Note{Note: note, Findings: found}, "v1"); err != nil {
		t.Fatal(err)
	}
	return b.String()
}

var mathElement = regexp.MustCompile(`(?s)<math>.*?</math>`)

// Every note of the corpus gives a page whose formulas are well formed, with
// every statement on it, and the same page each time.
func TestSheetsOfTheCorpus(t *testing.T) {
	for _, folder := range []string{"demo", "notes", "values"} {
		err := filepath.WalkDir(filepath.Join("..", "..", "..", "corpus", folder), func(path string, e os.DirEntry, err error) error {
			if err != nil || filepath.Ext(path) != ".joule" {
				return err
			}
			raw, err := os.ReadFile(path)
			if err != nil {
				return err
			}
			page := sheetOf(t, string(raw))
			for _, m := range mathElement.FindAllString(page, -1) {
				if err := wellFormed(m); err != nil {
					t.Errorf("%s: %v in %s", path, err, m)
				}
			}
			statements := 0
			for _, s := range lang.Read(string(raw), nil).Stmts {
				if _, hazard := s.Tree.(*lang.Safety); !hazard {
					statements++
				}
			}
			if n := strings.Count(page, `<div class="calc">`); n != statements {
				t.Errorf("%s: %d of %d statements", path, n, statements)
			}
			if again := sheetOf(t, string(raw)); again != page {
				t.Errorf("%s: two sheets differ", path)
			}
			return nil
		})
		if err != nil {
			t.Fatal(err)
		}
	}
}

func wellFormed(text string) error {
	d := xml.NewDecoder(strings.NewReader(text))
	for {
		if _, err := d.Token(); errors.Is(err, io.EOF) {
			return nil
		} else if err != nil {
			return err
		}
	}
}

func TestSheetSaysWhatAReviewerWeighs(t *testing.T) {
	page := sheetOf(t, `Test <b>cell</b>
=========

Prose with *emphasis* and <script>alert(1)</script>.

    C = 470 uF ± 5 %                 per "sheet <7>"
    U, static voltage = 400 V        per "plate"
    W, stored energy = C*U^2 = __ J
    E, static electric field strength = (0, 3, 4) kV/mm
    e, ratio = 1/3
    criterion W < 40 J               per "design rule 4"
    assume "fringing is left out"    per "common practice"
    assume U < 500 V
    safety "Short the terminals."    per "work instruction 7"
    waive unused-definition for e: "for the next revision"
`)
	for _, want := range []string{
		"<em>emphasis</em>", "<strong>Warning.</strong> Short the terminals.", "(work instruction 7)",
		"<strong>Error:</strong> W is 2.00 times the energy that is stored: the half is missing (half-missing-stored-energy)", "<code>1/2 * C*U^2</code>",
		"fails, margin −46.8 %", "(design rule 4)", "fringing is left out", "holds, margin 25 %", "sheet &lt;7&gt;",
		"unused-definition for e: for the next revision", "<th>Approved</th>", "not an approval", "µF", "75.2(22) J",
	} {
		if !strings.Contains(page, want) {
			t.Errorf("no %s in\n%s", want, page)
		}
	}
	for _, never := range []string{"<script", "<b>cell", "http://", "https://"} {
		if strings.Contains(page, never) {
			t.Errorf("%s on the page", never)
		}
	}
}

func TestFormulas(t *testing.T) {
	for text, want := range map[string]string{
		"1/2*C*U^2":                     "<mn>2</mn></mrow></mrow></mfrac>",
		"eps_0":                         "<msub><mi>ε</mi><mrow><mn>0</mn></mrow></msub>",
		"sqrt(2)*x":                     "<msqrt>",
		"integral(x for x from 0 to 1)": "<msubsup><mo>∫</mo>",
		"12.0(1) kV":                    "<mn>(1)</mn>",
		"3e-4":                          "<msup><mn>10</mn><mn>−4</mn></msup>",
		"sum(1/n for n from 1 to 9)":    "<munderover><mo>∑</mo>",
	} {
		d, ok := lang.ParseStatement("y = " + text).Tree.(*lang.Definition)
		if !ok || len(d.Members) == 0 {
			t.Fatalf("%s is not read", text)
		}
		got := expr(d.Members[0])
		if !strings.Contains(got, want) {
			t.Errorf("%s is\n%s\nwithout\n%s", text, got, want)
		}
	}
}
