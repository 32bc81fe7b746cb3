package check

// Language is the documentation of what the language itself finds.
func Language() []*Rule { return nil }
