package main

// useColor decides whether text is coloured: the flag first, then NO_COLOR
// (not empty) and TERM, then whether a person looks at the output.
func (w *world) useColor(flag, output string) (bool, error) {
	switch flag {
	case "always":
		return true, nil
	case "never":
		return false, nil
	case "auto":
		quiet := w.getenv("NO_COLOR") != "" || w.getenv("TERM") == "dumb" || output != ""
		return !quiet && isTerminal(w.out), nil
	}
	return false, usage("--color takes auto, always or never, not %q", flag)
}
