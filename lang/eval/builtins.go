package eval

import (
	"slices"
	"strings"
)

// Takes tells what a builtin demands of its arguments, for the compiler's
// check of dimensions and for completion.
type Takes uint8

// What the builtins take.
const (
	TakesNumber     Takes = iota + 1 // a number of dimension 1 (or a list of such)
	TakesAngle                       // an angle or a number of dimension 1
	TakesAny                         // any dimension
	TakesSame                        // any dimension, the same for all arguments
	TakesVector                      // vectors of any dimension
	TakesDirection                   // a vector of which the direction counts
	TakesTensor                      // a tensor of any dimension
	TakesWhole                       // a whole number
	TakesNumberArea                  // cbrt, sqrt: any dimension, of which a root is taken
)

// Gives tells how a builtin's dimension follows from its arguments'.
type Gives uint8

// What the builtins give.
const (
	GivesNumber  Gives = iota + 1 // dimension 1
	GivesAngle                    // an angle
	GivesSame                     // the dimension of the first argument
	GivesProduct                  // the product of the arguments' dimensions
	GivesSqrt                     // the square root of the argument's dimension
	GivesCbrt                     // the cube root
	GivesInverse                  // the inverse of the argument's dimension
	GivesCube                     // the third power (det)
	GivesLength                   // metre (awg)
)

// Signature describes a builtin function.
type Signature struct {
	Name     string
	Min, Max int      // arity; Max < 0: any number
	Params   []string // names of the parameters, as help shows them
	Takes    []Takes  // for each parameter; the last one goes on
	Gives    Gives
	Doc      string // meaning, for hover and signature help
}

// builtin is a signature with what builds its code.
type builtin struct {
	Signature
	make func(name string, node int, args []Code) (Code, error)
}

// Builtins lists the functions of the language in order of name.
func Builtins() []Signature {
	var out []Signature
	for _, b := range all {
		out = append(out, b.Signature)
	}
	slices.SortFunc(out, func(a, b Signature) int { return strings.Compare(a.Name, b.Name) })
	return out
}

// Builtin builds a call of the function called name. The error is a
// *ShapeError: an unknown name, a wrong count or a wrong shape of arguments.
func Builtin(name string, node int, args []Code) (Code, error) {
	b, ok := all[name]
	if !ok {
		return Code{}, refuse("", "there is no function `%s`", name)
	}
	if len(args) < b.Min || b.Max >= 0 && len(args) > b.Max {
		return Code{}, b.wrongCount(len(args))
	}
	return b.make(name, node, args)
}

func (b builtin) wrongCount(n int) error {
	form := "`" + b.Name + "(" + strings.Join(b.Params, ", ") + ")`"
	return refuse("write "+form, "%s takes %s, not %d", b.Name, plural(b.Min, "argument"), n)
}

func plural(n int, word string) string {
	if n == 1 {
		return "1 " + word
	}
	return number(float64(n)) + " " + word + "s"
}

// all holds the functions by name; read only.
var all map[string]builtin

func init() {
	unaries, all = map[string]*unary{}, map[string]builtin{}
	for _, m := range []map[string]unary{powerFunctions(), circular(), special()} {
		for name, u := range m {
			unaries[name] = u.named(name)
			all[name] = builtin{unaries[name].signature(), makeUnary}
		}
	}
	for _, b := range slices.Concat(binaryBuiltins(), reductions(), partBuiltins(), tensorBuiltins()) {
		all[b.Name] = b
	}
}
