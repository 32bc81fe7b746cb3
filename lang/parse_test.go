package lang

import "testing"

func TestEveryStatementOfTheExampleIsRead(t *testing.T) {
	s := Read(`Grading capacitor, stored energy
================================

Four mica discs between plates, in oil. Fringing is left out.

    uses "handbook/solids"

    medium mica: linear, uniaxial, homogeneous, lossy
        eps_r     = diag(6.9, 6.9, 8.7)           per "supplier sheet M-7, table 2"
        E_bd      = 118 kV/mm                     per "supplier sheet M-7, table 4"
        tan_delta = 3e-4 for f from 50 Hz to 1 MHz   per "supplier sheet M-7, table 5"

    U, peak voltage = 12.0(1) kV                  per "nameplate"
    d = 3.00 mm ± 0.05 mm                         per "drawing 12-441 rev C"
    R = 40 mm

    assume d << R
    E in mica, peak electric field strength = (0, 0, 1)*U/d = (0, 0, 4.000) kV/mm
    D in mica = mica.eps*E
    w, peak energy density = 1/2 * D·E = 616.3 J/m^3
    region disc in mica: cylinder(R, d)
    W, energy = integral(w over disc) = __ mJ

    criterion |E| <= mica.E_bd/10                 per "design rule 4.2"
    table bh: H [A/m], B/T, S [VA] = H*B  per "x"
       0 0
       1 -2e3
    regime: harmonic at f = 50 Hz
    waive half-missing-stored-energy for mica.eps: "ok"
    plot w, d for x from 1 mm to 2 mm
    assume "no wind"
    safety "earth it" per "IEC"
    check S(1 m) = 2.84 W/m^2
`, nil)
	for _, st := range s.Stmts {
		for _, f := range st.Faults {
			t.Errorf("%q: %v %s", st.Text, f.Span, f.Message)
		}
	}
}
