package rules

import "strings"

// unitParts splits a unit phrase into its symbols.
func unitParts(phrase string) []string {
	return strings.FieldsFunc(phrase, func(r rune) bool { return strings.ContainsRune("·./()^-0123456789²³⁻¹", r) })
}
