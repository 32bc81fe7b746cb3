package lsp

// settings are what a user chooses in the editor. Each has a default; whatever
// the editor sends in its place, of any type, is ignored.
type settings struct {
	results   bool // hints of computed values
	asked     bool // hints of values that a blank asks for
	workspace bool // findings of notes that are not open
}

func defaults() settings { return settings{results: true, asked: true, workspace: true} }

// shows reports whether a hint is wanted.
func (s settings) shows(h hint) bool {
	if h.asked {
		return s.asked
	}
	return s.results
}

// with takes over what the editor sends: an object of this section, or one
// that holds the section.
func (s settings) with(sent any) settings {
	object, ok := sent.(map[string]any)
	if !ok {
		return s
	}
	if section, ok := object[source].(map[string]any); ok {
		object = section
	}
	if hints, ok := object["inlayHints"].(map[string]any); ok {
		set(&s.results, hints["results"])
		set(&s.asked, hints["asked"])
	}
	set(&s.workspace, object["workspaceDiagnostics"])
	return s
}

// set takes over a value of the right type.
func set[T any](to *T, sent any) {
	if v, ok := sent.(T); ok {
		*to = v
	}
}
