package eval

import (
	"math"
	"testing"
)

// CODATA 2022 as tabulated by scipy (scipy/constants/_codata.py, table txt2022,
// commit 3dbf660a): value and standard uncertainty.
func TestConstants(t *testing.T) {
	want := map[string][2]float64{
		"eps_0": {8.8541878188e-12, 0.0000000014e-12}, "mu_0": {1.25663706127e-6, 0.00000000020e-6},
		"Z_0": {376.730313412, 0.000000059}, "c_0": {299792458, 0}, "q_e": {1.602176634e-19, 0},
		"h_planck": {6.62607015e-34, 0}, "k_B": {1.380649e-23, 0}, "N_A": {6.02214076e23, 0},
		"m_e": {9.1093837139e-31, 0.0000000028e-31}, "m_p": {1.67262192595e-27, 0.00000000052e-27},
		"g_n": {9.80665, 0}, "pi": {math.Pi, 0},
	}
	printed := map[string][2]float64{ // exact, printed to ten digits
		"sigma_SB": {5.670374419e-8, 1e-17}, "hbar": {1.054571817e-34, 1e-43},
	}
	got := map[string]Constant{}
	for _, c := range Constants() {
		got[c.Name] = c
		if c.Exact != (c.Standard == 0) || c.Meaning == "" || c.Source == "" || c.UnitPhrase == "" {
			t.Errorf("%s is described badly: %+v", c.Name, c)
		}
		if alpha := map[string]int{"eps_0": -1, "mu_0": 1, "Z_0": 1}[c.Name]; c.Alpha != alpha {
			t.Errorf("%s goes with alpha^%d, want %d", c.Name, c.Alpha, alpha)
		}
		w, ok := want[c.Name]
		if p, rounded := printed[c.Name]; rounded {
			if math.Abs(c.Value-p[0]) > p[1] {
				t.Errorf("%s = %.12g, printed %g", c.Name, c.Value, p[0])
			}
			continue
		}
		if !ok || c.Value != w[0] || c.Standard != w[1] {
			t.Errorf("%s = %g ± %g, want %v", c.Name, c.Value, c.Standard, w)
		}
	}
	// eps_0 mu_0 c_0^2 = 1 and Z_0 = mu_0 c_0, within the digits printed.
	near(t, "eps_0 mu_0 c_0^2", got["eps_0"].Value*got["mu_0"].Value*got["c_0"].Value*got["c_0"].Value, 1, 2e-10)
	near(t, "Z_0", got["mu_0"].Value*got["c_0"].Value, got["Z_0"].Value, 2e-10)
}
