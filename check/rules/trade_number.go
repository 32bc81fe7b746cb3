package rules

import "math"

// This file takes the plain numbers of three-phase voltages apart: √3 between
// lines and earth, √2 between rms and crest, an overvoltage factor.

// trade is what such a number is made of.
type trade struct {
	root3, root2 int  // exponents of √3 and √2
	third        bool // it holds a whole factor of 3, up or down
}

// overvoltages are the factors that may stand beside the roots: tolerances and
// temporary overvoltages of up to 1.3, halves.
var overvoltages = []float64{1, 1.05, 1.1, 1.15, 1.2, 1.25, 1.3, 0.95, 0.9, 0.5, 2, 0.25}

// tradeOf finds the roots in a number; ok is false where it is no usual one.
// The simplest reading is taken, within the digits of 1.73 and 1.41.
func tradeOf(x float64) (t trade, ok bool) {
	best := math.Inf(1)
	for _, over := range overvoltages {
		for root3 := -2; root3 <= 2; root3++ {
			for root2 := -1; root2 <= 1; root2++ {
				y := over * math.Pow(3, float64(root3)/2) * math.Pow(2, float64(root2)/2)
				if off := math.Abs(x/y - 1); off < 0.0035 && off < best-1e-12 {
					best, ok = off, true
					t = trade{root3 % 2, root2, root3 == 2 || root3 == -2}
				}
			}
		}
	}
	return t, ok
}
