package rules

import (
	"fmt"
	"math/big"

	"inkjoule/lang"
	"inkjoule/lang/kind"
)

// This file words what is found about energies that are made with slopes.

// alternates reports an alternating voltage, which may ride on a bias.
func alternates(n *lang.Note, f lang.Factor) bool {
	switch statOf(n, f) {
	case kind.Peak, kind.RMS, kind.PeakToPeak, kind.Average:
		return true
	}
	return false
}

// nameOf names a factor in a message.
func nameOf(f lang.Factor) string {
	if f.Symbol != nil {
		return f.Symbol.Name
	}
	return "the voltage"
}

func (c *claim) slopeMessage(f lang.Factor, s *slope, u float64, known bool) string {
	name := "the capacitance"
	if f.Symbol != nil {
		name = f.Symbol.Name
	}
	if s.charge {
		return fmt.Sprintf("%s is half of charge times voltage, since %s is %s%s: that is no energy where the part is not linear", c.sym.Name, name, s.what, s.where())
	}
	of := "a voltage"
	if known {
		of = fmt.Sprintf("%.4g V", u)
	}
	return fmt.Sprintf("%s multiplies %s, which is %s%s, by the square of %s: a slope at one voltage does not give the energy", c.sym.Name, name, s.what, s.where(), of)
}

// where tells the voltages to which the capacitance belongs.
func (s *slope) where() string {
	switch {
	case s.biased:
		return fmt.Sprintf(" (at %.4g V)", s.bias)
	case s.hasRange:
		u := s.valid.Unit
		return fmt.Sprintf(" (%.4g %s to %.4g %s)", u.FromSI(s.valid.Low), u.Symbol, u.FromSI(s.valid.High), u.Symbol)
	}
	return ""
}

func (s *slope) remedy() string {
	if s.table != "" {
		return fmt.Sprintf("Integrate along the table: `integral(%[1]s.%[2]s*%[1]s.%[3]s for %[1]s.%[2]s from 0 V to U)`.", s.table, s.volts, s.farads)
	}
	return "Integrate the voltage times the slope, `integral(v*C_d(v) for v from 0 V to U)`, or take the energy-equivalent capacitance."
}

// alongTable tells by what factor the half product is off where a table gives
// the characteristic.
func (c *claim) alongTable(s *slope, u float64, known bool) string {
	if s.table == "" || !known {
		return ""
	}
	k, ok := curveOf(c.note, s.table, s.volts, s.farads)
	if !ok || !k.reaches(0, u) || !s.biased || !k.reaches(s.bias, s.bias) {
		return ""
	}
	right := k.moment(0, u)
	return fmt.Sprintf(" Along the table the energy is %.3g J; the half product with this reading is %.3g times that.", right, k.at(s.bias)*u*u/2/right)
}

// slopeFix integrates a plain 1/2*C_d(U)*U^2.
func (c *claim) slopeFix(t *product, s *slope) *lang.Fix {
	by := t.byRole[roleElectric]
	if s.charge || len(by) != 1 || by[0].Symbol == nil || len(t.all) != 2 || t.coef.Cmp(big.NewRat(1, 2)) != 0 || !s.sure || s.call == nil || len(s.call.Args) != 1 || s.sym != nil {
		return nil
	}
	u, ok := s.call.Args[0].(*lang.Name)
	if !ok || lang.CanonicalName(u.Text) != by[0].Symbol.Key || len(products(c.note.Normal(c.sym, atoms))) != 1 {
		return nil
	}
	fn := s.call.Fn.Text
	if of, ok := s.call.Of.(*lang.Name); ok {
		fn = of.Text + "." + fn
	}
	return &lang.Fix{Title: "Integrate the slope", Edits: []lang.Edit{{Span: c.span(), New: fmt.Sprintf("integral(v*%s(v) for v from 0 V to %s)", fn, u.Text)}}}
}
