package eval

import (
	"context"
	"math"
	"testing"
)

// Slots of the coordinates in the tests below.
var at = Coordinates{R: 0, Theta: 1, Phi: 2, X: 3, Y: 4, Z: 5, N: 6}

// expr builds code from Go expressions of code, failing the test on a refusal.
type expr struct{ t testing.TB }

func (e expr) add(cs ...Code) Code { return e.fold(Add, cs) }
func (e expr) sub(cs ...Code) Code { return e.fold(Sub, cs) }
func (e expr) mul(cs ...Code) Code { return e.fold(Mul, cs) }
func (e expr) div(cs ...Code) Code { return e.fold(Div, cs) }
func (e expr) dot(a, b Code) Code  { return must(e.t)(Dot(0, a, b)) }
func (e expr) pow(a Code, k float64) Code {
	return must(e.t)(Pow(0, a, Num(k)))
}
func (e expr) vec(x, y, z Code) Code { return must(e.t)(Triple(0, x, y, z)) }
func (e expr) call(name string, args ...Code) Code {
	e.t.Helper()
	return must(e.t)(Builtin(name, 0, args))
}
func (e expr) fold(op func(int, Code, Code) (Code, error), cs []Code) Code {
	e.t.Helper()
	c := cs[0]
	for _, d := range cs[1:] {
		c = must(e.t)(op(0, c, d))
	}
	return c
}

func lengths(xs ...float64) []Code {
	var out []Code
	for _, x := range xs {
		out = append(out, Num(x))
	}
	return out
}

