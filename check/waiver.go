package check

import "inkjoule/lang"

// Waiver is a `waive` statement as the reviewer reads it.
type Waiver struct {
	Rule   string
	Name   string // the name that it speaks of as written, "" for the whole note
	Reason string
	Span   lang.Span // of the statement, note offsets
	Used   int       // findings that it silences
}

// Waivers lists the waivers of a note with the number of findings that each of
// them silences, in text order.
func Waivers(note *lang.Note, found []Finding) []Waiver {
	used := map[lang.Span]int{}
	for i := range found {
		if found[i].IsWaived() {
			used[found[i].WaivedBy]++
		}
	}
	var out []Waiver
	for _, s := range note.Script.Stmts {
		if w, ok := s.Tree.(*lang.Waive); ok {
			span := s.Abs(w)
			out = append(out, Waiver{w.Rule.Text, written(w.For), w.Reason.Text, span, used[span]})
		}
	}
	return out
}

// written is the name after `for` as it stands in the note.
func written(x lang.Expr) string {
	switch x := x.(type) {
	case *lang.Name:
		return x.Text
	case *lang.Member:
		return written(x.X) + "." + x.Field.Text
	}
	return ""
}
