package lang

// This file knows which properties of a medium give each other.

// derivation tells how a property follows from another one.
type derivation struct {
	from string
	how  byte // '0' times a constant, '/' divided by it, 'i' the inverse
	by   string
}

// derivations lists, for a property that the medium does not state, where it
// can come from: eps and eps_r, mu and mu_r, sigma and rho give each other.
func derivations(property string) []derivation {
	switch property {
	case "eps":
		return []derivation{{"eps_r", '*', "eps_0"}}
	case "eps_r":
		return []derivation{{"eps", '/', "eps_0"}}
	case "mu":
		return []derivation{{"mu_r", '*', "mu_0"}}
	case "mu_r":
		return []derivation{{"mu", '/', "mu_0"}}
	case "sigma":
		return []derivation{{"rho", 'i', ""}}
	case "rho":
		return []derivation{{"sigma", 'i', ""}}
	}
	return nil
}

// standardProperties are the property names of language.md with the kind that
// each has when its line declares none.
func standardProperties() map[string]string {
	return map[string]string{
		"eps_r": "relative permittivity", "eps": "permittivity", "mu_r": "relative permeability", "mu": "permeability",
		"sigma": "conductivity", "rho": "resistivity", "tan_delta": "loss factor", "E_bd": "dielectric strength",
		"B_sat": "saturation flux density", "density": "density", "c_p": "specific heat capacity", "k_th": "thermal conductivity",
	}
}

// propertyCells returns the keys of the cells behind MEDIUM.PROPERTY: its own,
// else those it is derived from; none where the medium has no such property.
func (a *analysis) propertyCells(medium, property string) []string {
	c := a.cells[medium]
	if c == nil || c.role != RoleMedium && c.role != RoleNote && c.role != RoleTable {
		return nil
	}
	if own := medium + "." + property; a.cells[own] != nil {
		return []string{own}
	}
	if property == "eps_c" {
		return a.complexPermittivityCells(medium)
	}
	for _, d := range derivations(property) {
		if from := medium + "." + d.from; a.cells[from] != nil {
			return []string{from}
		}
	}
	return nil
}

// complexPermittivityCells are the cells behind MEDIUM.eps_c: the permittivity
// and what adds loss to it.
func (a *analysis) complexPermittivityCells(medium string) []string {
	real := a.propertyCells(medium, "eps")
	if real == nil {
		return nil
	}
	for _, loss := range []string{"tan_delta", "sigma"} {
		if cs := a.propertyCells(medium, loss); cs != nil {
			real = append(real, cs...)
			break
		}
	}
	return real
}