func TestRegionIntegralsOfKnownValue(t *testing.T) {
	e := expr{t}
	r, theta, phi, x, y, z := slot(0), slot(1), slot(2), slot(3), slot(4), slot(5)
	n := Slot(6, Type{Shape: Vector})
	const pi = math.Pi
	cases := []struct {
		name string
		r    Region
		body Code
		want float64
	}{
		// Second moments: Gradshteyn and Ryzhik 4.64, or one line by hand.
		{"ball r^2", Region{Kind: Ball, Params: lengths(2)}, e.pow(r, 2), 4 * pi * 32 / 5},
		{"ball z^2", Region{Kind: Ball, Params: lengths(2)}, e.pow(z, 2), 4 * pi * 32 / 15},
		{"ball x^2 y^2", Region{Kind: Ball, Params: lengths(1)}, e.mul(e.pow(x, 2), e.pow(y, 2)), 4 * pi / 105},
		{"shell 1/r^4", Region{Kind: Shell, Params: lengths(0.5, 2)}, e.pow(r, -4), 4 * pi * (2 - 0.5)},
		{"shell cos^2", Region{Kind: Shell, Params: lengths(1, 2)}, e.pow(e.call("cos", theta), 2), 4 * pi / 3 * 7 / 3},
		{"box x y^2", Region{Kind: Box, Params: lengths(1, 2, 3)}, e.mul(x, e.pow(y, 2)), 0.5 * 8 / 3 * 3},
		{"box r^2", Region{Kind: Box, Params: lengths(1, 1, 1)}, e.pow(r, 2), 1},
		{"cylinder r^2 z", Region{Kind: Cylinder, Params: lengths(2, 3)}, e.mul(e.pow(r, 2), z), 2 * pi * 4 * 4.5},
		{"cylinder x^2", Region{Kind: Cylinder, Params: lengths(2, 3)}, e.pow(x, 2), pi * 4 * 3},
		{"tube 1/r^2", Region{Kind: Tube, Params: lengths(1, 4, 2)}, e.pow(r, -2), 4 * pi * math.Log(4)},
		{"tube sin^2", Region{Kind: Tube, Params: lengths(1, 2, 1)}, e.pow(e.call("sin", phi), 2), pi * 1.5},
		{"rectangle x y", Region{Kind: Rectangle, Params: lengths(2, 3)}, e.mul(x, y), 2 * 4.5},
		{"disc r", Region{Kind: Disc, Params: lengths(3)}, r, 2 * pi * 9},
		{"disc x^2", Region{Kind: Disc, Params: lengths(1)}, e.pow(x, 2), pi / 4},
		{"sphere z^2", Region{Kind: Sphere, Params: lengths(2)}, e.pow(z, 2), 4 * pi * 16 / 3},
		{"wall z cos^2", Region{Kind: Wall, Params: lengths(2, 3)}, e.mul(z, e.pow(e.call("cos", phi), 2)), 2 * pi * 4.5},
		{"segment x^3", Region{Kind: Segment, Params: lengths(2)}, e.pow(x, 3), 4},
		{"ring x^2", Region{Kind: Ring, Params: lengths(2)}, e.pow(x, 2), pi * 8},
		{"ring, 16 poles", Region{Kind: Ring, Params: lengths(1)}, e.pow(e.call("cos", e.mul(Num(8), phi)), 2), pi},
		{"ring, 11 poles", Region{Kind: Ring, Params: lengths(1)}, e.pow(e.call("cos", e.mul(Num(5.5), phi)), 2), pi},
		{"ring, kinks", Region{Kind: Ring, Params: lengths(1)}, must(t)(Abs(0, e.call("sin", phi))), 4},
		{"no dependence", Region{Kind: Tube, Params: lengths(1, 2, 3)}, Num(5), 45 * pi},
		// Gauss's theorem: ∮F·n dA = ∫div F dV, F = (x^3, y z, z^2 x), div F = 3x^2 + z + 2zx.
		{"flux out of a ball", Region{Kind: Ball, Params: lengths(2), Boundary: true}, e.dot(field(e), n), 3 * 4 * pi * 32 / 15},
		{"flux out of a box", Region{Kind: Box, Params: lengths(1, 2, 3), Boundary: true}, e.dot(field(e), n), 6 + 9 + 9},
		{"flux out of a cylinder", Region{Kind: Cylinder, Params: lengths(2, 3), Boundary: true}, e.dot(field(e), n), 36*pi + 18*pi},
		{"flux out of a tube", Region{Kind: Tube, Params: lengths(1, 2, 3), Boundary: true}, e.dot(field(e), n), 3*3*pi/4*15 + 4.5*3*pi},
		{"flux out of a shell", Region{Kind: Shell, Params: lengths(1, 2), Boundary: true}, e.dot(field(e), n), 3 * 4 * pi * 31 / 15},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			v := run(t, must(t)(RegionIntegral(0, c.r, at, c.body)), make([]Value, 7)...)
			near(t, c.name, v.Re(), c.want, 1e-9)
		})
	}
}

// field is (x^3, y z, z^2 x).
func field(e expr) Code {
	x, y, z := slot(3), slot(4), slot(5)
	return e.vec(e.pow(x, 3), e.mul(y, z), e.mul(e.pow(z, 2), x))
}

func TestMeasureIsTheIntegralOfOne(t *testing.T) {
	e := expr{t}
	for kind, fact := range regionFacts {
		for _, boundary := range []bool{false, true} {
			if boundary && fact.dims < 3 {
				continue
			}
			r := Region{Kind: kind, Params: lengths([]float64{0.7, 1.3, 2.1}[:fact.params]...), Boundary: boundary}
			// 1 that depends on everything: sin² + cos² of each coordinate
			one := Num(1)
			for s := range 6 {
				w := e.mul(Num(0.1), slot(s))
				one = e.mul(one, e.add(e.pow(e.call("sin", w), 2), e.pow(e.call("cos", w), 2)))
			}
			got := run(t, must(t)(RegionIntegral(0, r, at, one)), make([]Value, 7)...)
			want := run(t, must(t)(Measure(0, r)))
			near(t, fact.name, got.Re(), want.Re(), 1e-9)
		}
	}
}

