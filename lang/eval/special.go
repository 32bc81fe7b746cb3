package eval

import (
	"math"

	"gonum.org/v1/gonum/mathext"
)

// special are erf, the complete elliptic integrals of parameter m = k² and the
// American wire gauge.
func special() map[string]unary {
	return map[string]unary{
		"erf": {re: math.Erf, slope: func(x, _ float64) float64 { return 2 / math.SqrtPi * math.Exp(-x*x) },
			diff: erfDiff, doc: "error function"},
		"ellipK": {re: ellipK, slope: func(m, _ float64) float64 { return ellipKSlope(m) }, outside: modulus,
			diff: ellipKDiff, doc: "complete elliptic integral of the first kind K, of the parameter m = k²"},
		"ellipE": {re: ellipE, slope: func(m, _ float64) float64 { return -0.5 * ellipD(m) }, outside: beyondUnit,
			diff: func(n int, x, _ Code) (Code, error) { return product(n, Num(-0.5), hidden(n, x)), nil },
			doc:  "complete elliptic integral of the second kind E, of the parameter m = k²"},
		"awg": {re: wireGauge, slope: func(_, y float64) float64 { return -math.Log(92) / 39 * y },
			diff:  func(n int, _, y Code) (Code, error) { return product(n, Num(-math.Log(92)/39), y), nil },
			gives: GivesLength, doc: "diameter of a wire of American wire gauge n; write -1, -2, -3 for 00, 000, 0000"},
	}
}

// wireGauge is the diameter in metres: 0.127 mm at gauge 36 and a factor of 92
// over 39 steps (ASTM B258, section 5).
func wireGauge(n float64) float64 { return 0.127e-3 * math.Pow(92, (36-n)/39) }

func erfDiff(n int, x, _ Code) (Code, error) {
	return product(n, Num(2/math.SqrtPi), call1("exp", n, Neg(n, product(n, x, x)))), nil
}

func modulus(m float64) string {
	if m == 1 {
		return "pole"
	}
	return beyondUnit(m)
}

func beyondUnit(m float64) string {
	if m > 1 {
		return "complex"
	}
	return ""
}

// ellipK is K(m) for m < 1; below zero by the imaginary modulus transformation
// K(m) = K(m/(m-1))/sqrt(1-m) (A&S 17.4.17).
func ellipK(m float64) float64 {
	if m < 0 {
		return mathext.CompleteK(m/(m-1)) / math.Sqrt(1-m)
	}
	return mathext.CompleteK(m)
}

// ellipE is E(m) for m <= 1; below zero by E(m) = sqrt(1-m) E(m/(m-1))
// (A&S 17.4.18).
func ellipE(m float64) float64 {
	if m < 0 {
		return mathext.CompleteE(m/(m-1)) * math.Sqrt(1-m)
	}
	return mathext.CompleteE(m)
}

// ellipD is D(m) = (K - E)/m, without its cancellation at small m (DLMF
// 19.2.6). Below zero D = B(m/(m-1))/sqrt(1-m), B = K - D: the substitution
// θ → π/2 - θ in the defining integral.
func ellipD(m float64) float64 {
	if m < 0 {
		return mathext.CompleteB(m/(m-1)) / math.Sqrt(1-m)
	}
	return mathext.CompleteD(m)
}

// ellipKSlope is dK/dm = (K - D)/(2(1 - m)), from DLMF 19.4.1 with E = K - mD.
func ellipKSlope(m float64) float64 { return (ellipK(m) - ellipD(m)) / (2 * (1 - m)) }

func ellipKDiff(n int, x, y Code) (Code, error) {
	num, err := Sub(n, y, hidden(n, x))
	if err != nil {
		return Code{}, err
	}
	den, err := Sub(n, Num(2), product(n, Num(2), x))
	if err != nil {
		return Code{}, err
	}
	return Div(n, num, den)
}

// hidden is ellipD, which occurs in derivatives only.
func hidden(n int, a Code) Code {
	c, err := dFunction.call(n, a)
	if err != nil {
		return nullOf(a.Type) // complex: refused before, by ellipK or ellipE
	}
	return c
}

var dFunction *unary

func init() {
	dFunction = unary{re: ellipD, outside: modulus, slope: ellipDSlope, diff: ellipDDiff}.named("ellipD")
}

// ellipDSlope is dD/dm = ((K - D)/(1 - m) - D)/(2m), with its limit 3π/32 and
// series where the difference cancels: D = π/4 (1 + 3m/8 + 15m²/64 + 175m³/1024 + …).
func ellipDSlope(m, d float64) float64 {
	if math.Abs(m) < 1e-4 {
		return math.Pi / 4 * (3.0/8 + m*(30.0/64+m*(525.0/1024)))
	}
	return ((ellipK(m)-d)/(1-m) - d) / (2 * m)
}

// ellipDDiff builds the same expression; at m = 0 itself it divides by zero.
func ellipDDiff(n int, x, y Code) (Code, error) {
	k, err := ellipKDiff(n, x, call1("ellipK", n, x))
	if err != nil {
		return Code{}, err
	}
	num, err := Sub(n, product(n, Num(2), k), hidden(n, x))
	if err != nil {
		return Code{}, err
	}
	return Div(n, num, product(n, Num(2), x))
}
