// Package rules holds the rules of physics, one file a rule.
//
// A rule is a method of Book that gives a check.Rule; All finds it by
// reflection, so that its file is its only home: there is no list to keep and
// no state to fill at start. The method's name is the rule's name in another
// spelling (HalfMissingStoredEnergy, half-missing-stored-energy).
package rules

import (
	"reflect"
	"sync"

	"inkjoule/check"
)

// Book is the set of all rules; it carries nothing.
type Book struct{}

// All gives every rule, by name. The rules are shared and must not be changed.
func All() []*check.Rule { return all() }

var all = sync.OnceValue(func() []*check.Rule {
	book := reflect.ValueOf(Book{})
	var out []*check.Rule
	for i := range book.NumMethod() {
		if entry, ok := book.Method(i).Interface().(func() check.Rule); ok {
			rule := entry()
			out = append(out, &rule)
		}
	}
	return out
})
