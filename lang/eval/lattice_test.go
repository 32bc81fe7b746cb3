package eval

import (
	"context"
	"math"
	"math/big"
	"testing"
)

// Madelung constant of rock salt by R. Benson's series of hyperbolic secants,
// 12π Σ sech²(π/2·sqrt(m²+n²)) over odd m, n >= 1 (Finch, Mathematical
// Constants, sec. 1.10), against OEIS A085469.
func TestMadelungByHyperbolicSeries(t *testing.T) {
	e := expr{t}
	odd := func(s int) Code { return e.sub(e.mul(Num(2), slot(s)), Num(1)) }
	arg := e.mul(Num(math.Pi/2), e.call("sqrt", e.add(e.pow(odd(0), 2), e.pow(odd(1), 2))))
	term := e.pow(e.call("cosh", arg), -2)
	inner := must(t)(Sum(0, 1, Num(1), Num(9), term))
	c := e.mul(Num(12*math.Pi), must(t)(Sum(0, 0, Num(1), Num(9), inner)))
	near(t, "NaCl", run(t, c, Value{}, Value{}).Re(), 1.7475645946331821906362120355444, 1e-15)
}

// Madelung constants of the square and the 8-dimensional lattice from zeta and
// beta functions, these from their integrals (DLMF 25.5.3, 25.5.1 and for
// Dirichlet's beta the same with 1/(2 cosh x)): singular at 0 and infinite.
// OEIS A088537 and A261805.
func TestMadelungByIntegrals(t *testing.T) {
	e := expr{t}
	x := slot(0)
	integral := func(body Code) float64 {
		return run(t, must(t)(Integral(0, 0, Num(0), Num(inf), body)), Value{}).Re()
	}
	exp := func(c Code) Code { return e.call("exp", c) }
	root := e.pow(x, -0.5)
	eta := integral(e.div(root, e.add(exp(x), Num(1)))) / math.Sqrt(math.Pi)
	beta := integral(e.div(e.mul(Num(0.5), root), e.call("cosh", x))) / math.Sqrt(math.Pi)
	near(t, "2-D", -4*eta*beta, -1.61554262671282472386792333275861809, 1e-9)
	zetaHalf := eta / (1 - math.Sqrt2)
	zeta72 := integral(e.div(e.pow(x, 2.5), e.sub(exp(x), Num(1)))) / math.Gamma(3.5)
	m8 := 15 / (4 * math.Pow(math.Pi, 3)) * (8*math.Sqrt2 - 1) * zetaHalf * zeta72
	near(t, "8-D", m8, -2.052466827269271228176337799173383991708, 1e-9)
}

// Capacitance of the ring torus without hole: K = (1/π)∫ dt/I0(t)², with I0 as
// an integral of its own (DLMF 10.32.1); OEIS A249220.
func TestHornTorusByNestedIntegrals(t *testing.T) {
	e := expr{t}
	i0 := e.div(must(t)(Integral(0, 1, Num(0), Num(math.Pi), e.call("exp", e.mul(slot(0), e.call("cos", slot(1)))))), Num(math.Pi))
	c := e.div(must(t)(Integral(0, 0, Num(0), Num(inf), e.pow(i0, -2))), Num(math.Pi))
	near(t, "K", run(t, c, Value{}, Value{}).Re(), 0.435345066268971927532148125596, 1e-9)
}

// rockSalt is a cube of 2n+1 ions a side around the origin, unit distance. Ions
// on faces, edges and corners count a half, a quarter and an eighth (H. M.
// Evjen, Phys. Rev. 39 (1932) 675), which makes the cube neutral; the ion at the
// origin is left out.
func rockSalt(n int) (q, x, y, z []float64) {
	for i := -n; i <= n; i++ {
		for j := -n; j <= n; j++ {
			for k := -n; k <= n; k++ {
				if i == 0 && j == 0 && k == 0 {
					continue
				}
				c := 1 - 2*math.Abs(float64((i+j+k)%2))
				for _, s := range []int{i, j, k} {
					if s == n || s == -n {
						c /= 2
					}
				}
				q, x, y, z = append(q, c), append(x, float64(i)), append(y, float64(j)), append(z, float64(k))
			}
		}
	}
	return q, x, y, z
}

