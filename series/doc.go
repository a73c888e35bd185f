// Package series holds truncated power series over the differential field K of package
// field. Some generators of K are given weights: small parameters weigh 1, the wave number
// weighs 1 on large scales (k → 0) and −1 on small ones (k → ∞). With every such generator g
// replaced by λ^w(g) g, an element of K becomes a Laurent series in λ whose coefficient of
// λⁿ is homogeneous of weight n; λ itself is never written. So a coefficient may have a
// denominator such as ε + η, and a series may begin below weight 0.
//
// The order of truncation is part of the value: O(n) says that nothing is known of weight n
// or above, and a sum of unlike truncations has the lower order. Products, inverses, powers,
// roots, elementary functions and the derivation all state the order that they can vouch
// for. Coefficients are exact.
//
// Entire functions of one variable with rational data are a second kind of value (Entire,
// Fraction): they are expanded exactly, enclosed rigorously, and their zeros in a disc are
// counted with proof (ZerosInDisc, CompareTruncation).
//
// The relations of the field must not change during the life of a Grading and its series.
package series
