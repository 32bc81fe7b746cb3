package report

import (
	"encoding/xml"
	"fmt"
	"io"
	"strings"

	"inkjoule/check"
	"inkjoule/lang"
)

// junit writes the XML that build servers read as test results: a note is a
// suite; its criteria, its checks and its findings are the cases. Findings of
// advice pass and are told in their output.
type junit struct {
	w        io.Writer
	begun    bool
	problems []string
}

func newJUnit(w io.Writer, _ Options) Writer { return &junit{w: w} }

type (
	junitSuite struct {
		XMLName  xml.Name    `xml:"testsuite"`
		Name     string      `xml:"name,attr"`
		Tests    int         `xml:"tests,attr"`
		Failures int         `xml:"failures,attr"`
		Errors   int         `xml:"errors,attr"`
		Skipped  int         `xml:"skipped,attr"`
		Cases    []junitCase `xml:"testcase"`
	}
	junitCase struct {
		Class   string        `xml:"classname,attr"`
		Name    string        `xml:"name,attr"`
		File    string        `xml:"file,attr,omitempty"`
		Line    int           `xml:"line,attr,omitempty"`
		Failure *junitFailure `xml:"failure"`
		Error   *junitFailure `xml:"error"`
		Skipped *junitSkipped `xml:"skipped"`
		Out     string        `xml:"system-out,omitempty"`
	}
	junitFailure struct {
		Message string `xml:"message,attr"`
		Type    string `xml:"type,attr"`
		Text    string `xml:",chardata"`
	}
	junitSkipped struct {
		Message string `xml:"message,attr"`
	}
)

func (j *junit) begin() error {
	if j.begun {
		return nil
	}
	j.begun = true
	_, err := io.WriteString(j.w, xml.Header+"<testsuites name=\"inkjoule review\">\n")
	return err
}

func (j *junit) Note(n *Note) error {
	if err := j.begin(); err != nil {
		return err
	}
	s := junitSuite{Name: clean(n.Path)}
	for i := range n.Judged {
		if c, ok := junitJudged(n, &n.Judged[i]); ok {
			s.Cases = append(s.Cases, c)
		}
	}
	for i := range n.Findings {
		if f := &n.Findings[i]; f.Rule != "criterion-fails" && f.Rule != "check-fails" {
			s.Cases = append(s.Cases, junitFinding(n, f))
		}
	}
	if len(s.Cases) == 0 {
		s.Cases = []junitCase{{Class: s.Name, Name: "review", File: s.Name}}
	}
	return j.suite(s)
}

// suite counts the cases and writes them.
func (j *junit) suite(s junitSuite) error {
	for _, c := range s.Cases {
		s.Tests++
		switch {
		case c.Failure != nil:
			s.Failures++
		case c.Error != nil:
			s.Errors++
		case c.Skipped != nil:
			s.Skipped++
		}
	}
	out, err := xml.MarshalIndent(s, "  ", "  ")
	if err == nil {
		_, err = fmt.Fprintf(j.w, "%s\n", out)
	}
	return err
}

func (j *junit) Problem(message string) error {
	j.problems = append(j.problems, message)
	return nil
}

func (j *junit) Close() error {
	if err := j.begin(); err != nil {
		return err
	}
	if len(j.problems) > 0 {
		s := junitSuite{Name: "inkjoule"}
		for i, p := range j.problems {
			s.Cases = append(s.Cases, junitCase{Class: s.Name, Name: fmt.Sprintf("problem %d", i+1), Error: &junitFailure{Message: oneLine(p), Type: "problem"}})
		}
		if err := j.suite(s); err != nil {
			return err
		}
	}
	_, err := io.WriteString(j.w, "</testsuites>\n")
	return err
}

// junitJudged is the case of a criterion or a check; an assumption that is a
// text, or whose verdict is not known, is none.
func junitJudged(n *Note, g *lang.Judgement) (junitCase, bool) {
	if !g.Known {
		return junitCase{}, false
	}
	line := lineOf(n, g.Stmt.At)
	c := junitCase{Class: clean(n.Path), Name: fmt.Sprintf("%s %s (line %d)", g.Word, oneLine(g.Text), line), File: clean(n.Path), Line: line}
	if !g.Holds {
		c.Failure = &junitFailure{Message: "it does not hold, " + marginOf(g), Type: g.Word}
	}
	return c, true
}

// marginOf writes how far a relation is from its limit.
func marginOf(g *lang.Judgement) string {
	text := fmt.Sprintf("margin %.3g %%", 100*g.Margin)
	if g.Worst != g.Margin {
		text += fmt.Sprintf(", at worst %.3g %%", 100*g.Worst)
	}
	return text
}

func junitFinding(n *Note, f *check.Finding) junitCase {
	line, column := n.Script.Source.Position(f.Span.Start)
	c := junitCase{Class: clean(n.Path), Name: fmt.Sprintf("%s (line %d, column %d)", f.Rule, line, column), File: clean(n.Path), Line: line}
	code, marks := Excerpt(n.Script.Source, f.Span)
	text := strings.Join([]string{fmt.Sprintf("%s:%d:%d", n.Path, line, column), code, marks, oneLine(f.Detail)}, "\n")
	switch {
	case f.IsWaived():
		c.Skipped = &junitSkipped{"waived: " + oneLine(f.Waived)}
	case f.Severity == lang.Advice:
		c.Out = oneLine(f.Message) + "\n" + text
	default:
		c.Failure = &junitFailure{Message: oneLine(f.Message), Type: f.Severity.String(), Text: text}
	}
	return c
}
