package report

import (
	"bytes"
	"encoding/json"
	"os"
	"strings"
	"testing"

	"github.com/santhosh-tekuri/jsonschema/v6"

	"inkjoule/check"
	"inkjoule/lang"
)

// valid holds a document against the schema of the standard: OASIS, Static
// Analysis Results Interchange Format (SARIF) Version 2.1.0, errata 01.
func valid(t *testing.T, doc []byte) {
	t.Helper()
	raw, err := os.ReadFile("testdata/sarif-schema-2.1.0.json")
	if err != nil {
		t.Fatal(err)
	}
	schema, err := jsonschema.UnmarshalJSON(bytes.NewReader(raw))
	if err != nil {
		t.Fatal(err)
	}
	c := jsonschema.NewCompiler()
	c.AssertFormat()
	if err := c.AddResource("sarif.json", schema); err != nil {
		t.Fatal(err)
	}
	compiled, err := c.Compile("sarif.json")
	if err != nil {
		t.Fatal(err)
	}
	got, err := jsonschema.UnmarshalJSON(bytes.NewReader(doc))
	if err != nil {
		t.Fatalf("no JSON: %v\n%s", err, doc)
	}
	if err := compiled.Validate(got); err != nil {
		t.Errorf("not valid: %v", err)
	}
}

// reading is what a reader that knows nothing of this package takes from it.
type reading struct {
	Runs []struct {
		Tool struct {
			Driver struct {
				Rules []struct {
					ID                   string
					Help                 struct{ Text, Markdown string }
					DefaultConfiguration struct{ Level string }
				}
			}
		}
		ColumnKind string
		Results    []struct {
			RuleID              string
			RuleIndex           int
			Level               string
			Message             struct{ Text string }
			PartialFingerprints map[string]string
			RelatedLocations    []json.RawMessage
			Suppressions        []struct{ Kind, Justification string }
			Locations           []struct {
				PhysicalLocation struct {
					ArtifactLocation struct{ URI string }
					Region           struct {
						StartLine, StartColumn, EndLine, EndColumn int
						Snippet                                    struct{ Text string }
					}
				}
			}
		}
		Invocations []struct {
			ExecutionSuccessful        bool
			ToolExecutionNotifications []struct{ Message struct{ Text string } }
		}
	}
}

func TestSARIF(t *testing.T) {
	doc := written(t, "sarif", sample(), empty())
	valid(t, doc)
	var got reading
	if err := json.Unmarshal(doc, &got); err != nil {
		t.Fatal(err)
	}
	run := got.Runs[0]
	if len(run.Results) != 3 || run.ColumnKind != "unicodeCodePoints" || run.Invocations[0].ExecutionSuccessful ||
		run.Invocations[0].ToolExecutionNotifications[0].Message.Text != "notes/lost.joule does not exist" {
		t.Errorf("%+v", run)
	}
	for _, r := range run.Results {
		if r.RuleIndex >= 0 && run.Tool.Driver.Rules[r.RuleIndex].ID != r.RuleID {
			t.Errorf("the index of %s leads to %s", r.RuleID, run.Tool.Driver.Rules[r.RuleIndex].ID)
		}
	}
	first, waived, third := run.Results[0], run.Results[1], run.Results[2]
	at := first.Locations[0].PhysicalLocation
	if first.RuleID != "syntax" || first.Level != "note" || at.ArtifactLocation.URI != "notes/cell.joule" || at.Region.Snippet.Text != "µ-oil_1" ||
		at.Region.StartLine != 4 || at.Region.StartColumn != 12 || at.Region.EndLine != 4 || at.Region.EndColumn != 19 {
		t.Errorf("%+v", first)
	}
	if len(waived.Suppressions) != 1 || waived.Suppressions[0].Kind != "inSource" || waived.Suppressions[0].Justification != "both are amplitudes" {
		t.Errorf("%+v", waived)
	}
	if len(third.RelatedLocations) != 2 || third.Level != "error" || len(third.Suppressions) != 0 {
		t.Errorf("%+v", third)
	}
	for _, r := range run.Tool.Driver.Rules {
		if r.Help.Text == "" || r.Help.Markdown == "" || r.DefaultConfiguration.Level == "" {
			t.Errorf("%s is not explained", r.ID)
		}
	}
}

func TestSARIFWithoutNotes(t *testing.T) {
	valid(t, written(t, "sarif"))
}

// A finding keeps its fingerprint when its lines move, and gets another when
// its statement changes; equal ones are told apart.
func TestFingerprints(t *testing.T) {
	of := func(text string) []string {
		n := &lang.Note{Path: "a.joule", Script: lang.Read(text, nil)}
		note := &Note{Note: n}
		for i := 0; ; {
			at := strings.Index(text[i:], "C*U^2")
			if at < 0 {
				break
			}
			i += at + 1
			note.Findings = append(note.Findings, check.Finding{Path: n.Path, Fault: lang.Fault{Rule: "r", Severity: lang.Error, Message: "m", Span: lang.Span{Start: i - 1, End: i + 4}}})
		}
		var got reading
		if err := json.Unmarshal(written(t, "sarif", note), &got); err != nil {
			t.Fatal(err)
		}
		var out []string
		for _, r := range got.Runs[0].Results {
			out = append(out, r.PartialFingerprints["statement/v1"])
		}
		return out
	}
	a := of("Note\n\n    W = C*U^2\n    W = C*U^2\n")
	moved := of("Note\n\nAnother line.\n\n    W   = C*U^2\n    W = C*U^2\n")
	other := of("Note\n\n    W_2 = C*U^2\n")
	if len(a) != 2 || a[0] == a[1] || a[0] != moved[0] || a[1] != moved[1] || other[0] == a[0] {
		t.Errorf("%v\n%v\n%v", a, moved, other)
	}
}
