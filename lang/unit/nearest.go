package unit

// advice is what to write instead of an unknown symbol.
type advice struct{ write, detail string }

// advise finds what was probably meant by an unknown symbol.
func advise(symbol string) advice {
	if s := Nearest(symbol); s != "" {
		return advice{s, "did you mean `" + s + "`?"}
	}
	return advice{detail: "no unit has that symbol"}
}

// Nearest returns the unit that was probably meant by an unknown symbol; "" if
// none is near.
func Nearest(symbol string) string { return "" }
