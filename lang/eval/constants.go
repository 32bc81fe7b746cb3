package eval

import "math"

// Constant is a physical constant.
type Constant struct {
	Name       string
	Value      float64 // coherent SI
	Standard   float64 // standard uncertainty, 0 where exact
	Exact      bool    // by definition, or computed from defined constants
	UnitPhrase string
	Meaning    string
	Source     string
	// Alpha is the power of the fine-structure constant to which the constant is
	// proportional, all else being exact: constants with one share their
	// uncertainty, with the sign of Alpha. 0: an uncertainty of its own, or none.
	Alpha int
}

const codata = "CODATA 2022"

// Exact by the definition of the SI (SI Brochure, 9th edition, 2019, section 2.2).
const (
	cLight = 299792458.0
	qElem  = 1.602176634e-19
	kBoltz = 1.380649e-23
	nAvo   = 6.02214076e23
	hPlan  = 6.62607015e-34
)

// Constants lists the constants of the language: CODATA 2022 (P. Mohr et al.,
// "CODATA recommended values of the fundamental physical constants: 2022",
// table XXXI; physics.nist.gov/constants). h/2π and σ are computed from the
// defined constants, so they are exact to the last bit rather than to the
// digits printed. eps_0, mu_0 and Z_0 are fully correlated (eps_0·mu_0·c_0² = 1
// exactly, Z_0 = mu_0·c_0): see Alpha.
func Constants() []Constant {
	pi5 := math.Pow(math.Pi, 5)
	return []Constant{
		{"eps_0", 8.8541878188e-12, 0.0000000014e-12, false, "F/m", "vacuum electric permittivity", codata, -1},
		{"mu_0", 1.25663706127e-6, 0.00000000020e-6, false, "N/A^2", "vacuum magnetic permeability", codata, 1},
		{"c_0", cLight, 0, true, "m/s", "speed of light in vacuum", codata, 0},
		{"Z_0", 376.730313412, 0.000000059, false, "ohm", "characteristic impedance of vacuum", codata, 1},
		{"q_e", qElem, 0, true, "C", "elementary charge", codata, 0},
		{"m_e", 9.1093837139e-31, 0.0000000028e-31, false, "kg", "electron mass", codata, 0},
		{"m_p", 1.67262192595e-27, 0.00000000052e-27, false, "kg", "proton mass", codata, 0},
		{"k_B", kBoltz, 0, true, "J/K", "Boltzmann constant", codata, 0},
		{"N_A", nAvo, 0, true, "mol^-1", "Avogadro constant", codata, 0},
		{"h_planck", hPlan, 0, true, "J/Hz", "Planck constant", codata, 0},
		{"hbar", hPlan / (2 * math.Pi), 0, true, "J·s", "reduced Planck constant", codata, 0},
		{"sigma_SB", 2 * pi5 * kBoltz * (kBoltz / hPlan) * (kBoltz / hPlan) * (kBoltz / hPlan) / (15 * cLight * cLight), 0, true,
			"W/(m^2·K^4)", "Stefan-Boltzmann constant", codata, 0},
		{"g_n", 9.80665, 0, true, "m/s^2", "standard acceleration of gravity", codata + "; 3rd CGPM (1901)", 0},
		{"pi", math.Pi, 0, true, "1", "ratio of a circle's circumference to its diameter", "mathematics", 0},
	}
}
