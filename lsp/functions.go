package lsp

import (
	"strings"

	"inkjoule/lang"
	"inkjoule/lang/eval"
)

// signature is how a function, a form that binds a variable, or a shape is
// written.
type signature struct {
	name   string
	params []string // what stands between the parentheses, apart by commas
	doc    string
}

func (s signature) label() string { return s.name + "(" + strings.Join(s.params, ", ") + ")" }

// functions of the language in order of name, the forms among them.
func functions() []signature {
	out := forms()
	for _, f := range eval.Builtins() {
		out = append(out, signature{f.Name, f.Params, f.Doc})
	}
	return out
}

// forms are the functions that bind a variable or take a region, a column, a
// tolerance.
func forms() []signature {
	return []signature{
		{"integral", []string{"EXPR for x from A to B"}, "the integral over a variable, over the points of a table's column, or `EXPR over REGION` with its volume, surface or line element"},
		{"derivative", []string{"EXPR for x at A"}, "the derivative with respect to a variable at a value of it"},
		{"solve", []string{"EXPR = EXPR for x from A to B"}, "the value of the variable, between the bounds, for which both sides are equal"},
		{"loop", []string{"t.X", "t.Y"}, "the area of the closed polygon of two columns, positive"},
		{"assembly_energy", []string{"t.q", "t.x", "t.y", "t.z", "eps"}, "the energy of point charges, each pair counted once; eps_0 where no eps is given"},
		{"potential", []string{"t.q", "t.x", "t.y", "t.z", "point"}, "the potential of point charges at a point"},
		{"lower", []string{"x"}, "the lower worst-case bound"},
		{"upper", []string{"x"}, "the upper worst-case bound"},
	}
}

// shapes of a region.
func shapes() []signature {
	return []signature{
		{"box", []string{"a", "b", "c"}, "volume 0…a, 0…b, 0…c; coordinates x, y, z"},
		{"ball", []string{"R"}, "volume; coordinates r, theta, phi"},
		{"shell", []string{"a", "b"}, "volume between the radii a and b; coordinates r, theta, phi"},
		{"cylinder", []string{"R", "L"}, "volume; coordinates r, phi, z"},
		{"tube", []string{"a", "b", "L"}, "volume between the radii a and b; coordinates r, phi, z"},
		{"rectangle", []string{"a", "b"}, "surface; coordinates x, y"},
		{"disc", []string{"R"}, "surface; coordinates r, phi"},
		{"sphere", []string{"R"}, "surface; coordinates theta, phi"},
		{"wall", []string{"R", "L"}, "the side of a cylinder; coordinates phi, z"},
		{"segment", []string{"L"}, "line; coordinate x"},
		{"ring", []string{"R"}, "line; coordinate phi"},
	}
}

// signatureOf finds a function or shape of the language by name.
func signatureOf(name string) (signature, bool) {
	for _, s := range append(functions(), shapes()...) {
		if s.name == name {
			return s, true
		}
	}
	return signature{}, false
}

// ownSignature is the signature of a function of the note.
func ownSignature(sym *lang.Symbol) (signature, bool) {
	if sym == nil || sym.Role != lang.RoleFunction && sym.Role != lang.RoleProperty || sym.Def == nil || len(sym.Def.Params) == 0 {
		return signature{}, false
	}
	s := signature{name: sym.Name}
	for _, p := range sym.Def.Params {
		s.params = append(s.params, p.Text)
	}
	if sym.Facts.Kind != 0 {
		s.doc = sym.Facts.Kind.String()
	}
	return s, true
}
