package report

import (
	"encoding/json"
	"io"
	"math"

	"inkjoule/check"
	"inkjoule/lang"
)

// opening begins every document. The version is raised when a field changes its
// meaning; fields are added without it, and none is ever renamed.
const opening = `{"version": 1, "notes": [`

// jsonWriter streams one object: a note a line within "notes".
type jsonWriter struct {
	w        io.Writer
	begun    bool
	problems []string
	count    Count
}

func newJSON(w io.Writer, _ Options) Writer { return &jsonWriter{w: w} }

func (j *jsonWriter) Note(n *Note) error {
	lead := ",\n"
	if !j.begun {
		lead = opening + "\n"
		j.begun = true
	}
	j.count.Add(CountOf(n))
	return put(j.w, lead, jsonOf(n))
}

func (j *jsonWriter) Problem(message string) error {
	j.problems = append(j.problems, message)
	return nil
}

func (j *jsonWriter) Close() error {
	lead := "\n], \"problems\": "
	if !j.begun {
		lead = opening + `], "problems": `
	}
	if j.problems == nil {
		j.problems = []string{}
	}
	if err := put(j.w, lead, j.problems); err != nil {
		return err
	}
	if err := put(j.w, `, "counts": `, totalOf(j.count)); err != nil {
		return err
	}
	_, err := io.WriteString(j.w, "}\n")
	return err
}

type jsonNote struct {
	Path        string          `json:"path"`
	Values      []jsonValue     `json:"values"`
	Criteria    []jsonJudgement `json:"criteria"`
	Assumptions []jsonJudgement `json:"assumptions"`
	Checks      []jsonJudgement `json:"checks"`
	Safety      []jsonSafety    `json:"safety"`
	Waivers     []jsonWaiver    `json:"waivers"`
	Findings    []jsonFinding   `json:"findings"`
	Waived      []jsonFinding   `json:"waived"`
	Counts      jsonCounts      `json:"counts"`
	Against     *jsonAgainst    `json:"against,omitempty"`
}

// number is a figure that JSON can hold: null stands for NaN and infinity.
type number float64

// MarshalJSON never breaks the document.
func (x number) MarshalJSON() ([]byte, error) {
	if math.IsNaN(float64(x)) || math.IsInf(float64(x), 0) {
		return []byte("null"), nil
	}
	return json.Marshal(float64(x))
}

// jsonJudgement is a relation of the note. Holds and the margins are null where
// the verdict is not known, or where the assumption is a text.
type jsonJudgement struct {
	Line   int     `json:"line"`
	Text   string  `json:"text"`
	Holds  *bool   `json:"holds"`
	Margin *number `json:"margin"`
	Worst  *number `json:"worst"`
	Source string  `json:"source,omitempty"`
}

type jsonSafety struct {
	Line   int    `json:"line"`
	Text   string `json:"text"`
	Source string `json:"source,omitempty"`
}

type jsonWaiver struct {
	Line     int    `json:"line"`
	Rule     string `json:"rule"`
	Name     string `json:"name,omitempty"` // absent: for the whole note
	Reason   string `json:"reason"`
	Findings int    `json:"findings"` // that it silences
}

type jsonCounts struct {
	Statements int `json:"statements"`
	Values     int `json:"values"`
	Prose      int `json:"prose"`
	Errors     int `json:"errors"`
	Cautions   int `json:"cautions"`
	Advice     int `json:"advice"`
	Waived     int `json:"waived"`
}

type jsonTotal struct {
	Notes int `json:"notes"`
	jsonCounts
}

func countsOf(c Count) jsonCounts {
	return jsonCounts{c.Statements, c.Values, c.Prose, c.Errors, c.Cautions, c.Advice, c.Waived}
}

func totalOf(c Count) jsonTotal { return jsonTotal{c.Notes, countsOf(c)} }

func jsonOf(n *Note) *jsonNote {
	out := &jsonNote{
		Path: n.Path, Values: valuesOf(n), Waivers: waiversOf(n), Safety: safetyOf(n),
		Criteria: judgedOf(n, "criterion"), Assumptions: judgedOf(n, "assume"), Checks: judgedOf(n, "check"),
		Findings: []jsonFinding{}, Waived: []jsonFinding{}, Counts: countsOf(CountOf(n)), Against: againstOf(n.Against),
	}
	for i := range n.Findings {
		f := findingOf(n, &n.Findings[i])
		if n.Findings[i].IsWaived() {
			out.Waived = append(out.Waived, f)
		} else {
			out.Findings = append(out.Findings, f)
		}
	}
	return out
}

func judgedOf(n *Note, word string) []jsonJudgement {
	out := []jsonJudgement{}
	for i := range n.Judged {
		if g := &n.Judged[i]; g.Word == word {
			out = append(out, judgementOf(n, g))
		}
	}
	return out
}

func judgementOf(n *Note, g *lang.Judgement) jsonJudgement {
	out := jsonJudgement{Line: lineOf(n, g.Stmt.At), Text: g.Text, Source: g.Per}
	if g.Known {
		holds, margin, worst := g.Holds, number(g.Margin), number(g.Worst)
		out.Holds, out.Margin, out.Worst = &holds, &margin, &worst
	}
	return out
}

func safetyOf(n *Note) []jsonSafety {
	out := []jsonSafety{}
	for _, s := range n.Script.Stmts {
		if t, ok := s.Tree.(*lang.Safety); ok {
			one := jsonSafety{Line: lineOf(n, s.At), Text: t.Text.Text}
			if t.Per != nil {
				one.Source = t.Per.Text
			}
			out = append(out, one)
		}
	}
	return out
}

func waiversOf(n *Note) []jsonWaiver {
	out := []jsonWaiver{}
	for _, w := range check.Waivers(n.Note, n.Findings) {
		out = append(out, jsonWaiver{lineOf(n, w.Span.Start), w.Rule, w.Name, w.Reason, w.Used})
	}
	return out
}

func lineOf(n *Note, offset int) int {
	line, _ := n.Script.Source.Position(offset)
	return line
}