// A charge anywhere inside, none outside: the flux of its field is the charge.
func TestGaussLaw(t *testing.T) {
	e := expr{t}
	n := Slot(6, Type{Shape: Vector})
	for _, c := range []struct {
		place Value
		want  float64
	}{{Vec(0.3, 0.5, 0.2), 1}, {Vec(0.9, 0.1, 0.5), 1}, {Vec(1.5, 0.5, 0.5), 0}} {
		d := must(t)(Sub(0, e.vec(slot(3), slot(4), slot(5)), Const(c.place)))
		l := must(t)(Abs(0, d))
		flux := e.div(e.dot(d, n), e.mul(Num(4*math.Pi), e.pow(l, 3)))
		v := run(t, must(t)(RegionIntegral(0, Region{Kind: Box, Params: lengths(1, 1, 1), Boundary: true}, at, flux)), make([]Value, 7)...)
		if math.Abs(v.Re()-c.want) > 1e-9 {
			t.Errorf("flux of a charge at %v is %.12g, want %g", c.place, v.Re(), c.want)
		}
	}
}

// The field energy of a point charge has no finite value in a ball around it
// (OpenStax, University Physics 2, sec. 8.3, gives the energy outside R).
func TestPointChargeEnergyDiverges(t *testing.T) {
	e := expr{t}
	c := must(t)(RegionIntegral(3, Region{Kind: Ball, Params: lengths(1)}, at, e.pow(slot(0), -4)))
	_, fault := NewFrame(context.Background(), 7, Budget{}).Run(0, c)
	if fault == nil || fault.Rule != RuleDiverges || fault.Node != 3 {
		t.Errorf("fault %+v, want %s", fault, RuleDiverges)
	}
}

// A singular corner in two and three dimensions: the mean reciprocal distance
// between two points of a unit square (OEIS A254140) and of a unit cube (twice
// the self-energy coefficient OEIS A336274), by the distribution of differences.
func TestSelfEnergyOfSquareAndCube(t *testing.T) {
	e := expr{t}
	x, y, z := slot(3), slot(4), slot(5)
	rest := func(c Code) Code { return e.mul(Num(2), e.sub(Num(1), c)) }
	square := e.div(e.mul(rest(x), rest(y)), e.call("sqrt", e.add(e.pow(x, 2), e.pow(y, 2))))
	v := run(t, must(t)(RegionIntegral(0, Region{Kind: Rectangle, Params: lengths(1, 1)}, at, square)), make([]Value, 7)...)
	near(t, "square", v.Re(), 2.97320959824737848, 1e-9)
	cube := e.div(e.mul(rest(x), rest(y), rest(z)), e.call("sqrt", e.add(e.pow(x, 2), e.pow(y, 2), e.pow(z, 2))))
	v = run(t, must(t)(RegionIntegral(0, Region{Kind: Box, Params: lengths(1, 1, 1)}, at, cube)), make([]Value, 7)...)
	near(t, "cube", v.Re(), 2*0.94115632219483008, 1e-9)
}

func TestRegionsByName(t *testing.T) {
	for _, name := range []string{"box", "ball", "shell", "cylinder", "tube", "rectangle", "disc", "sphere", "wall", "segment", "ring"} {
		k, ok := RegionNamed(name)
		if !ok || k.String() != name || k.Params() == 0 || k.Dims() == 0 || len(k.Coords()) != k.Dims() {
			t.Errorf("%s: %v %v", name, k, k.Coords())
		}
	}
	if _, ok := RegionNamed("cone"); ok {
		t.Error("there is a cone")
	}
	for _, r := range []Region{
		{Kind: Box, Params: lengths(1)}, {Kind: Disc, Params: lengths(1), Boundary: true}, {},
		{Kind: Segment, Params: []Code{Const(Vec(1, 2, 3))}},
	} {
		if _, err := RegionIntegral(0, r, at, Num(1)); err == nil {
			t.Errorf("%+v is not refused", r)
		}
		if _, err := Measure(0, r); err == nil || err.Error() == "" {
			t.Errorf("%+v is measured", r)
		}
	}
}
