package kind

import "testing"

func TestEveryKindParses(t *testing.T) {
	for _, k := range All() {
		if table[k].Name == "" {
			t.Fatalf("kind %d has no line in the table", k)
		}
		for _, name := range table[k].Names() {
			if _, got, fault := Parse("peak " + name); fault != nil || got != k {
				t.Errorf("%q reads as %q, want %q (%v)", name, got, k, fault)
			}
		}
		if k.Unit().IsZero() {
			t.Errorf("%s: the unit %q does not parse", k, table[k].Unit)
		}
	}
}

func TestDistance(t *testing.T) {
	for _, c := range []struct {
		a, b string
		want int
	}{{"", "", 0}, {"abc", "", 3}, {"", "ab", 2}, {"kitten", "sitting", 3}, {"volume", "volume", 0}, {"a", "b", 1}} {
		if got := distance(c.a, c.b); got != c.want {
			t.Errorf("distance(%q, %q) = %d, want %d", c.a, c.b, got, c.want)
		}
	}
}
