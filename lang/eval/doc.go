// Package eval computes. It knows nothing of syntax, names or units: every
// Value is in coherent SI units, and the compiler above it has already decided
// what each name stands for and whether dimensions agree.
//
// # How it works
//
// A compiler builds a Code from small combinators (Const, Slot, Add, Dot,
// Builtin, Integral, …). A Code is a closure over a flat Frame of slots; it is
// built once and run as often as an integral or a sum needs. Each Code has a
// static Type (shape, real or complex). Code whose type is a real number has a
// second closure, Real, that works on bare float64 without allocation: that is
// what integrands run on. Any handles every type.
//
// # Derivatives
//
// There are two, both exact. A Value carries a tangent, its first derivative
// along the direction in which the frame's slots were seeded (dual numbers,
// forward mode): that is how uncertainty is propagated (see Propagate). And
// every Code can be differentiated into a new Code (see Derivative), so that
// derivatives of derivatives, and their uncertainty, are exact too.
//
// # Faults
//
// What can only be found while computing (a division by zero, a diverging
// integral) is a Fault, kept in the Frame: the first one stands, the closures
// that follow return zero, and loops stop. What can be found from the types
// alone is a *ShapeError from the combinator. The package does not panic.
//
// # Conventions decided here
//
//   - Vectors have three Cartesian components (x, y, z). In curvilinear regions
//     too, a vector integrand and the outward normal n are Cartesian.
//   - Tensors are 3×3, stored and given row by row: xx xy xz yx yy yz zx zy zz.
//   - Dot products do not conjugate. |v| of a complex vector is sqrt(Σ|v_i|²).
//   - tensor·tensor is the matrix product; vector·tensor is Tᵀ·v.
//   - |x| and max at a point where they have no derivative take the one from the
//     side of positive x, or of the first of equal arguments.
//   - A real function whose value would be complex faults rather than returns
//     NaN; give it a complex argument (x + 0*j) for the principal value.
package eval
