package report

import (
	"encoding/json"
	"math"
	"reflect"
	"testing"

	"inkjoule/lang/eval"
)

// What another program reads: written from service.md, not from the writer.
type readReview struct {
	Version int
	Notes   []struct {
		Path   string
		Values []struct {
			Name, Kind, Qualifier, Unit, Shown string
			Line                               int
			Value                              any
			Uncertainty, Low, High             *float64
			Media                              []string
			Input                              bool
		}
		Criteria []struct {
			Line          int
			Holds         *bool
			Margin, Worst *float64
		}
		Findings []struct {
			Rule, Severity, Message, Detail, Fix string
			Line, Column, EndLine, EndColumn     int
			Related                              []struct {
				Path, Message string
				Line, Column  int
			}
		}
		Counts struct{ Statements, Values, Prose int }
	}
	Problems []string
}

func TestJSONIsReadByAnotherProgram(t *testing.T) {
	var r readReview
	if err := json.Unmarshal(written(t, "json", sample(), empty()), &r); err != nil {
		t.Fatal(err)
	}
	if r.Version != 1 || len(r.Notes) != 2 || len(r.Problems) != 1 {
		t.Fatalf("%+v", r)
	}
	n := r.Notes[0]
	if n.Path != "notes/cell.joule" || n.Counts.Statements != 7 || n.Counts.Values != 2 || n.Counts.Prose != 2 {
		t.Errorf("%q %+v", n.Path, n.Counts)
	}
	e, w := n.Values[0], n.Values[1]
	if !reflect.DeepEqual(e.Value, []any{0.0, 0.0, 4e6}) || e.Unit != "V/m" || !e.Input || e.Uncertainty != nil || e.Line != 6 {
		t.Errorf("E is %+v", e)
	}
	if w.Value != 311.67 || w.Unit != "J/m^3" || *w.Uncertainty != 1.5 || *w.Low != 308 || *w.High != 315 || w.Kind != "energy density" || w.Qualifier != "peak" {
		t.Errorf("w is %+v", w)
	}
	if c := n.Criteria[0]; c.Line != 8 || !*c.Holds || *c.Margin != 0.25 || *c.Worst != 0.2 {
		t.Errorf("the criterion is %+v", c)
	}
	if len(n.Findings) != 2 {
		t.Fatalf("%d findings; waived ones do not count", len(n.Findings))
	}
	// `    medium µ-oil_1`: the mark begins in column 12 and ends before 19.
	if f := n.Findings[0]; f.Line != 4 || f.Column != 12 || f.EndLine != 4 || f.EndColumn != 19 || f.Fix == "" {
		t.Errorf("the finding is %+v", f)
	}
	if f := n.Findings[1].Related; len(f) != 2 || f[0].Line != 7-1 || f[1].Path != "notes/oil.joule" || f[1].Line != 0 {
		t.Errorf("related: %+v", f)
	}
}

func TestJSONWithoutNotes(t *testing.T) {
	var r readReview
	if err := json.Unmarshal(written(t, "json"), &r); err != nil || r.Notes == nil || len(r.Notes) != 0 {
		t.Errorf("%+v, %v", r, err)
	}
}

func TestJSONValues(t *testing.T) {
	nan, inf := math.NaN(), math.Inf(1)
	cases := []struct {
		name  string
		value eval.Value
		want  string
	}{
		{"number", eval.Real(616.25), `616.25`},
		{"not a number", eval.Real(nan), `null`},
		{"infinite", eval.Real(-inf), `null`},
		{"small", eval.Real(8.8541878188e-12), `8.8541878188e-12`},
		{"complex", eval.Cplx(complex(3.2, -1.5)), `{"re":3.2,"im":-1.5}`},
		{"complex, not a number", eval.Cplx(complex(nan, inf)), `{"re":null,"im":null}`},
		{"vector", eval.Vec(1, nan, -3), `[1,null,-3]`},
		{"complex vector", eval.CVec(1i, 2, 3), `[{"re":0,"im":1},{"re":2,"im":0},{"re":3,"im":0}]`},
		{"tensor", eval.Ten([9]float64{1, 2, 3, 4, 5, 6, 7, 8, 9}), `[[1,2,3],[4,5,6],[7,8,9]]`},
		{"list", eval.ListOf(1, 2), `[1,2]`},
		{"empty list", eval.ListOf(), `[]`},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			got, err := json.Marshal(plainValue(c.value))
			if err != nil || string(got) != c.want {
				t.Errorf("%s, %v; want %s", got, err, c.want)
			}
		})
	}
}
