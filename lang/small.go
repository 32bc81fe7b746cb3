package lang

import (
	"fmt"
	"math"
	"sort"
	"strings"

	"inkjoule/lang/eval"
	"inkjoule/lang/unit"
)

// pi is the circle constant, for angular frequencies.
const pi = math.Pi

// norm is the magnitude of a value of any shape.
func norm(v eval.Value) float64 {
	sum := 0.0
	for i := range v.Len() {
		c := v.At(i).C()
		sum += real(c)*real(c) + imag(c)*imag(c)
	}
	return math.Sqrt(sum)
}

// distance is the magnitude of v − w; infinite where their lengths differ.
func distance(v, w eval.Value) float64 {
	if v.Len() != w.Len() {
		return math.Inf(1)
	}
	sum := 0.0
	for i := range v.Len() {
		c := v.At(i).C() - w.At(i).C()
		sum += real(c)*real(c) + imag(c)*imag(c)
	}
	return math.Sqrt(sum)
}

// asciiNumber writes a numeral with ASCII signs only.
func asciiNumber(s string) string {
	if !strings.ContainsFunc(s, func(r rune) bool { return r > 127 }) {
		return s
	}
	return strings.Map(func(r rune) rune {
		switch {
		case r == '−' || r == '⁻':
			return '-'
		case r == '⁺':
			return '+'
		case isSuperscript(r):
			return rune(superscriptDigit(r))
		}
		return r
	}, s)
}

func sorted(xs []string) []string {
	sort.Strings(xs)
	return xs
}

// Nearest is the candidate closest to the word, "" if none is close: at most a
// third of the letters differ, or only the case does.
func Nearest(word string, candidates []string) string {
	best, at := "", 1+len([]rune(word))/3
	for _, c := range candidates {
		if strings.EqualFold(c, word) {
			return c
		}
		if d := editDistance(word, c, at); d < at || d == at && best == "" && d <= len([]rune(word))/3 {
			best, at = c, d
		}
	}
	return best
}

func nearest(word string, candidates []string) string { return Nearest(word, candidates) }

// editDistance counts insertions, deletions, replacements and swaps of
// neighbours between two words, giving up beyond most.
func editDistance(a, b string, most int) int {
	x, y := []rune(a), []rune(b)
	if d := len(x) - len(y); d > most || -d > most {
		return most + 1
	}
	var before []int
	last := make([]int, len(y)+1)
	for j := range last {
		last[j] = j
	}
	for i := 1; i <= len(x); i++ {
		row := make([]int, len(y)+1)
		row[0] = i
		for j := 1; j <= len(y); j++ {
			cost := 1
			if x[i-1] == y[j-1] {
				cost = 0
			}
			row[j] = min(last[j]+1, row[j-1]+1, last[j-1]+cost)
			if i > 1 && j > 1 && x[i-1] == y[j-2] && x[i-2] == y[j-1] {
				row[j] = min(row[j], before[j-2]+1)
			}
		}
		before, last = last, row
	}
	return last[len(y)]
}

// unknownName reports a name that nothing defines, with the nearest one.
func (e *elab) unknownName(at Tree, name, rule string) {
	e.c.hinted = true
	if e.a.incomplete {
		return
	}
	f := Fault{Rule: rule, Severity: Error, Span: at.Place(), Message: fmt.Sprintf("%s is not defined in this note", name)}
	if near := e.a.nearestName(name); near != "" {
		f.Detail = fmt.Sprintf("did you mean %s?", near)
		f.Fix = &Fix{Title: "Write " + near, Edits: []Edit{{at.Place(), near}}}
	} else if u := e.a.readUnit(name); u.err == nil {
		f.Detail = fmt.Sprintf("%s is a unit: a unit follows its number, as in 3 %s", name, name)
	} else {
		f.Detail = "define it, or refer to the note that does with `uses`"
	}
	e.report(f)
}

// mostGuesses bounds the unknown names for which a near one is looked for, each
// among all names: a note full of them must not take long to be told so.
const mostGuesses = 100

// nearestName is the name of the note that is nearest to an unknown one, or "".
func (a *analysis) nearestName(name string) string {
	if near, ok := a.near[name]; ok || len(a.near) >= mostGuesses {
		return near
	}
	if a.near == nil {
		a.near, a.spelled = map[string]string{}, a.names()
	}
	a.near[name] = nearest(name, a.spelled)
	return a.near[name]
}

// names are the spellings of everything the note defines.
func (a *analysis) names() []string {
	var out []string
	for key, c := range a.cells {
		if c.owner != nil {
			continue
		}
		if c.name != nil {
			key = c.name.Text
		}
		out = append(out, key)
	}
	return sorted(out)
}

// constants enters the built-in constants, which are cells that are done.
func (a *analysis) constants() {
	if a.previous != nil {
		for key, c := range a.previous.cells {
			if c.role == RoleConstant {
				a.cells[key] = c
			}
		}
		return
	}
	for _, k := range eval.Constants() {
		c := &cell{key: CanonicalName(k.Name), role: RoleConstant}
		c.begin()
		u, err := unit.Parse(k.UnitPhrase)
		if err != nil {
			continue
		}
		s := &c.sym
		s.Name, s.Key, s.Role, s.Doc, s.Per = k.Name, c.key, RoleConstant, k.Meaning, k.Source
		s.Facts = Facts{Known: true, Dim: u.Dim}
		s.Facts.Kind, s.Facts.KindBy = constantKind(k.Name)
		s.Result = Result{Known: true, Value: eval.Real(k.Value), Standard: k.Standard, Unit: u}
		s.Low, s.High = k.Value-2*k.Standard, k.Value+2*k.Standard
		s.Shown = formatter{unit: u, digits: 10}.value(s.Value)
		c.plain = k.Name == "pi"
		if c.plain {
			c.pi = 1
		}
		a.cells[c.key] = c
	}
}
