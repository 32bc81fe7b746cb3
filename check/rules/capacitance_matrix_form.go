package rules

import (
	"fmt"
	"math"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// CapacitanceMatrixForm finds capacitors of a network that stand as coefficients
// of Q = C·V, and coefficients that stand as capacitors.
func (Book) CapacitanceMatrixForm() check.Rule {
	return check.Rule{
		Name:     "capacitance-matrix-form",
		Severity: lang.Error,
		Title:    "Capacitances of two electrodes each stand as coefficients of a matrix, or the other way round",
		Sees: "A capacitance as a tensor on a vector of potentials (Q = C·V, ½V·C·V), or written out (½C₁₁V₁² + C₁₂V₁V₂ + ½C₂₂V₂², or Q₁ and Q₂ with one C₁₂), " +
			"of which an entry off the diagonal is positive, a row sum is negative, or an entry is declared as a partial capacitance and missing on the diagonal; " +
			"a capacitance coefficient off the diagonal that stands as a capacitor, ½C₁₂(V₁ − V₂)²; a coefficient on the diagonal beside such a capacitor.",
		Silent: "For the energy of the network, Σ½c_i0·V_i² + Σ½c_ij(V_i − V_j)², also expanded; for ½c(V₁ + V₂)², a capacitor across two voltages in series; for a charge C₁U₁ + C₂U₂ of two capacitors; " +
			"for entries off the diagonal below 1e-4 of the geometric mean of their diagonal, which are noise.",
		Formula: "Q_i = Σ_j C_ij·V_j with C_ii > 0, C_ij ≤ 0 and row sums ≥ 0; the capacitors of the network are c_ij = −C_ij and c_i0 = Σ_j C_ij.",
		Remedy:  "Convert once: C_ii = c_i0 + Σ c_ij and C_ij = −c_ij, and declare what the values are: capacitance coefficient or partial capacitance.",
		Source:  "Jackson, Classical Electrodynamics, 3rd ed., 1.11 (coefficients of capacity and induction; from memory)",
		Wrong: check.Example{Note: `    c_10, capacitance = 12 pF
    c_20, capacitance = 9 pF
    c_12, capacitance = 5 pF
    V_1, static electric potential = 100 V
    V_2, static electric potential = -40 V
    W, stored energy = 1/2*c_10*V_1^2 + c_12*V_1*V_2 + 1/2*c_20*V_2^2 = 47.2 nJ
`},
		Right: check.Example{Note: `    c_10, capacitance = 12 pF
    c_20, capacitance = 9 pF
    c_12, capacitance = 5 pF
    V_1, static electric potential = 100 V
    V_2, static electric potential = -40 V
    W, stored energy = 1/2*c_10*V_1^2 + 1/2*c_12*(V_1 - V_2)^2 + 1/2*c_20*V_2^2 = 116.2 nJ
`},
		Run: capacitanceMatrix,
	}
}

func capacitanceMatrix(p *check.Pass) error {
	v := viewOf(p)
	told := map[string]bool{} // tensors
	for _, c := range v.claims {
		if t := c.capacitanceTensor(); t != nil && !told[t.Key] {
			told[t.Key] = c.judgeTensor(p, t)
		}
		if c.isStored() {
			c.judgeMatrix(p, c.energyMatrix())
		}
	}
	var charges []*claim
	for _, c := range v.claims {
		if isOf(c.sym.Facts, kind.ElectricCharge) && len(c.charges()) > 1 {
			charges = append(charges, c)
		}
	}
	for i, c := range charges {
		for _, d := range charges[i+1:] {
			if m := chargeMatrix(c, d); m != nil && c.judgeMatrix(p, m) {
				return nil
			}
		}
	}
	return nil
}

// noise is the part of the diagonal below which an entry is numerical noise.
const noise = 1e-4

// capacitanceTensor is a capacitance that the claim multiplies on a vector.
func (c *claim) capacitanceTensor() *lang.Symbol {
	for _, t := range c.view.products(c.sym) {
		for _, f := range t.all {
			if f.Applied && f.Symbol != nil && f.Part == "" && isOf(f.Facts, kind.Capacitance) && f.Symbol.Known && f.Symbol.Value.Len() == 9 && f.Symbol.Value.IsReal() {
				return f.Symbol
			}
		}
	}
	return nil
}

// judgeTensor reports a tensor that is no matrix of coefficients.
func (c *claim) judgeTensor(p *check.Pass, s *lang.Symbol) bool {
	at := func(i, j int) float64 { return s.Value.At(3*i + j).Re() }
	for i := range 3 {
		row := 0.0
		for j := range 3 {
			row += at(i, j)
			if small := noise * math.Sqrt(math.Abs(at(i, i)*at(j, j))); i != j && at(i, j) > small {
				c.reportMatrix(p, s, fmt.Sprintf("the entry %s of %s is positive", "xyz"[i:i+1]+"xyz"[j:j+1], s.Name))
				return true
			}
		}
		if row < -noise*math.Abs(at(i, i)) {
			c.reportMatrix(p, s, fmt.Sprintf("the row %s of %s has a negative sum", "xyz"[i:i+1], s.Name))
			return true
		}
	}
	return false
}

func (c *claim) reportMatrix(p *check.Pass, s *lang.Symbol, why string) {
	f := lang.Fault{
		Message: fmt.Sprintf("%s takes %s as coefficients of Q = C·V, and %s", c.sym.Name, s.Name, why),
		Detail: "Off the diagonal a coefficient is what one potential draws to another electrode, and is not positive; a row sum is the capacitance to the reference. " +
			"If these are the capacitors between electrodes, take C_ii = c_i0 + Σc_ij and C_ij = -c_ij.",
		Related: c.because([]lang.Factor{{Symbol: s}}, func(s *lang.Symbol) string { return s.Name }),
	}
	if to, ok := c.networkEnergy(s); ok {
		f.Detail += fmt.Sprintf(" The energy of such a network is %.3g times %s.", to, c.sym.Name)
	}
	c.report(p, f)
}

// networkEnergy is the energy of the network whose capacitors are the entries
// of a tensor, over the claim's own value, for ½V·C·V.
func (c *claim) networkEnergy(s *lang.Symbol) (ratio float64, ok bool) {
	ps := c.view.products(c.sym)
	if len(ps) != 1 || !c.isStored() || !ps[0].is(1, 2) || len(ps[0].byRole[roleElectric]) != 1 || !c.sym.Known {
		return 0, false
	}
	v, ok := direction(ps[0].byRole[roleElectric][0].Symbol)
	own := c.sym.Value.Re()
	if !ok || own == 0 {
		return 0, false
	}
	w := 0.0
	for i := range 3 {
		w += s.Value.At(4*i).Re() * v[i] * v[i] / 2
		for j := range i {
			w += s.Value.At(3*i+j).Re() * (v[i] - v[j]) * (v[i] - v[j]) / 2
		}
	}
	return w / own, true
}
