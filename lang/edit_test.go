package lang

import (
	"slices"
	"testing"

	"pgregory.net/rapid"
)

// TestReplaceEqualsNewIndex holds that an edited source has the line index that
// its text alone would give, whatever line ends the edit joins or parts.
func TestReplaceEqualsNewIndex(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		text := rapid.StringOfN(rapid.RuneFrom([]rune("a\r\n°😀")), 0, 20, -1)
		src := NewSource(text.Draw(t, "text"))
		for range 20 {
			start := rapid.IntRange(0, len(src.Text)).Draw(t, "start")
			end := rapid.IntRange(start, len(src.Text)).Draw(t, "end")
			src = src.Replace(Span{start, end}, text.Draw(t, "new"))
			if want := NewSource(src.Text); !slices.Equal(src.lines, want.lines) {
				t.Fatalf("%q: lines %v, want %v", src.Text, src.lines, want.lines)
			}
		}
	})
}
