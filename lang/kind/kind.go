// Package kind is the table of quantity kinds and qualifiers.
package kind

import (
	"strings"

	"inkjoule/lang/unit"
)

// ID is a kind of quantity, an index of the table; 0 is unknown.
type ID uint16

// Class groups kinds by how they follow the fields: it decides 10 or 20 lg for
// levels and which column of the coefficient table applies.
type Class uint8

// The classes.
const (
	ClassOther      Class = iota // neither: lengths, media, ratios
	ClassAmplitude               // root-power: fields, voltages, currents; takes peak and rms
	ClassEnergy                  // energies and energy densities, quadratic in the fields
	ClassPower                   // powers, power densities, dissipation
	ClassPowerFlux               // power through an area
	ClassForce                   // forces and pressures of fields
	ClassSourceWork              // energy drawn from a source
)

// Kind is one line of the table.
type Kind struct {
	Name   string // as in ISO 80000
	Also   string // further names, apart by "; "
	Symbol string // the usual symbol
	Unit   string // coherent SI unit, as a phrase
	Class  Class
	Parent ID   // the kind that this one specializes, 0 for none
	Plain  bool // the one plausible kind of its dimension, see Default
}

// valid reports an ID of the table.
func (k ID) valid() bool { return k > 0 && int(k) < len(table) }

// Info returns the line of the table; a line without a name for an unknown ID.
func (k ID) Info() *Kind {
	if k.valid() {
		return &table[k]
	}
	return &table[0]
}

// String returns the name of the kind, "" for an unknown one.
func (k ID) String() string { return k.Info().Name }

// Unit returns the coherent SI unit of the kind; the zero Unit for unknown.
func (k ID) Unit() unit.Unit {
	if k.valid() {
		return derived().units[k]
	}
	return unit.Unit{}
}

// Dim returns the dimension of the kind, angle and cycle included.
func (k ID) Dim() unit.Dim { return k.Unit().Dim }

// Names returns the name and the further names.
func (k *Kind) Names() []string {
	if k.Also == "" {
		return []string{k.Name}
	}
	return append([]string{k.Name}, strings.Split(k.Also, "; ")...)
}

// All lists every kind in the order of the table.
func All() []ID {
	list := make([]ID, 0, len(table)-1)
	for k := 1; k < len(table); k++ {
		list = append(list, ID(k))
	}
	return list
}

// Is reports whether k is a or a specialization of a: differential capacitance
// is a capacitance. Unknown is nothing.
func (k ID) Is(a ID) bool {
	for ; k.valid(); k = table[k].Parent {
		if k == a {
			return true
		}
	}
	return false
}

// Compatible reports whether quantities of the two kinds may be equated, added
// and compared as far as kinds decide: one is unknown, they are the same, one
// specializes the other, or nothing keeps them apart. Dimensions are the
// caller's business.
func Compatible(a, b ID) bool { return !Apart(a, b) }
