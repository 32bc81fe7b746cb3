package lang

import "sync"

// keptForms are the normal forms of one cell's definition, by the way in
// which they were built. They belong to the cell's work and so
// outlive an edit that does not reach it. Their symbols may be those of an
// earlier note, so a form is brought up to date before it is handed out.
type keptForms struct {
	mu sync.Mutex
	by map[formKey]*Form
}

// formKey tells forms of one definition apart.
type formKey struct {
	expand uintptr // the function that tells which names are looked through
	apart  bool
}

// get finds a form, with its symbols looked up anew where they have changed.
func (k *keptForms) get(n *Note, key formKey) (*Form, bool) {
	if k == nil {
		return nil, false
	}
	k.mu.Lock()
	defer k.mu.Unlock()
	f, ok := k.by[key]
	if ok && !f.current(n) {
		f = f.in(n)
		k.by[key] = f
	}
	return f, ok
}

func (k *keptForms) put(key formKey, f *Form) {
	if k == nil {
		return
	}
	k.mu.Lock()
	defer k.mu.Unlock()
	if k.by == nil {
		k.by = map[formKey]*Form{}
	}
	k.by[key] = f
}

// current reports whether every symbol of the form is the note's own.
func (f *Form) current(n *Note) bool {
	if f == nil {
		return true
	}
	for _, t := range f.Terms {
		for _, x := range t.Factors {
			if x.Symbol != nil && n.Lookup(x.Symbol.Key) != x.Symbol || x.Over != nil && n.Lookup(x.Over.Key) != x.Over || !x.Inside.current(n) {
				return false
			}
		}
	}
	return true
}

// in is the form with the symbols of another note of the same names.
func (f *Form) in(n *Note) *Form {
	return f.mark(func(x *Factor) {
		if x.Symbol != nil {
			x.Symbol = n.Lookup(x.Symbol.Key)
		}
		if x.Over != nil {
			x.Over = n.Lookup(x.Over.Key)
		}
		x.Inside = x.Inside.in(n)
	})
}
