package rules

import (
	"fmt"
	"math"
	"math/big"
	"slices"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file reads the matrix of capacitances that a note writes out.

// entry is one capacitance of a term, with its coefficient.
type entry struct {
	cap  lang.Factor
	coef *big.Rat // 1 for C_ij of ½ΣΣC_ij·V_i·V_j
}

// matrix is Σ C_ij·V_i·V_j/2, or Q_i = Σ C_ij·V_j, by pairs of potentials.
type matrix struct {
	note    *lang.Note
	entries map[pair][]entry
}

func (m *matrix) add(a, b lang.Factor, t *product, coef *big.Rat) {
	at := inOrder(a.Key, b.Key)
	m.entries[at] = append(m.entries[at], entry{t.byRole[roleCapacity][0], coef})
}

// oneCapacitance reports a term with a single capacitance and potentials.
func oneCapacitance(t *product) bool {
	cs := t.byRole[roleCapacity]
	return len(cs) == 1 && cs[0].Exp == unit.Whole(1) && isOf(cs[0].Facts, kind.Capacitance) && t.pi == 0 && t.only(roleCapacity, roleElectric) &&
		!slices.ContainsFunc(t.byRole[roleElectric], func(f lang.Factor) bool { return !isOf(f.Facts, kind.Voltage) || f.Exp.Sign() < 0 || f.Symbol == nil })
}

// energyMatrix reads ½C_11·V_1² + C_12·V_1·V_2 + …; terms of another make are
// left out.
func (c *claim) energyMatrix() *matrix {
	m := &matrix{c.note, map[pair][]entry{}}
	for _, t := range c.view.products(c.sym) {
		if !oneCapacitance(t) {
			continue
		}
		switch vs := t.byRole[roleElectric]; {
		case len(vs) == 1 && vs[0].Exp == two:
			m.add(vs[0], vs[0], t, new(big.Rat).Mul(t.coef, big.NewRat(2, 1)))
		case len(vs) == 2 && vs[0].Exp == unit.Whole(1) && vs[1].Exp == unit.Whole(1):
			m.add(vs[0], vs[1], t, t.coef)
		}
	}
	return m
}

// chargeMatrix reads Q_1 = C_11·V_1 + C_12·V_2 and Q_2 = C_12·V_1 + C_22·V_2:
// one capacitance that ties two charges to each other's potential; nil for
// anything else.
func chargeMatrix(c, d *claim) *matrix {
	first, second := c.charges(), d.charges()
	for _, x := range first {
		for _, y := range second {
			if x.cap.Key != y.cap.Key || x.at.Key == y.at.Key || x.coef.Cmp(y.coef) != 0 {
				continue
			}
			m := &matrix{c.note, map[pair][]entry{}}
			if m.row(first, y.at, x.at) && m.row(second, x.at, y.at) {
				return m
			}
		}
	}
	return nil
}

// row adds the terms of the charge at one potential: those of its own make the
// diagonal, those of the other the cross entry, which both charges share and
// which is added once. False where its own potential does not draw it.
func (m *matrix) row(terms []drawn, own, other lang.Factor) bool {
	cross := inOrder(own.Key, other.Key)
	fill := len(m.entries[cross]) == 0
	drawsOwn := false
	for _, z := range terms {
		switch {
		case z.at.Key == own.Key:
			at := inOrder(own.Key, own.Key)
			m.entries[at] = append(m.entries[at], z.entry)
			if z.coef.Sign() < 0 {
				return false
			}
			drawsOwn = true
		case z.at.Key == other.Key && fill:
			m.entries[cross] = append(m.entries[cross], z.entry)
		}
	}
	return drawsOwn
}

// drawn is a term C·V of a charge.
type drawn struct {
	entry
	at lang.Factor
}

func (c *claim) charges() []drawn {
	var out []drawn
	for _, t := range c.view.products(c.sym) {
		if vs := t.byRole[roleElectric]; oneCapacitance(t) && len(vs) == 1 && vs[0].Exp == unit.Whole(1) {
			out = append(out, drawn{entry{t.byRole[roleCapacity][0], t.coef}, vs[0]})
		}
	}
	return out
}

// value is an entry's sum; ok is false where a capacitance has no known value.
func (m *matrix) value(at pair) (x float64, ok bool) {
	for _, e := range m.entries[at] {
		size, known := signedSize(e.cap)
		if !known {
			return 0, false
		}
		k, _ := e.coef.Float64()
		x += k * size
	}
	return x, len(m.entries[at]) > 0
}

// signedSize is the value of a capacitance, or of an element of a tensor.
func signedSize(f lang.Factor) (float64, bool) {
	s := f.Symbol
	if s == nil || !s.Known || !s.Value.IsReal() {
		return 0, false
	}
	if len(f.Part) == 2 && s.Value.Len() == 9 {
		return s.Value.At(3*int(f.Part[0]-'x') + int(f.Part[1]-'x')).Re(), true
	}
	return s.Value.Re(), s.Value.Len() == 1 && f.Part == ""
}

// judgeMatrix reports a cross entry that is positive, a row that draws less
// than nothing, and forms that are mixed.
func (c *claim) judgeMatrix(p *check.Pass, m *matrix) bool {
	for _, at := range m.crosses() {
		a, b := pair{at[0], at[0]}, pair{at[1], at[1]}
		if len(m.entries[a]) == 0 || len(m.entries[b]) == 0 || m.inSeries(at) {
			continue
		}
		cross, ok := m.value(at)
		selfA, okA := m.value(a)
		selfB, okB := m.value(b)
		why := m.mixed(at)
		switch {
		case why != "":
		case !ok || !okA || !okB:
			continue
		case cross > noise*math.Sqrt(math.Abs(selfA*selfB)):
			why = fmt.Sprintf("%s is positive beside the product of both potentials", m.capName(at))
		case len(m.crosses()) == 1 && math.Min(selfA, selfB)+cross < -noise*math.Max(selfA, selfB):
			why = fmt.Sprintf("%s is larger than what stands on the diagonal", m.capName(at))
		}
		if why != "" {
			c.report(p, lang.Fault{
				Message: fmt.Sprintf("%s takes capacitances for coefficients of Q = C·V, or the other way round: %s", c.sym.Name, why),
				Detail: "With C_ij the coefficients, C_ij ≤ 0 off the diagonal: `1/2*C_11*V_1^2 + C_12*V_1*V_2 + 1/2*C_22*V_2^2`. " +
					"With c_ij the capacitors between electrodes: `1/2*c_10*V_1^2 + 1/2*c_20*V_2^2 + 1/2*c_12*(V_1 - V_2)^2`. Both potentials count from one reference.",
				Related: c.because(m.factors(at), func(s *lang.Symbol) string { return s.Name + " = " + s.Shown }),
			})
			return true
		}
	}
	return false
}

// crosses are the pairs of different potentials, in order.
func (m *matrix) crosses() []pair {
	var out []pair
	for at := range m.entries {
		if at[0] != at[1] {
			out = append(out, at)
		}
	}
	slices.SortFunc(out, func(a, b pair) int { return slices.Compare(a[:], b[:]) })
	return out
}

// inSeries reports the capacitor of ½c(V_1 + V_2)²: it stands alike on the
// diagonal and, positive, beside the product.
func (m *matrix) inSeries(at pair) bool {
	return slices.ContainsFunc(m.entries[at], func(e entry) bool {
		return e.coef.Sign() > 0 && m.holds(pair{at[0], at[0]}, e.cap.Key, 1) && m.holds(pair{at[1], at[1]}, e.cap.Key, 1)
	})
}

// holds reports a capacitance with a coefficient of the sign.
func (m *matrix) holds(at pair, key string, sign int) bool {
	return slices.ContainsFunc(m.entries[at], func(e entry) bool { return e.cap.Key == key && e.coef.Sign() == sign })
}

// mixed tells how declared kinds contradict the form in which they stand.
func (m *matrix) mixed(at pair) string {
	for _, e := range m.entries[at] {
		for _, d := range []pair{{at[0], at[0]}, {at[1], at[1]}} {
			inside := m.holds(d, e.cap.Key, 1)
			if e.cap.Facts.Kind.Is(kind.PartialCapacitance) && !inside {
				return fmt.Sprintf("%s is declared as a partial capacitance and is missing on the diagonal", factorName(e.cap))
			}
			for _, own := range m.entries[d] {
				if inside && own.cap.Key != e.cap.Key && own.cap.Facts.Kind.Is(kind.CapacitanceCoefficient) {
					return fmt.Sprintf("%s is declared as a capacitance coefficient, which holds %s already", factorName(own.cap), factorName(e.cap))
				}
			}
		}
	}
	return ""
}

func (m *matrix) capName(at pair) string { return factorName(m.entries[at][0].cap) }

func (m *matrix) factors(at pair) []lang.Factor {
	var out []lang.Factor
	for _, e := range m.entries[at] {
		out = append(out, e.cap)
	}
	return out
}
