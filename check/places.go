package check

import (
	"cmp"
	"slices"
	"sort"

	"inkjoule/lang"
)

// place is one definition or statement of the note; a medium's properties are
// places of their own, its head is one too.
type place struct {
	start int // note offset; the place ends where the next begins or its statement ends
	stmt  *lang.Stmt
	def   *lang.Definition // nil: the statement is no definition, or this is a medium's head
}

// places finds the definition in which an offset lies.
type places struct{ all []place }

func newPlaces(note *lang.Note) *places {
	p := &places{}
	for _, s := range note.Script.Stmts {
		p.add(s)
	}
	slices.SortStableFunc(p.all, func(a, b place) int { return cmp.Compare(a.start, b.start) })
	return p
}

func (p *places) add(s *lang.Stmt) {
	def, _ := s.Tree.(*lang.Definition)
	p.all = append(p.all, place{s.At, s, def})
	if m, ok := s.Tree.(*lang.Medium); ok {
		for _, property := range m.Properties {
			p.all = append(p.all, place{s.Abs(property).Start, s, property})
		}
	}
}

// index gives the number of the place that holds the offset, or -1 in prose.
func (p *places) index(at int) int {
	i := sort.Search(len(p.all), func(i int) bool { return p.all[i].start > at }) - 1
	if i < 0 || at > p.all[i].stmt.At+len(p.all[i].stmt.Text) {
		return -1
	}
	return i
}

// at gives the place that holds the offset.
func (p *places) at(offset int) (place, bool) {
	i := p.index(offset)
	if i < 0 {
		return place{}, false
	}
	return p.all[i], true
}

// usesWithin gives the uses of names that lie within a span. Uses are sorted
// by place and never nest except for a member and its owner.
func usesWithin(note *lang.Note, span lang.Span) []lang.Use {
	first := sort.Search(len(note.Uses), func(i int) bool { return note.Uses[i].Span.Start >= span.Start })
	last := first
	for last < len(note.Uses) && note.Uses[last].Span.Start < span.End {
		last++
	}
	var out []lang.Use
	for _, u := range note.Uses[first:last] {
		if u.Span.End <= span.End {
			out = append(out, u)
		}
	}
	return out
}
