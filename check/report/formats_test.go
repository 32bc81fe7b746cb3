package report

import (
	"bytes"
	"encoding/xml"
	"strings"
	"testing"

	"github.com/yuin/goldmark"
	"github.com/yuin/goldmark/extension"
)

// TestJUnitIsReadBack reads the XML as a build server does: by its attributes
// alone, which must agree with the cases.
func TestJUnitIsReadBack(t *testing.T) {
	var got struct {
		XMLName xml.Name `xml:"testsuites"`
		Suites  []struct {
			Name     string `xml:"name,attr"`
			Tests    int    `xml:"tests,attr"`
			Failures int    `xml:"failures,attr"`
			Errors   int    `xml:"errors,attr"`
			Skipped  int    `xml:"skipped,attr"`
			Cases    []struct {
				Name    string    `xml:"name,attr"`
				Failure *struct{} `xml:"failure"`
				Error   *struct{} `xml:"error"`
				Skipped *struct{} `xml:"skipped"`
			} `xml:"testcase"`
		} `xml:"testsuite"`
	}
	if err := xml.Unmarshal(written(t, "junit", sample(), empty()), &got); err != nil {
		t.Fatal(err)
	}
	if len(got.Suites) != 3 {
		t.Fatalf("%d suites", len(got.Suites))
	}
	for _, s := range got.Suites {
		failed, errors, skipped := 0, 0, 0
		for _, c := range s.Cases {
			if c.Failure != nil {
				failed++
			}
			if c.Error != nil {
				errors++
			}
			if c.Skipped != nil {
				skipped++
			}
		}
		if s.Tests != len(s.Cases) || s.Failures != failed || s.Errors != errors || s.Skipped != skipped {
			t.Errorf("%s: %+v", s.Name, s)
		}
	}
}

// TestMarkdownIsReadBack renders the summary by a library of its own: nothing
// that a note says may become markup.
func TestMarkdownIsReadBack(t *testing.T) {
	n := sample()
	n.Findings[2].Message = "a | b <img src=x> *c* [d](e) `f|g` _h_"
	n.Judged[0].Per = "rule | 4 <b>"
	var out bytes.Buffer
	md := goldmark.New(goldmark.WithExtensions(extension.Table))
	if err := md.Convert(written(t, "markdown", n), &out); err != nil {
		t.Fatal(err)
	}
	html := out.String()
	for _, want := range []string{
		"A | b &lt;img src=x&gt; *c* [d](e) <code>f|g</code> _h_", ">rule | 4 &lt;b&gt;</td>", "<code>|E| &lt;= 5 kV/mm</code>",
		"<strong>error</strong>", "fringing is left out (common practice)", "both are amplitudes (1 finding)",
	} {
		if !strings.Contains(html, want) {
			t.Errorf("no %s in\n%s", want, html)
		}
	}
	if strings.Count(html, "<table>") != 1 || strings.Contains(html, "<em>") {
		t.Errorf("markup from a note in\n%s", html)
	}
}
