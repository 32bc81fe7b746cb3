package lang

import (
	"strings"
	"testing"
)

func TestTableFromFile(t *testing.T) {
	note := "t\n\n    table bh from \"bh.csv\"\n    x = bh.B at H = 150 A/m\n    table two from \"bh.csv\": B [T], H [A/m], w [J/m^3] = B*H/2\n    y = two.w[3]\n"
	f := folder{"a.joule": note, "bh.csv": "# measured\nH [A/m],B/T\n0,0\n100,0.2\n200,0.3\n"}
	got, n := shown(t, f, "a.joule", nil)
	for k, w := range map[string]string{"bh.H": "[0, 100.0, 200.0] A/m", "y": "30.00 J/m^3"} {
		if got[k] != w {
			t.Errorf("%s = %q, want %q", k, got[k], w)
		}
	}
	f["bh.csv"] = "H [A/m];B/T\n0;0\n100;0.2\n200;0.4\n"
	if got, _ = shown(t, f, "a.joule", n); got["y"] != "40.00 J/m^3" {
		t.Errorf("after a change of the file: y = %q", got["y"])
	}
}

func TestTableFromFileFaults(t *testing.T) {
	for text, want := range map[string]string{
		"H [A/m],B [T]\n0,0\n1\n":        "line 3 has 1 cell",
		"H [A/m],B [T]\n0,x\n":           `line 2: "x" is no number`,
		"H [A/m]\n0\n":                   "no column B",
		"H [A/m],B [mT]\n0,1\n":          "column B is in mT",
		"":                               "the first line names the columns",
		"H [A/m],B [T]\n0,1,5\n1,2,5\n ": "line 2 has 3 cells",
	} {
		f := folder{"a.joule": "t\n\n    table bh from \"bh.csv\": H [A/m], B [T]\n    x = bh.B[1]\n", "bh.csv": text}
		_, n := shown(t, f, "a.joule", nil)
		if len(n.Faults) == 0 || !strings.Contains(n.Faults[0].Message, want) {
			t.Errorf("%q: faults %v, want one with %q", text, n.Faults, want)
		}
	}
}
