package eval

import "math"

// The 7-point Gauss rule and its 15-point Kronrod extension on [-1, 1], after
// R. Piessens et al., QUADPACK (Springer, 1983), routine QK15. Nodes ascend;
// those of odd index are the Gauss nodes. Their degrees of exactness (13 and
// 22) are tested, and the Gauss half is compared with gonum's.
const panelSize = 15

var kronrodNodes, kronrodWeights, gaussWeights = mirror(
	[8]float64{
		0.991455371120812639206854697526329, 0.949107912342758524526189684047851,
		0.864864423359769072789712788640926, 0.741531185599394439863864773280788,
		0.586087235467691130294144691693830, 0.405845151377397166906606412076961,
		0.207784955007898467600689403773245, 0,
	},
	[8]float64{
		0.022935322010529224963732008058970, 0.063092092629978553290700663189204,
		0.104790010322250183839876322541518, 0.140653259715525918745189590510238,
		0.169004726639267902826583426598550, 0.190350578064785409913256402421014,
		0.204432940075298892414161999234649, 0.209482141084727828012999174891714,
	},
	[8]float64{
		0, 0.129484966168869693270611432679082,
		0, 0.279705391489276667901467771423780,
		0, 0.381830050505118944950369775488975,
		0, 0.417959183673469387755102040816327,
	})

func mirror(x, wk, wg [8]float64) (nodes, kron, gauss [panelSize]float64) {
	for i := range 8 {
		j := panelSize - 1 - i
		nodes[i], nodes[j] = -x[i], x[i]
		kron[i], kron[j] = wk[i], wk[i]
		gauss[i], gauss[j] = wg[i], wg[i]
	}
	return nodes, kron, gauss
}

// edgeWeights extrapolate the polynomial through the 15 values to -1. Where the
// integrand's own value there is another one, something narrow hides between
// the end and the first node (a skin of current at a surface, say).
var edgeWeights = lagrangeAtMinusOne()

func lagrangeAtMinusOne() (w [panelSize]float64) {
	for i, xi := range kronrodNodes {
		w[i] = 1
		for j, xj := range kronrodNodes {
			if i != j {
				w[i] *= (-1 - xj) / (xi - xj)
			}
		}
	}
	return w
}

// nullEven and nullOdd vanish on polynomials of degree 13 and 12: they are the
// divided difference of the 15 values, and that times x. They have the norm of
// the Kronrod weights. Where an integrand is not smooth the difference of the
// two rules may be small by chance; that all three are is not to be feared (J.
// Berntsen and T. Espelid, ACM Trans. Math. Softw. 17 (1991) 233).
var nullEven, nullOdd = nullRules()

func nullRules() (even, odd [panelSize]float64) {
	var ne, no, nk float64
	for i, xi := range kronrodNodes {
		even[i] = 1
		for j, xj := range kronrodNodes {
			if i != j {
				even[i] /= xi - xj
			}
		}
		odd[i] = even[i] * xi
		ne, no, nk = ne+even[i]*even[i], no+odd[i]*odd[i], nk+kronrodWeights[i]*kronrodWeights[i]
	}
	for i := range even {
		even[i] *= math.Sqrt(nk / ne)
		odd[i] *= math.Sqrt(nk / no)
	}
	return even, odd
}

// panelSum is the rule applied to one component: integral, error estimate and
// integral of the magnitude, all over an interval of half-width h. The estimate
// is the largest of the difference of the rules, of the null rules, and of
// QUADPACK's, which weighs the difference by the spread of the integrand about
// its mean.
func panelSum(h float64, fx []float64) (sum, err, abs float64) {
	fx = fx[:panelSize]
	var g, even, odd float64
	for i, y := range fx {
		sum += kronrodWeights[i] * y
		g += gaussWeights[i] * y
		abs += kronrodWeights[i] * math.Abs(y)
		even += nullEven[i] * y
		odd += nullOdd[i] * y
	}
	mean, asc := sum/2, 0.0
	for i, y := range fx {
		asc += kronrodWeights[i] * math.Abs(y-mean)
	}
	err = max(math.Abs(sum-g), math.Abs(even), math.Abs(odd)) * h
	sum, abs, asc = sum*h, abs*h, asc*h
	if asc != 0 && err != 0 {
		r := min(1, 200*err/asc)
		err = max(err, asc*r*math.Sqrt(r))
	}
	return sum, max(err, 50*epsilon*abs), abs
}

// epsilon is the relative spacing of float64 at 1.
const epsilon = 0x1p-52

// edgeValues are the values at the ends that the panel predicts.
func edgeValues(fx []float64) (left, right float64) {
	for i, w := range edgeWeights {
		left += w * fx[i]
		right += w * fx[panelSize-1-i]
	}
	return left, right
}
