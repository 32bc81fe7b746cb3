package kind

import (
	"slices"
	"sort"
	"strings"
)

// longestWords bounds the words that are compared with the table: no kind is
// nearly as long.
const longestWords = 80

// hit is a name of the table near to the words asked for; the lower the rank
// and then the distance, the nearer.
type hit struct {
	*spelling
	rank, far int
}

func (h hit) nearer(g hit) bool { return h.rank < g.rank || h.rank == g.rank && h.far < g.far }

// Nearest returns up to n names of kinds nearest to the words, best first and
// one for each kind: slips of the pen, then names that hold all the words
// (`field strength`), then names all of whose words are among them.
func Nearest(words string, n int) []string {
	var names []string
	hits := nearest(words)
	for _, h := range hits[:min(n, len(hits))] {
		names = append(names, h.name)
	}
	return names
}

// nearest returns the best name of each kind that has a near one, best first.
func nearest(words string) []hit {
	want := fold(words)
	if want == "" || len(want) > longestWords {
		return nil
	}
	var hits []hit
	parts, spellings := strings.Fields(want), derived().names
	for i := range spellings {
		h, near := compare(want, parts, &spellings[i])
		switch last := len(hits) - 1; {
		case !near:
		case last < 0 || hits[last].kind != h.kind:
			hits = append(hits, h)
		case h.nearer(hits[last]):
			hits[last] = h
		}
	}
	sort.SliceStable(hits, func(i, j int) bool { return hits[i].nearer(hits[j]) })
	return hits
}

// compare ranks a name: 0 a slip, 1 it holds the words, 2 the words hold it.
func compare(want string, words []string, s *spelling) (hit, bool) {
	h := hit{s, 0, len(want) + len(s.folded)}
	if d := len(want) - len(s.folded); d*4 <= len(want) && -d*4 <= len(want) {
		h.far = distance(want, s.folded)
	}
	switch {
	case h.far*4 <= len(want):
	case within(words, s.words):
		h.rank = 1
	case within(s.words, words):
		h.rank, h.far = 2, -len(s.folded) // the longest name that is held
	default:
		return hit{}, false
	}
	return h, true
}

// within reports that every word of a is a word of b.
func within(a, b []string) bool {
	for _, w := range a {
		if !slices.Contains(b, w) {
			return false
		}
	}
	return true
}

// distance is the number of characters to change, insert or drop to turn a
// into b.
func distance(a, b string) int {
	x, y := []rune(a), []rune(b)
	row := make([]int, len(y)+1, longestWords)
	for j := range row {
		row[j] = j
	}
	for i, c := range x {
		left, diagonal := i+1, i
		for j, d := range y {
			cost := diagonal
			if c != d {
				cost = 1 + min(diagonal, left, row[j+1])
			}
			diagonal, left, row[j] = row[j+1], cost, left
		}
		row[len(y)] = left
	}
	return row[len(y)]
}
