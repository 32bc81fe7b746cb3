package main

import (
	"fmt"
	"strings"
)

// around is how many unchanged lines are shown on either side of a change.
const around = 3

// diffLines shows the changed lines of a text in the unified form of POSIX
// diff -u. Both texts have the same number of lines: what changes notes here
// adds and removes none.
func diffLines(path, before, after string) string {
	a, b := strings.SplitAfter(before, "\n"), strings.SplitAfter(after, "\n")
	var out strings.Builder
	for i := 0; i < len(a); i++ {
		if a[i] == b[i] {
			continue
		}
		end := i + 1 // of the last changed line of the hunk
		for j := i + 1; j < len(a) && j <= end+2*around; j++ {
			if a[j] != b[j] {
				end = j + 1
			}
		}
		if out.Len() == 0 {
			fmt.Fprintf(&out, "--- %s\n+++ %s\n", path, path)
		}
		hunk(&out, a, b, max(0, i-around), min(end+around, len(a)))
		i = end
	}
	return out.String()
}

// hunk writes the lines from one to another.
func hunk(out *strings.Builder, a, b []string, from, to int) {
	if to == len(a) && to > from && a[to-1] == "" && b[to-1] == "" {
		to-- // the text ends with a line end
	}
	fmt.Fprintf(out, "@@ -%d,%d +%d,%d @@\n", from+1, to-from, from+1, to-from)
	for i := from; i < to; {
		same := i
		for same < to && a[same] != b[same] {
			same++
		}
		for _, side := range []struct {
			mark  string
			lines []string
		}{{"-", a}, {"+", b}} {
			for _, line := range side.lines[i:same] {
				out.WriteString(side.mark + ended(line))
			}
		}
		if i = same; i < to {
			out.WriteString(" " + ended(a[i]))
			i++
		}
	}
}

// ended ends a line that the text leaves open.
func ended(line string) string {
	if strings.HasSuffix(line, "\n") {
		return line
	}
	return line + "\n\\ No newline at end of file\n"
}
