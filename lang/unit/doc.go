// Package unit reads unit phrases: dimension, exact factor, level.
//
// # Phrases
//
// A phrase has no blanks: symbols joined by `·` (or `.`) and `/`, exponents
// `^2`, `^-1`, `^(1/2)`, `²`, `⁻¹`, groups in parentheses. A `/` divides by the
// next symbol or group, and nothing may follow that in the same group, since
// `W/m·K` reads in two ways (ISO 80000-1). A symbol is looked up whole before it
// is split into prefix and unit, so `min`, `cd`, `ft`, `yd` and `au` are
// themselves. Units outside the SI take no prefix, or the few in use.
//
// # Exactness
//
// A Factor is a rational times a power of π, exact however long the phrase; the
// float64 that ToSI uses keeps numerator and denominator apart, so that 7 mm is
// 7/1000 correctly rounded. Inexact are only factors that rest on a measured
// constant (Da), on c through the Gaussian correspondences that have been
// conventional since 2019 (statC, statV, statA), and logarithms.
//
// # Angle and cycle
//
// Plane angle and cycle are tracked beside the seven base dimensions: rad, °
// and sr carry angle, Hz and rpm carry a cycle, Bq and 1/s neither. They keep
// Hz, rad/s and 1/s apart without ever making a dimension error: what may be
// added or converted is decided by Dim.Compatible, which leaves them out.
//
// # Levels
//
// dB and Np leave 10 or 20 lg to the kind of the quantity (ByKind); dBm, dBW,
// dBi, dBd, dBuV, dBuV/m have it fixed, and `dB(uV/m)` takes it from the
// dimension in parentheses. A level per length is an attenuation coefficient,
// a plain unit: 1 dB/m is ln 10/20 m⁻¹.
//
// # The customary units and go-units
//
// go-units supplies the factors of in, ft, yd, mi, oz, lb, Å and cal, which pass
// the audit against NIST SP 811 (audit_test.go); it is asked by its own exported
// units, never by a user's text, since its search is random for some spellings.
// Its other customary units are defined here: bar, atm, inHg, psi and eV have
// wrong or rounded factors there, and hp, BTU, lbf, dyn, erg and the Gaussian
// units are missing. Linking it costs about 1.3 ms at process start, a seventh
// of what a cold review may take; the factors themselves are read when the first
// of these units is, 0.1 ms once. If the start becomes the limit, eight decimals
// in the table replace it, and the audit stays.
//
// # Limits
//
// Exponents beyond ±99, groups deeper than eight and factors outside the range
// of float64 are faults. Nothing panics on any input.
package unit
