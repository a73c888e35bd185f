// Package reduce takes a quadratic action to the one operator that remains: it writes the
// action as ½∫Φᵀ𝒟Φ with 𝒟 a self-adjoint matrix over K[D], solves the constraints, removes the
// fields that do not propagate, and says what is left: its normal form, the number of degrees
// of freedom with an independent count, the sound speed, the canonical variable and the
// conditions for stability.
//
// All steps are congruences E†𝒟E with E unimodular, or Schur complements with an exact
// inverse, so that the propagating content, Det 𝒟, never changes. Each is recorded.
package reduce
