package lang

import (
	"context"
	"errors"
	"testing"
)

// folder is a set of notes by path.
type folder map[string]string

func (f folder) Read(_ context.Context, path string) (string, error) {
	if t, ok := f[path]; ok {
		return t, nil
	}
	return "", errors.New("no such note")
}

// shown analyses a note of a folder and gives its values as shown.
func shown(t *testing.T, f folder, path string, previous *Note) (map[string]string, *Note) {
	t.Helper()
	n, err := Analyze(context.Background(), f[path], Options{Path: path, Files: f, Previous: previous})
	if err != nil {
		t.Fatal(err)
	}
	out := map[string]string{}
	for _, s := range n.Symbols {
		out[s.Key] = s.Shown
	}
	return out, n
}

func TestUses(t *testing.T) {
	f := folder{
		"a/main.joule":  "t\n\n    uses \"../b/parts.joule\" as p\n    uses \"media.joule\"\n    W = 1/2*p.C*U^2\n    U = p.double(3 V)\n    e = oil.eps\n    k = p.glass.eps_r\n",
		"b/parts.joule": "t\n\n    C = 2 F\n    double(x) = two*x\n    two = 2\n    medium glass\n        eps_r = 5\n",
		"a/media.joule": "t\n\n    medium oil\n        eps_r = 2\n",
	}
	got, n := shown(t, f, "a/main.joule", nil)
	want := map[string]string{"U": "6.000 V", "W": "36.00 J", "e": "17.71 pF/m", "k": "5.000"}
	for k, w := range want {
		if got[k] != w {
			t.Errorf("%s = %q, want %q", k, got[k], w)
		}
	}
	for _, x := range n.Faults {
		if x.Severity > Advice {
			t.Errorf("unexpected %s: %s", x.Rule, x.Message)
		}
	}
	f["b/parts.joule"] = "t\n\n    C = 4 F\n    double(x) = two*x\n    two = 3\n    medium glass\n        eps_r = 6\n"
	got, _ = shown(t, f, "a/main.joule", n)
	for k, w := range map[string]string{"U": "9.000 V", "W": "162.0 J", "k": "6.000"} {
		if got[k] != w {
			t.Errorf("after a change of the referred note: %s = %q, want %q", k, got[k], w)
		}
	}
}

func TestUsesFaults(t *testing.T) {
	f := folder{
		"a.joule": "t\n\n    uses \"b.joule\"\n    x = y\n",
		"b.joule": "t\n\n    uses \"a.joule\"\n    y = 1\n",
		"c.joule": "t\n\n    uses \"none.joule\" as q\n    x = q.y\n    z = q.f(2)\n",
		"d.joule": "t\n\n    uses \"handbook/nothing\"\n    x = air.eps_r\n",
	}
	for path, want := range map[string]string{"a.joule": "", "b.joule": "", "c.joule": "unknown-note", "d.joule": "unknown-note"} {
		_, n := shown(t, f, path, nil)
		var errs []string
		for _, x := range n.Faults {
			if x.Severity == Error {
				errs = append(errs, x.Rule)
			}
		}
		if want == "" && len(errs) != 0 || want != "" && (len(errs) != 1 || errs[0] != want) {
			t.Errorf("%s: errors %v, want one %q", path, errs, want)
		}
	}
}