func lists(xs ...[]float64) (out []Code) {
	for _, x := range xs {
		out = append(out, Const(ListOf(x...)))
	}
	return out
}

// Evjen's sums converge to Madelung's constant (OEIS A085469).
func TestPotentialConvergesToMadelung(t *testing.T) {
	last := math.Inf(1)
	for _, n := range []int{2, 4, 8} {
		q, x, y, z := rockSalt(n)
		l := lists(q, x, y, z)
		c := must(t)(Potential(0, l[0], l[1], l[2], l[3], Num(1/(4*math.Pi)), Const(Vec(0, 0, 0))))
		off := math.Abs(-run(t, c).Re() - 1.7475645946331821906362120355444)
		if off > last/4 {
			t.Errorf("cube of %d: off by %.2g after %.2g", n, off, last)
		}
		last = off
	}
	if last > 2e-4 {
		t.Errorf("off by %.2g at the end", last)
	}
}

// The energy of a cube of 216 charges of mixed size against the same sum with
// 200 bits.
func TestAssemblyEnergyAgainstBigFloat(t *testing.T) {
	var q, x, y, z []float64
	for i := range 216 {
		q = append(q, math.Sin(float64(i*i))*math.Exp(float64(i%7)))
		x, y, z = append(x, float64(i%6)*0.1), append(y, float64(i/6%6)*0.1), append(z, float64(i/36)*0.1)
	}
	l := lists(q, x, y, z)
	c := must(t)(AssemblyEnergy(0, l[0], l[1], l[2], l[3], Num(1/(4*math.Pi))))
	near(t, "energy", run(t, c).Re(), bigEnergy(q, x, y, z), 2e-15)
}

func bigEnergy(q, x, y, z []float64) float64 {
	b := func(v float64) *big.Float { return new(big.Float).SetPrec(200).SetFloat64(v) }
	sum := b(0)
	for i := range q {
		for j := range i {
			r2 := b(0)
			for _, c := range [][]float64{x, y, z} {
				d := b(0).Sub(b(c[i]), b(c[j]))
				r2.Add(r2, d.Mul(d, d))
			}
			t := b(0).Mul(b(q[i]), b(q[j]))
			sum.Add(sum, t.Quo(t, r2.Sqrt(r2)))
		}
	}
	v, _ := sum.Float64()
	return v
}

// An ill-conditioned sum against 200 bits: the compensated sum loses nothing
// beyond the rounding of its terms.
func TestSumAgainstBigFloat(t *testing.T) {
	e := expr{t}
	sign := e.call("cos", e.mul(Num(math.Pi), slot(0)))
	term := e.add(e.div(sign, e.pow(slot(0), 2)), e.mul(Num(1e6), sign)) // (-1)^n (1e6 + 1/n²)
	c := must(t)(Sum(0, 0, Num(1), Num(20000), term))
	want := new(big.Float).SetPrec(200)
	f := NewFrame(context.Background(), 1, Budget{})
	for n := 1; n <= 20000; n++ {
		f.Set(0, Real(float64(n)))
		v, _ := f.Run(0, term)
		want.Add(want, new(big.Float).SetPrec(200).SetFloat64(v.Re()))
	}
	w, _ := want.Float64()
	near(t, "sum", run(t, c, Value{}).Re(), w, 1e-15)
}

func TestChargesInOnePlace(t *testing.T) {
	l := lists([]float64{1, 2, 3}, []float64{0, 1, 0}, []float64{0, 0, 0}, []float64{0, 0, 0})
	c := must(t)(AssemblyEnergy(4, l[0], l[1], l[2], l[3], Num(1)))
	_, fault := NewFrame(context.Background(), 0, Budget{}).Run(0, c)
	if fault == nil || fault.Rule != RuleDivision || fault.Node != 4 || fault.Message != "charges 1 and 3 are in one place" {
		t.Errorf("fault %+v", fault)
	}
}
