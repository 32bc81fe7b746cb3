package check

// Nearest gives the name among names that a misspelt one most probably means,
// or "" where none is near: at most two letters, or a third of a longer name, may differ. Of two
// equally near the first is taken.
func Nearest(name string, names []string) string {
	best, least := "", min(max(2, len(name)/3), len(name)-1)+1
	for _, n := range names {
		if d := distance(name, n, least); d < least {
			best, least = n, d
		}
	}
	return best
}

// distance is the number of letters to insert, drop, replace or swap with their
// neighbour that turns a into b, or limit where it is not below that.
func distance(a, b string, limit int) int {
	if abs(len(a)-len(b)) >= limit {
		return limit
	}
	var before, row []int
	next := make([]int, len(b)+1)
	for j := range next {
		next[j] = j
	}
	for i := 1; i <= len(a); i++ {
		before, row, next = row, next, make([]int, len(b)+1)
		next[0] = i
		for j := 1; j <= len(b); j++ {
			next[j] = min(row[j]+1, next[j-1]+1, row[j-1]+differ(a[i-1], b[j-1]))
			if i > 1 && j > 1 && a[i-1] == b[j-2] && a[i-2] == b[j-1] {
				next[j] = min(next[j], before[j-2]+1)
			}
		}
	}
	return min(next[len(b)], limit)
}

func differ(a, b byte) int {
	if a == b {
		return 0
	}
	return 1
}

func abs(n int) int { return max(n, -n) }
